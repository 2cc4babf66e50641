/**
 * Plans of one pulse, invented, each drawn from a job.
 */
import { example, FRESH, NO_FLOW, type Example } from './exampleTypes'

export const PULSE_EXAMPLES: readonly Example[] = [
  example('bench-generator', 'A hand-sized ring generator in fresh water, safely below pinch-off.', {
    title: 'Bench ring generator',
    notes: 'A 25 mm tube driven by a 50 mm piston in a glass tank, for a first visualisation.',
    water: FRESH,
    nozzle: { shape: 'tube', diameter: 0.025, pistonDiameter: 0.05, length: 0.15 },
    programme: { shape: 'trapezoid', stroke: 0.0625, peakSpeed: 0.1, riseTime: 0.04, fallTime: 0.04 },
    ambient: NO_FLOW,
  }),
  example('inspection-thruster', 'A thruster of a small inspection vehicle in sea water, near the formation number.', {
    title: 'Inspection vehicle, aft thruster',
    notes: 'One pulse of a plunger thruster on a small hull that inspects moorings.',
    water: { kind: 'sea', temperatureCelsius: 15, salinity: 35, depth: 5 },
    nozzle: { shape: 'tube', diameter: 0.03, pistonDiameter: 0.06, length: 0.05, lossCoefficient: 0.1 },
    programme: { shape: 'trapezoid', stroke: 0.096, peakSpeed: 0.2, riseTime: 0.04, fallTime: 0.04 },
    ambient: NO_FLOW,
  }),
  example('millimetre-nozzle', 'A millimetre nozzle at low Reynolds number, where viscosity takes its share.', {
    title: 'Millimetre nozzle',
    notes: 'A micro-pump outlet; jet Reynolds number about 160.',
    water: { kind: 'fresh', temperatureCelsius: 25, depth: 0.05 },
    nozzle: { shape: 'tube', diameter: 0.001, pistonDiameter: 0.004, length: 0.006 },
    programme: { shape: 'half-sine', stroke: 0.002, peakSpeed: 0.14 },
    ambient: NO_FLOW,
  }),
  example('past-pinch-off', 'A long stroke past pinch-off: what goes into the ring and what trails behind.', {
    title: 'Long stroke past pinch-off',
    notes: 'Eight diameters of slug from a 40 mm tube; about half of it can not join the ring.',
    water: FRESH,
    nozzle: { shape: 'tube', diameter: 0.04, pistonDiameter: 0.08, length: 0.3 },
    programme: { shape: 'rectangular', stroke: 0.32, peakSpeed: 0.08 },
    ambient: NO_FLOW,
  }),
  example('form-and-pinch-off', 'A starting jet computed from the lip: the ring forms, fills and lets go.', {
    title: 'Form and pinch off',
    notes:
      'A 20 mm tube that drives eight diameters of slug into still water for a film of the roll-up: when does the ring let go of its jet?',
    water: FRESH,
    nozzle: { shape: 'tube', diameter: 0.02, pistonDiameter: 0.04, length: 0.2 },
    programme: { shape: 'trapezoid', stroke: 0.16, peakSpeed: 0.15, riseTime: 0.01, fallTime: 0.01 },
    ambient: NO_FLOW,
    jet: { ensemble: true, coreGrowth: true, delta: null },
  }),
  example('sharp-orifice', 'A sharp orifice in a plate: the jet contracts and pinch-off comes early.', {
    title: 'Sharp orifice in a plate',
    notes: 'A 20 mm hole in the end plate of a 40 mm cylinder.',
    water: FRESH,
    nozzle: { shape: 'orifice', diameter: 0.02, pistonDiameter: 0.04, lossCoefficient: 0.5 },
    programme: { shape: 'trapezoid', stroke: 0.03, peakSpeed: 0.25, riseTime: 0.02, fallTime: 0.02 },
    ambient: NO_FLOW,
  }),
]
