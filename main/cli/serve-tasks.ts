import type { MessagePort } from 'node:worker_threads'
import type { ToWorker } from '../../shared-kinetics/contract/task-messages.ts'
import { answerTask } from '../host/answer-task.ts'
import { createTaskTable } from '../host/task-table.ts'

/** The command line as the helper thread of another: answers tasks as they come. */
export function serveTasks(port: MessagePort): void {
  const tasks = createTaskTable()
  port.on('message', (message: ToWorker) => {
    void answerTask(tasks, message, (answer) => {
      port.postMessage(answer)
    })
  })
}
