import { describe, expect, it } from 'vitest'
import { underConstantRate } from '../check-values/exact-simulation.ts'
import {
  durationOf,
  evenTimes,
  firstOrder,
  normalNumbers,
  ramp,
  reducedTime,
  runOf,
  temperatureOf,
  type Pieces,
} from '../check-values/simulated-run.ts'
import type { RunColumns, RunInfo } from '../series/run.ts'
import { evaluateStudy } from './evaluate-study.ts'
import type { ProfileResult, StudyResult } from './study-result.ts'

// Series that something is wrong with, simulated exactly: one first-order step of 150 kJ/mol unless said otherwise.
type Run = { readonly info: RunInfo; readonly columns: RunColumns }
const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }
const levels = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)

function evaluate(runs: readonly Run[]): StudyResult {
  const settings = { signal: null, levels, methods: null, window: null, baseline: 'area-proportional', meanRange: [0.1, 0.9] } as const
  const columns = new Map(runs.map((run) => [run.info.columnsKey, run.columns]))
  return evaluateStudy({ runs: runs.map((run) => run.info), settings }, columns, {
    checkCancelled: () => undefined,
    progress: () => undefined,
  })
}

function conversionRun(id: string, programme: Pieces, shift: (T: number) => number = (T) => T): Run {
  const time = evenTimes(durationOf(programme), 2000)
  return runOf(id, {
    time_s: time,
    temperature_K: time.map((t) => shift(temperatureOf(programme, t))),
    signals: [{ quantity: 'conversion', unit: '1', values: reducedTime(step, programme, time).map(firstOrder) }],
  })
}

const profile = (result: StudyResult, method: string): ProfileResult => {
  const found = result.profiles.find((one) => one.method === method)
  if (found === undefined) throw new Error(`no ${method}`)
  return found
}
const worst = (result: StudyResult, method: string): number =>
  Math.max(...profile(result, method).Ea_kJ_per_mol.map((Ea) => (Ea === null ? Infinity : Math.abs(Ea - 150))))
const codes = (result: StudyResult): readonly string[] => result.findings.map((finding) => finding.code)

/** From 360 to 680 K at a rate that grows (or falls) evenly with temperature from 480 K on, by so much on either side of its middle. */
function drifting(rate_K_per_min: number, share: number): Pieces {
  const pieces = Array.from({ length: 40 }, (_, k) => {
    const rate_K_per_s = (rate_K_per_min / 60) * (1 + share * ((2 * k + 1) / 40 - 1))
    return { rate_K_per_s, duration_s: 5 / rate_K_per_s }
  })
  return { start_K: 360, pieces: [{ rate_K_per_s: rate_K_per_min / 60, duration_s: (120 * 60) / rate_K_per_min }, ...pieces] }
}

describe('heating rates that drift', () => {
  it('do not reach Vyazovkin, which follows T(t); methods of one rate a run are off, and that is said', () => {
    const result = evaluate([2, 5, 10, 20].map((rate, i) => conversionRun(`${rate}`, drifting(rate, i % 2 === 0 ? -0.2 : 0.2))))
    expect(result.runs.map((run) => run.programme)).toEqual(Array.from({ length: 4 }, () => 'constant-heating-rate'))
    expect(worst(result, 'vyazovkin')).toBeLessThan(0.05)
    expect(worst(result, 'friedman')).toBeLessThan(0.5)
    expect(worst(result, 'kas')).toBeGreaterThan(1)
    expect(codes(result)).toContain('heating-rate-not-constant')
  })
})

const withBad = (bad: number): StudyResult =>
  evaluate([2, 5, 10, 20, 40].map((rate, i) => conversionRun(`${rate}`, ramp(360, rate, 850), (T) => (i === bad ? T + 5 : T))))

describe('five runs of which one stands 5 K too high', () => {
  it.each([0, 4])('at an end (run %i): named, with the Ea it would be without it', (bad) => {
    const result = withBad(bad)
    const finding = result.findings.find(({ code }) => code === 'outlier-run')
    expect(finding?.run).toBe(result.runs[bad]?.runId)
    expect(Number(finding?.evidence['EaWithout_kJ_per_mol']) / 150).toBeCloseTo(1, 2)
    expect(codes(result)).not.toContain('interval-wide-because-few-runs')
    expect(codes(result)).toContain('runs-do-not-agree')
  })

  it('in the middle, where it does not turn the lines: named by the wide interval', () => {
    const result = withBad(2)
    expect(codes(result)).not.toContain('outlier-run')
    expect(result.findings.find(({ code }) => code === 'runs-do-not-agree')?.run).toBe(result.runs[2]?.runId)
  })

  it('nowhere: nothing is said', () => {
    // But that its temperature is calculated, which it is.
    expect(codes(withBad(-1))).toEqual(['temperature-not-measured'])
  })
})

describe('noise of the temperature', () => {
  it('of three runs of one step is not taken for several steps: a caution in less than one study of ten', () => {
    const studies = Array.from({ length: 30 }, (_, seed) => {
      const normal = normalNumbers(7 * seed + 1)
      const runs = [5, 10, 20].map((rate) => {
        const [offset, tilt] = [1.5 * normal(), 0.03 * normal()]
        return conversionRun(`${rate}`, ramp(360, rate, 850), (T) => T + offset + tilt * (T - 570))
      })
      return evaluate(runs).findings.filter(({ code }) => code === 'energy-varies')
    })
    expect(studies.flat().filter(({ severity }) => severity === 'caution').length).toBeLessThan(3)
    expect(studies.flat().filter(({ evidence }) => evidence['intervals'] === 'overlap').length).toBeGreaterThan(5)
  })
})

describe('two steps whose larger rate peak changes side', () => {
  const steps = [
    { Ea_J_per_mol: 100e3, A_per_s: 1e8, share: 0.6 },
    { Ea_J_per_mol: 200e3, A_per_s: 1e16, share: 0.4 },
  ]
  const result = evaluate(
    [1, 3, 10, 30].map((rate) => {
      const T = Float64Array.from({ length: 3000 }, (_, i) => 360 + (540 * i) / 2999)
      return runOf(`${rate}`, {
        time_s: T.map((value) => ((value - 360) * 60) / rate),
        temperature_K: T,
        signals: [{ quantity: 'conversion', unit: '1', values: T.map((value) => underConstantRate(steps, rate / 60, value).conversion) }],
      })
    }),
  )

  it('give Kissinger peaks of different steps: the conversion at each is that of the exact curve, and the difference is said', () => {
    result.kissinger?.conversionAtPeak.forEach((conversion, i) => {
      const rate = result.runs[i]?.heatingRate_K_per_min ?? Number.NaN
      const exact = underConstantRate(steps, rate / 60, result.kissinger?.peaks_K[i] ?? Number.NaN).conversion
      expect(Math.abs((conversion ?? Number.NaN) - exact)).toBeLessThan(0.005)
    })
    expect(codes(result)).toContain('peaks-at-different-conversion')
    expect(result.kissinger?.sources.join()).toContain('Kissinger')
  })

  it('of one step: nothing is said of them', () => {
    const single = evaluate([2, 5, 10, 20].map((rate) => conversionRun(`${rate}`, ramp(360, rate, 850))))
    // First order peaks at a conversion a little below 1 - 1/e.
    for (const conversion of single.kissinger?.conversionAtPeak ?? []) expect(Math.abs((conversion ?? 0) - 0.61)).toBeLessThan(0.02)
    expect(codes(single)).toEqual(['temperature-not-measured'])
  })
})

describe('levels without a number', () => {
  // The fast run stands lower than the slow one in the first half: its Ea is negative there, and Phi has no minimum.
  const crossing = evaluate(
    [5, 10, 20].map((rate, i) => conversionRun(`${rate}`, ramp(360, rate, 850), (T) => (i === 2 ? 570 + 2.2 * (T - 570) - 6 : T))),
  )

  it('are said, once a method and reason; a negative Ea too, and the mean tells what it rests on', () => {
    const findings = crossing.findings.filter(({ code }) => code === 'level-without-energy')
    for (const one of crossing.profiles) {
      const reasons = new Set(one.status.filter((status) => status !== 'ok' && status !== 'level-not-reached'))
      expect(findings.filter(({ evidence }) => evidence['method'] === one.method)).toHaveLength(reasons.size)
    }
    expect(findings.map(({ evidence }) => evidence['method'])).toContain('vyazovkin')
    expect(codes(crossing)).toContain('energy-not-positive')
    for (const { mean, Ea_kJ_per_mol: Ea } of crossing.profiles) {
      const used = levels.filter((level, i) => level > 0.0999 && level < 0.9001 && (Ea[i] ?? -1) > 0)
      expect(mean).toMatchObject({
        levelsUsed: used.length,
        levelsInRange: 17,
        firstLevel: used[0] ?? null,
        lastLevel: used.at(-1) ?? null,
      })
      expect(mean.levelsUsed).toBeLessThan(17)
    }
  })
})
