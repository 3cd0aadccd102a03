interface Remembered {
  readonly value: unknown
  readonly bytes: number
}

/** Steps of earlier evaluations by key, least recently used first. Nothing in here is ever changed after it was put in. */
export type EvaluationCache = Map<string, Remembered>

const mostBytes = 256 * 1024 * 1024

/**
 * The value remembered under `key`, or the one that `compute` gives, which is then remembered. The key names the function with its version and everything the
 * value depends on. What throws is not remembered. Beyond 256 MiB the least recently used go first.
 *
 * @param bytesOf - about how much memory a value holds on to
 */
export function remember<Value>(cache: EvaluationCache, key: string, compute: () => Value, bytesOf: (value: Value) => number): Value {
  const known = cache.get(key)
  if (known !== undefined) {
    cache.delete(key)
    cache.set(key, known)
    return known.value as Value
  }
  const value = compute()
  cache.set(key, { value, bytes: bytesOf(value) + 2 * key.length })
  let total = 0
  for (const { bytes } of cache.values()) total += bytes
  for (const [oldest, { bytes }] of cache) {
    if (total <= mostBytes || oldest === key) break
    cache.delete(oldest)
    total -= bytes
  }
  return value
}

/** Memory of every typed array reachable in a plain value, and a little for the rest. */
export function memoryOf(value: unknown): number {
  if (typeof value !== 'object' || value === null) return 8
  if (ArrayBuffer.isView(value)) return value.byteLength
  let sum = 16
  if (Array.isArray(value)) for (const part of value) sum += memoryOf(part)
  else for (const key in value) sum += memoryOf((value as Readonly<Record<string, unknown>>)[key])
  return sum
}
