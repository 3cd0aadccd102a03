import { severities, type Finding } from './finding.ts'
import { energyImplausible } from './rate-constant-rules/energy-implausible.ts'
import { fewTemperatures } from './rate-constant-rules/few-temperatures.ts'
import { holdModelFit } from './rate-constant-rules/hold-model-fit.ts'
import { linesNotStraight } from './rate-constant-rules/lines-not-straight.ts'
import { predictionExtrapolated } from './rate-constant-rules/prediction-extrapolated.ts'
import type { RateConstantReview } from './rate-constant-rules/rate-constant-review.ts'
import { tableNotes } from './rate-constant-rules/table-notes.ts'

const rules = [fewTemperatures, energyImplausible, linesNotStraight, holdModelFit, predictionExtrapolated, tableNotes]

/** Everything the program notices about a table of rate constants, stops first. */
export function reviewRateConstants(review: RateConstantReview): readonly Finding[] {
  return rules.flatMap((rule) => rule(review)).toSorted((a, b) => severities.indexOf(a.severity) - severities.indexOf(b.severity))
}
