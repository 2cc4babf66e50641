import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dispatch, dispatchDropped, RequestFailure, type HandlerTable } from '../../app/dispatch'

const PAGE = { url: 'app://main/', parent: null }

function tableWith(changes: Partial<HandlerTable> = {}): HandlerTable {
  return {
    'plan:open': async () => ({ token: 't', name: 'a.ringwright.json', text: '{}' }),
    'plan:given': async () => null,
    'plan:save': async () => null,
    'table:open': async () => null,
    'export:save': async () => null,
    'window:document': async () => null,
    'window:theme': async () => null,
    'app:information': async () => ({ name: 'Ringwright', version: '0', platform: 'linux' }),
    ...changes,
  }
}

describe('dispatch', () => {
  it('hands the decoded input to the handler and the value back', async () => {
    const answer = await dispatch(tableWith(), 'plan:open', null, PAGE)
    expect(answer).toEqual({ ok: true, value: { token: 't', name: 'a.ringwright.json', text: '{}' } })
  })

  it('refuses a sender that is not our page before it looks at anything else', async () => {
    let called = false
    const table = tableWith({
      'plan:open': async () => {
        called = true
        return null
      },
    })
    for (const frame of [{ url: 'https://example.org/', parent: null }, { url: 'app://main/', parent: {} }, null]) {
      expect(await dispatch(table, 'plan:open', null, frame)).toMatchObject({ ok: false, error: { code: 'sender' } })
    }
    expect(called).toBe(false)
  })

  it.each(['plan:delete', '__proto__', 'constructor', 'toString', '', null, 3, {}])(
    'refuses the channel %j',
    async (channel) => {
      expect(await dispatch(tableWith(), channel, null, PAGE)).toMatchObject({ ok: false, error: { code: 'channel' } })
    },
  )

  it('refuses an input its decoder does not take, in a sentence', async () => {
    expect(await dispatch(tableWith(), 'window:theme', { theme: 'sepia' }, PAGE)).toEqual({
      ok: false,
      error: {
        code: 'input',
        message: 'The request “window:theme” was refused: theme must be one of system, light, dark.',
      },
    })
  })

  it('turns a failure meant for the user into data', async () => {
    const table = tableWith({ 'plan:open': () => Promise.reject(new RequestFailure('read', 'The disk is gone.')) })
    expect(await dispatch(table, 'plan:open', null, PAGE)).toEqual({
      ok: false,
      error: { code: 'read', message: 'The disk is gone.' },
    })
  })

  it('keeps the details of an unexpected failure to itself', async () => {
    const table = tableWith({ 'plan:open': () => Promise.reject(new Error('/home/someone/secret.json')) })
    const answer = await dispatch(table, 'plan:open', null, PAGE)
    expect(answer).toMatchObject({ ok: false, error: { code: 'internal' } })
    expect(JSON.stringify(answer)).not.toContain('secret')
  })

  it('never throws, whatever it is sent', async () => {
    await fc.assert(
      fc.asyncProperty(fc.anything(), fc.anything(), async (channel, input) => {
        expect(typeof (await dispatch(tableWith(), channel, input, PAGE)).ok).toBe('boolean')
      }),
    )
  })
})

describe('dispatchDropped', () => {
  const open = async (filePath: string) => ({ token: 't', name: filePath, text: '' })

  it('opens a dropped plan for our page', async () => {
    expect(await dispatchDropped(open, '/a/b.json', PAGE)).toEqual({
      ok: true,
      value: { token: 't', name: '/a/b.json', text: '' },
    })
  })

  it('refuses another sender, and a path no plan or table has', async () => {
    expect(await dispatchDropped(open, '/a/b.json', { url: 'https://x.org/', parent: null })).toMatchObject({
      ok: false,
    })
    expect(await dispatchDropped(open, '/etc/passwd', PAGE)).toMatchObject({ ok: false, error: { code: 'input' } })
  })
})
