import { describe, expect, it } from 'vitest'
import type { Bridge, CommandId } from '../../../app/contract'
import { createHost } from '../../../renderer/host'
import { createDesktopHost, findBridge } from '../../../renderer/host/desktop'

interface Sent {
  readonly channel: string
  readonly input: unknown
}

/** A bridge that answers the same to everything and remembers what it was asked. */
function fakeBridge(answer: unknown) {
  const sent: Sent[] = []
  const listeners: ((command: CommandId) => void)[] = []
  const given: (() => void)[] = []
  const reply = async (channel: string, input: unknown): Promise<unknown> => {
    sent.push({ channel, input })
    if (answer instanceof Error) throw answer
    return answer
  }
  const candidate: unknown = {
    request: reply,
    openDropped: (file: unknown) => reply('dropped', file),
    onCommand: (listener: (command: CommandId) => void) => {
      listeners.push(listener)
      return () => listeners.splice(listeners.indexOf(listener), 1)
    },
    onGiven: (listener: () => void) => {
      given.push(listener)
      return () => given.splice(given.indexOf(listener), 1)
    },
  }
  const bridge = findBridge({ bridge: candidate })
  if (bridge === null) throw new Error('the fake is not a bridge')
  return { bridge, sent, listeners, given }
}

describe('finding the bridge', () => {
  it.each<[string, object]>([
    ['no bridge', {}],
    ['null', { bridge: null }],
    ['a text', { bridge: 'bridge' }],
    ['a verb missing', { bridge: { request: () => 0, openDropped: () => 0, onCommand: () => 0 } }],
    ['a verb that is none', { bridge: { request: 1, openDropped: () => 0, onCommand: () => 0, onGiven: () => 0 } }],
  ])('takes %s for a browser', (_what, page) => {
    expect(findBridge(page)).toBeNull()
  })

  it('decides which host the window gets', () => {
    const { bridge } = fakeBridge({ ok: true, value: null })
    expect(createHost(window).kind).toBe('browser')
    const desktop = Object.assign(Object.create(window), { bridge: bridge satisfies Bridge })
    expect(createHost(desktop).kind).toBe('desktop')
  })
})

describe('the desktop host', () => {
  it('opens and saves through the bridge, by token', async () => {
    const { bridge, sent } = fakeBridge({ ok: true, value: { token: 't', name: 'a.json', text: '{}' } })
    const host = createDesktopHost(bridge)
    expect(await host.openPlan()).toEqual({ token: 't', name: 'a.json', text: '{}' })
    await host.savePlan({ token: 't', name: 'a.json' }, 'a.json', 'text')
    await host.savePlan(null, 'b.json', 'text')
    expect(sent).toEqual([
      { channel: 'plan:open', input: null },
      { channel: 'plan:save', input: { token: 't', name: 'a.json', text: 'text' } },
      { channel: 'plan:save', input: { token: null, name: 'b.json', text: 'text' } },
    ])
  })

  it('sends pictures as base64 and texts as they are', async () => {
    const { bridge, sent } = fakeBridge({ ok: true, value: { name: 'x' } })
    const host = createDesktopHost(bridge)
    await host.exportFile('csv', 'a.csv', 'x,y')
    const bytes = Uint8Array.from({ length: 100_000 }, (_, i) => i % 256)
    await host.exportFile('png', 'b.png', bytes)
    expect(sent[0]?.input).toEqual({ kind: 'csv', name: 'a.csv', text: 'x,y', base64: null })
    expect(sent[1]?.input).toEqual({
      kind: 'png',
      name: 'b.png',
      text: null,
      base64: Buffer.from(bytes).toString('base64'),
    })
  })

  it('turns a refusal into the sentence it came with', async () => {
    const { bridge } = fakeBridge({ ok: false, error: { code: 'write', message: 'The disk is full.' } })
    expect(await createDesktopHost(bridge).savePlan(null, 'a', '')).toEqual({ failure: 'The disk is full.' })
  })

  it('says so when nobody answers', async () => {
    const { bridge } = fakeBridge(new Error('gone'))
    const host = createDesktopHost(bridge)
    expect(await host.openPlan()).toEqual({ failure: expect.stringMatching(/did not answer/) })
    // These have no answer to wait for, and must not fail in the background either.
    host.setTheme('dark')
    host.showDocument({ title: 'a', edited: true, undo: null, redo: null })
  })

  it('passes a dropped file and menu commands on, until unsubscribed', async () => {
    const { bridge, sent, listeners } = fakeBridge({ ok: true, value: { token: 't', name: 'a', text: '' } })
    const host = createDesktopHost(bridge)
    const file = new File(['x'], 'a.json')
    await host.openDropped(file)
    expect(sent).toEqual([{ channel: 'dropped', input: file }])
    const heard: CommandId[] = []
    const stop = host.onCommand((command) => heard.push(command))
    listeners.forEach((listener) => listener('file.save'))
    stop()
    listeners.forEach((listener) => listener('file.open'))
    expect(heard).toEqual(['file.save'])
  })

  it('asks for files the system gave, and hears when one comes, until unsubscribed', async () => {
    const { bridge, sent, given } = fakeBridge({ ok: true, value: null })
    const host = createDesktopHost(bridge)
    expect(await host.givenPlan()).toBeNull()
    expect(sent).toEqual([{ channel: 'plan:given', input: null }])
    let heard = 0
    const stop = host.onGiven(() => (heard += 1))
    given.forEach((listener) => listener())
    stop()
    given.forEach((listener) => listener())
    expect(heard).toBe(1)
  })
})
