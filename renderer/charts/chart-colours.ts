import { runColour, type Paper } from '../../shared-kinetics/figure/run-scale.ts'

/** What a chart paints with: the sheet's own tokens, and the scale of runs for its paper. */
export interface ChartColours {
  readonly paper: string
  readonly ink: string
  readonly softInk: string
  readonly hairline: string
  readonly grid: string
  readonly faint: string
  readonly accent: string
  readonly run: (place: number) => string
}

/** Reads the tokens that `styles/tokens.css` gives the element, so that each colour stands once. */
export function chartColoursOf(element: Element, paper: Paper): ChartColours {
  const tokens = getComputedStyle(element)
  const token = (name: string): string => tokens.getPropertyValue(name).trim()
  return {
    paper: token('--paper'),
    ink: token('--ink'),
    softInk: token('--ink-soft'),
    hairline: token('--hairline'),
    grid: token('--grid'),
    faint: token('--faint-mark'),
    accent: token('--accent'),
    run: (place) => runColour(place, paper),
  }
}

/** The colour with an opacity, as `#rrggbbaa`; other notations are returned as they are. */
export function withOpacity(colour: string, opacity: number): string {
  if (!/^#[0-9a-f]{6}$/i.test(colour)) return colour
  return (
    colour +
    Math.round(opacity * 255)
      .toString(16)
      .padStart(2, '0')
  )
}
