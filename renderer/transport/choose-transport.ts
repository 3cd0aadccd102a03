import type { HostTransport } from '../../shared-kinetics/contract/host-api.ts'
import { createDesktopTransport, findDesktopBridge } from './desktop.ts'
import { createHttpTransport } from './http.ts'

/** The way to the host that this window has. */
export function chooseTransport(scope: object): HostTransport {
  const bridge = findDesktopBridge(scope)
  return bridge === null ? createHttpTransport() : createDesktopTransport(bridge)
}
