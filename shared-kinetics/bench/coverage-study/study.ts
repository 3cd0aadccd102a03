import { errorKinds, reactions } from './design.ts'
import { isGated, outsideGate } from './gate.ts'
import { pageOf } from './page.ts'
import { runShare, type Share, type ShareResult } from './run-share.ts'
import { merged } from './tally.ts'
import { cellName } from './words.ts'

export { runShare }

/** Replicates of one share: some seconds of work. */
const replicatesOfShare = 50

/** The whole study in shares, in the order in which their results are put together. */
export const sharesOf = (replicates: number, seed: number): Share[] =>
  errorKinds.flatMap((error) =>
    reactions.flatMap((_, reaction) =>
      Array.from({ length: Math.ceil(replicates / replicatesOfShare) }, (__, k): Share => {
        const from = k * replicatesOfShare
        return { seed, error, reaction, from, to: Math.min(replicates, from + replicatesOfShare) }
      }),
    ),
  )

export interface StudyReport {
  readonly page: string
  readonly gatedCells: number
  /** Gated cells outside the bounds, by name and number. */
  readonly failures: readonly string[]
}

/** @param results - in the order of `sharesOf` */
export function reportOf(results: readonly ShareResult[], replicates: number, seed: number): StudyReport {
  const cells = merged(results.map((result) => result.cells))
  return {
    page: pageOf(
      cells,
      results.flatMap((result) => result.findings),
      { replicates, seed },
    ),
    gatedCells: cells.filter(isGated).length,
    failures: outsideGate(cells).map(cellName),
  }
}
