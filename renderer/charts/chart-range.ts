/** Ends of both axes of a chart. */
export interface ChartRange {
  readonly x: readonly [number, number]
  readonly y: readonly [number, number]
}

export type RangeMove = 'in' | 'out' | 'left' | 'right' | 'up' | 'down'

/** The range after one step by keyboard: a quarter nearer or farther, or a tenth along. Zooming out ends at `whole`. */
export function moveRange(range: ChartRange, move: RangeMove, whole: ChartRange): ChartRange {
  switch (move) {
    case 'in':
      return { x: scaled(range.x, 0.75), y: scaled(range.y, 0.75) }
    case 'out':
      return { x: within(scaled(range.x, 1 / 0.75), whole.x), y: within(scaled(range.y, 1 / 0.75), whole.y) }
    case 'left':
      return { ...range, x: shifted(range.x, -0.1) }
    case 'right':
      return { ...range, x: shifted(range.x, 0.1) }
    case 'up':
      return { ...range, y: shifted(range.y, 0.1) }
    case 'down':
      return { ...range, y: shifted(range.y, -0.1) }
  }
}

/** Whether a range shows something else than the whole figure. */
export function isZoomed(range: ChartRange, whole: ChartRange): boolean {
  return differs(range.x, whole.x) || differs(range.y, whole.y)
}

type Ends = readonly [number, number]

function scaled([low, high]: Ends, factor: number): Ends {
  const [middle, half] = [(low + high) / 2, ((high - low) / 2) * factor]
  return [middle - half, middle + half]
}

function shifted([low, high]: Ends, part: number): Ends {
  const by = (high - low) * part
  return [low + by, high + by]
}

function within([low, high]: Ends, whole: Ends): Ends {
  return high - low >= whole[1] - whole[0] ? whole : [low, high]
}

function differs(a: Ends, b: Ends): boolean {
  const slack = (b[1] - b[0]) * 1e-9
  return Math.abs(a[0] - b[0]) > slack || Math.abs(a[1] - b[1]) > slack
}
