/**
 * From a design back to what a plan holds, for the full analysis of one duty point.
 */
import type { PulseInput } from '../pulse'
import type { CompiledDesigns } from './design'
import { scaledStart } from './designRing'
import { scaledProgramme } from './designStroke'
import type { PointFigures } from './designTypes'
import type { ThrusterInput } from './resultTypes'
import type { ThrusterSection } from './types'

/** The pulse of a design at a duty point, the vehicle's speed as the flow past the nozzle. */
export function pulseOfDesign({ problem, planMoments, start }: CompiledDesigns, point: PointFigures): PulseInput {
  const { pulse } = problem
  const { diameter, pistonDiameter, stroke } = point.held
  const beyond = scaledStart(start, pulse.density, diameter, point.peakSpeed)
  return {
    ...pulse,
    nozzle: {
      ...pulse.nozzle,
      diameter,
      pistonDiameter,
      length: (pulse.nozzle.length / pulse.nozzle.diameter) * diameter,
    },
    programme: scaledProgramme(pulse.programme, planMoments, stroke, point.duration),
    axialFlow: point.speed,
    jet:
      pulse.jet === null || pulse.overPressure !== 'computed'
        ? pulse.jet
        : {
            ...pulse.jet,
            circulationBeyondSlug: beyond.circulation,
            impulseBeyondSlug: beyond.impulse,
            energyBeyondSlug: beyond.energy,
          },
  }
}

/**
 * What `analyseThruster` takes for a design at a duty point: the vehicle at the speed of that point, or a bench for a thrust
 * while standing.
 */
export function thrusterInputOf(designs: CompiledDesigns, point: PointFigures): ThrusterInput {
  const { problem } = designs
  const { vehicle, actuator } = problem.section
  const { count, ejectShare, frequency } = point.held
  const standing = point.speed === 0
  const section: ThrusterSection = {
    ...problem.section,
    count,
    actuator: { ...actuator, ejectShare },
    vehicle: standing || vehicle === null ? null : { ...vehicle, speed: point.speed },
    target: standing && point.thrustAsked !== null ? [{ thrust: point.thrustAsked, share: 1 }] : [],
    search: null,
  }
  return { ...problem, section, pulse: pulseOfDesign(designs, point), frequency }
}
