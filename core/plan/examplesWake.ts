/**
 * Plans of rings in motion, invented, each drawn from a job.
 */
import { example, FRESH, NO_FLOW, type Example } from './exampleTypes'

const HULL_NOZZLE = { shape: 'tube', diameter: 0.03, pistonDiameter: 0.06, length: 0.05, lossCoefficient: 0.1 }
const HULL_PROGRAMME = { shape: 'trapezoid', stroke: 0.075, peakSpeed: 0.2, riseTime: 0.03, fallTime: 0.03 }
const SEA = { kind: 'sea', temperatureCelsius: 15, salinity: 35, depth: 5 }
const BENCH_NOZZLE = { shape: 'tube', diameter: 0.025, pistonDiameter: 0.05, length: 0.15 }
const BENCH_PROGRAMME = { shape: 'trapezoid', stroke: 0.05, peakSpeed: 0.08, riseTime: 0.04, fallTime: 0.04 }
const LIGHT_RING = { circulation: 0.002, radius: 0.02, coreRadius: 0.003, core: 'gaussian' }

export const WAKE_EXAMPLES: readonly Example[] = [
  example('catch-up', 'Two pulses close together: does the second ring catch the first?', {
    title: 'Two pulses, close together',
    notes: 'A short period, so that the second ring starts in the wake of the first.',
    water: SEA,
    nozzle: HULL_NOZZLE,
    programme: HULL_PROGRAMME,
    ambient: NO_FLOW,
    train: { pulses: 2, period: 0.5 },
    wake: { duration: 4, outputStep: 0.02, stations: [0.1, 0.2] },
  }),
  example('three-ring-train', 'Three rings of a cruising thruster and their spacing downstream.', {
    title: 'Three-ring train',
    water: SEA,
    nozzle: HULL_NOZZLE,
    programme: HULL_PROGRAMME,
    ambient: NO_FLOW,
    train: { pulses: 3, period: 0.9 },
    wake: { duration: 6, outputStep: 0.03, stations: [0.1, 0.3] },
  }),
  example('jet-train', 'Two long pulses from the computed jet: ring and billows of each, and where they meet.', {
    title: 'Jet train',
    notes: 'Each stroke is long enough for its ring to pinch off; what trails behind it travels on as billows.',
    water: FRESH,
    nozzle: BENCH_NOZZLE,
    programme: { shape: 'trapezoid', stroke: 0.2, peakSpeed: 0.08, riseTime: 0.04, fallTime: 0.04 },
    ambient: NO_FLOW,
    train: { pulses: 2, period: 5 },
    wake: { start: 'jet', duration: 18, outputStep: 0.05, stations: [0.2] },
  }),
  example('hull-plate', 'A thruster that blows along a hull plate: how far the plate turns the ring.', {
    title: 'Thruster near a hull plate',
    notes: 'The plate stands 50 mm beside the axis.',
    water: SEA,
    nozzle: HULL_NOZZLE,
    programme: HULL_PROGRAMME,
    ambient: NO_FLOW,
    wake: { duration: 2, outputStep: 0.04, wall: { point: [0, -0.05, 0], normal: [0, 1, 0] }, stations: [0.1] },
  }),
  example('tank-wall', 'A ring generator that faces the end wall of its tank.', {
    title: 'Generator facing a tank wall',
    notes: 'The wall stands 0.25 m from the exit.',
    water: FRESH,
    nozzle: BENCH_NOZZLE,
    programme: BENCH_PROGRAMME,
    ambient: NO_FLOW,
    wake: { duration: 12, outputStep: 0.05, wall: { point: [0.25, 0, 0], normal: [1, 0, 0] }, stations: [0.1, 0.2] },
  }),
  example('opposed-thrusters', 'Two thrusters that blow at each other across a gap.', {
    title: 'Opposed thrusters',
    water: SEA,
    nozzle: HULL_NOZZLE,
    programme: HULL_PROGRAMME,
    ambient: NO_FLOW,
    wake: {
      duration: 4,
      outputStep: 0.02,
      nozzles: [
        { position: [0, 0, 0], direction: [1, 0, 0], delay: 0 },
        { position: [0.4, 0, 0], direction: [-1, 0, 0], delay: 0 },
      ],
    },
  }),
  example('side-by-side', 'Two thrusters side by side: how their rings lean towards each other.', {
    title: 'Thrusters side by side',
    water: SEA,
    nozzle: HULL_NOZZLE,
    programme: HULL_PROGRAMME,
    ambient: NO_FLOW,
    wake: {
      duration: 2.5,
      outputStep: 0.05,
      nozzles: [
        { position: [0, 0.05, 0], direction: [1, 0, 0], delay: 0 },
        { position: [0, -0.05, 0], direction: [1, 0, 0], delay: 0 },
      ],
    },
  }),
  example('vectored-pair', 'Two thrusters turned outwards, fired one after the other.', {
    title: 'Vectored pair',
    water: SEA,
    nozzle: HULL_NOZZLE,
    programme: HULL_PROGRAMME,
    ambient: NO_FLOW,
    train: { pulses: 2, period: 0.9 },
    wake: {
      duration: 2.5,
      outputStep: 0.05,
      nozzles: [
        { position: [0, 0.06, 0], direction: [1, 0.25, 0], delay: 0 },
        { position: [0, -0.06, 0], direction: [1, -0.25, 0], delay: 0.45 },
      ],
    },
  }),
  example('elliptic-nozzle', 'An elliptic nozzle: the ring exchanges its axes as it goes.', {
    title: 'Elliptic nozzle',
    water: FRESH,
    nozzle: { ...BENCH_NOZZLE, axisRatio: 2 },
    programme: BENCH_PROGRAMME,
    ambient: NO_FLOW,
    wake: { duration: 6, outputStep: 0.05 },
  }),
  example('leapfrogging-pair', 'Two equal rings one behind the other, for a laboratory demonstration.', {
    title: 'Leapfrogging pair',
    notes: 'Rings placed by hand; without viscosity they would pass each other for ever.',
    water: FRESH,
    nozzle: BENCH_NOZZLE,
    programme: BENCH_PROGRAMME,
    ambient: NO_FLOW,
    wake: {
      rings: [
        { ...LIGHT_RING, centre: [0, 0, 0] },
        { ...LIGHT_RING, centre: [0.016, 0, 0] },
      ],
      duration: 12,
      outputStep: 0.05,
      stations: [0.1],
    },
  }),
]
