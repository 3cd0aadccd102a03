/** What the command line touches of the process around it; tests put their own in place. */
export interface CliIo {
  readonly stdout: (text: string) => void
  readonly stderr: (text: string) => void
  /** Progress is written only where somebody watches. */
  readonly stderrIsTerminal: boolean
  readonly version: string
  /** Where the built worker and the built pages lie; only an entry file of the program knows. */
  readonly workerUrl: URL
  readonly rendererUrl: URL
}

export const exitCodes = { done: 0, inputUnusable: 1, wordsOff: 2, stopFinding: 3 } as const

/** The words of a call are off: exit 2. */
export class UsageError extends Error {
  override readonly name = 'UsageError'
}

/** The input cannot be used: exit 1. The message says which file, where and what to do. */
export class InputError extends Error {
  override readonly name = 'InputError'
}
