import {
  channels,
  type DesktopBridge,
  type HostTransport,
  type RequestAnswers,
  type RequestInput,
  type RequestName,
} from '../../shared-kinetics/contract/host-api.ts'
import { decodeAnswer } from '../../shared-kinetics/contract/wire-answer.ts'
import { decodeMessage, encodeMessage } from '../../shared-kinetics/contract/wire.ts'
import { isHostEvent } from './host-event.ts'
import { HostUnreachable } from './host-unreachable.ts'

/** The bridge that the preload put on the window, or null in a browser. */
export function findDesktopBridge(scope: object): DesktopBridge | null {
  const bridge: unknown = Reflect.get(scope, channels.bridge)
  const fits = typeof bridge === 'object' && bridge !== null && 'request' in bridge && 'subscribe' in bridge
  return fits ? (bridge as DesktopBridge) : null
}

/** The desktop shell's transport: the same bytes as over HTTP, through the preload's one method. */
export function createDesktopTransport(bridge: DesktopBridge): HostTransport {
  return {
    async call<Name extends RequestName>(name: Name, input: RequestInput<Name>): Promise<RequestAnswers[Name]> {
      let bytes: Uint8Array
      try {
        bytes = await bridge.request(name, encodeMessage(input))
      } catch (error) {
        throw new HostUnreachable(error instanceof Error ? error.message : 'The program does not answer.')
      }
      return decodeAnswer(bytes) as RequestAnswers[Name]
    },
    subscribe: (listener) =>
      bridge.subscribe((bytes) => {
        const event = decodeMessage(bytes)
        if (isHostEvent(event)) listener(event)
      }),
  }
}
