import { protocol } from 'electron'
import { serveRendererFile, securityHeaders, type RendererFiles } from '../host/renderer-files.ts'

/** Where the desktop window's pages live: `app://rampfold/`. No file of the disk has an address. */
const appScheme = 'app'
export const appOrigin = 'app://rampfold'

/** Must be called before the app is ready. */
export function registerAppScheme(): void {
  protocol.registerSchemesAsPrivileged([{ scheme: appScheme, privileges: { standard: true, secure: true, supportFetchAPI: true } }])
}

/** Serves the built renderer, with the same headers as the loopback server. */
export function serveAppScheme(files: RendererFiles): void {
  protocol.handle(appScheme, (request) => answerAppRequest(files, request))
}

function answerAppRequest(files: RendererFiles, request: Request): Response {
  if (request.method !== 'GET') return refuse(405, 'This address does not take requests of this kind.')
  if (!isAppAddress(request.url)) return refuse(403, 'This is not an address of the program.')
  const file = serveRendererFile(files, new URL(request.url).pathname)
  return file === null
    ? refuse(404, 'There is nothing at this address.')
    : new Response(new Uint8Array(file.bytes), { headers: file.headers })
}

const refuse = (status: number, text: string): Response =>
  new Response(text, { status, headers: { ...securityHeaders(), 'content-type': 'text/plain; charset=utf-8' } })

/** Whether an address belongs to the program's own pages. Compared by parts: Node gives a custom scheme no origin. */
export function isAppAddress(address: string): boolean {
  if (!URL.canParse(address)) return false
  const url = new URL(address)
  return url.protocol === `${appScheme}:` && url.host === 'rampfold' && url.username === '' && url.port === ''
}
