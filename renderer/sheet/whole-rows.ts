/** What a frame shows of a table: rows from the first on, all of them whole. */
export interface WholeRows {
  readonly first: number
  /** How many; one at least, where there is one. */
  readonly shown: number
  /** Of those rows together. */
  readonly height: number
}

/**
 * The whole rows that a frame shows from a row on. Rows may differ in height. Where all that follow fit, as many stand before them as there is room for, so that the end of the
 * table lies at the end of the frame.
 *
 * @param room - the height there is for rows
 */
export function wholeRowsFrom(heights: readonly number[], room: number, first: number): WholeRows {
  let from = Math.max(0, Math.min(first, heights.length - 1))
  let [shown, height] = [0, 0]
  const take = (row: number): boolean => {
    const next = heights[row]
    if (next === undefined || (shown > 0 && height + next > room + slack)) return false
    shown++
    height += next
    return true
  }
  while (take(from + shown));
  if (from + shown === heights.length) while (from > 0 && take(from - 1)) from--
  return { first: from, shown, height }
}

/**
 * The row to begin with so that a row is in sight, and a neighbour with it where there is room: as few rows away from the present one as will do.
 *
 * @param present - the row the frame begins with
 */
export function firstRowToShow(heights: readonly number[], room: number, present: number, row: number): number {
  const now = wholeRowsFrom(heights, room, present)
  if (row < now.first) {
    const before = wholeRowsFrom(heights, room, row - 1)
    return before.first + before.shown > row ? before.first : row
  }
  if (row < now.first + now.shown) return now.first
  const last = Math.min(row + 1, heights.length - 1)
  for (let first = now.first; first < row; first++) {
    const view = wholeRowsFrom(heights, room, first)
    if (view.first + view.shown > last) return view.first
  }
  return row
}

/** The row whose upper edge lies nearest to where the frame was scrolled to. */
export function rowAt(heights: readonly number[], scrolled: number): number {
  let [row, top] = [0, 0]
  for (const [i, height] of heights.entries()) {
    if (scrolled < top + height / 2) return i
    row = i
    top += height
  }
  return row
}

/** Heights on a screen come in parts of a pixel. */
const slack = 0.5
