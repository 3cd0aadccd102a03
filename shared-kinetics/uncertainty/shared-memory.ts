/** Zeros on memory that threads share: what is posted of it is not copied. */
export const sharedZeros = (length: number): Float64Array =>
  new Float64Array(new SharedArrayBuffer(length * Float64Array.BYTES_PER_ELEMENT))

/**
 * The same plain data with its columns on memory that threads share, so that it is posted to workers again and again without being copied; columns that lie there already are
 * taken as they are.
 */
export function onSharedMemory<Data>(data: Data): Data {
  return shared(data) as Data
}

function shared(data: unknown): unknown {
  if (data instanceof Float64Array) {
    if (data.buffer instanceof SharedArrayBuffer) return data
    const copy = sharedZeros(data.length)
    copy.set(data)
    return copy
  }
  if (data instanceof Uint8Array) {
    if (data.buffer instanceof SharedArrayBuffer) return data
    const copy = new Uint8Array(new SharedArrayBuffer(data.length))
    copy.set(data)
    return copy
  }
  if (Array.isArray(data)) return data.map(shared)
  if (typeof data !== 'object' || data === null) return data
  return Object.fromEntries(Object.entries(data).map(([key, value]) => [key, shared(value)]))
}
