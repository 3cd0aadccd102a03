import { createHash, randomBytes, timingSafeEqual } from 'node:crypto'
import type { IncomingMessage } from 'node:http'

export type Verdict =
  /** The first visit with the key: the cookie is set and the key leaves the address line. */
  | { readonly kind: 'let-in'; readonly cookie: string }
  | { readonly kind: 'pass'; readonly path: string }
  | { readonly kind: 'refuse'; readonly status: 400 | 403; readonly reason: string }

/** What a request says of itself; all that the gate looks at. */
type Visit = Pick<IncomingMessage, 'url' | 'method' | 'headers'>

export interface LoopbackGate {
  judge(request: Visit): Verdict
  /** A key that lets in once, and not after `keyForOnce_ms`. */
  keyForOnce(): string
}

/** A browser that has to be started first takes its time. */
export const keyForOnce_ms = 30_000

/**
 * Who may speak to the loopback server: a browser that was let in with this start's key (a cookie scripts cannot read and other
 * sites cannot send), naming this very address as Host (a name that was made to point here is refused) and, with anything but a
 * plain look, as Origin.
 * @param now - milliseconds that only go up
 */
export function createLoopbackGate(port: number, secret: string, now: () => number = () => performance.now()): LoopbackGate {
  const hosts = new Set([`127.0.0.1:${port}`, `localhost:${port}`])
  // Cookies do not know ports: two hosts on one machine must not overwrite each other's.
  const cookieName = `rampfold-${port}`
  const once = new Map<string, number>()

  const isKey = (key: string): boolean => {
    if (isSame(key, secret)) return true
    const name = hashOf(key)
    const until = once.get(name)
    once.delete(name)
    return until !== undefined && now() <= until
  }

  return {
    keyForOnce: () => {
      const key = randomBytes(32).toString('base64url')
      once.set(hashOf(key), now() + keyForOnce_ms)
      return key
    },
    judge: (request) => {
      const { host, origin } = request.headers
      if (host === undefined || !hosts.has(host)) return refuse('This program answers at its own address only.')
      const url = parseTarget(request.url, host)
      if (url === null) return refuse('This is not an address.', 400)
      const isLook = request.method === 'GET' || request.method === 'HEAD'
      if ((origin !== undefined || !isLook) && origin !== `http://${host}`) return refuse('Only its own pages may ask this program.')
      const key = url.searchParams.get('key')
      if (request.method === 'GET' && url.pathname === '/' && key !== null && isKey(key)) {
        return { kind: 'let-in', cookie: `${cookieName}=${secret}; HttpOnly; SameSite=Strict; Path=/` }
      }
      if (!isSame(cookieOf(request, cookieName), secret)) {
        return refuse('Please open the address that Rampfold printed in the terminal when it started. It holds the key of this start.')
      }
      return { kind: 'pass', path: url.pathname }
    },
  }
}

const refuse = (reason: string, status: 400 | 403 = 403): Verdict => ({ kind: 'refuse', status, reason })

function parseTarget(target: string | undefined, host: string): URL | null {
  if (target === undefined || !target.startsWith('/') || target.startsWith('//')) return null
  return URL.canParse(target, `http://${host}`) ? new URL(target, `http://${host}`) : null
}

function cookieOf(request: Visit, name: string): string {
  for (const part of (request.headers.cookie ?? '').split(';')) {
    const [key, value] = part.trim().split('=', 2)
    if (key === name) return value ?? ''
  }
  return ''
}

/** Compared in a time that says nothing of where the two differ. */
const isSame = (a: string, b: string): boolean => timingSafeEqual(digest(a), digest(b))
const digest = (text: string): Buffer => createHash('sha256').update(text).digest()
/** Keys are looked up by their hash, whose place says nothing of the key. */
const hashOf = (key: string): string => digest(key).toString('hex')
