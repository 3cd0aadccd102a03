import type { RateConstantTable } from '../../rate-constants/rate-constant-table.ts'
import type { RateConstantsResult } from '../../tasks/rate-constants-result.ts'
import type { Finding } from '../finding.ts'

/** What the rules about a table of rate constants look at. */
export interface RateConstantReview {
  readonly table: RateConstantTable
  readonly result: Omit<RateConstantsResult, 'findings'>
}

/** A finding about a table belongs to no run and no level. */
export const aboutTable = (finding: Omit<Finding, 'stage' | 'run' | 'level'>): Finding => ({
  ...finding,
  stage: 'activation',
  run: null,
  level: null,
})
