import { Cancelled } from '../errors.ts'
import type { TaskContext } from '../isoconversional/result.ts'

const counted = ['abs', 'exp', 'floor', 'hypot', 'log', 'max', 'min', 'sqrt'] as const

export interface WorkBetweenLooks {
  /** How often the work asked whether it was cancelled. */
  readonly looks: number
  /** The most calls of mathematical functions between two of these, the start and the end. */
  readonly most: number
  /** All calls of mathematical functions. */
  readonly all: number
}

/** Counts what is worked between two looks at the cancel flag by calls of mathematical functions, which do not depend on how fast a machine is. */
export function workBetweenLooks(work: (context: TaskContext) => void): WorkBetweenLooks {
  let [looks, most, all, since] = [0, 0, 0, 0]
  const look = (): void => {
    most = Math.max(most, since)
    since = 0
  }
  const functions: Record<(typeof counted)[number], (...values: number[]) => number> = Math
  const originals = counted.map((name) => functions[name])
  counted.forEach((name, i) => {
    const original = originals[i] as (...values: number[]) => number
    functions[name] = (...values) => {
      since++
      all++
      return original(...values)
    }
  })
  try {
    work({
      checkCancelled: () => {
        looks++
        look()
      },
      progress: () => undefined,
    })
    look()
  } finally {
    counted.forEach((name, i) => {
      functions[name] = originals[i] as (...values: number[]) => number
    })
  }
  return { looks, most, all }
}

/** A context that is cancelled at its k-th look, and how often it was looked at. */
export function cancelledAtLook(k: number): TaskContext & { readonly looks: () => number } {
  let looks = 0
  return {
    checkCancelled: () => {
      if (++looks >= k) throw new Cancelled()
    },
    progress: () => undefined,
    looks: () => looks,
  }
}
