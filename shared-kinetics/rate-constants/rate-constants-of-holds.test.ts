import { describe, expect, it } from 'vitest'
import { rateConstantTableSchema } from '../contract/rate-constant-schema.ts'
import { Cancelled } from '../errors.ts'
import { reactionModels } from '../reaction-models/registry.ts'
import { quantity } from '../units/quantity.ts'
import { arrheniusLine } from './arrhenius-line.ts'
import { rateConstantsOfHolds, type HoldAtLevels } from './rate-constants-of-holds.ts'

const levels = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)
const [Ea, A] = [110e3, 2e12]
/** Exact first-order runs: t = -ln(1 - alpha)/k. */
const holds: readonly HoldAtLevels[] = [390, 400, 410, 420].map((T) => {
  const k = A * Math.exp(-Ea / (8.31446261815324 * T))
  return {
    label: `hold ${T}`,
    temperature_K: T,
    time_s: levels.map((alpha) => -Math.log1p(-alpha) / k),
    conversion: levels,
    conversionBeforeHold: 0.01,
  }
})
const energyOf = (model: keyof typeof reactionModels, zeroInTime: 'fixed' | 'free'): { Ea: number; lnA: number } => {
  const { rows } = rateConstantsOfHolds(holds, reactionModels[model], { zeroInTime, range: [0.1, 0.9] })
  return arrheniusLine(rows.map((row) => ({ temperature: quantity(row.temperature_K, 'K'), rateConstant: row.rateConstant })))
}

const noteOf = (of: readonly HoldAtLevels[], zeroInTime: 'fixed' | 'free') =>
  rateConstantsOfHolds(of, reactionModels.F1, { zeroInTime, range: [0.1, 0.9] }).notes[0]

describe('rate constants of isothermal runs', () => {
  it('under the true model give Ea and A back', () => {
    for (const zeroInTime of ['fixed', 'free'] as const) {
      const line = energyOf('F1', zeroInTime)
      expect(line.Ea / Ea).toBeCloseTo(1, 9)
      expect(line.lnA).toBeCloseTo(Math.log(A), 7)
    }
  })

  it('stop before any fit of a hold when nobody waits any more', () => {
    const fits = holds.length * Object.keys(reactionModels).length
    const make = (last: number): number => {
      let looks = 0
      rateConstantsOfHolds(holds, reactionModels.F1, { zeroInTime: 'free', range: [0.1, 0.9] }, () => {
        if (++looks === last) throw new Cancelled()
      })
      return looks
    }
    for (const last of [1, holds.length + 1, fits]) expect(() => make(last)).toThrow(Cancelled)
    expect(make(fits + 1)).toBe(fits)
  })

  // D. Zhou, D. J. W. Grant, J. Phys. Chem. A 108 (2004) 4239: isothermal runs give the right Ea with any model; A is another.
  it('under any model give the same Ea, since all times scale alike', () => {
    for (const model of ['A2', 'R3', 'D3', 'F2', 'P2'] as const) {
      const line = energyOf(model, 'free')
      expect(line.Ea / Ea).toBeCloseTo(1, 9)
      expect(Math.abs(line.lnA - Math.log(A))).toBeGreaterThan(0.1)
    }
  })

  it('say what they rest on and which runs gave none', () => {
    const backward = { ...(holds[0] as HoldAtLevels), label: 'backward', time_s: levels.map((alpha) => 100 - alpha) }
    const table = rateConstantsOfHolds([...holds, backward], reactionModels.F1, { zeroInTime: 'free', range: [0.1, 0.9] })
    expect(table).toMatchObject({ rateUnit: '1/s', source: { kind: 'isothermal-runs', name: 'First order (F1)' } })
    expect(table.rows.map((row) => row.label)).toEqual(['hold 390', 'hold 400', 'hold 410', 'hold 420'])
    expect(table.notes.map((note) => note.code)).toEqual(['model-assumed', 'rows-set-aside'])
    expect(table.notes[0]?.evidence).toMatchObject({ model: 'F1', convertedBeforeHold: 0.01 })
    expect(table.notes[0]?.message).toMatch(/nonlinear least squares/)
    expect(table.holdFits).toMatchObject({ model: 'F1', method: 'least-squares-of-conversion', zeroInTime: 'free', range: [0.1, 0.9] })
    expect(table.holdFits?.holds.map((hold) => hold.label)).toEqual(['hold 390', 'hold 400', 'hold 410', 'hold 420'])
    expect(rateConstantTableSchema.parse(JSON.parse(JSON.stringify(table)))).toEqual(table)
    expect(table.notes[1]?.message).toMatch(/backward/)
    expect(rateConstantsOfHolds([], reactionModels.F1, { zeroInTime: 'free', range: [0.1, 0.9] }).rows).toEqual([])
  })

  it('say where each fitted zero in time lies, as it was put into the runs', () => {
    const zeros = [-120, 45, 0, 300]
    const shifted = holds.map((hold, i) => ({ ...hold, time_s: Array.from(hold.time_s, (t) => t + (zeros[i] ?? 0)) }))
    const free = noteOf(shifted, 'free')
    expect(free?.message).toMatch(/zero in time fitted \(hold 390 −120 s, hold 400 45 s, hold 410 0 s, hold 420 300 s\)/)
    expect(free?.evidence['leastZero_s']).toBeCloseTo(-120, 6)
    expect(free?.evidence['greatestZero_s']).toBeCloseTo(300, 6)
    expect(noteOf(holds, 'fixed')?.evidence).toMatchObject({ leastZero_s: 0, greatestZero_s: 0 })
    // A note holds at most 1000 characters.
    const many = Array.from({ length: 12 }, (_, i) => ({
      ...(shifted[1] as HoldAtLevels),
      label: `a run with a very long name, number ${i}`,
    }))
    for (const model of Object.values(reactionModels)) {
      const { notes } = rateConstantsOfHolds(many, model, { zeroInTime: 'free', range: [0.1, 0.9] })
      expect(notes.every(({ message }) => message.length <= 1000)).toBe(true)
    }
  })
})
