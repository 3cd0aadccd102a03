import { Worker } from 'node:worker_threads'
import { errorOfFailure } from '../../shared-kinetics/contract/failure.ts'
import type { FromWorker, ToWorker } from '../../shared-kinetics/contract/task-messages.ts'
import { Cancelled } from '../../shared-kinetics/errors.ts'
import type { TaskAnswer, TaskName, TaskOptions, TaskPool } from './host-tasks.ts'

export interface WorkerPoolOptions {
  /** The built worker-entry; only an entry file of the program knows where it lies. */
  readonly workerUrl: URL
  /** 2 by default. */
  readonly workers?: number
}

export interface WorkerPool extends TaskPool {
  /** Resolves when no worker is at work: a task that was cancelled has rejected before its worker has seen it. */
  whenIdle(): Promise<void>
}

/** A cancelled task that is still running after so long is ended with its worker. */
const cancelPatience_ms = 2000

interface Job {
  readonly message: ToWorker
  readonly options: TaskOptions
  readonly resolve: (value: unknown) => void
  readonly reject: (error: Error) => void
}

interface Slot {
  readonly worker: Worker
  /** Caches this worker has filled. */
  readonly known: Set<string>
  job: Job | null
}

/**
 * A pool of worker threads, started when first needed and not keeping the process alive while idle. A task goes to the idle
 * worker that ran its kind before, since that one's cache is warm. A worker that dies fails the task it was running; the next
 * task gets a new one.
 */
export function createWorkerPool({ workerUrl, workers = 2 }: WorkerPoolOptions): WorkerPool {
  const slots = new Set<Slot>()
  const waiting: Job[] = []
  let whoWaitsForIdle: (() => void)[] = []
  let lastId = 0
  let closed = false

  const startWorker = (): Slot => {
    const slot: Slot = { worker: new Worker(workerUrl), known: new Set(), job: null }
    slot.worker.unref()
    slot.worker.on('message', (message: FromWorker) => {
      take(slot, message)
    })
    slot.worker.on('error', (error) => {
      lose(slot, error instanceof Error ? error.message : String(error))
    })
    slot.worker.on('exit', (code) => {
      lose(slot, `it ended with code ${code}`)
    })
    slots.add(slot)
    return slot
  }

  const take = (slot: Slot, message: FromWorker): void => {
    const { job } = slot
    // A worker that is being ended keeps the process alive until it has.
    if (closed) return
    if (message.kind === 'ready' || job === null || message.id !== job.message.id) return
    if (message.kind === 'progress') {
      // Told of before the worker saw the cancel: whoever asked may be waiting for another answer by now.
      if (!isCancelled(job)) job.options.progress?.(message.done, message.total)
      return
    }
    slot.job = null
    slot.worker.unref()
    if (message.kind === 'answer') job.resolve(message.value)
    else job.reject(errorOfFailure(message.failure))
    pump()
    tellIdle()
  }

  const lose = (slot: Slot, why: string): void => {
    if (!slots.delete(slot)) return
    const unwanted = closed || (slot.job !== null && isCancelled(slot.job))
    slot.job?.reject(unwanted ? new Cancelled() : new Error(`The calculation stopped unexpectedly (${why}). Try it again.`))
    void slot.worker.terminate()
    pump()
    tellIdle()
  }

  const isIdle = (): boolean => waiting.length === 0 && [...slots].every((slot) => slot.job === null)
  const tellIdle = (): void => {
    if (!isIdle()) return
    for (const tell of whoWaitsForIdle) tell()
    whoWaitsForIdle = []
  }

  /** A task that does not look at its flag must not hold up the next one: its worker is ended, cache and all. */
  const endIfDeaf = (job: Job): void => {
    setTimeout(() => {
      for (const slot of slots) if (slot.job === job) lose(slot, 'it did not stop when asked')
    }, cancelPatience_ms).unref()
  }

  /** null: wait. A task whose own worker is busy with its kind waits for it: that one is about to be cancelled or done. */
  const slotFor = (job: Job): Slot | null => {
    const cache = cacheOf(job.message.task)
    const home = [...slots].find((slot) => slot.known.has(cache))
    if (home !== undefined && cached.has(job.message.task)) {
      if (home.job === null) return home
      // A cancelled task of any kind soon gives its worker back, or loses it.
      if (cacheOf(home.job.message.task) === cache || isCancelled(home.job)) return null
    }
    const idle = [...slots].filter((slot) => slot.job === null)
    return idle.find((slot) => slot.known.has(cache)) ?? idle[0] ?? (slots.size < workers ? startWorker() : null)
  }

  const pump = (): void => {
    if (closed) return
    for (const job of waiting.slice()) {
      const slot = slotFor(job)
      if (slot === null) continue
      waiting.splice(waiting.indexOf(job), 1)
      slot.job = job
      slot.known.add(cacheOf(job.message.task))
      slot.worker.ref()
      try {
        slot.worker.postMessage(job.message, [])
      } catch (error) {
        // Input that cannot be cloned is a fault of the caller, not of the worker.
        slot.job = null
        slot.worker.unref()
        job.reject(error instanceof Error ? error : new Error(String(error)))
      }
    }
  }

  return {
    run: async <Name extends TaskName>(name: Name, input: unknown, options: TaskOptions = {}): Promise<TaskAnswer<Name>> => {
      if (closed || options.signal?.aborted === true) throw new Cancelled()
      const cancelFlag = new Int32Array(new SharedArrayBuffer(4))
      lastId += 1
      const message: ToWorker = { kind: 'run', id: lastId, task: name, input, cancelFlag }
      const settled = new AbortController()
      const answer = new Promise<unknown>((resolve, reject) => {
        const job: Job = { message, options, resolve, reject }
        // Whoever waits is told at once; the worker gives itself back at its next look at the flag.
        const stop = (): void => {
          Atomics.store(cancelFlag, 0, 1)
          const place = waiting.indexOf(job)
          if (place < 0) endIfDeaf(job)
          else waiting.splice(place, 1)
          reject(new Cancelled())
        }
        options.signal?.addEventListener('abort', stop, { signal: settled.signal })
        waiting.push(job)
        pump()
      })
      try {
        return (await answer) as TaskAnswer<Name>
      } finally {
        settled.abort()
      }
    },
    whenIdle: async () =>
      new Promise((resolve) => {
        whoWaitsForIdle.push(resolve)
        tellIdle()
      }),
    close: async () => {
      closed = true
      for (const job of waiting.splice(0)) job.reject(new Cancelled())
      const ending = [...slots].map(async (slot) => slot.worker.terminate())
      for (const slot of slots) slot.job?.reject(new Cancelled())
      slots.clear()
      tellIdle()
      await Promise.all(ending)
    },
  }
}

const isCancelled = ({ message }: Job): boolean => Atomics.load(message.cancelFlag, 0) !== 0

/** Tasks that keep a cache in their worker and are therefore worth waiting for; both of these keep the same one. */
const cached: ReadonlySet<string> = new Set<TaskName>(['evaluate-study', 'estimate-uncertainty'])

/** What a task leaves behind in its worker. */
const cacheOf = (task: string): string => (cached.has(task) ? 'evaluation' : task)
