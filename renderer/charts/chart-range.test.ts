import { describe, expect, it } from 'vitest'
import { isZoomed, moveRange, type ChartRange } from './chart-range.ts'

const whole: ChartRange = { x: [0, 100], y: [-1, 1] }

describe('range of a chart moved by keyboard', () => {
  it('zooms in about the middle', () => {
    expect(moveRange(whole, 'in', whole)).toEqual({ x: [12.5, 87.5], y: [-0.75, 0.75] })
  })

  it('comes back to the whole after as many steps out as in', () => {
    const closer = moveRange(moveRange(whole, 'in', whole), 'in', whole)
    expect(isZoomed(closer, whole)).toBe(true)
    expect(isZoomed(moveRange(moveRange(closer, 'out', whole), 'out', whole), whole)).toBe(false)
  })

  it('never zooms out beyond the whole', () => {
    expect(moveRange(whole, 'out', whole)).toEqual(whole)
  })

  it('moves along one axis only', () => {
    expect(moveRange(whole, 'right', whole)).toEqual({ x: [10, 110], y: [-1, 1] })
    expect(moveRange(whole, 'down', whole)).toEqual({ x: [0, 100], y: [-1.2, 0.8] })
  })
})
