import { describe, expect, it } from 'vitest'
import type { Figure, Mark } from '../../shared-kinetics/figure/figure.ts'
import type { ChartColours } from './chart-colours.ts'
import { datasetsOf } from './figure-datasets.ts'
import { methodDash, methodMarker, runMarker } from './markers.ts'
import { rulesOf } from './figure-rules.ts'

const colours: ChartColours = {
  paper: '#ffffff',
  ink: '#111111',
  softInk: '#666666',
  hairline: '#cccccc',
  grid: '#eeeeee',
  faint: '#bbbbbb',
  accent: '#993311',
  run: (place) => (place < 0.5 ? '#000080' : '#ff8000'),
}
const axis = { label: 'Ea', unit: 'kJ/mol', min: null, max: null, second: null }
const figureWith = (...marks: Mark[]): Figure => ({ id: 'test', title: 'Test', description: 'A test.', x: axis, y: axis, marks })

const runLine = (index: number): Mark => ({ kind: 'line', name: `${index}`, tone: { kind: 'run', place: 0, index }, x: [1], y: [1] })
/** Chart.js draws the greatest order first. */
const orderOf = (dataset: object | undefined): number => Number(Reflect.get(dataset ?? {}, 'order'))

describe('datasets of a figure', () => {
  it('joins a line through its points and breaks it where a number is not to be had', () => {
    const [line] = datasetsOf(
      figureWith({ kind: 'line', name: 'run', tone: { kind: 'run', place: 1, index: 3 }, x: [1, 2, 3], y: [4, Number.NaN, 6] }),
      colours,
      null,
    )
    expect(line).toMatchObject({ label: 'run', showLine: true, pointRadius: 0, borderColor: '#ff8000' })
    expect(line?.data).toEqual([
      { x: 1, y: 4 },
      { x: 2, y: Number.NaN },
      { x: 3, y: 6 },
    ])
  })

  it('gives error bars to points with an interval, and none to a point whose interval is not to be had', () => {
    const [points] = datasetsOf(
      figureWith({
        kind: 'points',
        name: 'Ea',
        tone: { kind: 'method', index: 0 },
        x: [1, 2],
        y: [10, 20],
        joined: true,
        lower: [9, Number.NaN],
        upper: [12, 25],
      }),
      colours,
      null,
    )
    expect(points?.type).toBe('scatterWithErrorBars')
    expect(points?.data).toEqual([
      { x: 1, y: 10, yMin: 9, yMax: 12 },
      { x: 2, y: 20 },
    ])
  })

  it('draws a band as the area between its two ends', () => {
    const [lower, upper] = datasetsOf(
      figureWith({ kind: 'band', name: 'interval', tone: { kind: 'method', index: 0 }, x: [1], lower: [9], upper: [12] }),
      colours,
      null,
    )
    expect(lower?.data).toEqual([{ x: 1, y: 9 }])
    expect(upper).toMatchObject({ data: [{ x: 1, y: 12 }], fill: '-1', backgroundColor: '#99331126' })
  })

  it('draws later marks above earlier ones', () => {
    const faint: Mark = { kind: 'line', name: 'a', tone: { kind: 'faint' }, x: [1], y: [1] }
    const [first, second] = datasetsOf(figureWith(faint, { ...faint, name: 'b' }), colours, null)
    expect(orderOf(first)).toBeGreaterThan(orderOf(second))
  })

  it('draws the run pointed at stronger and the other runs fainter', () => {
    const [pointed, other] = datasetsOf(figureWith(runLine(0), runLine(1)), colours, 0)
    expect(pointed).toMatchObject({ borderWidth: 3, borderColor: '#000080' })
    expect(other).toMatchObject({ borderColor: '#00008059' })
  })

  it('takes the markers off joined points that stand too close to be told apart, and keeps every number', () => {
    const x = Array.from({ length: 99 }, (_, i) => i)
    const many = (index: number): Mark => ({ kind: 'points', name: 'Ea', tone: { kind: 'method', index }, x, y: x, joined: true })
    const [chosen, other] = datasetsOf(figureWith(many(0), many(1)), colours, null)
    expect(Reflect.get(chosen ?? {}, 'pointRadius')).toBeLessThan(3)
    expect(other).toMatchObject({ pointRadius: 0, showLine: true })
    expect(other?.data).toHaveLength(99)
  })

  it('leaves rules to the annotation of the axis they stand on', () => {
    const figure = figureWith(
      { kind: 'rule', name: 'Threshold', tone: { kind: 'faint' }, along: 'x', at: 12, dash: 'dashed' },
      { kind: 'rule', name: 'Lower end', tone: { kind: 'accent' }, along: 'y', at: 110 },
    )
    expect(datasetsOf(figure, colours, null)).toEqual([])
    expect(Object.values(rulesOf(figure, colours))).toEqual([
      expect.objectContaining({ scaleID: 'y', value: 12, borderDash: [6, 4] }),
      expect.objectContaining({ scaleID: 'x', value: 110, borderColor: '#993311' }),
    ])
  })
})

describe('markers and line styles', () => {
  it('gives ten runs ten different markers', () => {
    expect(new Set(Array.from({ length: 10 }, (_, i) => runMarker(i).word)).size).toBe(10)
  })

  it('gives six methods six line styles, and a marker that no run of the first five has', () => {
    expect(new Set(Array.from({ length: 6 }, (_, i) => methodDash(i).join())).size).toBe(6)
    for (let i = 0; i < 5; i += 1) expect(methodMarker(i).hollow).not.toBe(runMarker(i).hollow)
  })
})
