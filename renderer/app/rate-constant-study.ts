import type { RateConstantsResult } from '../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../sheet/data-table.ts'
import { copiedTables } from '../stages/activation/rate-constant-rows.ts'
import { gridCopyColumns } from '../stages/runs/rate-constant-copy.ts'
import type { Replica } from '../state/replica.ts'
import type { Stage, ViewState } from '../state/view-store.ts'

/** Whether the stage shows the table of rate constants: always in a study without runs, and on the stage of Ea where the table was made from the runs and is chosen. */
export function showsRateConstants(replica: Pick<Replica, 'document'> | null, view: Pick<ViewState, 'stage' | 'basis'>): boolean {
  if (replica === null || replica.document.rateConstants === null) return false
  return replica.document.runs.length === 0 || (view.stage === 'activation' && view.basis === 'rate-constants')
}

/** What is copied of a stage that shows rate constants; null where there is nothing to copy. */
export function rateConstantTables(
  { document }: Pick<Replica, 'document'>,
  rated: RateConstantsResult | null,
  stage: Stage,
): string | null {
  const table = document.rateConstants
  if (table === null || table.rows.length === 0) return null
  if (stage === 'activation') return rated === null ? null : copiedTables(rated)
  return copyText(gridCopyColumns(table), table.rows)
}
