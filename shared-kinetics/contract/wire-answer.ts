import { Cancelled, KineticsError, type ErrorDetails, type KineticsErrorCode } from '../errors.ts'
import { decodeMessage, encodeMessage } from './wire.ts'

/** How an answer or a failure looks on every wire. */
export type WireAnswer =
  | { readonly ok: true; readonly value: unknown }
  | {
      readonly ok: false
      readonly failure: {
        readonly kind: 'kinetics' | 'cancelled' | 'fault'
        readonly code: string
        readonly message: string
        readonly details: ErrorDetails
      }
    }

export const encodeAnswer = (value: unknown): Uint8Array => encodeMessage({ ok: true, value } satisfies WireAnswer)

/** A caller's mistake and a cancellation keep their type; anything else is a bug whose stack stays at home. */
export function encodeFailure(error: unknown): Uint8Array {
  return encodeMessage({ ok: false, failure: describeFailure(error) } satisfies WireAnswer)
}

function describeFailure(error: unknown): Extract<WireAnswer, { ok: false }>['failure'] {
  if (error instanceof KineticsError) return { kind: 'kinetics', code: error.code, message: error.message, details: error.details }
  if (error instanceof Cancelled) return { kind: 'cancelled', code: 'cancelled', message: error.message, details: {} }
  const message = error instanceof Error ? error.message : String(error)
  return { kind: 'fault', code: 'fault', message: `Something went wrong inside the program: ${message}`, details: {} }
}

/** The value of an answer, or throws the failure it carries. */
export function decodeAnswer(bytes: Uint8Array): unknown {
  const answer = decodeMessage(bytes) as WireAnswer
  if (answer.ok) return answer.value
  const { kind, code, message, details } = answer.failure
  if (kind === 'cancelled') throw new Cancelled()
  if (kind === 'kinetics') throw new KineticsError(code as KineticsErrorCode, message, details)
  throw new Error(message)
}
