/** The plan as it is when a thruster begins on it. */
import type { PulseResult } from '../pulse'
import { sweptVolume, type SearchInput, type Span } from '../thruster'
import { SEARCH_DEFAULTS, VEHICLE_DEFAULTS } from './decodeThruster'
import { setThruster, setTrain } from './edit'
import type { Plan } from './types'

/** Two digits, as one would type it. */
function typed(value: number): number {
  return Number(value.toPrecision(2))
}

/** Two digits, and not more than the value: what is asked for is given. */
function atMost(value: number): number {
  const step = 10 ** (Math.floor(Math.log10(value)) - 1)
  return Number((Math.floor(value / step) * step).toPrecision(2))
}

/** Share of the peak exit speed that a vehicle begins with: jets much faster than the vehicle waste their energy. */
const SPEED_SHARE = 0.3
/** Period of a first train over the stroke's duration: the rest refills. */
const PERIOD = 2.5
const PLAIN_PULSE = { duration: 0.5, impulse: 0.01, peakSpeed: 0.2, mass: 0, density: 1000 }

interface PulseFigures {
  readonly duration: number
  readonly impulse: number
  readonly peakSpeed: number
  /** Of the slug [kg]. */
  readonly mass: number
  readonly density: number
}

function figuresOf({ nozzle }: Plan, pulse: PulseResult | null, density: number): PulseFigures {
  if (pulse === null) return PLAIN_PULSE
  const mass = density * sweptVolume({ count: 1, diameter: nozzle.diameter, strokeRatio: pulse.strokeRatio })
  return { duration: pulse.duration, impulse: pulse.slug.impulse, peakSpeed: pulse.peakSpeed, mass, density }
}

/** Ranges about the plan's own design. */
function searchAround(plan: Plan, period: number): SearchInput {
  const about = (value: number, factor: number): Span => [typed(value / factor), typed(value * factor)]
  return {
    ...SEARCH_DEFAULTS,
    diameter: about(plan.nozzle.diameter, 2),
    frequency: about(1 / period, 4),
  }
}

/** A search about the plan as it stands, for a plan that has none. */
export function startSearch(plan: Plan): Plan {
  return setThruster(plan, { search: searchAround(plan, plan.train?.period ?? 1) })
}

/**
 * Put the thruster on a vehicle whose drag suits the thrust of this pulse, or clamp it on a bench; what is asked of it is what it
 * gives, so that the sizing has something to begin with.
 */
export function startThruster(plan: Plan, on: 'vehicle' | 'bench', pulse: PulseResult | null, density: number): Plan {
  const figures = figuresOf(plan, pulse, density)
  const train = plan.train ?? { pulses: 10, period: typed(PERIOD * figures.duration) }
  const thrust = figures.impulse / train.period
  const speed = typed(SPEED_SHARE * figures.peakSpeed)
  // What the intake holds back under way.
  const left = Math.max(0.1 * thrust, thrust - (figures.mass * speed) / train.period)
  const dragArea = atMost(left / (0.5 * figures.density * speed * speed))
  const withTrain = setTrain(plan, train)
  const search = searchAround(plan, train.period)
  return on === 'vehicle'
    ? setThruster(withTrain, {
        vehicle: { ...VEHICLE_DEFAULTS, drag: { kind: 'area', dragArea } },
        target: [{ speed, share: 1 }],
        search,
      })
    : setThruster(withTrain, { vehicle: null, target: [{ thrust: atMost(thrust), share: 1 }], search })
}
