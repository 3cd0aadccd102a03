import { programmeNames } from '../isoconversional/series-check.ts'
import { astmE2890, astmE2890Info, e2890Scope, type AstmE2890Estimate } from '../peak-methods/astm-e2890.ts'
import { astmE698, astmE698Info, type AstmE698Estimate } from '../peak-methods/astm-e698.ts'
import {
  augisBennett,
  augisBennettInfo,
  augisBennettWithoutStart,
  augisBennettWithoutStartInfo,
  avramiExponent,
} from '../peak-methods/augis-bennett.ts'
import { firstOrderPeakConversion } from '../peak-methods/first-order-peak.ts'
import { kissinger, kissingerInfo } from '../peak-methods/kissinger.ts'
import { ozawaPeak, ozawaPeakCorrected, ozawaPeakCorrectedInfo, ozawaPeakInfo } from '../peak-methods/ozawa-peak.ts'
import type { PeakEstimate, PeakStatus } from '../peak-methods/peak-line.ts'
import type { PeakMethodInfo } from '../peak-methods/peak-method-info.ts'
import type { LeftOut } from '../review/review-input.ts'
import { celsius, digits, mean } from '../review/words.ts'
import type { SignalQuantity } from '../series/signal-quantity.ts'
import { sources } from '../sources.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { joulesToKilojoules } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'
import { applyBorchardtDaniels } from './apply-borchardt-daniels.ts'
import { maybe, maybes } from './maybe.ts'
import { peakMethodNumber, peakResult, withoutResult } from './peak-method-result.ts'
import type { FullRatePeak, PeakRun } from './peak-run.ts'
import { notByHeatFlow } from './remarks-on-standards.ts'
import { safetyCaution } from './safety-caution.ts'
import type { KissingerResult, PeakMethodNumber, PeakMethodResult } from './study-result.ts'

/** What the peaks and the single runs of a study give. */
export interface PeakResults {
  /** null where it does not apply; the same numbers as in `peakMethods`, in the form that scripts rely on. */
  readonly kissinger: KissingerResult | null
  readonly peakMethods: readonly PeakMethodResult[]
  readonly leftOut: readonly LeftOut[]
}

/**
 * Kissinger, ASTM E698, ASTM E2890, Ozawa and Augis–Bennett on the rate peaks of the runs, and Borchardt–Daniels on each run. A method that does not apply stands
 * there with its reason; it never sinks the rest.
 *
 * @param runs - slowest programme first
 * @param signal - what was measured
 */
export function applyPeakMethods(runs: readonly PeakRun[], signal: SignalQuantity | null): PeakResults {
  if (runs.length === 0 || signal === null) return { kissinger: null, peakMethods: [], leftOut: [] }
  const { peaks, hindrance } = peaksOf(runs)
  const singles = applyBorchardtDaniels(runs, signal)
  if (hindrance !== null) {
    const without = lineInfos.map((info) => withoutResult(info, hindrance))
    return { kissinger: null, peakMethods: [...without, ...singles], leftOut: leftOutBecause(hindrance) }
  }
  const estimate = kissinger(peaks)
  const fromPeaks = [
    estimate.status === 'ok'
      ? peakResult(kissingerInfo, estimate, { numbers: conversionsAtPeak(estimate, peaks), remarks: [oneEnergy] })
      : withoutResult(kissingerInfo, noLine[estimate.status]),
    e698Result(runs, peaks, signal),
    e2890Result(runs, peaks, signal),
    ozawaResult(ozawaPeakInfo, ozawaPeak(peaks)),
    ozawaResult(ozawaPeakCorrectedInfo, ozawaPeakCorrected(peaks)),
    ...augisBennettResults(peaks, signal),
  ]
  // That there are too few programmes is said once, by the rule on their number.
  const said = estimate.status === 'ok' || estimate.status === 'too-few-programmes'
  return {
    kissinger: estimate.status === 'ok' ? kissingerResult(estimate, peaks) : null,
    peakMethods: [...fromPeaks, ...singles],
    leftOut: said ? [] : leftOutBecause(noLine[estimate.status]),
  }
}

const lineInfos = [
  kissingerInfo,
  astmE698Info,
  astmE2890Info,
  ozawaPeakInfo,
  ozawaPeakCorrectedInfo,
  augisBennettInfo,
  augisBennettWithoutStartInfo,
]

interface PeaksOfRuns {
  readonly peaks: readonly FullRatePeak[]
  /** Why they cannot be compared. */
  readonly hindrance: string | null
}

const hindered = (hindrance: string): PeaksOfRuns => ({ peaks: [], hindrance })

/** The peaks, one a run. */
function peaksOf(runs: readonly PeakRun[]): PeaksOfRuns {
  const peaks: FullRatePeak[] = []
  for (const { label, programme, programmeGroup, peak_K, conversionAtPeak, halfHeights, start } of runs) {
    if (programme.kind !== 'constant-heating-rate') {
      return hindered(
        `it is made for ${programmeNames['constant-heating-rate']}, and at least one run followed ${programmeNames[programme.kind]}`,
      )
    }
    if (Number.isNaN(peak_K)) return hindered(`the reaction rate of ${label} has no maximum that can be read inside the window`)
    peaks.push({
      heatingRate: programme.heatingRate,
      temperature: quantity(peak_K, 'K'),
      programmeGroup,
      conversion: conversionAtPeak,
      lowerHalf: halfHeights.lower,
      upperHalf: halfHeights.upper,
      start,
    })
  }
  return { peaks, hindrance: null }
}

const noLine: Readonly<Record<Exclude<PeakStatus, 'ok'>, string>> = {
  'too-few-programmes': 'it needs runs at two or more distinct heating rates',
  'line-not-determined': 'the peak temperatures of the runs do not differ',
  'energy-not-positive': 'the rate peak does not move to higher temperature with the heating rate',
}

const leftOutBecause = (reason: string): readonly LeftOut[] => [{ method: 'kissinger', label: kissingerInfo.label, reason }]

const oneEnergy = 'One Ea for the whole reaction: it does not show whether Ea varies with conversion.'

function conversionsAtPeak({ Ea }: PeakEstimate, peaks: readonly FullRatePeak[]): PeakMethodNumber[] {
  const conversions = peaks.map((peak) => peak.conversion).filter(Number.isFinite)
  const x = (Ea / gasConstant_J_per_mol_K) * mean(peaks.map((peak) => 1 / peak.temperature))
  return [
    peakMethodNumber('conversion-at-peak-lowest', 'lowest conversion at a peak', Math.min(...conversions), '1'),
    peakMethodNumber('conversion-at-peak-highest', 'highest conversion at a peak', Math.max(...conversions), '1'),
    peakMethodNumber(
      'conversion-at-peak-first-order',
      'conversion at the peak of a first-order reaction',
      firstOrderPeakConversion(x),
      '1',
    ),
  ]
}

function e698Result(runs: readonly PeakRun[], peaks: readonly FullRatePeak[], signal: SignalQuantity): PeakMethodResult {
  const endothermic = runs.find((run) => run.heat === 'endothermic')
  if (endothermic !== undefined) return withoutResult(astmE698Info, madeForExothermic(endothermic))
  const estimate = astmE698(peaks)
  if (estimate.status !== 'ok') return withoutResult(astmE698Info, noLine[estimate.status])
  return peakResult(astmE698Info, estimate, {
    numbers: [
      peakMethodNumber('first-estimate', 'Ea before it is refined', joulesToKilojoules(estimate.firstEstimate), 'kJ/mol'),
      peakMethodNumber('D', 'D = −d ln p/dx', estimate.D, '1'),
      peakMethodNumber(
        'peak-at-middle-rate',
        'peak temperature for D and Z, of the heating rate nearest the middle',
        estimate.middlePeak,
        'K',
      ),
      peakMethodNumber(
        'confirmation-temperature',
        'temperature of a half-life of 60 min',
        estimate.confirmationTemperature,
        'K',
        estimate.confirmationTemperatureStandardError,
      ),
    ],
    remarks: [
      ...notByHeatFlow(signal, runs),
      'Not for reactions that are partly inhibited, simultaneous or consecutive, nor with a phase change in their range; a line that is not straight shows that it does not apply.',
      'Z and half-lives are those of a first-order reaction.',
      ...confirmation(estimate),
    ],
  })
}

const madeForExothermic = ({ label }: PeakRun): string =>
  `the standard is made for exothermic reactions, and the heat flow of ${label} is endothermic`

function confirmation({ confirmationTemperature }: AstmE698Estimate): string[] {
  if (maybe(confirmationTemperature) === null) return []
  return [
    `To confirm: age a sample for 60 min at ${celsius(confirmationTemperature)}, where the half-life should be 60 min, then scan it beside one that was not aged. Its peak must be half as ` +
      'large; if it is not, these numbers do not apply.',
    safetyCaution,
  ]
}

function e2890Result(runs: readonly PeakRun[], peaks: readonly FullRatePeak[], signal: SignalQuantity): PeakMethodResult {
  const endothermic = runs.find((run) => run.heat === 'endothermic')
  if (endothermic !== undefined) return withoutResult(astmE2890Info, madeForExothermic(endothermic))
  const estimate = astmE2890(peaks)
  if (estimate.status !== 'ok') return withoutResult(astmE2890Info, noLine[estimate.status])
  const outside = outsideScope(estimate)
  if (outside !== null) return withoutResult(astmE2890Info, outside)
  const { order, peaksOfFamily } = estimate
  return peakResult(astmE2890Info, estimate, {
    numbers: order === null ? [] : [peakMethodNumber('order', orderNames[order.family], order.order, '1')],
    remarks: [
      ...notByHeatFlow(signal, runs),
      order === null
        ? 'No peak falls to half its height on both sides inside its window, so that there is no reaction order.'
        : `The reaction order is read from the shape of the peaks (${peaksOfFamily} of ${peaks.length}), exact for one reaction of such an order; a second reaction under a peak's flank or a baseline that is off passes for an order.`,
    ],
  })
}

const orderNames = { 'nth-order': 'n, reaction order', accelerating: 'p, order of an accelerating reaction' } as const

function outsideScope({ order, outOfScope }: AstmE2890Estimate): string | null {
  const [coldest, hottest] = e2890Scope.temperature_K
  if (outOfScope === 'temperature') return `the standard covers peaks between ${coldest} and ${hottest} K, and at least one lies outside`
  if (outOfScope === null || order === null) return null
  const [lowest, highest] = e2890Scope.order[order.family]
  const orders = order.family === 'nth-order' ? 'reaction orders' : 'accelerating reactions of an order'
  return `the standard covers ${orders} between ${lowest} and ${highest}, and the shape of the peaks gives ${digits(order.order)}`
}

function ozawaResult(info: PeakMethodInfo, estimate: PeakEstimate): PeakMethodResult {
  if (estimate.status !== 'ok') return withoutResult(info, noLine[estimate.status])
  const remark =
    info.id === 'ozawa-peak'
      ? "By Doyle's straight line for the temperature integral (1.052): for comparison with older work. Gives no A."
      : 'By the exact slope of the temperature integral in place of 1.052. Gives no A.'
  return peakResult(info, estimate, { remarks: [remark] })
}

function augisBennettResults(peaks: readonly FullRatePeak[], signal: SignalQuantity): PeakMethodResult[] {
  const infos = [augisBennettInfo, augisBennettWithoutStartInfo]
  if (signal === 'mass' || signal === 'heat-release') {
    return infos.map((info) => withoutResult(info, `it is made for crystallisation, which ${unseen[signal]}`))
  }
  const early = peaks.some(({ start, temperature }) => !(start < temperature))
  return infos.map((info) => {
    const withStart = info === augisBennettInfo
    if (withStart && early) return withoutResult(info, 'the heating of at least one run begins above its peak')
    const estimate = withStart ? augisBennett(peaks) : augisBennettWithoutStart(peaks)
    if (estimate.status !== 'ok') return withoutResult(info, noLine[estimate.status])
    return peakResult(info, estimate, {
      numbers: exponents(estimate, peaks),
      remarks: [
        'Made for crystallisation on heating (nucleation and growth); for another reaction its numbers mean nothing.',
        withStart
          ? 'T0 is the temperature at which the heating of each run began.'
          : 'Without T0: for one reaction Ea comes out high by R Tp.',
      ],
    })
  })
}

const unseen = { mass: 'does not change the mass', 'heat-release': 'a heat-release rate by combustion does not show' } as const

function exponents({ Ea }: PeakEstimate, peaks: readonly FullRatePeak[]): PeakMethodNumber[] {
  const found = peaks
    .map(({ temperature, lowerHalf, upperHalf }) => avramiExponent(Ea, temperature, quantity(upperHalf - lowerHalf, 'K')))
    .filter(Number.isFinite)
  if (found.length === 0) return []
  return [
    peakMethodNumber('avrami-exponent', 'n, Avrami exponent, mean of the runs', mean(found), '1'),
    peakMethodNumber('avrami-exponent-lowest', 'n, lowest of the runs', Math.min(...found), '1'),
    peakMethodNumber('avrami-exponent-highest', 'n, highest of the runs', Math.max(...found), '1'),
  ]
}

const kissingerResult = (estimate: PeakEstimate, peaks: readonly FullRatePeak[]): KissingerResult => ({
  Ea_kJ_per_mol: joulesToKilojoules(estimate.Ea),
  standardError_kJ_per_mol: maybe(joulesToKilojoules(estimate.standardError)),
  lower95_kJ_per_mol: maybe(joulesToKilojoules(estimate.lower95)),
  upper95_kJ_per_mol: maybe(joulesToKilojoules(estimate.upper95)),
  lnA_per_s: estimate.lnA,
  peaks_K: peaks.map((peak) => peak.temperature),
  conversionAtPeak: maybes(peaks.map((peak) => peak.conversion)),
  sources: kissingerInfo.sources.map((key) => sources[key]),
})
