import { parentPort, threadId } from 'node:worker_threads'
import type { ToWorker } from '../../../shared-kinetics/contract/task-messages.ts'
import { KineticsError } from '../../../shared-kinetics/errors.ts'
import { answerTask } from '../answer-task.ts'
import { sampleTasks } from './host-testing.ts'

// For the pool's tests: the real protocol in a real thread, with tasks that do what goes wrong. A file's name says what happens.
const tasks = sampleTasks()
const port = parentPort
port?.on('message', (message: ToWorker) => {
  void answerTask(
    {
      ...tasks,
      // Says which thread it ran in.
      'evaluate-study': async (input, context) => ({ ...(await tasks['evaluate-study'](input, context)), levels: [threadId] }),
      'import-file': (input, context) => {
        if (input.fileName === 'exit') process.exit(3)
        if (input.fileName === 'throw later') setTimeout(() => void Promise.reject(new Error('lost its way')))
        context.progress(0, 1)
        if (input.fileName === 'throw later' || input.fileName === 'hang') return new Promise(() => undefined)
        if (input.fileName === 'fault') throw new TypeError('a bug')
        if (input.fileName === 'mistake') throw new KineticsError('bad-option', 'A mistake.', { where: 'here' })
        if (input.fileName === 'spin') {
          // Never gives the thread back: only the flag on shared memory can reach it.
          for (let i = 0; ; i += 1) {
            context.progress(i, Number.MAX_SAFE_INTEGER)
            context.checkCancelled()
          }
        }
        if (input.fileName === 'write back') input.bytes[0] = 42
        return tasks['import-file'](input, context)
      },
    },
    message,
    (answer) => {
      port.postMessage(answer)
    },
  )
})
