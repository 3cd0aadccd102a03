/** Codes of the mistakes a caller can make; data that cannot answer is a status in a result, never one of these. */
export type KineticsErrorCode =
  | 'bad-levels'
  | 'bad-option'
  | 'bad-request'
  | 'bad-study'
  | 'column-length'
  | 'empty-window'
  | 'not-finite'
  | 'not-readable'
  | 'no-heating-rate'
  | 'no-signal'
  | 'revision-conflict'
  | 'time-not-ascending'
  | 'too-few-runs'
  | 'too-large'
  | 'unknown-run'
  | 'unknown-task'
  | 'unknown-upload'

export type ErrorDetails = Readonly<Record<string, string | number | boolean | null>>

/** A mistake the caller can mend. `message` says what is wrong, where, and what to do. */
export class KineticsError extends Error {
  override readonly name = 'KineticsError'
  readonly code: KineticsErrorCode
  readonly details: ErrorDetails

  constructor(code: KineticsErrorCode, message: string, details: ErrorDetails = {}) {
    super(message)
    this.code = code
    this.details = details
  }
}

/** Work that was stopped on request; never a fault, never shown as one. */
export class Cancelled extends Error {
  override readonly name = 'Cancelled'

  constructor() {
    super('Cancelled')
  }
}
