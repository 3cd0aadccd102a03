import { act } from 'react'
import { createRoot, type Root } from 'react-dom/client'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { parseTemperatureUncertainty } from '../stages/activation/parse-uncertainty.ts'
import { TypedField } from './TypedField.tsx'

let root: Root
let committed: number[]

const field = (): HTMLInputElement => {
  const found = document.querySelector('input')
  if (found === null) throw new Error('there is no field')
  return found
}
/** As a browser does it when a text is typed over the whole of the old one. */
const type = (text: string): void => {
  act(() => {
    Reflect.set(HTMLInputElement.prototype, 'value', text, field())
    field().dispatchEvent(new InputEvent('input', { bubbles: true }))
  })
}
const press = (key: string): void => act(() => void field().dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true })))
const leave = (): void =>
  act(() => {
    field().focus()
    field().blur()
  })
const show = (countsUnchanged: boolean): void =>
  act(() =>
    root.render(
      <TypedField
        label="Stated"
        text="0.5 K"
        countsUnchanged={countsUnchanged}
        parse={parseTemperatureUncertainty}
        onCommit={(value) => committed.push(value)}
      />,
    ),
  )

beforeEach(() => {
  Reflect.set(globalThis, 'IS_REACT_ACT_ENVIRONMENT', true)
  const place = document.createElement('div')
  document.body.append(place)
  root = createRoot(place)
  committed = []
})

afterEach(() => {
  act(() => root.unmount())
  document.body.replaceChildren()
})

describe('a typed field whose text was only assumed', () => {
  it('counts the very text that stands there once it is typed, on Enter and on leaving', () => {
    show(true)
    type('0.5 K')
    press('Enter')
    expect(committed).toEqual([0.5])
    type('0.5 K')
    leave()
    expect(committed).toEqual([0.5, 0.5])
  })

  it('counts nothing where nobody typed, or what was typed is taken back', () => {
    show(true)
    press('Enter')
    leave()
    type('0.5 K')
    press('Escape')
    leave()
    expect(committed).toEqual([])
  })
})

describe('any other typed field', () => {
  it('takes the text that stands there already for no change', () => {
    show(false)
    type('0.5 K')
    press('Enter')
    expect(committed).toEqual([])
    type('0.2 K')
    press('Enter')
    expect(committed).toEqual([0.2])
  })

  it('keeps what cannot be meant, with the reason', () => {
    show(false)
    type('-1 K')
    press('Enter')
    expect(committed).toEqual([])
    expect(field().getAttribute('aria-invalid')).toBe('true')
    expect(document.body.textContent).toContain('never below zero')
  })
})
