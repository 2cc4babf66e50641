import { describe, expect, it } from 'vitest'
import { commandOf, keyedCommands, keyText } from '../../../renderer/model/keys'

function press(key: string, more: Partial<Record<'ctrlKey' | 'metaKey' | 'shiftKey' | 'altKey', boolean>> = {}) {
  return { key, ctrlKey: false, metaKey: false, shiftKey: false, altKey: false, ...more }
}

describe('commandOf', () => {
  it('reads Ctrl elsewhere and Cmd on a Mac', () => {
    expect(commandOf(press('s', { ctrlKey: true }), 'browser', false)).toBe('file.save')
    expect(commandOf(press('s', { metaKey: true }), 'browser', false)).toBeNull()
    expect(commandOf(press('s', { metaKey: true }), 'browser', true)).toBe('file.save')
    expect(commandOf(press('Enter', { ctrlKey: true }), 'browser', false)).toBe('run.refresh')
  })

  it('tells Shift apart and redoes by Y as well', () => {
    expect(commandOf(press('S', { ctrlKey: true, shiftKey: true }), 'browser', false)).toBe('file.saveAs')
    expect(commandOf(press('Z', { ctrlKey: true, shiftKey: true }), 'browser', false)).toBe('edit.redo')
    expect(commandOf(press('z', { ctrlKey: true }), 'browser', false)).toBe('edit.undo')
    expect(commandOf(press('y', { ctrlKey: true }), 'browser', false)).toBe('edit.redo')
  })

  it('leaves to the browser what steers the browser', () => {
    for (const key of ['n', 'e', 't', 'w', 'l', 'r', 'p', 'f'])
      expect(commandOf(press(key, { ctrlKey: true }), 'browser', false), key).toBeNull()
    expect(commandOf(press('F5'), 'browser', false)).toBeNull()
    expect(commandOf(press('s', { ctrlKey: true, altKey: true }), 'browser', false)).toBeNull()
  })

  it('has more keys on the desktop, where no browser claims them', () => {
    expect(commandOf(press('n', { ctrlKey: true }), 'desktop', false)).toBe('file.new')
    expect(keyedCommands('desktop')).toEqual(expect.arrayContaining(keyedCommands('browser').slice()))
  })

  it('writes keys in the words of the platform', () => {
    expect(keyText('CmdOrCtrl+Shift+S', false)).toBe('Ctrl+Shift+S')
    expect(keyText('CmdOrCtrl+Shift+S', true)).toBe('⌘⇧S')
  })
})
