import { afterEach, describe, expect, it, vi } from 'vitest'
import type { DesktopBridge, HostEvent, HostTransport } from '../../shared-kinetics/contract/host-api.ts'
import { encodeAnswer, encodeFailure } from '../../shared-kinetics/contract/wire-answer.ts'
import { decodeMessage, encodeMessage } from '../../shared-kinetics/contract/wire.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import { chooseTransport } from './choose-transport.ts'
import { createDesktopTransport } from './desktop.ts'
import { isHostEvent } from './host-event.ts'
import { HostUnreachable } from './host-unreachable.ts'
import { createHttpTransport } from './http.ts'

type Answer = (name: string, body: Uint8Array) => Uint8Array

/** The same host behind each transport: over HTTP by a stand-in for fetch, on the desktop by a stand-in for the preload's bridge. */
const transports: Readonly<Record<string, (answer: Answer) => HostTransport>> = {
  http: (answer) => {
    vi.stubGlobal('fetch', async (path: string, init: { readonly body: Uint8Array }) => {
      const bytes = answer(path.replace('/request/', ''), init.body)
      return new Response(bytes as Uint8Array<ArrayBuffer>, { headers: { 'content-type': 'application/octet-stream' } })
    })
    return createHttpTransport()
  },
  desktop: (answer) => createDesktopTransport({ request: async (name, body) => answer(name, body), subscribe: () => () => undefined }),
}

afterEach(() => {
  vi.unstubAllGlobals()
})

describe.each(Object.entries(transports))('%s transport', (_name, create) => {
  it('carries name and input there and the answer back, binary parts included', async () => {
    const seen: unknown[] = []
    const transport = create((name, body) => {
      seen.push(name, decodeMessage(body))
      return encodeAnswer({ receivedBytes: 3 })
    })
    const bytes = Uint8Array.of(1, 2, 3)
    expect(await transport.call('upload.append', { uploadId: 'u-1', bytes })).toEqual({ receivedBytes: 3 })
    expect(seen).toEqual(['upload.append', { uploadId: 'u-1', bytes }])
  })

  it('throws a caller’s mistake and a cancellation as what they are', async () => {
    const conflict = create(() => encodeFailure(new KineticsError('revision-conflict', 'It has changed.', { seen: 1 })))
    await expect(conflict.call('study.read', {})).rejects.toMatchObject({
      name: 'KineticsError',
      code: 'revision-conflict',
      details: { seen: 1 },
    })
    const stopped = create(() => encodeFailure(new Cancelled()))
    await expect(stopped.call('study.read', {})).rejects.toBeInstanceOf(Cancelled)
  })

  it('says that the host cannot be reached when it cannot', async () => {
    const transport = create(() => {
      throw new TypeError('Failed to fetch')
    })
    await expect(transport.call('study.read', {})).rejects.toBeInstanceOf(HostUnreachable)
  })
})

describe('a page of an earlier start', () => {
  it('is told to open the new address', async () => {
    vi.stubGlobal('fetch', async () => new Response('Not let in.', { status: 403, headers: { 'content-type': 'text/plain' } }))
    await expect(createHttpTransport().call('study.read', {})).rejects.toThrow(/address that it printed/)
  })
})

describe('choice of transport', () => {
  it('takes the desktop’s bridge where the preload has put one', async () => {
    const bridge: DesktopBridge = { request: async () => encodeAnswer({ studies: [] }), subscribe: () => () => undefined }
    expect(await chooseTransport({ rampfold: bridge }).call('study.recent', {})).toEqual({ studies: [] })
  })
})

/** Stands in for the browser's event stream: tells what a test sends. */
class FakeEventSource extends EventTarget {
  static last: FakeEventSource | null = null
  closed = false
  readonly url: string
  constructor(url: string) {
    super()
    this.url = url
    FakeEventSource.last = this
  }
  send(data: string): void {
    this.dispatchEvent(new MessageEvent('message', { data }))
  }
  close(): void {
    this.closed = true
  }
}
const base64 = (bytes: Uint8Array): string => Buffer.from(bytes).toString('base64')

describe('the event stream', () => {
  it('carries the same bytes as the bridge, as base64; what this version does not know or cannot read is passed over', () => {
    vi.stubGlobal('EventSource', FakeEventSource)
    const heard: HostEvent[] = []
    const stop = createHttpTransport().subscribe((event) => heard.push(event))
    const source = FakeEventSource.last
    expect(source?.url).toBe('/events')
    const event: HostEvent = { kind: 'not-saved', message: 'Köhler µ: disk full' }
    source?.send(base64(encodeMessage(event)))
    for (const strange of [base64(encodeMessage({ kind: 'tea-is-ready' })), JSON.stringify(event), '', '%']) source?.send(strange)
    expect(heard).toEqual([event])
    stop()
    expect(source?.closed).toBe(true)
  })

  it('that breaks tells a host that does not answer as lost, and no other', async () => {
    vi.stubGlobal('EventSource', FakeEventSource)
    const lost: Error[] = []
    const asked = vi.fn<() => Promise<Response>>()
    vi.stubGlobal('fetch', asked)
    const stop = createHttpTransport().subscribe(
      () => undefined,
      (error) => lost.push(error),
    )
    const breaks = async (): Promise<void> => {
      FakeEventSource.last?.dispatchEvent(new Event('error'))
      await new Promise((resolve) => setTimeout(resolve, 10))
    }
    const answer = encodeAnswer({}) as Uint8Array<ArrayBuffer>
    asked.mockResolvedValueOnce(new Response(answer, { headers: { 'content-type': 'application/octet-stream' } }))
    await breaks()
    expect(lost).toEqual([])
    asked.mockRejectedValue(new TypeError('Failed to fetch'))
    await breaks()
    expect(lost).toEqual([expect.any(HostUnreachable)])
    stop()
    await breaks()
    expect(lost).toHaveLength(1)
  })
})

describe('events', () => {
  it('reach the listener from the bridge; what this version does not know is passed over', () => {
    const heard: HostEvent[] = []
    const send: ((bytes: Uint8Array) => void)[] = []
    const transport = createDesktopTransport({
      request: async () => new Uint8Array(),
      subscribe: (listener) => {
        send.push(listener)
        return () => undefined
      },
    })
    transport.subscribe((event) => heard.push(event))
    send[0]?.(encodeMessage({ kind: 'study-changed', revision: 4 }))
    send[0]?.(encodeMessage({ kind: 'tea-is-ready' }))
    expect(heard).toEqual([{ kind: 'study-changed', revision: 4 }])
  })

  it('are known by their shape', () => {
    const shapes: readonly unknown[] = [
      { kind: 'progress', work: 'import', done: 1, total: 2, what: 'a' },
      { kind: 'not-saved', message: 'full' },
      { kind: 'study-changed' },
      { kind: 'progress', done: '1', total: 2 },
      null,
      'study-changed',
    ]
    expect(shapes.map(isHostEvent)).toEqual([true, true, false, false, false, false])
  })
})
