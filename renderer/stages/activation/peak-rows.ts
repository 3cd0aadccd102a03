import type { Maybe, PeakMethodNumber, PeakMethodResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { studentWords } from '../../../shared-kinetics/figure/interval-status.ts'
import { kelvinToCelsius } from '../../../shared-kinetics/units/convert.ts'
import type { DataColumn } from '../../sheet/data-table.ts'
import { decimals, formatCelsius, formatInterval, formatLevel, halfWidth } from '../../sheet/format.ts'

/** The name of a row: a single-run method stands there once for every run. */
export const peakName = ({ label, runLabel }: PeakMethodResult): string => (runLabel === null ? label : `${label}, ${runLabel}`)

export const peakKey = ({ method, runId }: PeakMethodResult): string => `${method} ${runId ?? ''}`

/** The row picked out; the first where that one is gone. */
export const pickedPeaks = (methods: readonly PeakMethodResult[], key: string | null): PeakMethodResult | null =>
  methods.find((one) => peakKey(one) === key) ?? methods[0] ?? null

/** Numbers of a row's method as the table shows them; the unit stands in the head. */
export const peakColumns: readonly DataColumn<PeakMethodResult>[] = [
  {
    id: 'Ea',
    heading: 'Ea',
    unit: 'kJ/mol',
    numeric: true,
    text: ({ Ea_kJ_per_mol: Ea }) => decimals(Ea, 1),
    value: ({ Ea_kJ_per_mol: Ea }) => Ea,
    places: 2,
  },
  {
    id: 'interval',
    heading: '±\u00a095\u00a0%',
    unit: 'kJ/mol, Student\u2011t',
    numeric: true,
    text: (row) =>
      formatInterval(row.Ea_kJ_per_mol, row.lower95_kJ_per_mol, row.upper95_kJ_per_mol) || (studentWords(row) === null ? '' : 'none'),
    remark: studentWords,
    value: (row) => halfWidth(row.lower95_kJ_per_mol, row.upper95_kJ_per_mol),
    places: 2,
  },
  {
    id: 'lnA',
    heading: 'ln A',
    unit: '± standard error, A in 1/s',
    numeric: true,
    text: ({ lnA_per_s: lnA, lnAStandardError: error }) => withError(decimals(lnA, 2), decimals(error, 2)),
    value: ({ lnA_per_s: lnA }) => lnA,
    places: 3,
  },
  {
    id: 'r2',
    heading: 'r²',
    unit: '',
    numeric: true,
    text: ({ r2 }) => decimals(r2, 4),
    value: ({ r2 }) => r2,
    places: 6,
  },
]

const withError = (text: string, error: string): string => (text === '' || error === '' ? text : `${text} ±\u00a0${error}`)

const standardsForDsc: ReadonlySet<PeakMethodResult['method']> = new Set(['astm-e698', 'astm-e2890', 'borchardt-daniels'])

/** What nobody may overlook who reads no further than the row; the remarks say it at length. */
export function peakNote({ method, applies }: PeakMethodResult, signal: StudyResult['signal']): string {
  if (!applies) return ''
  const alone = method === 'borchardt-daniels' ? ['not to be relied on alone'] : []
  const dsc = standardsForDsc.has(method) && signal !== null && signal !== 'heat-flow' ? ['standard is for DSC'] : []
  return [...alone, ...dsc].join('; ')
}

/** A method's own numbers in words, or the reason why it does not apply. */
export function ownNumbers({ applies, reason, numbers }: PeakMethodResult): string {
  if (!applies) return sentence(reason ?? 'it does not apply')
  const known = numbers.filter(({ value }) => value !== null)
  return [...peakConversions(known), ...known.filter(({ key }) => !key.startsWith('conversion-at-peak')).map(numberText)].join('; ')
}

/** Three numbers that are one statement: where the peaks lie, and where they lay if the reaction were of first order. */
function peakConversions(numbers: readonly PeakMethodNumber[]): readonly string[] {
  const of = (key: PeakMethodNumber['key']): Maybe => numbers.find((one) => one.key === key)?.value ?? null
  const [lowest, highest] = [of('conversion-at-peak-lowest'), of('conversion-at-peak-highest')]
  if (lowest === null || highest === null) return []
  const range = lowest.toFixed(2) === highest.toFixed(2) ? lowest.toFixed(2) : `${lowest.toFixed(2)} to ${highest.toFixed(2)}`
  const first = of('conversion-at-peak-first-order')
  return [`peaks at α ${range}${first === null ? '' : `, of a first-order reaction at ${formatLevel(Number(first.toFixed(2)))}`}`]
}

function numberText({ label, value, standardError, unit }: PeakMethodNumber): string {
  if (value === null) return ''
  if (unit === 'K') return `${label} ${withError(formatCelsius(value), decimals(standardError, 1))} °C`
  if (unit === 'kJ/mol') return `${label} ${decimals(value, 1)} kJ/mol`
  // `D = −d ln p/dx` is a definition, `n, reaction order` a name: the number comes behind either.
  return `${label}${label.includes('=') ? ':' : ''} ${withError(decimals(value, 2), decimals(standardError, 2))}`
}

const sentence = (text: string): string => `${text.charAt(0).toUpperCase()}${text.slice(1)}${/[.!?]$/.test(text) ? '' : '.'}`

const textColumn = (id: string, heading: string, of: (row: PeakMethodResult) => string): DataColumn<PeakMethodResult> => ({
  id,
  heading,
  unit: '',
  numeric: false,
  text: of,
  value: of,
})

const numberColumn = (id: string, heading: string, unit: string, of: (row: PeakMethodResult) => Maybe): DataColumn<PeakMethodResult> => ({
  id,
  heading,
  unit,
  numeric: true,
  text: (row) => decimals(of(row), 2),
  value: of,
  places: 3,
})

/** For the clipboard: every number with its error, the method's own ones in words, the reason where it does not apply, and what to know before relying on it. */
export function peakCopyColumns(): readonly DataColumn<PeakMethodResult>[] {
  const [Ea, interval, lnA, r2] = peakColumns
  return [
    textColumn('method', 'Method', ({ label }) => label),
    textColumn('run', 'Run', ({ runLabel }) => runLabel ?? 'all'),
    ...[Ea, interval]
      .filter((column) => column !== undefined)
      .map((column) => ({ ...column, heading: column.id === 'Ea' ? column.heading : '± 95 %, Student-t', unit: 'kJ/mol' })),
    textColumn('interval-remark', 'On the interval', (row) => studentWords(row) ?? ''),
    ...(lnA === undefined ? [] : [{ ...lnA, unit: 'A in 1/s' }]),
    numberColumn('lnA-error', 's.e. of ln A', '', ({ lnAStandardError }) => lnAStandardError),
    ...(r2 === undefined ? [] : [r2]),
    numberColumn('confirmation', 'temperature of a half-life of 60 min', '°C', ({ numbers }) => {
      const kelvins = numbers.find(({ key }) => key === 'confirmation-temperature')?.value ?? null
      return kelvins === null ? null : kelvinToCelsius(kelvins)
    }),
    textColumn('own', 'Own numbers, or why it does not apply', ownNumbers),
    textColumn('remarks', 'To know before relying on it', ({ remarks }) => remarks.join(' ')),
    textColumn('sources', 'Sources', ({ sources }) => sources.join('; ')),
  ]
}
