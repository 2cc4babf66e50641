/**
 * The one file that main, preload and the page share: typed requests, never a path chosen by the page.
 *
 * A file the user picked is known to the page by its token only; main keeps the path behind it.
 */

/** Name of the bridge on the page's global object. */
export const BRIDGE_NAME = 'bridge'

/** A text file the user opened: its token for saving back, its name for showing, its contents. */
export interface OpenedFile {
  readonly token: string
  readonly name: string
  readonly text: string
}

export interface SavedFile {
  readonly token: string
  readonly name: string
}

export type ExportKind = 'csv' | 'svg' | 'png' | 'vtp' | 'gltf' | 'html' | 'txt' | 'lists'

/** Appearance the window follows. */
export type Theme = 'system' | 'light' | 'dark'

/** Commands the menu and the window share; each has one id, one title and at most one key. */
export const COMMANDS = {
  'file.new': { title: 'New plan', key: 'CmdOrCtrl+N' },
  'file.open': { title: 'Open…', key: 'CmdOrCtrl+O' },
  'file.save': { title: 'Save', key: 'CmdOrCtrl+S' },
  'file.saveAs': { title: 'Save as…', key: 'CmdOrCtrl+Shift+S' },
  'file.export': { title: 'Export…', key: 'CmdOrCtrl+E' },
  'file.print': { title: 'Print…', key: 'CmdOrCtrl+P' },
  'file.examples': { title: 'Examples…', key: null },
  'edit.undo': { title: 'Undo', key: 'CmdOrCtrl+Z' },
  'edit.redo': { title: 'Redo', key: 'CmdOrCtrl+Shift+Z' },
  'edit.lists': { title: 'Parts lists…', key: null },
  'run.refresh': { title: 'Run', key: 'CmdOrCtrl+Enter' },
  'view.stroke': { title: 'Stroke', key: null },
  'view.thrust': { title: 'Thrust', key: null },
  'view.wake': { title: 'Wake', key: null },
  'view.tankRun': { title: 'Tank run', key: null },
  'view.readings': { title: 'Readings', key: null },
  'view.units': { title: 'Units and appearance…', key: null },
  'help.keys': { title: 'Keys', key: null },
  'help.about': { title: 'About Ringwright', key: null },
} as const
export type CommandId = keyof typeof COMMANDS

export interface Requests {
  /** Ask for a plan file; null when the user cancelled. */
  'plan:open': { in: null; out: OpenedFile | null }
  /** The file that the system gave the program to open and that has waited longest; null when none waits. */
  'plan:given': { in: null; out: OpenedFile | null }
  /** Write a plan: to the file behind the token, or where the user says when it is null. */
  'plan:save': { in: { token: string | null; name: string; text: string }; out: SavedFile | null }
  /** Ask for a table (CSV or text) to read into the plan. */
  'table:open': { in: null; out: { name: string; text: string } | null }
  /** Write an export where the user says; `base64` for png, `text` otherwise. */
  'export:save': {
    in: { kind: ExportKind; name: string; text: string | null; base64: string | null }
    out: { name: string } | null
  }
  /** Tell the window what it shows, for its title, its edited mark and its menu. */
  'window:document': { in: { title: string; edited: boolean; undo: string | null; redo: string | null }; out: null }
  'window:theme': { in: { theme: Theme }; out: null }
  'app:information': { in: null; out: { name: string; version: string; platform: string } }
}
export type Channel = keyof Requests

/** What crosses back: data or a sentence, never an exception. */
export type Answer<T> = { ok: true; value: T } | { ok: false; error: { code: string; message: string } }

/** What the page may ask of the close dialog in the window's own words. */
export interface Bridge {
  request<C extends Channel>(channel: C, input: Requests[C]['in']): Promise<Answer<Requests[C]['out']>>
  /** A dropped file, resolved in the preload so that main learns its path and the page only a token. */
  openDropped(file: unknown): Promise<Answer<OpenedFile>>
  /** Commands chosen in the menu; returns the unsubscribe. */
  onCommand(listener: (command: CommandId) => void): () => void
  /** A file waits for `plan:given`; returns the unsubscribe. */
  onGiven(listener: () => void): () => void
}
