import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { UncertaintyResult } from '../../shared-kinetics/tasks/study-result.ts'
import type { EventHub } from './event-hub.ts'
import type { TaskPool } from './host-tasks.ts'
import type { Workspace } from './workspace.ts'

/** The intervals of the open study that take longer than an evaluation: worked out once a revision, shared by all who ask. */
export interface Uncertainty {
  /** Rejects with `Cancelled` when a newer revision is asked for, or `cancel` is called. */
  of(revision: number): Promise<UncertaintyResult>
  /** Stops work on any other revision: its workers are wanted. */
  cancelUnless(revision: number): void
  cancel(): void
}

/** Draws are shared out to so many workers. */
const shares = 2

export function createUncertainty(workspace: Workspace, pool: TaskPool, events: EventHub): Uncertainty {
  let current: { readonly revision: number; readonly result: Promise<UncertaintyResult>; readonly stop: AbortController } | null = null

  const estimate = async (signal: AbortSignal): Promise<UncertaintyResult> => {
    const { document } = workspace.session
    const { uncertainty } = document
    const report = events.progressOf('uncertainty')
    const columns = new Map(document.runs.map((run) => [run.columnsKey, workspace.study.columns.get(run.columnsKey)]))
    const study = { runs: document.runs, settings: document.settings, importNotes: document.importNotes }
    // Resampling is the first half of the way, drawing the second.
    const { result, order } = await pool.run(
      'estimate-uncertainty',
      { study, columns, uncertainty },
      { signal, progress: (done, total) => report(done, 2 * total, 'resampled runs') },
    )
    if (order.models.length === 0) return result
    const drawn = Array.from({ length: shares }, () => 0)
    const { draws, seed } = uncertainty
    const parts = await Promise.all(
      drawn.map(async (_, share) => {
        const range = { seed, from: Math.floor((share * draws) / shares), to: Math.floor(((share + 1) * draws) / shares) }
        const progress = (done: number): void => {
          drawn[share] = done
          const all = drawn.reduce((sum, some) => sum + some, 0)
          report(draws + all, 2 * draws, 'measured sources')
        }
        return pool.run('draw-energies', { ...order, range }, { signal, progress })
      }),
    )
    const intervals = await pool.run('intervals-of-draws', { order, shares: parts, seed }, { signal })
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
    // A failure is not remembered: asking again tries again.
    mine.result.catch(() => {
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
