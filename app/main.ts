/**
 * The desktop face: wiring of Electron to the pure parts beside this file. Decisions live there, not here.
 */
import { randomUUID } from 'node:crypto'
import * as files from 'node:fs/promises'
import path from 'node:path'
import {
  app,
  BrowserWindow,
  dialog,
  ipcMain,
  Menu,
  nativeTheme,
  protocol,
  session,
  type IpcMainInvokeEvent,
} from 'electron'
import { appResponse } from './appResponse'
import { CLOSE_CHOICES, closeQuestion, createCloseGuard } from './closeGuard'
import type { CommandId } from './contract'
import { dispatch, dispatchDropped } from './dispatch'
import { createSaver } from './files/atomicSave'
import { createPathTokens } from './files/pathTokens'
import { readText } from './files/readText'
import { createGivenFiles } from './givenFiles'
import { createHandlers } from './handlers'
import { COMMAND_WIRE, DROPPED_WIRE, GIVEN_WIRE, REQUEST_WIRE } from './ipc'
import { menuTemplate, platformOf, type MenuItem, type MenuState } from './menu'
import { allowPermission, APP_ORIGIN, isAllowedNavigation, isAllowedRequest, SCHEME } from './policy'
import { PROGRAM, PROGRAM_ID } from './program'
import { windowOptions, windowTitle } from './windowOptions'

const HERE = import.meta.dirname
const PAGE_FOLDER = path.join(HERE, '..', 'renderer')
const PLATFORM = platformOf(process.platform)

app.enableSandbox()
app.setName(PROGRAM.name)
if (PLATFORM === 'win32') app.setAppUserModelId(PROGRAM_ID)
protocol.registerSchemesAsPrivileged([
  { scheme: SCHEME, privileges: { standard: true, secure: true, supportFetchAPI: true } },
])

/** Opens the window; null until Electron is ready. */
let open: (() => void) | null = null
/** A page asks once by itself, when it starts; one that is there already is told. */
const given = createGivenFiles(() => {
  if (open === null) return
  const [window] = BrowserWindow.getAllWindows()
  if (window === undefined) open()
  else window.webContents.send(GIVEN_WIRE)
})

if (app.requestSingleInstanceLock()) {
  app.on('window-all-closed', () => {
    if (PLATFORM !== 'darwin') app.quit()
  })
  app.on('second-instance', (_event, words, folder) => {
    given.give(words.slice(1), folder)
    focusWindow()
  })
  // macOS names files by an event, for the first one before the program is ready.
  app.on('open-file', (event, file) => {
    event.preventDefault()
    given.give([file], path.sep)
  })
  given.give(process.argv.slice(app.isPackaged ? 1 : 2), process.cwd())
  app.on('activate', () => focusWindow())
  app.whenReady().then(start, () => app.exit(1))
} else {
  app.quit()
}

function start(): void {
  protocol.handle(SCHEME, (request) => appResponse(PAGE_FOLDER, request.method, request.url))
  closeTheNetwork()
  open = openWindow
  openWindow()
}

function focusWindow(): void {
  const [window] = BrowserWindow.getAllWindows()
  if (window === undefined) open?.()
  else {
    if (window.isMinimized()) window.restore()
    window.focus()
  }
}

function closeTheNetwork(): void {
  const { defaultSession } = session
  defaultSession.setPermissionRequestHandler((_contents, name, reply, details) => {
    reply(allowPermission(name, details.requestingUrl))
  })
  defaultSession.setPermissionCheckHandler((_contents, name, origin) => allowPermission(name, origin))
  defaultSession.webRequest.onBeforeRequest((details, reply) => reply({ cancel: !isAllowedRequest(details.url) }))
}

function openWindow(): void {
  const window = new BrowserWindow(
    windowOptions({ preload: path.join(HERE, 'preload.cjs'), icon: null, packaged: app.isPackaged }),
  )
  const send = (command: CommandId): void => window.webContents.send(COMMAND_WIRE, command)
  const setMenu = (state: MenuState): void =>
    Menu.setApplicationMenu(Menu.buildFromTemplate(menuTemplate(PLATFORM, state).map((item) => menuEntry(item, send))))

  const guard = createCloseGuard({
    ask: async (title) => {
      const { response } = await dialog.showMessageBox(window, closeQuestion(title))
      return CLOSE_CHOICES[response] ?? 'cancel'
    },
    requestSave: () => send('file.save'),
    close: () => window.close(),
  })
  const handlers = createHandlers({
    dialogs: {
      open: async ({ filters, defaultPath }) => {
        const start = defaultPath === null ? {} : { defaultPath }
        const chosen = await dialog.showOpenDialog(window, { properties: ['openFile'], filters, ...start })
        return chosen.canceled ? null : (chosen.filePaths[0] ?? null)
      },
      save: async ({ filters, defaultPath }) => {
        const start = defaultPath === null ? {} : { defaultPath }
        const chosen = await dialog.showSaveDialog(window, { filters, ...start })
        return chosen.canceled || chosen.filePath === '' ? null : chosen.filePath
      },
    },
    files: {
      readText,
      save: createSaver(files, { durable: true, syncFolder: PLATFORM !== 'win32', unique: randomUUID }),
    },
    tokens: createPathTokens(randomUUID),
    given,
    shell: {
      showDocument: ({ title, edited, undo, redo }, filePath) => {
        guard.documentShown(title, edited)
        window.setTitle(windowTitle(title, edited, PLATFORM))
        window.setDocumentEdited(edited)
        window.setRepresentedFilename(filePath ?? '')
        setMenu({ undo, redo, packaged: app.isPackaged })
      },
      setTheme: (theme) => {
        nativeTheme.themeSource = theme
      },
      saveEnded: (written) => guard.saveEnded(written),
    },
    information: { ...PROGRAM, platform: PLATFORM },
  })

  ipcMain.handle(REQUEST_WIRE, (event, channel: unknown, input: unknown) =>
    dispatch(handlers.table, channel, input, frameOf(event)),
  )
  ipcMain.handle(DROPPED_WIRE, (event, input: unknown) => dispatchDropped(handlers.openPath, input, frameOf(event)))

  setMenu({ undo: null, redo: null, packaged: app.isPackaged })
  window.on('close', (event) => {
    if (!guard.mayClose()) event.preventDefault()
  })
  window.on('closed', () => {
    ipcMain.removeHandler(REQUEST_WIRE)
    ipcMain.removeHandler(DROPPED_WIRE)
  })
  window.once('ready-to-show', () => window.show())
  keepOnPage(window)
  window.loadURL(`${APP_ORIGIN}/`).catch(() => app.exit(1))
}

function keepOnPage(window: BrowserWindow): void {
  const { webContents } = window
  webContents.on('page-title-updated', (event) => event.preventDefault())
  webContents.on('will-navigate', (event) => {
    if (!isAllowedNavigation(event.url)) event.preventDefault()
  })
  webContents.on('will-redirect', (event) => {
    if (!isAllowedNavigation(event.url)) event.preventDefault()
  })
  webContents.on('will-attach-webview', (event) => event.preventDefault())
  webContents.setWindowOpenHandler(() => ({ action: 'deny' }))
}

function frameOf(event: IpcMainInvokeEvent): { url: string; parent: unknown } | null {
  return event.senderFrame === null ? null : { url: event.senderFrame.url, parent: event.senderFrame.parent }
}

function menuEntry(item: MenuItem, send: (command: CommandId) => void): Electron.MenuItemConstructorOptions {
  const { command, submenu, ...rest } = item
  return {
    ...rest,
    ...(command === undefined ? {} : { click: () => send(command) }),
    ...(submenu === undefined ? {} : { submenu: submenu.map((entry) => menuEntry(entry, send)) }),
  }
}
