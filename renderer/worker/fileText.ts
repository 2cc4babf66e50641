/** The bytes of a file as text, and what tells it from every other. */

/** Text without a byte-order mark; null where the bytes are no UTF-8. */
export function decodeUtf8(bytes: ArrayBuffer): string | null {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    return null
  }
}

/** SHA-256 in hexadecimal figures; empty where the page may not compute it. */
export async function hashOf(bytes: ArrayBuffer): Promise<string> {
  const subtle = globalThis.crypto?.subtle
  if (subtle === undefined) return ''
  const digest = new Uint8Array(await subtle.digest('SHA-256', bytes))
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('')
}
