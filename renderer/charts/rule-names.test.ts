import { describe, expect, it } from 'vitest'
import { levelName, pushedInside, uprightNames } from './rule-names.ts'

const plot = { from: 50, to: 450 }

describe('names of upright rules', () => {
  it('stand outside the stretch between two rules where there is room', () => {
    const [lower, upper] = uprightNames(
      [
        { at: 200, width: 90 },
        { at: 300, width: 90 },
      ],
      plot,
    )
    expect(lower?.middle).toBeLessThan(200)
    expect(upper?.middle).toBeGreaterThan(300)
  })

  it.each([
    [60, 440],
    [60, 80],
    [420, 440],
  ])('stay inside the plot and apart from each other with rules at %i and %i', (low, high) => {
    const width = 90
    const names = uprightNames(
      [low, high].map((at) => ({ at, width })),
      plot,
    )
    for (const { middle } of names) {
      expect(middle - width / 2).toBeGreaterThanOrEqual(plot.from)
      expect(middle + width / 2).toBeLessThanOrEqual(plot.to)
    }
    const [first, second] = names
    const isApart = Math.abs((first?.middle ?? 0) - (second?.middle ?? 0)) >= width
    expect(isApart || first?.down !== second?.down).toBe(true)
  })
})

describe('name of a level rule', () => {
  it('keeps away from a curve that crosses the rule at its start', () => {
    const curve = Array.from({ length: 101 }, (_, i) => ({ x: 50 + i, y: 100 + i - 50 }))
    const middle = levelName(100, 60, plot, curve)
    expect(middle - 30).toBeGreaterThan(100)
    expect(middle + 30).toBeLessThanOrEqual(plot.to)
  })

  it('stands at the start where nothing is near', () => {
    expect(levelName(100, 60, plot, [{ x: 400, y: 300 }])).toBe(50 + 4 + 30)
  })
})

describe('place of a label that its drawing pushes inside', () => {
  it('is its own in the middle, and as near as it can be at the ends', () => {
    expect(pushedInside(250, 100, plot, 4)).toBe(250)
    expect(pushedInside(60, 100, plot, 4)).toBe(104)
    expect(pushedInside(440, 100, plot, 4)).toBe(396)
    expect(pushedInside(60, 500, plot, 4)).toBe(250)
  })
})
