import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import {
  channels,
  httpPaths,
  requestSchemas,
  uploadChunkBytes,
  type HostEvent,
  type HostTransport,
  type RequestAnswers,
  type RequestInput,
  type RequestName,
} from '../../shared-kinetics/contract/host-api.ts'
import { decodeAnswer } from '../../shared-kinetics/contract/wire-answer.ts'
import { decodeMessage, encodeMessage } from '../../shared-kinetics/contract/wire.ts'
import { Cancelled, KineticsError } from '../../shared-kinetics/errors.ts'
import type { Host } from '../host/create-host.ts'
import { importTexts, rejectionOf, sampleHost, sha256 } from '../host/testing/host-testing.ts'
import { startLoopbackServer, type LoopbackServer } from '../host/loopback-server.ts'
import { uploadToHost } from '../host/upload-to-host.ts'
import { openSavedCopy } from '../study/saved-copy.ts'
import { BrowserWindow as FakeBrowserWindow, fakeElectron } from './testing/fake-electron.ts'
import { openIpcGate } from './ipc.ts'

/** A wire as a page has it: encoded bytes in, encoded bytes out, and encoded events. */
interface Wire {
  send(name: string, body: Uint8Array): Promise<Uint8Array>
  subscribe(listener: (bytes: Uint8Array) => void): () => void
  close(): Promise<void>
}

async function overHttp(host: Host): Promise<Wire> {
  const server: LoopbackServer = await startLoopbackServer({
    host,
    files: new Map([['/', { mediaType: 'text/html', bytes: new Uint8Array() }]]),
    secret: 'a secret of this test',
  })
  const origin = `http://127.0.0.1:${server.port}`
  const first = await fetch(encodeURI(server.address), { redirect: 'manual' })
  const cookie = (first.headers.get('set-cookie') ?? '').split(';')[0] ?? ''
  return {
    send: async (name, body) => {
      const answer = await fetch(origin + httpPaths.request + encodeURIComponent(name), {
        method: 'POST',
        headers: { cookie, origin },
        body: new Uint8Array(body),
      })
      expect(answer.headers.get('content-type')).toBe('application/octet-stream')
      return new Uint8Array(await answer.arrayBuffer())
    },
    subscribe: (listener) => {
      const stop = new AbortController()
      void listen(`${origin}${httpPaths.events}`, cookie, stop.signal, listener)
      return () => {
        stop.abort()
      }
    },
    close: async () => server.close(),
  }
}

async function listen(url: string, cookie: string, signal: AbortSignal, listener: (bytes: Uint8Array) => void): Promise<void> {
  try {
    const stream = await fetch(url, { headers: { cookie }, signal })
    let text = ''
    const decoder = new TextDecoder()
    for await (const piece of stream.body ?? []) {
      text += decoder.decode(piece, { stream: true })
      const whole = text.split('\n\n')
      text = whole.pop() ?? ''
      for (const line of whole) if (line.startsWith('data: ')) listener(new Uint8Array(Buffer.from(line.slice(6), 'base64')))
    }
  } catch (error) {
    if (!signal.aborted && !(error instanceof TypeError)) throw error
  }
}

async function overIpc(host: Host): Promise<Wire> {
  const window = new FakeBrowserWindow()
  await window.loadURL('app://rampfold/index.html')
  const closeGate = openIpcGate(host)
  const bridge = fakeElectron.exposed(channels.bridge)
  return {
    send: async (name, body) => bridge.request(name, body),
    subscribe: (listener) => bridge.subscribe(listener),
    close: async () => {
      closeGate()
      window.close()
      await Promise.resolve()
    },
  }
}

const transportOver = (wire: Wire): HostTransport => ({
  call: async <Name extends RequestName>(name: Name, input: RequestInput<Name>) =>
    decodeAnswer(await wire.send(name, encodeMessage(input))) as RequestAnswers[Name],
  subscribe: (listener) => wire.subscribe((bytes) => listener(decodeMessage(bytes) as HostEvent)),
})

/** Gives the study a name it did not have. @returns the revision that made */
async function renameOnce(transport: HostTransport): Promise<number> {
  const { revision } = await transport.call('study.read', {})
  return (await transport.call('study.change', { revision, change: { kind: 'rename-study', name: `Köhler ${revision}` } })).revision
}

beforeAll(async () => {
  await import('../preload/preload.ts')
})
afterAll(() => {
  fakeElectron.reset()
})

describe.each([
  ['IPC', overIpc],
  ['HTTP', overHttp],
])('the host over %s', (_name, open) => {
  let host: Host
  let wire: Wire
  let transport: HostTransport

  beforeEach(async () => {
    host = sampleHost()
    wire = await open(host)
    transport = transportOver(wire)
  })
  afterEach(async () => {
    await wire.close()
    await host.close()
  })

  it('describes the program and reads an empty study', async () => {
    expect(await transport.call('program.describe', {})).toEqual({ name: 'rampfold', version: '1.2.3', shell: 'browser' })
    expect(await transport.call('study.read', {})).toMatchObject({ revision: 1, undo: null, redo: null, document: { runs: [] } })
  })

  it('changes, undoes and redoes', async () => {
    const renamed = await transport.call('study.change', { revision: 1, change: { kind: 'rename-study', name: 'Köhler µ' } })
    expect(renamed).toMatchObject({ revision: 2, undo: 'name of the study', document: { name: 'Köhler µ' } })
    const undone = await transport.call('study.undo', { revision: 2 })
    expect(undone).toMatchObject({ revision: 3, redo: 'name of the study' })
    expect(await transport.call('study.redo', { revision: 3 })).toMatchObject({ revision: 4, document: { name: 'Köhler µ' } })
  })

  it('imports, evaluates with columns as binary and NaN as null, and exports', async () => {
    const { snapshot, refused } = await importTexts(transport, { 'a.csv': 'rate 5', 'bad.csv': 'x' })
    expect(refused).toMatchObject([{ fileName: 'bad.csv', line: 1 }])
    const { result } = await transport.call('study.evaluate', { revision: snapshot.revision })
    const [run] = result.runs
    expect(run?.heatingRateStandardError_K_per_min).toBeNull()
    expect(run?.temperatureAtLevel_K).toEqual([null])
    expect(run?.curve.temperature_K).toBeInstanceOf(Float64Array)
    expect(run?.curve.temperature_K[0]).toBe(300)
    expect(run?.curve.signal[7]).toBeNaN()
    expect(run?.curve.baseline).toEqual(new Float64Array())
    const { files } = await transport.call('results.export', { revision: snapshot.revision, format: 'csv' })
    expect(files[0]?.fileName).toBe('activation.csv')
    expect(new TextDecoder().decode(files[0]?.bytes)).toBe('a, 1 runs')
  })

  it('opens the demo and saves a copy of it', async () => {
    await transport.call('study.open-demo', {})
    const { bytes, fileName } = await transport.call('study.save-copy', {})
    expect(fileName).toBe('Sample demo.rampfold')
    expect(openSavedCopy(bytes).document.runs).toHaveLength(2)
  })

  it('carries a large file in pieces, byte by byte', async () => {
    const bytes = new Uint8Array(5 * uploadChunkBytes + 12_345)
    for (let i = 0; i < bytes.length; i += 1) bytes[i] = 32 + ((i * 7919) % 90)
    bytes.set(new TextEncoder().encode('rate 7\n'))
    const uploadIds = await uploadToHost(transport, [{ fileName: 'large.csv', bytes }])
    const { snapshot } = await transport.call('runs.import', { uploadIds })
    expect(snapshot.document.runs[0]?.file).toEqual({ name: 'large.csv', byteLength: bytes.byteLength, sha256: sha256(bytes) })
  })

  it('refuses a piece that is too large, more than was declared, a file too large, and an upload it does not know', async () => {
    const { uploadId } = await transport.call('upload.begin', { fileName: 'a.csv', byteLength: 4 })
    const refusal = async (body: Uint8Array): Promise<unknown> =>
      rejectionOf(transport.call('upload.append', { uploadId, bytes: new Uint8Array(body) }))
    expect(await refusal(new Uint8Array(uploadChunkBytes + 1))).toMatchObject({ code: 'bad-request' })
    expect(await refusal(new Uint8Array(5))).toMatchObject({ code: 'too-large' })
    expect(await refusal(new Uint8Array(1))).toMatchObject({ code: 'unknown-upload' })
    const huge = transport.call('upload.begin', { fileName: 'a.csv', byteLength: 2 ** 40 })
    expect(await rejectionOf(huge)).toMatchObject({ code: 'too-large', details: { fileName: 'a.csv' } })
  })

  it('refuses bodies beyond all measure', async () => {
    const answer = await wire.send('study.read', new Uint8Array(5 * 2 ** 20))
    expect(() => decodeAnswer(answer)).toThrow(expect.objectContaining({ code: 'too-large' }))
  })

  it('refuses what is made on an old revision, as a KineticsError with its details', async () => {
    await transport.call('study.change', { revision: 1, change: { kind: 'rename-study', name: 'A' } })
    const error = await rejectionOf(transport.call('study.change', { revision: 1, change: { kind: 'rename-study', name: 'B' } }))
    expect(error).toBeInstanceOf(KineticsError)
    expect(error).toMatchObject({ code: 'revision-conflict', details: { seen: 1, current: 2 } })
  })

  it('tells a cancelled evaluation from a failed one', async () => {
    const { snapshot } = await importTexts(transport, { 'slow.csv': 'rate 5' })
    const running = rejectionOf(transport.call('study.evaluate', { revision: snapshot.revision }))
    await new Promise((resolve) => setTimeout(resolve, 20))
    await transport.call('work.cancel', { work: 'evaluate' })
    expect(await running).toBeInstanceOf(Cancelled)
  })

  it.each(['study.burn', 'toString', '__proto__', '', 'study.read/../x', '%2e%2e'])('refuses the unknown request %j', async (name) => {
    const answer = await wire.send(name, encodeMessage({}))
    expect(() => decodeAnswer(answer)).toThrow(expect.objectContaining({ code: 'bad-request' }))
  })

  it('refuses bytes that are no message', async () => {
    const cut = encodeMessage({ uploadId: 'a', bytes: new Uint8Array(100) }).subarray(0, 60)
    const bodies = [
      new Uint8Array(),
      new Uint8Array([1, 2, 3]),
      new Uint8Array([255, 255, 255, 255, 0]),
      new TextEncoder().encode('{"revision":1}'),
      cut,
    ]
    for (const body of bodies) {
      const answer = await wire.send('upload.append', body)
      expect(() => decodeAnswer(answer)).toThrow(expect.objectContaining({ name: 'KineticsError', code: 'bad-request' }))
    }
  })

  it('parses the input of every request: a wrong field, a missing one and one too many are refused', async () => {
    for (const name of Object.keys(requestSchemas)) {
      for (const body of [null, 7, 'x', [], { surplus: true }, { revision: '1' }, { uploadIds: 'all' }]) {
        const answer = await wire.send(name, encodeMessage(body))
        expect(() => decodeAnswer(answer), `${name} ${JSON.stringify(body)}`).toThrow(expect.objectContaining({ code: 'bad-request' }))
      }
    }
    expect(await transport.call('study.read', {})).toMatchObject({ revision: 1 })
  })

  it('tells an event by the bytes that the wire’s own encoding makes of it', async () => {
    const heard: Uint8Array[] = []
    const stop = wire.subscribe((bytes) => heard.push(bytes))
    // Over HTTP the stream has to open first.
    await expect
      .poll(async () => {
        await renameOnce(transport)
        return heard.length
      })
      .toBeGreaterThan(1)
    const revision = await renameOnce(transport)
    await expect.poll(() => heard).toContainEqual(encodeMessage({ kind: 'study-changed', revision }))
    stop()
  })

  it('tells every change and all progress, and stops telling when asked', async () => {
    const told: HostEvent[] = []
    const stop = transport.subscribe((event) => told.push(event))
    // Over HTTP the stream opens with the present revision; over IPC it is open at once.
    await expect
      .poll(async () => {
        await transport.call('study.change', {
          revision: (await transport.call('study.read', {})).revision,
          change: { kind: 'rename-study', name: String(told.length + Math.random()) },
        })
        return told.length
      })
      .toBeGreaterThan(1)
    const { snapshot } = await importTexts(transport, { 'a.csv': 'rate 5' })
    await expect.poll(() => told).toContainEqual({ kind: 'study-changed', revision: snapshot.revision })
    expect(told).toContainEqual({ kind: 'progress', work: 'import', done: 1, total: 1, what: 'a.csv' })
    stop()
    await new Promise((resolve) => setTimeout(resolve, 20))
    const before = told.length
    await transport.call('study.undo', { revision: snapshot.revision })
    await new Promise((resolve) => setTimeout(resolve, 20))
    expect(told).toHaveLength(before)
  })
})
