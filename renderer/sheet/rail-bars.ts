import type { Maybe } from '../../shared-kinetics/contract/study-result.ts'
import { decimals } from './format.ts'
import { scientific } from './scientific.ts'

/** Tallest bar that is drawn true to scale, in medians of all widths; a wider interval is cut there and marked as cut. */
const tallest = 4
/** Full height is never less than this part of the mean Ea, or of k, so that bars of good data look as small as their intervals are. */
const leastPart = 0.05

export interface RailBar {
  /** 0 to 1 of the rail's height; null where the level has no interval. */
  readonly height: number | null
  readonly cut: boolean
}

export interface RailScale {
  /** Half-width of the interval that a bar of full height stands for; 0 where there is no interval. */
  readonly fullHeight: number
  /** Whether full height is the least one, because no interval is as wide as that. */
  readonly isLeast: boolean
}

/** The rule of the bars' height: full height is the widest interval that is drawn true to scale, and `least` at least. */
function railScale(widths: readonly Maybe[], least: number): RailScale {
  const known = widths.filter((width) => width !== null).sort((a, b) => a - b)
  if (known.length === 0) return { fullHeight: 0, isLeast: false }
  const median = known[Math.floor(known.length / 2)] ?? 0
  const greatest = Math.min(known.at(-1) ?? 0, median * tallest)
  return { fullHeight: Math.max(greatest, least), isLeast: least > greatest }
}

const leastOfEnergy = (meanEa: Maybe): number => (meanEa === null ? 0 : leastPart * Math.abs(meanEa))

/** One bar a level, as tall as its interval is wide. One hopeless level must not flatten all the others, hence the cut. */
export const railBars = (widths: readonly Maybe[], meanEa: Maybe = null): readonly RailBar[] => barsOf(widths, leastOfEnergy(meanEa))

/** One bar a temperature, as tall as the half-width of its band in ln k. */
export const rateBars = (widths: readonly Maybe[]): readonly RailBar[] => barsOf(widths, Math.log1p(leastPart))

function barsOf(widths: readonly Maybe[], least: number): readonly RailBar[] {
  const { fullHeight } = railScale(widths, least)
  return widths.map((width) => {
    if (width === null) return { height: null, cut: false }
    if (!(fullHeight > 0)) return { height: 0, cut: false }
    return { height: Math.min(1, width / fullHeight), cut: width > fullHeight * (1 + 1e-9) }
  })
}

/**
 * What the bars mean, in two or three short lines; none where there are no intervals.
 *
 * @param kind - of the interval, in a word or two
 */
export function railCaption(widths: readonly Maybe[], meanEa: Maybe, kind: string): readonly string[] {
  const { fullHeight, isLeast } = railScale(widths, leastOfEnergy(meanEa))
  if (!(fullHeight > 0)) return []
  const cut = cutOf(railBars(widths, meanEa))
  const full = `${decimals(fullHeight, 1)} kJ/mol`
  return [
    `bars: ± 95 %, ${kind}`,
    isLeast ? `full height ${full} (5 % of Ea)` : `${cut === 0 ? 'tallest' : 'full height'} ${full}`,
    ...cutWords(cut),
  ]
}

/**
 * The same of bands of k: full height, the widest of them where it is another, and how many are cut.
 *
 * @param widths - half-widths in ln k
 */
export function rateCaption(widths: readonly Maybe[]): readonly string[] {
  const known = widths.filter((width) => width !== null)
  if (known.length === 0) return []
  const { fullHeight, isLeast } = railScale(widths, Math.log1p(leastPart))
  const cut = cutOf(rateBars(widths))
  const widest = shareOfK(Math.max(...known))
  return [
    'bars: ± 95 % of the line',
    ...(isLeast || cut > 0 ? [`full height ${shareOfK(fullHeight)}, widest ${widest}`] : [`tallest ${widest}`]),
    ...cutWords(cut),
  ]
}

const cutOf = (bars: readonly RailBar[]): number => bars.filter((bar) => bar.cut).length
const cutWords = (cut: number): readonly string[] => (cut === 0 ? [] : [`${cut} wider, cut at the dots`])

/** A half-width in ln k as a share of k or, from 100 % on, as the factor that it is. */
function shareOfK(width: number): string {
  if (width >= Math.LN2) return `factor ${scientific(Math.exp(width), 3)}`
  const percent = 100 * Math.expm1(width)
  return percent < 0.05 ? '< 0.1 % of k' : `${decimals(percent, 1)} % of k`
}
