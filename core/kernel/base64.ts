const DIGITS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/'

/** Bytes of a base64 text (RFC 4648, with padding). Characters outside the alphabet are not expected and count as 0. */
export function base64Bytes(text: string): Uint8Array<ArrayBuffer> {
  const values = new Uint8Array(128)
  for (let i = 0; i < DIGITS.length; i++) values[DIGITS.charCodeAt(i)] = i
  const padding = text.endsWith('==') ? 2 : text.endsWith('=') ? 1 : 0
  const bytes = new Uint8Array((text.length / 4) * 3 - padding)
  const length = text.length
  for (let i = 0, out = 0; i < length; i += 4, out += 3) {
    const high = ((values[text.charCodeAt(i) & 127] ?? 0) << 6) | (values[text.charCodeAt(i + 1) & 127] ?? 0)
    const low = ((values[text.charCodeAt(i + 2) & 127] ?? 0) << 6) | (values[text.charCodeAt(i + 3) & 127] ?? 0)
    bytes[out] = high >> 4
    // Writes past the end of a typed array are ignored: that drops the padding.
    bytes[out + 1] = ((high & 15) << 4) | (low >> 8)
    bytes[out + 2] = low & 255
  }
  return bytes
}
