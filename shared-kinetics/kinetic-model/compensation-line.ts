import { KineticsError } from '../errors.ts'
import { lineFit } from '../numerics/line-fit.ts'
import { studentTQuantile } from '../numerics/student-t.ts'
import type { Quantity } from '../units/quantity.ts'

/** Ea and ln A (A in 1/s) that one model gives for the same data. */
export interface ArrheniusPair {
  readonly Ea: Quantity<'J/mol'>
  readonly lnA: number
}

/** ln A = slope·Ea + intercept through the pairs of several models. Where status is not `ok` every number is NaN. */
export interface CompensationLine {
  /** `too-few-models`: fewer than two pairs; `energies-not-distinct`: the models give one Ea. */
  readonly status: 'ok' | 'too-few-models' | 'energies-not-distinct'
  readonly models: number
  readonly slope_mol_per_J: number
  readonly intercept: number
  /** One standard error each, n - 2 degrees of freedom, n models; NaN for two models. */
  readonly slopeStandardError_mol_per_J: number
  readonly interceptStandardError: number
  readonly covariance_mol_per_J: number
  /** How far the models lie from the line in ln A: the residual standard deviation. */
  readonly residualStandardDeviation: number
  readonly r2: number
  readonly dof: number
  readonly meanEa: number
  readonly lnAAtMeanEa: number
}

/**
 * The compensation line through the Ea and ln A that several models, wrong ones too, give for one curve (`singleCurveFit`): ln A = a Ea + b. The pairs lie nearly on
 * a straight line whatever the model, which is no law of chemistry but follows from one curve being fitted by all; where it meets the isoconversional Ea it gives ln A
 * without a choice of model.
 *
 * One line a heating rate: lines of different heating rates have slopes of their own. Points off the line are models far from the data.
 *
 * @param pairs - one pair a model, from one curve
 * @throws KineticsError `not-finite` where a pair is not finite: leave out models that gave no Ea
 * @source ictac-2011
 */
export function compensationLine(pairs: readonly ArrheniusPair[]): CompensationLine {
  pairs.forEach(({ Ea, lnA }, i) => {
    if (Number.isFinite(Ea) && Number.isFinite(lnA)) return
    throw new KineticsError('not-finite', `Model ${i + 1} of the compensation line has no finite Ea and ln A; leave it out.`, { pair: i })
  })
  const fit = lineFit(
    pairs.map(({ Ea }) => Ea),
    pairs.map(({ lnA }) => lnA),
  )
  const status = { ok: 'ok', 'too-few-points': 'too-few-models', 'x-not-distinct': 'energies-not-distinct' } as const
  return {
    status: status[fit.status],
    models: pairs.length,
    slope_mol_per_J: fit.slope,
    intercept: fit.intercept,
    slopeStandardError_mol_per_J: fit.slopeStandardError,
    interceptStandardError: fit.interceptStandardError,
    covariance_mol_per_J: fit.covariance,
    residualStandardDeviation: fit.residualStandardDeviation,
    r2: fit.r2,
    dof: Math.max(0, fit.dof),
    meanEa: fit.xMean,
    lnAAtMeanEa: fit.valueAtMean,
  }
}

/** ln A (A in 1/s) read from a compensation line. NaN where the line has no such number. */
export interface CompensatedLnA {
  readonly lnA: number
  /** One standard error: that of the line at Ea and that which Ea's own carries over, √(var(line) + slope² se(Ea)²). */
  readonly standardError: number
  /** The same with the scatter of single models about the line: how far a right model among them may lie. */
  readonly modelStandardError: number
  /** ln A ± t(0.975; n - 2)·modelStandardError; a rough interval, since models are not a random sample. */
  readonly lower95: number
  readonly upper95: number
}

/**
 * ln A at an isoconversional Ea from the compensation line: ln A = a Ea + b, without a choice of model.
 *
 * var(line) = s²[1/n + (Ea - mean)²/Σ(Ea_i - mean)²], s the scatter of the models about the line. Ea's error is taken as independent of the line.
 *
 * @param Ea - mean over the levels, or at one level
 * @param standardError - one standard error of Ea, 0 or more; NaN where it is not known, which leaves ln A without one
 * @throws KineticsError `bad-option` where the standard error is negative
 * @source ictac-2011
 */
export function lnAFromCompensation(line: CompensationLine, Ea: Quantity<'J/mol'>, standardError: Quantity<'J/mol'>): CompensatedLnA {
  if (standardError < 0) {
    throw new KineticsError('bad-option', `A standard error of Ea is not negative: ${standardError} J/mol.`, { standardError })
  }
  const fromMean = Ea - line.meanEa
  const lnA = line.lnAAtMeanEa + line.slope_mol_per_J * fromMean
  const s2 = line.residualStandardDeviation ** 2
  const variance = s2 / line.models + (line.slopeStandardError_mol_per_J * fromMean) ** 2 + (line.slope_mol_per_J * standardError) ** 2
  const modelStandardError = Math.sqrt(variance + s2)
  const halfWidth = line.dof >= 1 ? studentTQuantile(0.975, line.dof) * modelStandardError : Number.NaN
  return { lnA, standardError: Math.sqrt(variance), modelStandardError, lower95: lnA - halfWidth, upper95: lnA + halfWidth }
}
