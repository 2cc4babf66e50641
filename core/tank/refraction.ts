/**
 * Where a point in the water seems to be, seen through a flat window: the ray from air through glass into water by Snell's law, exactly.
 *
 * The lens is a point; the window is at right angles to its axis. Places are read with the scale that holds on the axis, so what is left is
 * how the scale changes across the field.
 */
import { bracketedRoot, DomainError, requireRange } from '../base'

/** Refractive indices at visible light and about 20 C: water 1.333 and sea water 1.34 (recalled, not re-read), window glass 1.52. */
export const REFRACTIVE_INDEX = { fresh: 1.333, sea: 1.34, glass: 1.52 } as const

export interface WindowView {
  /** Air between lens and window [m]. */
  readonly standOff: number
  /** Of the window [m]; 0 where it is left out. */
  readonly glassThickness: number
  /** Water between window and light sheet [m]. */
  readonly waterPath: number
  readonly waterIndex: number
  readonly glassIndex: number
}

export interface ApparentPlace {
  /** True distance from the axis of the lens [m]. */
  readonly offset: number
  /** As read with the scale on the axis [m]. */
  readonly apparent: number
  /** apparent / offset, 1 on the axis and above it outside. */
  readonly scaleFactor: number
  /** Angle of the ray in air [rad]. */
  readonly angle: number
}

/**
 * Apparent place of a point of the light sheet.
 *
 * @param offset from the axis of the lens [m], >= 0
 * @returns null where no ray from the lens gets there: it lies beyond total reflection, which needs a lens on the window
 * @throws {DomainError}
 */
export function apparentPlace(offset: number, view: WindowView): ApparentPlace | null {
  requireView(view)
  requireRange('offset', offset, { min: 0, unit: 'm' })
  if (offset === 0) return { offset, apparent: 0, scaleFactor: 1, angle: 0 }
  // Sine of the angle in air, kept as 1 - c so that rays along the window keep their digits.
  const sine = bracketedRoot((s) => reachOfRay(s, view) - offset, 0, 1 - 1e-14)
  if (sine === null) return null
  const apparent = tangent(sine) * paraxialPath(view)
  return { offset, apparent, scaleFactor: apparent / offset, angle: Math.asin(sine) }
}

/** Path in air that gives the scale on the axis: stand-off + glass / n + water / n [m]. */
export function paraxialPath({ standOff, glassThickness, waterPath, waterIndex, glassIndex }: WindowView): number {
  return standOff + glassThickness / glassIndex + waterPath / waterIndex
}

/** Scale in water over the scale of a target photographed dry at the same place: above 1. */
export function waterOverAirScale(view: WindowView): number {
  return (view.standOff + view.glassThickness + view.waterPath) / paraxialPath(view)
}

/** How far from the axis a ray meets the sheet. @param sine of its angle in air */
function reachOfRay(sine: number, view: WindowView): number {
  return (
    view.standOff * tangent(sine) +
    view.glassThickness * tangent(sine / view.glassIndex) +
    view.waterPath * tangent(sine / view.waterIndex)
  )
}

function tangent(sine: number): number {
  return sine / Math.sqrt((1 - sine) * (1 + sine))
}

function requireView(view: WindowView): void {
  requireRange('tankRun.camera.standOff', view.standOff, { min: 0, unit: 'm' })
  requireRange('tankRun.camera.windowThickness', view.glassThickness, { min: 0, unit: 'm' })
  requireRange('tankRun.camera.waterPath', view.waterPath, { min: 0, unit: 'm' })
  if (view.standOff === 0 && view.waterPath === 0)
    throw new DomainError(
      'tankRun.camera.waterPath',
      'tankRun.camera.waterPath must be above 0 m where tankRun.camera.standOff is 0 m, got 0 m for both: the lens would lie in the light sheet',
    )
  requireRange('waterIndex', view.waterIndex, { min: 1 })
  requireRange('glassIndex', view.glassIndex, { min: 1 })
}
