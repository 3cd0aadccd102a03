import { Button } from 'react-aria-components'
import type { FitOfModel, FitsOfHolds } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { NumberHeading } from '../../sheet/DataTable.tsx'
import { decimals } from '../../sheet/format.ts'
import { PowerOfTen } from '../../sheet/PowerOfTen.tsx'
import { digitsText, scientific } from '../../sheet/scientific.ts'
import { TableView } from '../../sheet/TableView.tsx'
import { modelOf } from '../runs/hold-models.ts'
import { rankingWords, unfittedWords } from '../runs/hold-ranking.ts'
import { useRateConstantsOfHolds } from '../runs/use-rate-constants-of-holds.ts'
import { modelCopyColumns } from './hold-fit-rows.ts'
import type { RatedProps } from './RateConstantsActivation.tsx'

/** The reaction models by what they leave of the holds, the closest first. Where the runs are at hand, another one is taken from here. */
export function ReactionModels({ table, fits, hasRuns, actions }: RatedProps & { readonly fits: FitsOfHolds }) {
  const make = useRateConstantsOfHolds(table, actions)
  const take = (fit: FitOfModel): void => {
    const model = modelOf(fit.model)
    if (model !== undefined) void make({ model, zeroInTime: fits.zeroInTime, range: [...fits.range] })
  }
  return (
    <>
      <p className="models-note">{rankingWords(fits)} A fit does not show that a model is right.</p>
      <div className="prediction-space">
        <TableView label="Table of reaction models" copied={() => copyText(modelCopyColumns(fits), fits.models)} currentRow={null}>
          <table className="data-table parameter-table prediction-table model-table">
            <caption className="visually-hidden">Reaction models, the closest to the holds first</caption>
            <thead>
              <tr>
                <th scope="col">
                  <span>Reaction model</span>
                </th>
                <NumberHeading text="s.d. of α" />
                <NumberHeading
                  text="Ratio of variances"
                  unit={fits.varianceRatioLimit === null ? '' : `limit ${digitsText(fits.varianceRatioLimit)}`}
                />
                <th scope="col">
                  <span className="visually-hidden">Fits</span>
                </th>
                <NumberHeading text="Ea" unit="kJ/mol" />
                <NumberHeading text="ln A" unit="A in 1/s" />
                <th scope="col">
                  <span className="visually-hidden">Choice</span>
                </th>
              </tr>
            </thead>
            <tbody>
              {fits.models.map((fit) => (
                <tr key={fit.model} className={fit.model === fits.model ? 'is-chosen' : undefined}>
                  <th scope="row">
                    <span className="model-code">{fit.model}</span>
                    <span className="soft">{fit.label}</span>
                  </th>
                  {fit.status === 'ok' ? (
                    <>
                      <td className="is-number">
                        <PowerOfTen text={scientific(fit.residualStandardDeviation, 3)} />
                      </td>
                      <td className="is-number">
                        <PowerOfTen text={scientific(fit.varianceRatio, 3)} />
                      </td>
                      <td>{fit.fits ? 'fits' : ''}</td>
                      <td className="is-number">{decimals(fit.Ea_kJ_per_mol, 2)}</td>
                      <td className="is-number">{decimals(fit.lnA_per_s, 2)}</td>
                    </>
                  ) : (
                    <td colSpan={5} className="soft">
                      {unfittedWords[fit.status]}
                    </td>
                  )}
                  <td className="model-choice">
                    {fit.model === fits.model
                      ? 'chosen'
                      : hasRuns &&
                        fit.status === 'ok' && (
                          <Button className="link-button" aria-label={`Take ${fit.model}`} onPress={() => take(fit)}>
                            Take
                          </Button>
                        )}
                  </td>
                </tr>
              ))}
            </tbody>
          </table>
        </TableView>
      </div>
    </>
  )
}
