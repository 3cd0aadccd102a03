import { KineticsError } from '../errors.ts'

/**
 * One encoding for every border (IPC, HTTP, events): a 4-byte little-endian length, that many bytes of JSON, and behind it the
 * binary columns, each starting at a multiple of 8. In the JSON a Float64Array stands as `{ "$f64": [offset, length] }` and a
 * Uint8Array as `{ "$u8": [offset, length] }`; NaN and infinities become null, `undefined` fields are left out.
 */
export function encodeMessage(value: unknown): Uint8Array {
  const binaries: Uint8Array[] = []
  let binaryLength = 0
  const place = (view: Float64Array | Uint8Array): number => {
    const bytes = new Uint8Array(view.buffer, view.byteOffset, view.byteLength)
    const offset = binaryLength
    binaries.push(bytes)
    binaryLength += align(bytes.byteLength)
    return offset
  }
  const json = JSON.stringify(value, (_key, part: unknown) => {
    if (part instanceof Float64Array) return { $f64: [place(part), part.length] }
    if (part instanceof Uint8Array) return { $u8: [place(part), part.byteLength] }
    if (typeof part === 'number' && !Number.isFinite(part)) return null
    return part
  })
  const header = encodeText(json ?? 'null')
  const start = align(4 + header.byteLength)
  const message = new Uint8Array(start + binaryLength)
  new DataView(message.buffer).setUint32(0, header.byteLength, true)
  message.set(header, 4)
  let at = start
  for (const bytes of binaries) {
    message.set(bytes, at)
    at += align(bytes.byteLength)
  }
  return message
}

/**
 * The value of a message, still `unknown`: a schema decides what it is.
 * @throws KineticsError `bad-request` for anything that `encodeMessage` could not have written
 */
export function decodeMessage(message: Uint8Array): unknown {
  if (message.byteLength < 4) throw damaged('it is shorter than its own length field')
  const headerLength = new DataView(message.buffer, message.byteOffset, message.byteLength).getUint32(0, true)
  if (4 + headerLength > message.byteLength) throw damaged('its header is longer than the message')
  const start = align(4 + headerLength)
  const take = (place: unknown, bytesEach: number): Uint8Array<ArrayBuffer> => {
    if (!Array.isArray(place) || place.length !== 2) throw damaged('a column has no place')
    const [offset, length] = place as unknown[]
    if (!isCount(offset) || !isCount(length)) throw damaged('a column has no place')
    const from = start + offset
    const to = from + length * bytesEach
    if (to > message.byteLength) throw damaged('a column reaches beyond its end')
    return message.slice(from, to)
  }
  try {
    return JSON.parse(decodeText(message.subarray(4, 4 + headerLength)), (_key, part: unknown) => {
      if (typeof part !== 'object' || part === null) return part
      if ('$f64' in part) return new Float64Array(take(part.$f64, 8).buffer)
      if ('$u8' in part) return take(part.$u8, 1)
      return part
    }) as unknown
  } catch (error) {
    if (error instanceof KineticsError) throw error
    throw damaged('its header is not JSON in UTF-8')
  }
}

const align = (length: number): number => (length + 7) & ~7
const isCount = (value: unknown): value is number => Number.isSafeInteger(value) && (value as number) >= 0
const damaged = (why: string): KineticsError => new KineticsError('bad-request', `A message cannot be read: ${why}.`)

// The ES library has no TextEncoder, and this folder compiles without DOM or Node types; both runtimes have it.
interface TextCodecs {
  readonly TextEncoder: new () => { encode(text: string): Uint8Array }
  readonly TextDecoder: new (label: string, options: { fatal: boolean; ignoreBOM: boolean }) => { decode(bytes: Uint8Array): string }
}
const codecs = globalThis as unknown as TextCodecs
const encodeText = (text: string): Uint8Array => new codecs.TextEncoder().encode(text)
const decodeText = (bytes: Uint8Array): string => new codecs.TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes)
