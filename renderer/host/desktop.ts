/**
 * The desktop face: every request goes through the bridge that the preload put on the page.
 */
import { BRIDGE_NAME, type Answer, type Bridge } from '../../app/contract'
import { TABLE_FILES } from './browser'
import { chosenFile, pickFiles } from './pickFile'
import type { Host, HostFailure } from './types'

const LOST: HostFailure = { failure: 'The program’s other half did not answer. Save a copy and restart the program.' }

/** The bridge of a page's global object, null where there is none. */
export function findBridge(page: object): Bridge | null {
  const candidate: unknown = Reflect.get(page, BRIDGE_NAME)
  return isBridge(candidate) ? candidate : null
}

function isBridge(value: unknown): value is Bridge {
  if (typeof value !== 'object' || value === null) return false
  return ['request', 'openDropped', 'onCommand', 'onGiven'].every(
    (verb) => typeof Reflect.get(value, verb) === 'function',
  )
}

export function createDesktopHost(bridge: Bridge): Host {
  const quietly = (sent: Promise<unknown>): void => {
    sent.catch(() => undefined)
  }
  return {
    kind: 'desktop',
    openPlan: () => settle(bridge.request('plan:open', null)),
    givenPlan: () => settle(bridge.request('plan:given', null)),
    onGiven: (listener) => bridge.onGiven(listener),
    openDropped: (file) => settle(bridge.openDropped(file)),
    savePlan: (file, name, text) => settle(bridge.request('plan:save', { token: file?.token ?? null, name, text })),
    openTable: () => settle(bridge.request('table:open', null)),
    // The page's own file input: hundreds of frames are then read one after another, and no path reaches the page.
    chooseTables: async () => (await pickFiles(document, TABLE_FILES)).map(chosenFile),
    exportFile: (kind, name, content) =>
      settle(
        bridge.request('export:save', {
          kind,
          name,
          text: typeof content === 'string' ? content : null,
          base64: typeof content === 'string' ? null : toBase64(content),
        }),
      ),
    showDocument: ({ title, edited, undo, redo }) =>
      quietly(bridge.request('window:document', { title, edited, undo, redo })),
    setTheme: (theme) => quietly(bridge.request('window:theme', { theme })),
    onCommand: (listener) => bridge.onCommand(listener),
  }
}

/** An answer as the window takes it: the value, or the sentence. */
async function settle<T>(sent: Promise<Answer<T>>): Promise<T | HostFailure> {
  try {
    const answer = await sent
    return answer.ok ? answer.value : { failure: answer.error.message }
  } catch {
    return LOST
  }
}

/** Bytes as base64, in pieces short enough to be arguments of one call. */
function toBase64(bytes: Uint8Array): string {
  const piece = 0x8000
  let text = ''
  for (let start = 0; start < bytes.length; start += piece)
    text += String.fromCharCode(...bytes.subarray(start, start + piece))
  return btoa(text)
}
