import { methods } from '../isoconversional/registry.ts'
import { programmeNames } from '../isoconversional/series-check.ts'
import { methodIds, type IsoconversionalResult, type MethodId, type MethodInfo, type TaskContext } from '../isoconversional/result.ts'
import type { LeftOut } from '../review/review-input.ts'
import type { Programme } from '../series/programme.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'

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
