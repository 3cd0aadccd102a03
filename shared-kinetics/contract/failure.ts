import { Cancelled, KineticsError, type ErrorDetails, type KineticsErrorCode } from '../errors.ts'

/** An error as it crosses a process, without its stack: a caller's mistake, a cancellation, or a fault of the program. */
export interface Failure {
  readonly kind: 'kinetics' | 'cancelled' | 'fault'
  readonly code: string
  readonly message: string
  readonly details: ErrorDetails
}

/** A caller's mistake and a cancellation keep their type; anything else is a fault. */
export function describeFailure(error: unknown): Failure {
  if (error instanceof KineticsError) return { kind: 'kinetics', code: error.code, message: error.message, details: error.details }
  if (error instanceof Cancelled) return { kind: 'cancelled', code: 'cancelled', message: error.message, details: {} }
  return { kind: 'fault', code: 'fault', message: error instanceof Error ? error.message : String(error), details: {} }
}

/** The error that a failure stands for; `describeFailure` of it gives the failure again. */
export function errorOfFailure({ kind, code, message, details }: Failure): Error {
  if (kind === 'cancelled') return new Cancelled()
  if (kind === 'kinetics') return new KineticsError(code as KineticsErrorCode, message, details)
  return new Error(message)
}
