import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'

/** Fires for each used run that could not be evaluated and was left out. */
export function runUnusable({ unusable, study }: ReviewInput): Finding[] {
  const used = study.runs.filter((run) => run.use).length
  return unusable.map(
    ({ info, error }): Finding => ({
      code: 'run-unusable',
      severity: 'stop',
      stage: 'runs',
      title: `${info.label} cannot be used`,
      message: `${error.message} The run was left out: ${used - unusable.length} of ${used} runs are analysed.`,
      run: info.id,
      level: null,
      evidence: { ...evidenceOf(error.details), reason: error.code, unusable: unusable.length, used },
      basis: 'A run that cannot be read the same way as the others is not compared with them',
      sources: [],
    }),
  )
}

const evidenceOf = (details: Readonly<Record<string, string | number | boolean | null>>): Record<string, string | number | null> =>
  Object.fromEntries(Object.entries(details).map(([key, value]) => [key, typeof value === 'boolean' ? String(value) : value]))
