/**
 * The lines of the drawing of a starting jet: axis, wall, the sheet by age, the cut, the place of the ring.
 */
import { at } from '../../../core/base'
import {
  AGE_STEPS,
  ageColour,
  sheetRuns,
  type DrawingColours,
  type JetSceneModel,
  type SheetLine,
} from '../../../core/report'
import { stroke, type Stroke } from '../strokes'
import type { Vector } from '../vectors'
import { EDGE_ANGLES } from './sheetSurface'

export type JetColour = keyof DrawingColours | `age ${number}`

const AXIS_DASH = [14, 4, 2, 4]
const CUT_DASH = [5, 4]
const COUNTER_DASH = [1.6, 3]
const CIRCLE_PARTS = 72
/** Widths of the sheet: where it is the drawing, and along the edges of the cut in space [pixels]. */
const SECTION_WIDTH = 2
const EDGE_WIDTH = 1.8
/** Half a cross [pixels]. */
const CROSS = 5
/** A merged ring [pixels]. */
const DOT = 2.2

/** Colours of the page and of every step of age. */
export function jetColours(colours: DrawingColours, dark: boolean): Readonly<Record<JetColour, string>> {
  const steps: Record<`age ${number}`, string> = {}
  for (let step = 0; step < AGE_STEPS; step += 1) steps[`age ${step}`] = ageColour(step, dark)
  return { ...colours, ...steps }
}

/** Lines that stay while the jet moves on. */
export function stillStrokes(model: JetSceneModel, flat: boolean): readonly Stroke<JetColour>[] {
  const { extent, nozzle } = model
  const axis = stroke<JetColour>(
    [
      [extent.xMin, 0, 0],
      [extent.xMax, 0, 0],
    ],
    'muted',
    1,
    { dash: AXIS_DASH },
  )
  if (!flat) {
    const lip = at(nozzle.stations, nozzle.stations.length - 1)
    return [axis, ...[lip.inner, lip.outer].map(({ x, r }) => stroke<JetColour>(circle(x, r), 'ink', 1))]
  }
  const corners = wallCorners(model)
  return [
    axis,
    ...[1, -1].map((side) =>
      stroke<JetColour>(
        [...corners, ...corners.slice(0, 1)].map(([x, r]): Vector => [x, side * r, 0]),
        'ink',
        1.1,
      ),
    ),
  ]
}

/** Section of the upper wall as x and r, round about. */
export function wallCorners({ nozzle }: JetSceneModel): readonly (readonly [number, number])[] {
  const [rear, lip] = [at(nozzle.stations, 0), at(nozzle.stations, nozzle.stations.length - 1)]
  return [rear.inner, lip.inner, lip.outer, rear.outer].map(({ x, r }) => [x, r] as const)
}

/** Lines of one shape. @param line the sheet, laid fine enough for the picture; perPixel length of a pixel in metres */
export function shapeStrokes(
  model: JetSceneModel,
  index: number,
  line: SheetLine,
  flat: boolean,
  perPixel: number,
): readonly Stroke<JetColour>[] {
  const shape = model.shapes[index]
  if (shape === undefined) return []
  const strokes: Stroke<JetColour>[] = []
  const { rMax } = model.extent
  if (shape.cutX !== null) {
    const [x, r] = [shape.cutX, rMax]
    const edge: readonly Vector[] = flat
      ? [
          [x, r, 0],
          [x, -r, 0],
        ]
      : circle(x, 0.94 * r)
    strokes.push(stroke<JetColour>(edge, 'accent', 1.3, { dash: CUT_DASH }))
  }
  // Up and down in section; along both edges of the cut in space.
  const turns: readonly (readonly [number, number])[] = flat
    ? [
        [1, 0],
        [-1, 0],
      ]
    : EDGE_ANGLES.map((angle) => [Math.cos(angle), Math.sin(angle)] as const)
  const width = flat ? SECTION_WIDTH : EDGE_WIDTH
  const runs = sheetRuns(line)
  for (const [y, z] of turns) {
    for (let i = 0; i < shape.looseCount; i += 1) {
      const [x, r] = [at(shape.x, i), at(shape.r, i)]
      const half = (DOT / 2) * perPixel
      strokes.push(
        stroke<JetColour>(
          [
            [x - half, r * y, r * z],
            [x + half, r * y, r * z],
          ],
          'muted',
          DOT,
        ),
      )
    }
    for (const { first, last, step, counter } of runs) {
      const points: Vector[] = []
      for (let i = first; i <= last; i += 1) points.push([at(line.x, i), at(line.r, i) * y, at(line.r, i) * z])
      strokes.push(stroke<JetColour>(points, `age ${step}`, width, counter ? { dash: COUNTER_DASH } : {}))
    }
  }
  const ring = model.rings[index] ?? null
  if (ring !== null && flat)
    for (const side of [1, -1]) {
      const [x, y, reach] = [ring.x, side * ring.radius, CROSS * perPixel]
      strokes.push(
        stroke<JetColour>(
          [
            [x - reach, y, 0],
            [x + reach, y, 0],
          ],
          'ink',
          1.4,
        ),
        stroke<JetColour>(
          [
            [x, y - reach, 0],
            [x, y + reach, 0],
          ],
          'ink',
          1.4,
        ),
      )
    }
  return strokes
}

function circle(x: number, r: number): Vector[] {
  return Array.from({ length: CIRCLE_PARTS + 1 }, (_, part) => {
    const angle = (2 * Math.PI * part) / CIRCLE_PARTS
    return [x, r * Math.cos(angle), r * Math.sin(angle)]
  })
}
