import type { ChartDataset } from 'chart.js'
import type { Figure, Mark, Tone } from '../../shared-kinetics/figure/figure.ts'
import { withOpacity, type ChartColours } from './chart-colours.ts'
import { methodDash, methodMarker, runMarker, type Marker } from './markers.ts'

export interface FigurePoint {
  readonly x: number
  readonly y: number
  readonly yMin?: number
  readonly yMax?: number
}
export type FigureDataset = ChartDataset<'scatter' | 'scatterWithErrorBars', FigurePoint[]>

/** How a tone is painted: by line and marker on every paper, never by colour alone where two things must be told apart. */
export interface Stroke {
  readonly colour: string
  readonly width: number
  readonly dash: readonly number[]
  readonly marker: Marker
  readonly radius: number
}

export function strokeOf(tone: Tone, colours: ChartColours): Stroke {
  switch (tone.kind) {
    case 'run': {
      const marker = runMarker(tone.index)
      return { colour: colours.run(tone.place), width: 1.6, dash: [], marker, radius: 5.5 * marker.scale }
    }
    case 'method': {
      const marker = methodMarker(tone.index)
      return {
        colour: tone.index === 0 ? colours.accent : colours.softInk,
        width: tone.index === 0 ? 2 : 1.5,
        dash: methodDash(tone.index),
        marker,
        radius: (tone.index === 0 ? 3.2 : 2.6) * marker.scale,
      }
    }
    case 'ink':
      return { colour: colours.ink, width: 1.8, dash: [], marker: runMarker(0), radius: 4 }
    case 'faint':
      return { colour: colours.faint, width: 1, dash: [], marker: runMarker(0), radius: 1.6 }
    case 'accent':
      return { colour: colours.accent, width: 1.6, dash: [], marker: runMarker(0), radius: 6 }
  }
}

export const dashOf = (mark: Mark, stroke: Stroke): readonly number[] => {
  if (mark.kind === 'band' || mark.kind === 'points' || mark.dash === undefined) return stroke.dash
  return mark.dash === 'dotted' ? [1.5, 4] : [6, 4]
}

/**
 * The datasets that draw a figure's marks, in the order of the marks (first drawn first); rules are drawn otherwise (`rulesOf`).
 * `emphasis` names the run (by its index) that is drawn stronger than the others, or is null.
 */
export function datasetsOf(figure: Figure, colours: ChartColours, emphasis: number | null): FigureDataset[] {
  const last = figure.marks.length
  const faintLines = figure.marks.filter((mark) => mark.kind === 'line' && mark.tone.kind === 'faint').length
  return figure.marks.flatMap((mark, i): FigureDataset[] => {
    const stroke = strokeOf(mark.kind === 'rule' ? { kind: 'ink' } : mark.tone, colours)
    // Chart.js draws the greatest order first; the chosen method lies above those it is compared with.
    const isChosen = mark.kind === 'points' && mark.tone.kind === 'method' && mark.tone.index === 0
    const order = isChosen ? 0 : last - i
    switch (mark.kind) {
      case 'line':
        return [lineDataset(mark, thinned(mark.tone, emphasised(mark.tone, stroke, emphasis), faintLines), order)]
      case 'points':
        return [pointsDataset(mark, uncrowded(mark, stroke), colours, order)]
      case 'band':
        return bandDatasets(mark, stroke, order)
      case 'rule':
        return []
    }
  })
}

function emphasised(tone: Tone, stroke: Stroke, emphasis: number | null): Stroke {
  if (emphasis === null || tone.kind !== 'run') return stroke
  return tone.index === emphasis ? { ...stroke, width: 3 } : { ...stroke, colour: withOpacity(stroke.colour, 0.35) }
}

/** More lines or joined points than this stand so close that they would run into one blot. */
const crowd = 40

/** Many faint lines are drawn thinner, so that single ones can still be told. */
function thinned(tone: Tone, stroke: Stroke, faintLines: number): Stroke {
  return tone.kind === 'faint' && faintLines > crowd ? { ...stroke, width: 0.5 } : stroke
}

/** Where joined points stand close, the line carries them: small markers on the chosen method, none on the others. */
function uncrowded(mark: Extract<Mark, { kind: 'points' }>, stroke: Stroke): Stroke {
  if (mark.tone.kind === 'faint') return mark.x.length > crowd * 5 ? { ...stroke, radius: 1 } : stroke
  if (!mark.joined || mark.x.length <= crowd) return stroke
  return { ...stroke, radius: mark.tone.kind === 'method' && mark.tone.index === 0 ? 1.7 : 0 }
}

/**
 * Chart.js draws a line without dashes by one upright stroke for all points within a pixel of each other, which turns a steep curve into
 * stairs. A dash longer than any chart is a solid line that it draws from point to point.
 */
const solid: readonly number[] = [100_000, 0]

function lineDataset(mark: Extract<Mark, { kind: 'line' }>, stroke: Stroke, order: number): FigureDataset {
  const dash = dashOf(mark, stroke)
  return {
    type: 'scatter',
    label: mark.name,
    data: pointsOf(mark.x, mark.y),
    showLine: true,
    pointRadius: 0,
    pointHitRadius: 6,
    borderColor: stroke.colour,
    borderWidth: stroke.width,
    borderDash: [...(dash.length === 0 ? solid : dash)],
    borderJoinStyle: 'round',
    order,
  }
}

function pointsDataset(mark: Extract<Mark, { kind: 'points' }>, stroke: Stroke, colours: ChartColours, order: number): FigureDataset {
  const { lower, upper } = mark
  const shared = {
    label: mark.name,
    showLine: mark.joined,
    borderColor: stroke.colour,
    borderWidth: stroke.width,
    borderDash: [...stroke.dash],
    pointStyle: stroke.marker.style,
    pointRotation: stroke.marker.rotation,
    pointRadius: stroke.radius,
    pointHoverRadius: stroke.radius + 1.5,
    pointHitRadius: 8,
    pointBackgroundColor: stroke.marker.hollow ? colours.paper : stroke.colour,
    pointBorderColor: stroke.colour,
    pointBorderWidth: mark.tone.kind === 'faint' ? 0 : 1.4,
    // A marker on the edge of the figure is shown whole.
    clip: 8,
    order,
  }
  if (lower === undefined || upper === undefined) return { type: 'scatter', ...shared, data: pointsOf(mark.x, mark.y) }
  const data = pointsOf(mark.x, mark.y).map((point, i): FigurePoint => {
    const [yMin, yMax] = [lower[i] ?? Number.NaN, upper[i] ?? Number.NaN]
    return Number.isFinite(yMin) && Number.isFinite(yMax) ? { ...point, yMin, yMax } : point
  })
  return {
    type: 'scatterWithErrorBars',
    ...shared,
    data,
    errorBarColor: stroke.colour,
    errorBarWhiskerColor: stroke.colour,
    errorBarLineWidth: 1,
    errorBarWhiskerLineWidth: 1,
    errorBarWhiskerSize: 6,
  }
}

function bandDatasets(mark: Extract<Mark, { kind: 'band' }>, stroke: Stroke, order: number): FigureDataset[] {
  const edge = {
    type: 'scatter',
    showLine: true,
    pointRadius: 0,
    pointHitRadius: 0,
    borderWidth: 0,
    borderColor: 'transparent',
    order,
  } as const
  return [
    { ...edge, label: `${mark.name}, lower end`, data: pointsOf(mark.x, mark.lower) },
    { ...edge, label: mark.name, data: pointsOf(mark.x, mark.upper), fill: '-1', backgroundColor: withOpacity(stroke.colour, 0.15) },
  ]
}

/** NaN stays in the data: Chart.js breaks a line there, which is what a number that is not to be had looks like. */
function pointsOf(x: ArrayLike<number>, y: ArrayLike<number>): FigurePoint[] {
  return Array.from(x, (abscissa, i) => ({ x: abscissa, y: y[i] ?? Number.NaN }))
}
