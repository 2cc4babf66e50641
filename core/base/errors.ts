/**
 * A caller's mistake, refused at the door of a room.
 *
 * @property field dotted path of the plan (or argument name) the mistake sits in.
 * @property message a sentence: what must hold, what was given, with its unit.
 */
export class DomainError extends Error {
  readonly field: string

  constructor(field: string, message: string) {
    super(message)
    this.name = 'DomainError'
    this.field = field
  }
}

/** One refused value of a document: where, what was given, what must hold. */
export interface Problem {
  readonly field: string
  /** What was given, as it can be shown: a number, a text, or a short description. */
  readonly value: string
  /** What must hold, in words with its unit. */
  readonly limit: string
  /** The whole sentence. */
  readonly message: string
}

/** How a long computation ended. Valid input that cannot be computed is a status, never an exception. */
export type RunStatus = 'done' | 'cancelled' | 'failed'

/** Progress of a long computation: share done in 0..1 and what is being done. */
export interface Progress {
  readonly share: number
  readonly what: string
}

/** Cancellation as core sees it: the part of an AbortSignal it reads. */
export interface CancelSignal {
  readonly aborted: boolean
}

export interface RunOptions {
  readonly signal?: CancelSignal
  readonly onProgress?: (progress: Progress) => void
}

/**
 * Refuse a number that is not finite or not inside its range.
 *
 * @param field name for the sentence
 * @param unit SI unit for the sentence, '' for a pure number
 * @throws {DomainError}
 */
export function requireRange(
  field: string,
  value: number,
  range: { readonly above?: number; readonly min?: number; readonly max?: number; readonly unit?: string },
): void {
  const unit = range.unit === undefined || range.unit === '' ? '' : ` ${range.unit}`
  const got = `got ${value}${unit}`
  if (!Number.isFinite(value)) throw new DomainError(field, `${field} must be a finite number, ${got}`)
  if (range.above !== undefined && !(value > range.above))
    throw new DomainError(field, `${field} must be above ${range.above}${unit}, ${got}`)
  if (range.min !== undefined && value < range.min)
    throw new DomainError(field, `${field} must be at least ${range.min}${unit}, ${got}`)
  if (range.max !== undefined && value > range.max)
    throw new DomainError(field, `${field} must be at most ${range.max}${unit}, ${got}`)
}
