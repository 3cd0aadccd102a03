import { describe, expect, it } from 'vitest'
import disturbed from '../check-values/computed/disturbed-line.json'
import { fQuantile } from '../numerics/f-distribution.ts'
import { lnPOfX } from '../temperature-integral/p-of-x.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { column, quantity } from '../units/quantity.ts'
import { constantRateIntegral } from './constant-rate-integral.ts'
import { vyazovkinWight, type LogIntegralReader } from './vyazovkin-wight.ts'

/** Reader of ln J at one level, from heating rates in K/min and temperatures in K. */
function reader(rates: readonly number[], T: readonly number[]): LogIntegralReader {
  const integrals = rates.map((rate, i) => constantRateIntegral(quantity(rate / 60, 'K/s'), column(Float64Array.of(T[i] as number), 'K')))
  return (Ea, lnJ, inverseT) => {
    integrals.forEach((integral, i) => {
      const value = integral.atLevel(Ea, 0)
      lnJ[i] = value.lnJ
      inverseT[i] = value.inverseT
    })
  }
}

const rates = disturbed.heatingRate_K_per_min
const disturbedT = disturbed.exactTemperature_K.map((text, i) => Number(text) + (disturbed.disturbance_K[i] as number))
const F = fQuantile(0.95, 4, 4)

/** S² by its definition. */
const variance = (Ea: number): number => {
  const J = rates.map((rate, i) => lnPOfX(Ea / (gasConstant_J_per_mol_K * (disturbedT[i] as number))) - Math.log(rate))
  const terms = J.flatMap((a, i) => J.flatMap((b, j) => (i === j ? [] : [(Math.exp(a - b) - 1) ** 2])))
  return terms.reduce((sum, term) => sum + term, 0) / (5 * 4)
}

describe('the interval of Vyazovkin and Wight', () => {
  it('matches the disturbed line: least S², where it lies, and both ends, to every printed digit', () => {
    const { vyazovkin: printed } = disturbed
    expect(F.toFixed(5)).toBe(printed.F_0_95_4_4)
    const result = vyazovkinWight(5, 201_530.7, F, reader(rates, disturbedT))
    expect(result.status).toBe('ok')
    expect((result.minimumEa / 1000).toFixed(4)).toBe(printed.varianceMinimumEa_kJ_per_mol)
    expect(result.minimumVariance.toFixed(8)).toBe(printed.varianceMinimum)
    expect([result.lower95, result.upper95].map((end) => (end / 1000).toFixed(3))).toEqual(printed.varianceRatioInterval_kJ_per_mol)
  })

  it('ends where S² by its definition is F times the least one, wherever the search starts', () => {
    for (const start of [150_000, 201_530, 260_000]) {
      const { minimumEa, minimumVariance, lower95, upper95 } = vyazovkinWight(5, start, F, reader(rates, disturbedT))
      for (const end of [lower95, upper95]) expect(Math.abs(variance(end) / (F * variance(minimumEa)) - 1)).toBeLessThan(1e-7)
      expect(Math.abs(minimumVariance / variance(minimumEa) - 1)).toBeLessThan(1e-9)
      // A minimum: higher on both sides.
      expect(variance(minimumEa * 1.001)).toBeGreaterThan(minimumVariance)
      expect(variance(minimumEa * 0.999)).toBeGreaterThan(minimumVariance)
    }
  })

  it('rests on exact integrals though it may start from others', () => {
    const read = reader(rates, disturbedT)
    const nearly: LogIntegralReader = (Ea, lnJ, inverseT) => {
      read(Ea, lnJ, inverseT)
      lnJ.forEach((value, i) => (lnJ[i] = value + 1e-4 * Math.sin(i)))
    }
    const plain = vyazovkinWight(5, 201_530, F, read)
    const started = vyazovkinWight(5, 201_530, F, read, nearly)
    for (const key of ['minimumEa', 'minimumVariance', 'lower95', 'upper95'] as const) {
      expect(Math.abs(started[key] / plain[key] - 1), `the ${key}`).toBeLessThan(1e-8)
    }
  })

  it('is Ea itself within rounding for error-free data', () => {
    const Ea = 200_000
    // A constant g(alpha) asks for beta in proportion to p(Ea/RT).
    const T = [540, 550, 560, 570]
    const exact = T.map((value) => Math.exp(lnPOfX(Ea / (gasConstant_J_per_mol_K * value)) - lnPOfX(Ea / (gasConstant_J_per_mol_K * 550))))
    const { status, lower95, upper95 } = vyazovkinWight(4, Ea, fQuantile(0.95, 3, 3), reader(exact, T))
    expect(status).toBe('ok')
    expect(lower95 / Ea).toBeCloseTo(1, 9)
    expect(upper95 / Ea).toBeCloseTo(1, 9)
    expect(upper95).toBeGreaterThanOrEqual(lower95)
  })

  it('leaves an end open that would lie beyond 1 or 1000 kJ/mol, and says so', () => {
    // Three runs that disagree: F(2, 2) = 19, and the heating rates are close.
    const { status, lower95, upper95, minimumEa } = vyazovkinWight(3, 250_000, fQuantile(0.95, 2, 2), reader([5, 6, 7], [600, 604, 605]))
    expect(status).toBe('end-outside')
    expect(minimumEa).toBeGreaterThan(0)
    expect(Number.isNaN(lower95) || Number.isNaN(upper95)).toBe(true)
    // Temperatures that fall with the heating rate: S² has no minimum above 0.
    const none = vyazovkinWight(3, 250_000, fQuantile(0.95, 2, 2), reader([5, 10, 20], [620, 610, 600]))
    expect(none).toMatchObject({ status: 'no-minimum', minimumEa: Number.NaN, lower95: Number.NaN, upper95: Number.NaN })
  })
})
