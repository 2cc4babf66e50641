/** Keys and menu entries reach the same commands. */
import { onScopeDispose } from 'vue'
import type { CommandId } from '../../app/contract'
import { commandOf } from '../model/keys'
import { isMac } from '../model/platform'
import type { Workspace } from '../model/workspace'

/** Text being typed has an undo of its own until it is taken. */
function isTyping(element: Element | null): boolean {
  return element instanceof HTMLInputElement && element.dataset['draft'] !== undefined
}

export function useCommands(workspace: Workspace): void {
  const mac = isMac()

  function perform(command: CommandId): void {
    const active = document.activeElement
    if (command === 'edit.undo' || command === 'edit.redo') {
      if (isTyping(active)) return
    } else if (active instanceof HTMLElement && isTyping(active)) {
      // What was typed counts before the plan is saved, run or left.
      active.blur()
      active.focus()
    }
    workspace.perform(command)
  }

  function press(event: KeyboardEvent): void {
    if (event.defaultPrevented) return
    if (event.key === 'Escape') {
      workspace.results.cancel()
      workspace.jet.cancel()
      workspace.wake.cancel()
      workspace.thrust.sizing.cancel()
      workspace.tank.spreads.cancel()
      return
    }
    const command = commandOf(event, workspace.host.kind, mac)
    if (command === null) return
    // A dialog is in front: only its own keys count.
    if (document.querySelector('dialog[open]') !== null) return
    if ((command === 'edit.undo' || command === 'edit.redo') && isTyping(document.activeElement)) return
    event.preventDefault()
    perform(command)
  }

  window.addEventListener('keydown', press)
  const unsubscribe = workspace.host.onCommand(perform)
  onScopeDispose(() => {
    window.removeEventListener('keydown', press)
    unsubscribe()
  })
}
