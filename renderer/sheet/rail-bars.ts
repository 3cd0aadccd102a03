import type { Maybe } from '../../shared-kinetics/contract/study-result.ts'

/** Tallest bar that is drawn true to scale, in medians of all widths; a wider interval is cut there and marked as cut. */
const tallest = 4

export interface RailBar {
  /** 0 to 1 of the rail's height; null where the level has no interval. */
  readonly height: number | null
  readonly cut: boolean
}

/** One bar a level, as tall as its interval is wide. One hopeless level must not flatten all the others, hence the cut. */
export function railBars(widths: readonly Maybe[]): readonly RailBar[] {
  const known = widths.filter((width) => width !== null).sort((a, b) => a - b)
  const median = known[Math.floor(known.length / 2)] ?? 0
  const greatest = Math.min(known.at(-1) ?? 0, median * tallest)
  return widths.map((width) => {
    if (width === null) return { height: null, cut: false }
    if (!(greatest > 0)) return { height: 0, cut: false }
    return { height: Math.min(1, width / greatest), cut: width > greatest * (1 + 1e-9) }
  })
}
