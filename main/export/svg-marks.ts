import type { Mark, Tone } from '../../shared-kinetics/figure/figure.ts'
import { printColour } from './print-colours.ts'

/** Where a plot stands on its page, and how its values come there. */
export interface Plot {
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
  readonly xAt: (value: number) => number
  readonly yAt: (value: number) => number
}

const methodDashes = ['', '1.5 3', '7 3', '7 3 1.5 3', '12 3', '3 2']

/** One mark as SVG elements. A number that is not finite leaves a gap. */
export function svgMark(mark: Mark, plot: Plot): string {
  const colour = printColour(mark.tone)
  switch (mark.kind) {
    case 'line':
      return stroke(brokenPath(placed(mark.x, mark.y, plot)), colour, widthOf(mark.tone), dashOf(mark.tone, mark.dash))
    case 'rule': {
      const [x, y] = [round(plot.xAt(mark.at)), round(plot.yAt(mark.at))]
      const path = mark.along === 'x' ? `M${plot.left} ${y}H${plot.right}` : `M${x} ${plot.top}V${plot.bottom}`
      return stroke(path, colour, 1, dashOf(mark.tone, mark.dash))
    }
    case 'band':
      return stretches(placed(mark.x, mark.upper, plot), placed(mark.x, mark.lower, plot))
        .map((path) => `<path d="${path}" fill="${colour}" fill-opacity="0.14"/>`)
        .join('')
    case 'points': {
      const places = placed(mark.x, mark.y, plot)
      const line = mark.joined ? stroke(brokenPath(places), colour, widthOf(mark.tone), dashOf(mark.tone, undefined)) : ''
      const bars = errorBars(mark, plot, colour)
      return `${line}${bars}${places.map((place) => (place === null ? '' : svgMarker(mark.tone, place.x, place.y))).join('')}`
    }
  }
}

/** The marker of a tone: each run and each method has its own shape, so that none is told by colour alone. */
function svgMarker(tone: Tone, x: number, y: number): string {
  const colour = printColour(tone)
  if (tone.kind === 'faint') return `<path d="${shape(0, x, y, 1.3)}" fill="${colour}"/>`
  const index = tone.kind === 'run' || tone.kind === 'method' ? tone.index : 0
  const hollow = tone.kind === 'method' || index >= shapes
  return `<path d="${shape(index % shapes, x, y, 3.6)}" fill="${hollow ? '#ffffff' : colour}" stroke="${colour}" stroke-width="1.2"/>`
}

/** The sample of a mark that stands in a legend, 24 wide from `x`. */
export function svgSample(mark: Mark, x: number, y: number): string {
  const colour = printColour(mark.tone)
  const line = (dash: string): string => stroke(`M${x} ${y}H${x + 24}`, colour, widthOf(mark.tone), dash)
  switch (mark.kind) {
    case 'band':
      return `<path d="M${x} ${y - 5}h24v10h-24z" fill="${colour}" fill-opacity="0.14"/>`
    case 'rule':
    case 'line':
      return line(dashOf(mark.tone, mark.dash))
    case 'points':
      return `${mark.joined ? line(dashOf(mark.tone, undefined)) : ''}${svgMarker(mark.tone, x + 12, y)}`
  }
}

type Place = { readonly x: number; readonly y: number } | null

function placed(x: ArrayLike<number>, y: ArrayLike<number>, plot: Plot): readonly Place[] {
  return Array.from({ length: Math.min(x.length, y.length) }, (_, i) => {
    const [px, py] = [plot.xAt(x[i] ?? Number.NaN), plot.yAt(y[i] ?? Number.NaN)]
    return Number.isFinite(px) && Number.isFinite(py) ? { x: round(px), y: round(py) } : null
  })
}

function brokenPath(places: readonly Place[]): string {
  return places.map((place, i) => (place === null ? '' : `${places[i - 1] === null || i === 0 ? 'M' : 'L'}${place.x} ${place.y}`)).join('')
}

/** Closed outlines between two edges, one for each stretch without a gap. */
function stretches(upper: readonly Place[], lower: readonly Place[]): readonly string[] {
  const paths: string[] = []
  let there: string[] = []
  let back: string[] = []
  const close = (): void => {
    if (there.length > 1) paths.push(`M${there.join('L')}L${back.toReversed().join('L')}Z`)
    there = []
    back = []
  }
  for (const [i, above] of upper.entries()) {
    const below = lower[i] ?? null
    if (above === null || below === null) {
      close()
      continue
    }
    there.push(`${above.x} ${above.y}`)
    back.push(`${below.x} ${below.y}`)
  }
  close()
  return paths
}

function errorBars(mark: Extract<Mark, { kind: 'points' }>, plot: Plot, colour: string): string {
  if (mark.lower === undefined || mark.upper === undefined) return ''
  const lower = placed(mark.x, mark.lower, plot)
  return placed(mark.x, mark.upper, plot)
    .map((above, i) => {
      const below = lower[i] ?? null
      return above === null || below === null ? '' : stroke(`M${above.x} ${above.y}V${below.y}`, colour, 1, '')
    })
    .join('')
}

function stroke(path: string, colour: string, width: number, dash: string): string {
  if (path === '') return ''
  const dashes = dash === '' ? '' : ` stroke-dasharray="${dash}"`
  return `<path d="${path}" fill="none" stroke="${colour}" stroke-width="${width}" stroke-linejoin="round"${dashes}/>`
}

const widthOf = (tone: Tone): number => (tone.kind === 'faint' ? 0.7 : 1.4)

function dashOf(tone: Tone, dash: 'dashed' | 'dotted' | undefined): string {
  if (dash === 'dashed') return '6 4'
  if (dash === 'dotted') return '1.5 3'
  return tone.kind === 'method' ? (methodDashes[tone.index % methodDashes.length] ?? '') : ''
}

const shapes = 6

/** Circle, square, triangle up, diamond, triangle down, plus: outlines of about the same area. */
function shape(kind: number, x: number, y: number, size: number): string {
  const at = (dx: number, dy: number): string => `${round(x + dx * size)} ${round(y + dy * size)}`
  const polygon = (...corners: readonly (readonly [number, number])[]): string => `M${corners.map(([dx, dy]) => at(dx, dy)).join('L')}Z`
  switch (kind) {
    case 1:
      return polygon([-0.9, -0.9], [0.9, -0.9], [0.9, 0.9], [-0.9, 0.9])
    case 2:
      return polygon([0, -1.15], [1.1, 0.85], [-1.1, 0.85])
    case 3:
      return polygon([0, -1.3], [1.1, 0], [0, 1.3], [-1.1, 0])
    case 4:
      return polygon([0, 1.15], [1.1, -0.85], [-1.1, -0.85])
    case 5: {
      const [a, b] = [0.35, 1.15]
      return polygon([-a, -b], [a, -b], [a, -a], [b, -a], [b, a], [a, a], [a, b], [-a, b], [-a, a], [-b, a], [-b, -a], [-a, -a])
    }
    default: {
      const r = round(size)
      return `M${at(-1, 0)}a${r} ${r} 0 1 0 ${2 * r} 0a${r} ${r} 0 1 0 ${-2 * r} 0Z`
    }
  }
}

export const round = (value: number): number => Math.round(value * 100) / 100
