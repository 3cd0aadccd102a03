import { describe, expect, it } from 'vitest'
import { evenTimes, firstOrder, durationOf, ramp, reducedTime, runOf, temperatureOf } from '../check-values/simulated-run.ts'
import { Cancelled } from '../errors.ts'
import { randomStream } from '../numerics/random.ts'
import type { UncertaintySettings } from '../uncertainty/measured-sources.ts'
import { drawShare, intervalsOfDraws } from './draw-uncertainty.ts'
import { estimateUncertainty } from './estimate-uncertainty.ts'
import { evaluateStudy } from './evaluate-study.ts'
import type { EvaluationCache } from './memo.ts'
import type { StudyInput } from './study-input.ts'

const withSeed = (seed: number): UncertaintySettings => ({
  temperatureCommon_K: 0.5,
  temperatureRun_K: 0.5,
  lag_s: 1,
  statedHeatingRate_share: 0.02,
  draws: 400,
  seed,
})
const context = { checkCancelled: () => undefined, progress: () => undefined }
const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }
const levels = [0.1, 0.3, 0.5, 0.7, 0.9]

/** Mass runs at constant heating rates, each with a thermometer off by about 0.4 K, and all of them by `shift_K` and a lag of `lag_s`. */
function studyOf(
  rates: readonly number[],
  seed = 1,
  { shift_K, lag_s }: { readonly shift_K: number; readonly lag_s: number } = { shift_K: 0, lag_s: 0 },
): { readonly study: StudyInput; readonly columns: Parameters<typeof evaluateStudy>[1] } {
  const random = randomStream(seed)
  const runs = rates.map((rate, i) => {
    const programme = ramp(400, rate, 700)
    const time = evenTimes(durationOf(programme), 2000)
    const offset = 0.4 * random.normal() + shift_K + (lag_s * rate) / 60
    return runOf(`r${i}`, {
      time_s: time,
      temperature_K: time.map((t) => temperatureOf(programme, t) + offset),
      signals: [
        { quantity: 'mass', unit: 'kg', values: reducedTime(step, programme, time).map((theta) => 8e-6 * (1 - 0.5 * firstOrder(theta))) },
      ],
    })
  })
  return {
    study: {
      runs: runs.map((run) => run.info),
      settings: { signal: null, levels, methods: null, window: null, baseline: 'area-proportional', meanRange: [0.1, 0.9] },
    },
    columns: new Map(runs.map((run) => [run.info.columnsKey, run.columns])),
  }
}

/** By kind, for Starink's method at one level. */
const notesOf = (rates: readonly number[]): ReadonlyMap<string, string> => {
  const { study, columns } = studyOf(rates)
  const one = { ...study, settings: { ...study.settings, methods: ['starink' as const], levels: [0.5] } }
  const [profile] = estimateUncertainty(one, columns, withSeed(1), context).result.profiles
  return new Map(profile?.intervals.map(({ kind, note }) => [kind, note]))
}

/** The coverage in percent that a note tells. */
const told = (note: string | undefined): number => Number(/true value in about (\d+) %/.exec(note ?? '')?.[1])

describe('the uncertainty of a study', () => {
  it('names jackknife and bootstrap for each method, pointwise and approximate, at every level that has an Ea', () => {
    const { study, columns } = studyOf([1, 2, 5, 10, 20])
    const evaluated = evaluateStudy(study, columns, context)
    const { profiles, seed } = estimateUncertainty(study, columns, withSeed(4), context).result
    expect(seed).toBe(4)
    expect(profiles.map((profile) => profile.method)).toEqual(evaluated.profiles.map((profile) => profile.method))
    profiles.forEach(({ intervals, method }, m) => {
      expect(intervals.map((interval) => interval.kind)).toEqual(['jackknife', 'bootstrap', 'combined'])
      for (const interval of intervals.slice(0, 2)) {
        expect(interval).toMatchObject({ level: 0.95, pointwise: true, approximate: true })
        expect(interval.note).toContain('Pointwise')
        levels.forEach((_, i) => {
          const Ea = evaluated.profiles[m]?.Ea_kJ_per_mol[i] ?? Number.NaN
          expect(interval.lower95_kJ_per_mol[i], `by ${method}`).toBeLessThan(Ea)
          expect(interval.upper95_kJ_per_mol[i], `by ${method}`).toBeGreaterThan(Ea)
        })
      }
      // The jackknife of a regression estimates the same standard error; of five runs within a factor.
      const ratio = (intervals[0]?.standardUncertainty_kJ_per_mol[2] ?? 0) / (evaluated.profiles[m]?.standardError_kJ_per_mol[2] ?? 0)
      expect(ratio, `by ${method}`).toBeGreaterThan(0.4)
      expect(ratio, `by ${method}`).toBeLessThan(2.5)
    })
    expect(profiles[0]?.intervals[1]?.note).toMatch(/All 81 distinct resamples of 5 runs.*fewer than three distinct programmes/)
  })

  it('takes from the cache what an evaluation left there, and gives the same numbers without it', () => {
    const { study, columns } = studyOf([1, 2, 5, 10])
    const cache: EvaluationCache = new Map()
    evaluateStudy(study, columns, context, cache)
    const known = new Set(cache.keys())
    const fromCache = estimateUncertainty(study, columns, withSeed(1), context, cache)
    expect(new Set(cache.keys())).toEqual(known)
    expect(fromCache).toEqual(estimateUncertainty(study, columns, withSeed(1), context))
  })

  it('resamples no three runs', () => {
    const { study, columns } = studyOf([1, 5, 20])
    for (const { intervals } of estimateUncertainty(study, columns, withSeed(1), context).result.profiles)
      expect(intervals.map((interval) => interval.kind)).toEqual(['combined'])
  })

  it('tells of four and of five runs how often their intervals hold, and gives no bootstrap of three programmes', () => {
    const four = notesOf([1, 2, 5, 10])
    expect(four.get('bootstrap')).toContain('34.4 % of the probability')
    expect(four.get('bootstrap')).toContain('too narrow')
    // 4,000 replicates of a straight line in an independent program (NumPy): 62 and 87 % for the bootstrap, 95 % for the jackknife of both.
    expect(Math.abs(told(four.get('bootstrap')) - 62)).toBeLessThan(4)
    expect(Math.abs(told(four.get('jackknife')) - 95)).toBeLessThan(3)
    const five = notesOf([1, 2, 5, 10, 20])
    expect(Math.abs(told(five.get('bootstrap')) - 87)).toBeLessThan(4)
    expect(five.get('jackknife')).not.toContain('too narrow')
    expect([...notesOf([5, 10, 10, 20]).keys()]).toEqual(['combined'])
    expect([...notesOf([5, 5, 10, 10, 20, 20]).keys()]).toEqual(['jackknife', 'combined'])
  })

  it('draws resamples of seven runs by the seed', () => {
    const { study, columns } = studyOf([1, 2, 3, 5, 10, 15, 20])
    const one = { ...study, settings: { ...study.settings, methods: ['starink' as const], levels: [0.5] } }
    const bootstrapWith = (seed: number) => estimateUncertainty(one, columns, withSeed(seed), context).result.profiles[0]?.intervals[1]
    expect(bootstrapWith(1)).toEqual(bootstrapWith(1))
    expect(bootstrapWith(1)?.standardUncertainty_kJ_per_mol).not.toEqual(bootstrapWith(2)?.standardUncertainty_kJ_per_mol)
    expect(bootstrapWith(1)?.note).toContain('drawn with seed 1')
  })

  it('stops when it is no longer wanted', () => {
    const { study, columns } = studyOf([1, 2, 5, 10, 20])
    const cache: EvaluationCache = new Map()
    evaluateStudy(study, columns, context, cache)
    let looks = 0
    const stopping = {
      checkCancelled: () => {
        if (++looks > 40) throw new Cancelled()
      },
      progress: () => undefined,
    }
    expect(() => estimateUncertainty(study, columns, withSeed(1), stopping, cache)).toThrow(Cancelled)
  })
})

describe('measured sources', () => {
  it('stand in a budget, and the draws spread as wide as it says together', () => {
    const { study, columns } = studyOf([1, 2, 5, 10, 20])
    const { result, order } = estimateUncertainty(study, columns, withSeed(1), context)
    const shares = [
      drawShare({ ...order, range: { seed: 1, from: 0, to: 1000 } }, context),
      drawShare({ ...order, range: { seed: 1, from: 1000, to: 2000 } }, context),
    ]
    const intervals = intervalsOfDraws(order, shares, 1)
    for (const { method, budget } of result.profiles) {
      // Mass has no baseline to choose.
      expect(budget.map((entry) => entry.source)).toEqual([
        'temperature-common',
        'temperature-run',
        'temperature-lag',
        'heating-rate',
        'signal-noise',
      ])
      const interval = intervals.get(method)
      expect(interval?.note).toContain('2000 draws with seed 1')
      levels.forEach((_, i) => {
        const together = Math.hypot(...budget.map((entry) => entry.standardUncertainty_kJ_per_mol[i] ?? Number.NaN))
        expect((interval?.standardUncertainty_kJ_per_mol[i] ?? 0) / together, `${method} at ${levels[i]}`).toBeCloseTo(1, 1)
      })
    }
  })

  it('take in what another baseline under a heat flow would do', () => {
    const runs = [2, 5, 10, 20].map((rate, i) => {
      const programme = ramp(400, rate, 700)
      const time = evenTimes(durationOf(programme), 3000)
      const alpha = reducedTime(step, programme, time).map(firstOrder)
      const drift = time.map((t) => 1e-5 * (1 + (0.4 * t) / durationOf(programme)))
      const heatFlow = alpha.map(
        (value, k) => ((value - (alpha[k - 1] ?? value)) * 2) / ((time[1] ?? 1) - (time[0] ?? 0)) + (drift[k] ?? 0) * (1 + 3 * value),
      )
      return runOf(`h${i}`, {
        time_s: time,
        temperature_K: time.map((t) => temperatureOf(programme, t)),
        signals: [{ quantity: 'heat-flow', unit: 'W', values: heatFlow }],
      })
    })
    const study: StudyInput = {
      runs: runs.map((run) => run.info),
      settings: {
        signal: null,
        levels,
        methods: ['friedman', 'starink'],
        window: null,
        baseline: 'area-proportional',
        meanRange: [0.1, 0.9],
      },
    }
    const columns = new Map(runs.map((run) => [run.info.columnsKey, run.columns]))
    const { result } = estimateUncertainty(study, columns, withSeed(1), context)
    for (const { budget } of result.profiles) {
      const entry = budget.find(({ source }) => source === 'baseline')
      expect(entry?.shownByScatter).toBe(false)
      for (const u of entry?.standardUncertainty_kJ_per_mol ?? [null]) {
        expect(u).toBeGreaterThan(0)
        expect(u).toBeLessThan(30)
      }
    }
  })

  it('give the reason where draws have no Ea, and where a source cannot be told', () => {
    const { study, columns } = studyOf([1, 2, 5, 10])
    const one = { ...study, settings: { ...study.settings, methods: ['vyazovkin' as const] } }
    const { order } = estimateUncertainty(one, columns, withSeed(1), context)
    // 100 draws about 150 kJ/mol, of which two have no Ea at the second level and one has none at the third.
    const draws = Float64Array.from({ length: 100 * levels.length }, (_, k) => 150e3 + (k % 7))
    for (const k of [1, levels.length + 1, 2]) draws[k] = Number.NaN
    const statusOf = (of: typeof order) => intervalsOfDraws(of, [[draws]], 1).get('vyazovkin')?.status
    expect(statusOf(order)).toEqual(['ok', 'draws-without-energy', 'ok', 'ok', 'ok'])
    const { noise } = order.sources
    const time_s = noise.time_s.slice() as typeof noise.time_s
    time_s[4] = Number.NaN
    expect(statusOf({ ...order, sources: { ...order.sources, noise: { ...noise, time_s } } })?.[1]).toBe('source-unknown')
  })

  it('are combined with the scatter, which they can only widen', () => {
    const { study, columns } = studyOf([1, 2, 5, 10, 20])
    const evaluated = evaluateStudy(study, columns, context)
    estimateUncertainty(study, columns, withSeed(1), context).result.profiles.forEach(({ intervals }, m) => {
      const combined = intervals.find((interval) => interval.kind === 'combined')
      levels.forEach((_, i) => {
        expect(combined?.standardUncertainty_kJ_per_mol[i]).toBeGreaterThan(
          evaluated.profiles[m]?.standardError_kJ_per_mol[i] ?? Number.NaN,
        )
      })
    })
  })
})

const meansOf = (change: { readonly shift_K: number; readonly lag_s: number }): readonly number[] => {
  const changed = studyOf([1, 2, 5, 10, 20], 1, change)
  return evaluateStudy(changed.study, changed.columns, context).profiles.map(({ mean }) => mean.Ea_kJ_per_mol ?? Number.NaN)
}

/** Change of the mean of each method by one unit, between runs changed `step` units to either side. */
const changeOfMeans = (change: { readonly shift_K: number; readonly lag_s: number }, step: number): readonly number[] => {
  const [up, down] = [meansOf(change), meansOf({ shift_K: -change.shift_K, lag_s: -change.lag_s })]
  return up.map((value, m) => (value - (down[m] ?? Number.NaN)) / (2 * step))
}

describe('the mean of Ea with all that is known of it', () => {
  const rates = [1, 2, 5, 10, 20]
  const { study, columns } = studyOf(rates)
  const evaluated = evaluateStudy(study, columns, context)

  it('holds what a shift and a lag common to all runs really do to it, found by evaluating such runs', () => {
    const perKelvin = changeOfMeans({ shift_K: 1, lag_s: 0 }, 1)
    const perSecond = changeOfMeans({ shift_K: 0, lag_s: 2 }, 2)
    const { profiles } = estimateUncertainty(study, columns, { ...withSeed(1), temperatureCommon_K: 2, lag_s: 3 }, context).result
    profiles.forEach(({ method, mean }, m) => {
      const scatter = evaluated.profiles[m]?.mean.standardError_kJ_per_mol ?? Number.NaN
      const real = Math.hypot(2 * (perKelvin[m] ?? Number.NaN), 3 * (perSecond[m] ?? Number.NaN))
      const stated = Math.sqrt((mean?.standardUncertainty_kJ_per_mol ?? 0) ** 2 - scatter ** 2)
      expect(mean?.Ea_kJ_per_mol).toBeCloseTo(evaluated.profiles[m]?.mean.Ea_kJ_per_mol ?? Number.NaN, 9)
      // The corrected OFW answers to a shift within 3 %, for all others first order is good to 1 %.
      expect(Math.abs(stated / real - 1), `by ${method}`).toBeLessThan(0.03)
      // t(0.975; 3) = 3.1824, z = 1.9600.
      const half = Math.hypot(3.1824 * scatter, 1.96 * stated)
      expect(((mean?.upper95_kJ_per_mol ?? 0) - (mean?.lower95_kJ_per_mol ?? 0)) / (2 * half), `by ${method}`).toBeCloseTo(1, 3)
      expect(mean?.note).toMatch(/common to all runs \(2 K, as stated\).*3 s times the heating rate, as stated/)
    })
  })

  it('is its scatter alone where nothing else is uncertain, and says of that what it leaves out', () => {
    const { profiles } = estimateUncertainty(study, columns, { ...withSeed(1), temperatureCommon_K: 0, lag_s: 0 }, context).result
    profiles.forEach(({ mean }, m) => {
      const alone = evaluated.profiles[m]?.mean
      expect(mean?.lower95_kJ_per_mol).toBeCloseTo(alone?.lower95_kJ_per_mol ?? Number.NaN, 9)
      expect(alone?.note).toMatch(/scatter of the runs alone.*all temperatures, thermal lag, the choice of baseline/)
    })
  })

  it('is not there with two programmes', () => {
    const two = studyOf([2, 10])
    for (const { mean } of estimateUncertainty(two.study, two.columns, withSeed(1), context).result.profiles) expect(mean).toBeNull()
  })
})

describe('a profile', () => {
  it('has the F-type interval beside each minimum, and the mean of Ea with an interval that is no narrower than errors of whole runs allow', () => {
    const { study, columns } = studyOf([1, 2, 5, 10, 20])
    const { profiles } = evaluateStudy(study, columns, context)
    const ratios: number[] = []
    for (const { method, otherIntervals, mean, standardError_kJ_per_mol: errors, lackOfFit } of profiles) {
      expect(otherIntervals.map((interval) => interval.kind)).toEqual(method.startsWith('vyazovkin') ? ['vyazovkin-wight-f'] : [])
      expect(lackOfFit).toBeNull()
      const error = mean.standardError_kJ_per_mol ?? Number.NaN
      expect(mean.lower95_kJ_per_mol).toBeLessThan(mean.Ea_kJ_per_mol ?? Number.NaN)
      // t(0.975; 3) = 3.1824.
      expect(((mean.upper95_kJ_per_mol ?? 0) - (mean.Ea_kJ_per_mol ?? 0)) / error).toBeCloseTo(3.1824, 4)
      // Errors of whole runs: the mean over levels is hardly better known than one level. (Rates of Friedman and steps between levels have others besides.)
      if (method === 'starink' || method === 'vyazovkin') ratios.push(error / (errors[2] ?? 0))
    }
    expect(ratios.map((ratio) => ratio.toFixed(1))).toEqual(['1.0', '1.0'])
    expect(profiles.find((profile) => profile.method === 'vyazovkin')?.otherIntervals[0]).toMatchObject({
      pointwise: true,
      approximate: true,
    })
  })

  it('has neither interval nor mean error with two programmes, and lack of fit where replicates are', () => {
    const two = studyOf([2, 10])
    for (const { otherIntervals, mean } of evaluateStudy(two.study, two.columns, context).profiles) {
      expect(otherIntervals).toEqual([])
      expect(mean.Ea_kJ_per_mol).toBeGreaterThan(0)
      expect(mean).toMatchObject({ standardError_kJ_per_mol: null, lower95_kJ_per_mol: null, upper95_kJ_per_mol: null })
    }
    const replicated = studyOf([2, 2, 5, 5, 20, 20])
    for (const { lackOfFit } of evaluateStudy(replicated.study, replicated.columns, context).profiles) {
      expect(lackOfFit).toMatchObject({ dofLackOfFit: 1, dofPureError: 3 })
      for (const p of [...(lackOfFit?.p ?? []), lackOfFit?.overMeanRange.p]) {
        expect(p).toBeGreaterThan(0)
        expect(p).toBeLessThan(1)
      }
      expect(lackOfFit?.F.length).toBe(levels.length)
    }
  })
})
