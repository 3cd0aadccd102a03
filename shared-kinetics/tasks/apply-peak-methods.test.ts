import { describe, expect, it } from 'vitest'
import {
  durationOf,
  evenTimes,
  firstOrder,
  holdAt,
  ramp,
  reducedTime,
  runOf,
  temperatureOf,
  type Pieces,
} from '../check-values/simulated-run.ts'
import { firstOrderPeakTemperature } from '../peak-methods/first-order-peak.ts'
import { peakMethodIds } from '../peak-methods/peak-method-info.ts'
import { kelvinToCelsius, perMinuteToPerSecond } from '../units/convert.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import { quantity } from '../units/quantity.ts'
import type { RunColumns, RunInfo } from '../series/run.ts'
import { evaluateStudy } from './evaluate-study.ts'
import type { PeakMethodResult, StudyResult } from './study-result.ts'

type Run = { readonly info: RunInfo; readonly columns: RunColumns }

const context = { checkCancelled: () => undefined, progress: () => undefined }
const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }

/** dα/dθ and α of the model by the reduced time. */
interface Model {
  readonly conversion: (theta: number) => number
  readonly f: (alpha: number) => number
}
const first: Model = { conversion: firstOrder, f: (alpha) => 1 - alpha }
const second: Model = { conversion: (theta) => theta / (1 + theta), f: (alpha) => (1 - alpha) ** 2 }
const nucleation: Model = {
  conversion: (theta) => -Math.expm1(-(theta ** 3)),
  f: (alpha) => 3 * (1 - alpha) * (-Math.log1p(-alpha)) ** (2 / 3),
}

function simulate(programme: Pieces, model: Model, signal: 'mass' | 'heat-flow', info: Partial<RunInfo> = {}): Run {
  const time = evenTimes(durationOf(programme), 4000)
  const temperature = time.map((t) => temperatureOf(programme, t))
  const alpha = reducedTime(step, programme, time).map(model.conversion)
  const values =
    signal === 'mass'
      ? alpha.map((a) => 5e-6 * (1 - 0.6 * a))
      : alpha.map(
          (a, i) => 2e5 * step.A_per_s * Math.exp(-step.Ea_J_per_mol / (gasConstant_J_per_mol_K * (temperature[i] ?? 0))) * model.f(a),
        )
  const id = `${programme.start_K}-${programme.pieces[0]?.rate_K_per_s ?? 0}`
  return runOf(
    id,
    { time_s: time, temperature_K: temperature, signals: [{ quantity: signal, unit: signal === 'mass' ? 'kg' : 'W/kg', values }] },
    info,
  )
}

const rates = [2, 5, 10, 20]
const ramps = (model: Model, signal: 'mass' | 'heat-flow', info: Partial<RunInfo> = {}, at = rates): Run[] =>
  at.map((rate) => simulate(ramp(380, rate, 800), model, signal, info))

function evaluate(runs: readonly Run[]): StudyResult {
  return evaluateStudy(
    {
      runs: runs.map((run) => run.info),
      settings: {
        signal: null,
        levels: [0.2, 0.5, 0.8],
        methods: ['friedman'],
        window: null,
        baseline: 'area-proportional',
        meanRange: [0.1, 0.9],
      },
    },
    new Map(runs.map((run, i) => [run.info.columnsKey, runs[i]?.columns])),
    context,
  )
}

function resultOf({ peakMethods }: StudyResult, method: string): PeakMethodResult {
  const found = peakMethods.find((result) => result.method === method)
  if (found === undefined) throw new Error(`no ${method}`)
  return found
}

const numberOf = ({ numbers }: PeakMethodResult, key: string): number => numbers.find((number) => number.key === key)?.value ?? Number.NaN

const correlation = (covariance: number | null | undefined, a = Number.NaN, b = Number.NaN): number => (covariance ?? Number.NaN) / (a * b)

describe('peak and single-run methods on simulated runs', () => {
  it('by heat flow, first order: every method in its order, each near what theory says of it', () => {
    const result = evaluate(ramps(first, 'heat-flow', { exothermic: 'up' }))
    expect([...new Set(result.peakMethods.map((method) => method.method))]).toEqual(peakMethodIds)
    const Ea = (method: string): number => resultOf(result, method).Ea_kJ_per_mol ?? Number.NaN
    expect(Math.abs(Ea('kissinger') / 150 - 1)).toBeLessThan(1e-3)
    expect(Ea('kissinger')).toBe(result.kissinger?.Ea_kJ_per_mol)
    expect(resultOf(result, 'kissinger').lnA_per_s).toBe(result.kissinger?.lnA_per_s)
    // Exact peak at the geometric mean of the heating rates. An exact temperature integral gives 2/x² of Ea more; no T0 gives R Tp more.
    const T = firstOrderPeakTemperature(quantity(step.Ea_J_per_mol, 'J/mol'), Math.log(step.A_per_s), perMinuteToPerSecond(2000 ** 0.25))
    const x = step.Ea_J_per_mol / (gasConstant_J_per_mol_K * T)
    for (const method of ['astm-e698', 'ozawa-peak-corrected']) expect(Math.abs(Ea(method) / 150 - 1 - 2 / x ** 2)).toBeLessThan(1e-3)
    expect(Math.abs(Ea('astm-e2890') / 150 - 1)).toBeLessThan(1e-3)
    expect(Math.abs(Ea('augis-bennett-without-start') / 150 - 1 - 1 / x)).toBeLessThan(1e-3)
    expect(Math.abs(Ea('augis-bennett') / 150 - 1 - (2 - T / (T - 380)) / x)).toBeLessThan(2e-3)
    expect(Math.abs(numberOf(resultOf(result, 'astm-e2890'), 'order') - 1)).toBeLessThan(0.02)
    const kissinger = resultOf(result, 'kissinger')
    expect(numberOf(kissinger, 'conversion-at-peak-lowest')).toBeCloseTo(numberOf(kissinger, 'conversion-at-peak-first-order'), 2)
  })

  it('ASTM E698 tells where half of the reaction is over in 60 min, and how to confirm it', () => {
    const result = evaluate(ramps(first, 'heat-flow', { exothermic: 'up' }))
    const e698 = resultOf(result, 'astm-e698')
    // Of 2, 5, 10 and 20 K/min, 5 lies nearest to their geometric mean of 6.7.
    expect(numberOf(e698, 'peak-at-middle-rate')).toBeCloseTo(result.runs[1]?.peak_K ?? 0, 8)
    const T = numberOf(e698, 'confirmation-temperature')
    // At the true Ea and A: k = ln 2/3600 s.
    const expected = step.Ea_J_per_mol / (gasConstant_J_per_mol_K * Math.log((step.A_per_s * 3600) / Math.LN2))
    expect(Math.abs(T - expected)).toBeLessThan(0.5)
    const said = e698.remarks.join(' ')
    expect(said).toContain(`age a sample for 60 min at ${kelvinToCelsius(T).toFixed(1)} °C`)
    expect(said).toContain('half as large')
    expect(said).toContain('does not replace tests on the real amount')
    expect(said).not.toContain('this is its calculation')
  })

  it('Borchardt–Daniels finds Ea and n of each run, and says that one run is not enough', () => {
    const result = evaluate(ramps(second, 'mass'))
    const runs = result.peakMethods.filter((method) => method.method === 'borchardt-daniels')
    expect(runs.map((run) => [run.runId, run.runLabel])).toEqual(result.runs.map((run) => [run.runId, run.label]))
    for (const run of runs) {
      expect(run.applies).toBe(true)
      expect(Math.abs((run.Ea_kJ_per_mol ?? 0) / 150 - 1)).toBeLessThan(0.01)
      expect(Math.abs(numberOf(run, 'order') - 2)).toBeLessThan(0.03)
      expect(Math.abs((run.lnA_per_s ?? 0) - Math.log(1e12))).toBeLessThan(0.4)
      expect(run.dof).toBe(14)
      // Rate and order at the middle of the points are known far better than either alone: Ea, ln Z and n go together, and the matrix has the determinant of one that can be.
      const [e, z, n] = [run.standardError_kJ_per_mol, run.lnAStandardError, run.numbers[0]?.standardError].map(
        (error) => error ?? Number.NaN,
      )
      const ez = correlation(run.covarianceEaLnA_kJ_per_mol, e, z)
      const en = correlation(run.covarianceWithOrder?.Ea_kJ_per_mol, e, n)
      const zn = correlation(run.covarianceWithOrder?.lnA, z, n)
      expect(Math.min(ez, en, zn)).toBeGreaterThan(0.9)
      expect(Math.max(ez, en, zn)).toBeLessThanOrEqual(1)
      expect(1 + 2 * ez * en * zn - ez ** 2 - en ** 2 - zn ** 2).toBeGreaterThan(-1e-9)
      expect(run.remarks.join(' ')).toMatch(/not to be relied on.*one heating rate is never enough/)
    }
  })

  it('ASTM E2890 and Augis–Bennett tell the order of an accelerating reaction', () => {
    const result = evaluate(ramps(nucleation, 'heat-flow', { exothermic: 'up' }))
    const e2890 = resultOf(result, 'astm-e2890')
    expect(e2890.numbers.map(({ label }) => label)).toEqual(['p, order of an accelerating reaction'])
    expect(Math.abs(numberOf(e2890, 'order') - 3)).toBeLessThan(0.06)
    // High by 2.2 % for its round 2.5, and by a few 1/x (3 % each) for its Ea and for the width at finite x.
    const exponent = numberOf(resultOf(result, 'augis-bennett'), 'avrami-exponent') / 3
    expect(exponent).toBeGreaterThan(1.022)
    expect(exponent).toBeLessThan(1.15)
  })
})

describe('a peak method that does not apply says why', () => {
  it('holds and other programmes', () => {
    const result = evaluate([530, 545, 560].map((T) => simulate(holdAt(T, 60_000), first, 'mass')))
    expect(result.kissinger).toBeNull()
    for (const method of result.peakMethods) {
      expect(method).toMatchObject({ applies: false, Ea_kJ_per_mol: null, lnA_per_s: null, numbers: [], line: null })
      expect(method.reason).toMatch(
        /^It is made for a constant heating rate, and (at least one|this) run followed a hold at one temperature\.$/,
      )
    }
    expect(result.peakMethods.filter((method) => method.method === 'borchardt-daniels')).toHaveLength(3)
  })

  it('one programme: nothing but Borchardt–Daniels', () => {
    const result = evaluate(ramps(first, 'mass', {}, [10]))
    expect(result.peakMethods.filter((method) => method.applies).map((method) => method.method)).toEqual(['borchardt-daniels'])
    expect(resultOf(result, 'astm-e698').reason).toBe('It needs runs at two or more distinct heating rates.')
  })

  it('two programmes: Ea without an interval', () => {
    const result = evaluate(ramps(first, 'mass', {}, [5, 20]))
    for (const id of ['kissinger', 'astm-e698', 'astm-e2890', 'ozawa-peak', 'ozawa-peak-corrected']) {
      expect(resultOf(result, id)).toMatchObject({
        applies: true,
        standardError_kJ_per_mol: null,
        lower95_kJ_per_mol: null,
        lnAStandardError: null,
        dof: 0,
      })
      expect(resultOf(result, id).Ea_kJ_per_mol).toBeGreaterThan(140)
    }
  })

  it('standards for exothermic reactions on an endothermic one; crystallisation by mass', () => {
    const endothermic = evaluate(ramps(first, 'heat-flow', { exothermic: 'down' }))
    for (const id of ['astm-e698', 'astm-e2890']) {
      expect(resultOf(endothermic, id).reason).toMatch(
        /^The standard is made for exothermic reactions, and the heat flow of Run .* is endothermic\.$/,
      )
    }
    expect(resultOf(endothermic, 'kissinger').applies).toBe(true)

    const unknown = evaluate(ramps(first, 'heat-flow'))
    expect(resultOf(unknown, 'astm-e698').remarks.join(' ')).toContain('do not say which way an exothermic event points')

    const mass = evaluate(ramps(first, 'mass'))
    expect(resultOf(mass, 'augis-bennett').reason).toBe('It is made for crystallisation, which does not change the mass.')
    expect(resultOf(mass, 'astm-e698').remarks[0]).toBe(
      'The standard speaks of heat flow by DSC; this is its calculation, used on the mass.',
    )
  })

  it('peaks outside the temperatures of a standard', () => {
    // The same reaction far slower: its peak stands above 900 K.
    const slow = { ...step, A_per_s: 1e6 }
    expect(
      firstOrderPeakTemperature(quantity(slow.Ea_J_per_mol, 'J/mol'), Math.log(slow.A_per_s), perMinuteToPerSecond(10)),
    ).toBeGreaterThan(900)
    const runs = rates.map((rate) => {
      const programme = ramp(600, rate, 1700)
      const time = evenTimes(durationOf(programme), 4000)
      const values = reducedTime(slow, programme, time).map((theta) => 5e-6 * (1 - 0.6 * firstOrder(theta)))
      return runOf(`slow ${rate}`, {
        time_s: time,
        temperature_K: time.map((t) => temperatureOf(programme, t)),
        signals: [{ quantity: 'mass', unit: 'kg', values }],
      })
    })
    expect(resultOf(evaluate(runs), 'astm-e2890').reason).toBe(
      'The standard covers peaks between 300 and 900 K, and at least one lies outside.',
    )
  })
})
