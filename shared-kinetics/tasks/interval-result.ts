import type { IntervalKind, IntervalStatus } from '../isoconversional/result.ts'
import { sources, type SourceKey } from '../sources.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import { intervalStatus } from '../figure/interval-status.ts'
import { maybes } from './maybe.ts'
import type { IntervalResult } from './study-result.ts'

/** What is said of a kind of interval wherever it is shown. */
const kinds: Readonly<
  Record<IntervalKind, { readonly label: string; readonly approximate: boolean; readonly sources: readonly SourceKey[] }>
> = {
  'vyazovkin-wight-f': { label: 'F-type interval of Vyazovkin and Wight', approximate: true, sources: ['vyazovkin-wight-2000'] },
  jackknife: { label: 'Jackknife over runs', approximate: true, sources: ['tukey-1958', 'efron-tibshirani-1993'] },
  bootstrap: { label: 'Bootstrap over runs', approximate: true, sources: ['efron-tibshirani-1993'] },
  'measured-sources': { label: 'Measured sources of uncertainty', approximate: true, sources: ['jcgm-101-2008'] },
  combined: { label: 'Scatter and measured sources combined', approximate: true, sources: ['jcgm-100-2008', 'abernethy-1985'] },
}

/** What a kind of interval is called. */
export const labelOfInterval = (kind: IntervalKind): string => kinds[kind].label

/** Columns of an interval in J/mol, as long as the levels; NaN where it is not to be had. */
export interface IntervalColumns {
  readonly standardUncertainty: ArrayLike<number>
  readonly lower95: ArrayLike<number>
  readonly upper95: ArrayLike<number>
}

/**
 * An interval in the terms of `StudyResult`: named by its kind, in kJ/mol, null for what is not to be had, which the status of the level gives the reason for.
 *
 * @param Ea - of the levels; NaN where there is none
 * @param missing - why an end is not there although the level has an Ea
 * @param given - what is said where both ends are there and above 0
 */
export function intervalResult(
  kind: IntervalKind,
  columns: IntervalColumns,
  note: string,
  Ea: ArrayLike<number>,
  missing: (level: number) => IntervalStatus,
  given: IntervalStatus = 'ok',
): IntervalResult {
  const { label, approximate, sources: keys } = kinds[kind]
  return {
    kind,
    label,
    level: 0.95,
    pointwise: true,
    approximate,
    note,
    sources: keys.map((key) => sources[key]),
    standardUncertainty_kJ_per_mol: kilojoules(columns.standardUncertainty),
    lower95_kJ_per_mol: kilojoules(columns.lower95),
    upper95_kJ_per_mol: kilojoules(columns.upper95),
    status: intervalStatus(Ea, columns.lower95, columns.upper95, missing, given),
  }
}

const kilojoules = (values: ArrayLike<number>): IntervalResult['lower95_kJ_per_mol'] =>
  maybes(Float64Array.from(values, joulesToKilojoules))
