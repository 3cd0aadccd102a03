import { describe, expect, it } from 'vitest'
import { levels, profileOf, reviewedRun, reviewInput } from '../check-values/review-input-of.ts'
import type { LevelStatus } from '../isoconversional/result.ts'
import { lineFit } from '../numerics/line-fit.ts'
import type { KissingerResult, ProfileResult } from '../tasks/study-result.ts'
import type { Finding } from './finding.ts'
import type { ReviewedRun } from './review-input.ts'
import { review } from './review.ts'
import { energyNotPositive } from './rules/energy-not-positive.ts'
import { energyVaries } from './rules/energy-varies.ts'
import { exothermicDirectionUnknown } from './rules/exothermic-direction-unknown.ts'
import { heatingRateNotConstant } from './rules/heating-rate-not-constant.ts'
import { intervalWideBecauseFewRuns } from './rules/interval-wide-because-few-runs.ts'
import { levelWithoutEnergy } from './rules/level-without-energy.ts'
import { outlierRun } from './rules/outlier-run.ts'
import { peaksAtDifferentConversion } from './rules/peaks-at-different-conversion.ts'
import { runsDoNotAgree } from './rules/runs-do-not-agree.ts'

const shown = (findings: readonly Finding[]): readonly string[] => findings.map((finding) => `${finding.severity} ${finding.code}`)
const words = (text: string): number => text.split(/\s+/).length

/** Runs on an exact line ln(beta/T²) = c - Ea/(R T) of 100 kJ/mol at every level, but for what is added to the temperature of each. */
function runsOffLine(rates: readonly number[], added_K: readonly (readonly number[])[]): ReviewedRun[] {
  return rates.map((rate, i) => {
    const T = levels.map((level, at) => temperatureOn(rate, 14.5 - level) + (added_K[i]?.[at] ?? 0))
    const change = {
      temperatureAtLevel_K: T,
      // Friedman's line of the same Ea.
      reactionRateAtLevel_per_s: levels.map((_, at) =>
        Math.exp(25 - 100e3 / (8.31446261815324 * temperatureOn(rate, 14.5 - (levels[at] ?? 0)))),
      ),
    }
    return reviewedRun(String(i), rate, i, { result: change })
  })
}

/** T of ln(rate/T²) = c - 100e3/(R T), rate in K/min, by bisection. */
function temperatureOn(rate: number, c: number): number {
  let [low, high] = [200, 1000]
  for (let k = 0; k < 100; k++) {
    const T = (low + high) / 2
    if (Math.log(rate) - 2 * Math.log(T) - c + 100e3 / (8.31446261815324 * T) > 0) low = T
    else high = T
  }
  return low
}

const rates = [2, 4, 8, 16, 32]
/** Errors of some 0.02 K, that leave something to judge by. */
const small = [0.02, -0.03, 0.01, 0.025, -0.02]
const withError = (run: number, error_K: readonly number[]): ReviewedRun[] =>
  runsOffLine(
    rates,
    rates.map((_, i) => levels.map((_level, at) => (small[i] ?? 0) + (i === run ? (error_K[at] ?? 0) : 0))),
  )

const outliers = (runs: readonly ReviewedRun[]): Finding[] => outlierRun(reviewInput({ runs }))

const slope = (runs: readonly ReviewedRun[]): number =>
  lineFit(
    runs.map(({ result }) => 1 / (result.temperatureAtLevel_K[1] ?? 0)),
    runs.map(({ result }) => Math.log(result.heatingRate_K_per_min ?? 0) - 2 * Math.log(result.temperatureAtLevel_K[1] ?? 0)),
  ).slope

describe('outlier-run', () => {
  it('names the run that was measured 5 K too hot, with Ea with and without it', () => {
    const [finding, ...more] = outliers(withError(4, [5, 5, 5]))
    expect(more).toEqual([])
    expect(finding).toMatchObject({ severity: 'caution', run: '4', sources: ['cook-weisberg-1982'] })
    expect(finding?.evidence['EaWithout_kJ_per_mol']).toBeCloseTo(100, 0)
    // t(1 - 0.05/10; 2) = 9.925 (Abramowitz & Stegun 1964, table 26.10).
    expect(finding?.evidence['limit']).toBeCloseTo(9.925, 3)
    expect(finding?.evidence).toMatchObject({ levels: 3, judged: 3 })
  })

  it('is silent without an error, for one that changes Ea by less than 5 %, and for one of changing sign', () => {
    expect(outliers(withError(4, []))).toEqual([])
    // 1 K at the end of a line over 1/T from 2 to 32 K/min is some 2 % of Ea; 5 K in its middle turns it by nothing.
    expect(outliers(withError(4, [1, 1, 1]))).toEqual([])
    expect(outliers(withError(2, [5, 5, 5]))).toEqual([])
    expect(outliers(withError(4, [5, -5, 5]))).toEqual([])
    expect(outliers(withError(4, [5, 0, 0]))).toEqual([])
  })

  it('fires from a change of Ea of 5 % on', () => {
    const errors = Array.from({ length: 21 }, (_, i) => 1.5 + 0.1 * i)
    const changes = errors.map((error) => Math.abs(slope(withError(4, [error, error, error])) / slope(withError(4, []).slice(0, 4)) - 1))
    // The levels differ a little in temperature, so that an error changes their Ea by a little less or more.
    errors.forEach((error, i) => {
      const change = changes[i] ?? Number.NaN
      const expected = change > 0.0505 ? 1 : change < 0.0495 ? 0 : null
      const fired = outliers(withError(4, [error, error, error])).length
      expect(expected ?? fired).toBe(fired)
    })
    expect(Math.min(...changes)).toBeLessThan(0.0495)
    expect(Math.max(...changes)).toBeGreaterThan(0.0505)
  })

  it('needs five runs', () => {
    expect(outliers(withError(4, [5, 5, 5]).slice(1))).toEqual([])
  })

  it('looks at the lines of the reaction rate where heating rates are not constant', () => {
    const general = withError(0, [-8, -8, -8]).map((run) => ({
      ...run,
      result: { ...run.result, programme: 'general' as const, heatingRate_K_per_min: null },
    }))
    const noisy = general.map((run, i) => ({
      ...run,
      result: {
        ...run.result,
        reactionRateAtLevel_per_s: run.result.reactionRateAtLevel_per_s.map((rate) => (rate ?? 0) * (1 + 1e-3 * (small[i] ?? 0))),
      },
    }))
    expect(outliers(noisy).map((finding) => finding.run)).toEqual(['0'])
  })
})

const profiles = (half: number, dof: number): { readonly profiles: readonly ProfileResult[] } => ({
  profiles: [profileOf('vyazovkin', [100, 100, 100], half, dof)],
})

describe('a wide interval', () => {
  it('is for want of runs where 1.96 in place of t would leave 10 % or less, else the runs do not agree', () => {
    // t(0.975; 1) = 12.706, so that 64.8 % is 10 % with 1.96; t(0.975; 3) = 3.182: 16.2 %.
    for (const [dof, limit] of [
      [1, 64.82],
      [2, 21.95],
      [3, 16.23],
      [8, 11.76],
    ] as const) {
      const [few, disagree] = [intervalWideBecauseFewRuns, runsDoNotAgree].map(
        (rule) => (half: number) => rule(reviewInput({ result: profiles(half, dof) })),
      )
      expect(shown(few?.(limit - 0.02) ?? [])).toEqual(['note interval-wide-because-few-runs'])
      expect(disagree?.(limit - 0.02)).toEqual([])
      expect(few?.(limit + 0.02)).toEqual([])
      expect(shown(disagree?.(limit + 0.02) ?? [])).toEqual(['caution runs-do-not-agree'])
      expect([...(few?.(10) ?? []), ...(disagree?.(10) ?? [])]).toEqual([])
    }
  })

  it('of runs of which one is at odds is not for want of runs, and that run is named', () => {
    const input = reviewInput({ runs: withError(2, [5, 5, 5]), result: profiles(12, 3) })
    expect(intervalWideBecauseFewRuns(input)).toEqual([])
    const [finding] = runsDoNotAgree(input)
    expect(finding).toMatchObject({ severity: 'caution', run: '2' })
    expect(finding?.message).toContain('Run 2 is at odds')
  })
})

const varied = (half: number): Finding | undefined =>
  energyVaries(reviewInput({ result: { profiles: [profileOf('vyazovkin', [85, 100, 115], half)] } }))[0]

describe('energy-varies', () => {
  it('is a caution where intervals have no value in common, a note that says so where all overlap', () => {
    expect(varied(14.9)).toMatchObject({ severity: 'caution', title: 'Ea varies by 30 % of its mean', evidence: { intervals: 'apart' } })
    expect(varied(15)).toMatchObject({ severity: 'note', evidence: { intervals: 'overlap' } })
    expect(varied(15)?.title).toContain('within its intervals')
    expect(varied(15)?.message).toContain('nothing shows a second step')
  })

  it('never says more than may', () => {
    expect(varied(1)?.message).toContain('may have more than one step')
  })

  it('without intervals says that noise cannot be ruled out', () => {
    const none = {
      ...profileOf('vyazovkin', [85, 100, 115]),
      lower95_kJ_per_mol: [null, null, null],
      upper95_kJ_per_mol: [null, null, null],
    }
    const [finding] = energyVaries(reviewInput({ result: { profiles: [none] } }))
    expect(finding).toMatchObject({ severity: 'caution', evidence: { intervals: 'none' } })
    expect(finding?.message).toContain('noise cannot be ruled out')
  })

  it('looks at a method that has numbers', () => {
    const result = { profiles: [profileOf('vyazovkin', [null, null, 100]), profileOf('friedman', [85, 100, 115])] }
    expect(energyVaries(reviewInput({ result }))[0]?.evidence).toMatchObject({ method: 'friedman' })
  })
})

const withStatus = (...status: LevelStatus[]): ProfileResult => ({
  ...profileOf(
    'vyazovkin',
    status.map((one) => (one === 'ok' ? 100 : null)),
  ),
  status,
})

const withoutEnergy = (...status: LevelStatus[]): Finding[] =>
  levelWithoutEnergy(reviewInput({ result: { profiles: [withStatus(...status)] } }))

describe('level-without-energy', () => {
  it.each(['minimum-at-bound', 'several-minima', 'minimum-flat', 'rate-not-positive', 'line-not-determined'] as const)(
    'says why: %s',
    (status) => {
      const [finding, ...more] = withoutEnergy('ok', status, status)
      expect(more).toEqual([])
      expect(finding).toMatchObject({ severity: 'caution', level: 0.5, evidence: { method: 'vyazovkin', status, missing: 2, levels: 3 } })
      expect(finding?.title).toContain('0.5 and 0.9')
    },
  )

  it('gives one a method and status, and leaves to other rules what they speak of', () => {
    expect(withoutEnergy('minimum-flat', 'several-minima', 'minimum-flat')).toHaveLength(2)
    expect(withoutEnergy('ok', 'level-not-reached', 'too-few-programmes')).toEqual([])
  })
})

const notPositive = (Ea: readonly number[]): Finding[] =>
  energyNotPositive(reviewInput({ result: { profiles: [profileOf('friedman', Ea), profileOf('kas', [100, 100, 100])] } }))

describe('energy-not-positive', () => {
  it('fires at 0 and below, not above', () => {
    expect(notPositive([0, -20, 100])[0]).toMatchObject({
      level: 0.5,
      evidence: { methods: 'friedman', lowest_kJ_per_mol: -20, levels: 2 },
    })
    expect(notPositive([0.01, 100, 100])).toEqual([])
  })
})

describe('peaks-at-different-conversion', () => {
  const kissinger: KissingerResult = {
    Ea_kJ_per_mol: 205,
    standardError_kJ_per_mol: 1,
    lower95_kJ_per_mol: 200,
    upper95_kJ_per_mol: 210,
    lnA_per_s: 20,
    peaks_K: [600, 610, 620, 630],
    conversionAtPeak: [],
    sources: [],
  }
  const findings = (...conversionAtPeak: (number | null)[]): Finding[] =>
    peaksAtDifferentConversion(reviewInput({ result: { kissinger: { ...kissinger, conversionAtPeak } } }))

  it('fires beyond a difference of 0.1, and names the two runs', () => {
    expect(findings(0.55, 0.6, 0.65, 0.64)).toEqual([])
    const [finding] = findings(0.3, 0.6, 0.65, null)
    expect(finding).toMatchObject({ severity: 'caution', evidence: { lowest: 0.3, highest: 0.65 } })
    expect(finding?.message).toContain('0.3 in Run 0 and 0.65 in Run 2')
    expect(peaksAtDifferentConversion(reviewInput())).toEqual([])
  })
})

const withEnthalpy = (signed: number | null, magnitude: number | null): Finding[] =>
  exothermicDirectionUnknown(
    reviewInput({ runs: [reviewedRun('a', 5, 0, { result: { enthalpy_J_per_g: signed, enthalpyMagnitude_J_per_g: magnitude } })] }),
  )

describe('exothermic-direction-unknown', () => {
  it('fires where there is a magnitude without a sign', () => {
    expect(withEnthalpy(null, 250)[0]).toMatchObject({ severity: 'note', evidence: { runs: 1, most_J_per_g: 250 } })
    expect(withEnthalpy(-250, 250)).toEqual([])
    expect(withEnthalpy(null, null)).toEqual([])
  })
})

// 2 and 20 K/min: a share s of the heating rate may move Ea by s/ln 10.
const twoRates = (spread: number, half: number) =>
  heatingRateNotConstant(
    reviewInput({
      runs: [reviewedRun('a', 2, 0, { heatingRateSpread: spread }), reviewedRun('b', 20, 1, { heatingRateSpread: spread / 2 })],
      result: { profiles: [profileOf('starink', [100, 100, 100], half)] },
    }),
  )

describe('heating-rate-not-constant', () => {
  it('says how far Ea may be off: the share over ln(fastest/slowest)', () => {
    const runs = [reviewedRun('a', 2, 0), reviewedRun('b', 20, 1, { heatingRateSpread: 0.1 })]
    const [finding] = heatingRateNotConstant(reviewInput({ runs }))
    // 0.1/ln 10.
    expect(finding?.evidence['EaShift_percent']).toBeCloseTo(4.3429, 3)
    expect(finding?.message).toContain('Friedman and Vyazovkin follow the measured T(t)')
    const [alone] = heatingRateNotConstant(reviewInput({ runs: [reviewedRun('b', 20, 1, { heatingRateSpread: 0.1 })] }))
    expect(alone?.evidence['EaShift_percent']).toBeNull()
  })

  it('is a caution where that is no less than half the interval, else a note', () => {
    const spread = 0.02 * Math.LN10
    expect(twoRates(spread, 2)).toMatchObject([{ severity: 'caution' }])
    expect(twoRates(spread, 2)[0]?.message).toMatch(/off by up to 2 %, no less than half of their 95 % interval \(2 %\)/)
    expect(twoRates(spread, 2.2)).toMatchObject([{ severity: 'note' }])
  })

  it('is one finding for all runs and methods, with the share of each run', () => {
    const [finding, ...more] = twoRates(0.12, 5)
    expect(more).toEqual([])
    expect(finding).toMatchObject({
      run: null,
      evidence: { runs: 2, spread_percent: 12 },
      title: '2 runs: heating rates wander by up to 12 %',
    })
    expect(Object.values(finding?.evidence ?? {})).toContain(6)
  })
})

describe('the rules on Ea', () => {
  it('speak briefly', () => {
    const findings = [
      ...review(reviewInput({ runs: withError(4, [5, 5, 5]), result: profiles(30, 3) })),
      ...review(reviewInput({ runs: [reviewedRun('a', 5, 0, { result: { enthalpyMagnitude_J_per_g: 250 } })] })),
      ...heatingRateNotConstant(reviewInput({ runs: [reviewedRun('a', 2, 0, { heatingRateSpread: 0.1 }), reviewedRun('b', 20, 1)] })),
      ...energyNotPositive(reviewInput({ result: { profiles: [profileOf('friedman', [-1, -20, 100])] } })),
      ...levelWithoutEnergy(
        reviewInput({
          result: {
            profiles: [
              withStatus('minimum-at-bound', 'several-minima', 'minimum-flat'),
              withStatus('rate-not-positive', 'line-not-determined', 'ok'),
            ],
          },
        }),
      ),
      ...energyVaries(reviewInput({ result: { profiles: [profileOf('vyazovkin', [70, 100, 130], 5)] } })),
      ...energyVaries(reviewInput({ result: { profiles: [profileOf('vyazovkin', [70, 100, 130], 50)] } })),
      ...intervalWideBecauseFewRuns(reviewInput({ result: profiles(20, 1) })),
      ...runsDoNotAgree(reviewInput({ result: profiles(40, 2) })),
    ]
    expect(new Set(findings.map((finding) => finding.code)).size).toBeGreaterThan(8)
    for (const { code, title, message } of findings) expect(`${code}: ${words(message) <= 50 && words(title) <= 20}`).toBe(`${code}: true`)
  })
})
