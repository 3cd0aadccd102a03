import type { RateConstantPrediction } from '../../tasks/rate-constants-result.ts'
import type { Finding } from '../finding.ts'
import { celsius, digits, list } from '../words.ts'
import { aboutTable, type RateConstantReview } from './rate-constant-review.ts'

/** Beyond this many spans of 1/T the band is no guide any more. */
const far = 0.5
/** Beyond this many the line says nothing of a real sample: an error of Ea is carried farther than all the data reach. */
const beyondUse = 3

/** Fires once where temperatures asked for lie beyond the data, with how far; a caution where one lies more than half the span of 1/T beyond, a stop beyond three. */
export function predictionExtrapolated({ result: { predictions, span } }: RateConstantReview): Finding[] {
  const beyond = predictions.filter((at) => at.extrapolation.side !== 'inside' && at.lnK !== null)
  const farthest = beyond.toSorted((a, b) => reach(b) - reach(a))[0]
  if (farthest === undefined || span === null) return []
  const severity = reach(farthest) > beyondUse ? 'stop' : reach(farthest) > far ? 'caution' : 'note'
  const where = beyond.map(
    ({ temperature_K, extrapolation: { side, beyond_K, beyondInSpans } }) =>
      `${celsius(temperature_K)} (${digits(beyond_K)} K ${side} the data${beyondInSpans === null ? '' : `, ${digits(beyondInSpans, 2)} of their span in 1/T`})`,
  )
  return [
    aboutTable({
      code: 'prediction-extrapolated',
      severity,
      title: titleOf(beyond.length, farthest),
      message:
        `Beyond the measured ${celsius(span.coldest_K)} to ${celsius(span.hottest_K)}: ${list(where)}. The bands hold only as far as the same reaction goes on there, which the data cannot ` +
        'show: another mechanism, a melting or a glass transition in between changes k. Measure nearer, or at the temperature itself.',
      evidence: {
        predictions: beyond.length,
        farthest_K: farthest.temperature_K,
        beyond_K: farthest.extrapolation.beyond_K,
        beyondInSpans: farthest.extrapolation.beyondInSpans,
      },
      basis:
        'Predictions beyond the measured range need a measurement there; half a span (caution) and three spans (stop) are common practice',
      sources: ['ictac-2011'],
    }),
  ]
}

function titleOf(count: number, { temperature_K, extrapolation: { side, beyond_K, beyondInSpans } }: RateConstantPrediction): string {
  const how = `${digits(beyond_K)} K ${side} the data${beyondInSpans === null ? '' : `, ${digits(beyondInSpans, 2)} of their span in 1/T`}`
  return count === 1
    ? `A prediction lies beyond the data: ${celsius(temperature_K)}, ${how}`
    : `${count} predictions lie beyond the data, ${celsius(temperature_K)} the farthest: ${how}`
}

const reach = ({ extrapolation }: RateConstantPrediction): number => extrapolation.beyondInSpans ?? Number.POSITIVE_INFINITY
