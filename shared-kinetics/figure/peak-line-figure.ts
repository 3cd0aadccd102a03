import type { PeakMethodId } from '../peak-methods/peak-method-info.ts'
import type { PeakMethodResult, StudyResult } from '../tasks/study-result.ts'
import type { Figure, Mark } from './figure.ts'
import { extentOf, niceAxis } from './nice-axis.ts'
import { runNames, runTones } from './run-place.ts'
import { drawnLine, inverseTemperatureAxis, pointOf } from './straight-lines-figure.ts'

const perMinute = Math.log(60)
const perMinuteLog10 = Math.log10(60)

/** What reaches K/min from the K/s in which methods hold heating rates, and the units drawn. */
const ordinates: Readonly<Record<PeakMethodId, { readonly shift: number; readonly unit: string }>> = {
  kissinger: { shift: perMinute, unit: 'β in K/min, T in K' },
  'astm-e698': { shift: perMinuteLog10, unit: 'β in K/min' },
  'astm-e2890': { shift: perMinute, unit: 'β in K/min, T in K' },
  'ozawa-peak': { shift: perMinute, unit: 'β in K/min' },
  'ozawa-peak-corrected': { shift: perMinute, unit: 'β in K/min' },
  'augis-bennett': { shift: perMinute, unit: 'β in K/min, T in K' },
  'augis-bennett-without-start': { shift: perMinute, unit: 'β in K/min, T in K' },
  'borchardt-daniels': { shift: 0, unit: '' },
}

/**
 * The straight line through the rate peaks of the runs that a peak method reads Ea from, against 1000/Tp with °C along the opposite edge; each run by its own colour and
 * marker. No marks for a method without such a line.
 */
export function peakLineFigure(result: Pick<StudyResult, 'runs'>, peaks: Pick<PeakMethodResult, 'method' | 'label' | 'line'>): Figure {
  const { line } = peaks
  const { shift, unit } = ordinates[peaks.method]
  const [tones, names] = [runTones(result), runNames(result.runs)]
  const drawn = line === null ? null : drawnLine(line, shift)
  const points = line === null ? [] : result.runs.map((_, run) => pointOf(line, run, shift))
  const marks: Mark[] = [
    ...(drawn === null ? [] : [{ kind: 'line', name: 'Line through the peaks', tone: { kind: 'ink' }, ...drawn } as const]),
    ...points.flatMap((point, run): Mark[] => {
      const tone = tones[run]
      if (point === null || tone === undefined) return []
      return [{ kind: 'points', name: names[run] ?? '', tone, x: [point.x], y: [point.y], joined: false }]
    }),
  ]
  const seen = points.filter((point) => point !== null)
  const label = line?.ordinate ?? ''
  const yAxis = niceAxis(...extentOf(seen.map((point) => point.y)), 5)
  return {
    id: 'peak-line',
    title: 'Straight line through the peaks',
    description: `${peaks.label}: ${label} against 1000/Tp, one point for the peak of the reaction rate in each of ${seen.length} runs, and the line through them; its slope gives Ea.`,
    x: { ...inverseTemperatureAxis(seen.map((point) => point.x)), label: '1000/Tp' },
    y: { label, unit, min: yAxis.min, max: yAxis.max, second: null },
    marks,
  }
}
