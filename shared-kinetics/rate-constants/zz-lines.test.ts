import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import tables from '../check-values/published/arrhenius-tables.json' with { type: 'json' }
import computed from '../check-values/computed/rate-constant-lines.json' with { type: 'json' }
import { inHalfUnits } from '../check-values/as-printed.ts'
import { celsiusToKelvin } from '../units/convert.ts'
import { quantity } from '../units/quantity.ts'
import { arrheniusLine } from './arrhenius-line.ts'
import { eyringLine } from './eyring-line.ts'
import { lineCurvature } from './line-curvature.ts'
import { predictRateConstant } from './predict-rate-constant.ts'
import type { RateConstantPoint } from './rate-constant-point.ts'
fc.configureGlobal({ numRuns: 5000 })


interface Table {
  readonly temperature_K?: readonly number[]
  readonly temperature_C?: readonly number[]
  readonly k: readonly number[]
}

const pointsOf = ({ temperature_K, temperature_C, k }: Table): readonly RateConstantPoint[] => {
  const temperatures = temperature_K?.map((T) => quantity(T, 'K')) ?? temperature_C?.map(celsiusToKelvin) ?? []
  return k.map((rateConstant, i) => ({ temperature: temperatures[i] ?? quantity(Number.NaN, 'K'), rateConstant }))
}
const tableOf = (id: string): readonly RateConstantPoint[] => {
  const table = tables.lines.find((line) => line.id === id)
  if (table === undefined) throw new Error(`no table ${id}`)
  return pointsOf(table)
}
/** A digit that was rounded at its very half may fall either way. */
const oneHalfUnit = 1.000001
/** Relative distance from a number of 15 digits. */
const apart = (value: number, text: string): number => Math.abs(value / Number(text) - 1)

describe('the Arrhenius line through published tables', () => {
  it.each(tables.lines.map((table) => [table.id, table] as const))('%s: every recomputed digit', (_, table) => {
    const line = arrheniusLine(pointsOf(table))
    const { recomputed } = table
    expect(line.status).toBe('ok')
    const values: Readonly<Record<string, number>> = {
      Ea: line.Ea / 1000,
      se: line.standardError / 1000,
      half95: (line.upper95 - line.lower95) / 2000,
      lnA: line.lnA,
      A: Math.exp(line.lnA),
      r2: line.r2,
      slope: line.fit.slope,
    }
    for (const [name, text] of Object.entries(recomputed)) {
      expect(inHalfUnits(values[name] ?? Number.NaN, text), `${name}: ${values[name]} against ${text}`).toBeLessThanOrEqual(oneHalfUnit)
    }
  })

  // Printed answers are rounded by hand: two to five per cent, unless the book worked with full digits.
  it.each(tables.lines.flatMap((table) => ('printed' in table && table.printed !== undefined ? [[table.id, table] as const] : [])))(
    '%s: the printed answer within what rounding by hand allows',
    (_, table) => {
      const line = arrheniusLine(pointsOf(table))
      const book = table.printed
      if (book === undefined) throw new Error('no printed answer')
      expect(Math.abs(line.Ea / 1000 / book.Ea - 1)).toBeLessThanOrEqual(book.within)
      const { A = Math.exp(line.lnA), AWithin = 0 } = book as { readonly A?: number; readonly AWithin?: number }
      expect(Math.abs(Math.exp(line.lnA) / A - 1)).toBeLessThanOrEqual(AWithin)
    },
  )

  it('has n - 2 degrees of freedom: the table that was printed with n - 1 is not matched', () => {
    const { wrongInterval } = tables
    const line = arrheniusLine(pointsOf(wrongInterval))
    expect(line.dof).toBe(3)
    expect(inHalfUnits(line.fit.slope, wrongInterval.recomputed.slope)).toBeLessThanOrEqual(oneHalfUnit)
    expect(inHalfUnits(line.fit.slopeStandardError, wrongInterval.recomputed.s)).toBeLessThanOrEqual(oneHalfUnit)
    expect(inHalfUnits(line.Ea / 1000, wrongInterval.recomputed.Ea)).toBeLessThanOrEqual(oneHalfUnit)
    // t(0.975; 3) = 3.1824 (Abramowitz & Stegun, Table 26.10); the printed ± is 2.776 standard errors, which is t of 4.
    expect(inHalfUnits((line.upper95 - line.lower95) / 2 / line.standardError, '3.1824')).toBeLessThanOrEqual(oneHalfUnit)
    expect(inHalfUnits(wrongInterval.printed.half95 / wrongInterval.printed.s, '2.776')).toBeLessThanOrEqual(oneHalfUnit)
    // Nor does the printed line follow from the printed rate constants.
    expect(line.Ea / 1000 / wrongInterval.printed.Ea).toBeGreaterThan(1.3)
  })
})

describe('a weighted line', () => {
  const points = tableOf('W1').map((point, i) => ({
    ...point,
    standardUncertainty: point.rateConstant * Number(computed.weighted.relativeUncertainty[i]),
  }))

  it('matches 30-digit arithmetic', () => {
    const line = arrheniusLine(points, 'stated-uncertainties')
    expect(apart(line.Ea, computed.weighted.Ea_J_per_mol)).toBeLessThan(1e-11)
    expect(apart(line.standardError, computed.weighted.standardError_J_per_mol)).toBeLessThan(1e-11)
    expect(apart(line.lnA, computed.weighted.lnA)).toBeLessThan(1e-11)
    expect(apart(line.lnAStandardError, computed.weighted.lnAStandardError)).toBeLessThan(1e-11)
    expect(apart(line.covarianceEaLnA, computed.weighted.covarianceEaLnA_J_per_mol)).toBeLessThan(1e-11)
    expect(apart(line.reducedChiSquare, computed.weighted.reducedChiSquare)).toBeLessThan(1e-11)
  })

  it('with equal relative uncertainties is the unweighted one', () => {
    const equal = tableOf('W8').map((point) => ({ ...point, standardUncertainty: point.rateConstant * 0.05 }))
    const [weighted, plain] = [arrheniusLine(equal, 'stated-uncertainties'), arrheniusLine(equal)]
    expect(apart(weighted.Ea, String(plain.Ea))).toBeLessThan(1e-11)
    expect(apart(weighted.standardError, String(plain.standardError))).toBeLessThan(1e-11)
  })

  it('is not had where a point has no uncertainty', () => {
    const line = arrheniusLine([...points.slice(1), ...tableOf('W1').slice(0, 1)], 'stated-uncertainties')
    expect(line.status).toBe('uncertainties-missing')
    expect(line.Ea).toBeNaN()
  })
})

describe('bands, curvature and transition-state parameters', () => {
  it('bands match 30-digit arithmetic, inside and beyond the data', () => {
    const points = tableOf('W8')
    const line = arrheniusLine(points)
    for (const row of computed.bands.rows) {
      const at = predictRateConstant(
        line,
        points.map((point) => point.temperature),
        quantity(Number(row.temperature_K), 'K'),
      )
      expect(apart(at.rateConstant, row.k)).toBeLessThan(1e-11)
      expect(apart(at.lineLower95, row.lineLower95)).toBeLessThan(1e-11)
      expect(apart(at.lineUpper95, row.lineUpper95)).toBeLessThan(1e-11)
      expect(apart(at.newLower95, row.newLower95)).toBeLessThan(1e-11)
      expect(apart(at.newUpper95, row.newUpper95)).toBeLessThan(1e-11)
    }
  })

  it('say how far a temperature lies beyond the data', () => {
    const points = tableOf('W8')
    const at = (T: number) =>
      predictRateConstant(
        arrheniusLine(points),
        points.map((p) => p.temperature),
        quantity(T, 'K'),
      ).extrapolation
    expect(at(300)).toEqual({ side: 'inside', beyond_K: 0, beyondInSpans: 0 })
    expect(at(273)).toMatchObject({ side: 'inside' })
    expect(at(358)).toMatchObject({ side: 'above', beyond_K: 20 })
    // The data reach from 1/338 to 1/273.
    expect(at(358).beyondInSpans).toBeCloseTo((1 / 338 - 1 / 358) / (1 / 273 - 1 / 338), 12)
    expect(at(250).beyondInSpans).toBeCloseTo((1 / 250 - 1 / 273) / (1 / 273 - 1 / 338), 12)
  })

  it.each(computed.quadratic.map((row) => [row.table, row] as const))('the quadratic term of %s matches 30-digit arithmetic', (id, row) => {
    const curvature = lineCurvature(tableOf(id))
    expect(apart(curvature.t, row.t)).toBeLessThan(1e-8)
    expect(apart(curvature.threshold, row.threshold)).toBeLessThan(1e-11)
    expect(curvature.isCurved).toBe(Math.abs(Number(row.t)) > Number(row.threshold))
  })

  it('a change of mechanism bends the line, an exact line does not', () => {
    const two = [300, 320, 340, 360, 380, 400].map((T) => ({
      temperature: quantity(T, 'K'),
      rateConstant: 1e10 * Math.exp(-80e3 / (8.314 * T)) + 1e3 * Math.exp(-30e3 / (8.314 * T)),
    }))
    expect(lineCurvature(two)).toMatchObject({ status: 'tested', isCurved: true })
    const one = [300, 320, 340, 360].map((T) => ({ temperature: quantity(T, 'K'), rateConstant: 1e10 * Math.exp(-80e3 / (8.314 * T)) }))
    expect(lineCurvature(one).isCurved).toBe(false)
  })

  it('the Eyring line matches 30-digit arithmetic', () => {
    const { eyring } = computed
    const line = eyringLine(tableOf('W8'), 1)
    expect(apart(line.enthalpy_J_per_mol.value, eyring.enthalpy_J_per_mol)).toBeLessThan(1e-11)
    expect(apart(line.enthalpy_J_per_mol.standardError, eyring.enthalpyStandardError)).toBeLessThan(1e-11)
    expect(apart(line.entropy_J_per_mol_K.value, eyring.entropy_J_per_mol_K)).toBeLessThan(1e-9)
    expect(apart(line.entropy_J_per_mol_K.standardError, eyring.entropyStandardError)).toBeLessThan(1e-11)
    const gibbs = line.gibbsAt(quantity(Number(eyring.gibbsAt_K), 'K'))
    expect(apart(gibbs.value, eyring.gibbs_J_per_mol)).toBeLessThan(1e-11)
    expect(apart(gibbs.standardError, eyring.gibbsStandardError)).toBeLessThan(1e-11)
  })

  it('the entropy of activation needs k per second', () => {
    const perMinute = tableOf('W8').map((point) => ({ ...point, rateConstant: point.rateConstant * 60 }))
    expect(apart(eyringLine(perMinute, 1 / 60).entropy_J_per_mol_K.value, computed.eyring.entropy_J_per_mol_K)).toBeLessThan(1e-9)
    const unknown = eyringLine(perMinute, null)
    expect(unknown.entropy_J_per_mol_K.value).toBeNaN()
    expect(unknown.gibbsAt(quantity(298, 'K')).value).toBeNaN()
    expect(apart(unknown.enthalpy_J_per_mol.value, computed.eyring.enthalpy_J_per_mol)).toBeLessThan(1e-11)
  })
})

describe('what cannot be answered', () => {
  const [first, second] = tableOf('W8')
  if (first === undefined || second === undefined) throw new Error('no points')

  it('two temperatures give Ea and no interval, replicates or not', () => {
    for (const points of [
      [first, second],
      [first, first, second, second],
    ]) {
      const line = arrheniusLine(points)
      expect(line.status).toBe('without-interval')
      expect(line.Ea).toBeGreaterThan(0)
      expect([line.standardError, line.lower95, line.lnAStandardError, line.r2, line.covarianceEaLnA]).toEqual(Array(5).fill(Number.NaN))
      const at = predictRateConstant(line, [first.temperature, second.temperature], first.temperature)
      expect(at.rateConstant / first.rateConstant).toBeCloseTo(1, 12)
      expect(at.newUpper95).toBeNaN()
    }
  })

  it('one temperature, or one point, gives nothing', () => {
    expect(arrheniusLine([first])).toMatchObject({ status: 'too-few-points', Ea: Number.NaN, lnA: Number.NaN })
    expect(arrheniusLine([])).toMatchObject({ status: 'too-few-points' })
    expect(arrheniusLine([first, first, first])).toMatchObject({ status: 'temperatures-not-distinct', Ea: Number.NaN })
    expect(eyringLine([first, first, first], 1)).toMatchObject({ status: 'temperatures-not-distinct' })
    expect(lineCurvature([first, second, second])).toMatchObject({ status: 'not-testable' })
  })

  it.each([
    [{ ...second, rateConstant: 0 }, /Row 2: the rate constant/],
    [{ ...second, rateConstant: -1e-5 }, /Row 2: the rate constant/],
    [{ ...second, rateConstant: Number.NaN }, /Row 2: the rate constant/],
    [{ ...second, temperature: quantity(0, 'K') }, /Row 2: the temperature/],
    [{ ...second, standardUncertainty: 0 }, /Row 2: the uncertainty/],
  ])('a row without a logarithm is refused by its number (%#)', (wrong, message) => {
    expect(() => arrheniusLine([first, wrong])).toThrow(message)
  })
})

const exactTable = fc
  .record({
    Ea: fc.double({ min: 20e3, max: 400e3, noNaN: true }),
    lnA: fc.double({ min: 5, max: 60, noNaN: true }),
    start: fc.double({ min: 250, max: 900, noNaN: true }),
    steps: fc.array(fc.double({ min: 1, max: 30, noNaN: true }), { minLength: 3, maxLength: 8 }),
    scatter: fc.array(fc.double({ min: -0.1, max: 0.1, noNaN: true }), { minLength: 9, maxLength: 9 }),
  })
  .map(({ Ea, lnA, start, steps, scatter }) => {
    let T = start
    const temperatures = [T, ...steps.map((step) => (T += step))]
    return {
      Ea,
      lnA,
      points: temperatures.map((t, i) => ({
        temperature: quantity(t, 'K'),
        rateConstant: Math.exp(lnA - Ea / (8.31446261815324 * t) + (scatter[i] ?? 0)),
      })),
      exact: temperatures.map((t) => ({ temperature: quantity(t, 'K'), rateConstant: Math.exp(lnA - Ea / (8.31446261815324 * t)) })),
    }
  })

/** A standard error of points on their line is the rounding of Ea, and an Ea about 0 that of its parts. */
const rounding = (line: { readonly Ea: number; readonly standardError: number }): number =>
  1e-6 + 1e-9 * (line.standardError + Math.abs(line.Ea))

describe('properties', () => {
  it('exact rate constants give back Ea and ln A', () => {
    fc.assert(
      fc.property(exactTable, ({ Ea, lnA, exact }) => {
        const line = arrheniusLine(exact)
        expect(Math.abs(line.Ea / Ea - 1)).toBeLessThan(1e-9)
        expect(Math.abs(line.lnA - lnA)).toBeLessThan(1e-7)
      }),
    )
  })

  it('the order of the rows changes nothing', () => {
    fc.assert(
      fc.property(exactTable, ({ points }) => {
        const [there, back] = [arrheniusLine(points), arrheniusLine(points.toReversed())]
        expect(Math.abs(back.Ea - there.Ea)).toBeLessThan(rounding(there))
        expect(Math.abs(back.standardError - there.standardError)).toBeLessThan(rounding(there))
      }),
    )
  })

  it('the unit of k shifts ln A and nothing else', () => {
    fc.assert(
      fc.property(exactTable, fc.constantFrom(60, 3600, 86_400), ({ points }, factor) => {
        const line = arrheniusLine(points)
        const other = arrheniusLine(points.map((point) => ({ ...point, rateConstant: point.rateConstant * factor })))
        expect(Math.abs(other.Ea - line.Ea)).toBeLessThan(rounding(line))
        expect(Math.abs(other.lnA - line.lnA - Math.log(factor))).toBeLessThan(1e-8)
        expect(Math.abs(other.standardError - line.standardError)).toBeLessThan(rounding(line))
      }),
    )
  })
})
