import { levelsOfMean } from '../../shared-kinetics/figure/levels-of-mean.ts'
import type { IntervalStatus } from '../../shared-kinetics/isoconversional/result.ts'
import { whyNotAMultiple } from '../../shared-kinetics/figure/assumed-share.ts'
import { intervalRemarks, studentStatus } from '../../shared-kinetics/figure/interval-status.ts'
import { intervalsNotGiven } from '../../shared-kinetics/figure/intervals-not-given.ts'
import type { CombinedMean, IntervalResult, ProfileResult, UncertaintyProfile } from '../../shared-kinetics/tasks/study-result.ts'
import { uncertaintyOf, type ExportSource } from './activation-json.ts'
import { assumedShareLines, budgetLine, combinedLines } from './budget-lines.ts'

/** Every kind of interval in the table, how it was made, and that it is pointwise; systematic errors and lack of fit beside them. */
export function intervalLines({ result, uncertainty }: ExportSource): string[] {
  const lines = [
    'All intervals are pointwise: each holds for its level by itself, not for the whole curve at once',
    ...(uncertainty === undefined ? [] : intervalsNotGiven(result.runs.map((run) => run.programmeGroup))).map(
      ({ label, reason }) => `${label}: not given, ${reason}`,
    ),
    ...(uncertainty?.profiles.some(({ intervals }) => intervals.some(({ kind }) => kind === 'combined')) === true
      ? [`Combined interval and its standard uncertainty u: ${whyNotAMultiple}`]
      : []),
    ...result.profiles.flatMap((profile) => {
      const apart = uncertaintyOf(profile, uncertainty)
      return [
        studentLine(profile),
        ...statusLines(`${profile.label}: Student-t interval`, studentStatus(profile), result.levels),
        ...[...profile.otherIntervals, ...(apart?.intervals ?? [])].flatMap((interval) => [
          otherLine(profile.label, interval),
          ...statusLines(`${profile.label}: ${interval.label}`, interval.status, result.levels),
        ]),
        ...(apart?.budget ?? []).map((entry) => budgetLine(profile.label, entry, profile.mean, result.levels)),
        ...(apart === undefined ? [] : combinedLines(profile, apart, result.levels)),
        ...(apart === undefined ? [] : assumedShareLines(profile, apart, result.levels).map((line) => `${profile.label}: ${line}`)),
        ...systematicLines(profile),
        ...lackOfFitLines(profile),
      ]
    }),
  ]
  const k = result.kissinger
  if (k !== null) {
    const interval =
      k.lower95_kJ_per_mol === null || k.upper95_kJ_per_mol === null
        ? ''
        : ` (95 %: ${k.lower95_kJ_per_mol.toFixed(1)} to ${k.upper95_kJ_per_mol.toFixed(1)})`
    lines.push(
      `Kissinger, from the peaks: Ea ${k.Ea_kJ_per_mol.toFixed(2)} kJ/mol${interval}, ln A ${k.lnA_per_s.toFixed(2)} (A in 1/s). Method: ${k.sources.join('; ')}`,
    )
  }
  if (result.runs.some((run) => run.heatingRateStandardError_K_per_min !== null)) {
    lines.push(
      'Heating rates: the standard error is that of the line through T(t), its rows taken as independent; it does not tell how steady the rate is',
    )
  }
  return lines
}

function studentLine({ label, interval, sources, standardError_kJ_per_mol: errors }: ProfileResult): string {
  const name = errors.some((error) => error !== null)
    ? `${interval.level * 100} % Student-t interval, ${interval.dof} degrees of freedom, for each level by itself`
    : 'no standard error and no interval at any level (see the findings and the status of each level in activation.json)'
  return `${label}: ${name}. Method: ${sources.join('; ')}`
}

function otherLine(label: string, { label: kind, level, approximate, note, sources }: IntervalResult): string {
  const basis = sources.length === 0 ? '' : ` Source: ${sources.join('; ')}`
  return `${label}: ${level * 100} % interval, ${kind}, pointwise${approximate ? ', approximate' : ''}. ${note}${basis}`
}

/** At which levels an interval says less than its numbers do, or nothing, and why. */
const statusLines = (interval: string, status: readonly IntervalStatus[], levels: readonly number[]): string[] =>
  intervalRemarks(status, levels).map((remark) => `${interval} at conversion ${remark.levels}: ${remark.words}`)

const signed = (percent: number): string => `${percent > 0 ? '+' : ''}${percent.toPrecision(2)} %`

/** Of a method that has a systematic error, its range over the levels. */
function systematicLines({ label, systematicError_percent: values }: ProfileResult): string[] {
  const known = values.filter((value) => value !== null)
  if (known.every((value) => value === 0)) return []
  const range = `${signed(Math.min(...known))} to ${signed(Math.max(...known))}`
  return [`${label}: systematic error of Ea from its temperature integral ${range} over the levels, no part of any interval`]
}

function lackOfFitLines({ label, lackOfFit }: ProfileResult): string[] {
  if (lackOfFit === null || lackOfFit.overMeanRange.p === null || lackOfFit.overMeanRange.F === null) return []
  const { F, p } = lackOfFit.overMeanRange
  return [
    `${label}: lack of fit against pure error of replicates over the range of the mean: F(${lackOfFit.dofLackOfFit}, ${lackOfFit.dofPureError}) = ${F.toPrecision(3)}, p = ${p.toPrecision(2)}`,
  ]
}

/**
 * The mean of Ea over the range, with its interval where there is one and what that does not hold; then the one that holds the measured sources too.
 *
 * @param caution - what stands beside every mean: `meanCaution`
 */
export function meanLines(
  { label, mean, interval }: ProfileResult,
  apart: UncertaintyProfile | undefined,
  caution: string | null = null,
): string[] {
  const { from, to, Ea_kJ_per_mol: Ea, spread_kJ_per_mol: spread, lower95_kJ_per_mol: lower, upper95_kJ_per_mol: upper, note } = mean
  if (Ea === null || spread === null) return []
  const ends =
    lower === null || upper === null
      ? ''
      : `, 95 % Student-t interval of the mean ${lower.toFixed(2)} to ${upper.toFixed(2)} kJ/mol (${interval.dof} degrees of freedom)`
  const left = ends === '' ? '' : `. ${note}`
  const beside = caution === null ? '' : `; ${caution}`
  return [
    `${label}: ${Ea.toFixed(2)} kJ/mol over conversion ${from} to ${to} (${levelsOfMean(mean)})${ends}, spread ${spread.toFixed(2)} kJ/mol${beside}${left}`,
    ...(apart === undefined || apart.mean === null ? [] : [combinedMeanLine(label, apart.mean, beside)]),
  ]
}

function combinedMeanLine(label: string, mean: CombinedMean, beside: string): string {
  const { Ea_kJ_per_mol: Ea, lower95_kJ_per_mol: lower, upper95_kJ_per_mol: upper, note } = mean
  const ends = lower === null || upper === null ? 'not to be had' : `${lower.toFixed(2)} to ${upper.toFixed(2)} kJ/mol`
  return `${label}: ${Ea.toFixed(2)} kJ/mol, 95 % interval of the mean, scatter and measured sources combined, ${ends}${beside}. ${note}`
}
