/**
 * What the runner stands in, and how it stops: every stop has an exit code and a sentence.
 */
export const EXIT = { done: 0, failed: 1, refused: 2, interrupted: 130 } as const
export type ExitCode = (typeof EXIT)[keyof typeof EXIT]

export interface BatchEnvironment {
  /** Folder that paths on the command line are relative to. */
  readonly folder: string
  readonly signal: AbortSignal
  /** Lets an interrupt in between the steps of a long computation. */
  readonly pause: () => Promise<void>
  /** Day of the run as it is printed in the record; absent: none is printed. */
  readonly date?: string
  readStandardInput(): Promise<Uint8Array>
  /** One line per file written. */
  writtenLine(text: string): void
  /** Everything else: refusals, notes. */
  note(text: string): void
}

/** A stop with its exit code and the sentence for standard error. */
export class Stop extends Error {
  readonly code: ExitCode

  constructor(code: ExitCode, message: string) {
    super(message)
    this.name = 'Stop'
    this.code = code
  }
}

/** @throws {Stop} */
export function stopWhenInterrupted(environment: BatchEnvironment): void {
  if (environment.signal.aborted)
    throw new Stop(EXIT.interrupted, 'The run was interrupted; what was finished is kept.')
}
