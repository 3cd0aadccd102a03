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
import type { RunInfo } from '../series/run.ts'
import type { UncertaintySettings } from '../uncertainty/measured-sources.ts'
import { drawShare, intervalsOfDraws } from './draw-uncertainty.ts'
import { estimateUncertainty } from './estimate-uncertainty.ts'
import { evaluateStudy } from './evaluate-study.ts'
import type { AnalysisSettings, StudyInput } from './study-input.ts'

const context = { checkCancelled: () => undefined, progress: () => undefined }
const stated: UncertaintySettings = {
  temperatureCommon_K: 0.5,
  temperatureRun_K: 0.5,
  lag_s: 1,
  statedHeatingRate_share: 0.02,
  draws: 400,
  seed: 1,
}
const levels = [0.05, 0.1, 0.3, 0.5, 0.7, 0.9, 0.95]
const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }

type Run = ReturnType<typeof runOf>

/** A heat flow whose baseline drifts and steps with the conversion, as heat capacities that grow and differ leave it. */
function heatFlowRun(id: string, programme: Pieces, { info = {}, drift = 1e-5 }: { info?: Partial<RunInfo>; drift?: number } = {}): Run {
  const time = evenTimes(durationOf(programme), 3000)
  const alpha = reducedTime(step, programme, time).map(firstOrder)
  const width = (time[1] ?? 1) - (time[0] ?? 0)
  const heatFlow = alpha.map(
    (value, k) => ((value - (alpha[k - 1] ?? value)) * 2) / width + drift * (1 + (0.4 * k) / time.length) * (1 + 0.5 * value),
  )
  return runOf(
    id,
    {
      time_s: time,
      temperature_K: time.map((t) => temperatureOf(programme, t)),
      signals: [{ quantity: 'heat-flow', unit: 'W', values: heatFlow }],
    },
    info,
  )
}

const studyOf = (runs: readonly Run[], change: Partial<AnalysisSettings>): StudyInput => ({
  runs: runs.map((run) => run.info),
  settings: { signal: null, levels, methods: null, window: null, baseline: 'area-proportional', meanRange: [0.1, 0.9], ...change },
})
const columnsOf = (runs: readonly Run[]): Parameters<typeof evaluateStudy>[1] =>
  new Map(runs.map((run) => [run.info.columnsKey, run.columns]))

const heatingRates = [2, 5, 10, 20]
const methods = ['friedman', 'kas', 'vyazovkin', 'vyazovkin-incremental'] as const

/** From 360 to 680 K at a rate that grows (or falls) evenly with temperature from 480 K on, by so much on either side of its middle. */
function driftingRun(id: string, rate_K_per_min: number, share: number): Run {
  const pieces = Array.from({ length: 40 }, (_, k) => {
    const rate_K_per_s = (rate_K_per_min / 60) * (1 + share * ((2 * k + 1) / 40 - 1))
    return { rate_K_per_s, duration_s: 5 / rate_K_per_s }
  })
  const programme = { start_K: 360, pieces: [{ rate_K_per_s: rate_K_per_min / 60, duration_s: (120 * 60) / rate_K_per_min }, ...pieces] }
  const time = evenTimes(durationOf(programme), 2000)
  return runOf(id, {
    time_s: time,
    temperature_K: time.map((t) => temperatureOf(programme, t)),
    signals: [{ quantity: 'conversion', unit: '1', values: reducedTime(step, programme, time).map(firstOrder) }],
  })
}

const rootMeanSquare = (values: readonly (number | null)[]): number => Math.hypot(...values.map(Number)) / Math.sqrt(values.length)

describe('heating rates that wander', () => {
  it.each([0.03, 0.1])('by %f, to and fro from run to run: the budget of methods of one rate says about what they are off', (share) => {
    const runs = heatingRates.map((rate, i) => driftingRun(`${rate}`, rate, i % 2 === 0 ? -share : share))
    const study = studyOf(runs, { methods: ['kas', 'starink', 'friedman', 'vyazovkin'] })
    const evaluated = evaluateStudy(study, columnsOf(runs), context).profiles
    const { profiles } = estimateUncertainty(study, columnsOf(runs), stated, context).result
    const found = new Map(
      profiles.map(({ method, budget }) => {
        const u = budget.find(({ source }) => source === 'heating-rate')?.standardUncertainty_kJ_per_mol ?? []
        const Ea = evaluated.find((one) => one.method === method)?.Ea_kJ_per_mol ?? []
        return [method, { u: rootMeanSquare(u), off: rootMeanSquare(Ea.map((value) => (value ?? Number.NaN) - 150)) }]
      }),
    )
    for (const method of ['kas', 'starink'] as const) {
      const { u, off } = found.get(method) ?? { u: Number.NaN, off: Number.NaN }
      expect(off).toBeGreaterThan(10 * share)
      expect(u / off).toBeGreaterThan(0.5)
      expect(u / off).toBeLessThan(3)
    }
    expect(found.get('friedman')?.u).toBe(0)
    // Follows T(t), but for runs that stay within 1 % of a straight ramp over the reaction.
    expect(found.get('vyazovkin')?.u).toBeLessThan(0.5)
  })

  it('not at all have no part in it', () => {
    const runs = heatingRates.map((rate) => driftingRun(`${rate}`, rate, 0))
    const { profiles } = estimateUncertainty(studyOf(runs, { methods: ['kas'] }), columnsOf(runs), stated, context).result
    expect(profiles[0]?.budget.find(({ source }) => source === 'heating-rate')).toMatchObject({ magnitude: 'none', assumed: false })
  })
})

describe('the choice of baseline in the budget', () => {
  const runs = heatingRates.map((rate) => heatFlowRun(`${rate}`, ramp(400, rate, 700), { drift: 1e-5 * rate }))
  const columns = columnsOf(runs)
  const energiesWith = (change: Partial<AnalysisSettings>) =>
    new Map(evaluateStudy(studyOf(runs, { methods, ...change }), columns, context).profiles.map((one) => [one.method, one.Ea_kJ_per_mol]))

  it.each([
    ['area-proportional', null],
    ['straight', null],
    ['area-proportional', { kind: 'temperature', start_K: 440, end_K: 640 }],
  ] as const)('is what evaluations with either baseline differ by, over √3: from %s, window %o', (baseline, window) => {
    const other = energiesWith({ window, baseline: baseline === 'straight' ? 'area-proportional' : 'straight' })
    const own = energiesWith({ window, baseline })
    const { profiles } = estimateUncertainty(studyOf(runs, { methods, window, baseline }), columns, stated, context).result
    let most = 0
    for (const { method, budget } of profiles) {
      const entry = budget.find(({ source }) => source === 'baseline')
      expect(entry?.reason).toBeNull()
      levels.forEach((level, i) => {
        const difference = Math.abs((own.get(method)?.[i] ?? Number.NaN) - (other.get(method)?.[i] ?? Number.NaN))
        most = Math.max(most, difference)
        // First order: of a large difference a part is not told.
        const u = entry?.standardUncertainty_kJ_per_mol[i] ?? Number.NaN
        expect(Math.abs(Math.sqrt(3) * u - difference), `${method} at ${level}: ${Math.sqrt(3) * u} for ${difference}`).toBeLessThan(
          0.2 * difference + 0.05,
        )
      })
    }
    expect(most).toBeGreaterThan(2)
  })

  it('is unknown, with the run named, where one run has no other baseline; the intervals are given without it and say so', () => {
    const withHold = [...runs, heatFlowRun('hold', holdAt(520, 4000), { info: { label: 'Hold at 520 K' } })]
    const study = studyOf(withHold, { methods: ['friedman', 'vyazovkin'] })
    const { result, order } = estimateUncertainty(study, columnsOf(withHold), stated, context)
    expect(result.profiles.map(({ method }) => method)).toEqual(['friedman', 'vyazovkin'])
    const draws = intervalsOfDraws(order, [drawShare({ ...order, range: { seed: 1, from: 0, to: 100 } }, context)], 1)
    for (const { budget, intervals, method, mean } of result.profiles) {
      const entry = budget.find(({ source }) => source === 'baseline')
      expect(entry?.reason).toContain('Hold at 520 K')
      expect(entry?.standardUncertainty_kJ_per_mol).toEqual(levels.map(() => null))
      const combined = intervals.find(({ kind }) => kind === 'combined')
      for (const interval of [combined, draws.get(method)]) {
        expect(interval?.note).toMatch(/The choice of baseline is not in it: .*Hold at 520 K/)
        expect(interval?.note).not.toMatch(/area-proportional or straight/)
        levels.forEach((_, i) => expect(interval?.upper95_kJ_per_mol[i]).toBeGreaterThan(interval?.lower95_kJ_per_mol[i] ?? Number.NaN))
        expect(interval?.status.filter((status) => status !== 'baseline-left-out' && status !== 'reaches-below-zero')).toEqual([])
        expect(interval?.status).toContain('baseline-left-out')
      }
      expect(mean?.upper95_kJ_per_mol).toBeGreaterThan(mean?.Ea_kJ_per_mol ?? Number.NaN)
      expect(mean?.note).toMatch(/The choice of baseline is not in it: .*Hold at 520 K/)
      // What does not rest on a baseline stays.
      for (const { source, standardUncertainty_kJ_per_mol: u } of budget.filter((one) => one.source !== 'baseline'))
        expect([source, u.every((value) => value !== null && value >= 0)]).toEqual([source, true])
    }
  })

  it('has no entry where no run has a choice', () => {
    const holds = [500, 510, 520, 530].map((T) => heatFlowRun(`${T}`, holdAt(T, 20_000)))
    const { profiles } = estimateUncertainty(studyOf(holds, { methods: ['friedman'] }), columnsOf(holds), stated, context).result
    expect(profiles[0]?.budget.map(({ source }) => source)).not.toContain('baseline')
    expect(profiles[0]?.budget.length).toBe(5)
  })
})
