import type { RunCount } from './design.ts'
import {
  drawsPerReplicate,
  errorKinds,
  errorsMade,
  gate,
  heatingRates_K_per_min,
  levels,
  massRuns,
  ofSeries,
  reactions,
  runCounts,
  studiedIntervals,
  studiedMethods,
  type ErrorKind,
  type StudiedInterval,
} from './design.ts'
import { boundsFor, coverageOf, errorOfShare, isGated, outsideGate } from './gate.ts'
import { conclusionsOf } from './conclusions.ts'
import type { ShareResult } from './run-share.ts'
import type { Cell } from './tally.ts'
import { cellName, errorNames, intervalNames, medianOf, methodName, percent, table } from './words.ts'

export type Findings = ShareResult['findings']

/** The page of the study, `docs/coverage.md`. */
export function pageOf(cells: readonly Cell[], findings: Findings, size: { readonly replicates: number; readonly seed: number }): string {
  return `${[
    opening(cells, size),
    `## What the numbers show\n\n${conclusionsOf(cells, findings)
      .map((lesson) => `- ${lesson}`)
      .join('\n')}`,
    `## Coverage in %\n\nLeast / median / most over the reactions and levels. Cells with * are held to the gate.\n\n${errorKinds
      .map((error) => `### ${errorNames[error]}\n\n${errorWords[error]}\n\n${summaryOf(cells, error)}`)
      .join('\n\n')}`,
    `## How wide the intervals are\n\nHalf the interval in % of Ea: mean over the replicates, median over methods, reactions and levels.\n\n${widthsOf(cells)}`,
    `## Bias\n\nThe method's own value on the series without errors against the true Ea, in % of it: that of the number of runs where it is farthest off. The mass runs go through conversion and smoothing.\n\n${biasOf(cells)}`,
    `## All cells\n\nCoverage in % at the levels ${levels.join(', ')}.\n\n${errorKinds
      .map((error) => `### ${errorNames[error]}, cell by cell\n\n${allOf(cells, error)}`)
      .join('\n\n')}`,
  ].join('\n\n')}\n`
}

const { temperatureCommon_K, temperatureRun_K, lag_s, statedHeatingRate_share } = errorsMade['all-sources']

const errorWords: Readonly<Record<ErrorKind, string>> = {
  'temperature-offset': `All temperatures of a run are off by one normal error of ${errorsMade['temperature-offset'].temperatureRun_K} K, independent from run to run. Independent errors of (nearly) equal variance.`,
  'heating-rate': `The heating rate stated for a run is off by a normal error of ${100 * errorsMade['heating-rate'].statedHeatingRate_share} %, independent from run to run, and time was rebuilt from it, so that dalpha/dt bears it too. Independent errors of equal variance.`,
  'all-sources': `What (d) takes into account at once: ${temperatureCommon_K} K common to all runs, ${temperatureRun_K} K in each run, a lag of ${lag_s} s times the heating rate, ${100 * statedHeatingRate_share} % of each stated heating rate. (a) sees only what differs from run to run.`,
  'signal-noise': `Mass runs of ${1e6 * massRuns.initial_kg} mg that lose ${1e6 * massRuns.lost_kg} mg, a row every ${massRuns.every_s} s whatever the heating rate, normal noise of ${1e9 * massRuns.noise_kg} µg in each row, through the program's own conversion. A fast run has fewer rows over the same conversion: unequal variance. Nothing is stated to (d), which finds the noise in the data. Tabulated, not gated.`,
}

function opening(cells: readonly Cell[], { replicates, seed }: { readonly replicates: number; readonly seed: number }): string {
  const gated = cells.filter(isGated)
  const outside = outsideGate(cells)
  const bounds = boundsFor(replicates)
  const series = runCounts.map((runs) => `${runs}: ${ofSeries(heatingRates_K_per_min, runs).join(', ')}`).join('; ')
  const kinetics = reactions
    .map(({ code, Ea_J_per_mol, lnA }) => `${code} with Ea = ${Ea_J_per_mol / 1000} kJ/mol and A = 1e${Math.round(lnA / Math.LN10)} 1/s`)
    .join(', ')
  return `# How often the intervals hold

Written by \`npm run study:coverage -- --write\`; not edited by hand. \`npm run study:coverage\` repeats it (some minutes on two cores; \`-- --quick\` with a tenth of the replicates); the same
seed gives the same numbers on any machine and however the work is shared out. It ends with an error where a gated cell lies outside ${100 * gate.least} to ${100 * gate.most} %.

Coverage is the share of ${replicates.toLocaleString('en')} simulated measurements (seed ${seed}) in which a 95 % interval, at one level, holds the method's OWN value on the same series without errors. How
far that value is from the true Ea is [bias](#bias), and stands apart. A share of ${replicates.toLocaleString('en')} has a standard error of ${(100 * errorOfShare(replicates)).toFixed(2)} %.

- Reactions: ${kinetics}. Exact T(alpha) and dalpha/dt under a constant heating rate.
- Runs at heating rates in K/min, one run each: ${series}.
- Levels ${levels.join(', ')}; methods ${studiedMethods.map(methodName).join(', ')}.
- The errors of one replicate are the same for all reactions, methods, levels and numbers of runs, so that cells are compared like with like, and are not independent of each other.
- (d) makes ${drawsPerReplicate} draws a replicate, of the errors as they are made: its quantiles then are the third from either end, between which another draw lies with probability 0.95 exactly.
- Gated: (a) for independent errors of equal variance, and (d) under its own assumptions; ${gated.length} cells. ${outside.length === 0 ? `All lie within ${percent(bounds.least)} to ${percent(bounds.most)} %.` : `Outside: ${outside.map(cellName).join('; ')}.`}`
}

const cellsOf = (cells: readonly Cell[], error: ErrorKind, interval: StudiedInterval): Cell[] =>
  cells.filter((cell) => cell.error === error && cell.interval === interval)

function summaryOf(cells: readonly Cell[], error: ErrorKind): string {
  const rows = studiedIntervals.flatMap((interval) =>
    studiedMethods.flatMap((method) => {
      const ofMethod = cellsOf(cells, error, interval).filter((cell) => cell.method === method)
      if (ofMethod.length === 0) return []
      const star = ofMethod.some(isGated) ? ' *' : ''
      return [[`${intervalNames[interval]}${star}`, methodName(method), ...runCounts.map((runs) => threeOf(ofMethod, runs))]]
    }),
  )
  return table(['Interval', 'Method', ...runCounts.map((runs) => `${runs} runs`)], 2, rows)
}

function threeOf(cells: readonly Cell[], runs: RunCount): string {
  const values = cells.filter((cell) => cell.runs === runs).map(coverageOf)
  return values.length === 0 ? '' : [Math.min(...values), medianOf(values), Math.max(...values)].map(percent).join(' / ')
}

const halfWidthShare = (cell: Cell): number => cell.halfWidths_J_per_mol / (cell.replicates - cell.withoutInterval) / cell.own_J_per_mol

function widthsOf(cells: readonly Cell[]): string {
  const rows = errorKinds.flatMap((error) =>
    studiedIntervals.map((interval) => {
      const found = cellsOf(cells, error, interval)
      const widths = runCounts.map((runs) => found.filter((cell) => cell.runs === runs).map(halfWidthShare))
      return [errorNames[error], intervalNames[interval], ...widths.map((values) => (values.length === 0 ? '' : percent(medianOf(values))))]
    }),
  )
  return table(['Errors', 'Interval', ...runCounts.map((runs) => `${runs} runs`)], 2, rows)
}

function biasOf(cells: readonly Cell[]): string {
  const kinds = [
    ['exact values', 'temperature-offset'],
    ['mass runs', 'signal-noise'],
  ] as const
  const rows = reactions.flatMap(({ code, Ea_J_per_mol }) =>
    levels.map((level) => [
      code,
      `${level}`,
      ...kinds.flatMap(([, error]) =>
        studiedMethods.map((method) => {
          const biases = cellsOf(cells, error, 'student-t')
            .filter((cell) => cell.model === code && cell.level === level && cell.method === method)
            .map((cell) => cell.own_J_per_mol / Ea_J_per_mol - 1)
          return (100 * biases.reduce((far, bias) => (Math.abs(bias) > Math.abs(far) ? bias : far), 0))
            .toFixed(3)
            .replace('-0.000', '0.000')
        }),
      ),
    ]),
  )
  return table(
    ['Reaction', 'Level', ...kinds.flatMap(([words]) => studiedMethods.map((method) => `${methodName(method)}, ${words}`))],
    1,
    rows,
  )
}

function allOf(cells: readonly Cell[], error: ErrorKind): string {
  const rows = reactions.flatMap(({ code }) =>
    runCounts.flatMap((runs) =>
      studiedMethods.map((method) => [
        code,
        `${runs}`,
        methodName(method),
        ...studiedIntervals.map((interval) =>
          cellsOf(cells, error, interval)
            .filter((cell) => cell.model === code && cell.runs === runs && cell.method === method)
            .toSorted((a, b) => a.level - b.level)
            .map((cell) => percent(coverageOf(cell)))
            .join(' '),
        ),
      ]),
    ),
  )
  return table(['Reaction', 'Runs', 'Method', ...studiedIntervals.map((interval) => intervalNames[interval])], 3, rows)
}
