/**
 * What a sizing asks for: its duty points, and the refusals at its door.
 */
import { DomainError, requireRange } from '../base'
import type { DesignProblem, DutyDemand } from './designTypes'
import type { DragLaw } from './drag'
import type { SearchInput, Span, ThrusterSection } from './types'

/**
 * The demands of a section: its duty points for least power, the vehicle as it moves for most thrust.
 *
 * Without a search the duty points are what is asked for; without duty points, nothing but the vehicle's speed.
 *
 * @param drag of the vehicle; needed by a duty point of a speed
 * @throws {DomainError} on thruster.target or thruster.vehicle.drag
 */
export function dutyDemands(section: ThrusterSection, drag: DragLaw | null): readonly DutyDemand[] {
  const goal = section.search?.goal ?? 'power'
  if (goal === 'thrust' || (section.target.length === 0 && section.search === null)) return [underWay(section, drag)]
  if (section.target.length === 0)
    throw new DomainError(
      'thruster.target',
      'thruster.target must hold a duty point, a speed or a thrust, for a search for least power; it holds none',
    )
  let shares = 0
  section.target.forEach((point, i) => {
    requireRange(`thruster.target.${i}.share`, point.share, { min: 0 })
    shares += point.share
  })
  if (!(shares > 0))
    throw new DomainError('thruster.target', 'thruster.target must have shares of which one is above 0; all are 0')
  return section.target.map((point, i): DutyDemand => {
    const share = point.share / shares
    if ('thrust' in point) {
      requireRange(`thruster.target.${i}.thrust`, point.thrust, { above: 0, unit: 'N' })
      return { speed: 0, thrust: point.thrust, share }
    }
    requireRange(`thruster.target.${i}.speed`, point.speed, { above: 0, unit: 'm/s' })
    if (drag === null)
      throw new DomainError(
        'thruster.vehicle.drag',
        `thruster.vehicle.drag must be given to hold the speed ${point.speed} m/s of thruster.target; it is missing`,
      )
    const thrust = drag.dragAt(point.speed)
    if (!(thrust > 0))
      throw new DomainError(
        'thruster.vehicle.drag',
        `thruster.vehicle.drag must be above 0 N at the speed ${point.speed} m/s of thruster.target, got ${thrust} N`,
      )
    return { speed: point.speed, thrust, share }
  })
}

/** The vehicle's held speed, the speed its drag allows, or a bench. */
function underWay(section: ThrusterSection, drag: DragLaw | null): DutyDemand {
  const held = section.vehicle === null ? 0 : section.vehicle.speed
  return { speed: held ?? (drag === null ? 0 : null), thrust: null, share: 1 }
}

/** @throws {DomainError} on what a search cannot begin with */
export function requireProblem(problem: DesignProblem): void {
  const { section, pulse } = problem
  requireRange('water.density', pulse.density, { above: 0, unit: 'kg/m3' })
  requireRange('water.kinematicViscosity', pulse.kinematicViscosity, { above: 0, unit: 'm2/s' })
  requireRange('thruster.actuator.efficiency', section.actuator.efficiency, { above: 0, max: 1 })
  requireRange('thruster.actuator.valveLag', section.actuator.valveLag, { min: 0, unit: 's' })
  if (section.search !== null) requireSearch(section.search)
}

function requireSearch(search: SearchInput): void {
  requireSpan('diameter', search.diameter, 'm')
  requireSpan('strokeRatio', search.strokeRatio, '')
  requireSpan('frequency', search.frequency, '1/s')
  requireSpan('count', search.count, '')
  if (Math.floor(search.count[1]) < Math.ceil(search.count[0]))
    throw new DomainError(
      'thruster.search.count',
      `thruster.search.count must hold a whole number, got ${search.count[0]} to ${search.count[1]}`,
    )
  if (search.ejectShare === null) return
  requireSpan('ejectShare', search.ejectShare, '')
  requireRange('thruster.search.ejectShare', search.ejectShare[1], { max: 1 })
}

function requireSpan(name: string, span: Span, unit: string): void {
  const field = `thruster.search.${name}`
  requireRange(field, span[0], { above: 0, unit })
  requireRange(field, span[1], { above: 0, unit })
  if (span[1] < span[0])
    throw new DomainError(field, `${field} must run from low to high, got ${span[0]} before ${span[1]}`)
}
