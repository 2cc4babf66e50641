import { describe, expect, it } from 'vitest'
import { COMMANDS } from '../../app/contract'
import { commandsOf, menuTemplate, platformOf, type MenuItem, type Platform } from '../../app/menu'

const PLATFORMS: readonly Platform[] = ['darwin', 'win32', 'linux']
const STATE = { undo: null, redo: null, packaged: true }

function all(template: readonly MenuItem[]): readonly MenuItem[] {
  return template.flatMap((item) => [item, ...all(item.submenu ?? [])])
}

/** Keys that roles bring along, besides those the template names. */
const ROLE_KEYS: Readonly<Record<string, string>> = {
  quit: 'CmdOrCtrl+Q',
  close: 'CmdOrCtrl+W',
  cut: 'CmdOrCtrl+X',
  copy: 'CmdOrCtrl+C',
  paste: 'CmdOrCtrl+V',
  selectAll: 'CmdOrCtrl+A',
  resetZoom: 'CmdOrCtrl+0',
  zoomIn: 'CmdOrCtrl+Plus',
  zoomOut: 'CmdOrCtrl+-',
  minimize: 'CmdOrCtrl+M',
  hide: 'CmdOrCtrl+H',
}

describe.each(PLATFORMS)('the menu on %s', (platform) => {
  it('offers every command of the contract exactly once', () => {
    expect(commandsOf(menuTemplate(platform, STATE)).toSorted()).toEqual(Object.keys(COMMANDS).toSorted())
  })

  it('has no key twice, those of the roles included', () => {
    const keys = all(menuTemplate(platform, STATE)).flatMap(({ accelerator, role }) => {
      const key = accelerator ?? (role === undefined ? undefined : ROLE_KEYS[role])
      return key === undefined ? [] : [key.replace(/^Cmd\+/, 'CmdOrCtrl+').toLowerCase()]
    })
    expect(keys.length).toBeGreaterThan(10)
    expect(new Set(keys).size).toBe(keys.length)
  })

  it('names the step that undo takes back, and disables it when there is none', () => {
    const undo = (name: string | null) =>
      all(menuTemplate(platform, { ...STATE, undo: name })).find((item) => item.command === 'edit.undo')
    expect(undo('Change diameter')).toMatchObject({ label: 'Undo Change diameter', enabled: true })
    expect(undo(null)).toMatchObject({ label: 'Undo', enabled: false })
  })

  it('shows the development tools only unpackaged', () => {
    const tools = (packaged: boolean) =>
      all(menuTemplate(platform, { ...STATE, packaged })).some((item) => item.role === 'toggleDevTools')
    expect(tools(false)).toBe(true)
    expect(tools(true)).toBe(false)
  })

  it('gives each letter of the menu bar once', () => {
    const letters = menuTemplate(platform, STATE).flatMap(
      ({ label }) => /&(.)/.exec(label ?? '')?.[1]?.toLowerCase() ?? [],
    )
    expect(new Set(letters).size).toBe(letters.length)
  })
})

describe('platform habits', () => {
  it('puts quit and the preferences into the application menu on macOS', () => {
    const [first] = menuTemplate('darwin', STATE)
    expect(first?.label).toBe('Ringwright')
    expect(first?.submenu?.at(-1)).toEqual({ role: 'quit' })
    expect(first?.submenu?.find((item) => item.command === 'view.units')?.accelerator).toBe('Cmd+,')
  })

  it.each(['win32', 'linux'] as const)('puts Exit at the end of File on %s', (platform) => {
    const [file] = menuTemplate(platform, STATE)
    expect(file?.label).toBe('&File')
    expect(file?.submenu?.at(-1)).toEqual({ role: 'quit', label: 'E&xit' })
  })

  it('treats another Unix like Linux', () => {
    expect(platformOf('freebsd')).toBe('linux')
    expect(platformOf('darwin')).toBe('darwin')
  })
})
