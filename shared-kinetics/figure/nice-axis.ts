/** Round ends and tick places of a linear axis. */
export interface NiceAxis {
  readonly min: number
  readonly max: number
  readonly step: number
  readonly ticks: readonly number[]
}

/**
 * Ends and ticks at 1, 2 or 5 times a power of ten, so that the ends enclose `low` to `high` and about `count` steps lie between them.
 * Numbers that are not finite give the axis 0 to 1.
 */
export function niceAxis(low: number, high: number, count = 6): NiceAxis {
  if (!Number.isFinite(low) || !Number.isFinite(high)) return niceAxis(0, 1, count)
  const [from, to] = spread(Math.min(low, high), Math.max(low, high))
  const step = niceStep((to - from) / count)
  const min = trim(Math.floor(from / step + 1e-9) * step)
  const max = trim(Math.ceil(to / step - 1e-9) * step)
  return { min, max, step, ticks: ticksBetween(min, max, step) }
}

/** The ticks of a fixed range: multiples of a round step inside it, ends included. */
export function niceTicks(min: number, max: number, count = 6): readonly number[] {
  if (!Number.isFinite(min) || !Number.isFinite(max) || !(max > min)) return []
  return ticksBetween(min, max, niceStep((max - min) / count))
}

/** A tick as text: as many decimals as its step needs, a true minus sign. */
export function tickText(value: number, step: number): string {
  const magnitude = Math.abs(value)
  if (magnitude >= 1e7 || (magnitude > 0 && magnitude < 1e-4)) return withMinus(value.toExponential(1).replace('e+', 'e'))
  const decimals = Math.max(0, Math.min(8, -Math.floor(Math.log10(step) + 1e-9)))
  return withMinus(value.toFixed(decimals))
}

/** A level of conversion as text, without the digits that binary arithmetic adds: `0.15`. */
export const levelText = (level: number): string => String(Number(level.toPrecision(6)))

/** The smallest of 1, 2, 5 times a power of ten that is at least `rough`. */
export function niceStep(rough: number): number {
  if (!(rough > 0)) return 1
  const power = 10 ** Math.floor(Math.log10(rough))
  const factor = [1, 2, 5, 10].find((candidate) => candidate * power >= rough * (1 - 1e-9)) ?? 10
  return trim(factor * power)
}

/** Least and greatest finite number of several arrays; NaN where there is none. */
export function extentOf(...columns: readonly Iterable<number | null>[]): readonly [number, number] {
  let low = Number.POSITIVE_INFINITY
  let high = Number.NEGATIVE_INFINITY
  for (const values of columns) {
    for (const value of values) {
      if (value === null || !Number.isFinite(value)) continue
      if (value < low) low = value
      if (value > high) high = value
    }
  }
  return low <= high ? [low, high] : [Number.NaN, Number.NaN]
}

/** A range of no width is widened, or an axis would have no length. */
function spread(low: number, high: number): readonly [number, number] {
  const width = high - low
  if (width > Math.max(Math.abs(low), Math.abs(high)) * 1e-12) return [low, high]
  const half = low === 0 ? 1 : Math.abs(low) * 0.05
  return [low - half, high + half]
}

function ticksBetween(min: number, max: number, step: number): readonly number[] {
  const first = Math.ceil(min / step - 1e-9)
  const last = Math.floor(max / step + 1e-9)
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => trim((first + i) * step))
}

/** Takes off the digits that binary arithmetic adds to round numbers; -0 becomes 0. */
const trim = (value: number): number => Number(value.toPrecision(12)) + 0
const withMinus = (text: string): string => text.replaceAll('-', '−')
