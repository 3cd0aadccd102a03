import type { RunColumns, RunInfo } from '../series/run.ts'
import { seriesOfStudy } from '../tasks/series-of-study.ts'

/** Milliseconds on the clock of the process. */
export interface PhaseTimes {
  /** Columns to conversion, to the runs read at the levels. */
  readonly conversion_ms: number
  /** All methods of an ordinary analysis with their intervals: the first call in the process, and the median of the calls that follow. */
  readonly methods: { readonly names: readonly string[]; readonly first_ms: number; readonly warm_ms: number }
}

export interface RunRead {
  readonly info: RunInfo
  readonly columns: RunColumns
}

const levels = Array.from({ length: 99 }, (_, i) => (i + 1) / 100)
const warmCalls = 21
const context = { checkCancelled: (): void => undefined, progress: (): void => undefined }

/**
 * Times the phases of an analysis with 99 levels in this process, the first call being cold.
 *
 * @param clock - milliseconds
 */
export function phases(runs: readonly RunRead[], clock: () => number): PhaseTimes {
  const columns = new Map(runs.map((run) => [run.info.columnsKey, run.columns]))
  const settings = { signal: null, levels, methods: null, window: null, baseline: 'area-proportional', meanRange: [0.1, 0.9] } as const
  const study = { runs: runs.map(({ info }) => info), settings }
  const cache = new Map()
  const start = clock()
  const first = seriesOfStudy(study, columns, context, cache)
  const conversion_ms = clock() - start
  // The conversion is remembered, the results of the methods are forgotten before each call.
  const converted = new Map(cache)
  const calls = Array.from({ length: 1 + warmCalls }, (_, call) => {
    const { chosen, resultOf } = call === 0 ? first : seriesOfStudy(study, columns, context, new Map(converted))
    const before = clock()
    for (const info of chosen) resultOf(info)
    return clock() - before
  })
  const [first_ms = Number.NaN, ...warm] = calls
  const warm_ms = warm.toSorted((a, b) => a - b)[warmCalls >> 1] ?? Number.NaN
  return { conversion_ms, methods: { names: first.chosen.map((info) => info.label), first_ms, warm_ms } }
}
