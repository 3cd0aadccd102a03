import { borchardtDaniels, borchardtDanielsInfo, type BorchardtDanielsEstimate, type RunPoints } from '../peak-methods/borchardt-daniels.ts'
import { readAtLevels } from '../conversion/levels.ts'
import type { ConversionCurve } from '../conversion/smooth-curve.ts'
import { programmeNames } from '../isoconversional/series-check.ts'
import type { SignalQuantity } from '../series/signal-quantity.ts'
import { column } from '../units/quantity.ts'
import { peakMethodNumber, singleRunResult, withoutResult } from './peak-method-result.ts'
import type { PeakRun } from './peak-run.ts'
import { notByHeatFlow } from './remarks-on-standards.ts'
import type { PeakMethodResult } from './study-result.ts'

/** Conversion 0.1 to 0.9 in steps of 0.05: outside, a baseline or plateau that is a little off is a large share of the rate; closer, smoothing ties neighbours together. */
const levels = Array.from({ length: 17 }, (_, i) => (i + 2) / 20)

/** The points of a run for Borchardt–Daniels; those that it does not reach are left out. */
export function pointsOfRun(curve: ConversionCurve): RunPoints {
  const read = readAtLevels(curve, levels)
  const kept = levels.map((_, i) => i).filter((i) => Number.isFinite(read.reactionRate_per_s[i]) && Number.isFinite(read.temperature_K[i]))
  const pick = (values: ArrayLike<number>): Float64Array => Float64Array.from(kept, (i) => values[i] ?? Number.NaN)
  return {
    temperature_K: column(pick(read.temperature_K), 'K'),
    conversion: column(pick(levels), '1'),
    reactionRate_per_s: column(pick(read.reactionRate_per_s), '1/s'),
  }
}

/** Borchardt–Daniels on each run heated at a constant rate, with the caution that one run is never enough. */
export function applyBorchardtDaniels(runs: readonly PeakRun[], signal: SignalQuantity): PeakMethodResult[] {
  return runs.map((run) => {
    const { programme, points } = run
    if (programme.kind !== 'constant-heating-rate') {
      return withoutResult(
        borchardtDanielsInfo,
        `it is made for ${programmeNames['constant-heating-rate']}, and this run followed ${programmeNames[programme.kind]}`,
        run,
      )
    }
    const estimate = borchardtDaniels(points)
    if (estimate.status !== 'ok') return withoutResult(borchardtDanielsInfo, without[estimate.status], run)
    return singleRunResult(borchardtDanielsInfo, run, estimate, {
      numbers: [peakMethodNumber('order', 'n, reaction order', estimate.order, '1', estimate.orderStandardError)],
      remarks: [
        'From a single run: not to be relied on. Another Ea with another f(α) fits one run as well; one heating rate is never enough.',
        `Unweighted least squares of ln(dα/dt) at ${points.temperature_K.length} conversions from 0.1 to 0.9, taken as independent; its interval does not tell whether (1 − α)ⁿ is right.`,
        ...notByHeatFlow(signal, [run]),
      ],
    })
  })
}

const without: Readonly<Record<Exclude<BorchardtDanielsEstimate['status'], 'ok'>, string>> = {
  'too-few-points': 'it needs at least four points between conversion 0.1 and 0.9',
  'rate-not-positive': 'the reaction rate is not above zero everywhere between conversion 0.1 and 0.9',
  'terms-not-independent': 'temperature and conversion of this run do not tell Ea and reaction order apart',
  'energy-not-positive': 'its least squares give an Ea that is not above zero: the reaction is not one of nth order',
}
