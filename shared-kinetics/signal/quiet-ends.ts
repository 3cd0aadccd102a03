import { lineFit } from '../numerics/line-fit.ts'
import { cellMeans, type CellMeans } from './cell-means.ts'
import { noiseOf } from './noise.ts'

/** A stretch of x beside a peak in which the signal runs straight. `inner` is the end near the peak, `outer` the one away from it. */
export interface QuietStretch {
  readonly inner: number
  readonly outer: number
  /** How far the signal strays from its straight line there, as a share of the peak's height. */
  readonly roughness: number
}

export interface QuietEnds {
  readonly apex: number
  /** Height over the chord between the ends of the data, with its sign. */
  readonly height: number
  /** Width at half that height. */
  readonly width: number
  /** null where the signal does not level off before the data end on that side, or leaves too little room for a stretch. */
  readonly before: QuietStretch | null
  readonly after: QuietStretch | null
  /** Whether the signal comes to the foot of its flank before the data end on that side. */
  readonly reachesFoot: { readonly before: boolean; readonly after: boolean }
  /**
   * How high the signal stands where the data end on that side, over the line of the other side, as a share of its largest height over that line. 0 where it comes
   * to its foot.
   */
  readonly standing: { readonly before: number; readonly after: number }
}

/** A peak lower than so many standard deviations of the noise is none. */
export const lowestPeak = 5

const cells = 1000
/** A flank has come to its foot where the signal is less steep than this share of the flank's steepest place. */
const footSteepness = 0.05
/** Roughness below this share of the height, or below three times the noise of the means it is read from, is as good as none. */
const finest = 1e-5
/** Where the data end before a stretch can be as long as the peak is wide, it may be shorter, but not than this share of it: its slope would be chance. */
const shortestInWidths = 0.5
/** A stretch begins at most so many widths of the peak beyond the foot, and is one to so many widths long. */
const mostWidths = 3
const lengthsPerWidth = 4
const placesPerWidth = 20

/**
 * Finds the main peak of a signal and the straight stretches on either side of it, on which tangents can be laid.
 *
 * The apex is where the signal is farthest from the chord between its ends. From there outwards on each side: the foot (5 % of the flank's steepest slope), then
 * of all stretches beyond it, at least as long as the peak is wide at half height, the one whose line can be carried to the apex with the least error. A line that
 * misses the signal by r over a length L is off by about r·(1 + (d/L)²) at a distance d from its middle, and one that cuts into the peak is no baseline. So a clean signal gets a long stretch far enough out that
 * the reaction has not begun there, and a drifting one the least bent stretch near the peak.
 *
 * @param x - ascending, rows `first` to `last` are looked at
 */
export function findQuietEnds(x: Float64Array, y: Float64Array, first: number, last: number): QuietEnds {
  const mean = cellMeans(x, y, first, last, Math.max(10, Math.min(cells, Math.floor((last - first + 1) / 2))))
  const n = mean.x.length
  const chord = aboveChord(mean)
  let apex = 0
  for (let i = 0; i < n; i++) if (Math.abs(chord[i] ?? 0) > Math.abs(chord[apex] ?? 0)) apex = i
  const height = chord[apex] ?? 0
  const up = chord.map((value) => value * Math.sign(height))
  const half = 0.5 * Math.abs(height)
  let left = apex
  while (left > 0 && (up[left] ?? 0) > half) left--
  let right = apex
  while (right < n - 1 && (up[right] ?? 0) > half) right++
  const width = Math.max(3, right - left)
  const cellNoise = noiseOf(x, y, first, last) / Math.sqrt(Math.max(1, mean.samplesPerCell))
  const search = { mean, up, width, height: Math.abs(height), noise: Number.isFinite(cellNoise) ? cellNoise : 0 }
  const feet = { before: footOf(search, left, apex, -1), after: footOf(search, right, apex, 1) }
  const before = feet.before === null ? null : quietSide(search, feet.before, apex, -1)
  const after = feet.after === null ? null : quietSide(search, feet.after, apex, 1)
  return {
    apex: mean.x[apex] ?? Number.NaN,
    height,
    width: width * mean.step,
    before,
    after,
    reachesFoot: { before: feet.before !== null, after: feet.after !== null },
    standing: standingOf(search, feet, before, after),
  }
}

interface Search {
  readonly mean: CellMeans
  /** Signal over the chord, turned so that the peak points up. */
  readonly up: Float64Array
  readonly width: number
  readonly height: number
  readonly noise: number
}

function aboveChord({ x, y }: CellMeans): Float64Array {
  const n = x.length
  const x0 = x[0] ?? 0
  const y0 = y[0] ?? 0
  const slope = ((y[n - 1] ?? 0) - y0) / ((x[n - 1] ?? 1) - x0)
  return y.map((value, i) => value - y0 - slope * ((x[i] ?? 0) - x0))
}

/** The first fifth of a signal is straight where it strays from its line by less than 1 % of its height: by no more than what a baseline may be off (or by four times the noise of its cells). */
const straightPart = 0.2
const straightWithin = 0.01

function standingOf(
  { mean, noise }: Search,
  feet: { readonly before: number | null; readonly after: number | null },
  before: QuietStretch | null,
  after: QuietStretch | null,
): QuietEnds['standing'] {
  if (feet.before !== null && feet.after !== null) return { before: 0, after: 0 }
  // A chord that ends near the top of a cut peak turns the peak upside down, and its feet mean nothing: a start that runs straight then tells more.
  const n = mean.x.length
  const part = Math.max(3, Math.round(straightPart * n))
  const line = lineFit(mean.x.subarray(0, part), mean.y.subarray(0, part))
  const over = mean.y.map((value, i) => Math.abs(value - line.valueAtMean - line.slope * ((mean.x[i] ?? 0) - line.xMean)))
  const most = Math.max(...over)
  if (Math.max(...over.subarray(0, part)) < Math.max(straightWithin * most, 4 * noise))
    return { before: 0, after: (over[n - 1] ?? 0) / most }
  return {
    before: feet.before === null ? standingAt(mean, 'before', after) : 0,
    after: feet.after === null ? standingAt(mean, 'after', before) : 0,
  }
}

/** Without a quiet stretch, an end stands for itself with so much of the cells. */
const outermost = 0.02

/** The height at one end over the line of the other side's quiet stretch, or over the level of the other end; the share it is of the largest such height. */
function standingAt({ x, y }: CellMeans, end: 'before' | 'after', otherSide: QuietStretch | null): number {
  const n = x.length
  const few = Math.max(1, Math.round(outermost * n))
  const edge = (side: 'before' | 'after'): readonly [number, number] => (side === 'before' ? [0, few] : [n - few, n])
  const level = (side: 'before' | 'after'): number => y.subarray(...edge(side)).reduce((sum, value) => sum + value, 0) / few
  const inside = (value: number): boolean =>
    otherSide !== null && value >= Math.min(otherSide.inner, otherSide.outer) && value <= Math.max(otherSide.inner, otherSide.outer)
  const rows = Array.from(x.keys()).filter((i) => inside(x[i] ?? Number.NaN))
  const other = end === 'before' ? 'after' : 'before'
  const line =
    rows.length >= 2
      ? lineFit(
          Float64Array.from(rows, (i) => x[i] ?? Number.NaN),
          Float64Array.from(rows, (i) => y[i] ?? Number.NaN),
        )
      : { xMean: 0, valueAtMean: level(other), slope: 0 }
  const over = y.map((value, i) => value - line.valueAtMean - line.slope * ((x[i] ?? 0) - line.xMean))
  const most = over.reduce((highest, value) => Math.max(highest, Math.abs(value)), 0)
  const [from, to] = edge(end)
  return most > 0 ? Math.abs(over.subarray(from, to).reduce((sum, value) => sum + value, 0)) / few / most : 0
}

function quietSide(search: Search, foot: number, apex: number, outward: -1 | 1): QuietStretch | null {
  const { mean, width } = search
  const n = mean.x.length
  const end = outward < 0 ? 0 : n - 1
  const room = Math.abs(end - foot) + 1
  const shortest = Math.min(width, room)
  if (shortest < shortestInWidths * width) return null
  let best: { inner: number; outer: number; roughness: number } | null = null
  let bestError = Infinity
  const step = Math.max(1, Math.round(width / placesPerWidth))
  for (let away = 0; away <= Math.min(mostWidths * width, room - shortest); away += step) {
    const inner = foot + outward * away
    for (let part = 0; part <= (mostWidths - 1) * lengthsPerWidth; part++) {
      const length = Math.min(Math.round(shortest * (1 + part / lengthsPerWidth)), room - away)
      const outer = inner + outward * (length - 1)
      const rough = roughness(search, inner, outer)
      const noRougher = Math.max(finest * search.height, (3 * search.noise) / Math.sqrt(length / blocks))
      const distance = (Math.abs(apex - 0.5 * (inner + outer)) + 1) / length
      const error = Math.max(rough, noRougher) * (1 + distance * distance)
      if (error < bestError && staysBeneath(search, inner, outer, apex, Math.max(rough, noRougher, 4 * search.noise))) {
        bestError = error
        best = { inner, outer, roughness: rough }
      }
      if (length === room - away) break
    }
  }
  if (best === null) return null
  const x = (cell: number): number => mean.x[cell] ?? Number.NaN
  return { inner: x(best.inner), outer: x(best.outer), roughness: best.roughness / search.height }
}

/** First cell beyond half height where the signal has all but stopped falling away from the peak; null where it never does. */
function footOf({ up, width, mean }: Search, halfHeight: number, apex: number, outward: -1 | 1): number | null {
  const n = mean.x.length
  const reach = Math.max(1, Math.round(width / 10))
  const fall = (i: number): number => {
    const a = Math.max(0, i - reach)
    const b = Math.min(n - 1, i + reach)
    return (-outward * ((up[b] ?? 0) - (up[a] ?? 0))) / ((mean.x[b] ?? 0) - (mean.x[a] ?? 0))
  }
  let steepest = 0
  for (let i = apex; i >= 0 && i < n && Math.abs(i - apex) <= 2 * width; i += outward) steepest = Math.max(steepest, fall(i))
  for (let i = halfHeight; i >= 0 && i < n; i += outward) if (fall(i) < footSteepness * steepest) return i
  return null
}

/** Parts of a stretch whose mean distances from the line are looked at: a slight bend shows in them long before it shows in single noisy cells. */
const blocks = 6

/**
 * How far the cells from `a` to `b` stray from their straight line beyond their noise: by the largest distance of one cell less four times its noise, or by the
 * largest mean distance over a sixth of the stretch, whichever is more.
 */
function roughness({ mean: { x, y }, noise }: Search, a: number, b: number): number {
  const from = Math.min(a, b)
  const length = Math.abs(b - a) + 1
  const line = lineFit(x.subarray(from, from + length), y.subarray(from, from + length))
  let worst = 0
  for (let block = 0; block < blocks; block++) {
    const start = from + Math.floor((block * length) / blocks)
    const end = from + Math.floor(((block + 1) * length) / blocks)
    let sum = 0
    for (let i = start; i < end; i++) {
      const residual = (y[i] ?? 0) - line.valueAtMean - line.slope * ((x[i] ?? 0) - line.xMean)
      sum += residual
      worst = Math.max(worst, Math.abs(residual) - 4 * noise)
    }
    if (end > start) worst = Math.max(worst, Math.abs(sum) / (end - start))
  }
  return worst
}

/** Whether the line of a stretch, carried on to the apex, never cuts into the peak: what lies beyond a baseline is no reaction. */
function staysBeneath({ mean: { x }, up }: Search, inner: number, outer: number, apex: number, tolerance: number): boolean {
  const line = lineFit(
    x.subarray(Math.min(inner, outer), Math.max(inner, outer) + 1),
    up.subarray(Math.min(inner, outer), Math.max(inner, outer) + 1),
  )
  const step = Math.sign(apex - inner)
  for (let i = inner; i !== apex; i += step) {
    if ((up[i] ?? 0) < line.valueAtMean + line.slope * ((x[i] ?? 0) - line.xMean) - tolerance) return false
  }
  return true
}
