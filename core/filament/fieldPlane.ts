/**
 * A field on the flat rectangle through the rings of a finished run: speed anywhere, the Stokes stream function for rings on the
 * x axis. For pictures.
 */
import { at } from '../base'
import { deltaOverCore } from '../coaxial'
import type { DyeOptions } from './dye'
import type { Wake } from './types'
import type { Vector } from './vector'
import { WakeFlow, type FlowSurroundings } from './wakeFlow'
import { wakeFrame, type RingShape } from './wakeFrame'

export type FieldQuantity = 'speed' | 'stream function'

export interface FieldPlane {
  readonly quantity: FieldQuantity
  readonly columns: number
  readonly rows: number
  /** First node, and the whole sides from it to the last column and the last row [m]. */
  readonly origin: Vector
  readonly along: Vector
  readonly across: Vector
  /** SI values at every output time, row by row, columns running fastest. */
  readonly values: readonly Float32Array[]
  /** Ends of the scale; a signed field's low end is minus its high end. */
  readonly low: number
  readonly high: number
}

/** Output times a field is drawn for at most. */
export const MOST_FIELD_OUTPUTS = 600

/** Nodes along the longer side. */
const NODES_ALONG = 96
const FEWEST_ACROSS = 24

/** The scale leaves out this share of the highest values: they stand in the cores and would dull the rest. */
const LEFT_OUT = 0.01

/** Whether every ring of the run lies on the x axis, where the stream function has a meaning. */
export function isOnJetAxis(wake: Wake): boolean {
  return (
    wake.model === 'coaxial' &&
    wake.trajectories.every(({ y, z, directionX }) => {
      const radiusOff = Math.hypot(y[0] ?? 0, z[0] ?? 0)
      return radiusOff < 1e-9 && Math.abs(Math.abs(directionX[0] ?? 1) - 1) < 1e-9
    })
  )
}

/**
 * The field at every output time on the plane z = 0 that holds all paths of the rings.
 *
 * @returns null where it was cancelled, or where the stream function is asked for rings off the x axis
 */
export async function fieldPlane(
  wake: Wake,
  surroundings: FlowSurroundings,
  quantity: FieldQuantity,
  options: DyeOptions = {},
): Promise<FieldPlane | null> {
  if (quantity === 'stream function' && (!isOnJetAxis(wake) || surroundings.wall !== null)) return null
  const sheet = sheetOf(wake)
  const points = nodesOf(sheet)
  const count = sheet.columns * sheet.rows
  const flow = new WakeFlow(surroundings)
  const velocity = new Float64Array(3 * count)
  const values: Float32Array[] = []
  const outputs = Math.min(wake.outputTimes.length, MOST_FIELD_OUTPUTS)
  for (let index = 0; index < outputs; index++) {
    if (options.signal?.aborted === true) return null
    const rings = wakeFrame(wake, index)
    values.push(
      quantity === 'speed'
        ? speedAt(flow, rings, points, count, velocity)
        : streamAt(surroundings, rings, points, count),
    )
    options.onProgress?.({ share: (index + 1) / outputs, what: 'field' })
    await options.pause?.()
  }
  const high = scaleEnd(values)
  return { ...sheet, quantity, values, low: quantity === 'speed' ? 0 : -high, high }
}

type Sheet = Pick<FieldPlane, 'columns' | 'rows' | 'origin' | 'along' | 'across'>

function sheetOf(wake: Wake): Sheet {
  let [lowX, highX, lowY, highY] = [Infinity, -Infinity, Infinity, -Infinity]
  for (const path of wake.trajectories)
    path.time.forEach((_, k) => {
      const reach = 2 * at(path.radius, k)
      lowX = Math.min(lowX, at(path.x, k) - reach)
      highX = Math.max(highX, at(path.x, k) + reach)
      lowY = Math.min(lowY, at(path.y, k) - reach)
      highY = Math.max(highY, at(path.y, k) + reach)
    })
  if (!(highX > lowX)) [lowX, highX, lowY, highY] = [-1, 1, -1, 1]
  const spacing = Math.max(highX - lowX, highY - lowY) / (NODES_ALONG - 1)
  const nodes = (low: number, high: number): number => Math.max(FEWEST_ACROSS, Math.ceil((high - low) / spacing) + 1)
  return {
    columns: nodes(lowX, highX),
    rows: nodes(lowY, highY),
    origin: [lowX, lowY, 0],
    along: [highX - lowX, 0, 0],
    across: [0, highY - lowY, 0],
  }
}

function nodesOf({ columns, rows, origin, along, across }: Sheet): Float64Array {
  const points = new Float64Array(3 * columns * rows)
  for (let row = 0; row < rows; row++)
    for (let column = 0; column < columns; column++) {
      const k = 3 * (row * columns + column)
      points[k] = origin[0] + (along[0] * column) / (columns - 1)
      points[k + 1] = origin[1] + (across[1] * row) / (rows - 1)
    }
  return points
}

function speedAt(
  flow: WakeFlow,
  rings: readonly RingShape[],
  points: Float64Array,
  count: number,
  velocity: Float64Array,
): Float32Array {
  flow.setRings(rings)
  flow.velocity(points, count, velocity)
  const speed = new Float32Array(count)
  for (let i = 0; i < count; i++)
    speed[i] = Math.hypot(velocity[3 * i] ?? 0, velocity[3 * i + 1] ?? 0, velocity[3 * i + 2] ?? 0)
  return speed
}

function streamAt(
  { kernel, cores, axialFlow }: FlowSurroundings,
  rings: readonly RingShape[],
  points: Float64Array,
  count: number,
): Float32Array {
  const targetX = Float64Array.from({ length: count }, (_, i) => points[3 * i] ?? 0)
  const targetR = Float64Array.from({ length: count }, (_, i) => Math.abs(points[3 * i + 1] ?? 0))
  const column = (read: (ring: RingShape) => number): Float64Array => Float64Array.from(rings, read)
  const stream = new Float64Array(count)
  kernel.coaxialStream(
    {
      targetCount: count,
      targetX,
      targetR,
      targetDeltaSquared: null,
      rings: {
        count: rings.length,
        x: column(({ centre }) => centre[0]),
        r: column(({ radius }) => radius),
        circulation: column(({ circulation, direction }) => circulation * Math.sign(direction[0])),
        deltaSquared: column(
          ({ coreRadius, number }) => (coreRadius * deltaOverCore(cores[number - 1] ?? 'uniform')) ** 2,
        ),
      },
      skipSelf: false,
    },
    stream,
  )
  return Float32Array.from(stream, (psi, i) => psi + 0.5 * axialFlow * (targetR[i] ?? 0) ** 2)
}

/** Magnitude that all but the highest values stay under. */
function scaleEnd(values: readonly Float32Array[]): number {
  // A sample is enough for the end of a colour scale.
  const sample = values
    .flatMap((frame) => [...frame].filter((_, i) => i % 7 === 0).map(Math.abs))
    .filter(Number.isFinite)
  sample.sort((a, b) => a - b)
  return sample[Math.floor((1 - LEFT_OUT) * (sample.length - 1))] ?? 1
}
