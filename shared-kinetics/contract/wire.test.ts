import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { Cancelled, KineticsError } from '../errors.ts'
import { describeFailure, errorOfFailure } from './failure.ts'
import { decodeMessage, encodeMessage } from './wire.ts'
import { decodeAnswer, encodeAnswer, encodeFailure } from './wire-answer.ts'

const plain = fc.letrec((tie) => ({
  value: fc.oneof(
    { depthSize: 'small', withCrossShrink: true },
    fc.string(),
    fc.boolean(),
    fc.constant(null),
    fc.double({ noNaN: true, noDefaultInfinity: true }).map((x) => (Object.is(x, -0) ? 0 : x)),
    fc.float64Array({ maxLength: 20 }),
    fc.uint8Array({ maxLength: 20 }),
    fc.array(tie('value'), { maxLength: 4 }),
    fc.dictionary(
      fc.string().filter((key) => !key.startsWith('$') && key !== '__proto__'),
      tie('value'),
      { maxKeys: 4, noNullPrototype: true },
    ),
  ),
})).value

describe('a message', () => {
  it('comes back as it went, columns bit for bit', () => {
    fc.assert(
      fc.property(plain, (value) => {
        expect(decodeMessage(encodeMessage(value))).toStrictEqual(value)
      }),
    )
  })

  it('keeps NaN inside a column and turns a bare one into null', () => {
    const decoded = decodeMessage(
      encodeMessage({ column: Float64Array.of(1, Number.NaN), bare: Number.NaN, infinite: Number.POSITIVE_INFINITY }),
    )
    expect(decoded).toStrictEqual({ column: Float64Array.of(1, Number.NaN), bare: null, infinite: null })
  })

  it('is read from the middle of a larger buffer', () => {
    const message = encodeMessage({ column: Float64Array.of(1.5, 2.5) })
    const larger = new Uint8Array(message.byteLength + 13)
    larger.set(message, 5)
    expect(decodeMessage(larger.subarray(5, 5 + message.byteLength))).toStrictEqual({ column: Float64Array.of(1.5, 2.5) })
  })

  it('sends only the part of a buffer that a column views', () => {
    const shared = new Float64Array(new SharedArrayBuffer(80))
    shared.set([0, 1, 2, 3, 4])
    expect(decodeMessage(encodeMessage({ part: shared.subarray(1, 3) }))).toStrictEqual({ part: Float64Array.of(1, 2) })
  })

  it('that is cut, padded with lies or no message at all is refused, never a crash', () => {
    const whole = encodeMessage({ a: Float64Array.of(1, 2, 3), b: 'text' })
    for (let length = 0; length < whole.byteLength; length++) {
      expect(() => decodeMessage(whole.subarray(0, length))).toThrow(KineticsError)
    }
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 200 }), (noise) => {
        expect(outcomeOf(noise)).toMatch(/^(value|KineticsError)$/)
      }),
    )
  })

  it.each(['{"$f64":[0,1000000]}', '{"$f64":[-8,1]}', '{"$f64":[0.5,1]}', '{"$f64":"x"}', '{"$u8":[0,1e300]}'])(
    'with the hostile column %s is refused',
    (json) => {
      const text = new TextEncoder().encode(json)
      const message = new Uint8Array(4 + text.byteLength + 64)
      new DataView(message.buffer).setUint32(0, text.byteLength, true)
      message.set(text, 4)
      expect(() => decodeMessage(message)).toThrow(KineticsError)
    },
  )
})

function outcomeOf(message: Uint8Array): string {
  try {
    decodeMessage(message)
    return 'value'
  } catch (error) {
    return error instanceof Error ? error.name : 'no error at all'
  }
}

describe('an answer', () => {
  it('carries a value', () => {
    expect(decodeAnswer(encodeAnswer({ revision: 3 }))).toStrictEqual({ revision: 3 })
  })

  it('carries a mistake with its code and details', () => {
    const failure = encodeFailure(new KineticsError('not-readable', 'line 3', { line: 3 }))
    expect(() => decodeAnswer(failure)).toThrow(
      expect.objectContaining({ name: 'KineticsError', code: 'not-readable', details: { line: 3 } }),
    )
  })

  it('carries a cancellation as what it is', () => {
    expect(() => decodeAnswer(encodeFailure(new Cancelled()))).toThrow(Cancelled)
  })

  it('tells a fault without its stack', () => {
    const bytes = encodeFailure(new TypeError('x is undefined'))
    expect(new TextDecoder().decode(bytes)).not.toContain('wire.test')
    expect(() => decodeAnswer(bytes)).toThrow(/x is undefined/)
  })
})

describe('a failure', () => {
  it.each([
    ['a mistake', new KineticsError('not-readable', 'line 3', { line: 3 })],
    ['a cancellation', new Cancelled()],
    ['a fault', new Error('x is undefined')],
  ])('of %s comes through any number of processes as it was', (_what, error) => {
    const once = errorOfFailure(describeFailure(error))
    const twice = errorOfFailure(describeFailure(once))
    expect(twice).toEqual(error)
    expect(twice.constructor).toBe(error.constructor)
    expect(describeFailure(twice)).toEqual(describeFailure(error))
  })

  it('of something thrown that is no error is a fault with its text', () => {
    expect(describeFailure('boom')).toEqual({ kind: 'fault', code: 'fault', message: 'boom', details: {} })
  })
})
