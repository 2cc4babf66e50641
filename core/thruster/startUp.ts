/**
 * From rest to cruise: the vehicle's speed, pulse after pulse.
 */
import { at } from '../base'
import type { CycleCourse } from './cycle'
import type { DragLaw } from './drag'

/** Parts of a period with their own mean thrust: the impulse of each is exact. */
const PARTS = 24
/** Up to about this many pulses each is marched by its parts; beyond, whole pulses are taken together at their mean thrust. */
const MOST_PULSES = 400
/** A step is at most this share of mass x cruise speed / thrust: light vehicles need steps shorter than a part. */
const LONGEST_STEP = 0.1
/** Points kept for a plot. */
const MOST_POINTS = 600
/** Share of the cruise speed that counts as there. */
export const THERE = 0.95
/** The march goes on past that moment for this share of its time. */
const BEYOND = 0.5
/** Given up after this many times mass x cruise speed / thrust at rest. */
const PATIENCE = 12

export interface StartUp {
  /** To 95 % of the cruise speed [s] and the way until then [m]; null where it is not reached. */
  readonly time: number | null
  readonly distance: number | null
  /** Pulses of each thruster until then. */
  readonly pulses: number | null
  /** Mass and added mass [kg]. */
  readonly movedMass: number
  /** True where each pulse was followed; false where many were taken together at their mean. */
  readonly pulseByPulse: boolean
  readonly history: {
    readonly time: readonly number[]
    readonly speed: readonly number[]
    readonly position: readonly number[]
  }
}

export interface StartUpInput {
  readonly course: CycleCourse
  readonly count: number
  readonly inTurn: boolean
  /** Mass and added mass [kg], > 0. */
  readonly movedMass: number
  readonly drag: DragLaw
  /** [m/s], > 0 */
  readonly cruiseSpeed: number
  /** rho (1 - recovered share) [kg/m3]: the intake holds back with this times inflow times speed. */
  readonly intakeDensity: number
}

/** A stretch of time with mean jet thrust [N] and mean inflow [m3/s] of all thrusters. */
interface Part {
  readonly duration: number
  readonly thrust: number
  readonly inflow: number
}

/**
 * March M dV/dt = thrust - intake - drag from rest, each part of a period at its exact mean thrust, by the classical Runge-Kutta
 * method (fourth order; the speed changes little within a part).
 */
export function marchStartUp(input: StartUpInput): StartUp {
  const { course, drag, movedMass, cruiseSpeed } = input
  const parts = periodParts(input)
  const meanThrust = parts.reduce((sum, part) => sum + part.thrust * part.duration, 0) / course.period
  const scale = (movedMass * cruiseSpeed) / meanThrust
  // Quadratic drag takes 1.83 scales to 95 %.
  const pulses = (2 * scale) / course.period
  const pulseByPulse = pulses <= MOST_PULSES
  const cycle = pulseByPulse ? parts : [wholePeriods(parts, course.period, Math.ceil(pulses / MOST_PULSES))]
  const stepsAPart = pulseByPulse ? Math.ceil(course.period / PARTS / (LONGEST_STEP * scale)) : 1
  const keepEvery = pulseByPulse ? Math.ceil((2 * pulses * PARTS * stepsAPart + PARTS) / MOST_POINTS) : 2
  const history = { time: [0], speed: [0], position: [0] }
  const slope = (part: Part, speed: number): number => {
    // A pulse may carry the vehicle past the last row of a drag table for a moment; the drag is held there.
    const resistance = drag.dragAt(Math.min(Math.max(0, speed), drag.highestSpeed))
    return (part.thrust - input.intakeDensity * part.inflow * speed - resistance) / movedMass
  }
  let time = 0
  let speed = 0
  let position = 0
  let arrival: { readonly time: number; readonly distance: number } | null = null
  for (let i = 0; time < (arrival === null ? PATIENCE * scale : arrival.time * (1 + BEYOND)); i++) {
    const part = at(cycle, Math.floor(i / stepsAPart) % cycle.length)
    const h = part.duration / stepsAPart
    const k1 = slope(part, speed)
    const k2 = slope(part, speed + (h / 2) * k1)
    const k3 = slope(part, speed + (h / 2) * k2)
    const k4 = slope(part, speed + h * k3)
    const next = Math.max(0, speed + (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4))
    // The method's own formula for the way, whose slope is the speed.
    const way = h * speed + ((h * h) / 6) * (k1 + k2 + k3)
    if (arrival === null && next >= THERE * cruiseSpeed) {
      const share = (THERE * cruiseSpeed - speed) / (next - speed)
      arrival = { time: time + share * h, distance: position + share * way }
    }
    time += h
    speed = next
    position += way
    if ((i + 1) % keepEvery === 0) {
      history.time.push(time)
      history.speed.push(speed)
      history.position.push(position)
    }
  }
  return {
    time: arrival?.time ?? null,
    distance: arrival?.distance ?? null,
    pulses: arrival === null ? null : Math.ceil(arrival.time / course.period),
    movedMass,
    pulseByPulse,
    history,
  }
}

/** One period in equal parts. */
function periodParts({ course, count, inTurn }: StartUpInput): Part[] {
  const { period } = course
  const impulse = sinceStart(course.jetImpulseTo, period)
  const volume = sinceStart(course.intakeVolumeTo, period)
  /** Of all thrusters, thruster k a share k / count of the period behind the first; the start of the count drops out of differences. */
  const ofAll = (one: (time: number) => number, time: number): number => {
    if (!inTurn) return count * one(time)
    let sum = 0
    for (let k = 0; k < count; k++) sum += one(time + period - (k * period) / count)
    return sum
  }
  return Array.from({ length: PARTS }, (_, i) => {
    const [from, until] = [(i * period) / PARTS, ((i + 1) * period) / PARTS]
    const h = until - from
    return {
      duration: h,
      thrust: (ofAll(impulse, until) - ofAll(impulse, from)) / h,
      inflow: (ofAll(volume, until) - ofAll(volume, from)) / h,
    }
  })
}

/** A sum within one period continued over the periods that follow. */
function sinceStart(within: (time: number) => number, period: number): (time: number) => number {
  const whole = within(period)
  return (time) => {
    const periods = Math.floor(time / period)
    return periods * whole + within(time - periods * period)
  }
}

function wholePeriods(parts: readonly Part[], period: number, periods: number): Part {
  const mean = (of: (part: Part) => number) => parts.reduce((sum, part) => sum + of(part) * part.duration, 0) / period
  return { duration: periods * period, thrust: mean((part) => part.thrust), inflow: mean((part) => part.inflow) }
}
