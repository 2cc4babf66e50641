/**
 * The desktop window without Electron: the real built page in real Chromium, answered by the function behind the app
 * scheme; the real built preload over a fake of Electron's few calls; the real handlers over real files and fake dialogs.
 */
import { randomUUID } from 'node:crypto'
import * as files from 'node:fs/promises'
import type { Browser, BrowserContext, Page } from 'playwright-core'
import { appResponse } from '../../app/appResponse'
import type { CommandId, Requests } from '../../app/contract'
import { dispatch, dispatchDropped } from '../../app/dispatch'
import { createSaver } from '../../app/files/atomicSave'
import { createPathTokens } from '../../app/files/pathTokens'
import { readText } from '../../app/files/readText'
import { createGivenFiles } from '../../app/givenFiles'
import { createHandlers } from '../../app/handlers'
import { COMMAND_WIRE, DROPPED_WIRE, GIVEN_WIRE, REQUEST_WIRE } from '../../app/ipc'
import { inProject } from '../../build/scripts/root.mjs'

const ORIGIN = 'https://app.test'

export interface DesktopPage {
  readonly page: Page
  readonly context: BrowserContext
  /** What the dialogs answer, first come first served; null is a cancel. */
  readonly dialogAnswers: (string | null)[]
  /** What the page last told the window. */
  readonly shown: Requests['window:document']['in'][]
  /** Addresses outside the page's origin that were asked for. */
  readonly strayRequests: string[]
  /** What the page wrote to the console as an error, and what it threw. */
  readonly errors: string[]
  /** The system gives the program a file to open. */
  give(file: string): Promise<void>
  /** Choose a command in the menu. */
  command(id: CommandId): Promise<void>
}

/** Stands in the page for `require('electron')`; runs as text, so it uses nothing from here. */
const FAKE_ELECTRON = `
  const listeners = []
  globalThis.__menu = (wire, command) => listeners.filter((l) => l.wire === wire).forEach((l) => l.run({}, command))
  const electron = {
    contextBridge: { exposeInMainWorld: (name, api) => Object.defineProperty(globalThis, name, { value: Object.freeze(api) }) },
    ipcRenderer: {
      invoke: (wire, ...list) => globalThis.__invoke(wire, list),
      on: (wire, run) => listeners.push({ wire, run }),
      removeListener: (wire, run) => listeners.splice(listeners.findIndex((l) => l.run === run), 1),
    },
    webUtils: { getPathForFile: (file) => '/dropped/' + file.name },
  }
  const require = (name) => {
    if (name !== 'electron') throw new Error('a sandboxed preload may not require ' + name)
    return electron
  }`

export async function openDesktopPage(browser: Browser): Promise<DesktopPage> {
  const context = await browser.newContext({ viewport: { width: 1360, height: 860 } })
  const dialogAnswers: (string | null)[] = []
  const shown: Requests['window:document']['in'][] = []
  const strayRequests: string[] = []
  const errors: string[] = []
  const given = createGivenFiles(() => undefined)
  const answerDialog = async () => dialogAnswers.shift() ?? null

  const handlers = createHandlers({
    dialogs: { open: answerDialog, save: answerDialog },
    files: { readText, save: createSaver(files, { durable: true, syncFolder: true, unique: randomUUID }) },
    tokens: createPathTokens(randomUUID),
    given,
    shell: {
      showDocument: (state) => shown.push(state),
      setTheme: () => undefined,
      saveEnded: () => undefined,
    },
    information: { name: 'Ringwright', version: '0', platform: 'linux' },
  })

  await context.exposeBinding('__invoke', (source, wire: unknown, list: unknown) => {
    const frame = { url: source.frame.url(), parent: source.frame.parentFrame() }
    const [first, second] = Array.isArray(list) ? list : []
    if (wire === REQUEST_WIRE) return dispatch(handlers.table, first, second, frame, ORIGIN)
    if (wire === DROPPED_WIRE) return dispatchDropped(handlers.openPath, first, frame, ORIGIN)
    throw new Error('main does not listen on this wire')
  })
  const preload = await files.readFile(inProject('dist', 'app', 'preload.cjs'), 'utf8')
  await context.addInitScript({
    content: `(() => {${FAKE_ELECTRON}\n(function (require) {\n${preload}\n})(require)\n})()`,
  })

  const root = inProject('dist', 'renderer')
  await context.route('**/*', async (route) => {
    const request = route.request()
    const url = request.url()
    if (!url.startsWith(`${ORIGIN}/`)) {
      strayRequests.push(url)
      return route.abort()
    }
    const response = await appResponse(root, request.method(), url, ORIGIN)
    return route.fulfill({
      status: response.status,
      headers: Object.fromEntries(response.headers),
      body: Buffer.from(await response.arrayBuffer()),
    })
  })

  const page = await context.newPage()
  page.on('pageerror', (error) => errors.push(error.message))
  page.on('console', (message) => {
    if (message.type() === 'error') errors.push(message.text())
  })
  await page.goto(`${ORIGIN}/`)
  return {
    page,
    context,
    dialogAnswers,
    shown,
    strayRequests,
    errors,
    give: async (file) => {
      given.give([file], '/')
      await page.evaluate((wire) => Reflect.get(globalThis, '__menu')(wire), GIVEN_WIRE)
    },
    command: (id) =>
      page.evaluate(([wire, command]) => Reflect.get(globalThis, '__menu')(wire, command), [COMMAND_WIRE, id]),
  }
}
