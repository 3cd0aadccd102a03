import { lineFit } from '../numerics/line-fit.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import type { SourceKey } from '../sources.ts'
import { gasConstant_J_per_mol_K, lnBoltzmannOverPlanck_per_K_s } from '../units/constants.ts'
import type { Quantity } from '../units/quantity.ts'
import { checkRateConstants, distinctTemperatures, type RateConstantPoint } from './rate-constant-point.ts'

export const eyringLineSources: readonly SourceKey[] = ['eyring-1935', 'iupac-arrhenius']

/** A number with its standard error and its 95 % Student-t interval (n - 2 degrees of freedom); NaN ends without an interval. */
export interface Estimate {
  readonly value: number
  readonly standardError: number
  readonly lower95: number
  readonly upper95: number
}

export interface EyringLine {
  readonly status: 'ok' | 'without-interval' | 'too-few-points' | 'temperatures-not-distinct'
  readonly dof: number
  /** Enthalpy of activation, J/mol. */
  readonly enthalpy_J_per_mol: Estimate
  /** Entropy of activation, J/(mol K); NaN where k cannot be given per second. */
  readonly entropy_J_per_mol_K: Estimate
  readonly r2: number
  /** Gibbs energy of activation at a temperature, J/mol, with the correlation of enthalpy and entropy; NaN where the entropy is. */
  readonly gibbsAt: (temperature: Quantity<'K'>) => Estimate
}

/**
 * Activation parameters of transition-state theory, from the line
 *
 *   ln(k/T) = ln(k_B/h) + ΔS‡/R - ΔH‡/(R T),   ΔG‡(T) = ΔH‡ - T ΔS‡
 *
 * by least squares on 1/T (centred), transmission coefficient 1. Slope -ΔH‡/R; ΔS‡ from the intercept. ΔH‡ is about R T below Ea. ΔS‡ needs k per second; for
 * k of another dimension than 1/time it refers to the concentration in k's unit as standard state (1 mol/L for L/(mol s)), which must be said beside it.
 *
 * Not to be used for reactions of solids or for a rate constant that stands for several steps: the numbers then have no molecular meaning.
 *
 * @param perSecond - what k is to be multiplied by to be per second (1/60 for 1/min); null where its unit is not known
 * @throws KineticsError `not-finite`, naming the row, where k or T is not above 0
 * @source eyring-1935
 */
export function eyringLine(points: readonly RateConstantPoint[], perSecond: number | null): EyringLine {
  checkRateConstants(points)
  const distinct = distinctTemperatures(points)
  const lnPerSecond = Math.log(perSecond ?? Number.NaN)
  const fit = lineFit(
    points.map((point) => 1 / point.temperature),
    points.map((point) => Math.log(point.rateConstant) - Math.log(point.temperature)),
  )
  const found = fit.status === 'ok' && distinct >= 2
  const withInterval = found && distinct >= 3
  const R = gasConstant_J_per_mol_K
  const t = withInterval ? studentTQuantile(0.975, fit.dof) : Number.NaN
  const estimate = (value: number, error: number): Estimate => {
    const standardError = withInterval && Number.isFinite(value) ? error : Number.NaN
    return { value: found ? value : Number.NaN, standardError, lower95: value - t * standardError, upper95: value + t * standardError }
  }
  return {
    status: found
      ? withInterval
        ? 'ok'
        : 'without-interval'
      : fit.status === 'too-few-points'
        ? 'too-few-points'
        : 'temperatures-not-distinct',
    dof: withInterval ? fit.dof : 0,
    enthalpy_J_per_mol: estimate(-R * fit.slope, R * fit.slopeStandardError),
    entropy_J_per_mol_K: estimate(R * (fit.intercept + lnPerSecond - lnBoltzmannOverPlanck_per_K_s), R * fit.interceptStandardError),
    r2: withInterval ? fit.r2 : Number.NaN,
    gibbsAt: (temperature) => {
      // -R T times the line at 1/T less ln(k_B/h): its error is that of the line there.
      const fromMean = 1 / temperature - fit.xMean
      const lnKOverT = fit.valueAtMean + fit.slope * fromMean + lnPerSecond
      const error = Math.sqrt(fit.valueAtMeanStandardError ** 2 + (fromMean * fit.slopeStandardError) ** 2)
      return estimate(R * temperature * (lnBoltzmannOverPlanck_per_K_s - lnKOverT), R * temperature * error)
    },
  }
}
