import { describe, expect, it } from 'vitest'
import { memoryOf, remember, type EvaluationCache } from './memo.ts'

const fail = (): number => {
  throw new Error('first time')
}
const mebibytes = (size: number) => () => size * 2 ** 20

describe('remembered steps', () => {
  it('are computed once a key', () => {
    const cache: EvaluationCache = new Map()
    let computed = 0
    const step = (key: string): number => remember(cache, key, () => ++computed, memoryOf)
    expect([step('a'), step('a'), step('b'), step('a')]).toEqual([1, 1, 2, 1])
  })

  it('that threw are tried again', () => {
    const cache: EvaluationCache = new Map()
    expect(() => remember(cache, 'a', fail, memoryOf)).toThrow('first time')
    expect(remember(cache, 'a', () => 7, memoryOf)).toBe(7)
  })

  it('go when memory is short: the least recently used first, never the newest', () => {
    const cache: EvaluationCache = new Map()
    remember(cache, 'a', () => 'a', mebibytes(100))
    remember(cache, 'b', () => 'b', mebibytes(100))
    remember(cache, 'a', () => 'new a', mebibytes(100))
    remember(cache, 'c', () => 'c', mebibytes(100))
    expect([...cache.keys()]).toEqual(['a', 'c'])
    remember(cache, 'huge', () => 'huge', mebibytes(1000))
    expect([...cache.keys()]).toEqual(['huge'])
  })

  it('are weighed by their arrays', () => {
    const weight = memoryOf({ a: new Float64Array(1000), b: [new Float64Array(500)], c: 'text', d: null })
    expect(weight).toBeGreaterThan(12_000)
    expect(weight).toBeLessThan(12_200)
  })
})
