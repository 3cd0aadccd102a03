import type { PeakMethodResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { NumberCell } from '../../sheet/DataTable.tsx'
import { rowKeys } from '../../sheet/row-keys.ts'
import { TableView } from '../../sheet/TableView.tsx'
import { useServices, useView } from '../../state/services.ts'
import { ownNumbers, peakColumns, peakCopyColumns, peakKey, peakName, peakNote, pickedPeaks } from './peak-rows.ts'

/** What the rate peaks, and single runs, say: one row a method, and of the row picked out what to know before relying on it. Up and down, or a click, pick a row, and its line stands at the left. */
export function Peaks({
  methods,
  signal,
  hasRemarksBeside,
}: {
  readonly methods: readonly PeakMethodResult[]
  readonly signal: StudyResult['signal']
  /** They stand at the left, under the line. */
  readonly hasRemarksBeside: boolean
}) {
  const { view } = useServices()
  const current = pickedPeaks(
    methods,
    useView((state) => state.peakRow),
  )
  const pick = (row: PeakMethodResult | undefined): void => {
    if (row !== undefined) view.setState({ peakRow: peakKey(row), evidence: 'peaks' })
  }
  if (current === null) return <p className="missing">There is no peak of the reaction rate to read anything from.</p>
  const index = methods.indexOf(current)
  return (
    <>
      <TableView
        label="Table of peak and single-run methods"
        copied={() => copyText(peakCopyColumns(), methods)}
        currentRow={index}
        onKeyDown={rowKeys(index, methods.length, (row) => pick(methods[row]))}
      >
        <table className="data-table level-table peak-table">
          <caption className="visually-hidden">
            Activation energy from rate peaks and from single runs, 95 % intervals by Student&rsquo;s t
          </caption>
          <thead>
            <tr>
              <th scope="col">
                <span>Method</span>
              </th>
              {peakColumns.map((column) => (
                <th key={column.id} scope="col" className="is-number">
                  <span>{column.heading}</span>
                  <span className="unit">{column.unit}</span>
                </th>
              ))}
              <th scope="col">
                <span>Own numbers</span>
                <span className="unit">± standard error</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {methods.map((row, i) => (
              // oxlint-disable-next-line jsx-a11y/click-events-have-key-events, jsx-a11y/no-noninteractive-element-interactions -- the table's own keys do the same
              <tr key={peakKey(row)} aria-current={i === index ? 'true' : undefined} onClick={() => pick(row)}>
                <th scope="row">{peakName(row)}</th>
                {row.applies &&
                  peakColumns.map((column) => <NumberCell key={column.id} text={column.text(row)} remark={column.remark?.(row) ?? null} />)}
                <td className="peak-own" colSpan={row.applies ? 1 : peakColumns.length + 1}>
                  <PeakNote text={peakNote(row, signal)} />
                  {row.applies ? ownNumbers(row) : `Does not apply. ${ownNumbers(row)}`}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </TableView>
      {!hasRemarksBeside && <PeakRemarks peaks={current} />}
    </>
  )
}

const PeakNote = ({ text }: { readonly text: string }) => (text === '' ? null : <span className="peak-note">{text}</span>)

/** What to know before relying on a row, and where its method is published. */
export const PeakRemarks = ({ peaks }: { readonly peaks: PeakMethodResult }) => (
  <div className="peak-remarks" aria-live="polite">
    <p>
      <strong>{peakName(peaks)}.</strong> {peaks.applies ? peaks.remarks.join(' ') : ownNumbers(peaks)}
    </p>
    <p className="source">{peaks.sources.join('; ')}</p>
  </div>
)
