/**
 * The window's construction, whole, so that a test can compare it whole.
 */
import type { Platform } from './menu'
import { PROGRAM } from './program'

export interface WindowEnvironment {
  readonly preload: string
  readonly icon: string | null
  readonly packaged: boolean
}

/** Options of the one BrowserWindow: isolated, sandboxed, no Node in the page, hidden until it has something to show. */
export function windowOptions(environment: WindowEnvironment) {
  return {
    title: PROGRAM.name,
    width: 1360,
    height: 860,
    minWidth: 1024,
    minHeight: 640,
    show: false,
    ...(environment.icon === null ? {} : { icon: environment.icon }),
    webPreferences: {
      preload: environment.preload,
      contextIsolation: true,
      sandbox: true,
      nodeIntegration: false,
      nodeIntegrationInWorker: false,
      nodeIntegrationInSubFrames: false,
      webviewTag: false,
      webSecurity: true,
      allowRunningInsecureContent: false,
      experimentalFeatures: false,
      navigateOnDragDrop: false,
      safeDialogs: true,
      spellcheck: false,
      devTools: !environment.packaged,
    },
  }
}

/** Title bar of the window. macOS shows unsaved changes in the close button, the others need a mark. */
export function windowTitle(document: string, edited: boolean, platform: Platform): string {
  return `${edited && platform !== 'darwin' ? '• ' : ''}${document} – ${PROGRAM.name}`
}
