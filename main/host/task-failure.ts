import type { FromWorker } from '../../shared-kinetics/contract/task-messages.ts'
import { Cancelled, KineticsError, type KineticsErrorCode } from '../../shared-kinetics/errors.ts'

/** The error that a failure message stands for. */
export function taskFailure(failure: Extract<FromWorker, { kind: 'failure' }>['failure']): Error {
  if (failure.kind === 'cancelled') return new Cancelled()
  if (failure.kind === 'kinetics') return new KineticsError(failure.code as KineticsErrorCode, failure.message, failure.details)
  return new Error(failure.message)
}
