import { lowerBound } from './lower-bound.ts'

export interface LocalPolynomialOptions {
  /** Points farther away than this, in units of x, carry no weight. */
  readonly halfWidth: number
  /** 1 a line, 2 a parabola, 3 a cubic. A cubic is exact for a cubic, and its value and slope err in the fourth power of the width. */
  readonly degree: 1 | 2 | 3
  /** Where fewer points lie within the half-width it is widened until there are so many; default 2·degree + 3. */
  readonly minimumPoints?: number
  /** Rows, both ends included, outside which the curve matters little: of many rows, nodes then lie four times as far apart there. */
  readonly closely?: { readonly first: number; readonly last: number }
}

export interface LocalFit {
  readonly value: number
  /** dy/dx. */
  readonly slope: number
}

/** With more rows than this within the half-width, means over cells stand for the rows, and the regression is done at nodes alone. */
const manyRows = 24
/**
 * Cells and nodes of a half-width. Cells keep cubics exact and leave as much of the noise as rows do. Nodes put the value off by some 1e-6 of a bell-shaped curve's
 * top and the slope by some 1e-5 of the steepest one; beside gaps by up to an eighth of what the regression itself is off there.
 */
const cellsPerHalfWidth = 16
const nodesPerHalfWidth = 12
const nodesWhereItMattersLittle = 3

/**
 * Value and slope of a curve at every x, by weighted regression of a polynomial on the neighbours (tricube weights). x ascends strictly and need not be evenly
 * spaced: nothing is resampled. Time grows with the number of rows alone: where more than 24 rows lie within the half-width, the regression is that of means of cells a
 * sixteenth of the half-width wide (weighted by the rows in them) on the means of the powers of x over them; it is done at nodes a twelfth of the half-width apart, and
 * a cubic through four nodes gives value and slope between them. Rows farther apart than nodes have a regression of their own.
 *
 * @source cleveland-1979; for even spacing and equal weights savitzky-golay-1964
 */
export function localPolynomial(
  x: Float64Array,
  y: Float64Array,
  options: LocalPolynomialOptions,
): { readonly value: Float64Array; readonly slope: Float64Array } {
  const rowsInHalfWidth = (options.halfWidth * (x.length - 1)) / ((x.at(-1) ?? 0) - (x[0] ?? 0))
  if (rowsInHalfWidth > manyRows) return throughNodes(x, meansOfCells(x, y, options.halfWidth / cellsPerHalfWidth), options)
  const value = new Float64Array(x.length)
  const slope = new Float64Array(x.length)
  const fitAt = localFit({ x, y, within: null }, options)
  for (let i = 0; i < x.length; i++) {
    const fit = fitAt(x[i] as number)
    value[i] = fit.value
    slope[i] = fit.slope
  }
  return { value, slope }
}

/** The same at one place, which need not be one of the x. */
export const localPolynomialAt = (x: Float64Array, y: Float64Array, at: number, options: LocalPolynomialOptions): LocalFit =>
  localFit({ x, y, within: null }, options)(at)

/** Value and slope at every x, from regressions of `samples` at nodes. */
function throughNodes(x: Float64Array, samples: Samples, options: LocalPolynomialOptions): { value: Float64Array; slope: Float64Array } {
  const value = new Float64Array(x.length)
  const slope = new Float64Array(x.length)
  const last = x.length - 1
  const closely = options.closely ?? { first: 0, last }
  const parts = [
    { first: 0, last: closely.first - 1, nodes: nodesWhereItMattersLittle },
    { ...closely, nodes: nodesPerHalfWidth },
    { first: closely.last + 1, last, nodes: nodesWhereItMattersLittle },
  ]
  const atNode = localFit(samples, options)
  const atRow = localFit(samples, options)
  for (const part of parts) if (part.last >= part.first) partThroughNodes(x, part, options.halfWidth, atNode, atRow, value, slope)
  return { value, slope }
}

function partThroughNodes(
  x: Float64Array,
  part: { readonly first: number; readonly last: number; readonly nodes: number },
  halfWidth: number,
  atNode: (at: number) => LocalFit,
  atRow: (at: number) => LocalFit,
  value: Float64Array,
  slope: Float64Array,
): void {
  const start = x[part.first] as number
  const span = (x[part.last] as number) - start
  const lastNode = Math.max(3, Math.ceil((span * part.nodes) / halfWidth))
  const step = span / lastNode
  // The four nodes around the rows of one interval; nodes that no row needs, as in a gap, are never fitted.
  const nodes: LocalFit[] = []
  let firstNode = -4
  for (let i = part.first; i <= part.last; ) {
    const at = x[i] as number
    if (!(step > 0) || (i > part.first && at - (x[i - 1] as number) > step)) {
      const fit = atRow(at)
      value[i] = fit.value
      slope[i] = fit.slope
      i++
      continue
    }
    const place = Math.floor((at - start) / step)
    const first = Math.min(lastNode - 3, Math.max(0, place - 1))
    for (let k = Math.max(first, firstNode + 4); k < first + 4; k++) nodes[k & 3] = atNode(start + k * step)
    firstNode = first
    const a = nodes[first & 3] as LocalFit
    const b = nodes[(first + 1) & 3] as LocalFit
    const c = nodes[(first + 2) & 3] as LocalFit
    const d = nodes[(first + 3) & 3] as LocalFit
    const v = cubicThrough(a.value, b.value, c.value, d.value)
    const s = cubicThrough(a.slope, b.slope, c.slope, d.slope)
    const from = start + first * step
    // All rows of the interval share these; the last interval takes the last row too.
    const end = place >= lastNode - 2 ? Infinity : start + (place + 1) * step
    let before = at
    do {
      const here = x[i] as number
      if (here - before > step) break
      before = here
      const u = (here - from) / step
      value[i] = v.c0 + u * (v.c1 + u * (v.c2 + u * v.c3))
      slope[i] = s.c0 + u * (s.c1 + u * (s.c2 + u * s.c3))
      i++
    } while (i <= part.last && (x[i] as number) < end)
  }
}

/** Coefficients of the cubic through four values at 0, 1, 2 and 3. */
const cubicThrough = (a: number, b: number, c: number, d: number): { c0: number; c1: number; c2: number; c3: number } => ({
  c0: a,
  c1: (18 * b - 11 * a - 9 * c + 2 * d) / 6,
  c2: (2 * a - 5 * b + 4 * c - d) / 2,
  c3: (3 * (b - c) + d - a) / 6,
})

/** Rows, or means of x and y over the rows of cells, with what tells how these lie about their mean: how many they are, and the means of the squares and cubes of their distances. */
interface Samples {
  readonly x: Float64Array
  readonly y: Float64Array
  readonly within: { readonly rows: Float64Array; readonly squares: Float64Array; readonly cubes: Float64Array } | null
}

/** Means over the rows of cells no wider than `width`, each cell beginning at a row. */
function meansOfCells(x: Float64Array, y: Float64Array, width: number): Samples {
  const n = x.length
  const meanX = new Float64Array(n)
  const meanY = new Float64Array(n)
  const rows = new Float64Array(n)
  const squares = new Float64Array(n)
  const cubes = new Float64Array(n)
  let cells = 0
  for (let i = 0; i < n; cells++) {
    const x0 = x[i] as number
    const y0 = y[i] as number
    const end = x0 + width
    let count = 0
    let sum1 = 0
    let sum2 = 0
    let sum3 = 0
    let sumY = 0
    do {
      const d = (x[i] as number) - x0
      const dd = d * d
      sum1 += d
      sum2 += dd
      sum3 += dd * d
      sumY += (y[i] as number) - y0
      count++
      i++
    } while (i < n && (x[i] as number) < end)
    const mean = sum1 / count
    const square = sum2 / count
    rows[cells] = count
    meanX[cells] = x0 + mean
    meanY[cells] = y0 + sumY / count
    squares[cells] = square - mean * mean
    cubes[cells] = sum3 / count - mean * (3 * square - 2 * mean * mean)
  }
  const filled = (values: Float64Array): Float64Array => values.subarray(0, cells)
  return { x: filled(meanX), y: filled(meanY), within: { rows: filled(rows), squares: filled(squares), cubes: filled(cubes) } }
}

/** The fit at any place. Its neighbours are found from those of the place before where places ascend, else by bisection. */
function localFit(samples: Samples, options: LocalPolynomialOptions): (at: number) => LocalFit {
  const { x } = samples
  const n = x.length
  const fewest = Math.min(n, options.minimumPoints ?? 2 * options.degree + 3)
  const room = scratch()
  let from = -1
  let to = -1
  let latest = Infinity
  return (at) => {
    if (at < latest) {
      from = lowerBound(x, at - options.halfWidth)
      to = lowerBound(x, at + options.halfWidth)
    }
    latest = at
    while (from < n && (x[from] ?? 0) <= at - options.halfWidth) from++
    while (to < n && (x[to] ?? 0) < at + options.halfWidth) to++
    let first = from
    let last = Math.max(to - 1, from - 1)
    let width = options.halfWidth
    if (last - first + 1 < fewest) {
      while (last - first + 1 < fewest) {
        const before = first > 0 ? at - (x[first - 1] ?? 0) : Infinity
        const after = last < n - 1 ? (x[last + 1] ?? 0) - at : Infinity
        if (before <= after) first--
        else last++
      }
      // A little beyond the farthest point, whose weight would otherwise be nothing.
      width = 1.1 * Math.max(at - (x[first] ?? at), (x[last] ?? at) - at)
    }
    return fitAround(samples, at, { first, last }, width > 0 ? width : 1, options.degree, room)
  }
}

function fitAround(
  samples: Samples,
  at: number,
  { first, last }: { readonly first: number; readonly last: number },
  width: number,
  degree: 1 | 2 | 3,
  room: Scratch,
): LocalFit {
  // Sums of the deviations from one of the values: a large offset of y then costs no digits.
  const offset = samples.y[(first + last) >> 1] ?? Number.NaN
  if (samples.within === null) sumRows(samples.x, samples.y, at, first, last, width, offset, room)
  else sumCells(samples.x, samples.y, samples.within, at, first, last, width, offset, room)
  const found = solve(room, degree)
  return {
    value: found > 0 ? offset + (room.coefficients[0] as number) : Number.NaN,
    slope: found > 1 ? (room.coefficients[1] as number) / width : Number.NaN,
  }
}

/** Room for one regression, kept from place to place: a run asks for thousands. */
interface Scratch {
  /** Normal equations of a cubic, 4 by 4, below the diagonal and on it; a lower degree takes their first rows. */
  readonly normal: Float64Array
  readonly right: Float64Array
  readonly factor: Float64Array
  /** After `solve`: the coefficients of the polynomial. */
  readonly coefficients: Float64Array
}

const scratch = (): Scratch => ({
  normal: new Float64Array(16),
  right: new Float64Array(4),
  factor: new Float64Array(16),
  coefficients: new Float64Array(4),
})

function sumRows(
  x: Float64Array,
  y: Float64Array,
  at: number,
  first: number,
  last: number,
  width: number,
  offset: number,
  { normal, right }: Scratch,
): void {
  let s0 = 0
  let s1 = 0
  let s2 = 0
  let s3 = 0
  let s4 = 0
  let s5 = 0
  let s6 = 0
  let t0 = 0
  let t1 = 0
  let t2 = 0
  let t3 = 0
  for (let j = first; j <= last; j++) {
    const u = ((x[j] as number) - at) / width
    const distance = Math.abs(u)
    if (distance >= 1) continue
    const falling = 1 - distance * distance * distance
    const w = falling * falling * falling
    const v = w * ((y[j] as number) - offset)
    const u2 = u * u
    const wu2 = w * u2
    const wu4 = wu2 * u2
    s0 += w
    s1 += w * u
    s2 += wu2
    s3 += wu2 * u
    s4 += wu4
    s5 += wu4 * u
    s6 += wu4 * u2
    t0 += v
    t1 += v * u
    t2 += v * u2
    t3 += v * u2 * u
  }
  normal[0] = s0
  normal[4] = s1
  normal[5] = s2
  normal[8] = s2
  normal[9] = s3
  normal[10] = s4
  normal[12] = s3
  normal[13] = s4
  normal[14] = s5
  normal[15] = s6
  right[0] = t0
  right[1] = t1
  right[2] = t2
  right[3] = t3
}

/** The mean of a polynomial over a cell is not its value at the mean x: the regression is on the means of the powers. */
function sumCells(
  x: Float64Array,
  y: Float64Array,
  { rows, squares, cubes }: NonNullable<Samples['within']>,
  at: number,
  first: number,
  last: number,
  width: number,
  offset: number,
  { normal, right }: Scratch,
): void {
  let s00 = 0
  let s10 = 0
  let s11 = 0
  let s20 = 0
  let s21 = 0
  let s22 = 0
  let s30 = 0
  let s31 = 0
  let s32 = 0
  let s33 = 0
  let t0 = 0
  let t1 = 0
  let t2 = 0
  let t3 = 0
  const perWidth = 1 / width
  for (let j = first; j <= last; j++) {
    const u = ((x[j] as number) - at) * perWidth
    const distance = Math.abs(u)
    if (distance >= 1) continue
    const falling = 1 - distance * distance * distance
    const w = falling * falling * falling * (rows[j] as number)
    const square = (squares[j] as number) * perWidth * perWidth
    const p2 = u * u + square
    const p3 = u * (u * u + 3 * square) + (cubes[j] as number) * perWidth * perWidth * perWidth
    const v = w * ((y[j] as number) - offset)
    const w1 = w * u
    const w2 = w * p2
    const w3 = w * p3
    s00 += w
    s10 += w1
    s11 += w1 * u
    s20 += w2
    s21 += w2 * u
    s22 += w2 * p2
    s30 += w3
    s31 += w3 * u
    s32 += w3 * p2
    s33 += w3 * p3
    t0 += v
    t1 += v * u
    t2 += v * p2
    t3 += v * p3
  }
  normal[0] = s00
  normal[4] = s10
  normal[5] = s11
  normal[8] = s20
  normal[9] = s21
  normal[10] = s22
  normal[12] = s30
  normal[13] = s31
  normal[14] = s32
  normal[15] = s33
  right[0] = t0
  right[1] = t1
  right[2] = t2
  right[3] = t3
}

/** The coefficients of the weighted polynomial, by Cholesky's factors; the degree is lowered where the points do not carry it. Returns how many there are. */
function solve({ normal, right, factor: l, coefficients: c }: Scratch, degree: number): number {
  let size = 0
  for (; size <= degree; size++) {
    // Each row of the factor is that of every larger one: the first that is not carried ends it.
    const row = 4 * size
    for (let j = 0; j < size; j++) {
      let rest = normal[row + j] as number
      for (let k = 0; k < j; k++) rest -= (l[row + k] as number) * (l[4 * j + k] as number)
      l[row + j] = rest / (l[4 * j + j] as number)
    }
    const diagonal = normal[row + size] as number
    let rest = diagonal
    for (let k = 0; k < size; k++) rest -= (l[row + k] as number) * (l[row + k] as number)
    if (!(rest > 1e-13 * diagonal)) break
    l[row + size] = Math.sqrt(rest)
  }
  for (let i = 0; i < size; i++) {
    let rest = right[i] as number
    for (let k = 0; k < i; k++) rest -= (l[4 * i + k] as number) * (c[k] as number)
    c[i] = rest / (l[4 * i + i] as number)
  }
  for (let i = size - 1; i >= 0; i--) {
    let rest = c[i] as number
    for (let k = i + 1; k < size; k++) rest -= (l[4 * k + i] as number) * (c[k] as number)
    c[i] = rest / (l[4 * i + i] as number)
  }
  return size
}
