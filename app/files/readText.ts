/**
 * A whole text file, within the size a plan or table may have.
 */
import { open } from 'node:fs/promises'
import { MAXIMUM_FILE_BYTES, MAXIMUM_FILE_TEXT } from '../limits'
import { FileRefusal } from './fileSentence'

/** @throws {FileRefusal} when the file is too large or no text; a system error when it cannot be read */
export async function readText(filePath: string): Promise<string> {
  const file = await open(filePath, 'r')
  try {
    const { size } = await file.stat()
    if (size > MAXIMUM_FILE_BYTES) throw new FileRefusal(tooLarge(size))
    return decodeText(await file.readFile())
  } finally {
    await file.close()
  }
}

/** UTF-8 bytes, or UTF-16 bytes that begin with their byte-order mark, as text without the mark. @throws {FileRefusal} */
export function decodeText(bytes: Uint8Array): string {
  if (bytes.byteLength > MAXIMUM_FILE_BYTES) throw new FileRefusal(tooLarge(bytes.byteLength))
  try {
    return new TextDecoder(encodingOf(bytes), { fatal: true }).decode(bytes)
  } catch {
    throw new FileRefusal('it is not UTF-8 text, nor UTF-16 text with a byte-order mark')
  }
}

function encodingOf([first, second]: Uint8Array): 'utf-8' | 'utf-16le' | 'utf-16be' {
  if (first === 0xff && second === 0xfe) return 'utf-16le'
  return first === 0xfe && second === 0xff ? 'utf-16be' : 'utf-8'
}

function tooLarge(size: number): string {
  return `it is larger than ${MAXIMUM_FILE_TEXT} (${Math.ceil(size / 1024 / 1024)} MB)`
}
