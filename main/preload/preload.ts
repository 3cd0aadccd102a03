import { contextBridge, ipcRenderer, type IpcRendererEvent } from 'electron'
import { channels } from '../../shared-kinetics/contract/channels.ts'
import type { DesktopBridge } from '../../shared-kinetics/contract/host-api.ts'

/** All a page of the desktop shell is given: ask, and listen. Neither `ipcRenderer` nor a channel name reaches it. */
const bridge: DesktopBridge = {
  request: async (name, body) => (await ipcRenderer.invoke(channels.request, name, body)) as Uint8Array,
  subscribe: (listener) => {
    const hear = (_event: IpcRendererEvent, bytes: Uint8Array): void => {
      listener(bytes)
    }
    ipcRenderer.on(channels.event, hear)
    return () => {
      ipcRenderer.off(channels.event, hear)
    }
  },
}
contextBridge.exposeInMainWorld(channels.bridge, bridge)
