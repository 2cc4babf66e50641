/**
 * Keys as commands. The table is the contract's; the browser face claims only keys whose browser meaning nobody misses in
 * a document (open, save, undo, redo, run), never those that steer the browser itself.
 */
import { COMMANDS, type CommandId } from '../../app/contract'
import type { Host } from '../host/types'

/** Commands whose key the browser face handles. */
const BROWSER_COMMANDS: readonly CommandId[] = [
  'file.open',
  'file.save',
  'file.saveAs',
  'edit.undo',
  'edit.redo',
  'run.refresh',
]

export interface KeyPress {
  readonly key: string
  readonly ctrlKey: boolean
  readonly metaKey: boolean
  readonly shiftKey: boolean
  readonly altKey: boolean
}

const COMMAND_IDS = Object.keys(COMMANDS).filter(isCommandId)

function isCommandId(id: string): id is CommandId {
  return id in COMMANDS
}

/** The command's key in a face, null where it has none there. */
export function keyOf(command: CommandId, face: Host['kind']): string | null {
  if (face === 'browser' && !BROWSER_COMMANDS.includes(command)) return null
  return COMMANDS[command].key
}

/** Commands with a key in a face. */
export function keyedCommands(face: Host['kind']): readonly CommandId[] {
  return COMMAND_IDS.filter((command) => keyOf(command, face) !== null)
}

/** The key in words of the platform: `Ctrl+Shift+S` or `⌘⇧S`. */
export function keyText(key: string, mac: boolean): string {
  if (!mac) return key.replace('CmdOrCtrl', 'Ctrl')
  return key.replace('CmdOrCtrl', '⌘').replace('Shift', '⇧').replaceAll('+', '')
}

/** The command a key press stands for; null for every other key. Ctrl/Cmd+Y redoes as well. */
export function commandOf(press: KeyPress, face: Host['kind'], mac: boolean): CommandId | null {
  const command = mac ? press.metaKey : press.ctrlKey
  const other = mac ? press.ctrlKey : press.metaKey
  if (!command || other || press.altKey) return null
  const key = press.key.length === 1 ? press.key.toUpperCase() : press.key
  if (key === 'Y' && !press.shiftKey) return 'edit.redo'
  const wanted = `CmdOrCtrl+${press.shiftKey ? 'Shift+' : ''}${key}`
  return keyedCommands(face).find((id) => COMMANDS[id].key === wanted) ?? null
}
