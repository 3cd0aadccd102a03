import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits } from '../words.ts'

const wordsOfSource = { option: 'given by hand', nominal: 'read from name or heading' } as const

/** Fires for each run whose export has no time, so that time was made from temperature and a nominal heating rate. */
export function timeRebuilt({ runs }: ReviewInput): Finding[] {
  return runs.flatMap(({ info, result }): Finding[] => {
    const source = result.heatingRateSource
    const rate = result.heatingRate_K_per_min
    if (info.hasTime || rate === null || source === null || source === 'measured') return []
    return [
      {
        code: 'time-rebuilt',
        severity: 'note',
        stage: 'runs',
        title: `${info.label}: time rebuilt from ${digits(rate, 4)} K/min`,
        message:
          `${info.label} has no time column. Time was made from its temperature and the ${digits(rate, 4)} K/min ${wordsOfSource[source]}; an error of that rate is an error of the ` +
          'reaction rate and cannot be seen. Export the run with time where you can.',
        run: info.id,
        level: null,
        evidence: { heatingRate_K_per_min: rate, source },
        basis: 'The heating rate of the sample counts, not the one that was set',
        sources: ['ictac-2014'],
      },
    ]
  })
}
