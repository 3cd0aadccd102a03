import { inLanes } from './in-lanes.ts'

/** What else waits for a worker waits no longer than a slice takes. In ms. */
const aimed_ms = 40

export interface Slices<Slice> {
  readonly draws: number
  /** Draws in the first slices, whose speed nobody knows. */
  readonly first: number
  /** In ms. */
  readonly clock: () => number
  /**
   * Makes the draws from one up to another.
   * @param progress - called with 0 when a worker begins, and on the way
   */
  readonly draw: (from: number, to: number, progress: (done: number) => void) => Promise<Slice>
  readonly report: (done: number) => void
}

/**
 * The draws of all slices, in order. A slice is as many draws as take about 40 ms by the time that the one before took: one that took longer makes the next ones shorter at once,
 * while they grow to no more than twice its size, so that one quick slice does not make a slow one. Which draws stand in one slice changes no number: each has a random stream of
 * its own.
 */
export async function drawInSlices<Slice>({ draws, first, clock, draw, report }: Slices<Slice>): Promise<Slice[]> {
  const slices: Slice[] = []
  let size = Math.max(1, Math.floor(first))
  let next = 0
  let allDrawn = 0

  const drawSlice = async (slice: number, from: number, to: number): Promise<void> => {
    let started = Number.NaN
    let drawn = 0
    const tell = (done: number): void => {
      // Time spent waiting for a worker says nothing about the speed of drawing.
      if (Number.isNaN(started)) started = clock()
      allDrawn += done - drawn
      drawn = done
      report(allDrawn)
    }
    slices[slice] = await draw(from, to, tell)
    const took_ms = clock() - started
    if (took_ms > 0) size = sizeAfter(to - from, took_ms)
    tell(to - from)
  }

  let begun = 0
  await inLanes(() => {
    if (next >= draws) return null
    const from = next
    next = Math.min(draws, from + size)
    return drawSlice(begun++, from, next)
  })
  return slices
}

const sizeAfter = (size: number, took_ms: number): number => Math.max(1, Math.min(2 * size, Math.floor((size * aimed_ms) / took_ms)))
