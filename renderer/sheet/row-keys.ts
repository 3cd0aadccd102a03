import type { KeyboardEvent } from 'react'
import { levelAfterKey } from './level-rail-keys.ts'

/** A table lists downwards what a rail has from left to right. */
const railKeys: Readonly<Record<string, string>> = {
  ArrowDown: 'ArrowRight',
  ArrowUp: 'ArrowLeft',
  PageDown: 'PageUp',
  PageUp: 'PageDown',
  Home: 'Home',
  End: 'End',
}

/**
 * The keys by which a table goes from row to row: arrows, page up and down, Home and End.
 *
 * @param index - of the current row; null for none
 */
export const rowKeys =
  (index: number | null, rows: number, onGo: (index: number) => void) =>
  (event: KeyboardEvent): void => {
    const key = railKeys[event.key]
    if (key === undefined || event.ctrlKey || event.metaKey || event.altKey) return
    const target = levelAfterKey(key, index ?? -1, rows)
    if (target === null) return
    event.preventDefault()
    onGo(target)
  }
