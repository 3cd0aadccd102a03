import { describe, expect, it } from 'vitest'
import twoSteps from '../check-values/computed/two-independent-steps.json'
import { profileOf, reviewedRun, reviewInput } from '../check-values/review-input-of.ts'
import { KineticsError } from '../errors.ts'
import { sources } from '../sources.ts'
import { findingCodes, severities, type Finding } from './finding.ts'
import type { ReviewedRun, ReviewInput } from './review-input.ts'
import { review } from './review.ts'
import { energyVaries } from './rules/energy-varies.ts'
import { heatingRateDiffersFromNominal } from './rules/heating-rate-differs-from-nominal.ts'
import { heatingRateNotConstant } from './rules/heating-rate-not-constant.ts'
import { importNotes } from './rules/import-notes.ts'
import { integralLagsDifferential } from './rules/integral-lags-differential.ts'
import { intervalWideBecauseFewRuns } from './rules/interval-wide-because-few-runs.ts'
import { levelNotReached } from './rules/level-not-reached.ts'
import { methodDoesNotApply } from './rules/method-does-not-apply.ts'
import { narrowHeatingRateSpread } from './rules/narrow-heating-rate-spread.ts'
import { orderBroken } from './rules/order-broken.ts'
import { replicatesDisagree } from './rules/replicates-disagree.ts'
import { runUnusable } from './rules/run-unusable.ts'
import { signalChosen } from './rules/signal-chosen.ts'
import { timeRebuilt } from './rules/time-rebuilt.ts'
import { tooFewProgrammes } from './rules/too-few-programmes.ts'
import { windowCutsReaction } from './rules/window-cuts-reaction.ts'

const quiet = reviewInput()
const atRates = (...rates: number[]): readonly ReviewedRun[] => rates.map((rate, i) => reviewedRun(String(i), rate, i))
const oneRun = (run: ReviewedRun): ReviewInput => reviewInput({ runs: [run] })
const shown = (findings: readonly Finding[]): readonly string[] => findings.map((finding) => `${finding.severity} ${finding.code}`)

describe('a series with nothing to remark on', () => {
  it('gets no finding', () => {
    expect(review(quiet)).toEqual([])
  })
})

describe('too-few-programmes', () => {
  it('is a stop below two, a caution at two, nothing at three', () => {
    expect(shown(tooFewProgrammes(reviewInput({ runs: atRates(5) })))).toEqual(['stop too-few-programmes'])
    expect(shown(tooFewProgrammes(reviewInput({ runs: atRates(5, 20) })))).toEqual(['caution too-few-programmes'])
    expect(tooFewProgrammes(reviewInput({ runs: atRates(2, 5, 20) }))).toEqual([])
  })

  it('counts replicates once, and says so', () => {
    const [finding] = tooFewProgrammes(reviewInput({ runs: [reviewedRun('a', 5, 0), reviewedRun('b', 5, 0), reviewedRun('c', 20, 1)] }))
    expect(finding?.severity).toBe('caution')
    expect(finding?.evidence).toEqual({ programmes: 2, runs: 3 })
    expect(finding?.message).toContain('3 runs')
  })

  it('is silent about an empty study, but not about one whose runs all failed', () => {
    expect(tooFewProgrammes(reviewInput({ runs: [] }))).toEqual([])
    const failed = { info: reviewedRun('x', 5, 0).info, error: new KineticsError('no-signal', 'Run x has no mass.') }
    expect(shown(tooFewProgrammes(reviewInput({ runs: [], unusable: [failed] })))).toEqual(['stop too-few-programmes'])
  })
})

describe('narrow-heating-rate-spread', () => {
  it('fires below a ratio of about four, not at four', () => {
    const [finding] = narrowHeatingRateSpread(reviewInput({ runs: atRates(5, 10, 19.3) }))
    expect(finding?.evidence['ratio']).toBeCloseTo(3.86, 10)
    expect(finding?.sources).toEqual(['ictac-2011', 'ictac-2014'])
    expect(narrowHeatingRateSpread(reviewInput({ runs: atRates(5, 10, 20) }))).toEqual([])
    expect(narrowHeatingRateSpread(reviewInput({ runs: atRates(5.02, 10, 19.9) }))).toEqual([])
  })

  it('needs two distinct heating rates to speak of a spread', () => {
    expect(narrowHeatingRateSpread(reviewInput({ runs: atRates(5) }))).toEqual([])
    const holds = atRates(5, 10).map((run) => ({ ...run, result: { ...run.result, heatingRate_K_per_min: null } }))
    expect(narrowHeatingRateSpread(reviewInput({ runs: holds }))).toEqual([])
  })
})

const ratesDiffer = (rate: number, nominal: number, change: Partial<ReviewedRun['result']> = {}): Finding[] =>
  heatingRateDiffersFromNominal(oneRun(reviewedRun('a', rate, 0, { result: { nominalHeatingRate_K_per_min: nominal, ...change } })))

const runsAt = (rates: readonly number[]) =>
  heatingRateDiffersFromNominal(
    reviewInput({ runs: rates.map((rate, i) => reviewedRun(`r${i}`, rate, i, { result: { nominalHeatingRate_K_per_min: 10 } })) }),
  )

describe('heating-rate-differs-from-nominal', () => {
  it('fires beyond 3 %, either way, with both numbers', () => {
    const [finding] = ratesDiffer(10.42, 10)
    expect(finding?.severity).toBe('caution')
    expect(finding?.run).toBe('a')
    expect(finding?.evidence).toMatchObject({ measured_K_per_min: 10.42, nominal_K_per_min: 10 })
    expect(finding?.message).toContain('4.2 % faster')
    expect(ratesDiffer(9.6, 10)).toHaveLength(1)
  })

  it('names both rates of open data whose file says 50 K/min and whose T(t) says 73.9', () => {
    const [finding] = ratesDiffer(73.9, 50)
    expect(finding).toMatchObject({ severity: 'caution', title: expect.stringMatching(/heated at 73\.9 K\/min, nominal 50$/) as unknown })
    expect(finding?.message).toContain('48 % faster')
  })

  it('is silent at 3 %', () => {
    expect(ratesDiffer(103, 100)).toEqual([])
    expect(ratesDiffer(103.01, 100)).toHaveLength(1)
  })

  it('speaks once for more than two runs, with the numbers of each, and apart for a slipped unit', () => {
    expect(runsAt([11, 9])).toHaveLength(2)
    // Three runs that were meant alike are one matter, not three.
    expect(runsAt([10.79, 10.78, 10.81])).toMatchObject([{ severity: 'caution', run: null }])
    const [slip, one, ...more] = runsAt([11, 9, 12, 10.5, 10, 600])
    expect(more).toEqual([])
    expect(slip).toMatchObject({ severity: 'stop', run: 'r5' })
    expect(one).toMatchObject({ severity: 'caution', run: null, title: expect.stringMatching(/^4 runs .*20 %$/) as unknown })
    const numbers = Object.entries(one?.evidence ?? {}).filter(([key]) => key.endsWith('measured_K_per_min'))
    expect(numbers.map(([, value]) => value)).toEqual([11, 9, 12, 10.5])
  })

  it('is a stop that names the unit of time where the two are a factor of 60 apart, within a tenth', () => {
    const [slow] = ratesDiffer(10.4 / 60, 10)
    expect(slow).toMatchObject({ severity: 'stop', message: expect.stringMatching(/seconds where it says minutes/) as unknown })
    const [fast] = ratesDiffer(9.6 * 60, 10)
    expect(fast).toMatchObject({ severity: 'stop', message: expect.stringMatching(/minutes where its heading says seconds/) as unknown })
    expect(ratesDiffer(60 * 11.01, 10)[0]?.severity).toBe('caution')
    expect(ratesDiffer(60 * 10.99, 10)[0]?.severity).toBe('stop')
  })

  it('is silent for holds, general programmes, rebuilt time, and where nothing was stated', () => {
    expect(ratesDiffer(10.5, 10, { heatingRate_K_per_min: null, heatingRateSource: null, programme: 'general' })).toEqual([])
    expect(ratesDiffer(10.5, 10, { heatingRateSource: 'option' })).toEqual([])
    expect(ratesDiffer(10.5, 10, { nominalHeatingRate_K_per_min: null })).toEqual([])
  })
})

const wandering = (share: number): Finding[] => heatingRateNotConstant(oneRun(reviewedRun('a', 10, 0, { heatingRateSpread: share })))

const between = (share: number, halfInterval_kJ_per_mol: number, method: 'kas' | 'friedman' = 'kas'): Finding[] =>
  heatingRateNotConstant(
    reviewInput({
      runs: [reviewedRun('a', 2, 0), reviewedRun('b', 20, 1, { heatingRateSpread: share })],
      result: { profiles: [profileOf(method, [200, 200, 200], halfInterval_kJ_per_mol)] },
    }),
  )

describe('heating-rate-not-constant', () => {
  it('fires beyond 5 %, not at it, nor where nothing was measured', () => {
    expect(shown(wandering(0.07))).toEqual(['note heating-rate-not-constant'])
    expect(wandering(0.05)).toEqual([])
    expect(wandering(Number.NaN)).toEqual([])
  })

  it('fires from 1 % on where the shift of Ea is more than a third of half the interval of a method of one heating rate', () => {
    // 3 % over ln 10 is 1.30 %, of 200 kJ/mol 2.6 kJ/mol.
    const [finding, ...more] = between(0.03, 7)
    expect(more).toEqual([])
    expect(finding?.run).toBe('b')
    expect(finding?.evidence['halfInterval_percent']).toBeCloseTo(3.5, 9)
    expect(finding?.evidence['EaShift_percent']).toBeCloseTo(1.303, 3)
    expect(between(0.03, 8)).toEqual([])
    // A ramp within 1 % is straight, however narrow the interval.
    expect(between(0.01, 0.01)).toEqual([])
    expect(between(0.03, 1, 'friedman')).toEqual([])
  })
})

const runAt = (id: string, rate: number, group: number, T: readonly (number | null)[]): ReviewedRun =>
  reviewedRun(id, rate, group, { result: { temperatureAtLevel_K: T } })

const replicate = (id: string, T: readonly (number | null)[], enthalpy: number): ReviewedRun =>
  reviewedRun(id, 10, 1, { result: { temperatureAtLevel_K: T, enthalpyMagnitude_J_per_g: enthalpy } })

// The slow and the fast programme lie 20 K apart at every level, so a fifth of the shift is 4 K.
const among = (a: readonly (number | null)[], b: readonly (number | null)[], heat: readonly [number, number] = [400, 400]): Finding[] => {
  const ends = [runAt('slow', 5, 0, [600, 610, 620]), runAt('fast', 20, 2, [620, 630, 640])] as const
  return replicatesDisagree(reviewInput({ runs: [ends[0], replicate('a', a, heat[0]), replicate('b', b, heat[1]), ends[1]] }))
}

describe('replicates-disagree', () => {
  it('fires beyond a fifth of the shift, and names the level where it is worst', () => {
    const [finding, ...more] = among([610, 620, 630], [614.2, 620, 636])
    expect(more).toEqual([])
    expect(finding).toMatchObject({ severity: 'caution', run: 'a', level: 0.9, evidence: { spread_K: 6, shareOfShift: 0.3 } })
  })

  it('is silent at a fifth of the shift', () => {
    expect(among([610, 620, 630], [614, 620, 634])).toEqual([])
  })

  it('fires where enthalpies differ by more than a tenth of their mean, not at it', () => {
    expect(shown(among([610, 620, 630], [610, 620, 630], [380, 421]))).toEqual(['caution replicates-disagree'])
    expect(among([610, 620, 630], [610, 620, 630], [380, 420])).toEqual([])
  })

  it('passes over levels that a replicate does not reach, and over single runs', () => {
    expect(among([610, 620, null], [610, 620, 650])).toEqual([])
    expect(replicatesDisagree(reviewInput({ runs: atRates(2, 5, 20) }))).toEqual([])
  })
})

describe('order-broken', () => {
  it('names the faster run and the worst level', () => {
    const [finding, ...more] = orderBroken(
      reviewInput({ runs: [runAt('slow', 5, 0, [600, 620, 640]), runAt('fast', 10, 1, [601, 618, 635])] }),
    )
    expect(more).toEqual([])
    expect(finding).toMatchObject({ severity: 'caution', run: 'fast', level: 0.9, evidence: { slower_K: 640, faster_K: 635, levels: 2 } })
  })

  it('fires at equal temperatures, not where each is higher', () => {
    expect(orderBroken(reviewInput({ runs: [runAt('a', 5, 0, [600, 620, 640]), runAt('b', 10, 1, [600, 621, 641])] }))).toHaveLength(1)
    expect(orderBroken(reviewInput({ runs: [runAt('a', 5, 0, [600, 620, 640]), runAt('b', 10, 1, [600.1, 621, 641])] }))).toEqual([])
  })

  it('compares replicates by their mean, and passes over levels that are not reached', () => {
    const runs = [runAt('a', 5, 0, [600, 620, 640]), runAt('b', 10, 1, [598, 622, null]), runAt('c', 10, 1, [604, 618.5, null])]
    expect(orderBroken(reviewInput({ runs }))).toEqual([])
  })

  it('says nothing about holds', () => {
    const holds = [runAt('a', 5, 0, [600, 620, 640]), runAt('b', 10, 1, [1, 2, 3])].map((run) => ({
      ...run,
      result: { ...run.result, programme: 'isothermal' as const },
    }))
    expect(orderBroken(reviewInput({ runs: holds }))).toEqual([])
  })
})

describe('method-does-not-apply', () => {
  const leftOut = [
    { method: 'kas', label: 'KAS', reason: 'made for ramps' },
    { method: 'kissinger', label: 'Kissinger', reason: 'made for ramps' },
    { method: 'isothermal-integral', label: 'Isothermal integral', reason: 'made for holds' },
  ] as const

  it('gives one finding a reason', () => {
    const findings = methodDoesNotApply(reviewInput({ leftOut }))
    expect(shown(findings)).toEqual(['note method-does-not-apply', 'note method-does-not-apply'])
    expect(findings[0]?.title).toBe('KAS and Kissinger left out')
    expect(findings[0]?.evidence).toMatchObject({ methods: 'KAS, Kissinger', count: 2 })
  })

  it('is a caution where the method was asked for by name', () => {
    const findings = methodDoesNotApply(reviewInput({ leftOut, settings: { methods: ['isothermal-integral'] } }))
    expect(findings.map((finding) => finding.severity)).toEqual(['note', 'caution'])
  })

  it('is silent where none was left out', () => {
    expect(methodDoesNotApply(quiet)).toEqual([])
  })
})

describe('signal-chosen', () => {
  const several = { signalsToChooseFrom: ['mass', 'heat-flow'] } as const
  it('fires where there are two and none was named', () => {
    const [finding] = signalChosen(reviewInput({ result: several }))
    expect(finding).toMatchObject({ severity: 'note', evidence: { chosen: 'mass', signals: 'mass, heat-flow', count: 2 } })
  })

  it('is silent where one was named, or there is but one', () => {
    expect(signalChosen(reviewInput({ result: several, settings: { signal: 'mass' } }))).toEqual([])
    expect(signalChosen(quiet)).toEqual([])
  })
})

describe('time-rebuilt', () => {
  it.each(['option', 'nominal'] as const)('fires for a run without time (rate from %s)', (heatingRateSource) => {
    const [finding] = timeRebuilt(oneRun(reviewedRun('a', 10, 0, { info: { hasTime: false }, result: { heatingRateSource } })))
    expect(finding).toMatchObject({ severity: 'note', run: 'a', evidence: { heatingRate_K_per_min: 10, source: heatingRateSource } })
  })

  it('is silent where time was measured', () => {
    expect(timeRebuilt(quiet)).toEqual([])
  })
})

const cutAt = (start: number, end: number, change: Partial<ReviewedRun['result']> = {}): Finding[] =>
  windowCutsReaction(oneRun(reviewedRun('a', 10, 0, { rateAtEnds: { start, end }, result: change })))

describe('window-cuts-reaction', () => {
  it('fires beyond 3 % of the largest rate at either end, not at it', () => {
    expect(cutAt(0.03, 0.03)).toEqual([])
    expect(cutAt(0.031, 0)[0]?.title).toContain('no plateau at the start')
    expect(cutAt(0, 0.2)[0]?.message).toContain('20 % of its largest rate')
    expect(cutAt(0.1, 0.2)[0]?.title).toContain('start and the end')
  })

  it('is a note only where a hold begins with the reaction running', () => {
    expect(shown(cutAt(0.9, 0, { programme: 'isothermal' }))).toEqual(['note window-cuts-reaction'])
    expect(shown(cutAt(0.9, 0.2, { programme: 'isothermal' }))).toEqual(['caution window-cuts-reaction'])
  })

  it('is silent about a conversion column', () => {
    const run = reviewedRun('a', 10, 0)
    expect(windowCutsReaction(oneRun({ ...run, rateAtEnds: null }))).toEqual([])
  })
})

describe('level-not-reached', () => {
  it('names the run and its missing levels', () => {
    const [finding] = levelNotReached(oneRun(reviewedRun('a', 10, 0, { result: { temperatureAtLevel_K: [null, 620, null] } })))
    expect(finding).toMatchObject({ severity: 'caution', run: 'a', level: 0.1, evidence: { missing: 2, levels: 3, first: 0.1, last: 0.9 } })
    expect(finding?.title).toContain('0.1 and 0.9')
  })

  it('is silent where every level is reached', () => {
    expect(levelNotReached(quiet)).toEqual([])
  })
})

const energySpread = (least: number, most: number): Finding[] =>
  energyVaries(reviewInput({ result: { profiles: [profileOf('vyazovkin', [least, 100, most])] } }))

describe('energy-varies', () => {
  it('is a note beyond 10 % of the mean and a caution beyond 20 %, with the spread as evidence', () => {
    expect(energySpread(95, 105)).toEqual([])
    expect(shown(energySpread(94.9, 105.1))).toEqual(['note energy-varies'])
    expect(shown(energySpread(90, 110))).toEqual(['note energy-varies'])
    expect(shown(energySpread(89.9, 110.1))).toEqual(['caution energy-varies'])
    expect(energySpread(85, 115)[0]?.evidence).toMatchObject({ method: 'vyazovkin', spread_kJ_per_mol: 30 })
    expect(energySpread(85, 115)[0]?.title).toBe('Ea varies by 30 % of its mean')
  })

  it('sees Ea of two independent steps, computed to 20 digits, spread by 29 % of its mean', () => {
    const table = twoSteps.levels.map((row) => Number(row.friedman))
    const change = { levels: twoSteps.levels.map(({ level }) => level), profiles: [profileOf('friedman', table, 0.01)] }
    const [finding] = energyVaries(reviewInput({ result: change }))
    expect(finding?.title).toBe('Ea varies by 29 % of its mean')
    expect(finding?.evidence['spread_kJ_per_mol']).toBeCloseTo(117.557 - 87.63089, 9)
  })

  // Tables of Ea at 0.05 to 0.95 as printed in J. Chem. 2022, art. 3514358, table 3; means and spreads recomputed.
  it.each([
    ['KAS', [268, 297, 290, 281, 279, 286, 274, 264, 254, 250, 245, 233, 229, 222, 215, 214, 218, 223, 233], 251.316, '33 %'],
    ['Friedman', [296, 324, 292, 265, 284, 273, 248, 239, 219, 197, 209, 214, 199, 201, 188, 219, 225, 230, 249], 240.579, '57 %'],
  ] as const)('says of a published table of Ea by %s that it is not of one step', (_, table, mean, share) => {
    const change = { levels: table.map((_unused, i) => (i + 1) / 20), profiles: [profileOf('friedman', table, 1)] }
    const [finding] = energyVaries(reviewInput({ result: change }))
    expect(finding?.severity).toBe('caution')
    expect(finding?.title).toBe(`Ea varies by ${share} of its mean`)
    expect(finding?.evidence['mean_kJ_per_mol']).toBeCloseTo(mean, 3)
  })

  it('looks at Vyazovkin before Friedman, and says nothing without a profile', () => {
    const profiles = [profileOf('friedman', [50, 100, 150]), profileOf('vyazovkin', [100, 100, 100])]
    expect(energyVaries(reviewInput({ result: { profiles } }))).toEqual([])
    expect(energyVaries(reviewInput({ result: { profiles: [] } }))).toEqual([])
  })
})

const gapBetween = (friedman: readonly (number | null)[], vyazovkin: readonly (number | null)[]): Finding[] =>
  integralLagsDifferential(reviewInput({ result: { profiles: [profileOf('friedman', friedman), profileOf('vyazovkin', vyazovkin)] } }))

describe('integral-lags-differential', () => {
  it('fires beyond 10 % at the worst level, not at it', () => {
    expect(gapBetween([100, 100, 100], [110, 90, 100])).toEqual([])
    const [finding] = gapBetween([100, 100, 100], [105, 88, 100])
    expect(finding).toMatchObject({ severity: 'note', level: 0.5, evidence: { integral_kJ_per_mol: 88, differential_kJ_per_mol: 100 } })
  })

  it('passes over levels without both, and needs both methods', () => {
    expect(gapBetween([100, null, 100], [100, 50, null])).toEqual([])
    expect(integralLagsDifferential(reviewInput({ result: { profiles: [profileOf('friedman', [100, 100, 100])] } }))).toEqual([])
  })
})

const intervalOf = (half: number, dof: number): Finding[] =>
  intervalWideBecauseFewRuns(reviewInput({ result: { profiles: [profileOf('vyazovkin', [100, 100, 100], half, dof)] } }))

describe('interval-wide-because-few-runs', () => {
  it('fires with one or two degrees of freedom and more than 10 % of Ea', () => {
    // t(0.975; 1) = 12.706 and t(0.975; 2) = 4.303 (Abramowitz & Stegun 1964, table 26.10).
    const [finding] = intervalOf(30, 1)
    expect(finding?.evidence['t']).toBeCloseTo(12.706, 3)
    expect(finding?.evidence['tWithOneMore']).toBeCloseTo(4.303, 3)
    expect(finding?.evidence['runs']).toBe(3)
    expect(intervalOf(10.1, 2)).toHaveLength(1)
  })

  it('is silent at 10 %, with more runs, and without an interval', () => {
    expect(intervalOf(10, 1)).toEqual([])
    expect(intervalOf(30, 3)).toEqual([])
    expect(intervalOf(30, 0)).toEqual([])
  })
})

describe('run-unusable', () => {
  it('is a stop with the reason of the error', () => {
    const error = new KineticsError('no-heating-rate', 'Run x has no time column. Give its heating rate.', { run: 'Run x', flag: true })
    const [finding] = runUnusable(reviewInput({ unusable: [{ info: reviewedRun('x', 5, 9).info, error }] }))
    expect(finding).toMatchObject({
      severity: 'stop',
      code: 'run-unusable',
      run: 'x',
      evidence: { reason: 'no-heating-rate', unusable: 1, used: 5, flag: 'true' },
    })
    expect(finding?.message).toContain('Give its heating rate. The run was left out: 4 of 5 runs are analysed.')
    expect(runUnusable(quiet)).toEqual([])
  })
})

describe('import notes', () => {
  const note = { code: 'rows-set-aside', severity: 'caution', message: '3 rows were set aside.', evidence: { rows: 3 } } as const
  it('of runs and of the study become findings', () => {
    const run = reviewedRun('a', 5, 0, { info: { importNotes: [note] } })
    const findings = importNotes(reviewInput({ runs: [run], importNotes: [{ ...note, code: 'file-left-out', severity: 'note' }] }))
    expect(shown(findings)).toEqual(['caution rows-set-aside', 'note file-left-out'])
    expect(findings[0]).toMatchObject({ run: 'a', message: note.message, evidence: { rows: 3 } })
    expect(findings[1]).toMatchObject({ run: null, title: 'A file was left out' })
  })

  it('of runs that are not used stay silent', () => {
    expect(importNotes(reviewInput({ runs: [reviewedRun('a', 5, 0, { info: { importNotes: [note], use: false } })] }))).toEqual([])
  })
})

describe('all rules together', () => {
  const everything = reviewInput({
    runs: [
      reviewedRun('a', 5, 0, { info: { hasTime: false }, result: { heatingRateSource: 'option' } }),
      reviewedRun('b', 8, 1, {
        heatingRateSpread: 0.1,
        rateAtEnds: { start: 0.5, end: 0.5 },
        result: { nominalHeatingRate_K_per_min: 9, temperatureAtLevel_K: [500, null, 640] },
      }),
    ],
    result: {
      signalsToChooseFrom: ['mass', 'heat-flow'],
      profiles: [profileOf('friedman', [100, 150, 200], 50, 1), profileOf('vyazovkin', [100, 125, 150], 50, 1)],
    },
    unusable: [{ info: reviewedRun('x', 5, 9).info, error: new KineticsError('no-signal', 'Run x has no mass.') }],
    leftOut: [{ method: 'kissinger', label: 'Kissinger', reason: 'made for ramps' }],
    importNotes: [{ code: 'file-left-out', severity: 'note', message: 'One file was left out.', evidence: { files: 1 } }],
  })
  const findings = review(everything)

  it('come as stops, cautions, notes', () => {
    const order = findings.map((finding) => severities.indexOf(finding.severity))
    expect(order).toEqual(order.toSorted((a, b) => a - b))
    expect(new Set(findings.map((finding) => finding.code)).size).toBe(15)
  })

  it('each say a number, what it means and what to do, and name their rule', () => {
    for (const finding of findings) {
      expect(findingCodes).toContain(finding.code)
      expect(finding.title.length).toBeLessThan(110)
      expect(`${finding.message} ${JSON.stringify(finding.evidence)}`).toMatch(/\d/)
      expect(finding.message).toMatch(/[.]$/)
      expect(finding.basis).not.toBe('')
      expect(finding.sources.every((key) => key in sources)).toBe(true)
      expect(JSON.stringify(finding)).not.toContain('undefined')
    }
  })
})
