import type { FitOfHold, FitOfModel, FitsOfHolds, TemperatureUnit } from '../../../shared-kinetics/contract/study-result.ts'
import { numberColumn, wordColumn, type DataColumn } from '../../sheet/data-table.ts'
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

/** Every number of the fits of the holds, for the clipboard. */
export const holdCopyColumns = (fits: FitsOfHolds, shown: TemperatureUnit): readonly DataColumn<FitOfHold>[] => [
  wordColumn('hold', 'hold', ({ label }) => label),
  numberColumn('temperature', 'T', temperatureUnitWords[shown], ({ temperature_K }) => Number(inUnit(temperature_K, shown).toFixed(6))),
  numberColumn('k', `k, ${fits.model}`, '1/s', ({ rateConstant_per_s: k }) => k),
  numberColumn('k-error', 's.e. of k', '1/s', ({ standardError_per_s: error }) => error),
  ...(fits.zeroInTime === 'fixed'
    ? []
    : [
        numberColumn<FitOfHold>('zero', 'zero in time', 's', ({ zero_s }) => zero_s),
        numberColumn<FitOfHold>('zero-error', 's.e. of the zero', 's', ({ zeroStandardError_s: error }) => error),
      ]),
  numberColumn('deviation', 'standard deviation of conversion', '', ({ residualStandardDeviation }) => residualStandardDeviation),
  numberColumn('greatest', 'greatest residual of conversion', '', ({ greatestResidual }) => greatestResidual),
  wordColumn('systematic', 'residuals', residualWords),
  numberColumn('sign-runs', 'runs of signs', '', ({ signRuns, signRunsProbability }) => (signRunsProbability === null ? null : signRuns)),
  numberColumn('chance', 'chance of so few', '', ({ signRunsProbability }) => signRunsProbability),
  numberColumn('rows', 'rows', '', ({ rows }) => rows),
  numberColumn('line-k', 'k, line of g', '1/s', ({ linearisedRateConstant_per_s: k }) => k),
  numberColumn('line-r2', 'r², line of g', '', ({ linearisedR2 }) => linearisedR2),
]

/** The reaction models as ranked, for the clipboard. */
export const modelCopyColumns = (fits: FitsOfHolds): readonly DataColumn<FitOfModel>[] => [
  numberColumn('rank', 'rank', '', (row) => fits.models.indexOf(row) + 1),
  wordColumn('model', 'model', ({ model }) => model),
  wordColumn('label', 'name', ({ label }) => label),
  wordColumn('chosen', 'chosen', ({ model }) => (model === fits.model ? 'yes' : 'no')),
  numberColumn('sum', 'sum of squares', '', ({ residualSumOfSquares }) => residualSumOfSquares),
  numberColumn('deviation', 'standard deviation of conversion', '', ({ residualStandardDeviation }) => residualStandardDeviation),
  numberColumn('ratio', 'ratio of variances', '', ({ varianceRatio }) => varianceRatio),
  numberColumn('limit', 'limit of the ratio', '', () => fits.varianceRatioLimit),
  wordColumn('fits', 'fits', (row) => (row.fits ? 'yes' : 'no')),
  numberColumn('Ea', 'Ea', 'kJ/mol', ({ Ea_kJ_per_mol: Ea }) => Ea),
  numberColumn('lnA', 'ln A', 'A in 1/s', ({ lnA_per_s: lnA }) => lnA),
  wordColumn('status', 'remark', ({ status }) => unfittedWords[status]),
]
