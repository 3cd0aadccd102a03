import type { AnnotationOptions } from 'chartjs-plugin-annotation'
import type { Figure } from '../../shared-kinetics/figure/figure.ts'
import type { ChartColours } from './chart-colours.ts'
import { dashOf, strokeOf } from './figure-datasets.ts'
import { chartFont } from './chart-font.ts'

/** The rules of a figure as annotations, each with its name at its end. */
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
        position: mark.along === 'x' ? 'start' : 'end',
        backgroundColor: colours.paper,
        color: colour,
        font: { family: chartFont, size: 11.5, weight: 'normal' },
        padding: { x: 4, y: 1 },
        xAdjust: mark.along === 'x' ? 6 : 0,
      },
    }
  }
  return rules
}
