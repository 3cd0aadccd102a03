import { describe, expect, it } from 'vitest'
import { hexOfOklch } from './oklch.ts'
import { runColour, type Paper } from './run-scale.ts'

type Triple = readonly [number, number, number]

const channels = (hex: string): Triple => {
  const value = Number.parseInt(hex.slice(1), 16)
  return [(value >> 16) / 255, ((value >> 8) & 255) / 255, (value & 255) / 255]
}
const linear = (channel: number): number => (channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4)
const times = (m: readonly Triple[], [x, y, z]: Triple): Triple => m.map((row) => row[0] * x + row[1] * y + row[2] * z) as unknown as Triple

/** WCAG 2.2, "relative luminance" and "contrast ratio". */
const luminance = (hex: string): number => {
  const [r, g, b] = channels(hex).map(linear) as unknown as Triple
  return 0.2126 * r + 0.7152 * g + 0.0722 * b
}
const contrast = (a: string, b: string): number => {
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y) as [number, number]
  return (high + 0.05) / (low + 0.05)
}

const labRoot = (t: number): number => (t > 216 / 24389 ? Math.cbrt(t) : ((24389 / 27) * t + 16) / 116)

/** CIE L* a* b* from linear sRGB, D65 (IEC 61966-2-1 matrix; CIE 15). A second colour space, so that OKLCH does not judge itself. */
const lab = (rgb: Triple): Triple => {
  const [X, Y, Z] = times(
    [
      [0.4124564, 0.3575761, 0.1804375],
      [0.2126729, 0.7151522, 0.072175],
      [0.0193339, 0.119192, 0.9503041],
    ],
    rgb,
  )
  const [fx, fy, fz] = [labRoot(X / 0.95047), labRoot(Y), labRoot(Z / 1.08883)]
  return [116 * fy - 16, 500 * (fx - fy), 200 * (fy - fz)]
}
const distance = (a: Triple, b: Triple): number => Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2])

/** G. M. Machado, M. M. Oliveira, L. A. F. Fernandes, IEEE Trans. Vis. Comput. Graph. 15 (2009) 1291, severity 1.0, on linear sRGB. */
const colourBlindness: Readonly<Record<string, readonly Triple[]>> = {
  protanopia: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deuteranopia: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  tritanopia: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.3039],
  ],
}

const papers: Readonly<Record<Paper, string>> = { light: '#faf7f1', dark: '#191613' }
const places = [0, 0.25, 0.5, 0.75, 1]
const steps = (values: readonly number[]): number[] => values.slice(1).map((value, i) => value - (values[i] ?? 0))
const clamp = (rgb: Triple): Triple => rgb.map((c) => Math.min(1, Math.max(0, c))) as unknown as Triple

describe('OKLCH to sRGB', () => {
  it.each([
    ['red', 0.62796, 0.25768, 29.234, '#ff0000'],
    ['green', 0.51975, 0.17686, 142.495, '#008000'],
    ['lime', 0.86644, 0.294827, 142.4953, '#00ff00'],
    ['blue', 0.452014, 0.313214, 264.052, '#0000ff'],
    ['white', 1, 0, 0, '#ffffff'],
    ['black', 0, 0, 0, '#000000'],
  ])('gives %s of CSS Color 4', (_name, lightness, chroma, hue, hex) => {
    expect(hexOfOklch({ lightness, chroma, hue })).toBe(hex)
  })
})

describe.each(['light', 'dark'] as const)('colours of runs on %s paper', (paper) => {
  const colours = places.map((place) => runColour(place, paper))
  const linearColours = colours.map((hex) => channels(hex).map(linear) as unknown as Triple)

  it('get lighter from slow to fast in equal steps of perceived lightness (CIE L*, within 1.5)', () => {
    const lightness = steps(linearColours.map((rgb) => lab(rgb)[0]))
    const mean = lightness.reduce((sum, step) => sum + step, 0) / lightness.length
    expect(mean).toBeGreaterThan(4)
    expect(Math.max(...lightness.map((step) => Math.abs(step - mean)))).toBeLessThan(1.5)
  })

  it('stand out from the paper by 3:1 or more (WCAG 2.2, 1.4.11)', () => {
    const contrasts = Array.from({ length: 21 }, (_, i) => contrast(runColour(i / 20, paper), papers[paper]))
    expect(Math.min(...contrasts)).toBeGreaterThanOrEqual(3)
  })

  it.each(Object.entries(colourBlindness))('stay apart, neighbour from neighbour, under %s', (_name, matrix) => {
    const seen = linearColours.map((rgb) => lab(clamp(times(matrix, rgb))))
    const apart = seen.slice(1).map((colour, i) => distance(colour, seen[i] ?? colour))
    // CIE76: 2.3 is a just noticeable difference side by side (M. Mahy et al., Color Res. Appl. 19 (1994) 105); lines need twice that.
    expect(Math.min(...apart)).toBeGreaterThan(5)
  })

  it('are placed on the scale beyond its ends as at its ends', () => {
    expect(runColour(-1, paper)).toBe(runColour(0, paper))
    expect(runColour(2, paper)).toBe(runColour(1, paper))
  })
})
