import { parentPort } from 'node:worker_threads'
import type { FromWorker, ToWorker } from '../../shared-kinetics/contract/task-messages.ts'
import { answerTask } from './answer-task.ts'
import { createTaskTable } from './task-table.ts'

// The kinetics worker: runs the tasks of its table, one after the other, as task-messages.ts says.
const port = parentPort
if (port === null) throw new Error('worker-entry runs as a worker thread only.')

const tasks = createTaskTable()
const post = (message: FromWorker): void => {
  port.postMessage(message)
}
port.on('message', (message: ToWorker) => {
  void answerTask(tasks, message, post)
})
post({ kind: 'ready' })
