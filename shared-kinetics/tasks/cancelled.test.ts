import { describe, expect, it } from 'vitest'
import { normalNumbers, durationOf, evenTimes, firstOrder, ramp, reducedTime, runOf, temperatureOf } from '../check-values/simulated-run.ts'
import { cancelledAtLook, workBetweenLooks } from '../check-values/work-between-looks.ts'
import { constantRateSeries, quiet } from '../check-values/series-of-values.ts'
import { Cancelled } from '../errors.ts'
import { methods } from '../isoconversional/registry.ts'
import type { TaskContext } from '../isoconversional/result.ts'
import { resampledEnergies } from '../uncertainty/resampled-energies.ts'
import { drawShare, intervalsOfDraws, type DrawOrder } from './draw-uncertainty.ts'
import { estimateUncertainty } from './estimate-uncertainty.ts'
import { evaluateStudy } from './evaluate-study.ts'
import type { StudyInput } from './study-input.ts'

const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }
const uncertainty = { temperatureCommon_K: 0.5, temperatureRun_K: 0.5, lag_s: 1, statedHeatingRate_share: 0.02, draws: 2000, seed: 1 }
const asked = ['friedman', 'ofw-corrected', 'starink', 'vyazovkin', 'vyazovkin-incremental', 'astm-e1641'] as const

type Kind = 'mass on ramps' | 'heat flow on ramps' | 'mass on programmes that wander'

interface Study {
  readonly study: StudyInput
  readonly columns: Parameters<typeof evaluateStudy>[1]
}

/** Four noisy runs of one first-order reaction. */
function studyOf(kind: Kind, levels: number): Study {
  const random = normalNumbers(1)
  const runs = [2, 5, 10, 20].map((rate, i) => {
    const programme = ramp(420, rate, 720)
    const duration = durationOf(programme)
    const time = evenTimes(duration, 240)
    const wander_K = kind === 'mass on programmes that wander' ? 4 : 0
    const offset_K = 0.4 * random()
    const theta = reducedTime(step, programme, time)
    const temperature_K = time.map((t) => temperatureOf(programme, t) + offset_K + wander_K * Math.sin((30 * t) / duration))
    const signal =
      kind === 'heat flow on ramps'
        ? ({
            quantity: 'heat-flow',
            unit: 'W/kg',
            values: theta.map((_, k) => {
              const dt = (time[k] ?? 0) - (time[k - 1] ?? Number.NaN)
              const passed = k === 0 ? 0 : (firstOrder(theta[k] ?? 0) - firstOrder(theta[k - 1] ?? 0)) / dt
              return 3e5 * passed + 40 + 0.02 * rate * random()
            }),
          } as const)
        : ({ quantity: 'mass', unit: 'kg', values: theta.map((value) => 8e-6 * (1 - 0.5 * firstOrder(value)) + 1e-9 * random()) } as const)
    return runOf(`r${i}`, { time_s: time, temperature_K, signals: [signal] })
  })
  return {
    study: {
      runs: runs.map((run) => run.info),
      settings: {
        signal: null,
        levels: Array.from({ length: levels }, (_, i) => (i + 1) / (levels + 1)),
        methods: asked,
        window: null,
        baseline: 'area-proportional',
        meanRange: [0.1, 0.9],
      },
    },
    columns: new Map(runs.map((run) => [run.info.columnsKey, run.columns])),
  }
}

const draws = 50
const few = 10
const many = 80

/** Everything that is asked of a worker about one study, each on what the one before left. */
function tasksOf(
  kind: Kind,
  levels: number,
): Readonly<Record<'evaluation' | 'resampling and budget' | 'draws' | 'intervals of draws', Work>> {
  const { study, columns } = studyOf(kind, levels)
  const estimate = (context: TaskContext): DrawOrder => estimateUncertainty(study, columns, uncertainty, context).order
  const order = estimate(quiet)
  const draw = (context: TaskContext, to: number): Float64Array[] => drawShare({ ...order, range: { seed: 1, from: 0, to } }, context)
  const share = draw(quiet, draws)
  return {
    evaluation: (context) => evaluateStudy(study, columns, context),
    'resampling and budget': estimate,
    draws: (context) => draw(context, levels === few ? 5 : 10),
    'intervals of draws': (context) => intervalsOfDraws(order, [share, share], 1, context),
  }
}

type Work = (context: TaskContext) => unknown

const kinds = ['mass on ramps', 'heat flow on ramps', 'mass on programmes that wander'] as const
const names = ['evaluation', 'resampling and budget', 'draws', 'intervals of draws'] as const

/** Calls of mathematical functions that take a fraction of a millisecond. */
const nextToNothing = 10_000

describe.each(kinds)('%s', (kind) => {
  const little = tasksOf(kind, few)
  const much = tasksOf(kind, many)

  it.each(names)('more levels and draws do not make the time longer in which a cancel goes unseen: %s', (name) => {
    const before = workBetweenLooks(little[name])
    const after = workBetweenLooks(much[name])
    expect(after.all).toBeGreaterThan(before.all)
    expect(after.looks).toBeGreaterThan(3 * before.looks)
    expect(after.most).toBeLessThanOrEqual(Math.max(1.1 * before.most, nextToNothing))
  })

  it.each(names)('a cancel ends it at the very next look, wherever that is: %s', (name) => {
    const { looks } = workBetweenLooks(little[name])
    for (const share of [0, 0.001, 0.01, 0.1, 0.3, 0.5, 0.7, 0.9, 1]) {
      const k = Math.max(1, Math.round(share * looks))
      const context = cancelledAtLook(k)
      expect(() => little[name](context)).toThrow(Cancelled)
      expect(context.looks()).toBe(k)
    }
  })
})

/** One resample, of runs whose Ea rises from level to level. */
const resampleOf = (levels: number): Work => {
  const rates = [1, 2, 5, 10, 20, 40]
  const alpha = Array.from({ length: levels }, (_, i) => (i + 1) / (levels + 1))
  const series = constantRateSeries(
    alpha,
    rates,
    alpha.map((level) => rates.map((rate) => 520 + 60 * level + (14 + level) * Math.log(rate) + 0.05 * (rate % 3))),
  )
  const result = methods.vyazovkin.run(series, quiet)
  const taken = [2, 1, 1, 0, 1, 1]
  return (context) => resampledEnergies(series, result, context)(taken)
}

describe('one resample of the runs', () => {
  it('looks at every level', () => {
    const before = workBetweenLooks(resampleOf(10))
    const after = workBetweenLooks(resampleOf(100))
    expect(after.all).toBeGreaterThan(8 * before.all)
    expect(after.looks).toBeGreaterThanOrEqual(100)
    expect(after.most).toBeLessThanOrEqual(1.2 * before.most)
  })
})
