import { describe, expect, it } from 'vitest'
import { inLanes } from './in-lanes.ts'

const turn = async (): Promise<void> => new Promise((resolve) => setImmediate(resolve))

describe('work in lanes', () => {
  it('has two pieces under way at once and begins the next when one is done', async () => {
    let atWork = 0
    let most = 0
    let begun = 0
    await inLanes(() => {
      if (begun === 7) return null
      begun += 1
      return (async () => {
        atWork += 1
        most = Math.max(most, atWork)
        await turn()
        atWork -= 1
      })()
    })
    expect([begun, most, atWork]).toEqual([7, 2, 0])
  })

  it.each([
    ['a piece fails', async () => Promise.reject(new Error('broken'))],
    [
      'the next cannot even be begun',
      () => {
        throw new Error('broken')
      },
    ],
  ] as const)('begins nothing more when %s', async (_, third) => {
    let begun = 0
    const done = inLanes(() => {
      begun += 1
      return begun === 3 ? third() : turn()
    })
    await expect(done).rejects.toThrow('broken')
    const then = begun
    for (let i = 0; i < 5; i++) await turn()
    expect(begun).toBe(then)
    expect(begun).toBeLessThanOrEqual(4)
  })
})
