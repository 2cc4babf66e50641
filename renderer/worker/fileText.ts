/** The bytes of a file as text, and what tells it from every other. */

/** UTF-8 bytes, or UTF-16 bytes that begin with their byte-order mark, as text without the mark; null where they are neither. */
export function decodeText(bytes: ArrayBuffer): string | null {
  try {
    return new TextDecoder(encodingOf(new Uint8Array(bytes, 0, Math.min(2, bytes.byteLength))), { fatal: true }).decode(
      bytes,
    )
  } catch {
    return null
  }
}

/** What decodeText does not take, as the end of a sentence. */
export const NO_TEXT = 'it is not UTF-8 text, nor UTF-16 text with a byte-order mark'

function encodingOf([first, second]: Uint8Array): 'utf-8' | 'utf-16le' | 'utf-16be' {
  if (first === 0xff && second === 0xfe) return 'utf-16le'
  return first === 0xfe && second === 0xff ? 'utf-16be' : 'utf-8'
}

/** SHA-256 in hexadecimal figures; empty where the page may not compute it. */
export async function hashOf(bytes: ArrayBuffer): Promise<string> {
  const subtle = globalThis.crypto?.subtle
  if (subtle === undefined) return ''
  const digest = new Uint8Array(await subtle.digest('SHA-256', bytes))
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('')
}
