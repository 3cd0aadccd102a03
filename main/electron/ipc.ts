import { BrowserWindow, ipcMain, type IpcMainInvokeEvent } from 'electron'
import { channels } from '../../shared-kinetics/contract/host-api.ts'
import { encodeFailure } from '../../shared-kinetics/contract/wire-answer.ts'
import { encodeMessage } from '../../shared-kinetics/contract/wire.ts'
import { KineticsError } from '../../shared-kinetics/errors.ts'
import type { Host } from '../host/create-host.ts'
import { isAppAddress } from './app-scheme.ts'

/** No request is larger than a piece of an upload in its envelope or a study's change. */
export const largestRequestBytes = 4 * 2 ** 20

/**
 * The one gate between pages and host: a single channel, open to the main frame of our own windows on our own address only.
 * Whoever else knocks, or sends something else than a name and bytes, gets an encoded failure.
 * @returns the call that closes the gate
 */
export function openIpcGate(host: Host): () => void {
  ipcMain.handle(channels.request, async (event: IpcMainInvokeEvent, ...words: unknown[]): Promise<Uint8Array> => {
    if (!isOurPage(event)) return encodeFailure(new KineticsError('bad-request', "Only the program's own pages may ask it."))
    const [name, body] = words
    if (words.length !== 2 || typeof name !== 'string' || !(body instanceof Uint8Array)) {
      return encodeFailure(new KineticsError('bad-request', 'A request is a name and bytes.'))
    }
    if (body.byteLength > largestRequestBytes) {
      return encodeFailure(new KineticsError('too-large', `A request holds at most ${largestRequestBytes} bytes.`))
    }
    return host.answer(name, body)
  })
  const stopEvents = host.subscribe((event) => {
    const bytes = encodeMessage(event)
    for (const window of BrowserWindow.getAllWindows()) {
      if (!window.isDestroyed()) window.webContents.send(channels.event, bytes)
    }
  })
  return () => {
    stopEvents()
    ipcMain.removeHandler(channels.request)
  }
}

function isOurPage({ sender, senderFrame }: IpcMainInvokeEvent): boolean {
  // null: the frame has gone since it asked.
  if (senderFrame === null || senderFrame !== sender.mainFrame) return false
  return BrowserWindow.getAllWindows().some((window) => window.webContents === sender) && isAppAddress(senderFrame.url)
}
