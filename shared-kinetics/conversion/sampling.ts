import { KineticsError } from '../errors.ts'
import { mostBackward, type UsableRows } from '../series/usable-rows.ts'
import type { ConversionCurve } from './smooth-curve.ts'

/** How densely a run was sampled while it reacted, and what of its rows could not be used. */
export interface Sampling {
  /** Between conversion 0.02 and 0.98. */
  readonly rowsInReaction: number
  readonly gaps: readonly {
    readonly from_K: number
    readonly to_K: number
    readonly conversionBefore: number
    readonly conversionAfter: number
  }[]
  readonly withoutNumber: number
  readonly sameTime: number
  readonly behind: number
  /** Those of `behind` that stood between the rows of the reaction. */
  readonly behindInReaction: number
}

/**
 * @param first - row of the run at which the window, and with it the curve, begins
 * @param rowsInEach - measured rows for each of the curve's, more than 1 where they were pooled
 * @throws KineticsError `time-not-ascending` where more than 5 % of the rows between which the reaction runs lie behind in time
 */
export function samplingOf({ setAside }: UsableRows, first: number, curve: ConversionCurve, rowsInEach: number, label: string): Sampling {
  const { reaction, conversion, temperature_K } = curve
  const rowsInReaction = Math.round((reaction.last - reaction.first + 1) * rowsInEach)
  const rowsOf = (blocks: typeof setAside.behind): number => blocks.reduce((sum, block) => sum + block.rows, 0)
  const behindInReaction = rowsOf(setAside.behind.filter(({ after }) => after >= first + reaction.first && after < first + reaction.last))
  if (behindInReaction > mostBackward * (rowsInReaction + behindInReaction)) {
    throw new KineticsError(
      'time-not-ascending',
      `${label}: time goes back while the sample reacts, and ${behindInReaction} of ${rowsInReaction + behindInReaction} rows there lie behind an earlier one. ` +
        'Export the run in one piece with time counted from its start, or correct the clock of these rows.',
      { run: label, backward: behindInReaction },
    )
  }
  return {
    rowsInReaction,
    gaps: curve.gaps.map((gap) => ({
      from_K: temperature_K[gap.first] ?? Number.NaN,
      to_K: temperature_K[gap.last] ?? Number.NaN,
      conversionBefore: conversion[gap.first] ?? Number.NaN,
      conversionAfter: conversion[gap.last] ?? Number.NaN,
    })),
    withoutNumber: setAside.withoutNumber,
    sameTime: setAside.sameTime,
    behind: rowsOf(setAside.behind),
    behindInReaction,
  }
}
