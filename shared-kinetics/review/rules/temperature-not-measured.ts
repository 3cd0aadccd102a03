import { straightest_K, type Steadiness } from '../../series/steadiness.ts'
import type { RunResult } from '../../tasks/study-result.ts'
import type { Finding } from '../finding.ts'
import type { ReviewInput } from '../review-input.ts'
import { digits, list } from '../words.ts'

/** A smaller distance is told as smaller than this. */
const negligible_K = 0.0001

/**
 * Fires for runs whose temperature is a programme and no measurement: on a ramp no row of the reaction lies farther from one straight line in time than a unit in the last
 * digits of the file is worth, nor than 0.02 K; in a hold the temperature is one number throughout. Silent for programmes of several pieces, for runs without time (which
 * `time-rebuilt` speaks of), and on ramps where the printed digits are too coarse to tell. One finding speaks for all such runs.
 */
export function temperatureNotMeasured({ runs }: ReviewInput): Finding[] {
  const found = runs.filter(({ info, steadiness, result }) => info.hasTime && isTooSteady(steadiness, result.programme))
  const [first] = found
  if (first === undefined) return []
  const whose =
    found.length === 1
      ? first.info.label
      : found.length === runs.length
        ? `all ${runs.length} runs`
        : `${found.length} of ${runs.length} runs`
  const largest = Math.max(...found.map(({ steadiness }) => steadiness.deviation_K))
  const holds = found.filter(({ result }) => result.programme === 'isothermal').length
  const named = found.length < runs.length && found.length > 1 ? ` (${list(found.map(({ info }) => info.label))})` : ''
  return [
    {
      code: 'temperature-not-measured',
      severity: 'note',
      stage: 'runs',
      title:
        holds === found.length
          ? `Temperature of ${whose} does not move in the hold`
          : `Temperature of ${whose} is a programme, not a measurement`,
      message:
        `${seen(largest, found.length - holds, holds)}${named}. A measured sample temperature lags, scatters and answers to the heat of the reaction. Of this one nothing of the ` +
        'kind can be seen: how far lag and self-heating move Ea cannot be told from these data. Export the measured sample temperature where there is one.',
      run: found.length === 1 ? first.info.id : null,
      level: null,
      evidence: {
        runs: found.length,
        ofRuns: runs.length,
        largestDeviation_K: largest,
        limit_K: Math.max(...found.map(({ steadiness, result }) => limitOf(steadiness, result.programme))),
      },
      basis:
        `Use the measured temperature of the sample, not the programme. The limit is common practice: the last printed digit, at most ${digits(straightest_K)} K ` +
        '(runs measured by two laboratories, open data, are off by 0.05 to 0.7 K)',
      sources: ['ictac-2014'],
    },
  ]
}

const isTooSteady = (steadiness: Steadiness, programme: RunResult['programme']): boolean =>
  steadiness.deviation_K <= limitOf(steadiness, programme)

/** What a programme written into a file may be off by, its digits being what they are; NaN where there is nothing to judge by. */
function limitOf({ lastDigit_K }: Steadiness, programme: RunResult['programme']): number {
  if (programme === 'isothermal') return 0
  return programme === 'constant-heating-rate' ? Math.min(lastDigit_K, straightest_K) : Number.NaN
}

function seen(largest_K: number, ramps: number, holds: number): string {
  const hold = 'every row of the hold has the same temperature, which was set or has too few digits'
  if (ramps === 0) return `${hold.charAt(0).toUpperCase()}${hold.slice(1)}`
  const off = largest_K < negligible_K ? `less than ${negligible_K} K` : `${digits(largest_K, 2)} K at most`
  const line = `While it reacts each row is ${off} off one straight line in time, as near as the printed digits go: the temperature was set or calculated`
  return holds === 0 ? line : `${line}; in holds ${hold}`
}
