import { effectScope } from 'vue'
import { describe, expect, it, vi } from 'vitest'
import { createTheme, readTheme } from '../../../renderer/model/theme'

function surroundings(stored: string | null, systemDark: boolean) {
  const items = new Map<string, string>(stored === null ? [] : [['ringwright.theme', stored]])
  const listeners = new Set<() => void>()
  const dark = {
    matches: systemDark,
    addEventListener: (_: string, listener: unknown) => {
      if (typeof listener === 'function') listeners.add(() => listener())
    },
    removeEventListener: vi.fn(),
  }
  return {
    items,
    dark,
    root: { dataset: {} as DOMStringMap },
    storage: {
      getItem: (key: string) => items.get(key) ?? null,
      setItem: (key: string, value: string) => void items.set(key, value),
    },
    systemTurns(to: boolean) {
      dark.matches = to
      for (const listener of listeners) listener()
    },
  }
}

describe('theme', () => {
  it('follows the system until something is chosen', () => {
    const around = surroundings(null, false)
    const theme = effectScope().run(() => createTheme(around))
    expect(around.root.dataset['theme']).toBe('light')
    around.systemTurns(true)
    expect(around.root.dataset['theme']).toBe('dark')
    theme?.choose('light')
    expect(around.root.dataset['theme']).toBe('light')
    expect(around.items.get('ringwright.theme')).toBe('light')
    around.systemTurns(true)
    expect(around.root.dataset['theme']).toBe('light')
  })

  it('remembers a choice and tells it to the host at once', () => {
    const around = surroundings('dark', false)
    const told = vi.fn()
    effectScope().run(() => createTheme(around, told))
    expect(around.root.dataset['theme']).toBe('dark')
    expect(told).toHaveBeenCalledWith('dark')
  })

  it('takes anything unknown in the storage for the system', () => {
    expect(readTheme('sepia')).toBe('system')
    expect(readTheme(null)).toBe('system')
  })
})
