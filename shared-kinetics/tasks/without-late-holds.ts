import type { MethodInfo } from '../isoconversional/result.ts'
import type { LeftOut } from '../review/review-input.ts'
import { percent } from '../review/words.ts'

/** A hold of which more than this share reacted before it began does not count from alpha = 0. */
const mostBefore = 0.02

/**
 * The choice without the isothermal integral, and with the reason, where a run had reacted to more than 2 % before its temperature had come to the hold: the time
 * from the start of the hold is then not the time that the conversion took.
 *
 * @source ictac-2014 (the heating up to a hold must not consume a noticeable share)
 */
export function withoutLateHolds(
  { chosen, leftOut }: { readonly chosen: readonly MethodInfo[]; readonly leftOut: readonly LeftOut[] },
  runs: readonly { readonly label: string; readonly conversionBeforeHold: number }[],
): { readonly chosen: readonly MethodInfo[]; readonly leftOut: readonly LeftOut[] } {
  const method = chosen.find((info) => info.id === 'isothermal-integral')
  const worst = runs.reduce((most, run) => (run.conversionBeforeHold > most.conversionBeforeHold ? run : most), {
    label: '',
    conversionBeforeHold: mostBefore,
  })
  if (method === undefined || worst.label === '') return { chosen, leftOut }
  const reason = `it counts time from the start of the hold, and ${percent(worst.conversionBeforeHold)} of ${worst.label} had reacted while it was heated up to it`
  return { chosen: chosen.filter((info) => info !== method), leftOut: [...leftOut, { method: method.id, label: method.label, reason }] }
}
