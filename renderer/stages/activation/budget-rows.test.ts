import { describe, expect, it } from 'vitest'
import { defaultUncertainty } from '../../../shared-kinetics/contract/study-document.ts'
import type { BudgetEntry, ProfileResult, UncertaintyProfile } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import {
  budgetCopyColumns,
  budgetCopyRows,
  budgetGroups,
  lagInKelvin,
  statedText,
  uText,
  type BudgetRow,
  withStated,
} from './budget-rows.ts'
import { methodFacts } from './method-facts.ts'
import type { ShownOfMethod } from './shown-interval.ts'
import { friedman, result, runAt, starink } from './testing/small-result.ts'

const entry = (source: BudgetEntry['source'], u: number, shownByScatter: boolean, magnitude = 'as found'): BudgetEntry => ({
  source,
  label: source,
  magnitude,
  standardUncertainty_kJ_per_mol: [u, null],
  shownByScatter,
  assumed: false,
  reason: null,
})
const combined = {
  kind: 'combined',
  label: 'combined',
  level: 0.95,
  pointwise: true,
  approximate: false,
  note: '',
  sources: [],
  standardUncertainty_kJ_per_mol: [13, null],
  lower95_kJ_per_mol: [120, null],
  upper95_kJ_per_mol: [180, null],
  status: ['ok', 'no-energy'],
} as const
const apart: UncertaintyProfile = {
  method: 'starink',
  intervals: [combined],
  mean: null,
  budget: [
    entry('temperature-common', 3, false),
    entry('temperature-run', 2, true),
    entry('temperature-lag', 4, false),
    entry('heating-rate', 0.002, true, 'up to 0.03 % of each'),
    entry('signal-noise', 1, true, 'found in the data: up to 0.4 s'),
  ],
}
const withScatter: ProfileResult = { ...starink, standardError_kJ_per_mol: [12, null] }
const shown = (profile: ProfileResult = withScatter, of: UncertaintyProfile | null = apart): ShownOfMethod => ({
  profile,
  apart: of,
  offers: [],
  kind: 'student-t',
  interval: null,
  mean: null,
})
const groups = budgetGroups(shown(), defaultUncertainty, result.runs, 0)

const rowOf = (settings: typeof defaultUncertainty, runs: typeof result.runs, id: string): BudgetRow | undefined =>
  budgetGroups(shown(), settings, runs, 0)
    .flatMap(({ rows }) => rows)
    .find((row) => row.id === id)
const wordsOf = (settings: typeof defaultUncertainty, id: string): string | undefined => rowOf(settings, result.runs, id)?.words

describe('budget at a level', () => {
  it('has the parts of the combined uncertainty first, then what the scatter shows already', () => {
    expect(groups.map(({ id, rows }) => [id, rows.map((row) => row.id)])).toEqual([
      ['combined', ['scatter', 'temperature-common', 'temperature-lag', 'combined']],
      ['measured-sources', ['temperature-run', 'heating-rate', 'signal-noise', 'measured-sources']],
    ])
  })

  it('adds up: the squares of the parts are the square of the combined one', () => {
    const [first] = groups
    const parts = (first?.rows ?? []).filter((row) => row.role === 'part').reduce((sum, row) => sum + (row.u ?? 0) ** 2, 0)
    expect(Math.sqrt(parts)).toBeCloseTo(first?.rows.at(-1)?.u ?? 0, 12)
  })

  it('draws each bar as long as its square beside the largest, and none for a sum or for what is not to be had', () => {
    const shares = groups.flatMap(({ rows }) => rows.map((row) => row.share * 144))
    expect(shares.map((share) => Number(share.toFixed(5)))).toEqual([144, 9, 16, 0, 4, 0, 1, 0])
    const second = budgetGroups(shown(), defaultUncertainty, result.runs, 1).flatMap(({ rows }) => rows)
    expect(second.every((row) => row.u === null && row.share === 0)).toBe(true)
  })

  it('says in words what nobody has stated, until it is changed', () => {
    expect(wordsOf(defaultUncertainty, 'temperature-run')).toBe('assumed: nobody has stated it')
    const typed = withStated(withStated(defaultUncertainty, { temperatureRun_K: defaultUncertainty.temperatureRun_K }), { seed: 3 })
    expect(wordsOf(typed, 'temperature-run')).toBe('as stated')
    expect(wordsOf(typed, 'temperature-common')).toBe('assumed: nobody has stated it')
    expect(wordsOf({ ...defaultUncertainty, temperatureRun_K: 0.2 }, 'temperature-run')).toBe('as stated')
    expect(wordsOf(defaultUncertainty, 'temperature-lag')).toBe('× heating rate: 1 s = 0.333 K at 20 K/min, assumed: nobody has stated it')
  })

  it('says what a lag means in kelvins at the fastest heating rate: lag times rate', () => {
    expect(lagInKelvin(1, [runAt(10, []), runAt(100, []), runAt(50, [])])).toBe('1 s = 1.67 K at 100 K/min')
    expect(lagInKelvin(0.5, [runAt(20, [])])).toBe('0.5 s = 0.167 K at 20 K/min')
    expect(lagInKelvin(1, [])).toBe('')
    expect(lagInKelvin(0, [runAt(20, [])])).toBe('')
  })

  it('asks for the uncertainty of a heating rate only where one was stated and not measured', () => {
    expect(rowOf(defaultUncertainty, result.runs, 'heating-rate')).toMatchObject({ stated: null, words: 'measured: up to 0.03 % of each' })
    expect(rowOf(defaultUncertainty, [...result.runs, { ...runAt(5, []), heatingRateSource: 'nominal' }], 'heating-rate')).toMatchObject({
      stated: 'statedHeatingRate_share',
    })
  })

  it('says why a source cannot be told', () => {
    const without = {
      ...entry('baseline', 0, false),
      standardUncertainty_kJ_per_mol: [null, null],
      reason: 'No other baseline can be drawn.',
    }
    const rows = budgetGroups(shown(withScatter, { ...apart, budget: [without] }), defaultUncertainty, result.runs, 0).flatMap(
      (group) => group.rows,
    )
    expect(rows.find((row) => row.id === 'baseline')).toMatchObject({ words: 'No other baseline can be drawn.', u: null })
  })

  it('is empty until it is worked out, and has no combined line without a scatter', () => {
    expect(budgetGroups(shown(withScatter, null), defaultUncertainty, result.runs, 0)).toEqual([])
    const two: ProfileResult = { ...withScatter, interval: { ...withScatter.interval, dof: 0 }, standardError_kJ_per_mol: [null, null] }
    const [first] = budgetGroups(shown(two), defaultUncertainty, result.runs, 0)
    expect(first?.rows.map((row) => row.id)).toEqual(['scatter', 'temperature-common', 'temperature-lag'])
    expect(first?.rows[0]?.words).toContain('two programmes')
  })

  it('is copied with units, what was stated, and where each line counts', () => {
    const lines = copyText(budgetCopyColumns(defaultUncertainty, 'Starink at α 0.05'), budgetCopyRows(groups)).split('\n')
    expect(lines[0]).toBe('Source, Starink at α 0.05\tStated (standard uncertainty) or found\tu(Ea) (kJ/mol)\tCounts in')
    expect(lines[2]).toBe('temperature-common\t0.5 K assumed: nobody has stated it\t3.000\tcombined uncertainty')
    expect(lines[7]).toBe('signal-noise\tfound in the data: up to 0.4 s\t1.000\tscatter of the runs already')
  })

  it('shows stated values in their units, and small ones as small', () => {
    const settings = { ...defaultUncertainty, temperatureCommon_K: 0.3, statedHeatingRate_share: 0.035 }
    expect(statedText(settings, 'temperatureCommon_K')).toBe('0.3 K')
    expect(statedText(settings, 'lag_s')).toBe('1 s')
    expect(statedText(settings, 'statedHeatingRate_share')).toBe('3.5 %')
    expect([0.002, 0, 1.234, null].map(uText)).toEqual(['< 0.01', '0.00', '1.23', ''])
  })
})

describe('what else is to be known at a level', () => {
  it('is the systematic error, apart from the interval', () => {
    const doyle: ProfileResult = { ...starink, systematicError_percent: [1.234, 1.1] }
    expect(methodFacts(doyle, 0)[0]).toBe('Systematic error from its temperature integral: +1.23 %; not part of the interval.')
    expect(methodFacts(starink, 0)[0]).toBe('Systematic error of the method: none.')
  })

  it('is lack of fit with F and p where replicates exist, else that it cannot be tested', () => {
    const tested: ProfileResult = {
      ...starink,
      lackOfFit: { dofLackOfFit: 2, dofPureError: 6, F: [36.75, null], p: [0.0004, null], overMeanRange: { F: 2.5, p: 0.161 } },
    }
    expect(methodFacts(tested, 0)).toContain(
      'Lack of fit against replicates: F(2, 6) = 36.75, p < 0.001. Over the range of the mean p = 0.161.',
    )
    expect(methodFacts(tested, 1)).toContain('Lack of fit: not to be had at this level.')
    expect(methodFacts(starink, 0)).toContain('Lack of fit: cannot be tested, no programme was measured twice.')
  })

  it('is ln[A f(α)] with its standard error and covariance, or ln A by the model of a standard', () => {
    const known: ProfileResult = { ...friedman, covarianceEaLnAf_kJ_per_mol: [0.2049, null] }
    expect(methodFacts(known, 0).at(-1)).toBe('ln[A f(α)] 25.12 ± 0.20 (standard error), A in 1/s; covariance with Ea 0.205 kJ/mol.')
    expect(methodFacts({ ...starink, lnA_per_s: [36.5, null] }, 0).at(-1)).toContain('ln A 36.50')
    expect(methodFacts(starink, 0)).toHaveLength(2)
  })
})
