import { Cancelled } from '../../shared-kinetics/errors.ts'
import { errorOfFailure } from '../../shared-kinetics/contract/failure.ts'
import type { FromWorker } from '../../shared-kinetics/contract/task-messages.ts'
import { answerTask } from './answer-task.ts'
import type { TaskAnswer, TaskPool, TaskTable } from './host-tasks.ts'

/** The same protocol with no thread behind it: for tests, and where a single short run does not earn a worker. */
export function createInProcessPool(tasks: TaskTable): TaskPool {
  const running = new Set<Int32Array>()
  let closed = false
  let lastId = 0
  return {
    run: async (name, input, options = {}) => {
      if (closed || options.signal?.aborted === true) throw new Cancelled()
      const cancelFlag = new Int32Array(new SharedArrayBuffer(4))
      const cancel = (): void => {
        Atomics.store(cancelFlag, 0, 1)
      }
      running.add(cancelFlag)
      options.signal?.addEventListener('abort', cancel)
      lastId += 1
      try {
        // A turn of the event loop first, as with a worker: a cancel that follows at once is seen.
        await new Promise((resolve) => setImmediate(resolve))
        let outcome: FromWorker | null = null
        await answerTask(tasks, { kind: 'run', id: lastId, task: name, input, cancelFlag }, (message) => {
          if (message.kind === 'progress') options.progress?.(message.done, message.total)
          else outcome = message
        })
        return valueOf(outcome) as TaskAnswer<typeof name>
      } finally {
        options.signal?.removeEventListener('abort', cancel)
        running.delete(cancelFlag)
      }
    },
    close: async () => {
      closed = true
      for (const flag of running) Atomics.store(flag, 0, 1)
      await Promise.resolve()
    },
  }
}

function valueOf(outcome: FromWorker | null): unknown {
  if (outcome?.kind === 'answer') return outcome.value
  throw outcome?.kind === 'failure' ? errorOfFailure(outcome.failure) : new Error('The task ended without an answer.')
}
