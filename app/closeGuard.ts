/**
 * Closing a window whose plan has unsaved changes: what to ask, and when to let go.
 */
export type CloseChoice = 'save' | 'discard' | 'cancel'

/** Buttons of the question, in the order of their choices; Enter saves, Escape keeps the window. */
export const CLOSE_CHOICES: readonly CloseChoice[] = ['save', 'discard', 'cancel']

export function closeQuestion(title: string) {
  return {
    type: 'warning' as const,
    message: `Save the changes to “${title}”?`,
    detail: 'Changes that are not saved are lost when the window closes.',
    buttons: ['Save', "Don't save", 'Cancel'],
    defaultId: 0,
    cancelId: 2,
    noLink: true,
  }
}

export interface CloseGuardServices {
  ask(title: string): Promise<CloseChoice>
  /** Ask the page to save. */
  requestSave(): void
  /** Close the window for good. */
  close(): void
}

export interface CloseGuard {
  /** The user wants the window closed: true lets it close now. */
  mayClose(): boolean
  /** The page told what it shows. */
  documentShown(title: string, edited: boolean): void
  /** A save ended: written, or not (cancelled or failed). */
  saveEnded(written: boolean): void
}

/** Guard of one window. After Save the window closes once the page says that nothing is left unsaved. */
export function createCloseGuard(services: CloseGuardServices): CloseGuard {
  let title = ''
  let edited = false
  let asking = false
  let closeAfterSave = false
  let released = false

  async function ask(): Promise<void> {
    asking = true
    try {
      const choice = await services.ask(title)
      if (choice === 'discard') release()
      if (choice === 'save') {
        closeAfterSave = true
        services.requestSave()
      }
    } finally {
      asking = false
    }
  }

  function release(): void {
    released = true
    services.close()
  }

  return {
    mayClose() {
      if (released || !edited) return true
      // A dialog that cannot be shown keeps the window: the work in it is worth more than the close.
      if (!asking) ask().catch(() => undefined)
      return false
    },
    documentShown(newTitle, newEdited) {
      title = newTitle
      edited = newEdited
      if (closeAfterSave && !edited) release()
    },
    saveEnded(written) {
      if (!written) closeAfterSave = false
    },
  }
}
