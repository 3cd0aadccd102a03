import { describe, expect, it } from 'vitest'
import { onSharedMemory } from './shared-memory.ts'

const data = {
  name: 'line',
  nothing: null,
  tables: [Float64Array.of(1, Number.NaN, -0), Float64Array.of()],
  inner: { flags: Uint8Array.of(0, 1), count: 3 },
}

describe('plain data on shared memory', () => {
  it('is the same data, with every column on a shared buffer', () => {
    const shared = onSharedMemory(data)
    expect(shared).toEqual(data)
    for (const column of [...shared.tables, shared.inner.flags]) expect(column.buffer).toBeInstanceOf(SharedArrayBuffer)
    for (const column of [...data.tables, data.inner.flags]) expect(column.buffer).toBeInstanceOf(ArrayBuffer)
  })

  it('takes columns that lie there already as they are', () => {
    const once = onSharedMemory(data)
    const twice = onSharedMemory(once)
    expect(twice.tables[0]).toBe(once.tables[0])
    expect(twice.inner.flags).toBe(once.inner.flags)
  })
})
