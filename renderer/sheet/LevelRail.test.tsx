import { act } from 'react'
import { createRoot, type Root } from 'react-dom/client'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { LevelRail } from './LevelRail.tsx'
import { railBars } from './rail-bars.ts'

const levels = [0.1, 0.25, 0.5, 0.9]
let root: Root
let moved: number[]

const slider = (): HTMLElement => {
  const found = document.querySelector<HTMLElement>('[role="slider"]')
  if (found === null) throw new Error('there is no slider')
  return found
}
const press = (key: string, modifiers: KeyboardEventInit = {}): boolean =>
  slider().dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true, ...modifiers }))

beforeEach(() => {
  Reflect.set(globalThis, 'IS_REACT_ACT_ENVIRONMENT', true)
  const place = document.createElement('div')
  document.body.append(place)
  root = createRoot(place)
  moved = []
  act(() =>
    root.render(
      <LevelRail
        levels={levels}
        index={1}
        bars={railBars([1, 2, null, 4])}
        spoken="0.25, Ea 140.2 kJ/mol"
        onMove={(index) => moved.push(index)}
      >
        <p>Ea 140.2</p>
      </LevelRail>,
    ),
  )
})

afterEach(() => {
  act(() => root.unmount())
  document.body.replaceChildren()
})

describe('level rail', () => {
  it('is a slider named "Conversion level" that says its value in words', () => {
    expect(slider().getAttribute('aria-label')).toBe('Conversion level')
    expect(slider().getAttribute('aria-valuenow')).toBe('0.25')
    expect([slider().getAttribute('aria-valuemin'), slider().getAttribute('aria-valuemax')]).toEqual(['0.1', '0.9'])
    expect(slider().getAttribute('aria-valuetext')).toBe('0.25, Ea 140.2 kJ/mol')
    expect(slider().tabIndex).toBe(0)
  })

  it('moves by keys and keeps them from scrolling the sheet', () => {
    const unhandled = ['ArrowRight', 'ArrowLeft', 'End', 'Home'].map((key) => press(key))
    expect(moved).toEqual([2, 0, 3, 0])
    expect(unhandled).toEqual([false, false, false, false])
  })

  it('leaves shortcuts and other keys alone', () => {
    expect([press('ArrowRight', { ctrlKey: true }), press('Tab')]).toEqual([true, true])
    expect(moved).toEqual([])
  })

  it('stands a bar at each level that has an interval, and a hollow mark where there is none', () => {
    expect(document.querySelectorAll('.rail-bar')).toHaveLength(4)
    expect(document.querySelectorAll('.rail-bar.is-empty')).toHaveLength(1)
  })
})
