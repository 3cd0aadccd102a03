import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import tables from '../check-values/published/arrhenius-tables.json' with { type: 'json' }
import computed from '../check-values/computed/rate-constant-lines.json' with { type: 'json' }
import { arrheniusAtRow, arrheniusFigure } from '../figure/arrhenius-figure.ts'
import type { RateConstantTable } from '../rate-constants/rate-constant-table.ts'
import { evaluateRateConstants } from './evaluate-rate-constants.ts'

function tableOf(id: string, change: Partial<RateConstantTable> = {}): RateConstantTable {
  const found = tables.lines.find((line) => line.id === id)
  if (found === undefined) throw new Error(`no table ${id}`)
  const { temperature_K = [] } = found as { readonly temperature_K?: readonly number[] }
  return {
    rows: temperature_K.map((T, i) => ({
      temperature_K: T,
      rateConstant: found.k[i] ?? Number.NaN,
      standardUncertainty: null,
      label: null,
      use: true,
    })),
    rateUnit: found.unit,
    temperatureUnitShown: 'K',
    predictAt_K: [],
    source: { kind: 'typed', name: null, sha256: null },
    notes: [],
    ...change,
  }
}
const codes = (table: RateConstantTable): string[] =>
  evaluateRateConstants(table).findings.map((finding) => `${finding.severity} ${finding.code}`)

/** ln A = ln k₁ + Ea/(R T₁) of 298 and 308 K, linear in both ln k: at 1 and 0 these are its sensitivities. */
const lnAOf = (y1: number, y2: number): number => y1 + (y2 - y1) / (1 / 298 - 1 / 308) / 298

describe('a table of rate constants, evaluated', () => {
  it('gives line, predictions and factors in the units of the wire', () => {
    const result = evaluateRateConstants(tableOf('W8', { predictAt_K: [288.15, 400] }))
    // Daniels & Johnston's N2O5 (recomputed 102.8979 kJ/mol, A 3.8163e13 1/s).
    expect(result.line.Ea_kJ_per_mol).toBeCloseTo(102.8979, 4)
    expect((result.line.A ?? 0) / 3.8163e13).toBeCloseTo(1, 4)
    expect(result.line.lnA_per_s).toBe(result.line.lnA)
    expect(result.line.interval).toEqual({ kind: 'student-t', level: 0.95, dof: 4 })
    const [cold, hot] = computed.bands.rows
    expect((result.predictions[0]?.rateConstant ?? 0) / Number(cold?.k)).toBeCloseTo(1, 10)
    expect((result.predictions[1]?.newUpper95 ?? 0) / Number(hot?.newUpper95)).toBeCloseTo(1, 10)
    expect(result.predictions.map((at) => at.extrapolation.side)).toEqual(['inside', 'above'])
    expect(result.eyring?.enthalpy_kJ_per_mol.value).toBeCloseTo(Number(computed.eyring.enthalpy_J_per_mol) / 1000, 8)
    expect(result.eyring?.entropy_J_per_mol_K.value).toBeCloseTo(Number(computed.eyring.entropy_J_per_mol_K), 8)
    expect(result.factorsPer10K.map((factor) => factor.from_K > 273)).toEqual([true, true])
    expect(result.curvature?.t).toBeCloseTo(Number(computed.quadratic.find((row) => row.table === 'W8')?.t), 8)
    expect(result.findings.map((finding) => finding.code)).toEqual(['prediction-extrapolated'])
  })

  it('carries the unit of k: per minute, only ln A and k change', () => {
    const perSecond = evaluateRateConstants(tableOf('W8'))
    const W8 = tableOf('W8')
    const perMinute = evaluateRateConstants({
      ...W8,
      rateUnit: 'min-1',
      rows: W8.rows.map((row) => ({ ...row, rateConstant: row.rateConstant * 60 })),
    })
    expect(perMinute.rateUnit).toBe('1/min')
    expect(perMinute.line.Ea_kJ_per_mol).toBeCloseTo(perSecond.line.Ea_kJ_per_mol ?? 0, 9)
    expect((perMinute.line.lnA ?? 0) - (perSecond.line.lnA ?? 0)).toBeCloseTo(Math.log(60), 9)
    expect(perMinute.line.lnA_per_s).toBeCloseTo(perSecond.line.lnA ?? 0, 9)
    expect(perMinute.eyring?.entropy_J_per_mol_K.value).toBeCloseTo(perSecond.eyring?.entropy_J_per_mol_K.value ?? 0, 8)
  })

  it('between neighbouring temperatures Ea is that of the two rows, and with two rows that of the line', () => {
    const W8 = tableOf('W8')
    const { betweenTemperatures, line } = evaluateRateConstants({ ...W8, rows: W8.rows.slice(1, 3) })
    expect(betweenTemperatures).toHaveLength(1)
    // 298 and 308 K: R ln(1.35e-4/3.46e-5)/(1/298 - 1/308).
    expect(betweenTemperatures[0]?.Ea_kJ_per_mol).toBeCloseTo((8.31446261815324e-3 * Math.log(1.35e-4 / 3.46e-5)) / (1 / 298 - 1 / 308), 9)
    expect(line.Ea_kJ_per_mol).toBeCloseTo(betweenTemperatures[0]?.Ea_kJ_per_mol ?? 0, 9)
    expect(line.lnA).toBeCloseTo(betweenTemperatures[0]?.lnA ?? 0, 9)
    expect(evaluateRateConstants(W8).betweenTemperatures.map(({ from_K, to_K }) => [from_K, to_K])).toEqual([
      [273, 298],
      [298, 308],
      [308, 318],
      [318, 328],
      [328, 338],
    ])
    expect(evaluateRateConstants({ ...W8, rows: W8.rows.slice(0, 1) }).betweenTemperatures).toEqual([])
  })

  it('two temperatures: no interval, with its reason, unless u(k) is stated', () => {
    const W8 = tableOf('W8', { predictAt_K: [300] })
    const bare = evaluateRateConstants({ ...W8, rows: W8.rows.slice(1, 3) })
    expect(bare).toMatchObject({
      line: { intervalStatus: 'two-temperatures', lnAIntervalStatus: 'two-temperatures' },
      predictions: [{ intervalStatus: 'two-temperatures', lineLower95: null }],
      betweenTemperatures: [{ intervalStatus: 'two-temperatures', lower95_kJ_per_mol: null }],
    })
    const rows = W8.rows.slice(1, 3).map((row, i) => ({ ...row, standardUncertainty: row.rateConstant * (i === 0 ? 0.03 : 0.04) }))
    const [pair] = evaluateRateConstants({ ...W8, rows }).betweenTemperatures
    // Relative 3 and 4 % make 5 % of the ratio: u(Ea) = R 0.05/(1/298 - 1/308), by JCGM 100, 5.1.2.
    const u = (8.31446261815324e-3 * 0.05) / (1 / 298 - 1 / 308)
    expect(pair?.standardUncertainty_kJ_per_mol).toBeCloseTo(u, 9)
    expect((pair?.upper95_kJ_per_mol ?? 0) - (pair?.Ea_kJ_per_mol ?? 0)).toBeCloseTo(1.959964 * u, 5)
    expect(pair?.lnAStandardUncertainty).toBeCloseTo(Math.hypot(0.03 * lnAOf(1, 0), 0.04 * lnAOf(0, 1)), 9)
  })

  it('says the standard state of an entropy that needs one', () => {
    const result = evaluateRateConstants(tableOf('W1', { rateUnit: 'L/(mol min)' }))
    expect(result.eyring?.standardStateOf).toBe('L/(mol s)')
    expect(result.line.lnA_per_s).toBeNull()
    expect(evaluateRateConstants(tableOf('W8')).eyring?.standardStateOf).toBeNull()
  })

  it('a row not used enters nothing and keeps its residual', () => {
    const W8 = tableOf('W8')
    const slip = { ...W8, rows: W8.rows.map((row, i) => (i === 2 ? { ...row, rateConstant: row.rateConstant * 10, use: false } : row)) }
    const result = evaluateRateConstants(slip)
    expect(result.line.points).toBe(5)
    expect(result.rows[2]?.residual).toBeCloseTo(Math.log(10), 1)
  })

  it('weighs where every row used has an uncertainty, and says so', () => {
    const W1 = tableOf('W1')
    const rows = W1.rows.map((row, i) => ({
      ...row,
      standardUncertainty: row.rateConstant * Number(computed.weighted.relativeUncertainty[i]),
    }))
    const result = evaluateRateConstants({ ...W1, rows })
    expect(result.weightedLine?.weighting).toBe('stated-uncertainties')
    expect((result.weightedLine?.Ea_kJ_per_mol ?? 0) * 1000).toBeCloseTo(Number(computed.weighted.Ea_J_per_mol), 4)
    expect(result.line.Ea_kJ_per_mol).toBeCloseTo(185.3079, 4)
    expect(evaluateRateConstants(W1).weightedLine).toBeNull()
  })
})

describe('far from the data', () => {
  it('the band keeps to positive temperatures, from coldest to hottest or beyond', () => {
    const temperature = fc.double({ min: 1, max: 10_000, noNaN: true })
    fc.assert(
      fc.property(fc.array(temperature, { maxLength: 5 }), (predictAt_K) => {
        const { band } = evaluateRateConstants(tableOf('W8', { predictAt_K }))
        expect(band.temperature_K.every((T) => T > 0 && Number.isFinite(T))).toBe(true)
        expect(Math.max(...band.temperature_K)).toBeGreaterThanOrEqual(Math.max(338, ...predictAt_K) * (1 - 1e-12))
        expect(Math.min(...band.temperature_K)).toBeLessThanOrEqual(Math.min(273, ...predictAt_K) * (1 + 1e-12))
      }),
      { numRuns: 40 },
    )
  })

  it('a k too small for a number is none, and its logarithm stays', () => {
    const result = evaluateRateConstants(tableOf('W8', { predictAt_K: [10] }))
    const [at] = result.predictions
    // ln k = ln A - Ea/(R T) with the published table's own Ea and A.
    expect(at?.lnK).toBeCloseTo(Math.log(3.8163e13) - 102_897.9 / (8.31446261815324 * 10), 0)
    expect(at).toMatchObject({ rateConstant: null, lineLower95: null, newUpper95: null, exponentialFactor: null })
    expect((at?.lnNewLower95 ?? 0) < (at?.lnLineLower95 ?? 0) && (at?.lnLineLower95 ?? 0) < (at?.lnK ?? 0)).toBe(true)
    expect((at?.lnNewUpper95 ?? 0) > (at?.lnLineUpper95 ?? 0) && (at?.lnLineUpper95 ?? 0) > (at?.lnK ?? 0)).toBe(true)
    expect(result.findings.map((finding) => finding.code)).toContain('prediction-extrapolated')
  })

  it('no number of a prediction is 0, however far', () => {
    fc.assert(
      fc.property(fc.double({ min: 1, max: 10_000, noNaN: true }), (at) => {
        const [row] = evaluateRateConstants(tableOf('W8', { predictAt_K: [at] })).predictions
        expect([row?.rateConstant, row?.lineLower95, row?.newLower95, row?.exponentialFactor, row?.factorPer10K.factor]).not.toContain(0)
        expect(row?.lnK).not.toBeNull()
      }),
      { numRuns: 40 },
    )
  })
})

describe('what is noticed about a table', () => {
  it('too few temperatures, by how many there are', () => {
    const W8 = tableOf('W8')
    expect(codes({ ...W8, rows: [] })).toEqual(['stop few-temperatures'])
    expect(codes({ ...W8, rows: W8.rows.slice(0, 1) })).toEqual(['stop few-temperatures'])
    expect(codes({ ...W8, rows: W8.rows.slice(0, 2) })).toEqual(['caution few-temperatures'])
    const one = evaluateRateConstants({ ...W8, rows: W8.rows.slice(0, 1), predictAt_K: [300] })
    expect([one.line.Ea_kJ_per_mol, one.line.lnA, one.eyring, one.predictions[0]?.rateConstant]).toEqual([null, null, null, null])
    expect(arrheniusFigure(one).description).toMatch(/no line/)
  })

  it('an interval that is wide: for want of points (W4: ±19.3 of 181.9 kJ/mol with five, W15 with four), or by scatter', () => {
    expect(codes(tableOf('W4'))).toContain('note few-temperatures')
    const rows = tableOf('W8').rows.map((row, i) => ({ ...row, rateConstant: row.rateConstant * (i % 2 === 0 ? 3 : 1 / 3) }))
    expect(codes(tableOf('W8', { rows }))).toContain('caution few-temperatures')
  })

  it('a table whose printed interval and slope cannot be had from its rate constants is noticed to be wide', () => {
    const { wrongInterval } = tables
    const rows = wrongInterval.temperature_K.map((temperature_K, i) => ({
      temperature_K,
      rateConstant: wrongInterval.k[i] ?? Number.NaN,
      standardUncertainty: null,
      label: null,
      use: true,
    }))
    const result = evaluateRateConstants(tableOf('W8', { rows }))
    expect(result.findings.map((finding) => finding.code)).toContain('few-temperatures')
    expect(result.line.Ea_kJ_per_mol).toBeCloseTo(Number(wrongInterval.recomputed.Ea), 1)
    expect(result.line.interval.dof).toBe(3)
  })

  it('a bend, an extrapolation near and far, an Ea that cannot be meant, a unit nobody stated', () => {
    expect(codes(tableOf('W4'))).toContain('caution lines-not-straight')
    expect(codes(tableOf('W8', { predictAt_K: [345] }))).toEqual(['note prediction-extrapolated'])
    expect(codes(tableOf('W8', { predictAt_K: [500] }))).toEqual(['caution prediction-extrapolated'])
    const far = evaluateRateConstants(tableOf('W8', { predictAt_K: [345, 100.05, 500] }))
    // 1/100.05 - 1/273 over 1/273 - 1/338 is 8.99.
    expect(far.findings).toMatchObject([
      {
        severity: 'stop',
        title: '3 predictions lie beyond the data, -173.1 °C the farthest: 173 K below the data, 9 of their span in 1/T',
      },
    ])
    expect(far.predictions.map(({ factorPer10K }) => factorPer10K.isWithinData)).toEqual([false, false, false])
    // 328 to 338 K ends at the hottest temperature, 335 to 345 K beyond it.
    const near = evaluateRateConstants(tableOf('W8', { predictAt_K: [328, 335] }))
    expect(near.predictions.map(({ factorPer10K }) => factorPer10K.isWithinData)).toEqual([true, false])
    expect(codes(tableOf('W8', { predictAt_K: [273, 300, 338] }))).toEqual([])
    expect(codes(tableOf('W8', { rateUnit: '' }))).toEqual(['note rate-unit-missing'])
    const W8 = tableOf('W8')
    const falling = W8.rows.map((row) => ({ ...row, rateConstant: 1 / row.rateConstant }))
    expect(codes({ ...W8, rows: falling })).toContain('caution energy-not-positive')
    const small = W8.rows.map((row) => ({ ...row, rateConstant: row.rateConstant ** 0.1 }))
    expect(codes({ ...W8, rows: small })).toContain('caution energy-implausible')
  })
})

describe('the Arrhenius figure', () => {
  it('holds points, line, bands and predictions within its axes', () => {
    const W8 = tableOf('W8', { predictAt_K: [400], temperatureUnitShown: 'C' })
    const figure = arrheniusFigure(evaluateRateConstants({ ...W8, rows: W8.rows.map((row, i) => ({ ...row, use: i !== 1 })) }))
    expect(figure.marks.map((mark) => mark.name)).toEqual([
      '95 % band, new measurement',
      '95 % band, line',
      'Arrhenius line',
      'Not used',
      'Rate constants',
      'Predicted',
    ])
    const [xMin = 0, xMax = 0, yMin = 0, yMax = 0] = [figure.x.min, figure.x.max, figure.y.min, figure.y.max].map(
      (end) => end ?? Number.NaN,
    )
    for (const mark of figure.marks) {
      if (mark.kind === 'rule') throw new Error('no rules here')
      for (const x of Array.from(mark.x)) expect(x >= xMin && x <= xMax).toBe(true)
      const ends = mark.kind === 'band' ? [mark.lower, mark.upper] : [mark.y]
      for (const y of ends.flatMap((values) => Array.from(values))) expect(y >= yMin && y <= yMax).toBe(true)
    }
    expect(figure.y.unit).toBe('k in 1/s')
    expect(figure.x.second?.unit).toBe('°C')
  })

  it('picks out one row', () => {
    const result = evaluateRateConstants(tableOf('W8'))
    expect(arrheniusAtRow(result, 1)).toMatchObject([{ x: [1000 / 298], y: [Math.log(3.46e-5)] }])
    expect(arrheniusAtRow(result, 99)).toEqual([])
  })
})
