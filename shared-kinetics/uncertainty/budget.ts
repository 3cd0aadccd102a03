import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column, type Column } from '../units/quantity.ts'
import { disturbedEnergy, roomFor } from './disturbed-energy.ts'
import type { EnergyModel } from './energy-model.ts'
import { uncertaintySources, type MeasuredSources, type UncertaintySource } from './measured-sources.ts'

/** Standard uncertainty of Ea that each source alone brings, one entry a level; NaN without Ea, 0 where the method does not use what the source disturbs. */
export type Budget = Readonly<Record<UncertaintySource, Column<'J/mol'>>>

/**
 * Sources whose errors differ from run to run lie in the scatter of the points already: adding them to the regression's standard error would count them twice. Those
 * that move all runs together leave no scatter.
 */
export const shownByScatter: Readonly<Record<UncertaintySource, boolean>> = {
  'temperature-common': false,
  'temperature-run': true,
  'temperature-lag': false,
  'heating-rate': true,
  'signal-noise': true,
  baseline: false,
}

/**
 * Sources that a combined interval adds to the scatter. One that cannot be told at all (no other baseline can be drawn under some run) is not among them: whoever shows the
 * interval says that it is not in it. One that is unknown at single levels stays, and leaves these levels without an interval.
 */
export const addedToScatter = ({ baseline }: Pick<MeasuredSources, 'baseline'>): readonly UncertaintySource[] =>
  uncertaintySources.filter((source) => !shownByScatter[source] && (source !== 'baseline' || baseline === null || baseline.reason === null))

/**
 * Budget of a method's Ea by the law of propagation: with cᵢ the sensitivity of Ea to the ordinate of run i (slope of a regression: (xᵢ - x̄)/Σ(x - x̄)²), and that
 * ordinate's derivatives by temperature, time, heating rate and reaction rate,
 *
 *   u² = Σ (cᵢ ∂yᵢ/∂q)² u(q)²   where runs err independently,   u = |Σ cᵢ ∂yᵢ/∂q| u(q)   where they err together.
 *
 * The choice of baseline counts as an even distribution between one baseline and the mirror image of the other, u = (difference)/√3, where the difference is that of the Ea
 * with the other baseline, whose shifts of single runs can be as large as those between heating rates. All else is of first order: a Monte Carlo of the
 * same sources agrees within a few per cent as long as the interval is no more than some 20 % of Ea.
 *
 * @source jcgm-100-2008 5.1, 5.2
 */
export const budgetOf = (model: EnergyModel, sources: MeasuredSources): Budget => withoutSigns(signedBudgetOf(model, sources))

/** The budget that belongs to a signed one. */
export function withoutSigns(signed: Budget): Budget {
  const of = (source: UncertaintySource): Column<'J/mol'> => column(signed[source].map(Math.abs), 'J/mol')
  return {
    'temperature-common': of('temperature-common'),
    'temperature-run': of('temperature-run'),
    'temperature-lag': of('temperature-lag'),
    'heating-rate': of('heating-rate'),
    'signal-noise': of('signal-noise'),
    baseline: of('baseline'),
  }
}

/**
 * The same, but what moves all runs together with the sign of its effect on Ea: that is what is added up over levels, where the effect on a mean is asked for.
 *
 * @throws Cancelled, by `checkCancelled`
 */
export function signedBudgetOf(model: EnergyModel, sources: MeasuredSources, checkCancelled: () => void = () => undefined): Budget {
  const { levels, runs } = model
  const empty = (): Column<'J/mol'> => column(new Float64Array(levels).fill(Number.NaN), 'J/mol')
  const budget = {
    'temperature-common': empty(),
    'temperature-run': empty(),
    'temperature-lag': empty(),
    'heating-rate': empty(),
    'signal-noise': empty(),
    baseline: empty(),
  }
  const { stated, noise, baseline, heatingRate_share } = sources
  const room = roomFor(runs)
  const otherBaseline =
    baseline === null ? null : { ...baseline, temperature_K: new Float64Array(runs), lnHeatingRate: new Float64Array(runs), lag_s: 0 }
  for (let level = 0; level < levels; level++) {
    checkCancelled()
    if (Number.isNaN(model.Ea[level] ?? Number.NaN)) continue
    let common = 0
    let ofRuns = 0
    let lag = 0
    let heatingRate = 0
    let ofNoise = 0
    for (let i = 0; i < runs; i++) {
      const k = level * runs + i
      const s = sensitivity(model, level, i)
      common += s.perKelvin
      ofRuns += s.perKelvin ** 2
      lag += s.perLag
      heatingRate += (s.perLnHeatingRate * (heatingRate_share[i] as number)) ** 2
      const now = times(s.perSecond + times(s.perLnReactionRate, noise.lnReactionRateSlope_per_s[k]), noise.time_s[k])
      const before = times(s.perSecondBefore, noise.time_s[k - runs])
      ofNoise += now ** 2 + before ** 2 + 2 * times(now * before, noise.correlationWithBefore[k])
      ofNoise += times(s.perLnReactionRate, noise.lnReactionRate[k]) ** 2
    }
    budget['temperature-common'][level] = common * stated.temperatureCommon_K
    budget['temperature-run'][level] = Math.sqrt(ofRuns) * stated.temperatureRun_K
    budget['temperature-lag'][level] = lag * stated.lag_s
    budget['heating-rate'][level] = Math.sqrt(heatingRate)
    budget['signal-noise'][level] = Math.sqrt(Math.max(0, ofNoise))
    const Ea = model.Ea[level] as number
    budget.baseline[level] = otherBaseline === null ? 0 : (disturbedEnergy(model, level, otherBaseline, room) - Ea) / Math.sqrt(3)
  }
  return budget
}

/** What a method does not use does not matter, known or not: 0 of a factor 0, and NaN only where an unknown value counts. */
const times = (factor: number, value: number | undefined): number => (factor === 0 ? 0 : factor * (value ?? Number.NaN))

/** dEa of an error of one run at one level: by its temperature, the time of the level and of the level before, its ln beta and ln(dα/dt). */
interface Sensitivity {
  readonly perKelvin: number
  /** By the lag, in J/(mol s). */
  readonly perLag: number
  readonly perSecond: number
  readonly perSecondBefore: number
  readonly perLnHeatingRate: number
  readonly perLnReactionRate: number
}

function sensitivity(model: EnergyModel, level: number, run: number): Sensitivity {
  const { form, runs } = model
  const R = gasConstant_J_per_mol_K
  const Ea = model.Ea[level] as number
  const k = level * runs + run
  const gain = gainOf(model, level, run)
  if (form.kind === 'line') {
    const T = form.temperature_K[k] as number
    // y errs by -s dT/T, and x by -dT/T², which is as good as an error of +slope dT/T² in y.
    const perKelvin = (gain * ((form.slope_K[level] as number) / T - (form.temperatureExponent[k] as number))) / T
    return {
      perKelvin,
      perLag: perKelvin * (model.heatingRate_K_per_s[k] as number),
      perSecond: gain * (form.perSecond[k] as number) + perKelvin * (model.heatingRate_K_per_s[k] as number),
      perSecondBefore: 0,
      perLnHeatingRate: gain * (form.perLnHeatingRate + (model.timeIsRebuilt[run] === 1 ? form.perLnReactionRate : 0)),
      perLnReactionRate: gain * form.perLnReactionRate,
    }
  }
  const inverseT = form.inverseT[k] as number
  return {
    perKelvin: (gain * Ea * (inverseT ** 2 + (form.variance[k] as number))) / R,
    perLag: gain * (form.perLag[k] as number),
    perSecond: gain * (form.perSecond[k] as number),
    perSecondBefore: -gain * (form.perSecondBefore[k] as number),
    perLnHeatingRate: form.holdsHeatingRate[k] === 1 ? -gain : 0,
    perLnReactionRate: 0,
  }
}

/** dEa/dy of one run's ordinate. */
function gainOf({ form, runs }: EnergyModel, level: number, run: number): number {
  const xAt = (i: number): number =>
    form.kind === 'line' ? 1 / (form.temperature_K[level * runs + i] as number) : (form.inverseT[level * runs + i] as number)
  let mean = 0
  for (let i = 0; i < runs; i++) mean += xAt(i) / runs
  let spread = 0
  for (let i = 0; i < runs; i++) spread += (xAt(i) - mean) ** 2
  const factor = form.kind === 'line' ? (form.energyPerSlope[level] as number) : gasConstant_J_per_mol_K
  return (factor * (xAt(run) - mean)) / spread
}
