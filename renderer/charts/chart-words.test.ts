import { describe, expect, it } from 'vitest'
import type { Figure } from '../../shared-kinetics/figure/figure.ts'
import { chartWords } from './chart-words.ts'

const figure: Figure = {
  id: 'activation-energy',
  title: 'Activation energy',
  description: '',
  x: { label: 'Conversion α', unit: '', min: 0, max: 1, second: null },
  y: { label: 'Ea', unit: 'kJ/mol', min: 100, max: 200, second: null },
  marks: [{ kind: 'line', name: 'Starink', tone: { kind: 'method', index: 0 }, x: [0.1, 0.9], y: [120, 160] }],
}

describe('a chart in words', () => {
  it('tells the points and rules of the level with their units, and leaves curves to the table', () => {
    const words = chartWords(figure, [
      { kind: 'rule', name: 'Level', tone: { kind: 'ink' }, along: 'y', at: 0.5 },
      { kind: 'points', name: 'Starink', tone: { kind: 'accent' }, x: [0.5], y: [146.0812], joined: false },
    ])
    expect(words).toBe('Level: Conversion α 0.5; Starink: Conversion α 0.5, Ea 146.08 kJ/mol')
  })

  it('says none for what is not to be had', () => {
    const mark = { kind: 'points', name: 'run', tone: { kind: 'ink' }, x: [0.5], y: [Number.NaN], joined: false } as const
    expect(chartWords(figure, [mark])).toBe('run: Conversion α 0.5, Ea none kJ/mol')
  })
})
