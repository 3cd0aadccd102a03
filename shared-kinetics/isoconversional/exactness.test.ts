import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { exactA, exactModels, exactRamp, type ExactModel } from '../check-values/exact-single-step.ts'
import { quiet, seriesOf, type RunValues } from '../check-values/series-of-values.ts'
import { friedman } from './friedman.ts'
import { ozawaFlynnWallCorrected } from './ozawa-flynn-wall-corrected.ts'
import type { IsoconversionalMethod } from './result.ts'
import { vyazovkinIncremental } from './vyazovkin-incremental.ts'
import { vyazovkin } from './vyazovkin.ts'

const levels = [0.01, 0.02, 0.1, 0.3, 0.5, 0.7, 0.9, 0.99]
const models = Object.keys(exactModels) as ExactModel[]

/** Methods that make no approximation of their own. */
const exactMethods: readonly (readonly [string, IsoconversionalMethod])[] = [
  ['Friedman', friedman],
  ['OFW corrected', ozawaFlynnWallCorrected],
  ['Vyazovkin', vyazovkin],
  ['Vyazovkin, incremental', vyazovkinIncremental],
]

const rampsOf = (model: ExactModel, Ea_J_per_mol: number, x: number, rates: readonly number[]): RunValues[] => {
  const reaction = { Ea_J_per_mol, A_per_s: exactA(Ea_J_per_mol, model, x), model }
  return rates.map((rate, i) => exactRamp(reaction, rate, i, levels))
}
const furthest = (Ea: Float64Array, truth: number): number => Math.max(...Ea.map((value) => Math.abs(value / truth - 1)))

describe.each(exactMethods)('%s on exact temperatures and reaction rates', (_, method) => {
  it.each(models)('gives the true Ea of %s to 1e-8, from Ea/RT 8 to 90', (model) => {
    for (const [Ea, x] of [
      [25e3, 8],
      [60e3, 14],
      [120e3, 25],
      [200e3, 45],
      [480e3, 90],
    ] as const) {
      const result = method(seriesOf(levels, rampsOf(model, Ea, x, [1, 2, 5, 10, 20])), quiet)
      expect(result.status).toEqual(levels.map(() => 'ok'))
      expect(furthest(result.Ea, Ea), `Ea ${Ea}, Ea/RT ${x}`).toBeLessThan(1e-8)
      for (const error of result.systematicError) expect(error).toBe(0)
    }
  })

  const numbers = {
    model: fc.constantFrom(...models),
    Ea: fc.double({ min: 20e3, max: 500e3, noNaN: true }),
    x: fc.double({ min: 8, max: 90, noNaN: true }),
    ratio: fc.double({ min: 1.5, max: 4, noNaN: true }),
  }

  it('gives it for any reaction and any rates', () => {
    fc.assert(
      fc.property(fc.record(numbers), fc.integer({ min: 2, max: 5 }), ({ model, Ea, x, ratio }, runs) => {
        const rates = Array.from({ length: runs }, (_unused, i) => 1.5 * ratio ** i)
        expect(furthest(method(seriesOf(levels, rampsOf(model, Ea, x, rates)), quiet).Ea, Ea)).toBeLessThan(1e-8)
      }),
      {
        numRuns: 60,
        // Its last level is reached above 20,000 K.
        examples: [[{ model: 'F2', Ea: 484_656, x: 8, ratio: 4 }, 4]],
      },
    )
  })

  it('does not change when an exact run is added, be it a new heating rate or a replicate', () => {
    fc.assert(
      fc.property(
        fc.record(numbers),
        fc.double({ min: 0.3, max: 60, noNaN: true }),
        fc.boolean(),
        ({ model, Ea, x, ratio }, added, replicate) => {
          const rates = [2, 2 * ratio, 2 * ratio * ratio]
          const all = rampsOf(model, Ea, x, [...rates, replicate ? rates[1]! : added])
          const before = method(seriesOf(levels, all.slice(0, 3)), quiet).Ea
          const after = method(seriesOf(levels, replicate ? [...all.slice(0, 3), { ...all[3]!, programmeGroup: 1 }] : all), quiet).Ea
          after.forEach((value, k) => expect(Math.abs(value / before[k]! - 1)).toBeLessThan(1e-8))
        },
      ),
      { numRuns: 40 },
    )
  })
})

/** The same ramp as a measured history with the samples at these shares of it. */
const sampled = (run: RunValues, shares: readonly number[]): RunValues => {
  const end = run.history!.time_s[1]!
  const [T0, T1] = [run.history!.temperature_K[0]!, run.history!.temperature_K[1]!]
  const at = [0, ...shares, 1]
  return {
    ...run,
    programme: { kind: 'general' },
    history: { time_s: at.map((share) => share * end), temperature_K: at.map((share) => T0 + share * (T1 - T0)) },
  }
}

describe.each([
  ['Vyazovkin', vyazovkin],
  ['Vyazovkin, incremental', vyazovkinIncremental],
] as const)('%s over measured histories', (_, method) => {
  it('does not change when a run is resampled: exact ramps keep their Ea whatever samples describe them', () => {
    const shares = fc
      .array(fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }), { maxLength: 60 })
      .map((values) => values.toSorted((a, b) => a - b))
    fc.assert(
      fc.property(fc.constantFrom(...models), fc.array(shares, { minLength: 3, maxLength: 3 }), (model, samples) => {
        const ramps = rampsOf(model, 140e3, 28, [2, 6, 18])
        const result = method(
          seriesOf(
            levels,
            ramps.map((run, i) => sampled(run, samples[i]!)),
          ),
          quiet,
        )
        expect(furthest(result.Ea, 140e3)).toBeLessThan(1e-8)
      }),
      { numRuns: 25 },
    )
  })
})
