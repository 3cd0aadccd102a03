/**
 * A plain value whose arrays of numbers stand on SharedArrayBuffers, so that threads hand it on without copying; arrays that looked at the same memory still do.
 * Everything else is the same.
 */
export function shareArrays<Value>(value: Value): Value {
  const shared = new Map<ArrayBufferLike, SharedArrayBuffer>()
  const share = (part: unknown): unknown => {
    if (typeof part !== 'object' || part === null) return part
    if (part instanceof Float64Array) return new Float64Array(sharedOf(part.buffer, shared), part.byteOffset, part.length)
    if (Array.isArray(part)) return part.map(share)
    return Object.fromEntries(Object.entries(part).map(([name, inside]) => [name, share(inside)]))
  }
  return share(value) as Value
}

function sharedOf(buffer: ArrayBufferLike, known: Map<ArrayBufferLike, SharedArrayBuffer>): SharedArrayBuffer {
  if (buffer instanceof SharedArrayBuffer) return buffer
  const before = known.get(buffer)
  if (before !== undefined) return before
  const copy = new SharedArrayBuffer(buffer.byteLength)
  new Uint8Array(copy).set(new Uint8Array(buffer))
  known.set(buffer, copy)
  return copy
}
