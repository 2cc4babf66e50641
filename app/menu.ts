/**
 * The menu as data: one template per platform and document state. Main turns `command` into a click.
 */
import { COMMANDS, type CommandId } from './contract'

export type Platform = 'darwin' | 'win32' | 'linux'

/** A platform the menu knows; any other Unix is treated like Linux. */
export function platformOf(name: string): Platform {
  return name === 'darwin' || name === 'win32' ? name : 'linux'
}

/** Roles the shell carries out by itself. */
export type MenuRole =
  | 'services'
  | 'hide'
  | 'hideOthers'
  | 'unhide'
  | 'quit'
  | 'close'
  | 'cut'
  | 'copy'
  | 'paste'
  | 'selectAll'
  | 'resetZoom'
  | 'zoomIn'
  | 'zoomOut'
  | 'togglefullscreen'
  | 'minimize'
  | 'zoom'
  | 'front'
  | 'toggleDevTools'

export interface MenuItem {
  readonly label?: string
  readonly role?: MenuRole
  readonly type?: 'separator'
  readonly command?: CommandId
  readonly accelerator?: string
  readonly enabled?: boolean
  readonly submenu?: readonly MenuItem[]
}

export interface MenuState {
  /** Name of the step undo takes back, null when there is none. */
  readonly undo: string | null
  readonly redo: string | null
  readonly packaged: boolean
}

const SEPARATOR: MenuItem = { type: 'separator' }

/** Pages in the order of their tabs. */
const PAGES: readonly CommandId[] = ['view.stroke', 'view.thrust', 'view.wake', 'view.tankRun', 'view.readings']

export function menuTemplate(platform: Platform, state: MenuState): readonly MenuItem[] {
  const mac = platform === 'darwin'
  return [
    ...(mac ? [applicationMenu()] : []),
    fileMenu(mac),
    editMenu(mac, state),
    { label: '&Run', submenu: [command('run.refresh')] },
    viewMenu(state),
    ...(mac ? [windowMenu()] : []),
    helpMenu(mac),
  ]
}

/** Every command a template offers, at any depth. */
export function commandsOf(template: readonly MenuItem[]): readonly CommandId[] {
  return template.flatMap((item) => [
    ...(item.command === undefined ? [] : [item.command]),
    ...commandsOf(item.submenu ?? []),
  ])
}

function command(id: CommandId, change: Partial<MenuItem> = {}): MenuItem {
  const { title, key } = COMMANDS[id]
  return { label: title, command: id, ...(key === null ? {} : { accelerator: key }), ...change }
}

function applicationMenu(): MenuItem {
  return {
    label: 'Ringwright',
    submenu: [
      command('help.about'),
      SEPARATOR,
      command('view.units', { accelerator: 'Cmd+,' }),
      SEPARATOR,
      { role: 'services' },
      SEPARATOR,
      { role: 'hide' },
      { role: 'hideOthers' },
      { role: 'unhide' },
      SEPARATOR,
      { role: 'quit' },
    ],
  }
}

function fileMenu(mac: boolean): MenuItem {
  return {
    label: '&File',
    submenu: [
      command('file.new'),
      command('file.open'),
      command('file.examples'),
      SEPARATOR,
      command('file.save'),
      command('file.saveAs'),
      command('file.export'),
      SEPARATOR,
      command('file.print'),
      SEPARATOR,
      mac ? { role: 'close' } : { role: 'quit', label: 'E&xit' },
    ],
  }
}

function editMenu(mac: boolean, state: MenuState): MenuItem {
  return {
    label: '&Edit',
    submenu: [
      command('edit.undo', {
        label: state.undo === null ? 'Undo' : `Undo ${state.undo}`,
        enabled: state.undo !== null,
      }),
      command('edit.redo', {
        label: state.redo === null ? 'Redo' : `Redo ${state.redo}`,
        enabled: state.redo !== null,
      }),
      SEPARATOR,
      { role: 'cut' },
      { role: 'copy' },
      { role: 'paste' },
      { role: 'selectAll' },
      SEPARATOR,
      command('edit.lists'),
      ...(mac ? [] : [SEPARATOR, command('view.units')]),
    ],
  }
}

function viewMenu(state: MenuState): MenuItem {
  return {
    label: '&View',
    submenu: [
      ...PAGES.map((id) => command(id)),
      SEPARATOR,
      { role: 'resetZoom' },
      { role: 'zoomIn' },
      { role: 'zoomOut' },
      SEPARATOR,
      { role: 'togglefullscreen' },
      ...(state.packaged ? [] : [SEPARATOR, { role: 'toggleDevTools' as const }]),
    ],
  }
}

function windowMenu(): MenuItem {
  return { label: 'Window', submenu: [{ role: 'minimize' }, { role: 'zoom' }, SEPARATOR, { role: 'front' }] }
}

function helpMenu(mac: boolean): MenuItem {
  return { label: '&Help', submenu: [command('help.keys'), ...(mac ? [] : [SEPARATOR, command('help.about')])] }
}
