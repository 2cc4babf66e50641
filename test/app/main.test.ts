/**
 * The wiring of Electron, run against a fake of it: that each guard is put in place, and before anything is shown.
 */
import { EventEmitter } from 'node:events'
import { beforeAll, describe, expect, it, vi } from 'vitest'

type Listener = (...list: readonly unknown[]) => unknown

const fake = vi.hoisted(() => {
  const order: string[] = []
  const handlers = new Map<string, Listener>()
  const kept: Record<string, unknown> = {}
  const windows: unknown[] = []
  const keep =
    (name: string) =>
    (...list: unknown[]) => {
      order.push(name)
      kept[name] = list.length === 1 ? list[0] : list
    }
  return { order, handlers, kept, keep, windows }
})

vi.mock('electron', async () => {
  const { EventEmitter } = await import('node:events')
  class FakeContents extends EventEmitter {
    readonly sent: unknown[] = []
    readonly setWindowOpenHandler = fake.keep('setWindowOpenHandler')
    send(...list: readonly unknown[]): void {
      this.sent.push(list)
    }
  }
  class BrowserWindow extends EventEmitter {
    readonly webContents = new FakeContents()
    readonly setTitle = fake.keep('setTitle')
    readonly setDocumentEdited = fake.keep('setDocumentEdited')
    readonly setRepresentedFilename = fake.keep('setRepresentedFilename')
    readonly show = fake.keep('show')
    readonly close = fake.keep('close')
    readonly focus = fake.keep('focus')
    isMinimized(): boolean {
      return false
    }
    constructor(options: unknown) {
      super()
      fake.keep('BrowserWindow')(options)
      fake.windows.push(this)
    }
    static getAllWindows(): readonly unknown[] {
      return fake.windows
    }
    async loadURL(url: string): Promise<void> {
      fake.keep('loadURL')(url)
    }
  }
  return {
    app: Object.assign(new EventEmitter(), {
      isPackaged: true,
      enableSandbox: fake.keep('enableSandbox'),
      setName: fake.keep('setName'),
      requestSingleInstanceLock: () => true,
      whenReady: () => Promise.resolve().then(() => fake.order.push('ready')),
      quit: fake.keep('quit'),
      exit: fake.keep('exit'),
    }),
    BrowserWindow,
    dialog: {
      showMessageBox: async () => ({ response: 2 }),
      showOpenDialog: async () => ({ canceled: true, filePaths: [] }),
      showSaveDialog: async () => ({ canceled: true, filePath: '' }),
    },
    ipcMain: {
      handle: (wire: string, handler: Listener) => fake.handlers.set(wire, handler),
      removeHandler: (wire: string) => fake.handlers.delete(wire),
    },
    Menu: { buildFromTemplate: (template: unknown) => template, setApplicationMenu: fake.keep('setApplicationMenu') },
    nativeTheme: { themeSource: 'system' },
    protocol: {
      registerSchemesAsPrivileged: fake.keep('registerSchemesAsPrivileged'),
      handle: (scheme: string, handler: Listener) => fake.keep('protocol.handle')(scheme, handler),
    },
    session: {
      defaultSession: {
        setPermissionRequestHandler: fake.keep('setPermissionRequestHandler'),
        setPermissionCheckHandler: fake.keep('setPermissionCheckHandler'),
        webRequest: { onBeforeRequest: fake.keep('onBeforeRequest') },
      },
    },
  }
})

function kept(name: string): Listener {
  const found = fake.kept[name]
  if (typeof found !== 'function') throw new Error(`${name} was not given a function`)
  return (...list) => Reflect.apply(found, undefined, list)
}

function request(channel: string, input: unknown, frame: unknown = { url: 'app://main/', parent: null }): unknown {
  return fake.handlers.get('ringwright:request')?.({ senderFrame: frame }, channel, input)
}

function theWindow(): EventEmitter & { webContents: EventEmitter & { sent: unknown[] } } {
  const [window] = fake.windows
  if (!(window instanceof EventEmitter) || !('webContents' in window)) throw new Error('no window was opened')
  return Object.assign(window, { webContents: Object(window.webContents) })
}

/** An event that remembers whether it was prevented. */
function preventable(more: object = {}) {
  const event = { prevented: false, preventDefault: () => void (event.prevented = true), ...more }
  return event
}

beforeAll(async () => {
  await import('../../app/main')
  await vi.waitFor(() => expect(fake.order).toContain('loadURL'))
})

describe('the desktop main', () => {
  it('turns the sandbox on and registers its scheme before Electron is ready, guards before the window', () => {
    const at = (name: string) => {
      expect(fake.order).toContain(name)
      return fake.order.indexOf(name)
    }
    expect(at('enableSandbox')).toBeLessThan(at('ready'))
    expect(at('registerSchemesAsPrivileged')).toBeLessThan(at('ready'))
    for (const guard of [
      'protocol.handle',
      'onBeforeRequest',
      'setPermissionRequestHandler',
      'setPermissionCheckHandler',
    ])
      expect(at(guard)).toBeLessThan(at('BrowserWindow'))
    expect(at('setWindowOpenHandler')).toBeLessThan(at('loadURL'))
    expect(fake.kept['registerSchemesAsPrivileged']).toEqual([
      { scheme: 'app', privileges: { standard: true, secure: true, supportFetchAPI: true } },
    ])
    expect(fake.kept['loadURL']).toBe('app://main/')
  })

  it('cancels every request outside its origin', () => {
    const cancelled = (url: string) => {
      let answer: unknown
      kept('onBeforeRequest')({ url }, (reply: unknown) => (answer = reply))
      return answer
    }
    expect(cancelled('https://example.org/')).toEqual({ cancel: true })
    expect(cancelled('app://main/assets/index.js')).toEqual({ cancel: false })
  })

  it('denies permissions, new windows and webviews', () => {
    let granted: unknown
    kept('setPermissionRequestHandler')(null, 'media', (answer: unknown) => (granted = answer), {
      requestingUrl: 'app://main/',
    })
    expect(granted).toBe(false)
    expect(kept('setPermissionCheckHandler')(null, 'geolocation', 'app://main')).toBe(false)
    expect(kept('setWindowOpenHandler')({ url: 'https://example.org/' })).toEqual({ action: 'deny' })
    const event = preventable()
    theWindow().webContents.emit('will-attach-webview', event)
    expect(event.prevented).toBe(true)
  })

  it('keeps the window on its page', () => {
    for (const name of ['will-navigate', 'will-redirect']) {
      const away = preventable({ url: 'https://example.org/' })
      const home = preventable({ url: 'app://main/#wake' })
      theWindow().webContents.emit(name, away)
      theWindow().webContents.emit(name, home)
      expect([away.prevented, home.prevented]).toEqual([true, false])
    }
  })

  it('answers requests of its page, and only of its page', async () => {
    expect(await request('app:information', null)).toMatchObject({ ok: true, value: { name: 'Ringwright' } })
    expect(await request('plan:open', null)).toEqual({ ok: true, value: null })
    expect(await request('app:information', null, { url: 'https://example.org/', parent: null })).toMatchObject({
      ok: false,
      error: { code: 'sender' },
    })
    expect(await request('app:information', null, null)).toMatchObject({ ok: false, error: { code: 'sender' } })
    const dropped = fake.handlers.get('ringwright:dropped')
    expect(await dropped?.({ senderFrame: { url: 'https://example.org/', parent: null } }, '/a.json')).toMatchObject({
      error: { code: 'sender' },
    })
  })

  it('shows the document in title and menu, and sends the menu’s commands to the page', async () => {
    await request('window:document', { title: 'Ring', edited: false, undo: 'Change diameter', redo: null })
    expect(fake.kept['setTitle']).toBe('Ring – Ringwright')
    const menu = JSON.stringify(fake.kept['setApplicationMenu'])
    expect(menu).toContain('Undo Change diameter')
    const template = fake.kept['setApplicationMenu']
    if (!Array.isArray(template)) throw new Error('no menu')
    const items: { label?: string; click?: () => void }[] = template.flatMap((item) => item.submenu)
    items.find((item) => item.label === 'Save')?.click?.()
    expect(theWindow().webContents.sent).toContainEqual(['ringwright:command', 'file.save'])
  })

  it('holds the window while something is unsaved', async () => {
    const close = () => {
      const event = preventable()
      theWindow().emit('close', event)
      return event.prevented
    }
    await request('window:document', { title: 'Ring', edited: true, undo: null, redo: null })
    expect(close()).toBe(true)
    await request('window:document', { title: 'Ring', edited: false, undo: null, redo: null })
    expect(close()).toBe(false)
  })

  it('takes files of a second start and of macOS, tells the page without their paths, and opens each once', async () => {
    const { app } = await import('electron')
    const { sent } = theWindow().webContents
    sent.length = 0
    app.emit('second-instance', {}, ['ringwright', '--flag', 'gone one.json'], '/nowhere')
    expect(sent).toEqual([['ringwright:given']])
    expect(fake.order.at(-1)).toBe('focus')
    const event = preventable()
    app.emit('open-file', event, '/nowhere/gone two.json')
    expect(event.prevented).toBe(true)
    const messages = [await request('plan:given', null), await request('plan:given', null)].map((answer) =>
      JSON.stringify(answer),
    )
    expect(messages[0]).toContain('“gone one.json” could not be opened')
    expect(messages[1]).toContain('“gone two.json” could not be opened')
    expect(messages.join()).not.toContain('/nowhere')
    expect(await request('plan:given', null)).toEqual({ ok: true, value: null })
  })

  it('forgets its wires when the window is gone', () => {
    theWindow().emit('closed')
    expect(fake.handlers.size).toBe(0)
  })
})
