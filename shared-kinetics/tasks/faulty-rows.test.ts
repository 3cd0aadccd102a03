import { describe, expect, it } from 'vitest'
import { durationOf, evenTimes, firstOrder, ramp, reducedTime, runOf, temperatureOf } from '../check-values/simulated-run.ts'
import { quiet } from '../check-values/series-of-values.ts'
import type { Finding } from '../review/finding.ts'
import { column } from '../units/quantity.ts'
import { evaluateStudy } from './evaluate-study.ts'
import type { StudyResult } from './study-result.ts'

type Run = ReturnType<typeof runOf>
const levels = Array.from({ length: 19 }, (_, i) => (i + 1) / 20)

/** First order, 150 kJ/mol and 1e12 1/s, exact. */
function exactRun(rate: number, samples = 3000): Run {
  const programme = ramp(360, rate, 850)
  const time = evenTimes(durationOf(programme), samples)
  const mass = reducedTime({ Ea_J_per_mol: 150e3, A_per_s: 1e12 }, programme, time).map((theta) => 5e-6 * (1 - 0.6 * firstOrder(theta)))
  return runOf(`${rate}`, {
    time_s: time,
    temperature_K: time.map((t) => temperatureOf(programme, t)),
    signals: [{ quantity: 'mass', unit: 'kg', values: mass }],
  })
}
const exact = [2, 5, 10, 20].map((rate) => exactRun(rate))

function evaluate(runs: readonly Run[]): StudyResult {
  const settings = { signal: null, levels, methods: null, window: null, baseline: 'area-proportional', meanRange: [0.1, 0.9] } as const
  return evaluateStudy(
    { runs: runs.map((run) => run.info), settings },
    new Map(runs.map((run) => [run.info.columnsKey, run.columns])),
    quiet,
  )
}
const onlyThird = (change: (run: Run) => Run): Run[] => exact.map((run, i) => (i === 2 ? change(run) : run))
const retimed = (run: Run, time: (t: number, i: number) => number): Run => ({
  ...run,
  columns: { ...run.columns, time_s: column((run.columns.time_s as Float64Array).map(time), 's') },
})
const found = (result: StudyResult, code: Finding['code']): Finding[] => result.findings.filter((finding) => finding.code === code)
const farthest = (result: StudyResult): number =>
  Math.max(
    ...result.profiles.flatMap((p) => (p.method === 'ofw' ? [] : p.Ea_kJ_per_mol.map((Ea) => (Ea === null ? 0 : Math.abs(Ea - 150))))),
  )

describe('rows that are not there', () => {
  it('a gap inside the reaction: no level in it, no peak beside it, a caution; the levels around it are exact', () => {
    const result = evaluate(
      onlyThird(({ info, columns }) => {
        const kept = Int32Array.from(columns.temperature_K.keys()).filter((i) => Math.abs((columns.temperature_K[i] as number) - 555) > 10)
        const pick = (values: Float64Array): Float64Array => Float64Array.from(kept, (i) => values[i] as number)
        return {
          info,
          columns: {
            time_s: column(pick(columns.time_s as Float64Array), 's'),
            temperature_K: column(pick(columns.temperature_K), 'K'),
            signals: columns.signals.map(pick),
          },
        }
      }),
    )
    expect(found(result, 'gap-in-reaction').map(({ severity, run }) => `${severity} ${run}`)).toEqual(['caution 10'])
    const third = result.runs[2]
    expect(third?.peak_K).toBeNull()
    expect(third?.temperatureAtLevel_K.filter((T) => T !== null && Math.abs(T - 555) < 10)).toEqual([])
    expect(third?.temperatureAtLevel_K.filter((T) => T === null).length).toBeGreaterThan(5)
    expect(farthest(result)).toBeLessThan(0.5)
  })

  it('few rows: a caution for each run', () => {
    expect(found(evaluate([2, 5, 10].map((rate) => exactRun(rate, 60))), 'sampling-coarse')).toHaveLength(3)
    const enough = evaluate([2, 5, 10].map((rate) => exactRun(rate, 100)))
    expect(found(enough, 'sampling-coarse')).toEqual([])
    expect(farthest(enough)).toBeLessThan(1.5)
  })
})

describe('time that does not ascend', () => {
  it('many rows set back while the sample reacts make the run unusable', () => {
    const result = evaluate(onlyThird((run) => retimed(run, (t, i) => (i >= 1250 && i < 1390 ? t - 200 : t))))
    expect(result.runs).toHaveLength(3)
    expect(result.findings[0]?.message).toMatch(/time goes back while the sample reacts/)
    expect(farthest(result)).toBeLessThan(0.5)
  })

  it('a few are a caution, and before the reaction a note', () => {
    const few = evaluate(onlyThird((run) => retimed(run, (t, i) => (i >= 1250 && i < 1260 ? t - 200 : t))))
    expect(found(few, 'rows-set-aside').map(({ severity, evidence }) => [severity, evidence['behindInReaction']])).toEqual([
      ['caution', 10],
    ])
    const before = evaluate(onlyThird((run) => retimed(run, (t, i) => (i >= 100 && i < 240 ? t - 50 : t))))
    expect(found(before, 'rows-set-aside').map(({ severity }) => severity)).toEqual(['note'])
  })

  it('rounded to 0.1 min: rows of one time count as their mean, which is unbiased, and it is said', () => {
    const result = evaluate(exact.map((run) => retimed(run, (t) => Math.round(t / 6) * 6)))
    expect(found(result, 'rows-set-aside').map(({ severity }) => severity)).toEqual(['caution', 'caution', 'caution', 'note'])
    for (const profile of result.profiles.filter(({ method }) => method === 'vyazovkin' || method === 'kas')) {
      expect(Math.abs((profile.mean.Ea_kJ_per_mol ?? Number.NaN) - 150)).toBeLessThan(0.5)
    }
  })
})
