import type { RunInfo } from '../series/run.ts'
import { signalQuantities, type SignalQuantity } from '../series/signal-quantity.ts'

export interface ChosenSignal {
  readonly signal: SignalQuantity | null
  /** Signals that every run has, in the order of choice. */
  readonly toChooseFrom: readonly SignalQuantity[]
}

/** The signal asked for; else the first that every run has; else, so that a run without it can be named, the first that most runs have. */
export function chooseSignal(runs: readonly RunInfo[], asked: SignalQuantity | null): ChosenSignal {
  const having = (quantity: SignalQuantity): number =>
    runs.filter((run) => run.signals.some((signal) => signal.quantity === quantity)).length
  const toChooseFrom = runs.length === 0 ? [] : signalQuantities.filter((quantity) => having(quantity) === runs.length)
  const commonest = signalQuantities.reduce((best, quantity) => (having(quantity) > having(best) ? quantity : best))
  const signal = runs.length === 0 ? null : (asked ?? toChooseFrom[0] ?? commonest)
  return { signal, toChooseFrom }
}
