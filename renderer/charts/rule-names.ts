/** A stretch of pixels along one direction. */
export interface Stretch {
  readonly from: number
  readonly to: number
}

/** Room between a rule and its name, in pixels. */
const gap = 4
const lineHeight = 17

export interface UprightRule {
  /** Where it stands, in pixels. */
  readonly at: number
  /** Width of its name in pixels. */
  readonly width: number
}

/** Where an upright rule's name has its middle, and how far it is let down from the top. */
export interface UprightName {
  readonly middle: number
  readonly down: number
}

/**
 * The names of upright rules, each beside its rule and inside the plot: the leftmost of several at its left, the others at their right, on
 * the other side where there is no room, and a line lower where a name would lie over another one.
 */
export function uprightNames(rules: readonly UprightRule[], plot: Stretch): readonly UprightName[] {
  const leftmost = Math.min(...rules.map((rule) => rule.at))
  const taken: (Stretch & { readonly line: number })[] = []
  return rules.map((rule) => {
    const wanted = rules.length > 1 && rule.at === leftmost ? 'left' : 'right'
    const { from, to } = beside(rule, fits(rule, wanted, plot) ? wanted : opposite(wanted))
    let line = 0
    while (taken.some((other) => other.line === line && other.from < to && from < other.to)) line += 1
    taken.push({ from, to, line })
    return { middle: (from + to) / 2, down: line * lineHeight }
  })
}

type Side = 'left' | 'right'
const opposite = (side: Side): Side => (side === 'left' ? 'right' : 'left')

const beside = ({ at, width }: UprightRule, side: Side): Stretch =>
  side === 'left' ? { from: at - gap - width, to: at - gap } : { from: at + gap, to: at + gap + width }

function fits(rule: UprightRule, side: Side, plot: Stretch): boolean {
  const { from, to } = beside(rule, side)
  return from >= plot.from && to <= plot.to
}

/**
 * Where a label about a place along an axis has its middle once it is pushed inside the plot, which the annotations do by themselves.
 *
 * @param padding - kept free at either end
 */
export function pushedInside(at: number, width: number, { from, to }: Stretch, padding: number): number {
  const reach = padding + width / 2
  if (width > to - from) return (from + to) / 2
  const fromLeft = from >= at - reach ? from + reach : at
  return to <= fromLeft + reach ? to - reach : fromLeft
}

/** A point of a curve in pixels. */
export interface PixelPoint {
  readonly x: number
  readonly y: number
}

/** Places looked at along a level rule, from its start. */
const places = 9

/**
 * Where along a level rule its name has its middle so that it keeps farthest from the curves: the first of the places that is as free as the
 * freest, or nearly so.
 */
export function levelName(at: number, width: number, plot: Stretch, curves: readonly PixelPoint[]): number {
  const first = plot.from + gap + width / 2
  const last = plot.to - gap - width / 2
  const candidates = Array.from({ length: places }, (_, i) => first + ((last - first) * i) / (places - 1))
  const room = candidates.map((middle) => clearance({ from: middle - width / 2, to: middle + width / 2 }, at, curves))
  const enough = Math.min(2 * lineHeight, Math.max(...room))
  return candidates[room.findIndex((free) => free >= enough)] ?? first
}

/** Distance in pixels from a name that lies along y = `at` to the nearest point of the curves. */
function clearance({ from, to }: Stretch, at: number, curves: readonly PixelPoint[]): number {
  let nearest = Number.POSITIVE_INFINITY
  for (const { x, y } of curves) {
    const aside = Math.max(0, from - x, x - to)
    const distance = Math.hypot(aside, Math.max(0, Math.abs(y - at) - lineHeight / 2))
    if (distance < nearest) nearest = distance
  }
  return nearest
}
