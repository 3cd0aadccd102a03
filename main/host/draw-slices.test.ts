import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { drawInSlices } from './draw-slices.ts'

beforeEach(() => {
  vi.useFakeTimers()
})
afterEach(() => {
  vi.useRealTimers()
})

const wait = async (ms: number): Promise<void> => new Promise((resolve) => setTimeout(resolve, ms))

interface Slice {
  readonly from: number
  readonly to: number
  readonly took_ms: number
}

/** Slices of draws that take `msOf(draw)` each, on fake time, begun after `queue_ms` of waiting for a worker. */
async function sliced(
  draws: number,
  first: number,
  msOf: (draw: number) => number,
  queue_ms = 0,
): Promise<{ readonly slices: readonly Slice[]; readonly reports: readonly number[]; readonly most: number }> {
  const reports: number[] = []
  let atWork = 0
  let most = 0
  const all = drawInSlices<Slice>({
    draws,
    first,
    clock: () => Date.now(),
    draw: async (from, to, progress) => {
      most = Math.max(most, ++atWork)
      await wait(queue_ms)
      progress(0)
      const took_ms = Array.from({ length: to - from }, (_, i) => msOf(from + i)).reduce((sum, ms) => sum + ms, 0)
      await wait(took_ms)
      atWork--
      return { from, to, took_ms }
    },
    report: (done) => {
      reports.push(done)
    },
  })
  await vi.runAllTimersAsync()
  return { slices: await all, reports, most }
}

const sizesOf = (slices: readonly Slice[]): number[] => slices.map(({ from, to }) => to - from)

describe('draws in slices', () => {
  it.each([
    ['quick', 2000, 29, 0.5],
    ['slow', 300, 4, 8],
    ['slower than expected', 200, 100, 3],
    ['longer than a slice should take, each of them', 20, 1, 120],
  ])('are each made once and given back in order, two slices at once: %s', async (_, draws, first, ms) => {
    const { slices, reports, most } = await sliced(draws, first, () => ms)
    expect(slices.map(({ from }) => from)).toEqual([0, ...slices.map(({ to }) => to).slice(0, -1)])
    expect(slices.at(-1)?.to).toBe(draws)
    expect(most).toBe(2)
    expect(reports).toEqual(reports.toSorted((a, b) => a - b))
    expect(reports.at(-1)).toBe(draws)
    // But the first two, whose size is a guess.
    for (const { from, to, took_ms } of slices.slice(2)) expect(took_ms).toBeLessThanOrEqual(Math.max(40, ms * Math.min(1, to - from)))
  })

  it('grow to what 40 ms hold, by doubling', async () => {
    const sizes = sizesOf((await sliced(2000, 4, () => 0.5)).slices)
    expect(sizes.slice(0, 2)).toEqual([4, 4])
    expect(Math.max(...sizes)).toBe(80)
    sizes.slice(2).forEach((size, i) => {
      expect(size).toBeLessThanOrEqual(2 * Math.max(...sizes.slice(0, i + 2)))
    })
  })

  it('are short again as soon as drawing becomes slow', async () => {
    const { slices } = await sliced(2000, 40, (draw) => (draw < 1000 ? 1 : 20))
    const late = slices.filter(({ from }) => from >= 1000)
    expect(late.slice(2).every(({ from, to }) => to - from <= 2)).toBe(true)
  })

  it('are not made shorter by waiting for a worker', async () => {
    expect(sizesOf((await sliced(400, 40, () => 1, 5000)).slices)).toEqual(sizesOf((await sliced(400, 40, () => 1)).slices))
  })

  it('keep their size where nobody tells when work begins', async () => {
    const slices = await drawInSlices({
      draws: 10,
      first: 4,
      clock: () => Date.now(),
      draw: async (from, to) => Promise.resolve(to - from),
      report: () => undefined,
    })
    expect(slices).toEqual([4, 4, 2])
  })

  it('begin no more when one fails', async () => {
    let begun = 0
    const all = drawInSlices({
      draws: 1000,
      first: 10,
      clock: () => Date.now(),
      draw: async () => {
        await wait(++begun === 3 ? 10 : 20)
        if (begun >= 3) throw new Error('stopped')
        return null
      },
      report: () => undefined,
    })
    const failure = all.then(
      () => null,
      (error: unknown) => error,
    )
    await vi.runAllTimersAsync()
    expect(await failure).toEqual(new Error('stopped'))
    expect(begun).toBeLessThanOrEqual(4)
  })
})
