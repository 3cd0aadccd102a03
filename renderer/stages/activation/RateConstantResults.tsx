import { Button } from 'react-aria-components'
import type { RateConstantsResult } from '../../../shared-kinetics/contract/study-result.ts'
import { noIntervalWords, scatterOnlyWords } from '../../../shared-kinetics/figure/result-words.ts'
import { Choice } from '../../sheet/Choice.tsx'
import { count, decimals, formatInterval } from '../../sheet/format.ts'
import { Half } from '../../sheet/Half.tsx'
import { copyText } from '../../sheet/data-table.ts'
import { PowerOfTen } from '../../sheet/PowerOfTen.tsx'
import { Remarked } from '../../sheet/Remarked.tsx'
import { scientific } from '../../sheet/scientific.ts'
import { TableView } from '../../sheet/TableView.tsx'
import { useServices, useView } from '../../state/services.ts'
import type { RatedProps } from './RateConstantsActivation.tsx'
import { RateConstantPairs } from './RateConstantPairs.tsx'
import { RateConstantPredictions } from './RateConstantPredictions.tsx'
import { ReactionModels } from './ReactionModels.tsx'
import { errorText, lowerEndWords, modelRemark, parameterCopyColumns, parameterRows, placesOf } from './rate-constant-rows.ts'

/** The right half: Ea, A and what follows from them, and k at the temperatures asked for. */
export function RateConstantResults(props: RatedProps) {
  const { rated, actions } = props
  const { line } = rated
  return (
    <Half side="result" title="Activation energy from rate constants" note={intervalNote(rated)}>
      {line.Ea_kJ_per_mol === null ? (
        <p className="missing">{missingText(rated)}</p>
      ) : (
        <>
          <Headline rated={rated} />
          <Parameters rated={rated} />
          <p className="rate-fit">{fitText(rated)}</p>
        </>
      )}
      <RateConstantPredictions {...props} />
      <BeneathNumbers {...props} />
      <div className="half-foot">
        <p className="source">{sourcesOf(rated)}</p>
        <div className="controls-end">
          <Button className="text-button" onPress={actions.copyTable}>
            Copy tables
          </Button>
          {(['csv', 'json', 'svg'] as const).map((format) => (
            <Button
              key={format}
              className="text-button"
              aria-label={`Export ${exportWords[format]} (${format.toUpperCase()})`}
              onPress={() => actions.exportRateConstants(format)}
            >
              {format === 'csv' ? 'Export table (CSV)' : format.toUpperCase()}
            </Button>
          ))}
        </div>
      </div>
    </Half>
  )
}

/** Reaction models where the table was made from holds, Ea from temperature to temperature where there are more than two: a choice where there is both. */
function BeneathNumbers(props: RatedProps) {
  const { view } = useServices()
  const { rated } = props
  const { holdFits: fits } = rated
  const wanted = useView((state) => state.beneathNumbers)
  const hasPairs = rated.betweenTemperatures.length > 1
  if (fits === null) return hasPairs ? <RateConstantPairs rated={rated} /> : null
  return (
    <>
      {hasPairs && (
        <div className="controls">
          <Choice
            label="Beneath"
            options={[
              { id: 'models', text: 'Reaction models' },
              { id: 'pairs', text: 'Between two temperatures' },
            ]}
            value={wanted}
            onChange={(beneathNumbers) => view.setState({ beneathNumbers })}
          />
        </div>
      )}
      {hasPairs && wanted === 'pairs' ? <RateConstantPairs rated={rated} /> : <ReactionModels {...props} fits={fits} />}
    </>
  )
}

const exportWords = { csv: 'table', json: 'results', svg: 'figure' } as const

function Headline({ rated }: { readonly rated: RateConstantsResult }) {
  const { line, rateUnit } = rated
  const remark = modelRemark(rated)
  const below = lowerEndWords(line)
  const { Ea_kJ_per_mol: Ea, lower95_kJ_per_mol: lower, upper95_kJ_per_mol: upper, standardError_kJ_per_mol: error } = line
  const places = placesOf(error)
  const interval = formatInterval(Ea, lower, upper, places)
  return (
    <>
      <p className="rate-headline">
        Ea{' '}
        <strong>
          {decimals(Ea, places)}
          {interval !== '' && ` ± ${interval}`}
        </strong>{' '}
        kJ/mol
        {error !== null && interval !== '' && (
          <span className="soft">
            {' '}
            ({remark === null ? '95 %' : '95 % of the scatter only'}; standard error{'\u00a0'}
            {errorText(error, places)})
          </span>
        )}
        {interval === '' && <span className="soft"> ({noIntervalWords(line.intervalStatus) ?? 'no interval'})</span>}
        {remark !== null && <span className="rate-remark"> {remark}</span>}
      </p>
      {below !== null && <p className="rate-below">The interval of Ea {below}.</p>}
      {line.A !== null && (
        <p className="rate-factor">
          A{' '}
          <strong>
            <PowerOfTen text={scientific(line.A, 3)} />
          </strong>{' '}
          {rateUnit === '' ? 'in the unit of k' : rateUnit}
          {line.ALower95 === null || line.AUpper95 === null ? (
            <span className="soft">
              {' '}
              (
              {remark === null
                ? (noIntervalWords(line.lnAIntervalStatus) ?? 'no interval: its ends cannot be written as numbers')
                : 'no interval'}
              )
            </span>
          ) : (
            <span className="soft">
              {' '}
              (95 %: <PowerOfTen text={scientific(line.ALower95, 3)} /> … <PowerOfTen text={scientific(line.AUpper95, 3)} />)
            </span>
          )}
          {remark !== null && <span className="rate-remark"> {remark}</span>}
        </p>
      )}
    </>
  )
}

function Parameters({ rated }: { readonly rated: RateConstantsResult }) {
  const rows = parameterRows(rated)
  const hasIntervals = rows.some((row) => row.lower !== null)
  return (
    <div className="parameter-space">
      <TableView label="Table of parameters" copied={() => copyText(parameterCopyColumns, rows)} currentRow={null}>
        <table className={hasIntervals ? 'data-table parameter-table' : 'data-table parameter-table is-narrow'}>
          <caption className="visually-hidden">Parameters of the Arrhenius line</caption>
          <thead>
            <tr>
              <th scope="col">Quantity</th>
              <th scope="col" className="is-number">
                Value
              </th>
              {hasIntervals && (
                <>
                  <th scope="col" className="is-number">
                    s.e.
                  </th>
                  <th scope="col" className="is-number">
                    lower 95 %
                  </th>
                  <th scope="col" className="is-number">
                    upper 95 %
                  </th>
                </>
              )}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.id}>
                <th scope="row">
                  {row.quantity} {row.unit !== '' && <span className="soft">{row.unit}</span>}
                  {row.remark !== null && row.noInterval === null && <span className="rate-remark is-beneath">{row.remark}</span>}
                </th>
                <td className="is-number">
                  <PowerOfTen text={row.format(row.value)} />
                </td>
                {hasIntervals && row.noInterval !== null && row.lower === null && row.upper === null && (
                  <td colSpan={3} className={row.remark === null ? 'is-number no-interval' : 'is-number no-interval is-off'}>
                    {row.noInterval}
                  </td>
                )}
                {hasIntervals && !(row.noInterval !== null && row.lower === null && row.upper === null) && (
                  <>
                    <td className="is-number">{row.formatError(row.standardError)}</td>
                    <td className="is-number">
                      <Remarked remark={row.lowerRemark}>
                        <PowerOfTen text={row.format(row.lower)} />
                      </Remarked>
                    </td>
                    <td className="is-number">
                      <PowerOfTen text={row.format(row.upper)} />
                    </td>
                  </>
                )}
              </tr>
            ))}
          </tbody>
        </table>
      </TableView>
    </div>
  )
}

/** Names the interval for what it is. */
function intervalNote(rated: RateConstantsResult): string {
  const { line } = rated
  const { dof } = line.interval
  if (line.Ea_kJ_per_mol === null) return ''
  if (dof < 1) return 'No interval: it needs rate constants at three temperatures or more.'
  if (modelRemark(rated) !== null)
    return `Ea: 95 % Student-t, n − 2 degrees of freedom (${dof} here), ${scatterOnlyWords}. A and predicted k have no interval.`
  return `95 % Student-t, n − 2 degrees of freedom (${dof} here), each parameter by itself; bands pointwise in temperature.`
}

/** How well the line fits, and whether it is one. */
function fitText({ line, weightedLine, curvature, eyring }: RateConstantsResult): string {
  const standardState = eyring?.standardStateOf ?? null
  const parts = [
    line.residualStandardDeviation === null ? '' : `scatter of ln k ${errorText(line.residualStandardDeviation, 4)}`,
    line.r2 === null || line.interval.dof < 1 ? '' : `r² ${decimals(line.r2, 5)}`,
    curvature === null
      ? ''
      : `${curvature.isCurved ? 'curved' : 'straight within the scatter'}: t ${decimals(Math.abs(curvature.t), 2)} of a quadratic term, ${curvature.isCurved ? 'above' : 'below'} ${decimals(curvature.threshold, 2)} (${count(curvature.dof, 'degree')} of freedom)`,
    weightedLine === null ? '' : `weighted by 1/u², reduced χ² ${decimals(weightedLine.reducedChiSquare, 2)}`,
    standardState === null ? '' : `ΔS‡ and ΔG‡ for a standard state of ${standardState}`,
  ].filter((part) => part !== '')
  const text = parts.join('; ')
  return text === '' ? '' : `${text.charAt(0).toUpperCase()}${text.slice(1)}.`
}

const sourcesOf = ({ line, eyring }: RateConstantsResult): string => [...new Set([...line.sources, ...(eyring?.sources ?? [])])].join('; ')

const missingText = ({ rows, line }: RateConstantsResult): string =>
  rows.every((row) => !row.use)
    ? 'No row is in use. Tick “Use” in the table at the left.'
    : line.distinctTemperatures < 2
      ? 'Ea and A stand here as soon as rate constants at two temperatures are in use; their intervals need three.'
      : 'No line can be drawn through these rate constants. The findings at the right say why.'
