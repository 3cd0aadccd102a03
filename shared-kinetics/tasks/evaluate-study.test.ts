import { describe, expect, it } from 'vitest'
import { temperatureAt, underConstantRate, type FirstOrderStep } from '../check-values/exact-simulation.ts'
import {
  autocatalytic,
  durationOf,
  evenTimes,
  firstOrder,
  holdAt,
  normalNumbers,
  ramp,
  reducedTime,
  runOf,
  temperatureOf,
  type Pieces,
} from '../check-values/simulated-run.ts'
import { Cancelled, KineticsError } from '../errors.ts'
import { gasConstant_J_per_mol_K } from '../units/constants.ts'
import type { RunColumns, RunInfo } from '../series/run.ts'
import { evaluateStudy } from './evaluate-study.ts'
import type { EvaluationCache } from './memo.ts'
import { taskMap } from './task-map.ts'
import type { AnalysisSettings } from './study-input.ts'
import type { StudyResult } from './study-result.ts'

type Run = { readonly info: RunInfo; readonly columns: RunColumns }

const context = { checkCancelled: () => undefined, progress: () => undefined }
const levels = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)
const defaults: AnalysisSettings = {
  signal: null,
  levels,
  methods: null,
  window: null,
  baseline: 'area-proportional',
  meanRange: [0.1, 0.9],
}
const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }

function evaluate(runs: readonly Run[], settings: Partial<AnalysisSettings> = {}, cache?: EvaluationCache): StudyResult {
  const columns = new Map(runs.map((run) => [run.info.columnsKey, run.columns]))
  return evaluateStudy({ runs: runs.map((run) => run.info), settings: { ...defaults, ...settings } }, columns, context, cache)
}

/** Mass in kg of a one-step reaction under any programme, rounded to 1 ng, with time. */
function massRun(
  id: string,
  programme: Pieces,
  model: (theta: number) => number = firstOrder,
  info: Partial<RunInfo> = {},
  noise = 0,
): Run {
  const time = evenTimes(durationOf(programme), 3000)
  const normal = normalNumbers(id.length + programme.start_K)
  const mass = reducedTime(step, programme, time).map(
    (theta) => Math.round(1e12 * 5e-6 * (1 - 0.6 * model(theta)) * (1 + noise * normal())) / 1e12,
  )
  return runOf(
    id,
    {
      time_s: time,
      temperature_K: time.map((t) => temperatureOf(programme, t)),
      signals: [{ quantity: 'mass', unit: 'kg', values: mass }],
    },
    info,
  )
}

const atRates = (rates: readonly number[], model = firstOrder, info: Partial<RunInfo> = {}, noise = 0): Run[] =>
  rates.map((rate) => massRun(`${rate}`, ramp(360, rate, 850), model, info, noise))

function worst(result: StudyResult, method: string, truth: number | readonly number[]): number {
  const profile = result.profiles.find((candidate) => candidate.method === method)
  if (profile === undefined) return Infinity
  return Math.max(
    ...profile.Ea_kJ_per_mol.map((Ea, i) => {
      const wanted = typeof truth === 'number' ? truth : (truth[i] ?? Number.NaN)
      return Ea === null ? Infinity : (100 * Math.abs(Ea - wanted)) / wanted
    }),
  )
}
const codes = (result: StudyResult): string[] => result.findings.map((finding) => finding.code)
const methodsOf = (result: StudyResult): string[] => result.profiles.map((profile) => profile.method)

const rampHoldRamp = (hold: number): Pieces => ({
  start_K: 380,
  pieces: [
    { rate_K_per_s: 0.15, duration_s: (hold - 380) / 0.15 },
    { rate_K_per_s: 0, duration_s: 1500 },
    { rate_K_per_s: 0.2, duration_s: 1000 },
  ],
})

/** A hold long enough for all but 1e-6 of the reaction. */
const wholeHold = (T: number): Pieces => holdAt(T, 14 / (step.A_per_s * Math.exp(-step.Ea_J_per_mol / (gasConstant_J_per_mol_K * T))))

describe('exact simulations', () => {
  it.each([
    ['first order', firstOrder, ['temperature-not-measured']],
    // That nobody measured these temperatures is said, and what an nth-order fit to a single run makes of it; nothing else is.
    ['autocatalytic', autocatalytic(0.01), ['single-run-energy-differs', 'temperature-not-measured']],
  ])('%s: Vyazovkin within 0.05 %, Friedman within 0.5 %, nothing else found', (_, model, codes) => {
    const result = evaluate(atRates([2, 5, 10, 20], model))
    expect(worst(result, 'vyazovkin', 150)).toBeLessThan(0.05)
    expect(worst(result, 'friedman', 150)).toBeLessThan(0.5)
    expect(result.findings.map((finding) => finding.code)).toEqual(codes)
  })

  it('first order: Friedman’s intercept is ln[A(1 - α)], Kissinger gives Ea and ln A', () => {
    const result = evaluate(atRates([2, 5, 10, 20]))
    const friedman = result.profiles.find((profile) => profile.method === 'friedman')
    levels.forEach((level, i) => expect(friedman?.lnAf_per_s[i]).toBeCloseTo(Math.log(1e12 * (1 - level)), 1))
    expect(result.kissinger?.Ea_kJ_per_mol).toBeCloseTo(150, 1)
    expect(result.kissinger?.lnA_per_s).toBeCloseTo(Math.log(1e12), 1)
    expect(friedman?.mean.Ea_kJ_per_mol).toBeCloseTo(150, 1)
    expect(friedman?.mean.spread_kJ_per_mol).toBeLessThan(0.5)
  })

  it('two steps side by side: Ea by Friedman is that of the exact rates, and is said to vary', () => {
    const steps: readonly FirstOrderStep[] = [
      { Ea_J_per_mol: 110e3, A_per_s: 1e10, share: 0.4 },
      { Ea_J_per_mol: 180e3, A_per_s: 1e14, share: 0.6 },
    ]
    const rates = [2, 5, 10, 20]
    const result = evaluate(
      rates.map((rate) => {
        const time = evenTimes(durationOf(ramp(300, rate, 800)), 4000)
        const T = time.map((t) => temperatureOf(ramp(300, rate, 800), t))
        const conversion = T.map((value) => underConstantRate(steps, rate / 60, value).conversion)
        return runOf(`${rate}`, { time_s: time, temperature_K: T, signals: [{ quantity: 'conversion', unit: '1', values: conversion }] })
      }),
    )
    // ln(dα/dt) against 1/T over the four exact points of each level.
    const exact = levels.map((level) => {
      const points = rates.map((rate) => {
        const T = temperatureAt(steps, rate / 60, level)
        return { x: 1 / T, y: Math.log(underConstantRate(steps, rate / 60, T).rate_per_s) }
      })
      const x = points.reduce((sum, point) => sum + point.x / 4, 0)
      const slope =
        points.reduce((sum, point) => sum + (point.x - x) * point.y, 0) / points.reduce((sum, point) => sum + (point.x - x) ** 2, 0)
      return (-gasConstant_J_per_mol_K * slope) / 1000
    })
    expect(worst(result, 'friedman', exact)).toBeLessThan(0.5)
    expect(codes(result)).toEqual(expect.arrayContaining(['energy-varies', 'integral-lags-differential']))
  })

  it('holds: isothermal methods and those for any programme', () => {
    const result = evaluate([530, 540, 550, 560].map((T) => massRun(`${T}`, wholeHold(T))))
    expect(result.runs.map((run) => [run.programme, run.programmeGroup, run.holdTemperature_K])).toEqual(
      [530, 540, 550, 560].map((T, i) => ['isothermal', i, expect.closeTo(T, 9) as number]),
    )
    expect(methodsOf(result)).toEqual(['friedman', 'vyazovkin', 'vyazovkin-incremental', 'isothermal-integral'])
    for (const method of methodsOf(result)) expect(worst(result, method, 150)).toBeLessThan(0.5)
    expect(result.kissinger).toBeNull()
    expect(result.runs[0]?.window.kind).toBe('time')
    expect(codes(result)).toContain('method-does-not-apply')
    expect(codes(result)).not.toContain('heating-rate-differs-from-nominal')
  })

  it('ramp, hold, ramp: any-programme methods only, though corners lie inside the reaction', () => {
    const result = evaluate([500, 510, 520].map((hold) => massRun(`${hold}`, rampHoldRamp(hold))))
    expect(result.runs.map((run) => run.programme)).toEqual(['general', 'general', 'general'])
    expect(new Set(result.runs.map((run) => run.programmeGroup)).size).toBe(3)
    expect(methodsOf(result)).toEqual(['friedman', 'vyazovkin', 'vyazovkin-incremental'])
    expect(worst(result, 'vyazovkin', 150)).toBeLessThan(0.3)
    expect(worst(result, 'friedman', 150)).toBeLessThan(0.75)
  })

  it('noise of 0.1 % of the mass leaves Ea within 3 %', () => {
    const result = evaluate(atRates([2, 5, 10, 20], firstOrder, {}, 0.001), { levels: levels.slice(1, -1) })
    expect(worst(result, 'vyazovkin', 150)).toBeLessThan(3)
    expect(worst(result, 'friedman', 150)).toBeLessThan(3)
  })

  it('without time, rebuilt from the stated heating rate', () => {
    const runs = atRates([2, 5, 10]).map((run, i) => ({
      info: {
        ...run.info,
        hasTime: false,
        nominalHeatingRate: {
          heatingRate_K_per_s: ([2, 5, 10][i] as number) / 60,
          source: i === 0 ? ('option' as const) : ('name' as const),
          text: '',
        },
      },
      columns: { ...run.columns, time_s: null },
    }))
    const result = evaluate(runs)
    expect(worst(result, 'vyazovkin', 150)).toBeLessThan(0.05)
    expect(result.runs.map((run) => run.heatingRateSource)).toEqual(['option', 'nominal', 'nominal'])
    expect(result.runs.map((run) => run.heatingRateStandardError_K_per_min)).toEqual([null, null, null])
    expect(codes(result).filter((code) => code === 'time-rebuilt')).toHaveLength(3)
  })
})

const labelled = (label: number) => ({
  nominalHeatingRate: { heatingRate_K_per_s: label / 60, source: 'name' as const, text: `${label}K` },
})

describe('runs', () => {
  it('labelled 10 K/min that ran at 20.15 count by what T(t) says, as a replicate of the run at 20', () => {
    // Seen in open data: 2.512, 5.025, "10" that ran at 20.151, and 15.118 K/min.
    const result = evaluate([
      massRun('2', ramp(360, 2.512, 850), firstOrder, labelled(2.5)),
      massRun('5', ramp(360, 5.025, 850), firstOrder, labelled(5)),
      massRun('10', ramp(360, 20.151, 850), firstOrder, labelled(10)),
      massRun('20', ramp(360, 20.1, 850), firstOrder, labelled(20)),
    ])
    const mislabelled = result.runs.find((run) => run.label === 'Run 10')
    expect(mislabelled?.heatingRate_K_per_min).toBeCloseTo(20.151, 3)
    expect(mislabelled?.programmeGroup).toBe(result.runs.find((run) => run.label === 'Run 20')?.programmeGroup)
    expect(new Set(result.runs.map((run) => run.programmeGroup)).size).toBe(3)
    expect(result.findings.filter(({ code }) => code === 'heating-rate-differs-from-nominal').map(({ run }) => run)).toEqual(['10'])
    expect(worst(result, 'vyazovkin', 150)).toBeLessThan(0.05)
    expect(worst(result, 'vyazovkin-incremental', 150)).toBeLessThan(0.5)
  })

  it('are listed slow to fast; replicates share a group and count once', () => {
    const result = evaluate([...atRates([20, 5, 10]), massRun('again', ramp(360, 10.1, 850))])
    expect(result.runs.map((run) => run.label)).toEqual(['Run 5', 'Run 10', 'Run again', 'Run 20'])
    expect(result.runs.map((run) => run.programmeGroup)).toEqual([0, 1, 1, 2])
    const [profile] = result.profiles
    expect(profile?.lines[9]?.x_per_K).toHaveLength(4)
    expect(profile?.lines[9]?.x_per_K[0]).toBeCloseTo(1 / (result.runs[0]?.temperatureAtLevel_K[9] ?? Number.NaN), 12)
  })

  it('of which one is bad do not sink the study', () => {
    const bad = runOf('bad', {
      time_s: null,
      temperature_K: new Float64Array(100).fill(400),
      signals: [{ quantity: 'mass', unit: 'kg', values: new Float64Array(100) }],
    })
    const flat = massRun('flat', holdAt(300, 1000))
    const result = evaluate([...atRates([2, 5, 10]), bad, flat])
    expect(result.runs).toHaveLength(3)
    expect(worst(result, 'vyazovkin', 150)).toBeLessThan(0.05)
    const stops = result.findings.filter((finding) => finding.severity === 'stop')
    expect(stops.map((finding) => [finding.code, finding.run, finding.evidence['reason']])).toEqual([
      ['run-unusable', 'bad', 'no-heating-rate'],
      ['run-unusable', 'flat', 'empty-window'],
    ])
  })

  it('whose columns are gone, or that lack the signal, are left out with a stop', () => {
    const runs = atRates([2, 5, 10])
    const columns = new Map(runs.slice(1).map((run) => [run.info.columnsKey, run.columns]))
    const gone = evaluateStudy({ runs: runs.map((run) => run.info), settings: defaults }, columns, context)
    expect(gone.findings.find((finding) => finding.severity === 'stop')).toMatchObject({ code: 'run-unusable', run: '2' })
    const other = evaluate(runs, { signal: 'heat-flow' })
    expect(other.runs).toEqual([])
    expect(codes(other)).toEqual(['run-unusable', 'run-unusable', 'run-unusable', 'too-few-programmes'])
    expect(other.signalsToChooseFrom).toEqual(['mass'])
  })

  it('that are not used are not looked at', () => {
    const runs = atRates([2, 5, 10, 20]).map((run, i) => (i === 1 ? { ...run, info: { ...run.info, use: false } } : run))
    expect(evaluate(runs).runs.map((run) => run.label)).toEqual(['Run 2', 'Run 10', 'Run 20'])
    expect(evaluate(runs.map((run) => ({ ...run, info: { ...run.info, use: false } })))).toMatchObject({
      runs: [],
      profiles: [],
      kissinger: null,
      findings: [],
      signal: null,
    })
  })

  it('two programmes give Ea without interval, one gives nothing and a stop', () => {
    const two = evaluate(atRates([2, 20]))
    expect(worst(two, 'vyazovkin', 150)).toBeLessThan(0.05)
    expect(two.profiles.every((profile) => profile.lower95_kJ_per_mol.every((value) => value === null))).toBe(true)
    expect(two.findings.map((finding) => `${finding.severity} ${finding.code}`)).toEqual([
      'caution too-few-programmes',
      'note temperature-not-measured',
    ])
    const one = evaluate(atRates([5]))
    expect(one.profiles.every((profile) => profile.Ea_kJ_per_mol.every((value) => value === null))).toBe(true)
    expect(one.findings.map((finding) => `${finding.severity} ${finding.code}`)).toEqual([
      'stop too-few-programmes',
      'note temperature-not-measured',
    ])
  })
})

/** Mass and a heat flow in mW-like W, whose direction is stated. */
const both = (rate: number): Run => {
  const run = massRun(`${rate}`, ramp(360, rate, 850))
  const time = run.columns.time_s as Float64Array
  const theta = reducedTime(step, ramp(360, rate, 850), time)
  const heatFlow = run.columns.temperature_K.map(
    (T, i) =>
      -250 * Math.exp(-(theta[i] as number)) * step.A_per_s * Math.exp(-step.Ea_J_per_mol / (gasConstant_J_per_mol_K * T)) * 4e-6 * 1000,
  )
  return {
    info: {
      ...run.info,
      initialMass_kg: 4e-6,
      exothermic: 'down',
      signals: [...run.info.signals, { quantity: 'heat-flow', unit: 'W', label: 'Heat flow (mW)', fileUnit: 'mW' }],
    },
    columns: { ...run.columns, signals: [...run.columns.signals, heatFlow] },
  }
}
const withBoth = [2, 5, 10].map(both)

const enthalpyOfFirst = (info: Partial<RunInfo>): number | null => {
  const changed = withBoth.map((run) => ({ ...run, info: { ...run.info, ...info } }))
  return evaluate(changed, { signal: 'heat-flow', methods: ['kas'] }).runs[0]?.enthalpy_J_per_g ?? null
}

describe('signals', () => {
  it('mass comes before heat flow where none is named, which is said', () => {
    const result = evaluate(withBoth)
    expect(result.signal).toBe('mass')
    expect(result.signalsToChooseFrom).toEqual(['mass', 'heat-flow'])
    expect(codes(result)).toContain('signal-chosen')
    expect(result.runs[0]?.enthalpy_J_per_g).toBeNull()
  })

  it('heat flow by name: the same Ea, and the enthalpy, negative for an exothermic event', () => {
    const result = evaluate(withBoth, { signal: 'heat-flow' })
    expect(codes(result)).not.toContain('signal-chosen')
    expect(worst(result, 'vyazovkin', 150)).toBeLessThan(0.5)
    for (const run of result.runs) {
      expect(run.column).toBe('Heat flow (mW)')
      expect((run.enthalpy_J_per_g ?? Number.NaN) / -250).toBeCloseTo(1, 2)
      expect(run.curve.baseline).toHaveLength(run.curve.time_s.length)
    }
  })

  it('the sign of an enthalpy follows the stated direction; without one there is the magnitude alone, and a note, without a mass neither', () => {
    expect((enthalpyOfFirst({ exothermic: 'up' }) ?? Number.NaN) / 250).toBeCloseTo(1, 2)
    const unknown = evaluate(
      withBoth.map((run) => ({ ...run, info: { ...run.info, exothermic: null } })),
      { signal: 'heat-flow', methods: ['kas'] },
    )
    expect(unknown.runs[0]?.enthalpy_J_per_g).toBeNull()
    expect((unknown.runs[0]?.enthalpyMagnitude_J_per_g ?? Number.NaN) / 250).toBeCloseTo(1, 2)
    expect(codes(unknown)).toContain('exothermic-direction-unknown')
    expect(enthalpyOfFirst({ initialMass_kg: null })).toBeNull()
  })
})

describe('windows', () => {
  it('of a run come before that of the series, which comes before what is found', () => {
    const runs = atRates([2, 5, 10]).map((run, i) =>
      i === 0 ? { ...run, info: { ...run.info, window: { kind: 'temperature', start_K: 420, end_K: 780 } as const } } : run,
    )
    const result = evaluate(runs, { window: { kind: 'temperature', start_K: 400, end_K: 800 } })
    expect(result.runs.map((run) => run.window)).toEqual([
      { kind: 'temperature', start_K: 420, end_K: 780 },
      { kind: 'temperature', start_K: 400, end_K: 800 },
      { kind: 'temperature', start_K: 400, end_K: 800 },
    ])
    expect(worst(result, 'vyazovkin', 150)).toBeLessThan(0.1)
    const [curve] = result.runs.map((run) => run.curve)
    expect(curve?.conversion.some(Number.isNaN)).toBe(true)
    expect(curve?.temperature_K[0]).toBe(360)
    expect(curve?.time_s.length).toBeLessThanOrEqual(1000)
  })

  it('that cut the reaction are a finding', () => {
    expect(codes(evaluate(atRates([2, 5, 10]), { window: { kind: 'temperature', start_K: 400, end_K: 560 } }))).toContain(
      'window-cuts-reaction',
    )
  })

  it('outside a run make that run unusable', () => {
    const result = evaluate(atRates([2, 5, 10]), { window: { kind: 'temperature', start_K: 900, end_K: 950 } })
    expect(result.runs).toEqual([])
    expect(result.findings[0]?.message).toMatch(/0 rows lie inside the window/)
  })
})

describe('what is asked for', () => {
  it('methods: those named, in the order of the list; a constant-rate method on holds is a caution', () => {
    expect(methodsOf(evaluate(atRates([2, 5, 10]), { methods: ['vyazovkin', 'kas'] }))).toEqual(['kas', 'vyazovkin'])
    const holds = evaluate(
      [530, 545, 560].map((T) => massRun(`${T}`, wholeHold(T))),
      { methods: ['kas', 'friedman'] },
    )
    expect(methodsOf(holds)).toEqual(['friedman'])
    expect(holds.findings.find((finding) => finding.code === 'method-does-not-apply')?.severity).toBe('caution')
  })

  it('levels: outside (0, 1), unordered or none are the caller’s mistake', () => {
    for (const bad of [[], [0], [0.5, 1], [0.5, 0.5], [0.5, 0.4], [Number.NaN]]) {
      expect(() => evaluate(atRates([5]), { levels: bad })).toThrow(KineticsError)
    }
  })

  it('levels outside the data: a conversion column that ends at 0.6', () => {
    const runs = atRates([2, 5, 10]).map((run) => {
      const mass = run.columns.signals[0] as Float64Array
      return {
        info: { ...run.info, signals: [{ quantity: 'conversion' as const, unit: '1' as const, label: 'x', fileUnit: '-' }] },
        columns: { ...run.columns, signals: [mass.map((m) => (0.6 * (5e-6 - m)) / 3e-6)] },
      }
    })
    const result = evaluate(runs, { levels: [0.3, 0.7] })
    expect(result.profiles.every((profile) => profile.Ea_kJ_per_mol[0] !== null && profile.Ea_kJ_per_mol[1] === null)).toBe(true)
    expect(result.runs[0]?.temperatureAtLevel_K[1]).toBeNull()
    expect(codes(result).filter((code) => code === 'level-not-reached')).toHaveLength(3)
  })

  it('is stopped when no longer wanted', () => {
    const runs = atRates([2, 5, 10])
    const columns = new Map(runs.map((run) => [run.info.columnsKey, run.columns]))
    let looks = 0
    const stopping = {
      progress: () => undefined,
      checkCancelled: () => {
        if (++looks > 4) throw new Cancelled()
      },
    }
    expect(() => taskMap['evaluate-study']({ runs: runs.map((run) => run.info), settings: defaults }, columns, stopping)).toThrow(Cancelled)
  })

  it('reports progress that only grows, up to all of it', () => {
    const runs = atRates([2, 5, 10])
    const columns = new Map(runs.map((run) => [run.info.columnsKey, run.columns]))
    const seen: number[][] = []
    evaluateStudy({ runs: runs.map((run) => run.info), settings: defaults }, columns, {
      checkCancelled: () => undefined,
      progress: (...at) => seen.push(at),
    })
    const shares = seen.map(([done = 0, total = 1]) => done / total)
    expect(shares).toEqual(shares.toSorted((a, b) => a - b))
    expect(shares.at(-1)).toBe(1)
  })
})

describe('steps are remembered', () => {
  it('so that a changed setting recomputes only what depends on it, and the result is the same', () => {
    const runs = atRates([2, 5, 10])
    const cache: EvaluationCache = new Map()
    const kinds = (): Record<string, number> => {
      const count: Record<string, number> = { convert: 0, levels: 0, method: 0, draw: 0 }
      for (const key of cache.keys()) {
        const kind = key.startsWith('method')
          ? 'method'
          : key.startsWith('["draw"')
            ? 'draw'
            : key.includes('"levels"')
              ? 'levels'
              : 'convert'
        count[kind] = (count[kind] ?? 0) + 1
      }
      return count
    }
    const first = evaluate(runs, { methods: ['friedman'] }, cache)
    expect(kinds()).toEqual({ convert: 3, levels: 3, method: 1, draw: 3 })
    evaluate(runs, { methods: ['friedman', 'kas'] }, cache)
    expect(kinds()).toEqual({ convert: 3, levels: 3, method: 2, draw: 3 })
    evaluate(runs, { methods: ['friedman'], levels: [0.5] }, cache)
    expect(kinds()).toEqual({ convert: 3, levels: 6, method: 3, draw: 3 })
    evaluate(runs, { methods: ['friedman'], meanRange: [0.2, 0.8], baseline: 'straight' }, cache)
    expect(kinds()).toEqual({ convert: 3, levels: 6, method: 3, draw: 3 })
    const relabelled = runs.map((run, i) => (i === 0 ? { ...run, info: { ...run.info, label: 'Renamed' } } : run))
    expect(evaluate(relabelled, { methods: ['friedman'] }, cache).runs[0]?.label).toBe('Renamed')
    expect(kinds()).toEqual({ convert: 3, levels: 6, method: 3, draw: 3 })
    const narrower = runs.map((run, i) =>
      i === 0 ? { ...run, info: { ...run.info, window: { kind: 'temperature', start_K: 400, end_K: 800 } as const } } : run,
    )
    evaluate(narrower, { methods: ['friedman'] }, cache)
    expect(kinds()).toEqual({ convert: 4, levels: 7, method: 4, draw: 4 })
    expect(evaluate(runs, { methods: ['friedman'] }, cache)).toEqual(first)
    expect(evaluate(runs, { methods: ['friedman'] })).toEqual(first)
  })
})
