import { Fragment, type ReactNode } from 'react'
import type { MethodId, PeakMethodResult } from '../../../shared-kinetics/contract/study-result.ts'

/** How Ea is read from each method's evidence, in one line. */
const readings: Readonly<Record<MethodId, string>> = {
  friedman: 'ln(dα/dt) against 1000/T; the slope is −Ea/R',
  ofw: 'ln β against 1000/T; the slope is −1.052 Ea/R',
  'ofw-corrected': 'ln β − δ against 1000/T; the slope is −1.052 Ea/R, δ what Doyle’s line leaves out of ln p(Ea/RT)',
  kas: 'ln(β/T²) against 1000/T; the slope is −Ea/R',
  starink: 'ln(β/T^1.92) against 1000/T; the slope is −1.0008 Ea/R',
  vyazovkin: 'the minimum of Φ over Ea, with exp(−Ea/RT) integrated over the measured T(t)',
  'vyazovkin-incremental': 'the minimum of Φ over Ea, with exp(−Ea/RT) integrated over T(t) from the level before to this one',
  'isothermal-integral': 'ln t against 1000/T; the slope is Ea/R',
  'starink-1996': 'ln(β/T^1.8) against 1000/T; the slope is −1.0037 Ea/R',
  tang: 'ln(β/T^1.894661) against 1000/T; the slope is −1.00145 Ea/R',
  'astm-e1641': 'log β against 1000/T; the slope is −b Ea/R, b refined by Doyle’s table',
  'iso-11358-2': 'log β against 1000/T; the slope is −0.4567 Ea/R',
}

/** Names short enough for a button; the whole name is `PeakMethodResult.label`. */
export const shortPeakNames: Readonly<Record<PeakMethodResult['method'], string>> = {
  kissinger: 'Kissinger',
  'astm-e698': 'ASTM E698',
  'astm-e2890': 'ASTM E2890',
  'ozawa-peak': 'Ozawa',
  'ozawa-peak-corrected': 'Ozawa corrected',
  'augis-bennett': 'Augis–Bennett',
  'augis-bennett-without-start': 'without T0',
  'borchardt-daniels': 'Borchardt–Daniels',
}

/** How Ea is read from the peaks of the reaction rate, or from a single run. */
export const peakReadings: Readonly<Record<PeakMethodResult['method'], string>> = {
  kissinger: 'ln(β/Tp²) against 1000/Tp; the slope is −Ea/R',
  'astm-e698': 'log β against 1000/Tp; the slope is −D Ea/(2.303 R), D refined at Ea/(RT)',
  'astm-e2890': 'ln(β/Tp²) against 1000/Tp; the slope is −Ea/R',
  'ozawa-peak': 'ln β against 1000/Tp; the slope is −1.052 Ea/R',
  'ozawa-peak-corrected': 'ln β against 1000/Tp; the slope is −h Ea/R, h that of −ln p at Ea/(RT)',
  'augis-bennett': 'ln(β/(Tp − T0)) against 1000/Tp, T0 where the heating began; the slope is −Ea/R',
  'augis-bennett-without-start': 'ln(β/Tp) against 1000/Tp; the slope is −Ea/R',
  'borchardt-daniels': 'ln(dα/dt) of one run against 1/T and ln(1\u00a0−\u00a0α) together',
}

export type ReportBasis = Extract<MethodId, 'astm-e1641' | 'iso-11358-2'>

/** Standards that a report can be made by. */
export const isReportBasis = (method: MethodId): method is ReportBasis => method === 'astm-e1641' || method === 'iso-11358-2'

/** What each is made for, as far as it bears on a choice; the finding on its scope holds the runs against the whole of it. */
export const scopeWords: Readonly<Record<ReportBasis, string>> = {
  'astm-e1641':
    'thermogravimetry between 400 and 1300 K of a smooth mass loss with a single maximum of its rate, first order, at four heating rates or more',
  'iso-11358-2': 'thermogravimetry of polymers that decompose by a single mechanism or in single steps that are clearly apart',
}

export const readingOf = (method: MethodId): ReactNode => raised(readings[method])

/** Text whose `^1.92` is set as an exponent. */
function raised(text: string): ReactNode {
  return text.split(/\^([\d.]+)/).map((part, i) => {
    const key = `${i} ${part}`
    return i % 2 === 1 ? <sup key={key}>{part}</sup> : <Fragment key={key}>{part}</Fragment>
  })
}
