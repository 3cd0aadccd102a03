import { severities, type Finding } from './finding.ts'
import type { ReviewInput } from './review-input.ts'
import { energyNotPositive } from './rules/energy-not-positive.ts'
import { baselineReplaced } from './rules/baseline-replaced.ts'
import { energyVaries } from './rules/energy-varies.ts'
import { exothermicDirectionUnknown } from './rules/exothermic-direction-unknown.ts'
import { gapInReaction } from './rules/gap-in-reaction.ts'
import { heatingRateDiffersFromNominal } from './rules/heating-rate-differs-from-nominal.ts'
import { heatingRateNotConstant } from './rules/heating-rate-not-constant.ts'
import { importNotes } from './rules/import-notes.ts'
import { integralLagsDifferential } from './rules/integral-lags-differential.ts'
import { intervalWideBecauseFewRuns } from './rules/interval-wide-because-few-runs.ts'
import { lackOfFit } from './rules/lack-of-fit.ts'
import { levelNotReached } from './rules/level-not-reached.ts'
import { levelWithoutEnergy } from './rules/level-without-energy.ts'
import { methodDoesNotApply } from './rules/method-does-not-apply.ts'
import { narrowHeatingRateSpread } from './rules/narrow-heating-rate-spread.ts'
import { orderBroken } from './rules/order-broken.ts'
import { outsideScopeOfStandard } from './rules/outside-scope-of-standard.ts'
import { outlierRun } from './rules/outlier-run.ts'
import { peakLineCurved } from './rules/peak-line-curved.ts'
import { peaksAtDifferentConversion } from './rules/peaks-at-different-conversion.ts'
import { replicatesDisagree } from './rules/replicates-disagree.ts'
import { rowsSetAside } from './rules/rows-set-aside.ts'
import { runUnusable } from './rules/run-unusable.ts'
import { runsDoNotAgree } from './rules/runs-do-not-agree.ts'
import { samplingCoarse } from './rules/sampling-coarse.ts'
import { signalChosen } from './rules/signal-chosen.ts'
import { temperatureNotMeasured } from './rules/temperature-not-measured.ts'
import { timeRebuilt } from './rules/time-rebuilt.ts'
import { singleRunEnergyDiffers } from './rules/single-run-energy-differs.ts'
import { tooFewProgrammes } from './rules/too-few-programmes.ts'
import { unequalVariance } from './rules/unequal-variance.ts'
import { windowCutsReaction } from './rules/window-cuts-reaction.ts'

const rules: readonly ((input: ReviewInput, checkCancelled: () => void) => Finding[])[] = [
  runUnusable,
  tooFewProgrammes,
  narrowHeatingRateSpread,
  heatingRateDiffersFromNominal,
  windowCutsReaction,
  baselineReplaced,
  gapInReaction,
  samplingCoarse,
  orderBroken,
  outlierRun,
  replicatesDisagree,
  lackOfFit,
  runsDoNotAgree,
  levelNotReached,
  levelWithoutEnergy,
  energyNotPositive,
  energyVaries,
  peaksAtDifferentConversion,
  peakLineCurved,
  singleRunEnergyDiffers,
  integralLagsDifferential,
  intervalWideBecauseFewRuns,
  unequalVariance,
  methodDoesNotApply,
  outsideScopeOfStandard,
  heatingRateNotConstant,
  signalChosen,
  timeRebuilt,
  temperatureNotMeasured,
  exothermicDirectionUnknown,
  rowsSetAside,
  importNotes,
]

/** Everything the rules notice: stops first, then cautions, then notes; within a severity in the order of the rules. @throws Cancelled, by `checkCancelled` */
export function review(input: ReviewInput, checkCancelled: () => void = () => undefined): Finding[] {
  const findings = rules.flatMap((rule) => {
    checkCancelled()
    return rule(input, checkCancelled)
  })
  return severities.flatMap((severity) => findings.filter((finding) => finding.severity === severity))
}
