/** A drawing written as SVG, as a PNG of twice its pixels. */
import { canvasToPng } from './plotImage'

/** Bytes of the picture. @throws {Error} if it cannot be drawn or read back. */
export async function svgToPng(
  svg: string,
  { width, height }: { readonly width: number; readonly height: number },
): Promise<Uint8Array> {
  const address = URL.createObjectURL(new Blob([svg], { type: 'image/svg+xml' }))
  try {
    const image = new Image(width, height)
    image.src = address
    await image.decode()
    const canvas = document.createElement('canvas')
    canvas.width = 2 * width
    canvas.height = 2 * height
    const context = canvas.getContext('2d')
    if (context === null) throw new Error('The picture could not be drawn here.')
    context.drawImage(image, 0, 0, canvas.width, canvas.height)
    return await canvasToPng(canvas)
  } finally {
    URL.revokeObjectURL(address)
  }
}
