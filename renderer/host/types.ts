/**
 * What the window asks of where it runs: the desktop bridge and the browser each implement this once.
 */
import type { CommandId, ExportKind, Theme } from '../../app/contract'

/** A plan file as the window knows it. `token` is the host's own; null when the file can only be downloaded again. */
export interface PlanFile {
  readonly token: string | null
  readonly name: string
}

export interface OpenedPlanFile extends PlanFile {
  readonly text: string
}

/** A file that was chosen and not yet read: many or large ones are read one after another. */
export interface ChosenFile {
  readonly name: string
  /** [bytes] */
  readonly size: number
  /** Its bytes, or a sentence that says why they cannot be had. */
  read(): Promise<ArrayBuffer | HostFailure>
}

export interface DocumentState {
  readonly title: string
  readonly edited: boolean
  /** Name of the step that undo would take back, null when there is none. */
  readonly undo: string | null
  readonly redo: string | null
}

/** A refusal or failure in a sentence for the user; thrown by no host method: they resolve to it. */
export interface HostFailure {
  readonly failure: string
}

export interface Host {
  readonly kind: 'desktop' | 'browser'
  /** Ask for a plan file; null when cancelled. */
  openPlan(): Promise<OpenedPlanFile | HostFailure | null>
  /** A file that the system gave the program to open, and that the window has not asked for yet; null when there is none. */
  givenPlan(): Promise<OpenedPlanFile | HostFailure | null>
  /** Such a file has come; the browser has none. Returns the unsubscribe. */
  onGiven(listener: () => void): () => void
  /** Read a file dropped on the window. */
  openDropped(file: File): Promise<OpenedPlanFile | HostFailure>
  /** Save to the file behind the token, or ask where (file null or saveAs). Null when cancelled. */
  savePlan(file: PlanFile | null, name: string, text: string): Promise<PlanFile | HostFailure | null>
  /** Ask for a table of numbers (CSV, text); null when cancelled. */
  openTable(): Promise<{ readonly name: string; readonly text: string } | HostFailure | null>
  /** Ask for any number of tables; the page learns their names and contents, never where they lie. None when cancelled. */
  chooseTables(): Promise<readonly ChosenFile[]>
  exportFile(
    kind: ExportKind,
    name: string,
    content: string | Uint8Array,
  ): Promise<{ readonly name: string } | HostFailure | null>
  /** Tell the shell what is shown. The browser puts it into the page's title and guards leaving. */
  showDocument(state: DocumentState): void
  setTheme(theme: Theme): void
  /** Menu commands of the shell; the browser has none. Returns the unsubscribe. */
  onCommand(listener: (command: CommandId) => void): () => void
}

export function isFailure(value: unknown): value is HostFailure {
  return typeof value === 'object' && value !== null && 'failure' in value
}
