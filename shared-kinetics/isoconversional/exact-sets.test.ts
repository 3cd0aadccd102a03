import { describe, expect, it } from 'vitest'
import sets from '../check-values/computed/exact-single-step.json'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { friedman } from './friedman.ts'
import { kissingerAkahiraSunose } from './kissinger-akahira-sunose.ts'
import { ozawaFlynnWall } from './ozawa-flynn-wall.ts'
import { starink } from './starink.ts'
import { vyazovkin } from './vyazovkin.ts'

/** f(alpha) of the reaction models of the sets. */
const models: Readonly<Record<string, (alpha: number) => number>> = {
  F1: (a) => 1 - a,
  A2: (a) => 2 * (1 - a) * Math.sqrt(-Math.log(1 - a)),
  R3: (a) => 3 * (1 - a) ** (2 / 3),
  D3: (a) => (1.5 * (1 - a) ** (2 / 3)) / (1 - (1 - a) ** (1 / 3)),
}

/** Rounds to as many decimals as the printed value has. */
const asPrinted = (value: number, printed: string): string => value.toFixed((printed.split('.')[1] ?? '').length)

describe.each(sets.sets)('$name: $model, Ea $Ea_kJ_per_mol kJ/mol, exact to 20 digits', (set) => {
  const levels = set.levels.map((row) => row.level)
  const f = models[set.model] as (alpha: number) => number
  const Ea = set.Ea_kJ_per_mol * 1000
  const A_per_s = set.A_per_min / 60
  const series = constantRateSeries(
    levels,
    sets.heatingRate_K_per_min,
    set.levels.map((row) => row.temperature_K),
    (alpha, T) => A_per_s * Math.exp(-Ea / (gasConstant_J_per_mol_K * T)) * f(alpha),
  )

  it.each([
    ['ofw', ozawaFlynnWall],
    ['kas', kissingerAkahiraSunose],
    ['starink', starink],
  ] as const)('%s gives the printed Ea to all digits', (id, method) => {
    const result = method(series, quiet)
    set.levels.forEach((row, k) => {
      expect(asPrinted((result.Ea[k] as number) / 1000, row[id]), `alpha ${row.level}`).toBe(row[id])
      expect(result.status[k]).toBe('ok')
    })
  })

  it('Vyazovkin gives the true Ea to the digits of the printed temperatures', () => {
    const result = vyazovkin(series, quiet)
    // Temperatures printed to 5e-8 K, over a span of some 40 K, leave Ea open by a few 1e-9 of it.
    for (const value of result.Ea) expect(Math.abs(value / Ea - 1)).toBeLessThan(1e-8)
    for (const error of result.standardError) expect(error / Ea).toBeLessThan(1e-8)
    for (const curve of result.phi) expect(curve.phiMinimum).toBeCloseTo(20, 12)
  })

  it('Friedman gives the true Ea and ln[A f(alpha)]', () => {
    const result = friedman(series, quiet)
    levels.forEach((alpha, k) => {
      expect(Math.abs((result.Ea[k] as number) / Ea - 1)).toBeLessThan(1e-11)
      expect(result.lnAf[k]).toBeCloseTo(Math.log(A_per_s * f(alpha)), 8)
    })
  })
})
