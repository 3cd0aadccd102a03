import { quiet } from '../../check-values/series-of-values.ts'
import { methods } from '../../isoconversional/registry.ts'
import { randomStream } from '../../numerics/random.ts'
import { evaluateStudy } from '../../tasks/evaluate-study.ts'
import { measuredSourcesOf } from '../../tasks/measured-sources-of.ts'
import { seriesOfStudy } from '../../tasks/series-of-study.ts'
import {
  errorsMade,
  massRuns,
  ofSeries,
  reactions,
  runCounts,
  seedOfDraws,
  seedOfErrors,
  studiedMethods,
  type ErrorKind,
  type Reaction,
  type RunCount,
} from './design.ts'
import { drawErrors, exactRuns, noErrors, seriesWithErrors, sourcesOf } from './exact-runs.ts'
import { intervalsOf, type Analysis, type IntervalMaker } from './intervals-of.ts'
import { cleanRuns, studyOf, withNoise } from './noisy-runs.ts'
import { newTally, type Cell } from './tally.ts'

/** A share of the work: replicates `from` to `to` (not included) of one error in one reaction, with every number of runs. */
export interface Share {
  readonly seed: number
  readonly error: ErrorKind
  /** Of `reactions`. */
  readonly reaction: number
  readonly from: number
  readonly to: number
}

export interface ShareResult {
  readonly cells: readonly Cell[]
  /** For signal noise: in how many of how many looks the finding `unequal-variance` was there, one entry a number of runs. */
  readonly findings: readonly { readonly runs: RunCount; readonly looks: number; readonly fired: number }[]
}

/** Replicates between two looks at the findings, which cost a whole evaluation. */
const replicatesPerLook = 10

/** Works a share out. The same replicates give the same numbers in whatever shares they come. */
export function runShare(share: Share, maker: IntervalMaker = intervalsOf): ShareResult {
  const reaction = reactions[share.reaction]
  if (reaction === undefined) throw new RangeError(`no reaction ${share.reaction}`)
  return share.error === 'signal-noise' ? shareOfNoise(share, reaction, maker) : shareAtLevels(share, reaction, maker)
}

/** Errors of temperature and heating rate, put on exact values at the levels. */
function shareAtLevels({ seed, error, from, to }: Share, reaction: Reaction, maker: IntervalMaker): ShareResult {
  const made = errorsMade[error]
  const timeIsRebuilt = made.statedHeatingRate_share > 0
  const runs = exactRuns(reaction)
  const analyse = (count: RunCount, errors: ReturnType<typeof drawErrors>, replicate: number): Analysis => {
    const series = seriesWithErrors(ofSeries(runs, count), ofSeries(errors, count), timeIsRebuilt)
    const results = studiedMethods.map((method) => methods[method].run(series, quiet))
    return { series, results, sources: sourcesOf(made, count), seedOfDraws: seedOfDraws(seed, error, replicate) }
  }
  const tallies = runCounts.map((count) => {
    const own = analyse(count, [...noErrors], 0).results.map((result) => result.Ea)
    return { count, tally: newTally({ error, model: reaction.code, runs: count }, own) }
  })
  for (let replicate = from; replicate < to; replicate++) {
    const errors = drawErrors(made, runs, randomStream(seedOfErrors(seed, error), replicate))
    for (const { count, tally } of tallies) tally.add(maker(analyse(count, errors, replicate)))
  }
  return { cells: tallies.flatMap(({ tally }) => tally.cells), findings: [] }
}

/** Noise of the mass, through the program's own conversion. */
function shareOfNoise({ seed, error, from, to }: Share, reaction: Reaction, maker: IntervalMaker): ShareResult {
  const clean = cleanRuns(reaction)
  const analyse = (
    runs: ReturnType<typeof withNoise>,
    count: RunCount,
    replicate: number,
    cache: Parameters<typeof seriesOfStudy>[3],
  ): Analysis => {
    const { study, columns } = studyOf(ofSeries(runs, count))
    const { runs: read, series, chosen, resultOf } = seriesOfStudy(study, columns, quiet, cache)
    return {
      series,
      results: chosen.map(resultOf),
      sources: measuredSourcesOf(read, study.settings, errorsMade[error], columns, quiet),
      seedOfDraws: seedOfDraws(seed, error, replicate),
    }
  }
  const withoutNoise = withNoise(clean, 0, randomStream(0))
  const cacheWithoutNoise = new Map()
  const tallies = runCounts.map((count) => {
    const own = analyse(withoutNoise, count, 0, cacheWithoutNoise).results.map((result) => result.Ea)
    return { count, tally: newTally({ error, model: reaction.code, runs: count }, own), looks: 0, fired: 0 }
  })
  for (let replicate = from; replicate < to; replicate++) {
    const runs = withNoise(clean, massRuns.noise_kg, randomStream(seedOfErrors(seed, error), replicate))
    const cache = new Map()
    for (const place of tallies) {
      place.tally.add(maker(analyse(runs, place.count, replicate, cache)))
      if (replicate % replicatesPerLook !== 0) continue
      const { study, columns } = studyOf(ofSeries(runs, place.count))
      place.looks++
      if (evaluateStudy(study, columns, quiet, cache).findings.some(({ code }) => code === 'unequal-variance')) place.fired++
    }
  }
  return {
    cells: tallies.flatMap(({ tally }) => tally.cells),
    findings: tallies.map(({ count, looks, fired }) => ({ runs: count, looks, fired })),
  }
}
