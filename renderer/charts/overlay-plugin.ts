import type { Chart, Plugin, Scale } from 'chart.js'
import { drawPoint } from 'chart.js/helpers'
import type { Mark } from '../../shared-kinetics/figure/figure.ts'
import { withOpacity, type ChartColours } from './chart-colours.ts'
import { dashOf, strokeOf, type Stroke } from './figure-datasets.ts'

interface Overlay {
  readonly marks: readonly Mark[]
  readonly colours: ChartColours
}

const overlays = new WeakMap<Chart, Overlay>()

/**
 * Marks drawn over a chart without being part of its data: the current level. Moving the level then costs one redraw, with no new datasets,
 * no scales and no layout.
 */
export function setOverlay(chart: Chart, overlay: Overlay): void {
  overlays.set(chart, overlay)
}

export const overlayPlugin: Plugin = {
  id: 'overlay',
  afterDatasetsDraw(chart) {
    const overlay = overlays.get(chart)
    const { x, y } = chart.scales
    if (overlay === undefined || x === undefined || y === undefined) return
    const { ctx, chartArea } = chart
    ctx.save()
    ctx.beginPath()
    ctx.rect(chartArea.left - 7, chartArea.top - 7, chartArea.width + 14, chartArea.height + 14)
    ctx.clip()
    for (const mark of overlay.marks) drawMark(ctx, mark, { x, y }, overlay.colours)
    ctx.restore()
  },
}

interface Scales {
  readonly x: Scale
  readonly y: Scale
}

function drawMark(ctx: CanvasRenderingContext2D, mark: Mark, scales: Scales, colours: ChartColours): void {
  const stroke = strokeOf(mark.tone, colours)
  ctx.strokeStyle = stroke.colour
  ctx.fillStyle = stroke.colour
  ctx.lineWidth = stroke.width
  ctx.setLineDash([...dashOf(mark, stroke)])
  switch (mark.kind) {
    case 'line':
      tracePath(ctx, mark.x, mark.y, scales)
      ctx.stroke()
      return
    case 'points':
      if (mark.joined) {
        tracePath(ctx, mark.x, mark.y, scales)
        ctx.stroke()
      }
      drawPoints(ctx, mark, stroke, scales, colours)
      return
    case 'band':
      tracePath(
        ctx,
        [...Array.from(mark.x), ...Array.from(mark.x).reverse()],
        [...Array.from(mark.lower), ...Array.from(mark.upper).reverse()],
        scales,
      )
      ctx.fillStyle = withOpacity(stroke.colour, 0.15)
      ctx.fill()
      return
    case 'rule':
      drawRule(ctx, mark, scales)
  }
}

function tracePath(ctx: CanvasRenderingContext2D, x: ArrayLike<number>, y: ArrayLike<number>, scales: Scales): void {
  ctx.beginPath()
  let pen = false
  for (let i = 0; i < x.length; i += 1) {
    const [left, top] = [scales.x.getPixelForValue(x[i] ?? Number.NaN), scales.y.getPixelForValue(y[i] ?? Number.NaN)]
    const drawable = Number.isFinite(left) && Number.isFinite(top)
    if (drawable && pen) ctx.lineTo(left, top)
    else if (drawable) ctx.moveTo(left, top)
    pen = drawable
  }
}

function drawPoints(
  ctx: CanvasRenderingContext2D,
  mark: Extract<Mark, { kind: 'points' }>,
  stroke: Stroke,
  scales: Scales,
  colours: ChartColours,
): void {
  ctx.setLineDash([])
  for (let i = 0; i < mark.x.length; i += 1) {
    const [left, top] = [scales.x.getPixelForValue(mark.x[i] ?? Number.NaN), scales.y.getPixelForValue(mark.y[i] ?? Number.NaN)]
    if (!Number.isFinite(left) || !Number.isFinite(top)) continue
    ctx.strokeStyle = stroke.colour
    ctx.lineWidth = 1.6
    drawWhiskers(
      ctx,
      left,
      scales.y.getPixelForValue(mark.lower?.[i] ?? Number.NaN),
      scales.y.getPixelForValue(mark.upper?.[i] ?? Number.NaN),
    )
    // A rim of paper keeps the marker apart from lines that run beneath it.
    ctx.strokeStyle = stroke.marker.hollow ? stroke.colour : colours.paper
    ctx.fillStyle = stroke.marker.hollow ? colours.paper : stroke.colour
    drawPoint(
      ctx,
      {
        pointStyle: stroke.marker.style,
        rotation: stroke.marker.rotation,
        radius: stroke.radius,
        borderWidth: stroke.marker.hollow ? 2 : 1.2,
      },
      left,
      top,
    )
  }
}

function drawWhiskers(ctx: CanvasRenderingContext2D, left: number, low: number, high: number): void {
  if (!Number.isFinite(low) || !Number.isFinite(high)) return
  ctx.beginPath()
  ctx.moveTo(left, low)
  ctx.lineTo(left, high)
  for (const top of [low, high]) {
    ctx.moveTo(left - 5, top)
    ctx.lineTo(left + 5, top)
  }
  ctx.stroke()
}

function drawRule(ctx: CanvasRenderingContext2D, mark: Extract<Mark, { kind: 'rule' }>, scales: Scales): void {
  const { x, y } = scales
  ctx.lineWidth = 1.2
  ctx.beginPath()
  if (mark.along === 'x') {
    const top = y.getPixelForValue(mark.at)
    ctx.moveTo(x.left, top)
    ctx.lineTo(x.right, top)
  } else {
    const left = x.getPixelForValue(mark.at)
    ctx.moveTo(left, y.top)
    ctx.lineTo(left, y.bottom)
  }
  ctx.stroke()
}
