import { describe, expect, it } from 'vitest'
import type { ProfileResult, RunResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { levelColumns, levelCopyColumns, levelRows } from './level-rows.ts'

const runAt = (rate: number, temperatures_K: readonly (number | null)[]): RunResult => ({
  runId: `run-${rate}`,
  label: `run ${rate}`,
  fileName: `run ${rate}.csv`,
  column: 'Mass (mg)',
  sha256: '0'.repeat(64),
  signal: 'mass',
  signalUnit: 'kg',
  programme: 'constant-heating-rate',
  programmeGroup: rate,
  nominalHeatingRate_K_per_min: null,
  heatingRate_K_per_min: rate,
  heatingRateStandardError_K_per_min: 0.01,
  heatingRateSource: 'measured',
  holdTemperature_K: null,
  holdStart_s: null,
  conversionBeforeHold: null,
  rows: 10,
  initialMass_kg: null,
  window: { kind: 'temperature', start_K: 400, end_K: 700 },
  peak_K: null,
  enthalpy_J_per_g: null,
  enthalpyMagnitude_J_per_g: null,
  temperatureAtLevel_K: temperatures_K,
  timeAtLevel_s: temperatures_K.map((T) => (T === null ? null : (T - 400) * 10)),
  reactionRateAtLevel_per_s: temperatures_K.map(() => null),
  signalAtLevel: temperatures_K.map(() => null),
  curve: {
    time_s: new Float64Array(),
    temperature_K: new Float64Array(),
    signal: new Float64Array(),
    conversion: new Float64Array(),
    reactionRate_per_s: new Float64Array(),
    baseline: new Float64Array(),
  },
})

const friedman: ProfileResult = {
  method: 'friedman',
  label: 'Friedman',
  sources: [],
  evidence: 'line',
  interval: { kind: 'student-t', level: 0.95, dof: 1, pointwise: true },
  Ea_kJ_per_mol: [150.25, null],
  standardError_kJ_per_mol: [1, null],
  lower95_kJ_per_mol: [145.25, null],
  upper95_kJ_per_mol: [155.25, null],
  lnAf_per_s: [25.123, null],
  lnAfStandardError: [0.2, null],
  covarianceEaLnAf_kJ_per_mol: [null, null],
  lnA_per_s: [null, null],
  otherIntervals: [],
  systematicError_percent: [0, 0],
  lackOfFit: null,
  r2: [0.99987, null],
  status: ['ok', 'level-not-reached'],
  lines: [],
  phi: [],
  mean: {
    from: 0.1,
    to: 0.9,
    Ea_kJ_per_mol: 150.25,
    spread_kJ_per_mol: 0,
    standardError_kJ_per_mol: null,
    lower95_kJ_per_mol: null,
    upper95_kJ_per_mol: null,
    levelsUsed: 2,
    levelsInRange: 3,
    firstLevel: 0.1,
    lastLevel: 0.5,
  },
}
const starink: ProfileResult = {
  ...friedman,
  method: 'starink',
  label: 'Starink',
  Ea_kJ_per_mol: [149, 151],
  lower95_kJ_per_mol: [144.5, 145],
  upper95_kJ_per_mol: [153.5, 157],
  lnAf_per_s: [null, null],
  status: ['ok', 'ok'],
}
const result: StudyResult = {
  levels: [0.05, 0.5],
  signal: 'mass',
  signalsToChooseFrom: ['mass'],
  runs: [runAt(2, [473.15, 523.15]), runAt(20, [513.15, null])],
  profiles: [friedman, starink],
  kissinger: null,
  peakMethods: [],
  findings: [],
}

describe('table of levels', () => {
  const columns = levelColumns(result, 'friedman', ['starink'])
  const rows = levelRows(result)

  it('says in words why a number is not to be had, and never shows 0 for it', () => {
    const second = rows[1]
    const cells = second === undefined ? [] : columns.map((column) => column.text(second))
    expect(cells).toContain('not reached')
    expect(cells).not.toContain('0')
    expect(cells).not.toContain('0.0')
  })

  it('is copied with one digit more than shown and every interval, empty where a number is not to be had', () => {
    expect(copyText(levelCopyColumns(result, 'friedman', ['starink']), rows).split('\n')).toEqual([
      'α\tEa Friedman (kJ/mol)\t± 95 % Friedman (kJ/mol)\tln[A f(α)] (A in 1/s)\tr²\tEa Starink (kJ/mol)\t± 95 % Starink (kJ/mol)\tT at 2 K/min (°C)\tT at 20 K/min (°C)\tStatus Friedman\tStatus Starink',
      '0.05\t150.25\t5.00\t25.123\t0.999870\t149.00\t4.50\t200.00\t240.00\tok\tok',
      '0.50\t\t\t\t\t151.00\t6.00\t250.00\t\tnot reached\tok',
    ])
  })

  it('copies both ends of an interval that is too lopsided for ±', () => {
    const lopsided: StudyResult = { ...result, profiles: [{ ...friedman, lower95_kJ_per_mol: [147, null] }] }
    const [head, first] = copyText(levelCopyColumns(lopsided, 'friedman', []), rows).split('\n')
    expect(head?.split('\t').slice(2, 4)).toEqual(['Ea Friedman, lower end 95 % (kJ/mol)', 'Ea Friedman, upper end 95 % (kJ/mol)'])
    expect(first?.split('\t').slice(2, 4)).toEqual(['147.00', '155.25'])
  })

  it('shows the slowest and the fastest programme as the mean over its replicates, without a number of a replicate', () => {
    const again = { ...runAt(20.4, [515.15, null]), programmeGroup: 20 }
    const replicated: StudyResult = { ...result, runs: [...result.runs, again] }
    const [first] = levelRows(replicated)
    const last = levelColumns(replicated, 'friedman', []).at(-1)
    expect(last?.heading).toBe('T at 20.2 K/min')
    expect(first === undefined ? '' : last?.text(first)).toBe('241.0')
  })

  it('has the error of the method’s own temperature integral and ln A of its own model only where it has one', () => {
    const headings = (profile: ProfileResult): readonly string[] =>
      levelColumns({ ...result, profiles: [profile] }, profile.method, []).map((column) => column.heading)
    expect(headings(friedman)).not.toContain('Syst. error')
    expect(headings(friedman)).not.toContain('ln A')
    const e1641: ProfileResult = {
      ...starink,
      method: 'astm-e1641',
      label: 'ASTM E1641',
      lnA_per_s: [36.5, null],
      systematicError_percent: [-0.234, null],
    }
    const columns = levelColumns({ ...result, profiles: [e1641] }, 'astm-e1641', [])
    const cells = (heading: string) => rows.map((row) => columns.find((column) => column.heading === heading)?.text(row))
    expect(cells('Syst. error')).toEqual(['−0.23', ''])
    expect(cells('ln A')).toEqual(['36.50', ''])
  })

  it('has no column of ln[A f(α)] for a method that gives none', () => {
    expect(levelColumns(result, 'starink', []).map((column) => column.id)).not.toContain('lnAf')
  })

  it('compares holds by the time at which they reach the level', () => {
    const held = { ...result, runs: result.runs.map((one) => ({ ...one, programme: 'isothermal' as const, holdTemperature_K: 400 })) }
    const units = levelColumns(held, 'friedman', []).flatMap((column) => (column.id.startsWith('end-') ? [column.unit] : []))
    expect(units).toEqual(['min', 'min'])
  })
})
