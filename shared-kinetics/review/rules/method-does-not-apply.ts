import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { list } from '../words.ts'

/** Fires for methods that were left out: one finding for all that share a reason. A caution where they were asked for by name, else a note. */
export function methodDoesNotApply({ study, leftOut }: ReviewInput): Finding[] {
  const reasons = new Map<string, string[]>()
  for (const { label, reason } of leftOut) reasons.set(reason, [...(reasons.get(reason) ?? []), label])
  const asked = new Set<string>(study.settings.methods ?? [])
  return [...reasons].map(([reason, labels]): Finding => {
    const wanted = leftOut.some((method) => method.reason === reason && asked.has(method.method))
    return {
      code: 'method-does-not-apply',
      severity: wanted ? 'caution' : 'note',
      stage: 'activation',
      title: `${list(labels)} left out`,
      message:
        `${list(labels)} ${labels.length === 1 ? 'is' : 'are'} left out (${labels.length} method${labels.length === 1 ? '' : 's'}): ${reason}. ` +
        `A number from ${labels.length === 1 ? 'it' : 'them'} would be wrong without looking wrong. ` +
        'Use Friedman or Vyazovkin, which take any programme, or leave out the runs that do not fit.',
      run: null,
      level: null,
      evidence: { methods: labels.join(', '), count: labels.length, reason },
      basis: 'The equations of the method',
      sources: ['ictac-2011'],
    }
  })
}
