import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { RunColumns } from '../../shared-kinetics/series/run.ts'
import { conversionOrders, type ConversionOrder } from '../../shared-kinetics/tasks/conversion-order.ts'
import type { ConvertedRun } from '../../shared-kinetics/tasks/convert-run.ts'
import type { StudyInput } from '../../shared-kinetics/tasks/study-input.ts'
import type { TaskPool } from './host-tasks.ts'

/** The runs of a study on their way to conversion, in whichever workers are free: none waits for another. */
export interface Conversions {
  /** Begins with a run before anybody asks for it: the conversion it most likely gets is there when the last file is read. */
  begin(study: StudyInput, columns: RunColumns): void
  /**
   * What the worker that evaluates does not have yet, by the keys of the orders. A single run is left to that worker.
   * @throws Cancelled
   */
  missing(
    study: StudyInput,
    columns: ReadonlyMap<string, RunColumns>,
    signal: AbortSignal,
    progress: (done: number, total: number) => void,
  ): Promise<ReadonlyMap<string, ConvertedRun>>
  /** They lie in the cache of the worker that evaluates. Should it lose them, it converts the runs itself. */
  handedOver(keys: Iterable<string>): void
}

export function createConversions(pool: TaskPool): Conversions {
  const begun = new Map<string, Promise<ConvertedRun | null>>()
  const handedOver = new Set<string>()

  const start = async (order: ConversionOrder, columns: RunColumns, signal?: AbortSignal): Promise<ConvertedRun | null> => {
    const running = pool.run('convert-run', { order, columns }, signal === undefined ? {} : { signal })
    begun.set(order.key, running)
    // Whoever asks for it hears of a failure, and the next one tries again.
    running.catch(() => {
      if (begun.get(order.key) === running) begun.delete(order.key)
    })
    return running
  }

  const convert = async (order: ConversionOrder, columns: RunColumns, signal: AbortSignal): Promise<ConvertedRun | null> => {
    try {
      return await (begun.get(order.key) ?? start(order, columns, signal))
    } catch (error) {
      // It was another's, who gave it up.
      if (error instanceof Cancelled && !signal.aborted) return convert(order, columns, signal)
      throw error
    }
  }

  return {
    begin: (study, columns) => {
      for (const order of conversionOrders(study)) {
        if (!handedOver.has(order.key) && !begun.has(order.key)) void start(order, columns).catch(() => undefined)
      }
    },
    missing: async (study, columns, signal, progress) => {
      const orders = conversionOrders(study).filter(({ key }) => !handedOver.has(key))
      const wanted = new Set(orders.map(({ key }) => key))
      for (const key of begun.keys()) if (!wanted.has(key)) begun.delete(key)
      if (orders.length < 2) return new Map()
      let done = 0
      const converted = new Map<string, ConvertedRun>()
      await Promise.all(
        orders.map(async (order) => {
          const measured = columns.get(order.info.columnsKey)
          const run = measured === undefined ? null : await convert(order, measured, signal)
          if (run !== null) converted.set(order.key, run)
          done += 1
          progress(done, orders.length)
        }),
      )
      return converted
    },
    handedOver: (keys) => {
      for (const key of keys) {
        handedOver.add(key)
        begun.delete(key)
      }
    },
  }
}
