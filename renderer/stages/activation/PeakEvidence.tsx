import { useMemo } from 'react'
import type { PeakMethodResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { studentWords } from '../../../shared-kinetics/figure/interval-status.ts'
import { peakLineFigure } from '../../../shared-kinetics/figure/peak-line-figure.ts'
import { FigureChart } from '../../charts/FigureChart.tsx'
import { decimals, formatCelsius, formatWithInterval } from '../../sheet/format.ts'
import { useColours } from '../../state/services.ts'
import type { SheetActions } from '../stage-props.ts'
import { ownNumbers, peakName } from './peak-rows.ts'
import { RunLegend } from './RunLegend.tsx'

const noMarks = [] as const

/** The line through the peaks that a peak method reads Ea from, and what it reads; of a method without one, why there is none. */
export function PeakEvidence({
  result,
  peaks,
  actions,
}: {
  readonly result: StudyResult
  readonly peaks: PeakMethodResult
  readonly actions: SheetActions
}) {
  const colours = useColours()
  const figure = useMemo(() => peakLineFigure(result, peaks), [result, peaks])
  if (!peaks.applies)
    return (
      <p className="missing">
        {peakName(peaks)} does not apply: {ownNumbers(peaks)}
      </p>
    )
  if (peaks.line === null)
    return <p className="missing">{peakName(peaks)} reads Ea from the points of one run; no line goes through the peaks of all runs.</p>
  const remark = studentWords(peaks)
  return (
    <>
      <FigureChart figure={figure} overlay={noMarks} colours={colours} onCopied={actions.pictureCopied} />
      <RunLegend result={result}>
        {({ peak_K }) => <span className="run-legend-stand">{peak_K === null ? 'no peak' : `peak ${formatCelsius(peak_K)} °C`}</span>}
      </RunLegend>
      <p className="peak-reading">
        Ea <strong>{formatWithInterval(peaks.Ea_kJ_per_mol, peaks.lower95_kJ_per_mol, peaks.upper95_kJ_per_mol)}</strong> kJ/mol
        {peaks.dof > 0 && ` (95 % Student-t, n − 2 degrees of freedom, ${peaks.dof} here)`}
        {peaks.lnA_per_s !== null && (
          <>
            , ln A <strong>{decimals(peaks.lnA_per_s, 2)}</strong> (A in 1/s)
          </>
        )}
        {peaks.r2 !== null && (
          <>
            , r² <strong>{decimals(peaks.r2, 5)}</strong>
          </>
        )}
        .{remark !== null && <span className="mean-remark">Its interval: {remark}.</span>}
      </p>
    </>
  )
}
