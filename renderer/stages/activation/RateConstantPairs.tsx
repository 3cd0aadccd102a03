import type { RateConstantsResult } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { decimals, formatSigned } from '../../sheet/format.ts'
import { TableView } from '../../sheet/TableView.tsx'
import { betweenCopyColumns, placesOf, temperatureIn } from './rate-constant-rows.ts'

/** Ea from each temperature to the next: where one mechanism goes on, they scatter about that of the line. With two temperatures in all, the line says it. */
export function RateConstantPairs({ rated }: { readonly rated: RateConstantsResult }) {
  const { betweenTemperatures: pairs, temperatureUnitShown: shown, line } = rated
  const places = placesOf(line.standardError_kJ_per_mol)
  return (
    <div className="prediction-space pairs-space">
      <TableView label="Table between two temperatures" copied={() => copyText(betweenCopyColumns(rated), pairs)} currentRow={null}>
        <table className="data-table parameter-table prediction-table">
          <caption className="visually-hidden">Between two temperatures</caption>
          <thead>
            <tr>
              <th scope="col">Between two temperatures</th>
              <th scope="col" className="is-number">
                Ea <span className="unit">kJ/mol</span>
              </th>
              <th scope="col" className="is-number">
                − line
              </th>
              <th scope="col" className="is-number">
                ln A
              </th>
            </tr>
          </thead>
          <tbody>
            {pairs.map((pair) => (
              <tr key={pair.from_K}>
                <th scope="row">
                  {temperatureIn(pair.from_K, shown)} to {temperatureIn(pair.to_K, shown)}
                </th>
                <td className="is-number">{decimals(pair.Ea_kJ_per_mol, places)}</td>
                <td className="is-number">
                  {pair.Ea_kJ_per_mol === null || line.Ea_kJ_per_mol === null
                    ? ''
                    : formatSigned(pair.Ea_kJ_per_mol - line.Ea_kJ_per_mol, places)}
                </td>
                <td className="is-number">{decimals(pair.lnA, places)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </TableView>
    </div>
  )
}
