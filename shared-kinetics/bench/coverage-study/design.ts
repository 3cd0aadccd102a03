import type { IntervalKind, MethodId } from '../../isoconversional/result.ts'
import { reactionModels, type ReactionModelCode } from '../../reaction-models/registry.ts'
import type { StatedUncertainties } from '../../uncertainty/measured-sources.ts'
import type { SingleStep } from '../../check-values/exact-model-curve.ts'

/** Everything the study of coverage chooses: reactions, programmes, errors, methods, intervals, sizes. Numbers of the study depend on nothing else. */
export const levels: readonly number[] = [0.1, 0.3, 0.5, 0.7, 0.9]

export interface Reaction extends SingleStep {
  readonly code: ReactionModelCode
}

const reaction = (code: ReactionModelCode, Ea_kJ_per_mol: number, log10A: number): Reaction => ({
  code,
  model: reactionModels[code],
  Ea_J_per_mol: 1000 * Ea_kJ_per_mol,
  lnA: log10A * Math.LN10,
})

/** A decelerating, a sigmoidal and a diffusion-controlled reaction, of small, middling and large Ea/(RT). */
export const reactions: readonly Reaction[] = [reaction('F1', 150, 12), reaction('A2', 80, 6), reaction('D3', 220, 16)]

/** Heating rates in K/min; the series of three to six runs are those that analysts measure. */
export const heatingRates_K_per_min: readonly number[] = [1, 2, 5, 10, 20, 40]
export const runCounts = [3, 4, 5, 6] as const
export type RunCount = (typeof runCounts)[number]
const chosen: Readonly<Record<RunCount, readonly [number, number]>> = { 3: [2, 5], 4: [1, 5], 5: [0, 5], 6: [0, 6] }

/** Those of six things, one a heating rate, that a series of so many runs has. */
export const ofSeries = <Item>(all: readonly Item[], runs: RunCount): readonly Item[] => all.slice(...chosen[runs])

export const studiedMethods = ['friedman', 'starink', 'vyazovkin', 'vyazovkin-incremental'] as const satisfies readonly MethodId[]

export const studiedIntervals = [
  'student-t',
  'vyazovkin-wight-f',
  'jackknife',
  'bootstrap',
  'measured-sources',
  'combined',
] as const satisfies readonly ('student-t' | IntervalKind)[]
export type StudiedInterval = (typeof studiedIntervals)[number]

export const errorKinds = ['temperature-offset', 'heating-rate', 'all-sources', 'signal-noise'] as const
export type ErrorKind = (typeof errorKinds)[number]

const nothing: StatedUncertainties = { temperatureCommon_K: 0, temperatureRun_K: 0, lag_s: 0, statedHeatingRate_share: 0 }

/** The errors that are made, and that (d) is told of. The noise of a signal it finds by itself. */
export const errorsMade: Readonly<Record<ErrorKind, StatedUncertainties>> = {
  'temperature-offset': { ...nothing, temperatureRun_K: 0.5 },
  'heating-rate': { ...nothing, statedHeatingRate_share: 0.015 },
  'all-sources': { temperatureCommon_K: 0.5, temperatureRun_K: 0.5, lag_s: 1, statedHeatingRate_share: 0.01 },
  'signal-noise': nothing,
}

/** Mass runs with signal noise: 8 mg of which half is lost, a row every 4 s whatever the heating rate. */
export const massRuns = { initial_kg: 8e-6, lost_kg: 4e-6, noise_kg: 5e-8, every_s: 4 } as const

/** Independent errors whose variance is alike from run to run: what Student's t assumes. */
export const gates: Readonly<Partial<Record<StudiedInterval, readonly ErrorKind[]>>> = {
  'student-t': ['temperature-offset', 'heating-rate'],
  'measured-sources': ['temperature-offset', 'heating-rate', 'all-sources'],
}
export const gate = { least: 0.93, most: 0.97, replicates: 2000 } as const

/** So many draws that the quantiles 0.025 and 0.975 are the third from either end: another draw lies between them with probability 0.95 exactly. */
export const drawsPerReplicate = 119

/** Random streams: those of the errors are numbered by replicate, and are the same for all models and numbers of runs; those of the draws of (d) have a seed a replicate. */
export const seedOfErrors = (seed: number, kind: ErrorKind): number => 8 * seed + errorKinds.indexOf(kind)
export const seedOfDraws = (seed: number, kind: ErrorKind, replicate: number): number =>
  2 ** 40 + (8 * seed + errorKinds.indexOf(kind)) * 2 ** 20 + replicate
