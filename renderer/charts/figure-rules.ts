import type { AnnotationOptions } from 'chartjs-plugin-annotation'
import type { Figure } from '../../shared-kinetics/figure/figure.ts'
import type { ChartColours } from './chart-colours.ts'
import { dashOf, strokeOf } from './figure-datasets.ts'
import { chartFont } from './chart-font.ts'

/** The rules of a figure as annotations, each with its name at its end. */
export function rulesOf(figure: Figure, colours: ChartColours): Record<string, AnnotationOptions<'line'>> {
  const rules: Record<string, AnnotationOptions<'line'>> = {}
  const upright = figure.marks.flatMap((mark) => (mark.kind === 'rule' && mark.along === 'y' ? [mark.at] : []))
  const leftmost = Math.min(...upright)
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
        position: 'start',
        backgroundColor: colours.paper,
        color: colour,
        font: { family: chartFont, size: 11.5, weight: 'normal' },
        padding: { x: 4, y: 1 },
        ...(mark.along === 'x' ? { xAdjust: 6 } : beside(mark.name, upright.length > 1 && mark.at === leftmost)),
      },
    }
  }
  return rules
}

/** Puts an upright rule's name to its side, so that the names of two near rules do not cover each other. */
function beside(name: string, left: boolean): { readonly xAdjust: number; readonly yAdjust: number } {
  const width = name.length * 5.4 + 12
  return { xAdjust: left ? -width / 2 - 4 : width / 2 + 4, yAdjust: 4 }
}
