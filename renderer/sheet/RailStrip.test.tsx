import { act } from 'react'
import { createRoot, type Root } from 'react-dom/client'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { RailStrip } from './RailStrip.tsx'

let root: Root
let moved: number[]

const found = (selector: string): HTMLElement => {
  const element = document.querySelector<HTMLElement>(selector)
  if (element === null) throw new Error(`there is no ${selector}`)
  return element
}
/** A press at a share of a track that is 100 wide. */
const pressAt = (share: number, init: PointerEventInit = {}): void => {
  found('.rail-track').getBoundingClientRect = () => new DOMRect(0, 0, 100, 20)
  found('.rail-grip').setPointerCapture = () => undefined
  act(() => void found('.rail-grip').dispatchEvent(new PointerEvent('pointerdown', { clientX: 100 * share, bubbles: true, ...init })))
}

beforeEach(() => {
  Reflect.set(globalThis, 'IS_REACT_ACT_ENVIRONMENT', true)
  const place = document.createElement('div')
  document.body.append(place)
  root = createRoot(place)
  moved = []
  const stops = [0.1, 0.4, 0.4, 0.9].map((share, i) => ({ key: String(i), share, bar: undefined }))
  act(() =>
    root.render(
      <RailStrip
        name="Rail"
        label="Temperature"
        number="40 °C"
        caption={['bars', 'widest']}
        slider={{ name: 'Temperature of the table', least: 1, greatest: 4, now: 3, spoken: '40 °C, k 1e-4' }}
        stops={stops}
        index={2}
        marks={[{ share: 0.5, text: '50' }]}
        onMove={(index) => moved.push(index)}
      >
        <p>k</p>
      </RailStrip>,
    ),
  )
})

afterEach(() => {
  act(() => root.unmount())
  document.body.replaceChildren()
})

describe('strip of a rail', () => {
  it('goes to the stop nearest to the hand, by the main button only', () => {
    pressAt(0.2)
    pressAt(0.95)
    pressAt(0.95, { button: 2 })
    expect(moved).toEqual([0, 3])
  })

  it('stays where it is among several stops at one place', () => {
    pressAt(0.42)
    expect(moved).toEqual([])
  })

  it('places handle, marks and stops by their share of the track', () => {
    expect(found('.rail-handle').style.left).toBe('40.000%')
    expect(found('.rail-mark').style.left).toBe('50.000%')
    expect(document.querySelectorAll('.rail-bar')).toHaveLength(4)
  })
})
