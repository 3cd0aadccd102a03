import { randomBytes } from 'node:crypto'
import { readdir, readFile } from 'node:fs/promises'
import { join } from 'node:path'

/** A file of the built renderer as both shells serve it. */
export interface RendererFile {
  readonly mediaType: string
  readonly bytes: Uint8Array
}

/** URL path to file: whatever is not in here does not exist for a page. */
export type RendererFiles = ReadonlyMap<string, RendererFile>

const mediaTypes: Readonly<Record<string, string>> = {
  html: 'text/html; charset=utf-8',
  js: 'text/javascript; charset=utf-8',
  css: 'text/css; charset=utf-8',
  json: 'application/json',
  svg: 'image/svg+xml',
  png: 'image/png',
  ico: 'image/x-icon',
  woff2: 'font/woff2',
  txt: 'text/plain; charset=utf-8',
}

/**
 * Reads the built renderer into memory once. Links and files of other kinds (source maps among them) are left out, and a
 * request can reach nothing but what was found now.
 * @throws Error when the folder holds no built renderer
 */
export async function readRendererFiles(folder: string): Promise<RendererFiles> {
  const files = new Map<string, RendererFile>()
  const walk = async (path: string, urlPath: string): Promise<void> => {
    for (const entry of await readdir(path, { withFileTypes: true })) {
      if (entry.isDirectory()) await walk(join(path, entry.name), `${urlPath}${entry.name}/`)
      const mediaType = mediaTypes[entry.name.split('.').at(-1)?.toLowerCase() ?? '']
      if (!entry.isFile() || mediaType === undefined) continue
      files.set(`${urlPath}${entry.name}`, { mediaType, bytes: await readFile(join(path, entry.name)) })
    }
  }
  await walk(folder, '/').catch(() => undefined)
  const index = files.get('/index.html')
  if (index === undefined) throw new Error(`The program's pages are not built: there is no index.html in ${folder}. Run "npm run build".`)
  return files.set('/', index)
}

/** A file as it goes out: in pages the nonce stands where scripts that add styles of their own look for it. */
export interface ServedFile extends RendererFile {
  readonly headers: Readonly<Record<string, string>>
}

export function serveRendererFile(files: RendererFiles, urlPath: string): ServedFile | null {
  const file = files.get(urlPath)
  if (file === undefined) return null
  if (!file.mediaType.startsWith('text/html')) return { ...file, headers: { ...securityHeaders(), 'content-type': file.mediaType } }
  const nonce = randomBytes(18).toString('base64')
  const page = new TextDecoder()
    .decode(file.bytes)
    .replace(/<head>/i, (head) => `${head}<meta property="csp-nonce" content="${nonce}" nonce="${nonce}">`)
  const headers = { ...securityHeaders(nonce), 'content-type': file.mediaType }
  return { mediaType: file.mediaType, bytes: new TextEncoder().encode(page), headers }
}

/**
 * Only this program's own files run or show, and nothing is asked of any other address.
 * @param nonce - lets the style element that a component library adds through; no inline script is ever let through
 */
export const contentSecurityPolicy = (nonce?: string): string =>
  [
    "default-src 'none'",
    "script-src 'self'",
    nonce === undefined ? "style-src 'self'" : `style-src 'self' 'nonce-${nonce}'`,
    "img-src 'self' data: blob:",
    "font-src 'self'",
    "connect-src 'self'",
    "base-uri 'none'",
    "form-action 'none'",
    "frame-ancestors 'none'",
  ].join('; ')

/** Headers of every answer of both shells. */
export const securityHeaders = (nonce?: string): Readonly<Record<string, string>> => ({
  'content-security-policy': contentSecurityPolicy(nonce),
  'x-content-type-options': 'nosniff',
  'x-frame-options': 'DENY',
  'referrer-policy': 'no-referrer',
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-resource-policy': 'same-origin',
  'permissions-policy': 'camera=(), microphone=(), geolocation=(), usb=(), serial=()',
  'cache-control': 'no-store',
})
