import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { largestUploadBytes } from '../../shared-kinetics/contract/host-api.ts'
import { textBytes } from './testing/host-testing.ts'
import { createUploads, largestUploadsTogetherBytes, mostUploads, uploadPatience_ms, type Uploads } from './uploads.ts'

let uploads: Uploads
beforeEach(() => {
  vi.useFakeTimers()
  let last = 0
  uploads = createUploads(() => `id-${(last += 1)}`)
})
afterEach(() => {
  uploads.close()
  vi.useRealTimers()
})

const code = (call: () => unknown): unknown => {
  try {
    call()
  } catch (error) {
    return error instanceof Error && 'code' in error ? error.code : error
  }
  return 'nothing was thrown'
}

describe('uploads', () => {
  it('put pieces together in order, on shared memory, and are taken once', () => {
    const id = uploads.begin('a.csv', 6)
    expect(uploads.append(id, textBytes('abc'))).toBe(3)
    expect(uploads.append(id, textBytes('def'))).toBe(6)
    const [file] = uploads.take([id, id])
    expect(new TextDecoder().decode(new Uint8Array(file?.bytes ?? []))).toBe('abcdef')
    expect(file?.bytes.buffer).toBeInstanceOf(SharedArrayBuffer)
    expect(code(() => uploads.take([id]))).toBe('unknown-upload')
    expect(uploads.heldBytes).toBe(0)
  })

  it('take all or none', () => {
    const id = uploads.begin('a.csv', 0)
    expect(code(() => uploads.take([id, 'other']))).toBe('unknown-upload')
    expect(uploads.take([id])).toHaveLength(1)
  })

  it('are bounded one by one, together, and in number', () => {
    expect(code(() => uploads.begin('a.csv', largestUploadBytes + 1))).toBe('too-large')
    const ids = Array.from({ length: largestUploadsTogetherBytes / largestUploadBytes }, () => uploads.begin('a.csv', largestUploadBytes))
    expect(code(() => uploads.begin('b.csv', 1))).toBe('too-large')
    for (const id of ids) uploads.discard(id)
    expect(uploads.heldBytes).toBe(0)
    for (let i = 0; i < mostUploads; i += 1) uploads.begin('empty.csv', 0)
    expect(code(() => uploads.begin('one more.csv', 0))).toBe('too-large')
  })

  it('are discarded when more arrives than was announced, and when asked', () => {
    const id = uploads.begin('a.csv', 2)
    expect(code(() => uploads.append(id, textBytes('abc')))).toBe('too-large')
    expect(code(() => uploads.append(id, textBytes('a')))).toBe('unknown-upload')
    const other = uploads.begin('a.csv', 2)
    uploads.discard(other)
    uploads.discard(other)
    expect(code(() => uploads.append(other, textBytes('a')))).toBe('unknown-upload')
    expect(uploads.heldBytes).toBe(0)
  })

  it('are given up when no piece comes for long, counted from the last one', () => {
    const id = uploads.begin('a.csv', 2)
    vi.advanceTimersByTime(uploadPatience_ms - 1)
    uploads.append(id, textBytes('a'))
    vi.advanceTimersByTime(uploadPatience_ms - 1)
    expect(uploads.heldBytes).toBe(2)
    vi.advanceTimersByTime(1)
    expect(uploads.heldBytes).toBe(0)
    expect(code(() => uploads.append(id, textBytes('b')))).toBe('unknown-upload')
  })
})
