import type { HostEvent } from '../../shared-kinetics/contract/host-api.ts'

/** Progress is told at most this often for each kind of work; the last step is always told. */
export const progressInterval_ms = 100

/** What the host tells every window. A listener that throws harms neither the others nor the work. */
export interface EventHub {
  subscribe(listener: (event: HostEvent) => void): () => void
  send(event: HostEvent): void
  /** A report of progress for one piece of work, thinned out in time. */
  progressOf(work: 'import' | 'evaluate' | 'uncertainty'): (done: number, total: number, what: string) => void
}

export function createEventHub(now: () => number): EventHub {
  const listeners = new Set<(event: HostEvent) => void>()
  const send = (event: HostEvent): void => {
    for (const listener of listeners) {
      try {
        listener(event)
      } catch {
        listeners.delete(listener)
      }
    }
  }
  return {
    subscribe: (listener) => {
      listeners.add(listener)
      return () => {
        listeners.delete(listener)
      }
    },
    send,
    progressOf: (work) => {
      let last = Number.NEGATIVE_INFINITY
      return (done, total, what) => {
        if (now() - last < progressInterval_ms && done < total) return
        last = now()
        send({ kind: 'progress', work, done, total, what })
      }
    },
  }
}
