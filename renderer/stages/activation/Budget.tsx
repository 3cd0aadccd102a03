import { useMemo } from 'react'
import { Button } from 'react-aria-components'
import type { UncertaintySettings } from '../../../shared-kinetics/contract/study-result.ts'
import type { Parsed } from '../../../shared-kinetics/units/parse-quantity.ts'
import { copyText } from '../../sheet/data-table.ts'
import { formatLevel } from '../../sheet/format.ts'
import { TableView } from '../../sheet/TableView.tsx'
import { TypedField } from '../../sheet/TypedField.tsx'
import { useStudy } from '../../state/services.ts'
import { isUncertaintyBehind } from '../../state/study-state.ts'
import type { ActivationProps } from './ActivationStage.tsx'
import { BehindNote } from './BehindNote.tsx'
import {
  budgetCopyColumns,
  budgetCopyRows,
  budgetGroups,
  isAssumed,
  statedText,
  uText,
  type BudgetGroup,
  type StatedKey,
  withStated,
} from './budget-rows.ts'
import { intervalFacts, methodFacts } from './method-facts.ts'
import { parseDraws, parseLag, parseSeed, parseShare, parseTemperatureUncertainty } from './parse-uncertainty.ts'

/** Where the uncertainty of the chosen method comes from at the level, and what the method's own numbers are worth there. */
export function Budget(props: ActivationProps) {
  const { shown, result, document, levelIndex, level, actions } = props
  const { uncertainty: settings } = document
  const isBehind = useStudy(isUncertaintyBehind)
  const groups = useMemo(() => budgetGroups(shown, settings, result.runs, levelIndex), [shown, settings, result, levelIndex])
  const set = (part: Partial<UncertaintySettings>): void =>
    actions.change({ kind: 'set-uncertainty', uncertainty: withStated(settings, part) })
  const heading = `${shown.profile.label} at α ${formatLevel(level)}`
  const text = (): string => copyText(budgetCopyColumns(settings, heading), budgetCopyRows(groups))
  return (
    <>
      {groups.length === 0 ? (
        <p className="missing">The sources of uncertainty stand here as soon as they are worked out.</p>
      ) : (
        <TableView label="Table of sources of uncertainty" copied={() => (isBehind ? null : text())} currentRow={null}>
          <table className={isBehind ? 'data-table budget-table is-behind' : 'data-table budget-table'}>
            <caption className="visually-hidden">Where the uncertainty comes from: {heading}</caption>
            <thead>
              <tr>
                <th scope="col">
                  <span>Source</span>
                </th>
                <th scope="col">
                  <span>Stated or found</span>
                  <span className="unit">standard uncertainty (one standard deviation)</span>
                </th>
                <th scope="col" className="is-number">
                  <span>u(Ea)</span>
                  <span className="unit">kJ/mol</span>
                </th>
                <th scope="col">
                  <span>u²</span>
                </th>
              </tr>
            </thead>
            {groups.map((group) => (
              <Group key={group.id} group={group} settings={settings} onState={set} />
            ))}
          </table>
        </TableView>
      )}
      <ul className="method-facts">
        {[...intervalFacts(shown, levelIndex), ...methodFacts(shown.profile, levelIndex)].map((fact) => (
          <li key={fact}>{fact}</li>
        ))}
      </ul>
      {shown.mean !== null && (
        <details className="source">
          <summary>How the combined interval of the mean is made</summary>
          {shown.mean.note}
        </details>
      )}
      <div className="budget-foot">
        <TypedField label="Draws" text={String(settings.draws)} parse={parseDraws} onCommit={(draws) => set({ draws })} />
        <TypedField label="Seed" text={String(settings.seed)} parse={parseSeed} onCommit={(seed) => set({ seed })} />
        {groups.length > 0 && (
          <Button className="text-button" isDisabled={isBehind} onPress={() => actions.copyOut(text())}>
            Copy budget
          </Button>
        )}
        {groups.length > 0 && isBehind && <BehindNote />}
      </div>
      <p className="source">
        {(['temperatureCommon_K', 'temperatureRun_K', 'lag_s'] as const).some((key) => isAssumed(settings, key)) && (
          <>What is assumed is common practice and stands in no standard: type what your own calibration shows. </>
        )}
        An expanded uncertainty is typed with its k: 0.3 K (k=2). The thermal lag in s is the shift of a calibration standard&rsquo;s onset
        between two heating rates, over the difference of the rates.
      </p>
    </>
  )
}

function Group({
  group,
  settings,
  onState,
}: {
  readonly group: BudgetGroup
  readonly settings: UncertaintySettings
  readonly onState: (part: Partial<UncertaintySettings>) => void
}) {
  return (
    <tbody className={`budget-${group.id}`}>
      <tr className="budget-title">
        <th scope="rowgroup" colSpan={4}>
          {group.title}
        </th>
      </tr>
      {group.rows.map((row) => (
        <tr key={row.id} className={row.role === 'sum' ? 'budget-sum' : undefined}>
          <th scope="row">{row.label}</th>
          <td className="budget-words">
            <div>
              {row.stated !== null && <StatedField stated={row.stated} settings={settings} onState={onState} />}
              <span>{row.words}</span>
            </div>
          </td>
          <td className="is-number">{uText(row.u)}</td>
          <td className="budget-share">
            {row.role === 'part' && row.u !== null && <span style={{ width: `${(100 * row.share).toFixed(2)}%` }} />}
          </td>
        </tr>
      ))}
    </tbody>
  )
}

const fieldNames: Readonly<Record<StatedKey, string>> = {
  temperatureCommon_K: 'Stated: temperature, common to all runs',
  temperatureRun_K: 'Stated: temperature, run by run',
  lag_s: 'Stated: thermal lag',
  statedHeatingRate_share: 'Stated: heating rate',
}
const parsers: Readonly<Record<StatedKey, (text: string) => Parsed<number>>> = {
  temperatureCommon_K: parseTemperatureUncertainty,
  temperatureRun_K: parseTemperatureUncertainty,
  lag_s: parseLag,
  statedHeatingRate_share: parseShare,
}

function StatedField({
  stated,
  settings,
  onState,
}: {
  readonly stated: StatedKey
  readonly settings: UncertaintySettings
  readonly onState: (part: Partial<UncertaintySettings>) => void
}) {
  return (
    <TypedField
      label={fieldNames[stated]}
      hideLabel
      text={statedText(settings, stated)}
      parse={parsers[stated]}
      countsUnchanged={isAssumed(settings, stated)}
      onCommit={(value) => onState({ [stated]: value })}
    />
  )
}
