/**
 * Files the system hands to the program: named on its command line, at a second start, or by an event of macOS. They wait here
 * until the page asks for them; the page never learns where they lie.
 */
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { decodeDroppedPath } from './decodeRequests'

export interface GivenFiles {
  /** Add files and tell that some wait. What is no plan or table by its name is passed over: switches of the runtime are. */
  give(words: readonly string[], folder: string): void
  /** Path of the one that has waited longest, which then waits no longer; null where none does. */
  next(): string | null
}

/** @param tell called when files were added */
export function createGivenFiles(tell: () => void): GivenFiles {
  const waiting: string[] = []
  return {
    give(words, folder) {
      const files = words.flatMap((word) => fileOf(word, folder) ?? [])
      waiting.push(...files)
      if (files.length > 0) tell()
    },
    next: () => waiting.shift() ?? null,
  }
}

/**
 * The file that a word of a command line names.
 *
 * @param word a path, from `folder` where it is relative, or a file URL, as Linux desktops send it
 * @returns null for a switch, and for what is neither a plan nor a table by its name
 */
export function fileOf(word: string, folder: string): string | null {
  if (word.startsWith('-')) return null
  const file = word.startsWith('file:') ? pathOf(word) : path.resolve(folder, word)
  return file !== null && decodeDroppedPath(file).ok ? file : null
}

function pathOf(url: string): string | null {
  try {
    return fileURLToPath(url)
  } catch {
    return null
  }
}
