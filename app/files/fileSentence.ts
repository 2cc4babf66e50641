/**
 * A failed file operation in a sentence: what could not be done, why, without the engine's own wording.
 */
const REASONS: Readonly<Record<string, string>> = {
  ENOENT: 'it, or the folder it should lie in, does not exist',
  EACCES: 'you may not open it there',
  EPERM: 'the system does not allow it',
  EROFS: 'the disk is read-only',
  ENOSPC: 'the disk is full',
  EDQUOT: 'your share of the disk is used up',
  EISDIR: 'it is a folder',
  ENOTDIR: 'a part of its path is not a folder',
  EBUSY: 'another program is using it',
  EMFILE: 'too many files are open',
  ENAMETOOLONG: 'its name is too long',
  EEXIST: 'a file of that name is in the way',
  EIO: 'the disk reported an error',
}

/** A file that can be read but not taken: too large, or not text. The reason completes "… because". */
export class FileRefusal extends Error {
  constructor(reason: string) {
    super(reason)
    this.name = 'FileRefusal'
  }
}

/** Code of a system error, '' when it has none. */
export function systemCode(error: unknown): string {
  return error instanceof Error && 'code' in error && typeof error.code === 'string' ? error.code : ''
}

/** @param act what was tried @param name the file as the user knows it */
export function fileSentence(act: 'open' | 'save', name: string, error: unknown): string {
  if (error instanceof FileRefusal) return `“${name}” could not be ${pastOf(act)} because ${error.message}.`
  const code = systemCode(error)
  const reason = REASONS[code] ?? (code === '' ? 'something unexpected went wrong' : `the system reported ${code}`)
  return `“${name}” could not be ${pastOf(act)} because ${reason}.`
}

function pastOf(act: 'open' | 'save'): string {
  return act === 'open' ? 'opened' : 'saved'
}
