import type { RequestInput } from '../../../shared-kinetics/contract/host-api.ts'
import type { RateConstantTable } from '../../../shared-kinetics/contract/study-result.ts'
import { useServices } from '../../state/services.ts'
import type { SheetActions } from '../stage-props.ts'
import { withChoicesKept } from './with-choices-kept.ts'

/**
 * Makes the rate constants of the study's holds under a model, in place of the table there is; what was chosen in that one stays.
 *
 * @returns whether there is a table; where there is none, the sheet has said why
 */
export function useRateConstantsOfHolds(
  table: RateConstantTable | null,
  actions: SheetActions,
): (input: Omit<RequestInput<'rate-constants.from-holds'>, 'revision'>) => Promise<boolean> {
  const { session } = useServices()
  return async (input) => {
    const answer = await session.ask('rate-constants.from-holds', input)
    if (answer === null) return false
    actions.change({ kind: 'set-rate-constants', table: withChoicesKept(answer.table, table) })
    return true
  }
}
