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

/**
 * Value and slope of a curve at every x, by weighted regression of a polynomial on the neighbours (tricube weights). x ascends strictly and need not be evenly
 * spaced: nothing is resampled. 20,000 points with 150 neighbours each take about 0.2 s, so that the special case of even spacing has no path of its own.
 *
 * @source cleveland-1979; for even spacing and equal weights savitzky-golay-1964
 */
export function localPolynomial(
  x: Float64Array,
  y: Float64Array,
  options: LocalPolynomialOptions,
): { readonly value: Float64Array; readonly slope: Float64Array } {
  const n = x.length
  const value = new Float64Array(n)
  const slope = new Float64Array(n)
  const neighbours = neighbourhood(x, options)
  const sums = new Float64Array(11)
  for (let i = 0; i < n; i++) {
    const at = x[i] ?? Number.NaN
    neighbours.moveTo(at)
    const fit = fitAround(x, y, at, neighbours.first, neighbours.last, neighbours.width, options.degree, sums)
    value[i] = fit.value
    slope[i] = fit.slope
  }
  return { value, slope }
}

/** The same at one place, which need not be one of the x. */
export function localPolynomialAt(x: Float64Array, y: Float64Array, at: number, options: LocalPolynomialOptions): LocalFit {
  const neighbours = neighbourhood(x, options)
  neighbours.moveTo(at)
  return fitAround(x, y, at, neighbours.first, neighbours.last, neighbours.width, options.degree, new Float64Array(11))
}

/** The rows that carry weight, moved along x; their bounds only ever grow when places are visited in ascending order. */
function neighbourhood(x: Float64Array, options: LocalPolynomialOptions) {
  const n = x.length
  const fewest = Math.min(n, options.minimumPoints ?? 2 * options.degree + 3)
  const state = { first: 0, last: -1, width: options.halfWidth, moveTo }
  let from = 0
  let to = 0
  function moveTo(at: number): void {
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
    state.first = first
    state.last = last
    state.width = width > 0 ? width : 1
  }
  return state
}

function fitAround(
  x: Float64Array,
  y: Float64Array,
  at: number,
  first: number,
  last: number,
  width: number,
  degree: 1 | 2 | 3,
  sums: Float64Array,
): LocalFit {
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
    const w = falling * falling * falling
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
  sums.set([s0, s1, s2, s3, s4, s5, s6, t0, t1, t2, t3])
  const [value, slope] = solveMoments(sums, degree)
  return { value: offset + value, slope: slope / width }
}

/** First two coefficients of the weighted polynomial, by Cholesky on the moments; the degree is lowered where the points do not carry it. */
function solveMoments(sums: Float64Array, degree: number): readonly [number, number] {
  for (let size = degree + 1; size >= 1; size--) {
    const l = new Float64Array(size * size)
    const c = new Float64Array(size)
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
    return [c[0] ?? Number.NaN, size > 1 ? (c[1] ?? Number.NaN) : Number.NaN]
  }
  return [Number.NaN, Number.NaN]
}
