/**
 * The page's only view of the outside: a few verbs, nothing of Electron itself. Bundled to one CommonJS file.
 */
import { contextBridge, ipcRenderer, webUtils } from 'electron'
import { BRIDGE_NAME, type Answer } from './contract'
import { COMMAND_WIRE, DROPPED_WIRE, GIVEN_WIRE, isChannel, REQUEST_WIRE } from './ipc'

const REFUSED: Answer<never> = {
  ok: false,
  error: { code: 'channel', message: 'This request is not one the program knows.' },
}

contextBridge.exposeInMainWorld(BRIDGE_NAME, {
  request: (channel: unknown, input: unknown): Promise<unknown> =>
    isChannel(channel) ? ipcRenderer.invoke(REQUEST_WIRE, channel, input) : Promise.resolve(REFUSED),

  openDropped: (file: unknown): Promise<unknown> =>
    ipcRenderer.invoke(DROPPED_WIRE, file instanceof File ? webUtils.getPathForFile(file) : ''),

  onCommand: (listener: (command: unknown) => void): (() => void) => {
    // The event object stays here: it would hand the page the sender.
    const forward = (_event: unknown, command: unknown): void => listener(command)
    ipcRenderer.on(COMMAND_WIRE, forward)
    return () => {
      ipcRenderer.removeListener(COMMAND_WIRE, forward)
    }
  },

  onGiven: (listener: () => void): (() => void) => {
    const forward = (): void => listener()
    ipcRenderer.on(GIVEN_WIRE, forward)
    return () => {
      ipcRenderer.removeListener(GIVEN_WIRE, forward)
    }
  },
})
