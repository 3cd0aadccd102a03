import type { IncomingMessage, Server, ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'
import { httpPaths, uploadChunkBytes, type HostEvent } from '../../shared-kinetics/contract/host-api.ts'
import { encodeFailure } from '../../shared-kinetics/contract/wire-answer.ts'
import { encodeMessage } from '../../shared-kinetics/contract/wire.ts'
import type { Host } from './create-host.ts'
import { createLoopbackGate, type LoopbackGate } from './loopback-gate.ts'
import { readBody } from './read-body.ts'
import { securityHeaders, serveRendererFile, type RendererFiles } from './renderer-files.ts'

export interface LoopbackServerOptions {
  readonly host: Host
  readonly files: RendererFiles
  /** Random and of this start only. */
  readonly secret: string
  /** 0 (any free one) by default. */
  readonly port?: number
}

export interface LoopbackServer {
  readonly port: number
  /** What a person opens: `http://127.0.0.1:PORT/?key=SECRET`. */
  readonly address: string
  /** An address whose key is good for one visit within half a minute: for places where others can read it. */
  addressForOnce(): string
  close(): Promise<void>
}

/** A comment line now and then, so that a stream that has died is noticed. */
const heartbeat_ms = 25_000

/** Serves pages, requests and events on 127.0.0.1 alone, to whoever holds this start's secret. */
export async function startLoopbackServer({ host, files, secret, port = 0 }: LoopbackServerOptions): Promise<LoopbackServer> {
  const streams = new Set<ServerResponse>()
  // Loaded when a server is asked for: the command line starts faster without.
  const { createServer } = await import('node:http')
  const server = createServer()
  await listen(server, port)
  const taken = (server.address() as AddressInfo).port
  const gate = createLoopbackGate(taken, secret)

  server.on('request', (request, response) => {
    answer({ host, files, gate, streams }, request, response).catch((error: unknown) => {
      if (response.headersSent) response.destroy()
      else sendText(response, 500, error instanceof Error ? error.message : String(error))
    })
  })
  const heartbeat = setInterval(() => {
    for (const stream of streams) stream.write(':\n\n')
  }, heartbeat_ms)
  heartbeat.unref()
  const stopEvents = host.subscribe((event) => {
    for (const stream of streams) stream.write(eventText(event))
  })
  return {
    port: taken,
    address: `http://127.0.0.1:${taken}/?key=${secret}`,
    addressForOnce: () => `http://127.0.0.1:${taken}/?key=${gate.keyForOnce()}`,
    close: async () => {
      stopEvents()
      clearInterval(heartbeat)
      for (const stream of streams) stream.end()
      await new Promise<void>((resolve) => {
        server.close(() => {
          resolve()
        })
        server.closeAllConnections()
      })
    },
  }
}

interface Served {
  readonly host: Host
  readonly files: RendererFiles
  readonly gate: LoopbackGate
  readonly streams: Set<ServerResponse>
}

async function answer(served: Served, request: IncomingMessage, response: ServerResponse): Promise<void> {
  const verdict = served.gate.judge(request)
  if (verdict.kind === 'refuse') {
    request.resume()
    sendText(response, verdict.status, verdict.reason)
    return
  }
  if (verdict.kind === 'let-in') {
    response.writeHead(303, { ...securityHeaders(), location: '/', 'set-cookie': verdict.cookie })
    response.end()
    return
  }
  const { path } = verdict
  if (request.method === 'POST' && path.startsWith(httpPaths.request)) {
    await answerRequest(served.host, path.slice(httpPaths.request.length), request, response)
  } else if (request.method === 'GET' && path === httpPaths.events) {
    await openStream(served, response)
  } else if (request.method === 'GET' || request.method === 'HEAD') {
    const file = serveRendererFile(served.files, path)
    if (file === null) {
      sendText(response, 404, 'There is nothing at this address.')
      return
    }
    response.writeHead(200, { ...file.headers, 'content-length': file.bytes.byteLength })
    response.end(request.method === 'HEAD' ? undefined : file.bytes)
  } else {
    request.resume()
    sendText(response, 405, 'This address does not take requests of this kind.')
  }
}

async function answerRequest(host: Host, name: string, request: IncomingMessage, response: ServerResponse): Promise<void> {
  let status = 200
  let answered: Uint8Array
  try {
    answered = await host.answer(name, await readBody(request, largestBody(name)))
  } catch (error) {
    // Not read to its end, so the connection cannot be used again.
    status = 413
    answered = encodeFailure(error)
    response.setHeader('connection', 'close')
  }
  response.writeHead(status, { ...securityHeaders(), 'content-type': 'application/octet-stream', 'content-length': answered.byteLength })
  response.end(answered)
}

/** A piece of a file with its envelope; every other request is small. */
const largestBody = (name: string): number => (name === 'upload.append' ? uploadChunkBytes + 4096 : 4 * 2 ** 20)

async function openStream({ host, streams }: Served, response: ServerResponse): Promise<void> {
  response.writeHead(200, { ...securityHeaders(), 'content-type': 'text/event-stream; charset=utf-8' })
  response.write('retry: 1000\n\n')
  streams.add(response)
  response.on('close', () => {
    streams.delete(response)
  })
  // A page that comes back after a pause learns at once whether it has missed something.
  const { revision } = await host.call('study.read', {})
  response.write(eventText({ kind: 'study-changed', revision }))
}

/** The same bytes as over IPC; an event stream carries text, so they go as base64. */
const eventText = (event: HostEvent): string => `data: ${Buffer.from(encodeMessage(event)).toString('base64')}\n\n`

function sendText(response: ServerResponse, status: number, text: string): void {
  response.writeHead(status, { ...securityHeaders(), 'content-type': 'text/plain; charset=utf-8' })
  response.end(`${text}\n`)
}

async function listen(server: Server, port: number): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject)
    server.listen(port, '127.0.0.1', () => {
      server.off('error', reject)
      resolve()
    })
  })
}
