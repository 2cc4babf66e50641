/** Tells the shell around the page what is shown, for its title, its edited mark and its menu; opens what it was given. */
import { onScopeDispose, watchEffect } from 'vue'
import { shownTitle } from '../model/files'
import type { Workspace } from '../model/workspace'

export function useShell({ host, document, files }: Workspace): void {
  const openGiven = (): void => void files.openGiven()
  onScopeDispose(host.onGiven(openGiven))
  openGiven()
  watchEffect(() => {
    host.showDocument({
      title: shownTitle(document.content.value),
      edited: document.edited.value,
      undo: document.undoName.value,
      redo: document.redoName.value,
    })
  })
}
