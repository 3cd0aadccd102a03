import { describe, expect, it } from 'vitest'
import { meanCaution } from './mean-not-alone.ts'

const varies = (intervals: string) => ({ code: 'energy-varies' as const, evidence: { intervals } })

describe('a mean of Ea', () => {
  it.each(['apart', 'none'])(
    'is not to be quoted alone where Ea varies and intervals are %s, be the finding a caution or a note',
    (intervals) => {
      expect(meanCaution([varies(intervals)])).toBe('not to be quoted alone: Ea varies')
    },
  )

  it('may stand alone where noise explains the spread, or nothing was found', () => {
    expect(meanCaution([varies('overlap')])).toBeNull()
    expect(meanCaution([{ code: 'too-few-programmes', evidence: {} }])).toBeNull()
    expect(meanCaution([])).toBeNull()
  })
})
