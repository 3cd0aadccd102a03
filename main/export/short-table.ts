import { levelsOfMean } from '../../shared-kinetics/figure/levels-of-mean.ts'
import { levelText } from '../../shared-kinetics/figure/nice-axis.ts'
import { meanCaution } from '../../shared-kinetics/figure/mean-not-alone.ts'
import type { ProfileResult, StudyResult, UncertaintyResult } from '../../shared-kinetics/tasks/study-result.ts'
import { assumedSharesOfAll, assumptionLines } from './budget-lines.ts'
import { uncertaintyOf } from './activation-json.ts'

/**
 * The table a terminal shows: Ea of every method at every level, with the larger half of its 95 % interval; a dash where there is no number. With what was worked out of
 * measured sources, the larger half of the combined interval stands in a column of its own, and below the table what it rests on that nobody stated.
 */
export function shortTable(result: StudyResult, uncertainty?: UncertaintyResult): string {
  const columns = [
    ['conversion', ...result.levels.map((level) => levelText(level))],
    ...result.profiles.flatMap((profile) => [
      [profile.label, ...result.levels.map((_, i) => cell(profile, i))],
      ...(uncertainty === undefined ? [] : [['combined', ...combinedCells(profile, uncertainty)]]),
    ]),
  ]
  const widths = columns.map((column) => Math.max(...column.map((text) => text.length)))
  const rows = ['', ...result.levels].map((_, row) => columns.map((column, c) => (column[row] ?? '').padStart(widths[c] ?? 0)).join('  '))
  return [
    'Ea in kJ/mol, with the larger half of its 95 % interval (Student-t, each level by itself)',
    ...(uncertainty === undefined ? [] : ['combined: the larger half of the 95 % interval from scatter and measured sources, kJ/mol']),
    ...rows,
    ...(uncertainty === undefined ? [] : [...assumptionLines(uncertainty), ...assumedSharesOfAll(result.profiles, uncertainty)]),
    ...means(result, uncertainty),
    ...kissinger(result),
    ...peakMethods(result),
    '',
  ].join('\n')
}

function cell(profile: ProfileResult, level: number): string {
  const Ea = profile.Ea_kJ_per_mol[level] ?? null
  if (Ea === null) return '-'
  const half = halfWidth(Ea, profile.lower95_kJ_per_mol[level] ?? null, profile.upper95_kJ_per_mol[level] ?? null)
  return half === null ? Ea.toFixed(1) : `${Ea.toFixed(1)} ±${intervalText(half)}`
}

function combinedCells(profile: ProfileResult, uncertainty: UncertaintyResult): readonly string[] {
  const interval = uncertaintyOf(profile, uncertainty)?.intervals.find(({ kind }) => kind === 'combined')
  return profile.Ea_kJ_per_mol.map((Ea, i) => {
    const half = Ea === null ? null : halfWidth(Ea, interval?.lower95_kJ_per_mol[i] ?? null, interval?.upper95_kJ_per_mol[i] ?? null)
    return half === null ? '-' : `±${intervalText(half)}`
  })
}

const plusMinus = (half: number | null): string => (half === null ? '' : ` ±${intervalText(half)}`)

/** An interval that rounds away is still there. */
const intervalText = (half: number): string => (half < 0.05 ? '<0.1' : half.toFixed(1))

function halfWidth(Ea: number, lower: number | null, upper: number | null): number | null {
  return lower === null || upper === null ? null : Math.max(Ea - lower, upper - Ea)
}

/** Each mean with the larger half of its 95 % interval: by the scatter of the runs, then combined with measured sources where those were worked out. */
function means(result: StudyResult, uncertainty: UncertaintyResult | undefined): string[] {
  const texts = result.profiles.flatMap((profile) => {
    const { label, mean } = profile
    const Ea = mean.Ea_kJ_per_mol
    if (Ea === null) return []
    const half = halfWidth(Ea, mean.lower95_kJ_per_mol, mean.upper95_kJ_per_mol)
    const combined = uncertaintyOf(profile, uncertainty)?.mean ?? null
    const halfCombined = combined === null ? null : halfWidth(Ea, combined.lower95_kJ_per_mol, combined.upper95_kJ_per_mol)
    const levels = mean.levelsUsed < mean.levelsInRange ? ` (${levelsOfMean(mean)})` : ''
    return [`${label} ${Ea.toFixed(1)}${plusMinus(half)}${halfCombined === null ? '' : `, combined${plusMinus(halfCombined)}`}${levels}`]
  })
  const range = result.profiles[0]?.mean
  const caution = meanCaution(result.findings)
  return range === undefined || texts.length === 0
    ? []
    : [
        `Mean over conversion ${levelText(range.from)} to ${levelText(range.to)}, kJ/mol${caution === null ? '' : `, ${caution}`}: ${texts.join('; ')}`,
      ]
}

function kissinger({ kissinger: k }: StudyResult): string[] {
  if (k === null) return []
  const half = halfWidth(k.Ea_kJ_per_mol, k.lower95_kJ_per_mol, k.upper95_kJ_per_mol)
  return [
    `Kissinger, from the peaks: ${k.Ea_kJ_per_mol.toFixed(1)}${half === null ? '' : ` ±${intervalText(half)}`} kJ/mol, ln A ${k.lnA_per_s.toFixed(2)} (A in 1/s)`,
  ]
}

/** Methods that apply; Kissinger has its own line, and every run of a single-run method is one item of one line. */
function peakMethods(result: StudyResult): string[] {
  const texts = new Map<string, string[]>()
  for (const {
    method,
    label,
    runLabel,
    applies,
    Ea_kJ_per_mol: Ea,
    lower95_kJ_per_mol: lower,
    upper95_kJ_per_mol: upper,
    lnA_per_s: lnA,
  } of result.peakMethods) {
    if (!applies || Ea === null || method === 'kissinger') continue
    const half = halfWidth(Ea, lower, upper)
    const energy = `${Ea.toFixed(1)}${half === null ? '' : ` ±${intervalText(half)}`} kJ/mol`
    const text = runLabel === null ? `${energy}${lnA === null ? '' : `, ln A ${lnA.toFixed(2)} (A in 1/s)`}` : `${runLabel} ${energy}`
    const heading = runLabel === null ? label : `${label}, each run alone, not to be relied on`
    texts.set(heading, [...(texts.get(heading) ?? []), text])
  }
  return [...texts].map(([heading, items]) => `${heading}: ${items.join('; ')}`)
}
