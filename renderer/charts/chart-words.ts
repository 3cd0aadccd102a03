import type { Axis, Figure, Mark } from '../../shared-kinetics/figure/figure.ts'

/**
 * What stands out in a chart, in words: single points with both their readings, rules, and the line in ink. Curves are left to the table
 * beside the chart. For people who hear the screen.
 */
export function chartWords(figure: Figure, overlay: readonly Mark[]): string {
  return [...figure.marks, ...overlay].flatMap((mark) => wordsOf(figure, mark)).join('; ')
}

function wordsOf({ x, y }: Figure, mark: Mark): readonly string[] {
  switch (mark.kind) {
    case 'points':
      return mark.x.length === 1 ? [`${mark.name}: ${reading(x, mark.x[0])}, ${reading(y, mark.y[0])}`] : []
    case 'rule':
      return [`${mark.name}: ${mark.along === 'y' ? reading(x, mark.at) : reading(y, mark.at)}`]
    case 'line':
      return mark.tone.kind === 'ink' ? [mark.name] : []
    case 'band':
      return []
  }
}

function reading(axis: Axis, value: number | undefined): string {
  const number = value === undefined || !Number.isFinite(value) ? 'none' : String(Number(value.toPrecision(5)))
  return `${axis.label} ${number}${axis.unit === '' ? '' : ` ${axis.unit}`}`
}
