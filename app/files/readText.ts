/**
 * A whole text file, within the size a plan or table may have.
 */
import { open } from 'node:fs/promises'
import { MAXIMUM_FILE_BYTES, MAXIMUM_FILE_TEXT } from '../limits'
import { FileRefusal } from './fileSentence'

/** @throws {FileRefusal} when the file is too large or not UTF-8; a system error when it cannot be read */
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

/** UTF-8 bytes as text, without a byte-order mark. @throws {FileRefusal} */
export function decodeText(bytes: Uint8Array): string {
  if (bytes.byteLength > MAXIMUM_FILE_BYTES) throw new FileRefusal(tooLarge(bytes.byteLength))
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    throw new FileRefusal('it is not UTF-8 text')
  }
}

function tooLarge(size: number): string {
  return `it is larger than ${MAXIMUM_FILE_TEXT} (${Math.ceil(size / 1024 / 1024)} MB)`
}
