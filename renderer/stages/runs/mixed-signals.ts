import type { StudyChange } from '../../../shared-kinetics/contract/study-change.ts'
import type { StudyDocument } from '../../../shared-kinetics/contract/study-document.ts'
import type { RunInfo, SignalQuantity } from '../../../shared-kinetics/contract/study-result.ts'

/** Used runs that hold one signal, and those that do not. */
export interface SignalHolders {
  readonly signal: SignalQuantity
  readonly having: readonly RunInfo[]
  readonly lacking: readonly RunInfo[]
}

/** Who holds which signal, where no signal is in all used runs; empty where one is. */
export function mixedSignals(document: StudyDocument): readonly SignalHolders[] {
  const used = document.runs.filter((run) => run.use)
  const signals = [...new Set(used.flatMap((run) => run.signals.map((one) => one.quantity)))]
  const holders = signals.map((signal): SignalHolders => {
    const has = (run: RunInfo): boolean => run.signals.some((one) => one.quantity === signal)
    return { signal, having: used.filter(has), lacking: used.filter((run) => !has(run)) }
  })
  return holders.some(({ lacking }) => lacking.length === 0) ? [] : holders
}

/** The changes after which the runs with one signal are analysed by it, and the others are left out. */
export function keepOnly({ signal, having, lacking }: SignalHolders, asked: SignalQuantity | null): readonly StudyChange[] {
  // Where the kept runs hold nothing else it is chosen by itself, also when the series grows later.
  const followsByItself = asked === null && having.every((run) => run.signals.every((one) => one.quantity === signal))
  return [
    ...lacking.map((run): StudyChange => ({ kind: 'use-run', runId: run.id, use: false })),
    ...(asked === signal || followsByItself ? [] : [{ kind: 'set-signal', signal } as const]),
  ]
}
