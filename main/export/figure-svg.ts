import type { Axis, Figure, Mark } from '../../shared-kinetics/figure/figure.ts'
import { extentOf, niceAxis, niceStep, niceTicks, tickText } from '../../shared-kinetics/figure/nice-axis.ts'
import { caution } from './caution.ts'
import { gridLine, ink, softInk } from './print-colours.ts'
import { round, svgMark, svgSample, type Plot } from './svg-marks.ts'
import { xmlText } from './xml-text.ts'

/** A quarter of a millimetre is one unit of the drawing, so that text of 12 units prints at 8.5 pt. */
const unitsPerMillimetre = 4
const textSize = 12
const lineHeight = 18
const averageGlyph = 6.3
/** The caution at the foot is set smaller than the rest. */
const footSize = 9.5
const footLineHeight = 13

export interface PrintSize {
  readonly width_mm: number
  readonly height_mm: number
}

/** Width of a column and a half of a journal page; the legend adds its own lines below. */
const defaultPrintSize: PrintSize = { width_mm: 160, height_mm: 105 }

/**
 * A figure as one standalone SVG 1.1 file at print size on white: axes with titles, units and round ticks, the marks, and a legend of every mark
 * but the faint ones. Fonts are asked for by name with a generic one to fall back on; all text is escaped.
 */
export function figureSvg(figure: Figure, size: PrintSize = defaultPrintSize): string {
  const width = size.width_mm * unitsPerMillimetre
  const legend = legendRows(figure.marks, width - 88)
  const noteLines = figure.note === undefined ? [] : [figure.note]
  const foot = linesOf(caution, Math.floor((width - 88) / ((averageGlyph * footSize) / textSize)))
  const heightAboveFoot = size.height_mm * unitsPerMillimetre + (legend.length + noteLines.length) * lineHeight
  const height = heightAboveFoot + (foot.length + 1) * footLineHeight
  const [x, y] = [axisOf(figure, 'x'), axisOf(figure, 'y')]
  const plot = plotOn(width, size.height_mm * unitsPerMillimetre, figure, x, y)
  const parts = [
    `<title>${xmlText(figure.title)}</title>`,
    `<desc>${xmlText(`${figure.description} ${caution}`)}</desc>`,
    `<rect width="${width}" height="${height}" fill="#ffffff"/>`,
    `<clipPath id="plot"><rect x="${plot.left}" y="${plot.top}" width="${plot.right - plot.left}" height="${plot.bottom - plot.top}"/></clipPath>`,
    text(figure.title, plot.left, 22, { family: serif, size: 15, weight: 'bold' }),
    ...x.ticks.map((tick) => gridAndTick('x', tick, x.step, plot)),
    ...y.ticks.map((tick) => gridAndTick('y', tick, y.step, plot)),
    secondAxis(figure.x, plot),
    `<g clip-path="url(#plot)">${inDrawingOrder(figure.marks)
      .map((mark) => svgMark(mark, plot))
      .join('\n')}</g>`,
    `<path d="M${plot.left} ${plot.top}V${plot.bottom}H${plot.right}" fill="none" stroke="${ink}" stroke-width="1"/>`,
    text(axisTitle(figure.x), (plot.left + plot.right) / 2, plot.bottom + 38, { anchor: 'middle' }),
    text(axisTitle(figure.y), 18, (plot.top + plot.bottom) / 2, { anchor: 'middle', turned: true }),
    ...legend.flatMap((row, line) => row.map((entry) => legendEntry(entry, plot.left, plot.bottom + 60 + line * lineHeight))),
    ...noteLines.map((note, line) => text(note, plot.left, plot.bottom + 60 + (legend.length + line) * lineHeight, { colour: softInk })),
    ...foot.map((line, i) => text(line, plot.left, heightAboveFoot + (i + 1) * footLineHeight, { colour: softInk, size: footSize })),
  ]
  return (
    `<?xml version="1.0" encoding="UTF-8"?>\n<svg xmlns="http://www.w3.org/2000/svg" version="1.1" width="${size.width_mm}mm" ` +
    `height="${height / unitsPerMillimetre}mm" viewBox="0 0 ${width} ${height}">\n${parts.filter((part) => part !== '').join('\n')}\n</svg>\n`
  )
}

/** Words in lines of at most so many letters. */
function linesOf(words: string, most: number): readonly string[] {
  const lines: string[] = []
  for (const word of words.split(' ')) {
    const last = lines.at(-1)
    if (last === undefined || last.length + 1 + word.length > most) lines.push(word)
    else lines[lines.length - 1] = `${last} ${word}`
  }
  return lines
}

const isChosenMethod = (mark: Mark): boolean => mark.kind === 'points' && mark.tone.kind === 'method' && mark.tone.index === 0

/** The chosen method comes first in a figure and in its legend, but is drawn over the others. */
const inDrawingOrder = (marks: readonly Mark[]): readonly Mark[] => [
  ...marks.filter((mark) => !isChosenMethod(mark)),
  ...marks.filter(isChosenMethod),
]

interface DrawnAxis {
  readonly min: number
  readonly max: number
  readonly step: number
  readonly ticks: readonly number[]
}

/** Fixed ends are kept as they are; open ones are set around the marks. */
function axisOf(figure: Figure, which: 'x' | 'y'): DrawnAxis {
  const axis = figure[which]
  const around = niceAxis(...extentOf(...figure.marks.map((mark) => valuesOn(mark, which))))
  const [min, max] = [axis.min ?? around.min, axis.max ?? around.max]
  if (!(max > min)) return around
  const count = which === 'x' ? 8 : 6
  return { min, max, step: niceStep((max - min) / count), ticks: niceTicks(min, max, count) }
}

function valuesOn(mark: Mark, which: 'x' | 'y'): number[] {
  if (mark.kind === 'rule') return (mark.along === 'y') === (which === 'x') ? [mark.at] : []
  if (which === 'x') return Array.from(mark.x)
  if (mark.kind === 'band') return [...Array.from(mark.lower), ...Array.from(mark.upper)]
  if (mark.kind === 'line') return Array.from(mark.y)
  return [...Array.from(mark.y), ...Array.from(mark.lower ?? []), ...Array.from(mark.upper ?? [])]
}

function plotOn(width: number, height: number, figure: Figure, x: DrawnAxis, y: DrawnAxis): Plot {
  const widest = Math.max(0, ...y.ticks.map((tick) => tickText(tick, y.step).length))
  const left = Math.round(40 + widest * averageGlyph)
  const [right, top, bottom] = [width - 22, figure.x.second === null ? 38 : 74, height - 52]
  return {
    left,
    right,
    top,
    bottom,
    xAt: (value) => left + ((value - x.min) / (x.max - x.min)) * (right - left),
    yAt: (value) => bottom - ((value - y.min) / (y.max - y.min)) * (bottom - top),
  }
}

function gridAndTick(which: 'x' | 'y', value: number, step: number, plot: Plot): string {
  const label = tickText(value, step)
  if (which === 'x') {
    const x = round(plot.xAt(value))
    return `<path d="M${x} ${plot.top}V${plot.bottom}" stroke="${gridLine}"/>${text(label, x, plot.bottom + 17, { anchor: 'middle' })}`
  }
  const y = round(plot.yAt(value))
  return `<path d="M${plot.left} ${y}H${plot.right}" stroke="${gridLine}"/>${text(label, plot.left - 7, y + 4, { anchor: 'end' })}`
}

function secondAxis(axis: Axis, plot: Plot): string {
  if (axis.second === null) return ''
  const ticks = axis.second.ticks.map(({ at, text: label }) => {
    const x = round(plot.xAt(at))
    return `<path d="M${x} ${plot.top}v-4" stroke="${softInk}"/>${text(label, x, plot.top - 8, { anchor: 'middle', colour: softInk })}`
  })
  const title = text(axisTitle({ ...axis.second }), plot.right, plot.top - 26, { anchor: 'end', colour: softInk })
  return `<path d="M${plot.left} ${plot.top}H${plot.right}" stroke="${softInk}" stroke-width="0.7"/>${ticks.join('')}${title}`
}

interface LegendEntry {
  readonly mark: Mark
  readonly x: number
}

/** Marks that are named once each, in rows that fit the width. */
function legendRows(marks: readonly Mark[], width: number): readonly (readonly LegendEntry[])[] {
  const seen = new Set<string>()
  const rows: LegendEntry[][] = []
  let x = Number.POSITIVE_INFINITY
  for (const mark of marks) {
    if (mark.tone.kind === 'faint' || seen.has(mark.name)) continue
    seen.add(mark.name)
    const room = 32 + mark.name.length * averageGlyph + 16
    if (x + room > width) {
      rows.push([])
      x = 0
    }
    rows.at(-1)?.push({ mark, x })
    x += room
  }
  return rows
}

function legendEntry({ mark, x }: LegendEntry, left: number, y: number): string {
  return `${svgSample(mark, left + x, y)}${text(mark.name, left + x + 32, y + 4, {})}`
}

const axisTitle = ({ label, unit }: { readonly label: string; readonly unit: string }): string =>
  unit === '' ? label : `${label} (${unit})`

const sans = "'Source Sans 3', 'Source Sans Pro', Helvetica, Arial, sans-serif"
const serif = "'Source Serif 4', 'Source Serif Pro', Georgia, serif"

interface TextStyle {
  readonly anchor?: 'middle' | 'end'
  readonly family?: string
  readonly size?: number
  readonly weight?: 'bold'
  readonly colour?: string
  readonly turned?: boolean
}

function text(content: string, x: number, y: number, style: TextStyle): string {
  const attributes = [
    `x="${round(x)}" y="${round(y)}"`,
    `font-family="${style.family ?? sans}" font-size="${style.size ?? textSize}" fill="${style.colour ?? ink}"`,
    style.weight === undefined ? '' : `font-weight="${style.weight}"`,
    style.anchor === undefined ? '' : `text-anchor="${style.anchor}"`,
    style.turned === true ? `transform="rotate(-90 ${round(x)} ${round(y)})"` : '',
  ]
  return `<text ${attributes.filter((attribute) => attribute !== '').join(' ')}>${withRaisedPowers(content)}</text>`
}

/** `T^1.92` with its power raised; everything else as it stands. */
function withRaisedPowers(content: string): string {
  return content
    .split(/(\^[\d.]+)/)
    .map((part, i) => (i % 2 === 0 ? raisedBack(part, i > 0) : `<tspan dy="-4" font-size="9">${xmlText(part.slice(1))}</tspan>`))
    .join('')
}

const raisedBack = (part: string, afterPower: boolean): string =>
  afterPower && part !== '' ? `<tspan dy="4">${xmlText(part)}</tspan>` : xmlText(part)
