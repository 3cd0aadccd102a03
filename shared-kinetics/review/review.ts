import { severities, type Finding } from './finding.ts'
import type { ReviewInput } from './review-input.ts'
import { energyVaries } from './rules/energy-varies.ts'
import { heatingRateDiffersFromNominal } from './rules/heating-rate-differs-from-nominal.ts'
import { heatingRateNotConstant } from './rules/heating-rate-not-constant.ts'
import { importNotes } from './rules/import-notes.ts'
import { integralLagsDifferential } from './rules/integral-lags-differential.ts'
import { intervalWideBecauseFewRuns } from './rules/interval-wide-because-few-runs.ts'
import { levelNotReached } from './rules/level-not-reached.ts'
import { methodDoesNotApply } from './rules/method-does-not-apply.ts'
import { narrowHeatingRateSpread } from './rules/narrow-heating-rate-spread.ts'
import { orderBroken } from './rules/order-broken.ts'
import { runUnusable } from './rules/run-unusable.ts'
import { signalChosen } from './rules/signal-chosen.ts'
import { timeRebuilt } from './rules/time-rebuilt.ts'
import { tooFewProgrammes } from './rules/too-few-programmes.ts'
import { windowCutsReaction } from './rules/window-cuts-reaction.ts'

const rules: readonly ((input: ReviewInput) => Finding[])[] = [
  runUnusable,
  tooFewProgrammes,
  narrowHeatingRateSpread,
  heatingRateDiffersFromNominal,
  windowCutsReaction,
  orderBroken,
  levelNotReached,
  energyVaries,
  integralLagsDifferential,
  intervalWideBecauseFewRuns,
  methodDoesNotApply,
  heatingRateNotConstant,
  signalChosen,
  timeRebuilt,
  importNotes,
]

/** Everything the rules notice: stops first, then cautions, then notes; within a severity in the order of the rules. */
export function review(input: ReviewInput): Finding[] {
  const findings = rules.flatMap((rule) => rule(input))
  return severities.flatMap((severity) => findings.filter((finding) => finding.severity === severity))
}
