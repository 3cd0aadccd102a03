import type { IsoconversionalResult, TaskContext } from '../isoconversional/result.ts'
import type { SeriesAtLevels } from '../series/series-at-levels.ts'
import { bootstrap } from '../uncertainty/bootstrap.ts'
import { designCoverage } from '../uncertainty/design-coverage.ts'
import { deleteOne, jackknife } from '../uncertainty/jackknife.ts'
import { resampledEnergies } from '../uncertainty/resampled-energies.ts'
import { resamplesOf, type ResampledInterval, type Resamples } from '../uncertainty/resamples.ts'
import { intervalResult } from './interval-result.ts'
import type { IntervalResult } from './study-result.ts'

/** What is resampled of a series, the same for every method. */
export interface Resampling {
  /** Each run left out once; null where there are too few. */
  readonly left: readonly Uint8Array[] | null
  readonly resamples: Resamples | null
  readonly seed: number
  /** How often the intervals hold the true value of such runs, by `designCoverage`; NaN where it was not asked for. */
  readonly coverage: { readonly jackknife: number; readonly bootstrap: number }
}

/** The resamples of the runs of a series. @throws KineticsError where the seed is no whole number from 0 on */
export const resamplingOf = (series: SeriesAtLevels, seed: number): Resampling => {
  const programmeGroup = series.runs.map((run) => run.programmeGroup)
  return {
    left: deleteOne(programmeGroup),
    resamples: resamplesOf(programmeGroup, seed),
    seed,
    coverage: { jackknife: Number.NaN, bootstrap: Number.NaN },
  }
}

/** The same with the coverage, from the temperatures at the level nearest the middle that all runs reach. @throws Cancelled */
export function withCoverage(resampling: Resampling, series: SeriesAtLevels, context: TaskContext): Resampling {
  const { left, resamples } = resampling
  const byMiddle = Array.from(series.levels, (level, i) => ({ i, distance: Math.abs(level - 0.5) })).toSorted(
    (a, b) => a.distance - b.distance,
  )
  const reached = byMiddle.find(({ i }) => series.runs.every((run) => Number.isFinite(run.temperature_K[i])))
  if (reached === undefined || (left === null && resamples === null)) return resampling
  const x = series.runs.map((run) => 1 / (run.temperature_K[reached.i] as number))
  return { ...resampling, coverage: designCoverage(x, left, resamples, context.checkCancelled) }
}

/** Jackknife and bootstrap over the runs, each where there are runs enough for it. @throws Cancelled */
export function intervalsByResampling(
  series: SeriesAtLevels,
  result: IsoconversionalResult,
  resampling: Resampling,
  context: TaskContext,
): IntervalResult[] {
  const { left, resamples, seed, coverage } = resampling
  const intervals: IntervalResult[] = []
  if (left === null && resamples === null) return intervals
  const energies = resampledEnergies(series, result, context)
  const ofEach = (times: readonly ArrayLike<number>[]): Float64Array[] =>
    times.map((taken) => {
      context.checkCancelled()
      return energies(taken)
    })
  const atLevels = (
    resampled: readonly Float64Array[],
    intervalOf: (energies: Float64Array, Ea: number) => ResampledInterval,
  ): readonly ResampledInterval[] =>
    Array.from(result.Ea, (Ea, level) => {
      context.checkCancelled()
      return intervalOf(
        Float64Array.from(resampled, (row) => row[level] ?? Number.NaN),
        Ea,
      )
    })

  if (left !== null) {
    const found = atLevels(ofEach(left), (without, Ea) => jackknife(Ea, without))
    const note = `Each of ${left.length} runs left out once; Student's t with ${left.length - 1} degrees of freedom. Pointwise and approximate${holds(coverage.jackknife)}.`
    intervals.push(intervalResult('jackknife', columnsOf(found), note, result.Ea, () => 'energy-needs-every-run'))
  }
  if (resamples !== null) {
    const found = atLevels(ofEach(resamples.times), (values) => bootstrap(values, resamples))
    const note = `${howDrawn(resamples, series.runs.length, seed)} 2.5 and 97.5 % points. Pointwise and approximate${holds(coverage.bootstrap)}.`
    intervals.push(intervalResult('bootstrap', columnsOf(found), note, result.Ea, () => 'resamples-without-energy'))
  }
  return intervals
}

const columnsOf = (intervals: readonly ResampledInterval[]) => ({
  standardUncertainty: intervals.map((interval) => interval.standardUncertainty),
  lower95: intervals.map((interval) => interval.lower95),
  upper95: intervals.map((interval) => interval.upper95),
})

/** A simulation knows a share to about a hundredth. */
function holds(coverage: number): string {
  if (Number.isNaN(coverage)) return ''
  const share = `${(100 * coverage).toFixed(0)} %`
  const much =
    coverage < 0.92
      ? `, and too narrow: it holds the true value in about ${share} of cases, not 95 %`
      : `: it holds the true value in about ${share} of cases`
  return `${much} (simulation with these runs' temperatures, errors independent and alike)`
}

function howDrawn({ times, made, droppedShare }: Resamples, runs: number, seed: number): string {
  const dropped = `${(100 * droppedShare).toFixed(1)} % of the probability, resamples of fewer than three distinct programmes, was dropped`
  return made === 'every'
    ? `All ${times.length} distinct resamples of ${runs} runs, each with its probability; ${dropped}.`
    : `${times.length} resamples of ${runs} runs drawn with seed ${seed}; ${dropped}.`
}
