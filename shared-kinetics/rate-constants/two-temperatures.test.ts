import { describe, expect, it } from 'vitest'
import tables from '../check-values/published/arrhenius-tables.json' with { type: 'json' }
import { inHalfUnits } from '../check-values/as-printed.ts'
import { celsiusToKelvin } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'
import { energyFromEquivalentTimes, equivalentTime } from './equivalent-time.ts'
import { energyFromRatio } from './energy-from-ratio.ts'
import { exponentialFactor } from './exponential-factor.ts'
import { factorPer10K } from './factor-per-10-k.ts'
import { lnPreExponential } from './ln-pre-exponential.ts'
import { rateRatio } from './rate-ratio.ts'
import { twoTemperatures } from './two-temperatures.ts'

const kelvin = (value: number) => quantity(value, 'K')
const kilojoules = (value: number) => quantity(value * 1000, 'J/mol')
// Where a value was recomputed with R = 8.314, as its book does: E from a ratio goes with R, and what follows from E goes with E/R.
const R = 8.31446261815324
/** A digit that was rounded at its very half may fall either way. */
const oneHalfUnit = 1.000001

describe('two temperatures', () => {
  it.each(tables.twoTemperatures.map((table) => [table.id, table] as const))('%s', (_, table) => {
    const [T1 = Number.NaN, T2 = Number.NaN] =
      'temperature_K' in table && table.temperature_K !== undefined
        ? table.temperature_K
        : (table.temperature_C ?? []).map((t) => celsiusToKelvin(t) as number)
    const [k1 = Number.NaN, k2 = Number.NaN] = table.k
    const { status, Ea, lnA } = twoTemperatures(
      { temperature: kelvin(T1), rateConstant: k1 },
      { temperature: kelvin(T2), rateConstant: k2 },
    )
    expect(status).toBe('ok')
    const there = 'kThere' in table ? k2 * rateRatio(Ea, kelvin(T2), kelvin(table.at_K ?? Number.NaN)) : Number.NaN
    const recomputed: readonly (readonly [number, string | undefined])[] = [
      [Ea / 1000, table.recomputed.Ea],
      [Math.exp(lnA), 'A' in table.recomputed ? table.recomputed.A : undefined],
      [there, 'kThere' in table ? table.kThere?.recomputed : undefined],
    ]
    for (const [value, text] of recomputed.filter(([, text]) => text !== undefined)) {
      expect(inHalfUnits(value, text ?? ''), `${value} against ${text}`).toBeLessThanOrEqual(oneHalfUnit)
    }
    const book = 'printed' in table && table.printed !== undefined ? table.printed : { Ea: Ea / 1000, within: 0 }
    expect(Math.abs(Ea / 1000 / book.Ea - 1)).toBeLessThanOrEqual(book.within)
    const bookThere = 'kThere' in table && table.kThere !== undefined ? table.kThere : { printed: 1, within: Number.POSITIVE_INFINITY }
    expect(Math.abs((Number.isNaN(there) ? 1 : there) / bookThere.printed - 1)).toBeLessThanOrEqual(bookThere.within)
  })

  it('W14: a table that was built with R = 8.314 (HELM workbook 6.4)', () => {
    const { Ea, lnA } = twoTemperatures(
      { temperature: kelvin(310), rateConstant: 7.757192 },
      { temperature: kelvin(350), rateConstant: 110.9601 },
    )
    expect(Math.abs((Ea * 8.314) / R / 60e3 - 1)).toBeLessThan(1e-5)
    expect(Math.abs(Math.exp(lnA) / 1e11 - 1)).toBeLessThan(1e-5)
  })

  it('are refused where k is not above 0, and give nothing where they are one temperature', () => {
    const one = { temperature: kelvin(300), rateConstant: 1 }
    expect(() => twoTemperatures(one, { temperature: kelvin(310), rateConstant: 0 })).toThrow(/Row 2/)
    expect(twoTemperatures(one, { temperature: kelvin(300), rateConstant: 2 })).toMatchObject({
      status: 'temperatures-not-distinct',
      Ea: Number.NaN,
    })
    expect(() => energyFromRatio(-2, kelvin(300), kelvin(310))).toThrow(/ratio/)
    expect(() => energyFromRatio(2, kelvin(0), kelvin(310))).toThrow(/first temperature/)
  })
})

describe('ratios alone', () => {
  it('W11: 1.47 times faster at 37 than at 30 °C (OpenStax: 43.0 kJ/mol; recomputed 42.9830 with 303 and 310 K)', () => {
    const { Ea } = energyFromRatio(1.47, celsiusToKelvin(30), celsiusToKelvin(37))
    expect(inHalfUnits(energyFromRatio(1.47, kelvin(303), kelvin(310)).Ea / 1000, '42.9830')).toBeLessThanOrEqual(oneHalfUnit)
    expect(Math.abs(Ea / 1000 - 43.0)).toBeLessThan(0.1)
  })

  it.each(tables.ratios.rows)('twice, three and four times faster from $from_C to $to_C °C', ({ from_C, to_C, Ea }) => {
    tables.ratios.columns.forEach((ratio, i) => {
      expect(
        inHalfUnits(energyFromRatio(ratio, celsiusToKelvin(from_C), celsiusToKelvin(to_C)).Ea / 1000, Ea[i] ?? ''),
      ).toBeLessThanOrEqual(oneHalfUnit)
    })
  })

  it('twice faster from 298 to 308 K, whole kelvins (recomputed 52.896)', () => {
    expect(inHalfUnits(energyFromRatio(2, kelvin(298), kelvin(308)).Ea / 1000, '52.896')).toBeLessThanOrEqual(oneHalfUnit)
  })

  it('the factor per 10 K at 25 °C, and back', () => {
    const { Ea, factor } = tables.ratios.factorFrom25C
    Ea.forEach((value, i) => {
      const q = factorPer10K(kilojoules(value), celsiusToKelvin(25))
      expect(inHalfUnits(q, factor[i] ?? '')).toBeLessThanOrEqual(oneHalfUnit)
      expect(energyFromRatio(q, celsiusToKelvin(25), celsiusToKelvin(35)).Ea / 1000).toBeCloseTo(value, 9)
    })
  })

  it('doubling per 10 K is four times over 20 K and 128 times over 70 K (OpenStax, Chemistry 2e, chapter 12)', () => {
    const { Ea } = energyFromRatio(4, kelvin(300), kelvin(320))
    expect(rateRatio(Ea, kelvin(300), kelvin(320))).toBeCloseTo(4, 12)
    expect(2 ** 7).toBe(128)
    // In an Arrhenius reaction the factor per 10 K falls with temperature, so the rule overstates the step from 370 K.
    expect(factorPer10K(Ea, kelvin(360))).toBeLessThan(2)
  })

  it('W17: milk, 30 min at 336 K equals 15 s at 347 K (Levenspiel ex. 2.3: 422 kJ/mol, recomputed 421.885 with R = 8.314)', () => {
    const { Ea } = energyFromEquivalentTimes({ time: 1800, temperature: kelvin(336) }, { time: 15, temperature: kelvin(347) })
    expect(inHalfUnits((Ea * 8.314) / R / 1000, '421.885')).toBeLessThanOrEqual(oneHalfUnit)
    expect(Math.abs(Ea / 1000 - 422)).toBeLessThan(0.5)
    expect(equivalentTime(quantity(1800, 's'), kelvin(336), kelvin(347), Ea)).toBeCloseTo(15, 9)
    expect(() => energyFromEquivalentTimes({ time: 0, temperature: kelvin(336) }, { time: 15, temperature: kelvin(347) })).toThrow(/time/)
  })
})

describe('one rate constant and a known Ea', () => {
  it('W12: A of cyclobutane, 6.1e-8 1/s at 325 °C, 261 kJ/mol (OpenStax 3.9e15; recomputed with R = 8.314: 3.79e15, with 598 K 3.84e15)', () => {
    const A = Math.exp(lnPreExponential(6.1e-8, celsiusToKelvin(325), kilojoules(261)))
    const withOldR = kilojoules((261 * R) / 8.314)
    expect(inHalfUnits(Math.exp(lnPreExponential(6.1e-8, celsiusToKelvin(325), withOldR)), '3.79e15')).toBeLessThanOrEqual(oneHalfUnit)
    expect(inHalfUnits(Math.exp(lnPreExponential(6.1e-8, kelvin(598), withOldR)), '3.84e15')).toBeLessThanOrEqual(oneHalfUnit)
    expect(Math.abs(A / 3.9e15 - 1)).toBeLessThan(0.04)
  })

  it('W16: 3.46e-2 1/s at 298 K, 50.2 kJ/mol, at 350 K (Chang ex. 13.9: 0.702; recomputed 0.70217 with R = 8.314)', () => {
    const k = 3.46e-2 * rateRatio(kilojoules(50.2), kelvin(298), kelvin(350))
    expect(inHalfUnits(3.46e-2 * rateRatio(kilojoules((50.2 * R) / 8.314), kelvin(298), kelvin(350)), '0.70217')).toBeLessThanOrEqual(
      oneHalfUnit,
    )
    expect(Math.abs(k - 0.702)).toBeLessThan(0.001)
  })

  it('the exponential factor is k/A', () => {
    const [T, Ea] = [kelvin(300), kilojoules(50)]
    expect(Math.log(2.5 / exponentialFactor(Ea, T))).toBeCloseTo(lnPreExponential(2.5, T, Ea), 12)
    expect(exponentialFactor(kilojoules(0), T)).toBe(1)
  })
})
