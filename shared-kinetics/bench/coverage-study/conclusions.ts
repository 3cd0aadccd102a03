import { levels, runCounts, type ErrorKind, type RunCount, type StudiedInterval } from './design.ts'
import { coverageOf } from './gate.ts'
import type { Findings } from './page.ts'
import type { Cell } from './tally.ts'
import { medianOf, percent } from './words.ts'

/** Least to most coverage. */
const range = (found: readonly Cell[]): string => {
  const values = found.map(coverageOf)
  return `${percent(Math.min(...values))} to ${percent(Math.max(...values))} %`
}

const median = (found: readonly Cell[]): string => percent(medianOf(found.map(coverageOf)))

/** Sentences on what the study shows, their numbers taken from it. */
export function conclusionsOf(cells: readonly Cell[], findings: Findings): string[] {
  const of = (interval: StudiedInterval, errors: readonly ErrorKind[], runs: readonly RunCount[] = runCounts, level?: number): Cell[] =>
    cells.filter(
      (cell) =>
        cell.interval === interval &&
        errors.includes(cell.error) &&
        runs.includes(cell.runs) &&
        (level === undefined || cell.level === level),
    )
  const byRuns = (interval: StudiedInterval, errors: readonly ErrorKind[]): string =>
    runCounts
      .filter((runs) => of(interval, errors, [runs]).length > 0)
      .map((runs) => `${median(of(interval, errors, [runs]))} % of ${runs} runs`)
      .join(', ')
  const width = (runs: RunCount): number =>
    medianOf(
      of('student-t', ['temperature-offset'], [runs]).map((cell) => cell.halfWidths_J_per_mol / cell.replicates / cell.own_J_per_mol),
    )
  const fired = runCounts
    .map((runs) => {
      const looks = findings.filter((finding) => finding.runs === runs)
      const sum = (key: 'looks' | 'fired'): number => looks.reduce((total, look) => total + look[key], 0)
      return `${percent(sum('fired') / sum('looks'))} % of ${runs} runs`
    })
    .join(', ')
  const equal: readonly ErrorKind[] = ['temperature-offset', 'heating-rate']
  const lowest = levels[0] ?? Number.NaN
  return [
    `(a) holds what it says where errors are independent and alike: ${range(of('student-t', equal))} over all cells, also for three runs, where one degree of freedom must do.`,
    `(a) of three runs is right and of little use: half of it is ${percent(width(3))} % of Ea, against ${percent(width(4))} % of four runs, ${percent(width(5))} % of five and ${percent(width(6))} % of six, for 0.5 K in each run.`,
    `(d) holds where what is stated is true: ${range(of('measured-sources', [...equal, 'all-sources']))}. It does not need scatter to be seen, so that of three runs it is far narrower than (a); it is worth what the statements are worth.`,
    `(b) does not hold 95 %, whatever its name: median ${byRuns('vyazovkin-wight-f', equal)}. It is approximate, and says so.`,
    `(c) the jackknife comes close (${byRuns('jackknife', equal)}); the bootstrap over so few runs is too narrow (${byRuns('bootstrap', equal)}).`,
    `Errors common to all runs leave no scatter, and (a) cannot know of them: with all sources it holds ${range(of('student-t', ['all-sources']))}. Combined with the stated ones it holds ${range(of('combined', ['all-sources']))}.`,
    `Signal noise at a constant sampling time: (a) holds ${range(of('student-t', ['signal-noise']))}, median ${byRuns('student-t', ['signal-noise'])}; (d) from the noise found in the data ${range(of('measured-sources', ['signal-noise']))}, least near the start of the reaction (median at level ${lowest}: ${median(of('measured-sources', ['signal-noise'], runCounts, lowest))} %). The finding \`unequal-variance\` tells the user when data are of this kind: it was there in ${fired} (looked for in every tenth replicate; its rule asks for variances more than four times apart, which three heating rates from 5 to 20 K/min only just are).`,
  ]
}
