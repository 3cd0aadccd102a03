import type { Chart, Plugin } from 'chart.js'
import type { Axis, Figure } from '../../shared-kinetics/figure/figure.ts'
import type { ChartColours } from './chart-colours.ts'
import { chartFont } from './chart-font.ts'

interface AxisText {
  readonly figure: Figure
  readonly colours: ChartColours
}

const texts = new WeakMap<Chart, AxisText>()
export const setAxisText = (chart: Chart, text: AxisText): void => {
  texts.set(chart, text)
}

const titleSize = 12.5
const tickSize = 12

/** `Ea (kJ/mol)`, or the label alone for a pure number. */
export const axisTitle = (axis: Axis): string => (axis.unit === '' ? axis.label : `${axis.label} (${axis.unit})`)

/** Axis titles with raised exponents (`T^1.92`), and the second reading along the opposite edge; Chart.js itself has neither. */
export const axisTextPlugin: Plugin = {
  id: 'axis-text',
  afterDraw(chart) {
    const text = texts.get(chart)
    const { x, y } = chart.scales
    if (text === undefined || x === undefined || y === undefined) return
    const { ctx, chartArea } = chart
    ctx.save()
    ctx.fillStyle = text.colours.softInk
    ctx.textBaseline = 'alphabetic'
    const middle = (chartArea.left + chartArea.right) / 2
    drawRaised(ctx, axisTitle(text.figure.x), middle, chart.height - 3)
    ctx.save()
    ctx.translate(titleSize, (chartArea.top + chartArea.bottom) / 2)
    ctx.rotate(-Math.PI / 2)
    drawRaised(ctx, axisTitle(text.figure.y), 0, 0)
    ctx.restore()
    const { second } = text.figure.x
    if (second !== null) {
      ctx.font = `${tickSize}px ${chartFont}`
      ctx.textAlign = 'center'
      let free = Number.NEGATIVE_INFINITY
      for (const tick of second.ticks) {
        const left = x.getPixelForValue(tick.at)
        const label = `${tick.text} ${second.unit}`
        const half = ctx.measureText(label).width / 2
        if (left < x.left - 1 || left > x.right + 1 || left - half < free) continue
        ctx.fillText(label, left, chartArea.top - 8)
        free = left + half + 10
      }
    }
    ctx.restore()
  },
}

const partFont = (i: number): string => `${i % 2 === 1 ? titleSize * 0.72 : titleSize}px ${chartFont}`

/** Text centred at a place; what follows `^` up to the next mark that is no number is raised and smaller. */
function drawRaised(ctx: CanvasRenderingContext2D, text: string, centre: number, baseline: number): void {
  const parts = text.split(/\^([\d.]+)/)
  const widths = parts.map((part, i) => {
    ctx.font = partFont(i)
    return ctx.measureText(part).width
  })
  let left = centre - widths.reduce((sum, width) => sum + width, 0) / 2
  ctx.textAlign = 'left'
  for (const [i, part] of parts.entries()) {
    ctx.font = partFont(i)
    ctx.fillText(part, left, i % 2 === 1 ? baseline - titleSize * 0.36 : baseline)
    left += widths[i] ?? 0
  }
}
