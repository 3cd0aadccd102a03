import { describe, expect, it } from 'vitest'
import { levelAfterKey } from './level-rail-keys.ts'
import { nearestLevel } from './nearest-level.ts'
import { railBars, railCaption, rateBars, rateCaption } from './rail-bars.ts'

describe('keys of the level rail (WAI-ARIA slider pattern)', () => {
  it.each([
    ['ArrowRight', 10],
    ['ArrowUp', 10],
    ['ArrowLeft', 8],
    ['ArrowDown', 8],
    ['PageUp', 14],
    ['PageDown', 4],
    ['Home', 0],
    ['End', 18],
  ])('%s leads from level 9 of 19 to %i', (key, expected) => {
    expect(levelAfterKey(key, 9, 19)).toBe(expected)
  })

  it('stays on the rail at both ends', () => {
    expect([
      levelAfterKey('ArrowLeft', 0, 19),
      levelAfterKey('PageDown', 2, 19),
      levelAfterKey('ArrowRight', 18, 19),
      levelAfterKey('PageUp', 16, 19),
    ]).toEqual([0, 0, 18, 18])
  })

  it('leaves every other key alone', () => {
    expect(['Tab', 'a', 'Enter', ' '].map((key) => levelAfterKey(key, 3, 19))).toEqual([null, null, null, null])
  })
})

describe('nearest level', () => {
  it('is the closest one, the lower of two at the same distance', () => {
    expect([
      nearestLevel([0.25, 0.5, 0.75], 0.6),
      nearestLevel([0.25, 0.75], 0.5),
      nearestLevel([], 0.5),
      nearestLevel([0.1, 0.2], 9),
    ]).toEqual([1, 0, 0, 1])
  })
})

describe('bars of the rail', () => {
  it('are as tall as the interval is wide', () => {
    expect(railBars([2, 4, 8]).map((bar) => bar.height)).toEqual([0.25, 0.5, 1])
  })

  it('are absent, not zero, where there is no interval', () => {
    expect(railBars([null, 5])[0]).toEqual({ height: null, cut: false })
  })

  it('stay low in good data: full height is 5 % of the mean Ea at least', () => {
    expect(railBars([0.1, 0.2], 200).map((bar) => bar.height)).toEqual([0.01, 0.02])
    expect(railCaption([0.1, 0.2], 200, 'jackknife')).toEqual(['bars: ± 95 %, jackknife', 'full height 10.0 kJ/mol (5 % of Ea)'])
  })

  it('say what the tallest stands for, and that some are cut', () => {
    expect(railCaption([2, 31.04, 20], 200, 'Student-t')[1]).toBe('tallest 31.0 kJ/mol')
    expect(railCaption([10, 10, 10, 10, 1000], 200, 'Student-t').slice(1)).toEqual(['full height 40.0 kJ/mol', '1 wider, cut at the dots'])
    expect(railCaption([null, null], 200, 'Student-t')).toEqual([])
  })

  it('stay low where bands of k are narrow: full height is 5 % of k at least, and what is cut is said', () => {
    const narrow = [Math.log(1.0004), Math.log(1.00025)]
    expect(rateBars(narrow).every(({ height }) => height !== null && height < 0.01)).toBe(true)
    expect(rateCaption(narrow)).toEqual(['bars: ± 95 % of the line', 'full height 5.0 % of k, widest < 0.1 % of k'])
    expect(rateCaption([Math.log(1.08), Math.log(1.137)])[1]).toBe('tallest 13.7 % of k')
    const far = [0.02, 0.02, 0.02, 0.02, 1.2]
    expect(rateBars(far)[4]).toEqual({ height: 1, cut: true })
    expect(rateCaption(far).slice(1)).toEqual(['full height 8.3 % of k, widest factor 3.32', '1 wider, cut at the dots'])
    expect(rateCaption([null])).toEqual([])
  })

  it('cut one hopeless level instead of flattening the others', () => {
    const bars = railBars([1, 1, 1, 1, 1000])
    expect(bars[4]).toEqual({ height: 1, cut: true })
    expect(bars[0]?.height).toBe(0.25)
  })
})
