import type { FitOfHold, FitOfModel, FitsOfHolds, TemperatureUnit } from '../../../shared-kinetics/contract/study-result.ts'
import type { DataColumn } from '../../sheet/data-table.ts'
import { digitsText } from '../../sheet/scientific.ts'
import { inUnit, temperatureUnitWords } from '../runs/rate-constant-edits.ts'
import { unfittedWords } from '../runs/hold-ranking.ts'

/** Whether the residuals of a hold keep one sign in stretches. */
export const residualWords = ({ signRunsProbability: chance, isSystematic }: FitOfHold): string =>
  chance === null ? 'too few rows for a runs test' : isSystematic ? 'systematic' : 'not systematic'

/** k as the slope of g against time, for comparison. */
export const linearisedWords = ({ linearisedRateConstant_per_s: k, linearisedR2: r2, rows }: FitOfHold): string =>
  `line of g: ${digitsText(k)} 1/s, r² ${r2 === null ? 'none' : digitsText(r2, 5)}; ${rows} rows`

/** How k and the errors beside it were made. */
export const holdNote = ({ model, zeroInTime, range: [from, to] }: FitsOfHolds): string =>
  `${zeroInTime === 'free' ? 'k and the zero in time' : 'k'} by nonlinear least squares of conversion against time under ${model}, conversion ${from} to ${to}. ± standard errors from the covariance, rows taken as independent.`

const number = <Row>(id: string, heading: string, unit: string, value: (row: Row) => number | null): DataColumn<Row> => ({
  id,
  heading,
  unit,
  numeric: true,
  text: (row) => String(value(row) ?? ''),
  value,
})
const word = <Row>(id: string, heading: string, text: (row: Row) => string): DataColumn<Row> => ({
  id,
  heading,
  unit: '',
  numeric: false,
  text,
  value: text,
})

/** Every number of the fits of the holds, for the clipboard. */
export const holdCopyColumns = (fits: FitsOfHolds, shown: TemperatureUnit): readonly DataColumn<FitOfHold>[] => [
  word('hold', 'hold', ({ label }) => label),
  number('temperature', 'T', temperatureUnitWords[shown], ({ temperature_K }) => Number(inUnit(temperature_K, shown).toFixed(6))),
  number('k', `k, ${fits.model}`, '1/s', ({ rateConstant_per_s: k }) => k),
  number('k-error', 's.e. of k', '1/s', ({ standardError_per_s: error }) => error),
  ...(fits.zeroInTime === 'fixed'
    ? []
    : [
        number<FitOfHold>('zero', 'zero in time', 's', ({ zero_s }) => zero_s),
        number<FitOfHold>('zero-error', 's.e. of the zero', 's', ({ zeroStandardError_s: error }) => error),
      ]),
  number('deviation', 'standard deviation of conversion', '', ({ residualStandardDeviation }) => residualStandardDeviation),
  number('greatest', 'greatest residual of conversion', '', ({ greatestResidual }) => greatestResidual),
  word('systematic', 'residuals', residualWords),
  number('sign-runs', 'runs of signs', '', ({ signRuns, signRunsProbability }) => (signRunsProbability === null ? null : signRuns)),
  number('chance', 'chance of so few', '', ({ signRunsProbability }) => signRunsProbability),
  number('rows', 'rows', '', ({ rows }) => rows),
  number('line-k', 'k, line of g', '1/s', ({ linearisedRateConstant_per_s: k }) => k),
  number('line-r2', 'r², line of g', '', ({ linearisedR2 }) => linearisedR2),
]

/** The reaction models as ranked, for the clipboard. */
export const modelCopyColumns = (fits: FitsOfHolds): readonly DataColumn<FitOfModel>[] => [
  number('rank', 'rank', '', (row) => fits.models.indexOf(row) + 1),
  word('model', 'model', ({ model }) => model),
  word('label', 'name', ({ label }) => label),
  word('chosen', 'chosen', ({ model }) => (model === fits.model ? 'yes' : 'no')),
  number('sum', 'sum of squares', '', ({ residualSumOfSquares }) => residualSumOfSquares),
  number('deviation', 'standard deviation of conversion', '', ({ residualStandardDeviation }) => residualStandardDeviation),
  number('ratio', 'ratio of variances', '', ({ varianceRatio }) => varianceRatio),
  number('limit', 'limit of the ratio', '', () => fits.varianceRatioLimit),
  word('fits', 'fits', (row) => (row.fits ? 'yes' : 'no')),
  number('Ea', 'Ea', 'kJ/mol', ({ Ea_kJ_per_mol: Ea }) => Ea),
  number('lnA', 'ln A', 'A in 1/s', ({ lnA_per_s: lnA }) => lnA),
  word('status', 'remark', ({ status }) => unfittedWords[status]),
]
