/**
 * Asking for a file by a file input, and reading it.
 */
import { decodeText, NO_TEXT } from '../worker/fileText'
import { isFailure, type ChosenFile, type HostFailure } from './types'

/** Most a plan or a table may hold [bytes], the same as in the other faces. */
const MAXIMUM_BYTES = 50 * 1024 * 1024

/** Show the browser's file dialog; null when it was closed without a choice. */
export async function pickFile(document: Document, accept: string): Promise<File | null> {
  return (await pickFiles(document, accept, false))[0] ?? null
}

/** Show the browser's file dialog; empty when it was closed without a choice. */
export function pickFiles(document: Document, accept: string, multiple = true): Promise<readonly File[]> {
  return new Promise((resolve) => {
    const input = document.createElement('input')
    input.type = 'file'
    input.accept = accept
    input.multiple = multiple
    input.hidden = true
    const finish = (): void => {
      input.remove()
      resolve([...(input.files ?? [])])
    }
    input.addEventListener('change', finish, { once: true })
    input.addEventListener('cancel', finish, { once: true })
    document.body.append(input)
    input.click()
  })
}

/** A file of the page, read when it is asked for. */
export function chosenFile(file: File): ChosenFile {
  return { name: file.name, size: file.size, read: () => readBytes(file) }
}

async function readBytes(file: File): Promise<ArrayBuffer | HostFailure> {
  if (file.size > MAXIMUM_BYTES) {
    const size = Math.ceil(file.size / 1024 / 1024)
    return { failure: `“${file.name}” could not be opened because it is larger than 50 MB (${size} MB).` }
  }
  try {
    return await file.arrayBuffer()
  } catch {
    return { failure: `“${file.name}” could not be opened because the browser could not read it.` }
  }
}

/** The text of a file, or a sentence that says why it cannot be had. */
export async function readFile(file: File): Promise<string | HostFailure> {
  const bytes = await readBytes(file)
  if (isFailure(bytes)) return bytes
  return decodeText(bytes) ?? { failure: `“${file.name}” could not be opened because ${NO_TEXT}.` }
}
