/**
 * Asking for a file by a file input, and reading it.
 */
import type { HostFailure } from './types'

/** Most a plan or a table may hold [bytes], the same as in the other faces. */
const MAXIMUM_BYTES = 50 * 1024 * 1024

/** Show the browser's file dialog; null when it was closed without a choice. */
export function pickFile(document: Document, accept: string): Promise<File | null> {
  return new Promise((resolve) => {
    const input = document.createElement('input')
    input.type = 'file'
    input.accept = accept
    input.hidden = true
    const finish = (): void => {
      input.remove()
      resolve(input.files?.[0] ?? null)
    }
    input.addEventListener('change', finish, { once: true })
    input.addEventListener('cancel', finish, { once: true })
    document.body.append(input)
    input.click()
  })
}

/** The text of a file, or a sentence that says why it cannot be had. */
export async function readFile(file: File): Promise<string | HostFailure> {
  if (file.size > MAXIMUM_BYTES) {
    const size = Math.ceil(file.size / 1024 / 1024)
    return { failure: `“${file.name}” could not be opened because it is larger than 50 MB (${size} MB).` }
  }
  let bytes: ArrayBuffer
  try {
    bytes = await file.arrayBuffer()
  } catch {
    return { failure: `“${file.name}” could not be opened because the browser could not read it.` }
  }
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    return { failure: `“${file.name}” could not be opened because it is not UTF-8 text.` }
  }
}
