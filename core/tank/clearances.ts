/**
 * How far the ring stays from every wall, and what each costs it.
 */
import { typescriptKernel } from '../kernel'
import { tankSlowing } from '../coaxial'
import type { TankWalls } from './walls'
import { wallSlowing } from './walls'

export type WallName = 'side wall' | 'tank wall' | 'surface' | 'floor' | 'far wall'

export interface Clearance {
  readonly wall: WallName
  /** From the ring's axis; for the far wall from the last station, or from the exit plane where there is none [m]. */
  readonly distance: number
  /** distance over the exit diameter. */
  readonly overDiameter: number
  /** distance over the ring's largest radius on its way; null without a ring. */
  readonly overRadius: number | null
  /** Change of the ring's speed by this wall alone, per cent: negative slows it; null without a ring or where the ring does not fit. */
  readonly costPercent: number | null
  /** At least the clearance of common practice. */
  readonly ok: boolean
  /** True where the ring's rim comes nearer than its radius: a real wall sheds vorticity of its own there. */
  readonly wallInteraction: boolean
  readonly text: string
}

export interface ClearanceInput {
  readonly walls: TankWalls
  readonly exitDiameter: number
  /** Clearance over the exit diameter. */
  readonly practice: number
  /** The ring at birth, and its largest radius on the way; null without one. */
  readonly ring: {
    readonly circulation: number
    readonly radius: number
    readonly speed: number
    readonly largestRadius: number
  } | null
  readonly lastStation: number | null
}

/** Other walls are put this many distances away where one is looked at alone: the rest of their share is 1e-9 of it. */
const FAR = 2000

/** Rows for the walls that are told. */
export function clearances(input: ClearanceInput): readonly Clearance[] {
  const { walls, lastStation, exitDiameter } = input
  const rows: Clearance[] = []
  const add = (wall: WallName, distance: number | null, change: (distance: number) => number | null): void => {
    if (distance !== null) rows.push(clearance(input, wall, distance, change))
  }
  const alone = (distance: number): number | null => oneWall(input, distance)
  if (walls.bore !== null) add('tank wall', walls.side, () => wholeTank(input))
  else add('side wall', walls.side, alone)
  add('surface', walls.surface, alone)
  add('floor', walls.floor, alone)
  const from = lastStation ?? 0
  if (walls.end !== null && walls.end - from > -exitDiameter)
    add('far wall', Math.max(0, walls.end - from), (distance) => farWall(input, distance))
  return rows
}

function clearance(
  input: ClearanceInput,
  wall: WallName,
  distance: number,
  change: (distance: number) => number | null,
): Clearance {
  const { ring, exitDiameter, practice } = input
  const overDiameter = distance / exitDiameter
  const overRadius = ring === null ? null : distance / ring.largestRadius
  // Beside the ring the rim is a radius nearer than the axis; the far wall faces its whole plane.
  const near = wall === 'far wall' ? 1 : 2
  const wallInteraction = overRadius !== null && overRadius < near
  const changed = ring === null ? null : change(distance)
  const costPercent = changed === null || ring === null ? null : (100 * changed) / ring.speed
  const ok = overDiameter >= practice
  const named = wall === 'side wall' ? 'Each side wall' : `The ${wall}`
  const place = wall === 'far wall' && input.lastStation !== null ? 'from the last station' : 'from the axis'
  const parts = [
    `${named} is ${short(overDiameter)} exit diameters ${wall === 'far wall' && input.lastStation === null ? 'from the exit plane' : place}${ok ? '' : `, less than the ${short(practice)} of common practice`}.`,
  ]
  if (wallInteraction)
    parts.push(
      'The ring comes within about a radius of it: a real wall sheds vorticity of its own and the ring rebounds.',
    )
  return { wall, distance, overDiameter, overRadius, costPercent, ok, wallInteraction, text: parts.join(' ') }
}

/** A wall beside the axis, the others far away. */
function oneWall({ ring }: ClearanceInput, distance: number): number | null {
  if (ring === null || distance <= ring.radius) return null
  const far = FAR * distance
  return tankSlowing(ring.circulation, ring.radius, {
    width: far,
    depth: far,
    fromSide: distance,
    fromFloor: far / 2,
  })
}

function wholeTank({ ring, walls }: ClearanceInput): number | null {
  return ring === null ? null : wallSlowing(walls, ring.circulation, ring.radius)
}

/** The mirror image beyond the far wall, opposite in sense. */
function farWall({ ring }: ClearanceInput, distance: number): number | null {
  if (ring === null || distance <= 0) return null
  const out = { axial: new Float64Array(1), radial: new Float64Array(1) }
  typescriptKernel.coaxialVelocity(
    {
      targetCount: 1,
      targetX: Float64Array.of(0),
      targetR: Float64Array.of(ring.radius),
      targetDeltaSquared: null,
      rings: {
        count: 1,
        x: Float64Array.of(2 * distance),
        r: Float64Array.of(ring.radius),
        circulation: Float64Array.of(-ring.circulation),
        deltaSquared: Float64Array.of(0),
      },
      skipSelf: false,
    },
    out,
  )
  return out.axial[0] ?? null
}

function short(value: number): number {
  return Number(value.toPrecision(3))
}
