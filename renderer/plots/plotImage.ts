/**
 * A plot as a PNG on white: twice the pixels, the light colours whatever the window wears, title and axes on the picture.
 */
import { axisText, drawingColours, type PlotModel } from '../../core/report'
import { createPlotChart } from './chart'

const WIDTH = 800
const HEIGHT = 500
const FONT_SIZE = 14

/** Bytes of the picture. @throws {Error} if the canvas cannot be read back. */
export async function plotToPng(model: PlotModel, fontFamily: string): Promise<Uint8Array> {
  const canvas = document.createElement('canvas')
  canvas.width = WIDTH
  canvas.height = HEIGHT
  canvas.style.width = `${WIDTH}px`
  canvas.style.height = `${HEIGHT}px`
  const colours = drawingColours('light')
  const chart = createPlotChart(
    canvas,
    { model, colours, cursor: null },
    {
      fontFamily,
      fontSize: FONT_SIZE,
      responsive: false,
      pixelRatio: 2,
      top: 48,
      axisTitles: true,
      plugins: [
        {
          id: 'paper',
          beforeDraw({ ctx, width, height }) {
            ctx.save()
            ctx.fillStyle = colours.ground
            ctx.fillRect(0, 0, width, height)
            ctx.fillStyle = colours.ink
            ctx.textBaseline = 'alphabetic'
            ctx.font = `600 ${FONT_SIZE + 2}px ${fontFamily}`
            ctx.textAlign = 'left'
            ctx.fillText(model.title, 12, 28)
            ctx.font = `${FONT_SIZE}px ${fontFamily}`
            ctx.fillStyle = colours.muted
            ctx.textAlign = 'right'
            ctx.fillText(model.title === model.y.title ? model.y.unit : axisText(model.y), width - 12, 28)
            ctx.restore()
          },
        },
      ],
    },
  )
  try {
    return await canvasToPng(canvas)
  } finally {
    chart.destroy()
  }
}

/** The canvas as PNG bytes. */
export async function canvasToPng(canvas: HTMLCanvasElement): Promise<Uint8Array> {
  const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'))
  if (blob === null) throw new Error('The picture could not be written as PNG.')
  return new Uint8Array(await blob.arrayBuffer())
}
