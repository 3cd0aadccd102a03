import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { StudyResult } from '../../shared-kinetics/tasks/study-result.ts'
import type { EventHub } from './event-hub.ts'
import type { TaskPool } from './host-tasks.ts'
import type { Workspace } from './workspace.ts'

/** The results of the open study: worked out once a revision, shared by all who ask. */
export interface Evaluation {
  /** Rejects with `Cancelled` when a newer revision is asked for, or `cancel` is called. */
  of(revision: number): Promise<StudyResult>
  cancel(): void
}

/** @param withoutCurves - nobody will look at a chart of the runs or of Phi(Ea) */
export function createEvaluation(workspace: Workspace, pool: TaskPool, events: EventHub, withoutCurves: boolean): Evaluation {
  let current: { readonly revision: number; readonly result: Promise<StudyResult>; readonly stop: AbortController } | null = null

  const start = (revision: number): Promise<StudyResult> => {
    current?.stop.abort()
    const stop = new AbortController()
    const { document } = workspace.session
    const columns = new Map(document.runs.map((run) => [run.columnsKey, workspace.study.columns.get(run.columnsKey)]))
    const report = events.progressOf('evaluate')
    const study = { runs: document.runs, settings: document.settings, importNotes: document.importNotes, withoutCurves }
    const input = { study, columns }
    const result = pool.run('evaluate-study', input, {
      signal: stop.signal,
      progress: (done, total) => {
        report(done, total, 'activation energy')
      },
    })
    const mine = { revision, result, stop }
    current = mine
    // A failure is not remembered: asking again tries again.
    result.catch(() => {
      if (current === mine) current = null
    })
    return result
  }

  return {
    of: async (revision) => {
      // Whoever asks for an old revision here has been overtaken between two turns of the event loop.
      if (revision !== workspace.session.revision) throw new Cancelled()
      return current?.revision === revision ? current.result : start(revision)
    },
    cancel: () => {
      current?.stop.abort()
      current = null
    },
  }
}
