import { lowerBound } from './lower-bound.ts'
import { scratch, solve, sumCells, sumRows, type Scratch, type WithinCells } from './normal-equations.ts'

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
  const value = new Float64Array(x.length)
  const slope = new Float64Array(x.length)
  const many = rowsInHalfWidth > manyRows
  const samples = many ? meansOfCells(x, y, options.halfWidth / cellsPerHalfWidth) : { x, y, within: null }
  const atNode = localFit(samples, options)
  const atRow = localFit(samples, options)
  const closely = options.closely ?? { first: 0, last: x.length - 1 }
  const part = (first: number, last: number, nodes: number): void => {
    if (rowsInHalfWidth > 2 * nodes) partThroughNodes(x, first, last, options.halfWidth / nodes, atNode, atRow, value, slope)
    else for (let i = first; i <= last; i++) fitRow(x, i, atRow, value, slope)
  }
  part(0, closely.first - 1, nodesWhereItMattersLittle)
  part(closely.first, closely.last, nodesPerHalfWidth)
  part(closely.last + 1, x.length - 1, nodesWhereItMattersLittle)
  return { value, slope }
}

function fitRow(x: Float64Array, i: number, atRow: (at: number) => LocalFit, value: Float64Array, slope: Float64Array): void {
  const fit = atRow(x[i] as number)
  value[i] = fit.value
  slope[i] = fit.slope
}

/** The same at one place, which need not be one of the x. */
export const localPolynomialAt = (x: Float64Array, y: Float64Array, at: number, options: LocalPolynomialOptions): LocalFit =>
  localFit({ x, y, within: null }, options)(at)

/** Rows `firstRow` to `lastRow`, with nodes at most `width` apart. */
function partThroughNodes(
  x: Float64Array,
  firstRow: number,
  lastRow: number,
  width: number,
  atNode: (at: number) => LocalFit,
  atRow: (at: number) => LocalFit,
  value: Float64Array,
  slope: Float64Array,
): void {
  if (lastRow < firstRow) return
  const start = x[firstRow] as number
  const span = (x[lastRow] as number) - start
  const lastNode = Math.max(3, Math.ceil(span / width))
  const step = span / lastNode
  // The four nodes around the rows of one interval; nodes that no row needs, as in a gap, are never fitted.
  const nodes: LocalFit[] = []
  const cubics = new Float64Array(8)
  let firstNode = -4
  for (let i = firstRow; i <= lastRow; ) {
    const at = x[i] as number
    if (!(step > 0) || (i > firstRow && at - (x[i - 1] as number) > step)) {
      fitRow(x, i, atRow, value, slope)
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
    cubicThrough(a.value, b.value, c.value, d.value, cubics, 0)
    cubicThrough(a.slope, b.slope, c.slope, d.slope, cubics, 4)
    // All rows of the interval share these; the last interval takes the last row too.
    const end = place >= lastNode - 2 ? Infinity : start + (place + 1) * step
    i = alongCubics(x, i, lastRow, end, start + first * step, step, cubics, value, slope)
  }
}

/** Coefficients of the cubic through four values at 0, 1, 2 and 3. */
function cubicThrough(a: number, b: number, c: number, d: number, into: Float64Array, at: number): void {
  into[at] = a
  into[at + 1] = (18 * b - 11 * a - 9 * c + 2 * d) / 6
  into[at + 2] = (2 * a - 5 * b + 4 * c - d) / 2
  into[at + 3] = (3 * (b - c) + d - a) / 6
}

/** Fills the rows from `i` on that lie before `end` with no gap between them; the row after the last of them. A function of its own, since the compiler then has little to wait for. */
function alongCubics(
  x: Float64Array,
  i: number,
  lastRow: number,
  end: number,
  from: number,
  step: number,
  cubics: Float64Array,
  value: Float64Array,
  slope: Float64Array,
): number {
  const [v0, v1, v2, v3] = [cubics[0] as number, cubics[1] as number, cubics[2] as number, cubics[3] as number]
  const [s0, s1, s2, s3] = [cubics[4] as number, cubics[5] as number, cubics[6] as number, cubics[7] as number]
  let before = x[i] as number
  let row = i
  for (; row <= lastRow; row++) {
    const here = x[row] as number
    if (row > i && (here >= end || here - before > step)) break
    before = here
    const u = (here - from) / step
    value[row] = v0 + u * (v1 + u * (v2 + u * v3))
    slope[row] = s0 + u * (s1 + u * (s2 + u * s3))
  }
  return row
}

/** Rows, or means of x and y over the rows of cells with what tells how these lie about their mean. */
interface Samples {
  readonly x: Float64Array
  readonly y: Float64Array
  readonly within: WithinCells | null
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
  const { halfWidth, degree } = options
  const n = x.length
  const fewest = Math.min(n, options.minimumPoints ?? 2 * degree + 3)
  const room = scratch()
  let from = -1
  let to = -1
  let latest = Infinity
  return (at) => {
    if (at < latest) {
      from = lowerBound(x, at - halfWidth)
      to = lowerBound(x, at + halfWidth)
    }
    latest = at
    while (from < n && (x[from] ?? 0) <= at - halfWidth) from++
    while (to < n && (x[to] ?? 0) < at + halfWidth) to++
    let first = from
    let last = Math.max(to - 1, from - 1)
    let width = halfWidth
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
    return fitAround(samples, at, first, last, width > 0 ? width : 1, degree, room)
  }
}

function fitAround(samples: Samples, at: number, first: number, last: number, width: number, degree: 1 | 2 | 3, room: Scratch): LocalFit {
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
