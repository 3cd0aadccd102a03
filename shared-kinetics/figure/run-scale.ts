import { hexOfOklch, type Oklch } from './oklch.ts'

export type Paper = 'light' | 'dark'

/** From slate blue (slow) to ember (fast), in equal steps of lightness. Hue and chroma are those of both papers; dark paper needs more light. */
const stops: readonly { readonly chroma: number; readonly hue: number }[] = [
  { chroma: 0.075, hue: 255 },
  { chroma: 0.08, hue: 295 },
  { chroma: 0.095, hue: 345 },
  { chroma: 0.125, hue: 380 },
  { chroma: 0.155, hue: 407 },
]
const lightnessOf: Readonly<Record<Paper, readonly [number, number]>> = { light: [0.42, 0.64], dark: [0.6, 0.82] }

/** The colour of a run: `place` 0 is the slowest programme, 1 the fastest; between two stops it is interpolated. */
export function runColour(place: number, paper: Paper): string {
  return hexOfOklch(runOklch(place, paper))
}

function runOklch(place: number, paper: Paper): Oklch {
  const at = Math.min(1, Math.max(0, place)) * (stops.length - 1)
  const lower = stops[Math.min(stops.length - 2, Math.floor(at))]
  const upper = stops[Math.min(stops.length - 1, Math.floor(at) + 1)]
  if (lower === undefined || upper === undefined) throw new RangeError('the scale of runs has no stops')
  const part = at - Math.min(stops.length - 2, Math.floor(at))
  const [darkest, lightest] = lightnessOf[paper]
  const between = (a: number, b: number): number => a + (b - a) * part
  return {
    lightness: darkest + ((lightest - darkest) * at) / (stops.length - 1),
    chroma: between(lower.chroma, upper.chroma),
    hue: between(lower.hue, upper.hue) % 360,
  }
}
