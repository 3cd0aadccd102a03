import { cumulativeIntegral } from '../signal/cumulative-integral.ts'
import { valueAt } from '../series/value-at.ts'
import { column } from '../units/quantity.ts'
import type { ConversionCurve, DrawnBaseline } from './smooth-curve.ts'

/** What noise of a signal of rate leaves in its partial area and in the rate beyond what it leaves in single rows, for noise of 1 and one row a second. */
export interface AreaNoise {
  /** Covariance of the conversion at two times, the earlier first, in s². */
  readonly covariance: (earlier_s: number, later_s: number) => number
  /** Variance that baseline and whole area add to dα/dt at one time, in s⁰. */
  readonly rateVariance: (time_s: number) => number
}

/** Quantities along the window are held at so many of its rows: they are smooth, whatever the noise. */
const places = 400

/**
 * Noise of a partial area over the whole of it, and of the baseline under it, which is drawn through the same noisy rows.
 *
 * With the baseline's lines L and their shares w, the area A, and D = (L before - L after)/A for a baseline that follows the conversion (else 0),
 * A dα/dt = s - Σ w L is to first order disturbed as d δα/dt = ε - Σ w δL + D δα - (δA/A) dα/dt, so that with h = exp ∫D dt
 *
 *   δα(t) = h (F(t) - q F(end)),   F = ∫(ε - Σ w δL)/h dt,   q = ∫dα/h up to t over that up to the end.
 *
 * A line is the least-squares line through its rows, whose mean and slope err independently and go with the noise of the same rows in F. That noise also decides
 * which stretches tangents are laid through is not held: in a window a few widths of the peak long the errors can be twice as large (`stretchNoise`).
 *
 * @param curve - of a rate; `drawn` tells its baseline, null the signal's own zero
 */
export function areaNoise(curve: ConversionCurve): AreaNoise {
  const { drawn } = curve
  const n = curve.time_s.length
  const start = curve.time_s[0] ?? Number.NaN
  const rows = Math.min(places, n - 1) + 1
  const at = (values: Float64Array): Float64Array =>
    Float64Array.from({ length: rows }, (_, k) => values[Math.round((k * (n - 1)) / (rows - 1))] ?? Number.NaN)
  const time = at(curve.time_s).map((t) => t - start)
  const alpha = at(curve.conversion)
  const rate = at(curve.reactionRate_per_s)
  const whole = time[rows - 1] ?? Number.NaN
  const integral = (values: Float64Array): Float64Array => cumulativeIntegral(column(time, 's'), values)

  const growth = integral(time.map((t) => driftOf(drawn, start + t))).map(Math.exp)
  const reached = new Float64Array(rows)
  for (let k = 1; k < rows; k++) {
    const inverse = 0.5 * (1 / (growth[k - 1] as number) + 1 / (growth[k] as number))
    reached[k] = (reached[k - 1] as number) + inverse * ((alpha[k] as number) - (alpha[k - 1] as number))
  }
  const ofAll = reached[rows - 1] ?? Number.NaN
  const squared = integral(growth.map((h) => 1 / h ** 2))
  const modes = modesOf(drawn, time, alpha, start).map((mode) => ({
    ...mode,
    sum: integral(mode.shape.map((value, k) => value / (growth[k] as number))),
    // What the rows of a line add to F they add where the line was fitted.
    inverseGrowth: 1 / valueAt(time, growth, Math.min(whole, Math.max(0, mode.at - start))),
  }))

  const within = (time_s: number): number => Math.min(whole, Math.max(0, time_s - start))
  const read = (values: Float64Array, t: number): number => valueAt(time, values, t)
  /** Share of the whole that a time has, and the weight of each line's error in δα/h there. */
  const placeAt = (time_s: number) => {
    const t = within(time_s)
    const q = read(reached, t) / ofAll
    return {
      q,
      h: read(growth, t),
      squared: read(squared, t),
      weights: modes.map((mode) => read(mode.sum, t) - q * (mode.sum[rows - 1] as number)),
      shared: modes.map((mode) => mode.inverseGrowth * (mode.sharedUpTo(time_s) - q * mode.sharedUpTo(start + whole))),
    }
  }
  const total = squared[rows - 1] ?? Number.NaN

  return {
    covariance(earlier_s, later_s) {
      const [a, b] = [placeAt(earlier_s), placeAt(later_s)]
      let sum = a.squared * (1 - b.q) - a.q * b.squared + a.q * b.q * total
      modes.forEach(({ variance }, p) => {
        const [wa, wb] = [a.weights[p] as number, b.weights[p] as number]
        sum += wa * wb * variance - wa * (b.shared[p] as number) - wb * (a.shared[p] as number)
      })
      return a.h * b.h * sum
    },
    rateVariance(time_s) {
      const t = within(time_s)
      const ofArea = read(rate, t) / ofAll
      let sum = ofArea ** 2 * total
      for (const mode of modes) {
        const weight = read(mode.shape, t) - ofArea * (mode.sum[rows - 1] as number)
        sum += weight ** 2 * mode.variance + 2 * weight * ofArea * mode.inverseGrowth * mode.sharedUpTo(start + whole)
      }
      return Math.max(0, sum)
    },
  }
}

/** Mean or slope of one line of a baseline. */
interface Mode {
  /** Middle of the rows that the line was fitted to. */
  readonly at: number
  /** What an error of 1 adds to the baseline along the window. */
  readonly shape: Float64Array
  readonly variance: number
  /** Its covariance with ∫ε dt up to a time. */
  readonly sharedUpTo: (time_s: number) => number
}

function modesOf(drawn: DrawnBaseline | null, time: Float64Array, alpha: Float64Array, start: number): Mode[] {
  if (drawn === null) return []
  const whole = time.at(-1) ?? Number.NaN
  return drawn.lines.flatMap((line): Mode[] => {
    const { from_s, to_s } = line
    const middle = 0.5 * (from_s + to_s)
    const length = to_s - from_s
    const share = (k: number): number => {
      if (drawn.passes === 'level') return 1
      const passed = drawn.passes === 'with-time' ? (time[k] as number) / whole : (alpha[k] as number)
      return line.end === 'start' ? 1 - passed : passed
    }
    const into = (t: number): number => Math.min(length, Math.max(0, t - from_s))
    const mean: Mode = {
      at: middle,
      shape: time.map((_, k) => share(k)),
      variance: line.varianceOfMean / length,
      sharedUpTo: (t) => into(t) / length,
    }
    if (!line.hasSlope) return [mean]
    const arm = (k: number): number =>
      drawn.passes === 'with-conversion' ? start + (time[k] as number) - middle : (line.end === 'start' ? start : start + whole) - middle
    return [
      mean,
      {
        at: middle,
        shape: time.map((_, k) => share(k) * arm(k)),
        variance: 12 / length ** 3,
        sharedUpTo: (t) => (6 * ((into(t) - 0.5 * length) ** 2 - 0.25 * length ** 2)) / length ** 3,
      },
    ]
  })
}

/** (L before - L after)/A of a baseline that follows the conversion. */
function driftOf(drawn: DrawnBaseline | null, time_s: number): number {
  if (drawn?.passes !== 'with-conversion') return 0
  let drift = 0
  for (const { end, x, value, slope } of drawn.lines) drift += (end === 'start' ? 1 : -1) * (value + slope * (time_s - x))
  return drift
}
