import { describe, expect, it } from 'vitest'
import { quiet } from '../check-values/series-of-values.ts'
import { autocatalytic, durationOf, evenTimes, firstOrder, ramp, reducedTime, runOf, temperatureOf } from '../check-values/simulated-run.ts'
import type { MethodId } from '../isoconversional/result.ts'
import { evaluateStudy } from './evaluate-study.ts'

const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }
const levels = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)
const contracting = (theta: number): number => (theta < 1 ? 1 - (1 - theta) ** 3 : 1)

const toNearest = (value: number, unit: number): number => Math.round(value / unit) * unit

/** A run as a balance writes it: 8 mg to 1 µg, temperature to 0.01 K, no noise. */
function fileOf(rate_K_per_min: number, model: (theta: number) => number) {
  const programme = ramp(360, rate_K_per_min, 850)
  const time = evenTimes(durationOf(programme), 4901)
  const theta = reducedTime(step, programme, time)
  return runOf(`${rate_K_per_min}`, {
    time_s: time,
    temperature_K: time.map((t) => toNearest(temperatureOf(programme, t), 0.01)),
    signals: [{ quantity: 'mass', unit: 'kg', values: theta.map((value) => toNearest(8e-6 * (1 - 0.9 * model(value)), 1e-9)) }],
  })
}

describe.each([
  ['first order', firstOrder],
  ['contracting sphere', contracting],
  ['autocatalytic', autocatalytic(0.01)],
])('files of 1 µg in 8 mg and 0.01 K, %s', (_, model) => {
  const runs = [1, 2, 5, 10, 20].map((rate) => fileOf(rate, model))
  const settings = { signal: null, levels, methods: null, window: null, baseline: 'area-proportional', meanRange: [0.1, 0.9] } as const
  const result = evaluateStudy(
    { runs: runs.map((run) => run.info), settings },
    new Map(runs.map((run) => [run.info.columnsKey, run.columns])),
    quiet,
  )
  const worst = (method: MethodId): number =>
    Math.max(
      ...(result.profiles
        .find((profile) => profile.method === method)
        ?.Ea_kJ_per_mol.map((Ea) => 100 * Math.abs((Ea ?? Infinity) / 150 - 1)) ?? [Infinity]),
    )

  it.each([
    ['vyazovkin', 0.05],
    ['ofw-corrected', 0.05],
    ['friedman', 0.5],
    ['vyazovkin-incremental', 0.5],
  ] as const)('%s gives Ea within %d %%', (method, allowed) => {
    expect(worst(method)).toBeLessThan(allowed)
  })

  it('the other methods err by what they say of themselves', () => {
    for (const method of ['ofw', 'kas', 'starink'] as const) {
      const profile = result.profiles.find((one) => one.method === method)
      profile?.Ea_kJ_per_mol.forEach((Ea, k) => {
        const stated = profile.systematicError_percent[k] ?? Number.NaN
        expect(Math.abs(100 * ((Ea ?? Number.NaN) / 150 - 1) - stated), `${method}, ${levels[k]}`).toBeLessThan(0.05)
      })
      expect(profile?.Ea_kJ_per_mol).toHaveLength(19)
    }
  })

  it('there is nothing to be careful of', () => {
    expect(result.findings.filter(({ severity }) => severity !== 'note')).toEqual([])
  })
})
