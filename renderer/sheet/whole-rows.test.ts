import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { firstRowToShow, rowAt, wholeRowsFrom, type WholeRows } from './whole-rows.ts'

const table = fc.record({
  heights: fc.array(fc.integer({ min: 20, max: 90 }), { minLength: 1, maxLength: 30 }),
  room: fc.integer({ min: 20, max: 400 }),
  at: fc.nat(29),
  row: fc.nat(29),
})
const shows = ({ first, shown }: WholeRows, row: number): boolean => row >= first && row < first + shown
const sum = (heights: readonly number[]): number => heights.reduce((total, height) => total + height, 0)

describe('whole rows of a frame', () => {
  it('are cut nowhere, whatever their heights', () => {
    expect(wholeRowsFrom([30, 60, 30, 30], 100, 0)).toEqual({ first: 0, shown: 2, height: 90 })
    expect(wholeRowsFrom([30, 60, 30, 30], 100, 1)).toEqual({ first: 1, shown: 2, height: 90 })
    fc.assert(
      fc.property(table, ({ heights, room, at }) => {
        const { first, shown, height } = wholeRowsFrom(heights, room, at)
        expect(height).toBe(sum(heights.slice(first, first + shown)))
        expect(shown === 1 || height <= room + 0.5).toBe(true)
        // Nothing more would fit, neither behind nor, at the end, before.
        const next = heights[first + shown] ?? heights[first - 1]
        expect(next === undefined || height + next > room).toBe(true)
      }),
    )
  })

  it('at the end of the table reach back as far as there is room', () => {
    expect(wholeRowsFrom([30, 60, 30, 30], 100, 3)).toEqual({ first: 2, shown: 2, height: 60 })
    expect(wholeRowsFrom([30, 60], 500, 1)).toEqual({ first: 0, shown: 2, height: 90 })
    expect(wholeRowsFrom([], 100, 0)).toEqual({ first: 0, shown: 0, height: 0 })
  })

  it('stand still once they are settled', () => {
    fc.assert(
      fc.property(table, ({ heights, room, at }) => {
        const settled = wholeRowsFrom(heights, room, at)
        expect(wholeRowsFrom(heights, room, rowAt(heights, sum(heights.slice(0, settled.first))))).toEqual(settled)
      }),
    )
  })

  it('have the wanted row among them, and do not move where it is already', () => {
    fc.assert(
      fc.property(table, ({ heights, room, at, row: wanted }) => {
        const row = Math.min(wanted, heights.length - 1)
        const view = wholeRowsFrom(heights, room, firstRowToShow(heights, room, at, row))
        const before = wholeRowsFrom(heights, room, at)
        expect(shows(view, row)).toBe(true)
        expect(shows(before, row) ? view : before).toEqual(before)
      }),
    )
  })
})
