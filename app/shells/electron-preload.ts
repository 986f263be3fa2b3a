/** All that the page is given of the world outside it: one call, and progress by the id of a call. */
import { contextBridge, ipcRenderer, type IpcRendererEvent } from 'electron'
import type { Call, Envelope, Progress } from '../contract/wire.ts'

contextBridge.exposeInMainWorld('levelstead', {
  call(call: Call): Promise<Envelope> {
    return ipcRenderer.invoke('levelstead:call', call) as Promise<Envelope>
  },
  /** Gives back what ends the listening. */
  onProgress(listener: (progress: Progress) => void): () => void {
    function heard(_event: IpcRendererEvent, progress: Progress): void {
      listener(progress)
    }
    ipcRenderer.on('levelstead:progress', heard)
    return () => ipcRenderer.off('levelstead:progress', heard)
  },
})
