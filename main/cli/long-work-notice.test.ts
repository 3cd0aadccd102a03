import { describe, expect, it } from 'vitest'
import { createLongWorkNotice } from './long-work-notice.ts'

/** What is said of work of 4,000 steps that begins at 2,000 and makes so many steps in each tenth of a second, and when. */
function saidOf(stepsInTenth: number): readonly { readonly line: string; readonly at_ms: number }[] {
  let now = 5_000
  const said: { line: string; at_ms: number }[] = []
  const notice = createLongWorkNotice(
    () => now,
    (line) => said.push({ line, at_ms: now - 5_000 }),
    'Drawing',
    'Take fewer levels.',
  )
  for (let done = 2_000; done <= 4_000; done += stepsInTenth) {
    notice({ done, total: 4_000 })
    now += 100
  }
  return said
}

describe('the notice of long work', () => {
  it('tells once, after a second, how long it will go on', () => {
    // 10 steps a tenth of a second: 1,900 steps are left after a second, which is 19 s.
    expect(saidOf(10)).toEqual([{ line: 'Drawing will take about 19 s more. Take fewer levels.', at_ms: 1_000 }])
    // 5 a tenth: 1,950 steps, 39 s.
    expect(saidOf(5).map(({ line }) => line)).toEqual(['Drawing will take about 39 s more. Take fewer levels.'])
  })

  it('says nothing of work that ends soon', () => {
    expect(saidOf(25)).toEqual([])
    expect(saidOf(2_000)).toEqual([])
  })
})
