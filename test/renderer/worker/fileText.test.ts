import { describe, expect, it } from 'vitest'
import { decodeText } from '../../../renderer/worker/fileText'

/** Two bytes a character after a byte-order mark. */
function utf16(text: string, littleEndian: boolean): ArrayBuffer {
  const view = new DataView(new ArrayBuffer(2 * text.length + 2))
  view.setUint16(0, 0xfeff, littleEndian)
  for (let i = 0; i < text.length; i++) view.setUint16(2 * i + 2, text.charCodeAt(i), littleEndian)
  return view.buffer
}

describe('the text of a file', () => {
  const text = 't;x (µm)\r\n0,1;2\r\n'

  it('is read from UTF-8 and from UTF-16 of either order, without the mark', () => {
    expect(decodeText(Uint8Array.from(new TextEncoder().encode(`\uFEFF${text}`)).buffer)).toBe(text)
    expect(decodeText(utf16(text, true))).toBe(text)
    expect(decodeText(utf16(text, false))).toBe(text)
    expect(decodeText(new ArrayBuffer(0))).toBe('')
  })

  it('is none where the bytes are neither, or UTF-16 is cut in the middle of a character', () => {
    expect(decodeText(Uint8Array.from([0x89, 0x50, 0xff, 0xfe]).buffer)).toBeNull()
    expect(decodeText(utf16(text, true).slice(0, -1))).toBeNull()
  })
})
