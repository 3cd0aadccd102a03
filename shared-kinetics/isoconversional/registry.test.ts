import * as fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { temperatureAt, underConstantRate } from '../check-values/exact-simulation.ts'
import { constantHeatingRate, hold, quiet, seriesOf, type RunValues } from '../check-values/series-of-values.ts'
import { methodsOnRequest } from '../contract/methods-on-request.ts'
import { sources } from '../sources.ts'
import { methods } from './registry.ts'
import { methodIds } from './result.ts'

const step = { Ea_J_per_mol: 120_000, A_per_s: 1e11, share: 1 }
const levels = [0.2, 0.5, 0.8]

/** Ramps whose temperatures are moved off the exact ones, so that no result is exact by luck; history from 300 K on. */
function ramps(rates: readonly number[], moved_K: readonly number[]): RunValues[] {
  return rates.map((beta, i) => {
    const temperature_K = levels.map((level, k) => temperatureAt([step], beta / 60, level) + moved_K[(3 * i + k) % moved_K.length]!)
    return {
      programme: constantHeatingRate(beta),
      programmeGroup: i,
      temperature_K,
      time_s: temperature_K.map((T) => ((T - 300) * 60) / beta),
      reactionRate_per_s: temperature_K.map((T) => underConstantRate([step], beta / 60, T).rate_per_s),
      history: { time_s: [0, (400 * 60) / beta], temperature_K: [300, 700] },
    }
  })
}
const asGeneral = (run: RunValues): RunValues => ({ ...run, programme: { kind: 'general' } })
const asHold = (run: RunValues, i: number): RunValues => ({
  ...run,
  programme: hold(430 + 12 * i),
  history: { time_s: [0, 1e6], temperature_K: [430 + 12 * i, 430 + 12 * i] },
})

/** Runs in each form a method takes. */
const formsOf = (id: (typeof methodIds)[number], runs: readonly RunValues[]): RunValues[][] =>
  methods[id].info.appliesTo.map((kind) =>
    kind === 'general' ? runs.map(asGeneral) : kind === 'isothermal' ? runs.map(asHold) : [...runs],
  )

describe('the register of methods', () => {
  it('has every id once, with its own info, label and sources', () => {
    expect(Object.keys(methods)).toEqual([...methodIds])
    for (const id of methodIds) {
      expect(methods[id].info.id).toBe(id)
      expect(methods[id].info.sources.length).toBeGreaterThan(0)
      for (const source of methods[id].info.sources) expect(Object.keys(sources)).toContain(source)
    }
    expect(new Set(methodIds.map((id) => methods[id].info.label)).size).toBe(methodIds.length)
  })

  it('runs by itself what a person need not ask for, in the order of the contract, and offers the rest', () => {
    expect(methodIds.filter((id) => methods[id].info.byDefault)).toEqual([
      'friedman',
      'ofw',
      'ofw-corrected',
      'kas',
      'starink',
      'vyazovkin',
      'vyazovkin-incremental',
      'isothermal-integral',
    ])
    expect(methodIds.filter((id) => !methods[id].info.byDefault)).toEqual([...methodsOnRequest])
    for (const id of methodsOnRequest) expect(methods[id].info.appliesTo).toEqual(['constant-heating-rate'])
  })

  it.each(methodIds)('%s gives whole columns of one length and one kind of evidence', (id) => {
    for (const runs of formsOf(id, ramps([2, 5, 10, 20], [0.1, -0.2, 0.3, 0, -0.1]))) {
      const result = methods[id].run(seriesOf(levels, runs), quiet)
      expect(result.method).toBe(id)
      expect(result.status).toEqual(['ok', 'ok', 'ok'])
      for (const column of [result.Ea, result.standardError, result.lower95, result.upper95, result.r2]) {
        expect(column).toHaveLength(3)
        expect(column.every(Number.isFinite)).toBe(true)
      }
      for (let k = 0; k < 3; k++) {
        expect(result.standardError[k]).toBeGreaterThan(0)
        expect(result.lower95[k]).toBeLessThan(result.Ea[k]!)
        expect(result.upper95[k]).toBeGreaterThan(result.Ea[k]!)
      }
      expect([result.lines.length, result.phi.length]).toEqual(methods[id].info.evidence === 'line' ? [3, 0] : [0, 3])
    }
  })
})

/** Largest relative difference of two columns. */
const difference = (a: Float64Array, b: Float64Array): number => Math.max(...a.map((value, k) => Math.abs(value / b[k]! - 1)))

describe.each(methodIds)('Ea by %s', (id) => {
  const moved = fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 12, maxLength: 12 })
  const energies = (runs: readonly RunValues[]): Float64Array => methods[id].run(seriesOf(levels, runs), quiet).Ea

  it('does not depend on the order of the runs', () => {
    fc.assert(
      fc.property(moved, fc.shuffledSubarray([0, 1, 2, 3], { minLength: 4 }), (offsets, order) => {
        for (const runs of formsOf(id, ramps([2, 5, 10, 20], offsets))) {
          expect(difference(energies(order.map((i) => runs[i]!)), energies(runs))).toBeLessThan(1e-9)
        }
      }),
      { numRuns: 25 },
    )
  })

  it('does not depend on where time starts nor on its unit', () => {
    fc.assert(
      fc.property(
        moved,
        fc.double({ min: -1e4, max: 1e4, noNaN: true }),
        fc.double({ min: 0.01, max: 100, noNaN: true }),
        (offsets, origin, unit) => {
          for (const runs of formsOf(id, ramps([2, 5, 10, 20], offsets))) {
            const scaled = runs.map(
              (run): RunValues => ({
                ...run,
                programme:
                  run.programme.kind === 'constant-heating-rate'
                    ? constantHeatingRate((60 * run.programme.heatingRate) / unit)
                    : run.programme,
                time_s: run.time_s!.map((t) => t * unit),
                reactionRate_per_s: run.reactionRate_per_s!.map((rate) => rate / unit),
                history: {
                  time_s: Array.from(run.history!.time_s, (t) => (t + origin) * unit),
                  temperature_K: run.history!.temperature_K,
                },
              }),
            )
            expect(difference(energies(scaled), energies(runs))).toBeLessThan(1e-9)
          }
        },
      ),
      { numRuns: 25 },
    )
  })
})
