import { lowerBound } from './lower-bound.ts'

export interface LocalPolynomialOptions {
  /** Points farther away than this, in units of x, carry no weight. */
  readonly halfWidth: number
  /** 1 a line, 2 a parabola, 3 a cubic. A cubic is exact for a cubic, and its value and slope err in the fourth power of the width. */
  readonly degree: 1 | 2 | 3
  /** Where fewer points lie within the half-width it is widened until there are so many; default 2·degree + 3. */
  readonly minimumPoints?: number
}

export interface LocalFit {
  readonly value: number
  /** dy/dx. */
  readonly slope: number
}

/** With more rows than this within the half-width, means over cells stand for the rows: five or more then fall into a cell. */
const manyRows = 200
/** Cells and nodes of a half-width: on a bell-shaped curve the value is off by some 1e-5 of the top, the slope by some 1e-5 of the steepest one, at most. */
const cellsPerHalfWidth = 40
const nodesPerHalfWidth = 12

/**
 * Value and slope of a curve at every x, by weighted regression of a polynomial on the neighbours (tricube weights). x ascends strictly and need not be evenly
 * spaced: nothing is resampled. Time grows with the number of rows alone: where more than 200 rows lie within the half-width, the regression runs over means of
 * cells (weighted by the rows in them) at nodes a twelfth of the half-width apart, and a cubic through four nodes gives value and slope between them.
 *
 * @source cleveland-1979; for even spacing and equal weights savitzky-golay-1964
 */
export function localPolynomial(
  x: Float64Array,
  y: Float64Array,
  options: LocalPolynomialOptions,
): { readonly value: Float64Array; readonly slope: Float64Array } {
  const rowsInHalfWidth = (options.halfWidth * (x.length - 1)) / ((x.at(-1) ?? 0) - (x[0] ?? 0))
  if (rowsInHalfWidth > manyRows) return throughNodes(x, y, options)
  const value = new Float64Array(x.length)
  const slope = new Float64Array(x.length)
  const fitAt = localFit({ x, y, weight: null }, options)
  for (let i = 0; i < x.length; i++) {
    const fit = fitAt(x[i] ?? Number.NaN)
    value[i] = fit.value
    slope[i] = fit.slope
  }
  return { value, slope }
}

/** The same at one place, which need not be one of the x. */
export const localPolynomialAt = (x: Float64Array, y: Float64Array, at: number, options: LocalPolynomialOptions): LocalFit =>
  localFit({ x, y, weight: null }, options)(at)

function throughNodes(x: Float64Array, y: Float64Array, options: LocalPolynomialOptions): { value: Float64Array; slope: Float64Array } {
  const n = x.length
  const start = x[0] ?? Number.NaN
  const span = (x[n - 1] ?? Number.NaN) - start
  const lastNode = Math.max(3, Math.ceil((span * nodesPerHalfWidth) / options.halfWidth))
  const step = span / lastNode
  const fitAt = localFit(meansOfCells(x, y, options.halfWidth / cellsPerHalfWidth), options)
  const value = new Float64Array(n)
  const slope = new Float64Array(n)
  // The four nodes around the row, moved along with it; nodes that no row needs, as in a gap, are never fitted.
  let firstNode = 0
  let nodes: LocalFit[] = []
  for (let i = 0; i < n; i++) {
    const place = ((x[i] ?? Number.NaN) - start) / step
    const first = Math.min(lastNode - 3, Math.max(0, Math.floor(place) - 1))
    if (first !== firstNode || nodes.length === 0) {
      nodes = [0, 1, 2, 3].map((k) => nodes[k + first - firstNode] ?? fitAt(start + (first + k) * step))
      firstNode = first
    }
    const u = place - first
    const [a, b, c, d] = nodes as [LocalFit, LocalFit, LocalFit, LocalFit]
    const wa = (-(u - 1) * (u - 2) * (u - 3)) / 6
    const wb = (u * (u - 2) * (u - 3)) / 2
    const wc = (-u * (u - 1) * (u - 3)) / 2
    const wd = (u * (u - 1) * (u - 2)) / 6
    value[i] = wa * a.value + wb * b.value + wc * c.value + wd * d.value
    slope[i] = wa * a.slope + wb * b.slope + wc * c.slope + wd * d.slope
  }
  return { value, slope }
}

/** Samples, each standing for as many rows as its weight says; null: for one. */
interface Samples {
  readonly x: Float64Array
  readonly y: Float64Array
  readonly weight: Float64Array | null
}

/** Mean x and y of the rows in cells no wider than `width`, each cell beginning at a row. */
function meansOfCells(x: Float64Array, y: Float64Array, width: number): Samples {
  const n = x.length
  const meanX = new Float64Array(n)
  const meanY = new Float64Array(n)
  const weight = new Float64Array(n)
  let cells = 0
  for (let i = 0; i < n; cells++) {
    const from = i
    const x0 = x[i] ?? Number.NaN
    const y0 = y[i] ?? Number.NaN
    let sumX = 0
    let sumY = 0
    do {
      sumX += (x[i] ?? Number.NaN) - x0
      sumY += (y[i] ?? Number.NaN) - y0
      i++
    } while (i < n && (x[i] ?? Number.NaN) < x0 + width)
    meanX[cells] = x0 + sumX / (i - from)
    meanY[cells] = y0 + sumY / (i - from)
    weight[cells] = i - from
  }
  return { x: meanX.subarray(0, cells), y: meanY.subarray(0, cells), weight: weight.subarray(0, cells) }
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
  { x, y, weight }: Samples,
  at: number,
  { first, last }: { readonly first: number; readonly last: number },
  width: number,
  degree: 1 | 2 | 3,
  room: Scratch,
): LocalFit {
  const { sums } = room
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
  // Sums of the deviations from one of the values: a large offset of y then costs no digits.
  const offset = y[(first + last) >> 1] ?? Number.NaN
  for (let j = first; j <= last; j++) {
    const u = ((x[j] ?? Number.NaN) - at) / width
    const distance = Math.abs(u)
    if (distance >= 1) continue
    const falling = 1 - distance * distance * distance
    const w = falling * falling * falling * (weight === null ? 1 : (weight[j] ?? Number.NaN))
    const v = w * ((y[j] ?? Number.NaN) - offset)
    const wu = w * u
    const wu2 = wu * u
    const wu3 = wu2 * u
    s0 += w
    s1 += wu
    s2 += wu2
    s3 += wu3
    s4 += wu3 * u
    s5 += wu3 * u * u
    s6 += wu3 * u * u * u
    t0 += v
    t1 += v * u
    t2 += v * u * u
    t3 += v * u * u * u
  }
  sums[0] = s0
  sums[1] = s1
  sums[2] = s2
  sums[3] = s3
  sums[4] = s4
  sums[5] = s5
  sums[6] = s6
  sums[7] = t0
  sums[8] = t1
  sums[9] = t2
  sums[10] = t3
  const found = solveMoments(room, degree)
  return {
    value: found > 0 ? offset + (room.coefficients[0] ?? Number.NaN) : Number.NaN,
    slope: found > 1 ? (room.coefficients[1] ?? Number.NaN) / width : Number.NaN,
  }
}

/** Room for one regression, kept from place to place: a run asks for thousands. */
interface Scratch {
  /** Moments 0 to 6 of the weights, then the four of y. */
  readonly sums: Float64Array
  readonly factor: Float64Array
  /** After `solveMoments`: the coefficients of the polynomial. */
  readonly coefficients: Float64Array
}

const scratch = (): Scratch => ({ sums: new Float64Array(11), factor: new Float64Array(16), coefficients: new Float64Array(4) })

/** The coefficients of the weighted polynomial, by Cholesky on the moments; the degree is lowered where the points do not carry it. Returns how many there are. */
function solveMoments({ sums, factor: l, coefficients: c }: Scratch, degree: number): number {
  for (let size = degree + 1; size >= 1; size--) {
    let carried = true
    for (let i = 0; i < size && carried; i++) {
      for (let j = 0; j <= i; j++) {
        const moment = sums[i + j] ?? Number.NaN
        let rest = moment
        for (let k = 0; k < j; k++) rest -= (l[i * size + k] ?? 0) * (l[j * size + k] ?? 0)
        if (i === j) {
          if (!(rest > 1e-13 * moment)) carried = false
          l[i * size + i] = Math.sqrt(rest)
        } else l[i * size + j] = rest / (l[j * size + j] ?? Number.NaN)
      }
    }
    if (!carried) continue
    for (let i = 0; i < size; i++) {
      let rest = sums[7 + i] ?? Number.NaN
      for (let k = 0; k < i; k++) rest -= (l[i * size + k] ?? 0) * (c[k] ?? 0)
      c[i] = rest / (l[i * size + i] ?? Number.NaN)
    }
    for (let i = size - 1; i >= 0; i--) {
      let rest = c[i] ?? Number.NaN
      for (let k = i + 1; k < size; k++) rest -= (l[k * size + i] ?? 0) * (c[k] ?? 0)
      c[i] = rest / (l[i * size + i] ?? Number.NaN)
    }
    return size
  }
  return 0
}
