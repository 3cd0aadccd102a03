import { describe, expect, it } from 'vitest'
import { profileOf, reviewedRun, reviewInput } from '../../check-values/review-input-of.ts'
import { durationOf, firstOrder, ramp, reducedTime, runOf, temperatureOf } from '../../check-values/simulated-run.ts'
import { randomStream } from '../../numerics/random.ts'
import { evaluateStudy } from '../../tasks/evaluate-study.ts'
import type { StudyResult } from '../../tasks/study-result.ts'
import type { Finding } from '../finding.ts'
import { lackOfFit } from './lack-of-fit.ts'
import { unequalVariance } from './unequal-variance.ts'

const context = { checkCancelled: () => undefined, progress: () => undefined }
const step = { Ea_J_per_mol: 150e3, A_per_s: 1e12 }

interface Simulated {
  readonly rates: readonly number[]
  /** Of the mass lost. */
  readonly noise: number
  /** Between samples; default the same for all. */
  readonly every_s: (rate: number) => number
  /** Standard deviation of each run's temperature offset. */
  readonly offset_K: number
  readonly seed?: number
}

/** Mass runs of a first-order reaction, evaluated. */
function simulate({ rates, noise, every_s, offset_K, seed = 1 }: Simulated): StudyResult {
  const runs = rates.map((rate, i) => {
    const random = randomStream(seed, i)
    const programme = ramp(430, rate, 640)
    const time = Float64Array.from({ length: Math.floor(durationOf(programme) / every_s(rate)) + 1 }, (_, k) => k * every_s(rate))
    const offset = offset_K * random.normal()
    return runOf(`${rate}-${i}`, {
      time_s: time,
      temperature_K: time.map((t) => temperatureOf(programme, t) + offset),
      signals: [
        {
          quantity: 'mass',
          unit: 'kg',
          values: reducedTime(step, programme, time).map((theta) => 8e-6 - 4e-6 * (firstOrder(theta) + noise * random.normal())),
        },
      ],
    })
  })
  return evaluateStudy(
    {
      runs: runs.map((run) => run.info),
      settings: {
        signal: null,
        levels: Array.from({ length: 19 }, (_, i) => (i + 1) / 20),
        methods: null,
        window: null,
        baseline: 'area-proportional',
        meanRange: [0.1, 0.9],
      },
    },
    new Map(runs.map((run) => [run.info.columnsKey, run.columns])),
    context,
  )
}

const found = (result: StudyResult, code: Finding['code']): Finding | undefined => result.findings.find((finding) => finding.code === code)
const words = (text: string): number => text.split(/\s+/).length

describe('unequal variance', () => {
  const rates = [1, 2, 5, 10, 20]

  it('is told of where noise at a constant sampling time scatters Ea', () => {
    for (const seed of [1, 2, 3, 4, 5, 6, 7, 8]) {
      const finding = found(simulate({ rates, noise: 0.02, every_s: () => 4, offset_K: 0, seed }), 'unequal-variance')
      expect(finding?.severity).toBe('note')
      expect(finding?.run).toBe('20-4')
      expect(finding?.evidence.varianceRatio).toBeGreaterThan(4)
      expect(words(finding?.message ?? '')).toBeLessThanOrEqual(55)
    }
  })

  it('is not told of where rows follow the heating rate, noise is small, or runs differ for another reason', () => {
    for (const seed of [1, 2, 3, 4, 5, 6]) {
      expect(found(simulate({ rates, noise: 0.02, every_s: (rate) => 20 / rate, offset_K: 0, seed }), 'unequal-variance')).toBeUndefined()
      expect(found(simulate({ rates, noise: 0.0005, every_s: () => 4, offset_K: 0, seed }), 'unequal-variance')).toBeUndefined()
      expect(found(simulate({ rates, noise: 0.002, every_s: () => 4, offset_K: 1, seed }), 'unequal-variance')).toBeUndefined()
    }
    expect(found(simulate({ rates, noise: 0, every_s: () => 4, offset_K: 0 }), 'unequal-variance')).toBeUndefined()
  })

  it('asks for constant heating rates and a level with an interval', () => {
    const noisy = [2, 5, 10, 20].map((rate, i) => reviewedRun(String(i), rate, i, { timeNoiseAtLevel_s: [1, 1, 1] }))
    // Noise of one second is the larger in temperature the faster the run: 100 times the variance from 2 to 20 K/min.
    const wide = { profiles: [{ ...profileOf('vyazovkin', [100, 100, 100], 5), standardError_kJ_per_mol: [0.3, 0.3, 0.3] }] }
    expect(unequalVariance(reviewInput({ runs: noisy, result: wide }))[0]?.evidence.varianceRatio).toBeGreaterThan(50)
    const general = noisy.map((run) => ({ ...run, result: { ...run.result, heatingRate_K_per_min: null } }))
    expect(unequalVariance(reviewInput({ runs: general, result: wide }))).toEqual([])
    expect(unequalVariance(reviewInput({ runs: noisy, result: { profiles: [profileOf('vyazovkin', [null, null, null])] } }))).toEqual([])
  })
})

describe('lack of fit', () => {
  it('is told of where replicates agree far better than the programmes lie on a line', () => {
    // Each programme with an offset of its own that its replicate shares: simulated by offsets that differ by programme.
    const shared = { dofLackOfFit: 2, dofPureError: 4, F: [30, 30, 30], p: [0.004, 0.004, 0.004], overMeanRange: { F: 30, p: 0.004 } }
    const [finding] = lackOfFit(reviewInput({ result: { profiles: [{ ...profileOf('vyazovkin', [100, 100, 100]), lackOfFit: shared }] } }))
    expect(finding).toMatchObject({
      code: 'lack-of-fit',
      severity: 'caution',
      evidence: { F: 30, p: 0.004, dofLackOfFit: 2, dofPureError: 4 },
    })
    expect(words(finding?.message ?? '')).toBeLessThanOrEqual(50)
    const chance = { ...shared, overMeanRange: { F: 2, p: 0.25 } }
    expect(lackOfFit(reviewInput({ result: { profiles: [{ ...profileOf('vyazovkin', [100, 100, 100]), lackOfFit: chance }] } }))).toEqual(
      [],
    )
    expect(lackOfFit(reviewInput())).toEqual([])
  })

  it('is not told of in replicated runs whose errors are independent, but in about one of twenty', () => {
    const rates = [2, 2, 5, 5, 20, 20]
    const told = Array.from({ length: 24 }, (_, k) =>
      found(simulate({ rates, noise: 0.001, every_s: () => 4, offset_K: 0.4, seed: 100 + k }), 'lack-of-fit'),
    )
    // 24 series at 5 %: more than 4 happen once in a hundred times.
    expect(told.filter((finding) => finding !== undefined).length).toBeLessThanOrEqual(4)
  })
})
