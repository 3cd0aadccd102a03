import type { Tone } from '../../shared-kinetics/figure/figure.ts'
import { runColour } from '../../shared-kinetics/figure/run-scale.ts'

export const ink = '#1f1b16'
export const softInk = '#6a6257'
export const gridLine = '#e6e0d5'
const faint = '#c2b8a8'
const accent = '#9a3412'

/** The colour of a mark on white paper, as `#rrggbb`. */
export function printColour(tone: Tone): string {
  switch (tone.kind) {
    case 'run':
      return runColour(tone.place, 'light')
    case 'method':
      return tone.index === 0 ? accent : softInk
    case 'ink':
      return ink
    case 'faint':
      return faint
    case 'accent':
      return accent
  }
}
