import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { MethodId } from '../../shared-kinetics/isoconversional/result.ts'
import { drawPlan, noteOnFewerDraws } from '../../shared-kinetics/tasks/draw-uncertainty.ts'
import type { IntervalResult, UncertaintyResult } from '../../shared-kinetics/tasks/study-result.ts'
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

/** Slices at work at once. */
const atOnce = 2
/** A tenth of a second or so of a common study: imports, saves and evaluations are served between two slices. */
const drawsInSlice = 100

export function createUncertainty(workspace: Workspace, pool: TaskPool, events: EventHub): Uncertainty {
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
    const all = draws * orders.length
    for (const [before, some] of orders.entries()) {
      const shares = await drawInSlices(
        draws,
        async (from, to, progress) => pool.run('draw-energies', { ...some, range: { seed, from, to } }, { signal, progress }),
        (done) => {
          report(all + before * draws + done, 2 * all, 'measured sources')
        },
      )
      for (const [method, interval] of await pool.run('intervals-of-draws', { order: some, shares, seed }, { signal }))
        intervals.set(method, { ...interval, note: interval.note + noteOnFewerDraws(draws, asked) })
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

/** The draws of all slices, in order. The next slice goes to the pool only when one is done, behind whatever else has come to wait there. */
async function drawInSlices<Slice>(
  draws: number,
  draw: (from: number, to: number, progress: (done: number) => void) => Promise<Slice>,
  report: (done: number) => void,
): Promise<Slice[]> {
  const slices: Slice[] = []
  const drawn: number[] = []
  let next = 0
  let failed = false
  const drawOn = async (): Promise<void> => {
    while (!failed && next * drawsInSlice < draws) {
      const slice = next++
      const from = slice * drawsInSlice
      const to = Math.min(draws, from + drawsInSlice)
      const tell = (done: number): void => {
        drawn[slice] = done
        report(drawn.reduce((sum, some) => sum + some, 0))
      }
      try {
        slices[slice] = await draw(from, to, tell)
      } catch (error) {
        failed = true
        throw error
      }
      tell(to - from)
    }
  }
  await Promise.all(Array.from({ length: atOnce }, drawOn))
  return slices
}
