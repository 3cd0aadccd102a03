import { lineConfidenceBand, linePredictionBand } from '../numerics/line-bands.ts'
import type { Quantity } from '../units/quantity.ts'
import type { ArrheniusLine } from './arrhenius-line.ts'
import { expOrNone } from './exp-or-none.ts'
import { extrapolationOf, type Extrapolation } from './extrapolation.ts'

/**
 * k at a temperature, in the unit of the table; NaN where there is no line, and NaN ends where there is no interval. A k or an end beyond double precision is
 * NaN as well, while its logarithm is there.
 */
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
  /** ln of the four ends. */
  readonly lnLineLower95: number
  readonly lnLineUpper95: number
  readonly lnNewLower95: number
  readonly lnNewUpper95: number
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
  const found = line.status === 'ok' || line.status === 'without-interval'
  const withInterval = line.status === 'ok'
  const [ofLine, ofNew] = [lineConfidenceBand(line.fit, 1 / temperature), linePredictionBand(line.fit, 1 / temperature)]
  const lnK = found ? ofLine.value : Number.NaN
  const [lnLineLower95, lnLineUpper95, lnNewLower95, lnNewUpper95] = withInterval
    ? [ofLine.lower, ofLine.upper, ofNew.lower, ofNew.upper]
    : [Number.NaN, Number.NaN, Number.NaN, Number.NaN]
  return {
    temperature,
    lnK,
    rateConstant: expOrNone(lnK),
    lineLower95: expOrNone(lnLineLower95),
    lineUpper95: expOrNone(lnLineUpper95),
    newLower95: expOrNone(lnNewLower95),
    newUpper95: expOrNone(lnNewUpper95),
    lnLineLower95,
    lnLineUpper95,
    lnNewLower95,
    lnNewUpper95,
    extrapolation: extrapolationOf(data_K, temperature),
  }
}
