/**
 * What a sizing and a map read of a plan, as one text: two plans with the same text have the same of both, whatever their present
 * design. Nozzle and programme lend their proportions and shape only, so moving on the map or opening a candidate leaves it as it is.
 */
import { DomainError } from '../../core/base'
import type { Plan } from '../../core/plan'
import { compileProgramme } from '../../core/pulse'

/** Digits that count: scaling a design back and forth rounds the rest. */
const DIGITS = 9

export function designKey(plan: Plan): string {
  const { water, nozzle, models, ambient, thruster, jet } = plan
  const { diameter, pistonDiameter, length, ...exit } = nozzle
  const parts = {
    water,
    models,
    ambient,
    exit,
    piston: pistonDiameter / diameter,
    length: length / diameter,
    programme: proportions(plan),
    thruster: thruster === null ? null : { ...thruster, count: null, actuator: actuatorOf(plan) },
    // What a computed jet adds belongs to one stroke.
    jet:
      models.overPressure === 'computed' || models.formationNumber === 'computed'
        ? [jet, nozzle, plan.programme]
        : null,
  }
  return JSON.stringify(parts, (_key, value: unknown) =>
    typeof value === 'number' ? Number(value.toPrecision(DIGITS)) : value,
  )
}

/** The share of the period that ejects counts only where the search does not choose it. */
function actuatorOf({ thruster }: Plan): unknown {
  const searched = (thruster?.search?.ejectShare ?? null) !== null
  return searched ? { ...thruster?.actuator, ejectShare: null } : thruster?.actuator
}

function proportions({ programme }: Plan): unknown {
  const { shape, riseTime, fallTime, rows, peakSpeed } = programme
  try {
    const compiled = compileProgramme(programme)
    const { duration, stroke } = compiled
    const reached = shape === 'trapezoid' ? Math.min(1, compiled.peakSpeed / peakSpeed) : 1
    const share = (time: number): number => (time * reached) / duration
    return {
      shape,
      ramps: shape === 'trapezoid' ? [share(riseTime), share(fallTime)] : null,
      rows: rows.map((row) =>
        'speed' in row
          ? [row.time / duration, (row.speed * duration) / stroke]
          : [row.time / duration, row.position / stroke],
      ),
    }
  } catch (error) {
    if (error instanceof DomainError) return programme
    throw error
  }
}
