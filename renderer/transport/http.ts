import {
  httpPaths,
  type HostEvent,
  type HostTransport,
  type RequestAnswers,
  type RequestInput,
  type RequestName,
} from '../../shared-kinetics/contract/host-api.ts'
import { decodeAnswer } from '../../shared-kinetics/contract/wire-answer.ts'
import { decodeMessage, encodeMessage } from '../../shared-kinetics/contract/wire.ts'
import { HostUnreachable } from './host-unreachable.ts'
import { isHostEvent } from './host-event.ts'

/** The browser shell's transport: one POST a request with the binary wire as body, and one event stream of the same bytes in base64. */
export function createHttpTransport(): HostTransport {
  return {
    async call<Name extends RequestName>(name: Name, input: RequestInput<Name>): Promise<RequestAnswers[Name]> {
      const bytes = await post(name, encodeMessage(input))
      return decodeAnswer(bytes) as RequestAnswers[Name]
    },
    subscribe(listener, lost = () => undefined) {
      let stopped = false
      const source = new EventSource(httpPaths.events, { withCredentials: true })
      source.addEventListener('message', (message: MessageEvent<string>) => {
        const event = decodeEvent(message.data)
        if (event !== null) listener(event)
      })
      source.addEventListener('error', () => {
        // A stream breaks for lesser reasons too (a machine that slept); only a host that does not answer is lost.
        post('program.describe', encodeMessage({})).catch((error: unknown) => {
          if (error instanceof HostUnreachable && !stopped) lost(error)
        })
      })
      return () => {
        stopped = true
        source.close()
      }
    },
  }
}

async function post(name: RequestName, body: Uint8Array): Promise<Uint8Array> {
  let response: Response
  try {
    response = await fetch(httpPaths.request + name, {
      method: 'POST',
      credentials: 'same-origin',
      headers: { 'content-type': 'application/octet-stream' },
      // The wire's own buffer; the cast only drops SharedArrayBuffer, which fetch does not take.
      body: body as Uint8Array<ArrayBuffer>,
    })
  } catch {
    throw new HostUnreachable('The program behind this page does not answer.')
  }
  const bytes = new Uint8Array(await response.arrayBuffer())
  const type = response.headers.get('content-type') ?? ''
  if (type.startsWith('application/octet-stream')) return bytes
  if (response.status === 401 || response.status === 403) {
    throw new HostUnreachable(
      'This page does not belong to the running program any more. Open the address that it printed when it started.',
    )
  }
  throw new HostUnreachable(`The program behind this page answered with status ${response.status}.`)
}

function decodeEvent(base64: string): HostEvent | null {
  try {
    const value = decodeMessage(Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0)))
    return isHostEvent(value) ? value : null
  } catch {
    return null
  }
}
