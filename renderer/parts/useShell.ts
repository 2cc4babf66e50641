/** Tells the shell around the page what is shown, for its title, its edited mark and its menu. */
import { watchEffect } from 'vue'
import { shownTitle } from '../model/files'
import type { Workspace } from '../model/workspace'

export function useShell({ host, document }: Workspace): void {
  watchEffect(() => {
    host.showDocument({
      title: shownTitle(document.content.value),
      edited: document.edited.value,
      undo: document.undoName.value,
      redo: document.redoName.value,
    })
  })
}
