import type { Chart } from 'chart.js'
import type { AnnotationOptions } from 'chartjs-plugin-annotation'
import type { Figure, Mark } from '../../shared-kinetics/figure/figure.ts'
import type { ChartColours } from './chart-colours.ts'
import { chartFont } from './chart-font.ts'
import { dashOf, strokeOf } from './figure-datasets.ts'
import { levelName, pushedInside, uprightNames, type PixelPoint } from './rule-names.ts'

type Rule = Extract<Mark, { kind: 'rule' }>

const nameSize = 11.5
const nameFont = `${nameSize}px ${chartFont}`
/** Of the label about its text. */
const padding = { x: 4, y: 1 }

/** The rules of a figure as annotations, each with its name beside it and inside the plot. */
export function rulesOf(figure: Figure, colours: ChartColours): Record<string, AnnotationOptions<'line'>> {
  const rules: Record<string, AnnotationOptions<'line'>> = {}
  for (const [i, mark] of figure.marks.entries()) {
    if (mark.kind !== 'rule') continue
    const stroke = strokeOf(mark.tone, colours)
    const colour = mark.tone.kind === 'faint' ? colours.softInk : stroke.colour
    rules[`rule-${i}`] = {
      type: 'line',
      scaleID: mark.along === 'x' ? 'y' : 'x',
      value: mark.at,
      borderColor: colour,
      borderWidth: 1.2,
      borderDash: [...dashOf(mark, stroke)],
      label: {
        display: true,
        content: mark.name,
        position: mark.along === 'x' ? 'center' : 'start',
        backgroundColor: colours.paper,
        color: colour,
        font: { family: chartFont, size: nameSize, weight: 'normal' },
        padding,
        // Where a name fits is known only once the chart is laid out.
        xAdjust: ({ chart }) => adjustment(chart, figure, mark).x,
        yAdjust: ({ chart }) => adjustment(chart, figure, mark).y,
      },
    }
  }
  return rules
}

/** From where the annotation would put the name (on the rule) to where it stands. */
function adjustment(chart: Chart, figure: Figure, rule: Rule): { readonly x: number; readonly y: number } {
  const { x, y } = chart.scales
  if (x === undefined || y === undefined) return { x: 0, y: 0 }
  const plot = { from: x.left, to: x.right }
  if (rule.along === 'x') {
    const middle = levelName(y.getPixelForValue(rule.at), widthOf(chart, rule), plot, curvesInPixels(chart, figure))
    return { x: middle - (x.left + x.right) / 2, y: 0 }
  }
  const upright = figure.marks.filter((mark) => mark.kind === 'rule').filter((mark) => mark.along === 'y')
  const names = uprightNames(
    upright.map((mark) => ({ at: x.getPixelForValue(mark.at), width: widthOf(chart, mark) })),
    plot,
  )
  const name = names[upright.indexOf(rule)]
  if (name === undefined) return { x: 0, y: 0 }
  return { x: name.middle - pushedInside(x.getPixelForValue(rule.at), widthOf(chart, rule), plot, padding.x), y: 4 + name.down }
}

function widthOf({ ctx }: Chart, { name }: Rule): number {
  ctx.save()
  ctx.font = nameFont
  const { width } = ctx.measureText(name)
  ctx.restore()
  return width + 2 * padding.x
}

function curvesInPixels(chart: Chart, figure: Figure): readonly PixelPoint[] {
  const { x, y } = chart.scales
  if (x === undefined || y === undefined) return []
  return figure.marks.flatMap((mark) =>
    mark.kind === 'line' || mark.kind === 'points'
      ? Array.from(mark.x, (abscissa, i) => ({
          x: x.getPixelForValue(abscissa),
          y: y.getPixelForValue(mark.y[i] ?? Number.NaN),
        })).filter((point) => Number.isFinite(point.x) && Number.isFinite(point.y))
      : [],
  )
}
