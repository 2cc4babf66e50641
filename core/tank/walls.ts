/**
 * The walls of the tank as the ring feels them: how much they hold it back, and the round tube that holds it back as much.
 *
 * Round tank: the tube integral of the coaxial room. Rectangular tank with its surface: the full lattice of images there. The march of
 * rings knows tubes only, so a rectangular tank enters it as the tube of equal slowing. For a ring of constant size that is exact; for
 * one that grows at constant impulse both slowings keep Gamma R^2 and differ by the next order in (R / wall)^2 only.
 */
import { bracketedRoot, DomainError, requireRange } from '../base'
import { LARGEST_TUBE_SHARE, tankSlowing, tubeSlowing, type TankSection } from '../coaxial'
import type { TankRunSection } from './types'

export type WallKind = 'open' | 'round' | 'rectangular'

/** Where the axis stands in its tank; null: not told. Distances from the axis [m]. */
export interface TankWalls {
  readonly kind: WallKind
  /** Of a round tank [m]. */
  readonly bore: number | null
  readonly side: number | null
  readonly surface: number | null
  readonly floor: number | null
  /** From the exit plane along the axis. */
  readonly end: number | null
  /** Cross-section with the axis in it; null unless width and depth are told. */
  readonly section: TankSection | null
  /** What is not told, one sentence each. */
  readonly notes: readonly string[]
}

/**
 * The tank of a section.
 *
 * @param exitDiameter of the nozzle, which must find room in the tank [m]
 * @throws {DomainError} on tankRun.tank… and tankRun.nozzleDepth
 */
export function tankWalls(section: Pick<TankRunSection, 'tank' | 'nozzleDepth'>, exitDiameter: number): TankWalls {
  const { tank, nozzleDepth } = section
  const { length, width, depth, bore } = tank
  requireSize('tankRun.tank.length', length, 0)
  requireSize('tankRun.tank.width', width, exitDiameter)
  requireSize('tankRun.tank.depth', depth, exitDiameter)
  requireSize('tankRun.tank.bore', bore, exitDiameter)
  if (bore !== null) {
    const ignored = width !== null || depth !== null
    const notes = ignored ? ['The tank is taken as round: its bore stands, width and depth are not read.'] : []
    const half = bore / 2
    return { kind: 'round', bore, side: half, surface: null, floor: null, end: length, section: null, notes }
  }
  const surface = surfaceDistance(nozzleDepth, depth, exitDiameter)
  const floor = depth === null || surface === null ? null : depth - surface
  const side = width === null ? null : width / 2
  const open = { bore: null, side, surface, floor, end: length }
  if (width === null || depth === null || side === null || floor === null) {
    const missing = [width === null ? 'width' : null, depth === null ? 'water depth' : null].filter(
      (one) => one !== null,
    )
    const note = `The tank's ${missing.join(' and ')} ${missing.length > 1 ? 'are' : 'is'} not told: arrivals are those of a ring far from all walls.`
    return { ...open, kind: 'open', section: null, notes: [note] }
  }
  return { ...open, kind: 'rectangular', section: { width, depth, fromSide: side, fromFloor: floor }, notes: [] }
}

function requireSize(field: string, value: number | null, above: number): void {
  if (value !== null) requireRange(field, value, { above, unit: 'm' })
}

function surfaceDistance(nozzleDepth: number | null, depth: number | null, exitDiameter: number): number | null {
  if (nozzleDepth === null) return depth === null ? null : depth / 2
  const max = depth === null ? {} : { max: depth - exitDiameter / 2 }
  requireRange('tankRun.nozzleDepth', nozzleDepth, { min: exitDiameter / 2, ...max, unit: 'm' })
  return nozzleDepth
}

/**
 * Change of a ring's speed by the tank [m/s], against its motion; 0 in an open tank.
 *
 * @param circulation Gamma [m2/s]
 * @param radius R [m]
 * @throws {DomainError} where the ring does not fit between the walls
 */
export function wallSlowing(walls: TankWalls, circulation: number, radius: number): number {
  if (walls.kind === 'open') return 0
  requireRoom(walls, radius)
  if (walls.bore !== null) return tubeSlowing(circulation, radius, walls.bore / 2)
  return walls.section === null ? 0 : tankSlowing(circulation, radius, walls.section)
}

/**
 * Radius of the round tube that slows a ring as the tank does [m]; null in an open tank.
 *
 * @param radius R [m]
 * @throws {DomainError} where the ring does not fit between the walls
 */
export function slowingTube(walls: TankWalls, radius: number): number | null {
  if (walls.kind === 'open') return null
  const wanted = wallSlowing(walls, 1, radius)
  if (walls.bore !== null) return walls.bore / 2
  // The slowing falls as the cube of the tube's radius, so a cube root of the ratio is nearly straight.
  const misfit = (tube: number): number => Math.cbrt(tubeSlowing(1, radius, tube) / wanted) - 1
  const least = radius / LARGEST_TUBE_SHARE
  const most = 2 * ((walls.section?.width ?? 0) + (walls.section?.depth ?? 0))
  const found = bracketedRoot(misfit, least, Math.max(2 * least, most), 1e-12 * radius)
  if (found === null) throw tooNarrow(walls, radius)
  return found
}

/** `slowingTube` that remembers: rings of one programme at many speeds have one radius, to rounding. */
export function slowingTubes(walls: TankWalls): (radius: number) => number | null {
  const known = new Map<string, number | null>()
  return (radius) => {
    const key = radius.toPrecision(12)
    const tube = known.has(key) ? (known.get(key) ?? null) : slowingTube(walls, Number(key))
    known.set(key, tube)
    return tube
  }
}

/** Distance from the axis to the nearest wall beside it [m]; Infinity where none is told. */
export function nearestSide(walls: TankWalls): number {
  return Math.min(walls.side ?? Infinity, walls.surface ?? Infinity, walls.floor ?? Infinity)
}

function requireRoom(walls: TankWalls, radius: number): void {
  if (radius > LARGEST_TUBE_SHARE * nearestSide(walls)) throw tooNarrow(walls, radius)
}

function tooNarrow(walls: TankWalls, radius: number): DomainError {
  const near = nearestSide(walls)
  const field = fieldOfNearest(walls, near)
  return new DomainError(
    field,
    `${field} must leave the ring room: its radius ${short(radius)} m must be at most ${LARGEST_TUBE_SHARE} of the distance from the axis to the nearest wall, got ${short(near)} m`,
  )
}

function fieldOfNearest(walls: TankWalls, near: number): string {
  if (walls.bore !== null) return 'tankRun.tank.bore'
  if (walls.side === near) return 'tankRun.tank.width'
  return walls.surface === near ? 'tankRun.nozzleDepth' : 'tankRun.tank.depth'
}

function short(value: number): number {
  return Number(value.toPrecision(4))
}
