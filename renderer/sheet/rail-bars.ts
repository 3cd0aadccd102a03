import type { Maybe } from '../../shared-kinetics/contract/study-result.ts'
import { decimals } from './format.ts'

/** Tallest bar that is drawn true to scale, in medians of all widths; a wider interval is cut there and marked as cut. */
const tallest = 4
/** Full height is never less than this part of the mean Ea, so that bars of good data look as small as their intervals are. */
const leastPart = 0.05

export interface RailBar {
  /** 0 to 1 of the rail's height; null where the level has no interval. */
  readonly height: number | null
  readonly cut: boolean
}

export interface RailScale {
  /** Half-width of the interval that a bar of full height stands for; 0 where there is no interval. */
  readonly fullHeight: number
  /** Whether full height is the least part of the mean Ea, because no interval is as wide as that. */
  readonly fromMean: boolean
}

/** The rule of the bars' height: full height is the widest interval that is drawn true to scale, and 5 % of the mean Ea at least. */
function railScale(widths: readonly Maybe[], meanEa: Maybe): RailScale {
  const known = widths.filter((width) => width !== null).sort((a, b) => a - b)
  if (known.length === 0) return { fullHeight: 0, fromMean: false }
  const median = known[Math.floor(known.length / 2)] ?? 0
  const greatest = Math.min(known.at(-1) ?? 0, median * tallest)
  const least = meanEa === null ? 0 : leastPart * Math.abs(meanEa)
  return { fullHeight: Math.max(greatest, least), fromMean: least > greatest }
}

/** One bar a level, as tall as its interval is wide. One hopeless level must not flatten all the others, hence the cut. */
export function railBars(widths: readonly Maybe[], meanEa: Maybe = null): readonly RailBar[] {
  const { fullHeight } = railScale(widths, meanEa)
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
  const { fullHeight, fromMean } = railScale(widths, meanEa)
  if (!(fullHeight > 0)) return []
  const cut = railBars(widths, meanEa).filter((bar) => bar.cut).length
  const full = `${decimals(fullHeight, 1)} kJ/mol`
  return [
    `bars: ± 95 %, ${kind}`,
    fromMean ? `full height ${full} (5 % of Ea)` : `${cut === 0 ? 'tallest' : 'full height'} ${full}`,
    ...(cut === 0 ? [] : [`${cut} wider, cut at the dots`]),
  ]
}
