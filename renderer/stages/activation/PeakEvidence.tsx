import { useMemo } from 'react'
import type { PeakMethodResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { studentWords } from '../../../shared-kinetics/figure/interval-status.ts'
import { peakLineFigure } from '../../../shared-kinetics/figure/peak-line-figure.ts'
import { FigureChart } from '../../charts/FigureChart.tsx'
import { count, decimals, formatCelsius, formatWithInterval } from '../../sheet/format.ts'
import { useColours } from '../../state/services.ts'
import type { SheetActions } from '../stage-props.ts'
import { PeakRemarks } from './Peaks.tsx'
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
  if (!peaks.applies || peaks.line === null)
    return (
      <>
        <p className="missing">
          {peaks.applies
            ? `${peaks.label} reads Ea from the points of one run: no line goes through the peaks.`
            : 'There is no line to draw.'}
        </p>
        {peaks.applies && <Reading peaks={peaks} />}
        <PeakRemarks peaks={peaks} />
      </>
    )
  return (
    <>
      <FigureChart figure={figure} overlay={noMarks} colours={colours} onCopied={actions.pictureCopied} />
      <RunLegend result={result}>
        {({ peak_K }) => <span className="run-legend-stand">{peak_K === null ? 'no peak' : `peak ${formatCelsius(peak_K)}\u00a0°C`}</span>}
      </RunLegend>
      <Reading peaks={peaks} />
      <PeakRemarks peaks={peaks} />
    </>
  )
}

/** What the method reads, in words. */
function Reading({ peaks }: { readonly peaks: PeakMethodResult }) {
  const remark = studentWords(peaks)
  return (
    <p className="peak-reading">
      Ea <strong>{formatWithInterval(peaks.Ea_kJ_per_mol, peaks.lower95_kJ_per_mol, peaks.upper95_kJ_per_mol)}</strong> kJ/mol
      {peaks.dof > 0 && ` (95 % Student-t, ${count(peaks.dof, 'degree')} of freedom)`}
      {peaks.lnA_per_s !== null && (
        <>
          , ln A <strong>{decimals(peaks.lnA_per_s, 2)}</strong> (A in 1/s)
        </>
      )}
      {peaks.r2 !== null && (
        <>
          , r²&nbsp;<strong>{decimals(peaks.r2, 5)}</strong>
        </>
      )}
      .{remark !== null && <span className="mean-remark">Its interval: {remark}.</span>}
    </p>
  )
}
