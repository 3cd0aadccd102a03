import type { Worker } from 'node:worker_threads'
import { errorOfFailure } from '../../shared-kinetics/contract/failure.ts'
import type { FromWorker, ToWorker } from '../../shared-kinetics/contract/task-messages.ts'
import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { TaskAnswer, TaskName, TaskOptions, TaskPool, TaskTable } from './host-tasks.ts'
import { createInProcessPool } from './in-process-pool.ts'

/** What the helper does while this thread is busy with the files. */
const helped: ReadonlySet<string> = new Set<TaskName>(['convert-run'])

/**
 * The tasks of this thread, with conversions in one helper thread beside it: runs are converted while the next files are read. Orders are posted as they come, since
 * this thread, busy as it is, could not hand out the next one. What a helper that dies leaves undone is done here.
 */
export function createHelpedPool(tasks: TaskTable, helper: Worker): TaskPool {
  const here = createInProcessPool(tasks)
  const waiting = new Map<number, (message: FromWorker | null) => void>()
  let isThere = true
  let lastId = 0

  const lose = (): void => {
    isThere = false
    for (const settle of waiting.values()) settle(null)
    waiting.clear()
  }
  helper.on('message', (message: FromWorker) => {
    if (message.kind !== 'answer' && message.kind !== 'failure') return
    waiting.get(message.id)?.(message)
    waiting.delete(message.id)
  })
  helper.on('error', lose)
  helper.on('exit', lose)

  const ask = async (task: TaskName, input: unknown, { signal }: TaskOptions): Promise<FromWorker | null> => {
    const cancelFlag = new Int32Array(new SharedArrayBuffer(4))
    lastId += 1
    const message: ToWorker = { kind: 'run', id: lastId, task, input, cancelFlag }
    const cancel = (): void => {
      Atomics.store(cancelFlag, 0, 1)
    }
    signal?.addEventListener('abort', cancel)
    try {
      return await new Promise<FromWorker | null>((resolve) => {
        waiting.set(message.id, resolve)
        helper.postMessage(message, [])
      })
    } finally {
      signal?.removeEventListener('abort', cancel)
    }
  }

  return {
    run: async <Name extends TaskName>(
      name: Name,
      input: Parameters<TaskPool['run']>[1],
      options: TaskOptions = {},
    ): Promise<TaskAnswer<Name>> => {
      if (options.signal?.aborted === true) throw new Cancelled()
      const answer = isThere && helped.has(name) ? await ask(name, input, options) : null
      if (answer?.kind === 'answer') return answer.value as TaskAnswer<Name>
      if (answer?.kind === 'failure') throw errorOfFailure(answer.failure)
      return here.run(name, input, options)
    },
    close: async () => {
      isThere = false
      await here.close()
      await helper.terminate()
    },
  }
}
