import { temperatureAtConversion } from '../../check-values/exact-model-curve.ts'
import { evenTimes, ramp, durationOf, reducedTime, runOf, temperatureOf } from '../../check-values/simulated-run.ts'
import type { RandomStream } from '../../numerics/random.ts'
import type { ReactionModelCode } from '../../reaction-models/registry.ts'
import type { RunColumns, RunInfo } from '../../series/run.ts'
import type { StudyInput } from '../../tasks/study-input.ts'
import { heatingRates_K_per_min, levels, massRuns, studiedMethods, type Reaction } from './design.ts'

/** Conversion after a reduced time θ = ∫ k dt, the inverse of g. */
const conversionAfter: Readonly<Partial<Record<ReactionModelCode, (theta: number) => number>>> = {
  F1: (theta) => -Math.expm1(-theta),
  A2: (theta) => -Math.expm1(-(theta ** 2)),
  D3: (theta) => 1 - Math.max(0, 1 - Math.sqrt(theta)) ** 3,
}

/** One run's clean curve: rows at a constant sampling time, from 40 K below the first thousandth of the reaction to 40 K above the last. */
export interface CleanRun {
  readonly heatingRate_K_per_min: number
  readonly time_s: Float64Array
  readonly temperature_K: Float64Array
  readonly mass_kg: Float64Array
}

export function cleanRuns(reaction: Reaction): CleanRun[] {
  const after = conversionAfter[reaction.code]
  if (after === undefined) throw new RangeError(`no closed form of the conversion for ${reaction.code}`)
  return heatingRates_K_per_min.map((rate) => {
    const at = (alpha: number): number => temperatureAtConversion(reaction, rate / 60, alpha)
    const programme = ramp(at(0.001) - 40, rate, at(0.999) + 40)
    const time_s = evenTimes(durationOf(programme), Math.round(durationOf(programme) / massRuns.every_s) + 1)
    const theta = reducedTime({ Ea_J_per_mol: reaction.Ea_J_per_mol, A_per_s: Math.exp(reaction.lnA) }, programme, time_s)
    return {
      heatingRate_K_per_min: rate,
      time_s,
      temperature_K: time_s.map((t) => temperatureOf(programme, t)),
      mass_kg: theta.map((value) => massRuns.initial_kg - massRuns.lost_kg * after(value)),
    }
  })
}

export interface MassRun {
  readonly info: RunInfo
  readonly columns: RunColumns
}

/** The runs with noise of the mass, independent from row to row and alike in all rows. */
export const withNoise = (runs: readonly CleanRun[], noise_kg: number, random: RandomStream): MassRun[] =>
  runs.map(({ heatingRate_K_per_min, time_s, temperature_K, mass_kg }) =>
    runOf(`${heatingRate_K_per_min}`, {
      time_s,
      temperature_K,
      signals: [{ quantity: 'mass', unit: 'kg', values: mass_kg.map((value) => value + noise_kg * random.normal()) }],
    }),
  )

/** The runs as a study, converted and analysed as the program does by default. */
export const studyOf = (runs: readonly MassRun[]): { readonly study: StudyInput; readonly columns: ReadonlyMap<string, RunColumns> } => ({
  study: {
    runs: runs.map((run) => run.info),
    settings: { signal: null, levels, methods: studiedMethods, window: null, baseline: 'area-proportional', meanRange: [0.1, 0.9] },
  },
  columns: new Map(runs.map((run) => [run.info.columnsKey, run.columns])),
})
