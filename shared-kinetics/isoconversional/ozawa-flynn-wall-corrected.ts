import { lineFit } from '../numerics/line-fit.ts'
import { lnPOfX, scaledPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { heatingRateOf, lineMethod, temperatureAtLevel, type LineAtLevel, type RefinedLine } from './line-method.ts'
import type { MethodInfo } from './result.ts'

export const ozawaFlynnWallCorrectedInfo: MethodInfo = {
  id: 'ofw-corrected',
  label: 'Ozawa–Flynn–Wall corrected',
  sources: ['flynn-1983', 'ozawa-1965', 'flynn-wall-1966', 'ictac-2011'],
  appliesTo: ['constant-heating-rate'],
  evidence: 'line',
  byDefault: true,
}

/** Doyle's line ln p(x) = -5.331 - 1.052 x. */
const doyleIntercept = 5.331
const doyleSlope = 1.052

/** Successive Ea differ by less than this share at the end. */
const converged = 1e-13
const mostPasses = 60

/**
 * The method of Ozawa and of Flynn and Wall with the exact temperature integral in place of Doyle's line: at each level the line
 *
 *   ln beta - δ(xᵢ) = const - 1.052 Ea/(R T),   δ(x) = ln p(x) + 5.331 + 1.052 x,   xᵢ = Ea/(R Tᵢ)
 *
 * through the runs, δ being what Doyle's line leaves out of ln p at each run. The first pass has δ = 0 and gives the Ea of OFW as published; each pass then takes
 * δ from the Ea before, until Ea no longer changes. That Ea is the one for which ln beta - ln p(Ea/(R T)) has no slope against 1/T, so that it does not depend on
 * the line that was corrected; a pass leaves about a twentieth of the error of the one before.
 *
 * Standard error: that of the slope of ln beta about the corrected line, times dEa/dslope = -R/m, m the slope of uᵢ h(xᵢ) against uᵢ = 1/Tᵢ with h = -d ln p/dx
 * (close to 1); the correction itself moves with Ea, so that the factor is not R/1.052.
 *
 * Assumes a constant heating rate and Ea constant from alpha = 0 to the level. No systematic error from the temperature integral, as Vyazovkin's method has none, from
 * which it differs only in how it weighs the errors of the runs. Where Ea varies with conversion it lags behind the differential value, as every integral taken from
 * zero does. Not for programmes other than a constant heating rate.
 *
 * Statuses: `level-not-reached`, `too-few-programmes`, `line-not-determined` (also where the slope is that of no positive Ea, for which there is no temperature integral).
 *
 * @source flynn-1983
 * @source ictac-2011 (methods on Doyle's line are to be corrected or left)
 */
export const ozawaFlynnWallCorrected = lineMethod({
  info: ozawaFlynnWallCorrectedInfo,
  temperature: temperatureAtLevel,
  ordinate: (run) => Math.log(heatingRateOf(run)),
  withoutOrdinate: 'line-not-determined',
  slopeFactor: -doyleSlope,
  interceptIsLnAf: false,
  integral: null,
  refine: corrected,
})

function corrected({ x: inverseT, y: lnRate, fit: first }: LineAtLevel): RefinedLine | null {
  let fit = first
  let y = lnRate
  let Ea = energyOf(fit.slope)
  for (let pass = 0; pass < mostPasses; pass++) {
    if (!(Ea > 0)) return null
    const before = Ea / gasConstant_J_per_mol_K
    y = lnRate.map((value, i) => value - beyondDoyle(before * (inverseT[i] as number)))
    fit = lineFit(inverseT, y)
    const next = energyOf(fit.slope)
    const settled = Math.abs(next - Ea) <= converged * Ea
    Ea = next
    if (settled) return { Ea, y, fit, energyPerSlope: energyPerSlope(Ea, inverseT), lnA: Number.NaN, integral: null }
  }
  return null
}

const energyOf = (slope: number): number => (-slope * gasConstant_J_per_mol_K) / doyleSlope

/** What Doyle's line leaves out of ln p(x). */
const beyondDoyle = (x: number): number => lnPOfX(x) + doyleIntercept + doyleSlope * x

function energyPerSlope(Ea: number, inverseT: Float64Array): number {
  const rise = inverseT.map((u) => u / scaledPOfX((Ea * u) / gasConstant_J_per_mol_K))
  return -gasConstant_J_per_mol_K / lineFit(inverseT, rise).slope
}
