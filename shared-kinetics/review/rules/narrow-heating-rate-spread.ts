import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits } from '../words.ts'

const smallestRatio = 4
/** Rates set to 5 and 20 K/min come out a little nearer to each other. */
const about = 0.97

/** Fires where the fastest heating rate is less than about four times (3.88 times) the slowest, for at least two distinct constant rates. */
export function narrowHeatingRateSpread({ runs }: ReviewInput): Finding[] {
  const constant = runs.flatMap(({ result }) =>
    result.heatingRate_K_per_min === null ? [] : [{ rate: result.heatingRate_K_per_min, group: result.programmeGroup }],
  )
  if (new Set(constant.map((run) => run.group)).size < 2) return []
  const slowest = Math.min(...constant.map((run) => run.rate))
  const fastest = Math.max(...constant.map((run) => run.rate))
  const ratio = fastest / slowest
  if (ratio >= about * smallestRatio) return []
  return [
    {
      code: 'narrow-heating-rate-spread',
      severity: 'caution',
      stage: 'runs',
      title: `Fastest heating rate only ${digits(ratio)} times the slowest`,
      message:
        `From ${digits(slowest)} to ${digits(fastest)} K/min the ratio is ${digits(ratio)}. The runs lie close together in temperature, so that its small errors become large errors of Ea. ` +
        'Add a slower or faster run: 5 to 10 times the slowest is recommended.',
      run: null,
      level: null,
      evidence: { slowest_K_per_min: slowest, fastest_K_per_min: fastest, ratio },
      basis: `Recommended is a ratio of fastest to slowest of about 5 to 10 or more; to warn below about ${smallestRatio} is common practice`,
      sources: ['ictac-2011', 'ictac-2014'],
    },
  ]
}
