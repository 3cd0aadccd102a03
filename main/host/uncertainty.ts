import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { MethodId } from '../../shared-kinetics/isoconversional/result.ts'
import { drawPlan, drawsToBeginWith, noteOnFewerDraws, type DrawOrder } from '../../shared-kinetics/tasks/draw-uncertainty.ts'
import type { IntervalResult, UncertaintyResult } from '../../shared-kinetics/tasks/study-result.ts'
import { drawInSlices } from './draw-slices.ts'
import type { EventHub } from './event-hub.ts'
import type { TaskPool } from './host-tasks.ts'
import { inLanes } from './in-lanes.ts'
import type { Workspace } from './workspace.ts'

/** The intervals of the open study that take longer than an evaluation: worked out once a revision, shared by all who ask. */
export interface Uncertainty {
  /** Rejects with `Cancelled` when a newer revision is asked for, or `cancel` is called. */
  of(revision: number): Promise<UncertaintyResult>
  /** Stops work on any other revision: its workers are wanted. */
  cancelUnless(revision: number): void
  cancel(): void
}

/** @param clock - in ms */
export function createUncertainty(
  workspace: Workspace,
  pool: TaskPool,
  events: EventHub,
  clock: () => number = () => performance.now(),
): Uncertainty {
  let current: { readonly revision: number; readonly result: Promise<UncertaintyResult>; readonly stop: AbortController } | null = null

  const estimate = async (signal: AbortSignal): Promise<UncertaintyResult> => {
    const { document } = workspace.session
    const { uncertainty } = document
    const reportAll = events.progressOf('uncertainty')
    // A worker may still tell of work that nobody waits for.
    const report: typeof reportAll = (...progress) => {
      if (!signal.aborted) reportAll(...progress)
    }
    const columns = new Map(document.runs.map((run) => [run.columnsKey, workspace.study.columns.get(run.columnsKey)]))
    const study = { runs: document.runs, settings: document.settings, importNotes: document.importNotes }
    // Resampling is the first half of the way, drawing the second.
    const { result, order } = await pool.run(
      'estimate-uncertainty',
      { study, columns, uncertainty },
      { signal, progress: (done, total) => report(done, 2 * total, 'resampled runs') },
    )
    if (order.models.length === 0) return result
    const { draws: asked, seed } = uncertainty
    const { draws, orders } = drawPlan(order, asked)
    const intervals = new Map<MethodId, IntervalResult>()
    const intervalOf = async (alone: DrawOrder, shares: readonly (readonly Float64Array[])[]): Promise<void> => {
      for (const [method, interval] of await pool.run('intervals-of-draws', { order: alone, shares, seed }, { signal }))
        intervals.set(method, { ...interval, note: interval.note + noteOnFewerDraws(draws, asked) })
    }
    const all = draws * orders.length
    for (const [before, some] of orders.entries()) {
      const shares = await drawInSlices({
        draws,
        first: drawsToBeginWith(some),
        clock,
        draw: async (from, to, progress) => pool.run('draw-energies', { ...some, range: { seed, from, to } }, { signal, progress }),
        report: (done) => {
          report(all + before * draws + done, 2 * all, 'measured sources')
        },
      })
      const orderOfEach = some.models.map((model) => ({ ...some, models: [model] }))
      let next = 0
      await inLanes(() => {
        const m = next++
        const alone = orderOfEach[m]
        return alone === undefined
          ? null
          : intervalOf(
              alone,
              shares.map((share) => share.slice(m, m + 1)),
            )
      })
    }
    const profiles = result.profiles.map((profile) => {
      const interval = intervals.get(profile.method)
      return interval === undefined ? profile : { ...profile, intervals: [...profile.intervals, interval] }
    })
    return { ...result, draws, profiles }
  }

  const start = (revision: number): Promise<UncertaintyResult> => {
    current?.stop.abort()
    const stop = new AbortController()
    const mine = { revision, result: estimate(stop.signal), stop }
    current = mine
    // A failure is not remembered: asking again tries again. What else was running of it is for nothing.
    mine.result.catch(() => {
      stop.abort()
      if (current === mine) current = null
    })
    return mine.result
  }

  const cancel = (): void => {
    current?.stop.abort()
    current = null
  }

  return {
    of: async (revision) => {
      if (revision !== workspace.session.revision) throw new Cancelled()
      return current?.revision === revision ? current.result : start(revision)
    },
    cancelUnless: (revision) => {
      if (current !== null && current.revision !== revision) cancel()
    },
    cancel,
  }
}
