import type { Failure } from './failure.ts'

/**
 * Host to worker and back, over worker_threads. Columns travel as views on SharedArrayBuffers, so nothing is copied.
 * `cancelFlag` is one Int32 on shared memory: 0 go on, 1 stop; long loops poll it.
 */
export type ToWorker = {
  readonly kind: 'run'
  readonly id: number
  readonly task: string
  readonly input: unknown
  readonly cancelFlag: Int32Array
}

export type FromWorker =
  | { readonly kind: 'ready' }
  | { readonly kind: 'progress'; readonly id: number; readonly done: number; readonly total: number }
  | { readonly kind: 'answer'; readonly id: number; readonly value: unknown }
  | { readonly kind: 'failure'; readonly id: number; readonly failure: Failure }
