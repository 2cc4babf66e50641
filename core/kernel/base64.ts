const DIGITS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/'

/** Bytes of a base64 text (RFC 4648, with padding). Characters outside the alphabet are not expected and count as 0. */
export function base64Bytes(text: string): Uint8Array<ArrayBuffer> {
  const values = new Uint8Array(128)
  for (let i = 0; i < DIGITS.length; i++) values[DIGITS.charCodeAt(i)] = i
  const padding = text.endsWith('==') ? 2 : text.endsWith('=') ? 1 : 0
  const bytes = new Uint8Array((text.length / 4) * 3 - padding)
  const digit = (i: number): number => values[text.charCodeAt(i) & 127] ?? 0
  for (let i = 0, out = 0; i < text.length; i += 4, out += 3) {
    const word = (digit(i) << 18) | (digit(i + 1) << 12) | (digit(i + 2) << 6) | digit(i + 3)
    bytes[out] = word >> 16
    // Writes past the end of a typed array are ignored: that drops the padding.
    bytes[out + 1] = (word >> 8) & 255
    bytes[out + 2] = word & 255
  }
  return bytes
}

/** Doubles from base64 of their little-endian bytes. */
export function base64Doubles(text: string): Float64Array<ArrayBuffer> {
  const view = new DataView(base64Bytes(text).buffer)
  return Float64Array.from({ length: view.byteLength / 8 }, (_, i) => view.getFloat64(i * 8, true))
}
