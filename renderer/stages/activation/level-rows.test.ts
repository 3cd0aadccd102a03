import { describe, expect, it } from 'vitest'
import type { ProfileResult, StudyResult } from '../../../shared-kinetics/contract/study-result.ts'
import { copyText } from '../../sheet/data-table.ts'
import { levelColumns, levelCopyColumns, levelRows } from './level-rows.ts'
import type { ShownInterval } from './shown-interval.ts'
import { friedman, result, runAt, starink } from './testing/small-result.ts'

const jackknife = (lower: readonly (number | null)[], upper: readonly (number | null)[]): ShownInterval => ({
  kind: 'jackknife',
  label: 'Jackknife over runs',
  approximate: true,
  note: '',
  sources: [],
  lower95_kJ_per_mol: lower,
  upper95_kJ_per_mol: upper,
  status: lower.map((end, i) =>
    (end ?? upper[i] ?? null) === null ? 'no-energy' : end === null ? 'end-outside' : end < 0 ? 'reaches-below-zero' : 'ok',
  ),
})
const headings = (profile: ProfileResult): readonly string[] =>
  levelColumns({ ...result, profiles: [profile] }, profile.method, []).map((column) => column.heading)

const jackknifeOf = (profile: ProfileResult): ShownInterval | null =>
  profile.method === 'friedman' ? jackknife([148.25, null], [152.25, null]) : jackknife([140, null], [158, 160])

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
      'α\tEa Friedman (kJ/mol)\t± 95 % Friedman, Student-t (kJ/mol)\tln[A f(α)] (A in 1/s)\ts.e. of ln[A f(α)]\tr²\tEa Starink (kJ/mol)\t± 95 % Starink, Student-t (kJ/mol)\tT at 2 K/min (°C)\tT at 20 K/min (°C)\tStatus Friedman\tStatus Starink',
      '0.05\t150.25\t5.00\t25.123\t0.200\t0.999870\t149.00\t4.50\t200.00\t240.00\tok\tok',
      '0.50\t\t\t\t\t\t151.00\t6.00\t250.00\t\tnot reached\tok',
    ])
  })

  it('copies both ends of an interval that is too lopsided for ±', () => {
    const lopsided: StudyResult = { ...result, profiles: [{ ...friedman, lower95_kJ_per_mol: [147, null] }] }
    const [head, first] = copyText(levelCopyColumns(lopsided, 'friedman', []), rows).split('\n')
    expect(head?.split('\t').slice(2, 4)).toEqual([
      'Ea Friedman, lower end 95 %, Student-t (kJ/mol)',
      'Ea Friedman, upper end 95 %, Student-t (kJ/mol)',
    ])
    expect(first?.split('\t').slice(2, 4)).toEqual(['147.00', '155.25'])
  })

  it('shows and copies the kind of interval that was chosen, each method its own, both ends where one is open', () => {
    const [first] = rows
    const shown = levelColumns(result, 'friedman', ['starink'], jackknifeOf)
    expect(shown.map((column) => (first === undefined ? '' : column.text(first))).slice(0, 4)).toEqual([
      '0.05',
      '150.3',
      '2.0',
      '25.12 ± 0.20',
    ])
    const head =
      copyText(levelCopyColumns(result, 'friedman', ['starink'], jackknifeOf), rows)
        .split('\n')[0]
        ?.split('\t') ?? []
    expect(head).toContain('± 95 % Friedman, jackknife (kJ/mol)')
    expect(head).toContain('Ea Starink, upper end 95 %, jackknife (kJ/mol)')
    expect(levelCopyColumns(result, 'friedman', [], () => null).some((column) => column.id.startsWith('interval'))).toBe(false)
  })

  it('says of an interval why an end is not there or means nothing, where it stands and where it is copied', () => {
    const wide = jackknife([-3, null], [301, null])
    const open: ShownInterval = { ...wide, status: ['reaches-below-zero', 'energy-needs-every-run'] }
    const column = levelColumns(result, 'starink', [], () => open).find(({ id }) => id === 'interval-starink')
    expect(rows.map((row) => column?.text(row))).toEqual(['152.0', 'none'])
    expect(rows.map((row) => column?.remark?.(row))).toEqual([
      'reaches below 0, where no activation energy lies: these runs do not bound Ea from below',
      'not to be had: without one of the runs there is no Ea',
    ])
    const copied = copyText(
      levelCopyColumns(result, 'starink', [], () => open),
      rows,
    ).split('\n')
    expect(copied[0]).toMatch(/\tStatus Starink\tInterval Starink, jackknife$/)
    expect(copied[1]).toMatch(/\tok\treaches below 0, [^\t]*$/)
    expect(copied[2]).toMatch(/\tok\tnot to be had: without one of the runs there is no Ea$/)
  })

  it('has nothing to say of an interval that is complete', () => {
    const column = levelColumns(result, 'starink', []).find(({ id }) => id === 'interval-starink')
    expect(rows.map((row) => column?.remark?.(row))).toEqual([null, null])
    expect(levelCopyColumns(result, 'starink', []).some(({ id }) => id === 'remark-starink')).toBe(false)
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
