/**
 * The drawing with its words on one canvas, for a picture file.
 */
import type { DrawingColours } from '../../core/report'
import type { FrameWord } from './frameWord'
import { NO_OVERLAY, type Overlay } from './overlay'

type DrawnWord = Pick<FrameWord, 'text' | 'quiet' | 'left' | 'top' | 'width' | 'height' | 'leader'>

export interface PictureLook {
  /** CSS pixels of the picture. */
  readonly width: number
  readonly height: number
  readonly family: string
  readonly fontSize: number
  readonly colours: DrawingColours
}

/** A copy of the drawn canvas with the labels and what lies over it written on it. @throws {Error} where there is no 2-D canvas. */
export function drawLabels(
  drawn: HTMLCanvasElement,
  labels: readonly DrawnWord[],
  look: PictureLook,
  overlay: Overlay = NO_OVERLAY,
): HTMLCanvasElement {
  const picture = document.createElement('canvas')
  picture.width = drawn.width
  picture.height = drawn.height
  const context = picture.getContext('2d')
  if (context === null) throw new Error('This browser gives no canvas to write the picture on.')
  context.drawImage(drawn, 0, 0)
  context.scale(drawn.width / look.width, drawn.height / look.height)
  context.font = `${look.fontSize}px ${look.family}`
  context.textAlign = 'center'
  context.textBaseline = 'middle'
  context.strokeStyle = look.colours.muted
  context.lineWidth = 0.75
  for (const { leader } of labels) {
    if (leader === null) continue
    context.beginPath()
    context.moveTo(leader[0].x, leader[0].y)
    context.lineTo(leader[1].x, leader[1].y)
    context.stroke()
  }
  drawOverlay(context, overlay, look.colours)
  context.textAlign = 'center'
  for (const label of labels) {
    context.fillStyle = label.quiet ? look.colours.muted : look.colours.ink
    context.fillText(label.text, label.left + label.width / 2, label.top + label.height / 2)
  }
  return picture
}

function drawOverlay(context: CanvasRenderingContext2D, overlay: Overlay, colours: DrawingColours): void {
  for (const { left, top, width, height, fill } of overlay.patches) {
    context.fillStyle = fill
    context.fillRect(left, top, width, height)
  }
  for (const { from, to, tone, width } of overlay.lines) {
    context.strokeStyle = colours[tone]
    context.lineWidth = width
    context.beginPath()
    context.moveTo(from.x, from.y)
    context.lineTo(to.x, to.y)
    context.stroke()
  }
  for (const { text, at, anchor, tone } of overlay.texts) {
    context.fillStyle = colours[tone]
    context.textAlign = anchor === 'middle' ? 'center' : anchor
    context.fillText(text, at.x, at.y)
  }
}
