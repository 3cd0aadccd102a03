import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { reviewedRun, reviewInput, type RunToReview } from '../../check-values/review-input-of.ts'
import {
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
} from '../../check-values/simulated-run.ts'
import { straightest_K } from '../../series/steadiness.ts'
import { evaluateStudy } from '../../tasks/evaluate-study.ts'
import type { Finding } from '../finding.ts'
import { temperatureNotMeasured } from './temperature-not-measured.ts'

const steady = (deviation_K: number, lastDigit_K: number): RunToReview => ({ steadiness: { deviation_K, lastDigit_K } })
const of = (...changes: readonly RunToReview[]): readonly Finding[] =>
  temperatureNotMeasured(reviewInput({ runs: changes.map((change, i) => reviewedRun(`r${i}`, 5 * (i + 1), i, change)) }))
const hold: RunToReview = { ...steady(0, Number.NaN), result: { programme: 'isothermal' } }

describe('temperature-not-measured', () => {
  it('fires within the last printed digit and 0.02 K, at either limit, and not beyond', () => {
    expect(of(steady(0.01, 0.01))).toHaveLength(1)
    expect(of(steady(0.0101, 0.01))).toEqual([])
    expect(of(steady(straightest_K, 0.5))).toHaveLength(1)
    expect(of(steady(0.0201, 0.5))).toEqual([])
    expect(straightest_K).toBe(0.02)
  })

  it('is a note that says how near the line each row lies, what cannot be seen, and what to do', () => {
    const [finding] = of(steady(0.0023, 0.01))
    expect(finding).toMatchObject({
      severity: 'note',
      run: 'r0',
      evidence: { runs: 1, ofRuns: 1, largestDeviation_K: 0.0023, limit_K: 0.01 },
      sources: ['ictac-2014'],
    })
    expect(finding?.message).toMatch(
      /0\.0023 K at most off one straight line.*lag and self-heating.*Export the measured sample temperature/,
    )
    expect(of(steady(1e-12, 0.01))[0]?.message).toContain('less than 0.0001 K off')
  })

  it('speaks once for several runs, and names them where they are not all', () => {
    const [all, ...more] = of(steady(0, 0.01), steady(0.002, 0.02))
    expect(more).toEqual([])
    expect(all).toMatchObject({ run: null, title: 'Temperature of all 2 runs is a programme, not a measurement' })
    expect(all?.evidence).toEqual({ runs: 2, ofRuns: 2, largestDeviation_K: 0.002, limit_K: 0.02 })
    const [some] = of(steady(0, 0.01), steady(0, 0.02), steady(0.4, Number.NaN))
    expect(some?.title).toMatch(/2 of 3 runs/)
    expect(some?.message).toContain('(Run r0 and Run r1)')
  })

  it('fires for holds of one temperature only, and does not call them a programme for sure', () => {
    const [finding] = of(hold)
    expect(finding).toMatchObject({
      title: 'Temperature of Run r0 does not move in the hold',
      evidence: { largestDeviation_K: 0, limit_K: 0 },
    })
    expect(finding?.message).toContain('set or has too few digits')
    expect(of({ ...hold, ...steady(1e-6, Number.NaN) })).toEqual([])
    expect(of(hold, steady(0, 0.01))[0]?.message).toMatch(/straight line.*in holds every row/)
  })

  it('is silent for other programmes, for time that was rebuilt, and where nothing is known', () => {
    expect(of({ ...steady(0, 0.01), result: { programme: 'general' } })).toEqual([])
    expect(of({ ...steady(0, 0.01), info: { hasTime: false } })).toEqual([])
    expect(of(steady(Number.NaN, Number.NaN))).toEqual([])
  })
})

const step = { Ea_J_per_mol: 120e3, A_per_s: 1e10 }

/** Runs of one first-order step at 2, 5 and 10 K/min, or in holds, T printed with three decimals after `disturbed`; codes of the findings. */
function evaluated(programmes: readonly Pieces[], disturbed: (T: number) => number, rows = 1500): readonly string[] {
  const runs = programmes.map((programme, i) => {
    const time = evenTimes(durationOf(programme), rows).map((t) => Number(t.toFixed(2)))
    return runOf(`${i}`, {
      time_s: time,
      temperature_K: time.map((t) => Number(disturbed(temperatureOf(programme, t)).toFixed(3))),
      signals: [{ quantity: 'conversion', unit: '1', values: reducedTime(step, programme, time).map(firstOrder) }],
    })
  })
  return codesOf(runs)
}

function codesOf(runs: readonly ReturnType<typeof runOf>[]): readonly string[] {
  const settings = {
    signal: null,
    levels: [0.3, 0.5, 0.7],
    methods: null,
    window: null,
    baseline: 'straight',
    meanRange: [0.3, 0.7],
  } as const
  return evaluateStudy(
    { runs: runs.map(({ info }) => info), settings },
    new Map(runs.map(({ info, columns }) => [info.columnsKey, columns])),
    {
      checkCancelled: () => undefined,
      progress: () => undefined,
    },
  ).findings.map(({ code }) => code)
}

describe('evaluated runs', () => {
  const ramps = [2, 5, 10].map((rate) => ramp(400, rate, 750))
  it('of a nominal temperature are told, whether their rows are pooled or not', () => {
    expect(evaluated(ramps, (T) => T)).toContain('temperature-not-measured')
    expect(evaluated(ramps, (T) => T, 9000)).toContain('temperature-not-measured')
    const holds = [480, 490, 500].map((T) => holdAt(T, 4 / (step.A_per_s * Math.exp(-step.Ea_J_per_mol / (8.31446261815324 * T)))))
    expect(evaluated(holds, (T) => T)).toContain('temperature-not-measured')
    const normal = normalNumbers(3)
    expect(evaluated(holds, (T) => T + 0.005 * normal())).not.toContain('temperature-not-measured')
  })

  it('of a temperature with scatter, or one that gets ahead of the programme by self-heating, are not', () => {
    const normal = normalNumbers(11)
    expect(evaluated(ramps, (T) => T + 0.02 * normal())).not.toContain('temperature-not-measured')
    expect(evaluated(ramps, (T) => T + 0.3 * Math.exp(-(((T - 530) / 30) ** 2)))).not.toContain('temperature-not-measured')
  })
})

const data = new URL('../../../../shared/data/measured/', import.meta.url)

/** Runs of a folder of exports in s, K and mg. */
const measured = (folder: string, pattern: RegExp): readonly ReturnType<typeof runOf>[] =>
  readdirSync(new URL(folder, data))
    .filter((name) => pattern.test(name))
    .map((name) => {
      const rows = readFileSync(new URL(`${folder}/${name}`, data), 'utf8')
        .split('\n')
        .map((line) => line.split(',').slice(0, 3).map(Number))
        .filter((row) => row.length === 3 && row.every(Number.isFinite))
      const values = (k: number, factor = 1): Float64Array => Float64Array.from(rows, (row) => factor * (row[k] ?? Number.NaN))
      return runOf(name, {
        time_s: values(0),
        temperature_K: values(1),
        signals: [{ quantity: 'mass', unit: 'kg', values: values(2, 1e-6) }],
      })
    })

describe.skipIf(!existsSync(data))('open data sets (skipped without ../shared/data)', () => {
  it('whose time its owners made even by processing is told; those with recorded times are not', () => {
    // Its README: one grid of temperature in all files, time exactly linear.
    expect(codesOf(measured('pmma-tga-n2-seven-rates', /^UMET.*csv$/))).toContain('temperature-not-measured')
    expect(codesOf(measured('pmma-dsc-tga-n2-four-rates', /^FSRI_TGA.*csv$/))).not.toContain('temperature-not-measured')
    expect(codesOf(measured('pine-tga-dsc-n2-three-rates', /^FSRI.*csv$/))).not.toContain('temperature-not-measured')
    expect(codesOf(measured('untidy-layouts/pine-tga-n2-three-rates', /csv$/))).not.toContain('temperature-not-measured')
  })
})
