import type { Finding } from '../review/finding.ts'

/** What stands beside a mean of Ea that does not describe the reaction by itself; null where nothing speaks against quoting it. By the finding `energy-varies`, unless noise may do it. */
export const meanCaution = (findings: readonly Pick<Finding, 'code' | 'evidence'>[]): string | null =>
  findings.some(({ code, evidence }) => code === 'energy-varies' && evidence['intervals'] !== 'overlap')
    ? 'not to be quoted alone: Ea varies'
    : null
