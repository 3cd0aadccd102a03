import { randomStream } from '../numerics/random.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import type { Resamples } from './resamples.ts'

/** Standard error of a share of 0.65: 0.011; of 0.94: 0.005. */
const replicates = 2_000
/** The answer belongs to the runs and not to a study's seed. */
const seed = 1

/**
 * How often jackknife and bootstrap hold the true value for these very runs: by simulation of a straight line through points at their 1/T whose ordinates err
 * independently, normally and alike. Replicates of a programme and unevenly spread heating rates make a difference that no number of runs tells.
 *
 * Each resample is one weighted slope, a sum over the runs with coefficients that do not depend on the errors. The bootstrap's ends hold the true slope where at least 2.5 %
 * of the probability lies on either side of it.
 *
 * @param x - 1/T of the runs, in 1/K
 * @param left - of `deleteOne`, or null
 * @returns shares; NaN for what is not asked for
 */
export function designCoverage(
  x: ArrayLike<number>,
  left: readonly Uint8Array[] | null,
  resamples: Resamples | null,
  checkCancelled: () => void,
): { readonly jackknife: number; readonly bootstrap: number } {
  const n = x.length
  const all = slopeWeights(x, new Uint8Array(n).fill(1))
  const withoutEach = left?.map((times) => slopeWeights(x, times)) ?? null
  const drawn = resamples === null ? null : flattened(resamples.times.map((times) => slopeWeights(x, times)))
  const t = studentTQuantile(0.975, Math.max(1, n - 1))
  const y = new Float64Array(n)
  let byJackknife = 0
  let byBootstrap = 0
  for (let k = 0; k < replicates; k++) {
    if (k % 50 === 0) checkCancelled()
    const random = randomStream(seed, k)
    for (let i = 0; i < n; i++) y[i] = random.normal()
    if (withoutEach !== null && Math.abs(sumOfProducts(all, y)) <= t * jackknifeError(withoutEach, y)) byJackknife++
    if (drawn !== null && resamples !== null && holdsZero(drawn, resamples.probability, y)) byBootstrap++
  }
  return {
    jackknife: withoutEach === null ? Number.NaN : byJackknife / replicates,
    bootstrap: drawn === null ? Number.NaN : byBootstrap / replicates,
  }
}

/** Of the slope by weighted least squares on each ordinate. */
function slopeWeights(x: ArrayLike<number>, times: Uint8Array): Float64Array {
  let sum = 0
  let mean = 0
  times.forEach((w, i) => {
    sum += w
    mean += w * (x[i] as number)
  })
  mean /= sum
  let spread = 0
  times.forEach((w, i) => (spread += w * ((x[i] as number) - mean) ** 2))
  return Float64Array.from(times, (w, i) => (w * ((x[i] as number) - mean)) / spread)
}

const sumOfProducts = (a: Float64Array, b: Float64Array): number => {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += (a[i] as number) * (b[i] as number)
  return sum
}

function jackknifeError(withoutEach: readonly Float64Array[], y: Float64Array): number {
  const n = withoutEach.length
  const slopes = withoutEach.map((weights) => sumOfProducts(weights, y))
  const mean = slopes.reduce((sum, slope) => sum + slope / n, 0)
  return Math.sqrt(((n - 1) / n) * slopes.reduce((sum, slope) => sum + (slope - mean) ** 2, 0))
}

function flattened(rows: readonly Float64Array[]): Float64Array {
  const width = rows[0]?.length ?? 0
  const flat = new Float64Array(rows.length * width)
  rows.forEach((row, k) => flat.set(row, k * width))
  return flat
}

const tail = 0.025

/** Whether 0 lies between the 2.5 and the 97.5 % point of the resampled slopes. */
function holdsZero(weights: Float64Array, probability: Float64Array, y: Float64Array): boolean {
  const n = y.length
  let below = 0
  let above = 0
  for (let k = 0; k < probability.length; k++) {
    let slope = 0
    for (let i = 0; i < n; i++) slope += (weights[k * n + i] as number) * (y[i] as number)
    if (slope <= 0) below += probability[k] as number
    if (slope >= 0) above += probability[k] as number
    if (below >= tail && above >= tail) return true
  }
  return false
}
