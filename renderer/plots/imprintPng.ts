/** A picture with a line of print in a margin below it, as drawings written as SVG have it. */
import { fittedLine, imprintColour } from '../../core/report'
import { canvasToPng } from './plotImage'

/** Width of a picture over the size of its print, and the margin over that size. */
const PRINT = { share: 1 / 80, smallest: 11, largest: 28, margin: 1.8 }

/** Bytes of the taller picture. @throws {Error} if it cannot be read or drawn here. */
export async function imprintPng(bytes: Uint8Array, line: string): Promise<Uint8Array> {
  const picture = await createImageBitmap(new Blob([new Uint8Array(bytes)], { type: 'image/png' }))
  try {
    const { width, height } = picture
    const font = Math.round(Math.min(PRINT.largest, Math.max(PRINT.smallest, width * PRINT.share)))
    const margin = Math.round(PRINT.margin * font)
    const canvas = document.createElement('canvas')
    canvas.width = width
    canvas.height = height + margin
    const context = canvas.getContext('2d')
    if (context === null) throw new Error('The picture could not be drawn here.')
    context.drawImage(picture, 0, 0)
    // The margin goes on with what the drawing stands on.
    const corner = context.getImageData(0, height - 1, 1, 1).data
    const ground = `#${[...corner.slice(0, 3)].map((part) => part.toString(16).padStart(2, '0')).join('')}`
    context.fillStyle = ground
    context.fillRect(0, height, width, margin)
    context.font = `${font}px system-ui, sans-serif`
    context.fillStyle = imprintColour(ground)
    context.textBaseline = 'alphabetic'
    const text = fittedLine(line, width - 2 * font, (part) => context.measureText(part).width)
    context.fillText(text, font, height + Math.round(1.2 * font))
    return await canvasToPng(canvas)
  } finally {
    picture.close()
  }
}
