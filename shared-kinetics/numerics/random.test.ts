import { compiled, ndtr } from 'cephes'
import * as fc from 'fast-check'
import { beforeAll, describe, expect, it } from 'vitest'
import { philoxBlock, randomStream } from './random.ts'

beforeAll(async () => {
  await compiled
})

const block = (counter: readonly number[], key: readonly [number, number]): string[] => {
  const out = new Uint32Array(4)
  philoxBlock(new Uint32Array(counter), key[0], key[1], out)
  return [...out].map((word) => word.toString(16).padStart(8, '0'))
}

/** The published algorithm over again, in whole numbers without limit. */
function philoxByBigInt(counter: readonly number[], key: readonly [number, number]): string[] {
  let [c0, c1, c2, c3] = counter.map(BigInt) as [bigint, bigint, bigint, bigint]
  let [k0, k1] = key.map(BigInt) as [bigint, bigint]
  const mask = 0xffff_ffffn
  for (let round = 0; round < 10; round++) {
    const p0 = 0xd2511f53n * c0
    const p1 = 0xcd9e8d57n * c2
    ;[c0, c1, c2, c3] = [(p1 >> 32n) ^ c1 ^ k0, p1 & mask, (p0 >> 32n) ^ c3 ^ k1, p0 & mask]
    k0 = (k0 + 0x9e3779b9n) & mask
    k1 = (k1 + 0xbb67ae85n) & mask
  }
  return [c0, c1, c2, c3].map((word) => word.toString(16).padStart(8, '0'))
}

/** Largest distance between the share of a sample and a distribution, times √n (Kolmogorov–Smirnov). */
function distanceFrom(distribution: (x: number) => number, sample: readonly number[]): number {
  const sorted = sample.toSorted((a, b) => a - b)
  const n = sorted.length
  const largest = sorted.reduce((worst, x, i) => Math.max(worst, (i + 1) / n - distribution(x), distribution(x) - i / n), 0)
  return largest * Math.sqrt(n)
}

// 2·exp(-2·1.95²) = 0.001: these seeds are fixed, so that a sound generator passes for good.
const acceptedDistance = 1.95

describe('the block function of the generator', () => {
  // Known answers published with the generator (all bits 0, all bits 1, digits of pi); from memory, and confirmed by the whole-number version above.
  it.each([
    { counter: [0, 0, 0, 0], key: [0, 0], words: ['6627e8d5', 'e169c58d', 'bc57ac4c', '9b00dbd8'] },
    {
      counter: [0xffffffff, 0xffffffff, 0xffffffff, 0xffffffff],
      key: [0xffffffff, 0xffffffff],
      words: ['408f276d', '41c83b0e', 'a20bc7c6', '6d5451fd'],
    },
    {
      counter: [0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344],
      key: [0xa4093822, 0x299f31d0],
      words: ['d16cfe09', '94fdcceb', '5001e420', '24126ea1'],
    },
  ] as const)('answers $words', ({ counter, key, words }) => {
    expect(block(counter, key)).toEqual(words)
    expect(philoxByBigInt(counter, key)).toEqual(words)
  })

  it('agrees with whole numbers without limit for any counter and key', () => {
    const word = fc.integer({ min: 0, max: 0xffffffff })
    fc.assert(
      fc.property(fc.tuple(word, word, word, word), fc.tuple(word, word), (counter, key) => {
        expect(block(counter, key)).toEqual(philoxByBigInt(counter, key))
      }),
      { numRuns: 500 },
    )
  })
})

describe('a stream of random numbers', () => {
  it('is the same for the same seed and stream, whatever other streams do', () => {
    const alone = randomStream(7, 3)
    const first = Array.from({ length: 50 }, () => alone.normal())
    const between = randomStream(7, 3)
    const other = randomStream(7, 4)
    const second = Array.from({ length: 50 }, () => {
      other.normal()
      return between.normal()
    })
    expect(second).toEqual(first)
  })

  it('begins with the words of its first block', () => {
    const [w0 = 0, w1 = 0] = philoxByBigInt([0, 0, 5, 1], [9, 2]).map((hex) => Number.parseInt(hex, 16))
    expect(randomStream(2 * 2 ** 32 + 9, 2 ** 32 + 5).uniform()).toBe(((w0 >>> 6) * 2 ** 26 + (w1 >>> 6) + 0.5) / 2 ** 52)
  })

  it('is uniform inside (0, 1) and normal, by moments and by the largest distance', () => {
    const n = 100_000
    const stream = randomStream(20261201)
    const uniform = Array.from({ length: n }, () => stream.uniform())
    expect(Math.min(...uniform.slice(0, 50_000))).toBeGreaterThan(0)
    expect(distanceFrom((x) => x, uniform)).toBeLessThan(acceptedDistance)
    const normal = Array.from({ length: n }, () => stream.normal())
    expect(distanceFrom(ndtr, normal)).toBeLessThan(acceptedDistance)
    const moment = (power: number): number => normal.reduce((sum, z) => sum + z ** power, 0) / n
    // Standard errors of the moments of a normal sample: √(1/n), √(2/n), √(15/n), √(96/n).
    expect(Math.abs(moment(1))).toBeLessThan(4 * Math.sqrt(1 / n))
    expect(Math.abs(moment(2) - 1)).toBeLessThan(4 * Math.sqrt(2 / n))
    expect(Math.abs(moment(3))).toBeLessThan(4 * Math.sqrt(15 / n))
    expect(Math.abs(moment(4) - 3)).toBeLessThan(4 * Math.sqrt(96 / n))
    // Neighbours, which come from one pair in every second case, are not correlated.
    const neighbours = normal.slice(1).reduce((sum, z, i) => sum + z * (normal[i] ?? 0), 0) / n
    expect(Math.abs(neighbours)).toBeLessThan(4 / Math.sqrt(n))
  })

  it('is uniform and uncorrelated across streams and seeds as well as along one', () => {
    const n = 20_000
    const across = Array.from({ length: n }, (_, stream) => randomStream(1, stream).uniform())
    expect(distanceFrom((x) => x, across)).toBeLessThan(acceptedDistance)
    const acrossSeeds = Array.from({ length: n }, (_, seed) => randomStream(seed).normal())
    expect(distanceFrom(ndtr, acrossSeeds)).toBeLessThan(acceptedDistance)
    const neighbours = acrossSeeds.slice(1).reduce((sum, z, i) => sum + z * (acrossSeeds[i] ?? 0), 0) / n
    expect(Math.abs(neighbours)).toBeLessThan(4 / Math.sqrt(n))
  })

  it('draws whole numbers below a bound with equal shares', () => {
    const stream = randomStream(5, 5)
    const counts = [0, 0, 0, 0, 0, 0, 0]
    for (let i = 0; i < 70_000; i++) {
      const drawn = stream.integerBelow(7)
      counts[drawn] = (counts[drawn] ?? 0) + 1
    }
    const chiSquare = counts.reduce((sum, count) => sum + (count - 10_000) ** 2 / 10_000, 0)
    // 0.999 quantile of chi-square with 6 degrees of freedom.
    expect(chiSquare).toBeLessThan(22.458)
    expect(counts).toHaveLength(7)
    expect(stream.integerBelow(1)).toBe(0)
  })

  it('rejects what is no seed, no stream and no bound', () => {
    for (const bad of [-1, 0.5, Number.NaN, 2 ** 53]) {
      expect(() => randomStream(bad)).toThrow(/seed/)
      expect(() => randomStream(1, bad)).toThrow(/stream/)
    }
    for (const bad of [0, -1, 1.5, 2 ** 33, Number.NaN]) expect(() => randomStream(1).integerBelow(bad)).toThrow(/bound/)
  })
})
