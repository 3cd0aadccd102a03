import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { describeFailure } from '../../shared-kinetics/contract/failure.ts'
import type { FromWorker, ToWorker } from '../../shared-kinetics/contract/task-messages.ts'
import type { TaskContext } from '../../shared-kinetics/isoconversional/result.ts'
import type { TaskTable } from './host-tasks.ts'

/** A task reports progress at most this often; a loop may call it every round. */
const progressInterval_ms = 50

type AnyTask = (input: unknown, context: TaskContext) => unknown

/** Runs one task as the protocol asks: its progress, then its answer or its failure, through `post`. Never rejects. */
export async function answerTask(tasks: TaskTable, message: ToWorker, post: (message: FromWorker) => void): Promise<void> {
  const { id, task, input, cancelFlag } = message
  let lastReport = Number.NEGATIVE_INFINITY
  const context: TaskContext = {
    checkCancelled: () => {
      if (Atomics.load(cancelFlag, 0) !== 0) throw new Cancelled()
    },
    progress: (done, total) => {
      const now = performance.now()
      if (now - lastReport < progressInterval_ms && done < total) return
      lastReport = now
      post({ kind: 'progress', id, done, total })
    },
  }
  try {
    context.checkCancelled()
    const run = Object.hasOwn(tasks, task) ? (tasks as Readonly<Record<string, unknown>>)[task] : undefined
    if (typeof run !== 'function') throw new KineticsError('unknown-task', `There is no task named ${task}.`, { task })
    const value = await (run as AnyTask)(input, context)
    context.checkCancelled()
    post({ kind: 'answer', id, value })
  } catch (error) {
    post({ kind: 'failure', id, failure: describeFailure(error) })
  }
}
