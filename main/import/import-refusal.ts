import type { RefusedFile } from '../../shared-kinetics/contract/host-api.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'

/**
 * A file that cannot be used: which one, where, why, and what to do about it. Its `details` carry the same four things, so that
 * nothing is lost when it crosses a thread or a process as a plain `KineticsError`.
 */
export class ImportRefusal extends KineticsError {
  readonly fileName: string
  /** 1-based; null where no single line is at fault. */
  readonly line: number | null
  readonly reason: string
  readonly remedy: string

  constructor(fileName: string, line: number | null, reason: string, remedy: string) {
    super('not-readable', `${fileName}${line === null ? '' : `, line ${line}`}: ${reason} ${remedy}`, { fileName, line, reason, remedy })
    this.fileName = fileName
    this.line = line
    this.reason = reason
    this.remedy = remedy
  }
}

/** Makes the refusal of the file in hand; the steps of the import throw what it returns. */
export type Refuse = (line: number | null, reason: string, remedy: string) => ImportRefusal

/** The refusal as the contract carries it; null for any other error. Takes one that has crossed a thread as well. */
export function refusedFile(error: unknown): RefusedFile | null {
  if (!(error instanceof KineticsError) || error.code !== 'not-readable') return null
  const { fileName, line, reason, remedy } = error.details
  if (typeof fileName !== 'string' || typeof reason !== 'string' || typeof remedy !== 'string') return null
  return { fileName, line: typeof line === 'number' ? line : null, reason, remedy }
}

/** Text of a file as a message quotes it: on one line, and not endless. */
export function quoted(text: string): string {
  const line = text.replace(/\s+/g, ' ').trim()
  return `“${line.length > 40 ? `${line.slice(0, 39)}…` : line}”`
}
