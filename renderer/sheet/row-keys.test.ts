import type { KeyboardEvent } from 'react'
import { describe, expect, it } from 'vitest'
import { rowKeys } from './row-keys.ts'

/** Where a key leads from a row of ten, and whether the page may still act on it. */
function after(key: string, index: number | null, modifiers: Partial<KeyboardEvent> = {}): readonly [number | null, boolean] {
  let went: number | null = null
  let isLeft = true
  const event = {
    key,
    ctrlKey: false,
    metaKey: false,
    altKey: false,
    preventDefault: () => {
      isLeft = false
    },
    ...modifiers,
  } as KeyboardEvent
  rowKeys(index, 10, (row) => {
    went = row
  })(event)
  return [went, isLeft]
}

describe('keys of a table', () => {
  it('go downwards with the arrow that points down', () => {
    expect(['ArrowDown', 'ArrowUp', 'PageDown', 'PageUp', 'Home', 'End'].map((key) => after(key, 5)[0])).toEqual([6, 4, 9, 0, 0, 9])
  })

  it('stop at both ends, and begin at the first row where none is current', () => {
    expect([after('ArrowUp', 0)[0], after('ArrowDown', 9)[0], after('ArrowDown', null)[0]]).toEqual([0, 9, 0])
  })

  it('leave shortcuts and other keys alone', () => {
    expect([after('ArrowDown', 5, { ctrlKey: true }), after('ArrowDown', 5, { altKey: true }), after('ArrowRight', 5)]).toEqual([
      [null, true],
      [null, true],
      [null, true],
    ])
  })
})
