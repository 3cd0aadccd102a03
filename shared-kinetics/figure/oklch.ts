/** OKLCH: lightness 0 to 1, chroma, hue in degrees. */
export interface Oklch {
  readonly lightness: number
  readonly chroma: number
  readonly hue: number
}

/**
 * The sRGB colour of an OKLCH colour as `#rrggbb`. Where the colour is outside the gamut its chroma is lowered until it fits, so that lightness
 * and hue, which carry the order, are kept.
 * @source B. Ottosson, "A perceptual color space for image processing" (2020); CSS Color Module Level 4
 */
export function hexOfOklch(colour: Oklch): string {
  let chroma = colour.chroma
  let rgb = linearRgb({ ...colour, chroma })
  while (chroma > 0 && rgb.some((channel) => channel < -1e-4 || channel > 1 + 1e-4)) {
    chroma = Math.max(0, chroma - 0.002)
    rgb = linearRgb({ ...colour, chroma })
  }
  return `#${rgb.map((channel) => byteOf(channel).toString(16).padStart(2, '0')).join('')}`
}

function linearRgb({ lightness, chroma, hue }: Oklch): readonly number[] {
  const angle = (hue * Math.PI) / 180
  const a = chroma * Math.cos(angle)
  const b = chroma * Math.sin(angle)
  const l = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3
  const m = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3
  const s = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3
  return [
    4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s,
    -1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s,
    -0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s,
  ]
}

/** Transfer function of sRGB (IEC 61966-2-1), to a byte. */
function byteOf(channel: number): number {
  const clipped = Math.min(1, Math.max(0, channel))
  const encoded = clipped <= 0.0031308 ? 12.92 * clipped : 1.055 * clipped ** (1 / 2.4) - 0.055
  return Math.round(encoded * 255)
}
