import { describe, expect, it } from 'vitest'
import { kissinger } from '../peak-methods/kissinger.ts'
import type { PeakMethodResult, RunResult } from '../tasks/study-result.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity } from '../units/quantity.ts'
import { peakLineFigure } from './peak-line-figure.ts'

const rates_K_per_min = [2, 5, 10, 20]
const peaks_K = [500, 515, 527, 540]
const runs = rates_K_per_min.map(
  (rate, i) =>
    ({
      runId: `run-${i}`,
      label: `sample ${i}`,
      programme: 'constant-heating-rate',
      programmeGroup: i,
      heatingRate_K_per_min: rate,
    }) as RunResult,
)
const estimate = kissinger(
  peaks_K.map((T, i) => ({
    heatingRate: quantity((rates_K_per_min[i] ?? Number.NaN) / 60, 'K/s'),
    temperature: quantity(T, 'K'),
    programmeGroup: i,
  })),
)
const row: Pick<PeakMethodResult, 'method' | 'label' | 'line'> = {
  method: 'kissinger',
  label: 'Kissinger',
  line: {
    ordinate: 'ln(β/Tp²)',
    x_per_K: [...estimate.line.x_per_K],
    y: [...estimate.line.y],
    slope_K: estimate.line.slope_K,
    intercept: estimate.line.intercept,
  },
}

describe('line through the peaks', () => {
  const { marks, x, y } = peakLineFigure({ runs }, row)

  it('has a point for every run at ln(β/Tp²), β in K/min, over 1000/Tp, by its own colour and marker', () => {
    const points = marks.flatMap((mark) => (mark.kind === 'points' ? [mark] : []))
    expect(points.map((mark) => mark.name)).toEqual(['2 K/min', '5 K/min', '10 K/min', '20 K/min'])
    for (const [i, mark] of points.entries()) {
      const [T = Number.NaN, rate = Number.NaN] = [peaks_K[i], rates_K_per_min[i]]
      expect(mark.x[0]).toBeCloseTo(1000 / T, 12)
      expect(mark.y[0]).toBeCloseTo(Math.log(rate / T ** 2), 12)
      expect(mark.tone).toEqual({ kind: 'run', place: i / 3, index: i })
    }
    expect([x.label, x.second?.unit, y.label, y.unit]).toEqual(['1000/Tp', '°C', 'ln(β/Tp²)', 'β in K/min, T in K'])
  })

  it('has a line whose slope is −Ea/R, from before the first point to behind the last', () => {
    const line = marks.find((mark) => mark.kind === 'line')
    if (line === undefined) throw new Error('there is no line')
    const [x0 = 0, x1 = 0] = Array.from(line.x)
    const [y0 = 0, y1 = 0] = Array.from(line.y)
    expect(((y1 - y0) / (x1 - x0)) * 1000).toBeCloseTo(-Number(estimate.Ea) / gasConstant_J_per_mol_K, 6)
    expect(x0).toBeLessThan(1000 / 540)
    expect(x1).toBeGreaterThan(1000 / 500)
  })

  it('reaches K/min in base 10 where the ordinate is log β', () => {
    const log = {
      ...row,
      method: 'astm-e698',
      line: { ...row.line, ordinate: 'log β', y: rates_K_per_min.map((rate) => Math.log10(rate / 60)) },
    }
    const figure = peakLineFigure({ runs }, log as typeof row)
    const shown = figure.marks.flatMap((mark) => (mark.kind === 'points' ? [mark.y[0] ?? Number.NaN] : []))
    for (const [i, value] of shown.entries()) expect(value).toBeCloseTo(Math.log10(rates_K_per_min[i] ?? Number.NaN), 12)
    expect(shown).toHaveLength(4)
  })

  it('has no marks where a method has no line, and no line where none is determined', () => {
    expect(peakLineFigure({ runs }, { method: 'borchardt-daniels', label: 'Borchardt–Daniels', line: null }).marks).toEqual([])
    const flat = row.line === null ? null : { ...row.line, slope_K: null, intercept: null }
    expect(peakLineFigure({ runs }, { ...row, line: flat }).marks.map((mark) => mark.kind)).toEqual([
      'points',
      'points',
      'points',
      'points',
    ])
  })
})
