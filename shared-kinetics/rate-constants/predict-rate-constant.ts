import { studentTQuantile } from '../numerics/student-t.ts'
import type { Quantity } from '../units/quantity.ts'
import type { ArrheniusLine } from './arrhenius-line.ts'
import { extrapolationOf, type Extrapolation } from './extrapolation.ts'

/** k at a temperature, in the unit of the table; NaN where there is no line, and NaN ends where there is no interval. */
export interface PredictedRateConstant {
  readonly temperature: Quantity<'K'>
  readonly lnK: number
  readonly rateConstant: number
  /** 95 % band of the line: where ln k of the line lies at this temperature. */
  readonly lineLower95: number
  readonly lineUpper95: number
  /** 95 % band of a new measurement: where one more measured k would lie. */
  readonly newLower95: number
  readonly newUpper95: number
  readonly extrapolation: Extrapolation
}

/**
 * k at a temperature from an Arrhenius line, with two bands, x = 1/T:
 *
 *   ln k = ȳ + slope (x - x̄)
 *   of the line:             ± t(0.975; n - 2) s √(1/n + (x - x̄)²/Σ(xᵢ - x̄)²)
 *   of a new measurement:    ± t(0.975; n - 2) s √(1 + 1/n + (x - x̄)²/Σ(xᵢ - x̄)²)
 *
 * each for one temperature by itself. Both hold as far as the same reaction goes on at this temperature, which no band can tell: how far the temperature lies
 * beyond the data is given beside it. For a weighted line the new measurement is one of average weight.
 *
 * @source draper-smith-1998
 */
export function predictRateConstant(line: ArrheniusLine, data_K: readonly number[], temperature: Quantity<'K'>): PredictedRateConstant {
  const { fit } = line
  const found = line.status === 'ok' || line.status === 'without-interval'
  const fromMean = 1 / temperature - fit.xMean
  const lnK = found ? fit.valueAtMean + fit.slope * fromMean : Number.NaN
  const variance = fit.valueAtMeanStandardError ** 2 + (fromMean * fit.slopeStandardError) ** 2
  const t = line.status === 'ok' ? studentTQuantile(0.975, line.dof) : Number.NaN
  const ofLine = t * Math.sqrt(variance)
  const ofNew = t * Math.sqrt(variance + fit.residualStandardDeviation ** 2)
  return {
    temperature,
    lnK,
    rateConstant: Math.exp(lnK),
    lineLower95: Math.exp(lnK - ofLine),
    lineUpper95: Math.exp(lnK + ofLine),
    newLower95: Math.exp(lnK - ofNew),
    newUpper95: Math.exp(lnK + ofNew),
    extrapolation: extrapolationOf(data_K, temperature),
  }
}
