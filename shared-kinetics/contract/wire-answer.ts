import { describeFailure, errorOfFailure, type Failure } from './failure.ts'
import { decodeMessage, encodeMessage } from './wire.ts'

/** How an answer or a failure looks on every wire. */
type WireAnswer = { readonly ok: true; readonly value: unknown } | { readonly ok: false; readonly failure: Failure }

export const encodeAnswer = (value: unknown): Uint8Array => encodeMessage({ ok: true, value } satisfies WireAnswer)

/** A caller's mistake is told as it is; a fault is told as one of the program, and its stack stays at home. */
export function encodeFailure(error: unknown): Uint8Array {
  const failure = describeFailure(error)
  const message = failure.kind === 'fault' ? `Something went wrong inside the program: ${failure.message}` : failure.message
  return encodeMessage({ ok: false, failure: { ...failure, message } } satisfies WireAnswer)
}

/** The value of an answer, or throws the failure it carries. */
export function decodeAnswer(bytes: Uint8Array): unknown {
  const answer = decodeMessage(bytes) as WireAnswer
  if (answer.ok) return answer.value
  throw errorOfFailure(answer.failure)
}
