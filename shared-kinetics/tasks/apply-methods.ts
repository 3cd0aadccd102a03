import { methods } from '../isoconversional/registry.ts'
import { programmeNames } from '../isoconversional/series-check.ts'
import { methodIds, type IsoconversionalResult, type MethodId, type MethodInfo, type TaskContext } from '../isoconversional/result.ts'
import { kissinger, type RatePeak } from '../peak-methods/kissinger.ts'
import type { LeftOut } from '../review/review-input.ts'
import type { Programme } from '../series/programme.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { quantity } from '../units/quantity.ts'
import { kissingerResult } from './profile-result.ts'
import type { KissingerResult } from './study-result.ts'

/**
 * Methods to run, in the order of `methodIds`: those asked for that apply to the programme of every run. Left out with a reason are those that were asked for by
 * name and, where nothing was asked for, those made for constant heating rates; that a method for holds is not run on ramps needs no saying.
 */
export function chooseMethods(
  asked: readonly MethodId[] | null,
  programmes: readonly Programme['kind'][],
): { readonly chosen: readonly MethodInfo[]; readonly leftOut: readonly LeftOut[] } {
  const chosen: MethodInfo[] = []
  const leftOut: LeftOut[] = []
  for (const id of methodIds) {
    if (asked !== null && !asked.includes(id)) continue
    const { info } = methods[id]
    if (asked === null && !info.byDefault) continue
    const hindered = programmes.find((kind) => !info.appliesTo.includes(kind))
    if (hindered === undefined) chosen.push(info)
    else if (asked !== null || info.appliesTo.includes('constant-heating-rate'))
      leftOut.push({ method: id, label: info.label, reason: notMadeFor(info, hindered) })
  }
  return { chosen, leftOut }
}

function notMadeFor(info: MethodInfo, kind: Programme['kind']): string {
  return `made for ${info.appliesTo.map((name) => programmeNames[name]).join(' or ')}, and at least one run followed ${programmeNames[kind]}`
}

/** Runs one method on the series. */
export const applyMethod = (info: MethodInfo, series: SeriesAtLevels, context: TaskContext): IsoconversionalResult =>
  methods[info.id].run(series, { checkCancelled: context.checkCancelled, progress: () => undefined })

export interface RunPeak {
  readonly label: string
  readonly programme: Programme
  readonly programmeGroup: number
  /** NaN where the reaction rate has no maximum. */
  readonly peak_K: number
  readonly conversionAtPeak: number
}

/** Kissinger's Ea where every run was heated at a constant rate and has a rate peak; else null, with the reason. */
export function applyKissinger(runs: readonly RunPeak[]): {
  readonly kissinger: KissingerResult | null
  readonly leftOut: readonly LeftOut[]
} {
  const peaks: RatePeak[] = []
  for (const { label, programme, programmeGroup, peak_K } of runs) {
    if (programme.kind !== 'constant-heating-rate') {
      return without(
        `it is made for ${programmeNames['constant-heating-rate']}, and at least one run followed ${programmeNames[programme.kind]}`,
      )
    }
    if (Number.isNaN(peak_K)) return without(`the reaction rate of ${label} has no maximum that can be read inside the window`)
    peaks.push({ heatingRate: programme.heatingRate, temperature: quantity(peak_K, 'K'), programmeGroup })
  }
  const estimate = kissinger(peaks)
  switch (estimate.status) {
    case 'ok':
      return {
        kissinger: kissingerResult(
          estimate,
          peaks,
          runs.map((run) => run.conversionAtPeak),
        ),
        leftOut: [],
      }
    case 'too-few-programmes':
      // Said once, by the rule on the number of programmes.
      return { kissinger: null, leftOut: [] }
    case 'line-not-determined':
      return without('the peak temperatures of the runs do not differ')
    case 'energy-not-positive':
      return without('the rate peak does not move to higher temperature with the heating rate')
  }
}

const without = (reason: string): { readonly kissinger: null; readonly leftOut: readonly LeftOut[] } => ({
  kissinger: null,
  leftOut: [{ method: 'kissinger', label: 'Kissinger', reason }],
})
