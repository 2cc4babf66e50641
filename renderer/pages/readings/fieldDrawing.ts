/** A velocity field drawn on a canvas: vorticity in the signed map, a contour, the ring's centroid, the cut behind it, axes and scale. */
import { fromBase } from '../../../core/quantity'
import { contourLines, axisTicks, fieldColour, type DrawingColours } from '../../../core/report'
import type { FieldPicture } from '../../../core/run'
import type { FieldNumbers } from '../../../core/tank'

/** Share of the scale at which the contour is drawn. */
export const CONTOUR_SHARE = 0.2
const STEPS = 127
/** Room around the picture [px]. */
const ROOM = { left: 46, right: 12, top: 10, bottom: 62 }

export interface FieldLook {
  readonly colours: DrawingColours
  readonly font: string
  readonly lengthUnit: string
  /** Vorticity at the ends of the scale [1/s]. */
  readonly scale: number
  readonly contour: boolean
  readonly cut: boolean
}

/** Draw; the picture keeps its proportions inside the size given [px]. */
export function drawField(
  context: CanvasRenderingContext2D,
  size: { readonly width: number; readonly height: number },
  picture: FieldPicture,
  numbers: FieldNumbers,
  look: FieldLook,
): void {
  const { colours } = look
  context.fillStyle = colours.ground
  context.fillRect(0, 0, size.width, size.height)
  context.font = `11px ${look.font}`
  const [x0, x1] = picture.x
  const [y0, y1] = picture.y
  const room = { width: size.width - ROOM.left - ROOM.right, height: size.height - ROOM.top - ROOM.bottom }
  const perMetre = Math.min(room.width / (x1 - x0), room.height / (y1 - y0))
  const width = perMetre * (x1 - x0)
  const height = perMetre * (y1 - y0)
  const left = ROOM.left + (room.width - width) / 2
  const top = ROOM.top + (room.height - height) / 2
  const toX = (x: number): number => left + (x - x0) * perMetre
  const toY = (y: number): number => top + height - (y - y0) * perMetre

  context.imageSmoothingEnabled = true
  context.imageSmoothingQuality = 'high'
  context.drawImage(imageOf(picture, look.scale), left, top, width, height)
  context.strokeStyle = colours.edge
  context.lineWidth = 1
  context.strokeRect(left, top, width, height)

  context.save()
  context.beginPath()
  context.rect(left, top, width, height)
  context.clip()
  // The middle of the map is pale in either theme: what is drawn on it is dark in both.
  context.strokeStyle = MARK
  context.fillStyle = MARK
  if (look.contour) drawContours(context, picture, look.scale, toX, toY)
  if (y0 < 0 && y1 > 0) {
    context.lineWidth = 0.75
    context.setLineDash([8, 3, 2, 3])
    stroke(context, [left, toY(0)], [left + width, toY(0)])
  }
  if (look.cut && picture.cut !== null) {
    context.lineWidth = 1.5
    context.setLineDash([5, 4])
    stroke(context, [toX(picture.cut), top], [toX(picture.cut), top + height])
    context.setLineDash([])
    note(context, 'ring cut', toX(picture.cut) + 5, top + 12)
  }
  context.setLineDash([])
  if (numbers.ring !== null) {
    const { x, radius } = numbers.ring
    for (const y of [radius, -radius]) if (y >= y0 && y <= y1) cross(context, toX(x), toY(y))
  }
  context.restore()
  drawAxes(context, { left, top, width, height }, picture, look)
  drawScale(context, { left, width, top: size.height - 22 }, look)
}

const MARK = '#1B2430'

function stroke(
  context: CanvasRenderingContext2D,
  from: readonly [number, number],
  to: readonly [number, number],
): void {
  context.beginPath()
  context.moveTo(...from)
  context.lineTo(...to)
  context.stroke()
}

function cross(context: CanvasRenderingContext2D, x: number, y: number): void {
  context.lineWidth = 1.8
  stroke(context, [x - 6, y], [x + 6, y])
  stroke(context, [x, y - 6], [x, y + 6])
}

function note(context: CanvasRenderingContext2D, text: string, x: number, y: number): void {
  context.save()
  context.strokeStyle = 'rgba(243, 240, 236, 0.9)'
  context.lineWidth = 3
  context.lineJoin = 'round'
  context.strokeText(text, x, y)
  context.fillText(text, x, y)
  context.restore()
}

/** The vorticity as an image of one pixel a vector; its first row is the highest y. */
function imageOf({ columns, rows, values, peak }: FieldPicture, scale: number): HTMLCanvasElement {
  const canvas = document.createElement('canvas')
  canvas.width = columns
  canvas.height = rows
  const context = canvas.getContext('2d')
  if (context === null) return canvas
  const image = context.createImageData(columns, rows)
  const paints = Array.from({ length: 2 * STEPS + 1 }, (_, k) =>
    fieldColour('signed', 0.5 + (0.5 * (k - STEPS) * peak) / (STEPS * scale)),
  )
  for (let j = 0; j < rows; j++)
    for (let i = 0; i < columns; i++) {
      const paint = paints[(values[(rows - 1 - j) * columns + i] ?? 0) + STEPS] ?? [0, 0, 0]
      image.data.set([...paint, 255], 4 * (j * columns + i))
    }
  context.putImageData(image, 0, 0)
  return canvas
}

function drawContours(
  context: CanvasRenderingContext2D,
  picture: FieldPicture,
  scale: number,
  toX: (x: number) => number,
  toY: (y: number) => number,
): void {
  const { columns, rows, x, y, values, peak } = picture
  const spread = ([from, to]: readonly [number, number], count: number): number[] =>
    Array.from({ length: count }, (_, k) => from + ((to - from) * k) / (count - 1))
  const grid = { x: spread(x, columns), y: spread(y, rows), values }
  const level = (CONTOUR_SHARE * scale * STEPS) / peak
  if (!(level < STEPS)) return
  context.lineWidth = 1
  for (const value of [level, -level]) {
    context.setLineDash(value > 0 ? [] : [4, 3])
    for (const line of contourLines(grid, value)) {
      context.beginPath()
      line.forEach((point, k) => {
        if (k === 0) context.moveTo(toX(point.x), toY(point.y))
        else context.lineTo(toX(point.x), toY(point.y))
      })
      context.stroke()
    }
  }
  context.setLineDash([])
}

function drawAxes(
  context: CanvasRenderingContext2D,
  frame: { readonly left: number; readonly top: number; readonly width: number; readonly height: number },
  { x, y }: FieldPicture,
  { colours, lengthUnit }: FieldLook,
): void {
  const { left, top, width, height } = frame
  const shown = (value: number): number => fromBase(value, lengthUnit)
  const ends = (pair: readonly [number, number]): readonly [number, number] => [shown(pair[0]), shown(pair[1])]
  const [xMin, xMax] = ends(x)
  const [yMin, yMax] = ends(y)
  context.fillStyle = colours.muted
  context.strokeStyle = colours.edge
  context.lineWidth = 1
  context.textBaseline = 'middle'
  context.textAlign = 'right'
  for (const { value, label } of axisTicks(yMin, yMax, Math.max(2, Math.floor(height / 42)))) {
    const place = top + height - ((value - yMin) / (yMax - yMin)) * height
    stroke(context, [left - 4, place], [left, place])
    context.fillText(label, left - 7, place)
  }
  context.textAlign = 'center'
  for (const { value, label } of axisTicks(xMin, xMax, Math.max(2, Math.floor(width / 60)))) {
    const place = left + ((value - xMin) / (xMax - xMin)) * width
    stroke(context, [place, top + height], [place, top + height + 4])
    context.fillText(label, place, top + height + 12)
  }
  context.textAlign = 'right'
  context.fillText(`x, y (${lengthUnit})`, left + width, top + height + 27)
}

function drawScale(
  context: CanvasRenderingContext2D,
  place: { readonly left: number; readonly width: number; readonly top: number },
  { colours, scale }: FieldLook,
): void {
  const length = Math.min(180, place.width * 0.4)
  for (let i = 0; i < length; i++) {
    const [red, green, blue] = fieldColour('signed', i / (length - 1))
    context.fillStyle = `rgb(${red}, ${green}, ${blue})`
    context.fillRect(place.left + i, place.top, 1.5, 8)
  }
  context.strokeStyle = colours.edge
  context.strokeRect(place.left, place.top, length, 8)
  context.fillStyle = colours.muted
  context.textBaseline = 'middle'
  context.textAlign = 'left'
  const end = scale.toPrecision(2)
  context.fillText(`vorticity −${Number(end)} to ${Number(end)} 1/s`, place.left + length + 8, place.top + 4)
}
