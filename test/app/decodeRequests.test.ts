import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { decodeDroppedPath, DECODERS } from '../../app/decodeRequests'
import { isChannel } from '../../app/ipc'
import { MAXIMUM_FILE_BYTES } from '../../app/limits'

const CHANNELS = Object.keys(DECODERS).filter(isChannel)

describe('the decoders', () => {
  it('stand for every channel of the contract', () => {
    expect(CHANNELS.toSorted()).toEqual([
      'app:information',
      'export:save',
      'plan:given',
      'plan:open',
      'plan:save',
      'table:open',
      'window:document',
      'window:theme',
    ])
  })

  it('never throw, whatever JSON they are given', () => {
    fc.assert(
      fc.property(fc.constantFrom(...CHANNELS), fc.jsonValue(), (channel, input) => {
        expect(typeof DECODERS[channel](input).ok).toBe('boolean')
      }),
    )
  })

  it('never throw on what JSON cannot hold', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...CHANNELS),
        fc.anything({ withNullPrototype: true, withBigInt: true }),
        (channel, input) => {
          expect(typeof DECODERS[channel](input).ok).toBe('boolean')
        },
      ),
    )
  })

  it('accept random objects of the right shape and give back exactly what they hold', () => {
    const save = fc.record({
      token: fc.option(fc.string({ maxLength: 200 })),
      name: fc.string({ maxLength: 200 }),
      text: fc.string(),
    })
    fc.assert(
      fc.property(save, (input) => {
        expect(DECODERS['plan:save'](input)).toEqual({ ok: true, value: input })
      }),
    )
  })

  it.each([
    ['plan:open', {}, /takes no input/],
    ['plan:save', null, /must be an object/],
    ['plan:save', [], /must be an object/],
    ['plan:save', { token: null, name: 'a' }, /text is missing/],
    ['plan:save', { token: 3, name: 'a', text: '' }, /token must be a text/],
    ['plan:save', { token: null, name: 'a', text: '', path: '/etc/hosts' }, /a field that is not known: path/],
    [
      'plan:save',
      { token: null, name: 'x'.repeat(256), text: '' },
      /name must have at most 255 characters, it has 256/,
    ],
    [
      'export:save',
      { kind: 'exe', name: 'a', text: '', base64: null },
      /kind must be one of csv, svg, png, vtp, gltf, html, txt/,
    ],
    ['export:save', { kind: 'csv', name: 'a', text: null, base64: 'AAAA' }, /csv export must carry text/],
    ['export:save', { kind: 'gltf', name: 'a', text: null, base64: 'AAAA' }, /gltf export must carry text/],
    ['export:save', { kind: 'png', name: 'a', text: 'x', base64: null }, /png export must carry base64/],
    ['export:save', { kind: 'png', name: 'a', text: null, base64: 'AAA' }, /base64 must be base64/],
    ['export:save', { kind: 'png', name: 'a', text: null, base64: '<b>=' }, /base64 must be base64/],
    ['window:document', { title: 'a', edited: 'yes', undo: null, redo: null }, /edited must be true or false/],
    ['window:theme', { theme: 'sepia' }, /theme must be one of system, light, dark/],
  ] as const)('%s refuses %j', (channel, input, message) => {
    const decoded = DECODERS[channel](input)
    expect(decoded.ok).toBe(false)
    expect(decoded.ok ? '' : decoded.message).toMatch(message)
  })

  it('does not take a prototype for a field', () => {
    const input: unknown = JSON.parse('{"token":null,"name":"a","text":"b","__proto__":{"polluted":true}}')
    expect(DECODERS['plan:save'](input).ok).toBe(false)
    expect(Reflect.get({}, 'polluted')).toBeUndefined()
    expect(DECODERS['plan:save'](Object.create({ token: null, name: 'a', text: 'b' })).ok).toBe(false)
  })

  it('take a plan of 50 MB and refuse a longer one, counted in bytes', () => {
    const save = (text: string) => DECODERS['plan:save']({ token: null, name: 'a', text })
    expect(save('x'.repeat(MAXIMUM_FILE_BYTES)).ok).toBe(true)
    expect(save('x'.repeat(MAXIMUM_FILE_BYTES + 1)).ok).toBe(false)
    // Two bytes a letter in UTF-8.
    expect(save('é'.repeat(MAXIMUM_FILE_BYTES / 2)).ok).toBe(true)
    expect(save('é'.repeat(MAXIMUM_FILE_BYTES / 2 + 1)).ok).toBe(false)
  })
})

describe('decodeDroppedPath', () => {
  it('takes plans and tables', () => {
    expect(decodeDroppedPath('/home/someone/a.ringwright.json').ok).toBe(true)
    expect(decodeDroppedPath('C:\\data\\Speed.CSV').ok).toBe(true)
  })

  it.each([[''], ['/etc/passwd'], ['/home/someone/.ssh/key'], ['/a\0.json'], [null], [{}]])('refuses %j', (input) => {
    expect(decodeDroppedPath(input).ok).toBe(false)
  })
})
