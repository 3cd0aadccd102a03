import { readAtLevels, type LevelsRead } from '../conversion/levels.ts'
import { KineticsError } from '../errors.ts'
import type { IsoconversionalResult, MethodInfo, TaskContext } from '../isoconversional/result.ts'
import type { LeftOut } from '../review/review-input.ts'
import { programmeGroups, type RunToGroup } from '../series/programme-groups.ts'
import type { RunColumns, RunInfo, SignalInfo } from '../series/run.ts'
import type { RunAtLevels, SeriesAtLevels } from '../series/series-at-levels.ts'
import type { SignalQuantity } from '../series/signal-quantity.ts'
import { column, type Column } from '../units/quantity.ts'
import { applyMethod, chooseMethods } from './apply-methods.ts'
import { chooseSignal } from './choose-signal.ts'
import { conversionOrder, type ConversionOrder } from './conversion-order.ts'
import { convertRun, type ConvertedRun } from './convert-run.ts'
import { memoryOf, remember, type EvaluationCache } from './memo.ts'
import type { StudyInput } from './study-input.ts'
import { withoutLateHolds } from './without-late-holds.ts'

/** A study's runs converted, read at the levels and put together, and the methods that are to be run on them. */
export interface StudySeries {
  /** The signal that is analysed. */
  readonly signal: SignalQuantity | null
  readonly toChooseFrom: readonly SignalQuantity[]
  /** Slowest programme first. */
  readonly runs: readonly GroupedRun[]
  readonly unusable: readonly { readonly info: RunInfo; readonly error: KineticsError }[]
  /** Its runs in the order of `runs`. */
  readonly series: SeriesAtLevels
  readonly chosen: readonly MethodInfo[]
  readonly leftOut: readonly LeftOut[]
  /** A method's result on the series; worked out once for a cache. */
  readonly resultOf: (method: MethodInfo) => IsoconversionalResult
}

/**
 * Raw columns of a study to its series. Each step is remembered in `cache` under what it depends on. A run that cannot be used is left out with its reason.
 *
 * @param columns - by `RunInfo.columnsKey`
 * @param step - called after each run
 * @throws KineticsError `bad-levels`; Cancelled
 */
export function seriesOfStudy(
  study: StudyInput,
  columns: ReadonlyMap<string, RunColumns | undefined>,
  context: TaskContext,
  cache: EvaluationCache,
  step: () => void = () => undefined,
): StudySeries {
  const { runs: all, settings } = study
  checkLevels(settings.levels)
  const used = all.filter((run) => run.use)
  const { signal, toChooseFrom } = chooseSignal(used, settings.signal)
  const read: ReadRun[] = []
  const unusable: { info: RunInfo; error: KineticsError }[] = []
  for (const info of used) {
    context.checkCancelled()
    try {
      if (signal !== null) read.push(readRun(info, columns.get(info.columnsKey), signal, study, cache, context.checkCancelled))
    } catch (error) {
      if (!(error instanceof KineticsError)) throw error
      unusable.push({ info, error })
    }
    step()
  }
  const runs = inOrderOfProgramme(read)
  const series = seriesAtLevels(runs, settings.levels)
  const { chosen, leftOut } = withoutLateHolds(
    chooseMethods(
      settings.methods,
      runs.map((run) => run.converted.told.programme.kind),
    ),
    runs.map(({ info, converted }) => ({ label: info.label, conversionBeforeHold: converted.conversionBeforeHold })),
  )
  const seriesKey = JSON.stringify(runs.map((run) => [run.key, run.group]))
  return {
    signal,
    toChooseFrom,
    runs,
    unusable,
    series,
    chosen: runs.length === 0 ? [] : chosen,
    leftOut: runs.length === 0 ? [] : leftOut,
    resultOf: (info) => {
      context.checkCancelled()
      return remember(cache, `method ${info.id} ${methodVersion} ${seriesKey}`, () => applyMethod(info, series, context), memoryOf)
    },
  }
}

/** Bump when a method or `readAtLevels` gives other numbers: remembered steps of another version are not used. */
const methodVersion = 3
const readVersion = 1

/** A used run: converted, and read at the levels. */
export interface ReadRun {
  readonly info: RunInfo
  readonly signal: SignalInfo
  readonly order: ConversionOrder
  readonly converted: ConvertedRun
  readonly levels: LevelsRead
  /** Names everything that the two before depend on. */
  readonly key: string
}

export interface GroupedRun extends ReadRun {
  readonly group: number
}

function readRun(
  info: RunInfo,
  columns: RunColumns | undefined,
  quantity: SignalQuantity,
  study: StudyInput,
  cache: EvaluationCache,
  checkCancelled: () => void,
): ReadRun {
  if (columns === undefined) {
    throw new KineticsError('unknown-run', `The measured columns of ${info.label} are not here. Add its file again.`, { run: info.label })
  }
  const order = conversionOrder(info, quantity, study)
  const converted = remember(cache, order.key, () => convertRun(info, columns, order.settings, checkCancelled), memoryOf)
  const { levels: asked } = study.settings
  const key = JSON.stringify([order.key, 'levels', readVersion, asked])
  const levels = remember(cache, key, () => readAtLevels(converted.converted.curve, asked, checkCancelled), memoryOf)
  return { info, signal: order.signal, order, converted, levels, key }
}

/** Slow programmes first; replicates in the order in which the study has them. */
function inOrderOfProgramme(read: readonly ReadRun[]): GroupedRun[] {
  const toGroup = read.map(({ converted: { told, converted, rows, range } }): RunToGroup => {
    const { first, last } = converted.curve.reaction
    return {
      programme: told.programme,
      reaction: {
        time_s: column(rows.time_s.subarray(range.first + first, range.first + last + 1), 's'),
        temperature_K: column(rows.temperature_K.subarray(range.first + first, range.first + last + 1), 'K'),
      },
      meanHeatingRate_K_per_s: told.meanHeatingRate_K_per_s,
      meanTemperature_K: told.meanTemperature_K,
    }
  })
  const groups = programmeGroups(toGroup)
  return read.map((run, i) => ({ ...run, group: itemAt(groups, i) })).sort((a, b) => a.group - b.group)
}

/** The same times counted from `start`. */
function from(start: number, time_s: Column<'s'>): Column<'s'> {
  if (start === 0) return time_s
  const counted = new Float64Array(time_s.length)
  for (let i = 0; i < counted.length; i++) counted[i] = (time_s[i] as number) - start
  return column(counted, 's')
}

function seriesAtLevels(runs: readonly GroupedRun[], levels: readonly number[]): SeriesAtLevels {
  return {
    levels: column(Float64Array.from(levels), '1'),
    runs: runs.map(({ converted, levels: read, group }): RunAtLevels => {
      const { time_s, temperature_K } = converted.converted.curve
      const start = time_s[0] ?? 0
      return {
        programme: converted.told.programme,
        programmeGroup: group,
        heatingRateSpread: converted.told.heatingRateSpread,
        history: { time_s: from(start, time_s), temperature_K },
        time_s: from(start, read.time_s),
        temperature_K: read.temperature_K,
        reactionRate_per_s: read.reactionRate_per_s,
      }
    }),
  }
}

function checkLevels(levels: readonly number[]): void {
  const ascending = levels.every((level, i) => level > (levels[i - 1] ?? 0) && level < 1)
  if (levels.length === 0 || !ascending) {
    throw new KineticsError('bad-levels', 'Levels of conversion lie between 0 and 1 and ascend, each named once; e.g. 0.05, 0.1, 0.15.', {
      levels: levels.length,
    })
  }
}

function itemAt<Item>(items: readonly Item[], i: number): Item {
  const item = items[i]
  if (item === undefined) throw new RangeError(`no item ${i}`)
  return item
}
