import { request } from 'node:http'
import { connect } from 'node:net'
import { mkdir, mkdtemp, rm, symlink, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { decodeMessage, encodeMessage } from '../../shared-kinetics/contract/wire.ts'
import type { Host } from './create-host.ts'
import { sampleHost } from './testing/host-testing.ts'
import { createLoopbackGate, keyForOnce_ms, type LoopbackGate } from './loopback-gate.ts'
import { startLoopbackServer, type LoopbackServer } from './loopback-server.ts'
import { readRendererFiles } from './renderer-files.ts'

const secret = 'k3y'
let host: Host
let server: LoopbackServer
let folder = ''
let cookie = ''
let origin = ''

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rampfold-pages-'))
  await mkdir(join(folder, 'pages/assets'), { recursive: true })
  await writeFile(join(folder, 'pages/index.html'), '<!doctype html><html><head><title>t</title></head></html>')
  await writeFile(join(folder, 'pages/assets/app.js'), 'export {}')
  await writeFile(join(folder, 'pages/assets/app.js.map'), '{}')
  await writeFile(join(folder, 'secret.txt'), 'secret')
  await symlink(join(folder, 'secret.txt'), join(folder, 'pages/linked.txt'))
  host = sampleHost()
  server = await startLoopbackServer({ host, files: await readRendererFiles(join(folder, 'pages')), secret })
  origin = `http://127.0.0.1:${server.port}`
  cookie = `rampfold-${server.port}=${secret}`
})
afterAll(async () => {
  await server.close()
  await host.close()
  await rm(folder, { recursive: true, force: true })
})

interface Answer {
  readonly status: number
  readonly headers: Readonly<Record<string, string | string[] | undefined>>
  readonly text: string
}

/** Node's own client: unlike fetch it sends any Host, Origin and path. */
async function ask(path: string, headers: Record<string, string> = {}, method = 'GET', body?: Uint8Array): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const asked = request({ host: '127.0.0.1', port: server.port, path, method, headers }, (response) => {
      let text = ''
      response.setEncoding('utf8')
      response.on('data', (piece: string) => (text += piece))
      response.on('end', () => {
        resolve({ status: response.statusCode ?? 0, headers: response.headers, text })
      })
    })
    asked.on('error', reject)
    asked.end(body)
  })
}

describe('the loopback server', () => {
  it('listens on 127.0.0.1 and names an address with this start’s key', async () => {
    expect(server.address).toBe(`http://127.0.0.1:${server.port}/?key=${secret}`)
    const other = new Promise((resolve, reject) => {
      const socket = connect(server.port, '127.0.0.2', () => {
        resolve('open')
        socket.end()
      })
      socket.on('error', reject)
    })
    await expect(other).rejects.toHaveProperty('code', 'ECONNREFUSED')
  })

  it('lets in whoever has the key, with a cookie that scripts and other sites cannot use, and takes the key off the address', async () => {
    const answer = await ask(`/?key=${secret}`)
    expect(answer).toMatchObject({ status: 303, headers: { location: '/' } })
    expect(answer.headers['set-cookie']).toEqual([`rampfold-${server.port}=${secret}; HttpOnly; SameSite=Strict; Path=/`])
    expect(await ask('/', { cookie })).toMatchObject({ status: 200 })
  })

  it.each([
    ['no cookie', '/', {}],
    ['a wrong key', '/?key=wrong', {}],
    ['an empty key', '/?key=', {}],
    ['a key elsewhere than at the start', '/assets/app.js?key=k3y', {}],
    ['a cookie of another start', '/', { cookie: 'rampfold-1=k3y' }],
  ])('answers 403 with %s, and says what to do', async (_what, path, headers) => {
    const answer = await ask(path, headers)
    expect(answer.status).toBe(403)
    expect(answer.text).toMatch(/open the address that Rampfold printed in the terminal/)
    expect(answer.headers['set-cookie']).toBeUndefined()
  })

  it('asks the cookie for events and requests too', async () => {
    expect((await ask('/events')).status).toBe(403)
    expect((await ask('/request/study.read', { origin }, 'POST', encodeMessage({}))).status).toBe(403)
  })

  it.each(['evil.example', '127.0.0.1', 'localhost', '127.0.0.1:1', '127.0.0.1.evil.example'])(
    'refuses the Host %s, key or not',
    async (name) => {
      for (const path of ['/', `/?key=${secret}`]) expect((await ask(path, { host: name, cookie })).status).toBe(403)
    },
  )

  it('answers to localhost as well', async () => {
    expect((await ask('/', { host: `localhost:${server.port}`, cookie })).status).toBe(200)
  })

  it('takes a request only from its own pages', async () => {
    const body = encodeMessage({})
    for (const wrong of [
      'http://evil.example',
      'null',
      `http://localhost:${server.port}`,
      `https://127.0.0.1:${server.port}`,
      'http://127.0.0.1:1',
    ]) {
      expect((await ask('/request/study.read', { cookie, origin: wrong }, 'POST', body)).status).toBe(403)
      expect((await ask('/', { cookie, origin: wrong })).status).toBe(403)
    }
    expect((await ask('/request/study.read', { cookie }, 'POST', body)).status).toBe(403)
    expect((await ask('/request/study.read', { cookie, origin }, 'POST', body)).status).toBe(200)
  })

  it.each([
    '/../secret.txt',
    '/assets/../../secret.txt',
    '/%2e%2e/secret.txt',
    '/..%2fsecret.txt',
    '/assets/..%5c..%5csecret.txt',
    '/linked.txt',
    '/assets/app.js.map',
    '/assets',
    '/etc/passwd',
    '/index.html%00.js',
    '//127.0.0.1/index.html',
    '/package.json',
  ])('reaches nothing of the disk by %s', async (path) => {
    const answer = await ask(path, { cookie })
    expect([400, 403, 404]).toContain(answer.status)
    expect(answer.text).not.toContain('secret')
  })

  it('takes no other methods', async () => {
    for (const method of ['PUT', 'DELETE', 'OPTIONS']) expect((await ask('/', { cookie, origin }, method)).status).toBe(405)
    expect((await ask('/request/study.read', { cookie })).status).toBe(404)
    expect(await ask('/', { cookie }, 'HEAD')).toMatchObject({ status: 200, text: '' })
  })

  it('sends the strict headers with every answer', async () => {
    const answers = await Promise.all([
      ask('/'),
      ask('/', { cookie }),
      ask('/nothing', { cookie }),
      ask('/assets/app.js', { cookie }),
      ask(`/?key=${secret}`),
    ])
    for (const { headers } of answers) {
      const policy = String(headers['content-security-policy'])
      expect(policy).toMatch(/^default-src 'none'; script-src 'self'; style-src 'self'/)
      for (const part of ["connect-src 'self'", "base-uri 'none'", "form-action 'none'", "frame-ancestors 'none'"])
        expect(policy).toContain(part)
      expect(policy).not.toContain('unsafe')
      expect(headers).toMatchObject({
        'x-content-type-options': 'nosniff',
        'referrer-policy': 'no-referrer',
        'cross-origin-opener-policy': 'same-origin',
        'cross-origin-resource-policy': 'same-origin',
        'cache-control': 'no-store',
      })
    }
  })

  it('gives each page a style nonce of its own, and scripts none', async () => {
    const nonces = await Promise.all(
      [1, 2].map(async () => {
        const { text, headers } = await ask('/', { cookie })
        const nonce = /<head><meta property="csp-nonce" content="([^"]+)"/.exec(text)?.[1]
        expect(headers['content-security-policy']).toContain(`style-src 'self' 'nonce-${nonce}';`)
        expect(headers['content-security-policy']).toContain("script-src 'self';")
        return nonce
      }),
    )
    expect(nonces[0]).not.toBe(nonces[1])
  })

  it('answers 413 to a body beyond measure, whether it says so or not', async () => {
    const declared = await ask('/request/study.read', { cookie, origin, 'content-length': String(2 ** 30) }, 'POST').catch(
      (error: unknown) => error,
    )
    expect(declared).toMatchObject({ status: 413 })
    const streamed = await ask(
      '/request/study.read',
      { cookie, origin, 'transfer-encoding': 'chunked' },
      'POST',
      new Uint8Array(6 * 2 ** 20),
    ).catch((error: unknown) => error)
    expect(streamed).toSatisfy(
      (answer: Partial<Answer> & { code?: string }) => answer.status === 413 || ['EPIPE', 'ECONNRESET'].includes(answer.code ?? ''),
    )
    expect((await ask('/', { cookie })).status).toBe(200)
  })

  it('tells a page that comes back where the study is', async () => {
    const stream = await fetch(`${origin}/events`, { headers: { cookie } })
    expect(stream.headers.get('content-type')).toMatch(/^text\/event-stream/)
    let text = ''
    for await (const piece of stream.body ?? []) {
      text += new TextDecoder().decode(piece)
      if (text.includes('data: ')) break
    }
    const data = /^data: (\S+)$/m.exec(text)?.[1] ?? ''
    expect(decodeMessage(Buffer.from(data, 'base64'))).toEqual({ kind: 'study-changed', revision: 1 })
  })
})

const visit = (gate: LoopbackGate, key: string): string =>
  gate.judge({ url: `/?key=${key}`, method: 'GET', headers: { host: '127.0.0.1:1' } }).kind

describe('a key for once', () => {
  it('lets in one visit within its time, while the printed one stays as it is', () => {
    let now = 0
    const gate = createLoopbackGate(1, secret, () => now)
    const [first, second, late] = [gate.keyForOnce(), gate.keyForOnce(), gate.keyForOnce()]
    expect(new Set([first, second, late, secret]).size).toBe(4)
    now = keyForOnce_ms
    expect([first, first, second, second].map((key) => visit(gate, key))).toEqual(['let-in', 'refuse', 'let-in', 'refuse'])
    now += 1
    expect([late, secret, secret].map((key) => visit(gate, key))).toEqual(['refuse', 'let-in', 'let-in'])
  })
})

describe('the built pages', () => {
  it('are missed with a word on what to do', async () => {
    await expect(readRendererFiles(join(folder, 'none'))).rejects.toThrow(/not built.*npm run build/)
  })
})
