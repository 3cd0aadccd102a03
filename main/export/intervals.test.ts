import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import { profileOf, reviewInput } from '../../shared-kinetics/check-values/review-input-of.ts'
import { emptyStudy } from '../../shared-kinetics/contract/study-document.ts'
import type { IntervalResult, ProfileResult, StudyResult, UncertaintyResult } from '../../shared-kinetics/tasks/study-result.ts'
import type { ExportSource } from './activation-json.ts'
import { assumptionLines, budgetLine } from './budget-lines.ts'
import { exportResults, type ExportFormat } from './export-results.ts'
import { shortTable } from './short-table.ts'

const intervalOf = (kind: IntervalResult['kind'], label: string): IntervalResult => ({
  kind,
  label,
  level: 0.95,
  pointwise: true,
  approximate: true,
  note: `How ${kind} was made.`,
  sources: ['S. Author, J. Something 1 (2000) 1'],
  standardUncertainty_kJ_per_mol: [1, 2, null],
  lower95_kJ_per_mol: [90, 91, null],
  upper95_kJ_per_mol: [110.5, 111, null],
  status: ['ok', 'ok', 'no-energy'],
})

const friedman: ProfileResult = {
  ...profileOf('friedman', [100, 101, null]),
  label: 'Friedman',
  lnAf_per_s: [20, 21, null],
  lnAfStandardError: [0.5, 0.6, null],
  covarianceEaLnAf_kJ_per_mol: [0.9, 1.1, null],
}
const kas: ProfileResult = {
  ...profileOf('kas', [100, 101, null]),
  label: 'Kissinger–Akahira–Sunose',
  systematicError_percent: [-0.42, -0.4, null],
  lackOfFit: { dofLackOfFit: 1, dofPureError: 3, F: [2, 3, null], p: [0.25, 0.18, null], overMeanRange: { F: 2.5, p: 0.212 } },
  mean: { ...profileOf('kas', [100, 101, null]).mean, standardError_kJ_per_mol: 1, lower95_kJ_per_mol: 97.25, upper95_kJ_per_mol: 103.75 },
}
const vyazovkin: ProfileResult = {
  ...profileOf('vyazovkin', [100, 101, null]),
  label: 'Vyazovkin',
  otherIntervals: [intervalOf('vyazovkin-wight-f', 'F-type interval of Vyazovkin and Wight')],
}
const result: StudyResult = { ...reviewInput({ result: { profiles: [friedman, kas, vyazovkin] } }).result, findings: [] }
const uncertainty: UncertaintyResult = {
  levels: result.levels,
  seed: 7,
  draws: 0,
  profiles: [
    {
      method: 'vyazovkin',
      intervals: [intervalOf('jackknife', 'Jackknife over runs')],
      mean: {
        Ea_kJ_per_mol: 100.5,
        standardUncertainty_kJ_per_mol: 1.5,
        lower95_kJ_per_mol: 96.25,
        upper95_kJ_per_mol: 104.75,
        note: 'The scatter with a common error of temperature.',
      },
      budget: [
        {
          source: 'temperature-run',
          label: 'Temperature, each run',
          magnitude: '0.5 K',
          standardUncertainty_kJ_per_mol: [1, 1, null],
          shownByScatter: true,
          assumed: false,
          reason: null,
        },
      ],
    },
  ],
}
const source: ExportSource = { document: emptyStudy('study', 'A study'), result, program: { name: 'rampfold', version: '1.2.3' } }
const textOf = (from: ExportSource, format: ExportFormat, index = 0): string =>
  new TextDecoder().decode(exportResults(from, format)[index]?.bytes)

/** The result with a run for each programme group. */
const runsOf = (groups: readonly number[]): StudyResult => {
  const [run] = result.runs
  if (run === undefined) throw new Error('there is no run')
  return { ...result, runs: groups.map((programmeGroup) => ({ ...run, programmeGroup })) }
}

describe('intervals in what is exported', () => {
  it('stand in the JSON of each profile, named by kind, with those made apart from the evaluation', () => {
    const json = JSON.parse(textOf({ ...source, uncertainty }, 'json')) as { profiles: ProfileResult[]; uncertainty: unknown }
    expect(json.uncertainty).toEqual({ seed: 7, draws: 0 })
    expect(json.profiles[2]?.otherIntervals.map(({ kind, pointwise }) => [kind, pointwise])).toEqual([
      ['vyazovkin-wight-f', true],
      ['jackknife', true],
    ])
    expect(json.profiles[2]).toMatchObject({ budget: [{ source: 'temperature-run' }], lackOfFit: null })
    expect(json.profiles[2]).toMatchObject({ meanCombined: { lower95_kJ_per_mol: 96.25 } })
    expect(json.profiles[0]).toMatchObject({ meanCombined: null })
    expect(json.profiles[0]).toMatchObject({ covarianceEaLnAf_kJ_per_mol: [0.9, 1.1, null], otherIntervals: [] })
    expect(json.profiles[1]).toMatchObject({
      systematicError_percent: [-0.42, -0.4, null],
      lackOfFit: { overMeanRange: { p: 0.212 } },
      mean: { lower95_kJ_per_mol: 97.25, upper95_kJ_per_mol: 103.75 },
    })
    expect(JSON.parse(textOf(source, 'json'))).toMatchObject({ uncertainty: null })
  })

  it('stand in the table after the columns that every method has, where a method has them', () => {
    const { data } = Papa.parse<string[]>(textOf({ ...source, uncertainty }, 'csv').trim())
    const [headings = [], first = [], , last = []] = data
    expect(headings.slice(1 + 3 * 5)).toEqual([
      'ln[A f] Friedman standard error',
      'covariance of Ea and ln[A f] Friedman (kJ/mol)',
      'Ea Kissinger-Akahira-Sunose systematic error (%)',
      'Ea Vyazovkin F-type interval of Vyazovkin and Wight lower 95 % (kJ/mol)',
      'Ea Vyazovkin F-type interval of Vyazovkin and Wight upper 95 % (kJ/mol)',
      'Ea Vyazovkin Jackknife over runs lower 95 % (kJ/mol)',
      'Ea Vyazovkin Jackknife over runs upper 95 % (kJ/mol)',
      'u(Ea) Vyazovkin by temperature-run (kJ/mol)',
    ])
    expect(first.slice(1 + 3 * 5)).toEqual(['0.5', '0.9', '-0.42', '90', '110.5', '90', '110.5', '1'])
    expect(last.slice(1 + 3 * 5)).toEqual(['', '', '', '', '', '', '', ''])
    // Contract: these come first, whatever is added.
    expect(headings.slice(0, 6)).toEqual([
      'conversion',
      'Ea Friedman (kJ/mol)',
      'Ea Friedman standard error (kJ/mol)',
      'Ea Friedman lower 95 % (kJ/mol)',
      'Ea Friedman upper 95 % (kJ/mol)',
      'ln[A f] Friedman (A in 1/s)',
    ])
  })

  it('are named in the text beside the table, all as pointwise', () => {
    const notes = textOf({ ...source, uncertainty }, 'csv', 1)
    expect(notes).toContain('All intervals are pointwise')
    expect(notes).toContain(
      'Vyazovkin: 95 % interval, F-type interval of Vyazovkin and Wight, pointwise, approximate. How vyazovkin-wight-f was made.',
    )
    expect(notes).toContain('Vyazovkin: 95 % interval, Jackknife over runs, pointwise, approximate.')
    expect(notes).toContain(
      'Vyazovkin: Temperature, each run, 0.5 K; shown by the scatter of the points already; u(Ea) 1.00 kJ/mol over conversion',
    )
    expect(notes).toContain('Kissinger–Akahira–Sunose: systematic error of Ea from its temperature integral -0.42 % to -0.40 %')
    expect(notes).toContain('F(1, 3) = 2.50, p = 0.21')
    expect(notes).toContain('95 % Student-t interval of the mean 97.25 to 103.75 kJ/mol (3 degrees of freedom')
    expect(notes).toContain('From the scatter of the runs alone')
    expect(notes).toContain(
      'Vyazovkin: 100.50 kJ/mol, 95 % interval of the mean, scatter and measured sources combined, 96.25 to 104.75 kJ/mol. The scatter with a common error of temperature.',
    )
    expect(textOf(source, 'csv', 1)).not.toContain('Jackknife')
    expect(textOf(source, 'csv', 1)).not.toContain('interval of the mean, scatter and measured')
  })

  it('give the reason for every end that is not there, and a word where the lower one means nothing', () => {
    const status: IntervalResult['status'] = ['resamples-without-energy', 'resamples-without-energy', 'no-energy']
    const missing = {
      ...intervalOf('bootstrap', 'Bootstrap over runs'),
      lower95_kJ_per_mol: [null, null, null],
      upper95_kJ_per_mol: [null, null, null],
      status,
    }
    const outside = {
      ...intervalOf('vyazovkin-wight-f', 'F-type interval of Vyazovkin and Wight'),
      upper95_kJ_per_mol: [110.5, null, null],
      status: ['ok', 'end-outside', 'no-energy'] as const,
    }
    const below = { ...friedman, lower95_kJ_per_mol: [-12.5, 91, null] }
    const two = { ...kas, lower95_kJ_per_mol: [null, null, null], upper95_kJ_per_mol: [null, null, null] }
    const from: ExportSource = {
      ...source,
      result: { ...result, profiles: [below, two, { ...vyazovkin, otherIntervals: [outside] }] },
      uncertainty: { ...uncertainty, profiles: [{ method: 'vyazovkin', intervals: [missing], budget: [], mean: null }] },
    }
    const json = JSON.parse(textOf(from, 'json')) as { profiles: (ProfileResult & { intervalStatus: string[] })[] }
    expect(json.profiles.map((profile) => profile.intervalStatus)).toEqual([
      ['reaches-below-zero', 'ok', 'no-energy'],
      ['too-few-programmes', 'too-few-programmes', 'no-energy'],
      ['ok', 'ok', 'no-energy'],
    ])
    expect(json.profiles[2]?.otherIntervals.map((interval) => interval.status)).toEqual([outside.status, status])
    const notes = textOf(from, 'csv', 1)
    const [first, second] = result.levels.map(String)
    expect(notes).toContain(`Friedman: Student-t interval at conversion ${first}: reaches below 0, where no activation energy lies`)
    expect(notes).toContain(
      `Student-t interval at conversion ${first} and ${second}: not to be had with fewer than three distinct programmes`,
    )
    expect(notes).toContain(`F-type interval of Vyazovkin and Wight at conversion ${second}: an end lies beyond 1 or 1000 kJ/mol`)
    expect(notes).toContain(
      `Bootstrap over runs at conversion ${first} and ${second}: not to be had: more than 1 % of the resamples give no Ea`,
    )
    expect(textOf(source, 'csv', 1)).not.toContain('at conversion')
  })

  it('say which kinds there are none of, and what they need', () => {
    const three = { ...source, result: runsOf([0, 0, 1, 1, 2, 2]), uncertainty }
    expect(JSON.parse(textOf(three, 'json'))).toMatchObject({
      intervalsNotGiven: [{ kind: 'bootstrap', reason: 'needs 4 distinct programmes, here 3' }],
    })
    expect(textOf(three, 'csv', 1)).toContain('Bootstrap over runs: not given, needs 4 distinct programmes, here 3')
    const few = textOf({ ...source, result: runsOf([0, 1, 2]), uncertainty }, 'csv', 1)
    expect(few).toContain('Jackknife over runs: not given, needs 4 runs, here 3')
    expect(textOf({ ...three, result: runsOf([0, 0, 1, 2]) }, 'csv', 1)).toContain(
      'leaving out a run would leave fewer than 3 distinct programmes',
    )
    expect(textOf({ ...three, result: runsOf([0, 1]) }, 'csv', 1)).toContain('combined: not given, needs 3 distinct programmes, here 2')
    expect(textOf({ ...three, result: runsOf([0, 1, 2, 3]) }, 'csv', 1)).not.toContain('not given')
    // Nothing was asked for: nothing is missing.
    expect(textOf({ ...source, result: runsOf([0, 1, 2]) }, 'csv', 1)).not.toContain('not given')
  })
})

describe('what intervals from measured sources rest on', () => {
  const [entry] = uncertainty.profiles[0]?.budget ?? []
  const [profile] = uncertainty.profiles
  if (entry === undefined || profile === undefined) throw new Error('there is no budget')

  it('is told in kJ/mol over the levels of the mean, and as unknown with its reason where it cannot be', () => {
    const wide = { ...entry, standardUncertainty_kJ_per_mol: [9, 1.5, 3.25, 9] }
    expect(budgetLine('KAS', wide, { from: 0.2, to: 0.8 }, [0.1, 0.2, 0.8, 0.9])).toMatch(
      /; u\(Ea\) 1\.50 to 3\.25 kJ\/mol over conversion 0\.2 to 0\.8$/,
    )
    const unknown = { ...entry, standardUncertainty_kJ_per_mol: [null, null], reason: 'No other baseline under Run 4.' }
    expect(budgetLine('KAS', unknown, { from: 0.2, to: 0.8 }, [0.2, 0.8])).toMatch(/u\(Ea\) unknown .*\. No other baseline under Run 4\.$/)
  })

  it('stands below the table on the screen, beside which the combined interval has a column; neither without it', () => {
    const budget = [{ ...entry, assumed: true, magnitude: '0.5 K in each run, assumed, nothing stated' }]
    const apart = { ...uncertainty, profiles: [{ ...profile, intervals: [intervalOf('combined', 'Combined')], budget }] }
    expect(assumptionLines({ ...apart, profiles: [...apart.profiles, ...apart.profiles] })).toEqual([
      'Temperature, each run: 0.5 K in each run, assumed, nothing stated',
    ])
    const text = shortTable(result, apart)
    // The larger half of 90 to 110.5 about 100 and of 91 to 111 about 101.
    expect(text.split('\n').filter((line) => / ±10\.5$| ±10\.0$/.test(line))).toHaveLength(2)
    expect(text).toContain('Temperature, each run: 0.5 K in each run, assumed, nothing stated')
    expect(shortTable(result)).not.toMatch(/combined|assumed/)
  })

  // u 1 and 2 kJ/mol of the combined interval: 0.8 and 1.6 are 64 % of its variance, 0.6 and 1.2 are 36 %.
  const assuming = (share: number, change: Partial<typeof entry> = {}): UncertaintyResult => {
    const u = [Math.sqrt(share), 2 * Math.sqrt(share), null]
    const lag = {
      ...entry,
      source: 'temperature-lag',
      label: 'Thermal lag',
      magnitude: '1 s times the heating rate, assumed, nothing stated',
    } as const
    const budget = [{ ...lag, assumed: true, shownByScatter: false, standardUncertainty_kJ_per_mol: u, ...change }]
    return { ...uncertainty, profiles: [{ ...profile, intervals: [intervalOf('combined', 'Combined')], budget }] }
  }

  it('is named where it is assumed and makes most of the combined interval', () => {
    const said =
      'Thermal lag, 1 s times the heating rate, is assumed: nobody has stated it, and it makes 64 % of the variance of the combined interval. State your own (--lag'
    expect(shortTable(result, assuming(0.64))).toContain(said)
    expect(textOf({ ...source, uncertainty: assuming(0.64) }, 'csv', 1)).toContain(`Vyazovkin: ${said}`)
    const json = JSON.parse(textOf({ ...source, uncertainty: assuming(0.64) }, 'json')) as { profiles: { budgetRemarks: string[] }[] }
    expect(json.profiles.map(({ budgetRemarks }) => budgetRemarks)).toEqual([[], [], [expect.stringContaining(said)]])
    for (const less of [assuming(0.36), assuming(0.64, { assumed: false }), assuming(0.64, { shownByScatter: true })])
      expect(shortTable(result, less)).not.toContain('of the variance')
  })

  it('is given beside half the interval, with the reason why that is not 1.96 times as much', () => {
    const notes = textOf({ ...source, uncertainty: assuming(0.36) }, 'csv', 1)
    expect(notes).toMatch(/Vyazovkin: combined, u\(Ea\) 1\.00 to 2\.00 kJ\/mol and half the 95 % interval 10\.00 to 10\.50 kJ\/mol/)
    expect(notes.split('half the interval is no fixed multiple of u')).toHaveLength(2)
    expect(textOf({ ...source, uncertainty }, 'csv', 1)).not.toContain('multiple of u')
  })
})

const varies = (intervals: string): StudyResult['findings'] => [
  {
    code: 'energy-varies',
    severity: 'caution',
    stage: 'activation',
    title: 'Ea varies',
    message: 'Ea varies.',
    run: null,
    level: null,
    evidence: { intervals },
    basis: 'A rule',
    sources: [],
  },
]

describe('the mean of Ea', () => {
  const caution = 'not to be quoted alone: Ea varies'

  it('has the half of its interval on the screen, and of the combined one where that was asked for', () => {
    // 97.25 to 103.75 about 100.5; combined 96.25 to 104.75 about the same.
    const [withScatter, withAll] = [shortTable(result), shortTable(result, uncertainty)]
    expect(withScatter).toMatch(/\nMean over conversion 0\.1 to 0\.9, kJ\/mol: Friedman 100\.5 \(2 of 3 levels/)
    expect(withScatter).toMatch(/; Kissinger–Akahira–Sunose 100\.5 ±3\.3 \(/)
    expect(withAll).toMatch(/; Vyazovkin 100\.5, combined ±4\.3 \(/)
  })

  it('is not to be quoted alone where Ea varies by more than noise', () => {
    for (const intervals of ['apart', 'none']) {
      const varying = { ...result, findings: varies(intervals) }
      expect(shortTable(varying)).toContain(`kJ/mol, ${caution}: Friedman`)
      const notes = textOf({ ...source, result: varying, uncertainty }, 'csv', 1)
      expect(notes.split(caution)).toHaveLength(result.profiles.length + 2)
      expect(JSON.parse(textOf({ ...source, result: varying }, 'json'))).toMatchObject({ profiles: [{ meanCaution: caution }, {}, {}] })
    }
    for (const findings of [[], varies('overlap')]) {
      expect(shortTable({ ...result, findings })).not.toContain(caution)
      expect(textOf({ ...source, result: { ...result, findings } }, 'csv', 1)).not.toContain(caution)
    }
  })
})
