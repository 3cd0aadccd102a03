import type { Tone } from '../../shared-kinetics/figure/figure.ts'

export const ink = '#1f1b16'
export const softInk = '#6a6257'
export const gridLine = '#e6e0d5'
const faint = '#c2b8a8'
const accent = '#9a3412'

/** Lightness, chroma and hue (OKLCH) of the scale of heating rates on light paper, slow to fast, in equal steps of lightness. */
const runScale: readonly (readonly [number, number, number])[] = [
  [0.42, 0.075, 255],
  [0.475, 0.08, 295],
  [0.53, 0.095, 345],
  [0.585, 0.125, 380],
  [0.64, 0.155, 407],
]

/** The colour of a mark on white paper, as `#rrggbb`. */
export function printColour(tone: Tone): string {
  switch (tone.kind) {
    case 'run':
      return runColour(tone.place)
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

/** The colour at a place of 0 (slowest) to 1 (fastest); between the scale's own colours lightness, chroma and hue go linearly. */
export function runColour(place: number): string {
  const at = Math.min(1, Math.max(0, place)) * (runScale.length - 1)
  const below = Math.min(runScale.length - 2, Math.floor(at))
  const [from, to] = [runScale[below], runScale[below + 1]]
  if (from === undefined || to === undefined) return ink
  const mix = (i: 0 | 1 | 2): number => from[i] + (to[i] - from[i]) * (at - below)
  return oklchToHex(mix(0), mix(1), mix(2))
}

/** sRGB of a colour given in OKLCH: B. Ottosson, "A perceptual color space for image processing" (2020), and CSS Color 4, section 10. */
export function oklchToHex(lightness: number, chroma: number, hue_deg: number): string {
  const [a, b] = [chroma * Math.cos((hue_deg * Math.PI) / 180), chroma * Math.sin((hue_deg * Math.PI) / 180)]
  const l = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3
  const m = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3
  const s = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3
  const linear = [
    4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s,
    -1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s,
    -0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s,
  ]
  return `#${linear.map((part) => hexPair(gamma(Math.min(1, Math.max(0, part))))).join('')}`
}

const gamma = (part: number): number => (part <= 0.0031308 ? 12.92 * part : 1.055 * part ** (1 / 2.4) - 0.055)
const hexPair = (part: number): string =>
  Math.round(part * 255)
    .toString(16)
    .padStart(2, '0')
