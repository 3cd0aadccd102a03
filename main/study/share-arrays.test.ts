import { describe, expect, it } from 'vitest'
import { shareArrays } from './share-arrays.ts'

describe('arrays on shared memory', () => {
  const whole = Float64Array.of(1, Number.NaN, -0, 4)
  const value = {
    name: 'run',
    nothing: null,
    nested: { whole, part: whole.subarray(1, 3), list: [whole.subarray(3), 'text', 5] as const },
  }
  const shared = shareArrays(value)

  it('hold the same numbers in the same places', () => {
    expect(shared).toEqual(value)
    expect(Object.is(shared.nested.whole[2], -0)).toBe(true)
    expect(shared.nested.part.byteOffset).toBe(8)
  })

  it('share memory where they did, and none with what they were made from', () => {
    expect(shared.nested.whole.buffer).toBeInstanceOf(SharedArrayBuffer)
    expect(shared.nested.part.buffer).toBe(shared.nested.whole.buffer)
    expect(shared.nested.list[0].buffer).toBe(shared.nested.whole.buffer)
    shared.nested.whole[0] = 7
    expect(whole[0]).toBe(1)
  })

  it('are taken as they are where they are shared already', () => {
    expect(shareArrays(shared).nested.whole.buffer).toBe(shared.nested.whole.buffer)
  })
})
