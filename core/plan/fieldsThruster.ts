/** Numbers and choices of the section `thruster`; see fields.ts for what the limits mean. */
import { MOST_THRUSTERS } from '../thruster'
import type { FieldDefinition } from './fieldTypes'

/** Seeds of a random draw: 32 bits. */
export const LARGEST_SEED = 4294967295

/** A jet square to the way does not push. 89 degrees. */
const STEEPEST_CANT = (89 * Math.PI) / 180

const share = { dimension: 'number', min: 0.01, max: 0.99 } as const
const scatter = { dimension: 'number', min: 0, max: 0.5 } as const
const bore = { dimension: 'length', min: 1e-4, max: 10 } as const
const strokes = { dimension: 'number', min: 0.05, max: 100 } as const
const rate = { dimension: 'frequency', min: 1e-4, max: 1000 } as const
const many = { dimension: 'number', min: 1, max: MOST_THRUSTERS, whole: true } as const
const room = { dimension: 'length', above: 0, max: 1000, optional: true } as const

export const THRUSTER_FIELDS = {
  'thruster.count': { ...many, label: 'Thrusters', help: 'How many thrusters push the vehicle together.' },
  'thruster.spacing': {
    ...room,
    label: 'Spacing',
    help: 'Between the axes of neighbouring nozzles; empty: far enough apart not to disturb each other.',
  },
  'thruster.cant': {
    label: 'Cant',
    dimension: 'angle',
    min: -STEEPEST_CANT,
    max: STEEPEST_CANT,
    help: 'Angle between each jet and the way of the vehicle; only its share along the way pushes.',
  },
  'thruster.arm': {
    ...room,
    label: 'Arm',
    help: 'Arm of a vectored pair about the centre of the vehicle; empty: no turning moment is computed.',
  },
  'thruster.vehicle.speed': {
    label: 'Vehicle speed',
    dimension: 'speed',
    min: 0,
    max: 100,
    optional: true,
    help: 'Speed that is held; empty: found where thrust and drag are equal.',
  },
  'thruster.vehicle.mass': {
    label: 'Mass',
    dimension: 'mass',
    above: 0,
    max: 1e9,
    optional: true,
    help: 'Mass of the vehicle with everything aboard.',
  },
  'thruster.vehicle.addedMass': {
    label: 'Added mass',
    dimension: 'mass',
    min: 0,
    max: 1e9,
    optional: true,
    help: 'Water that is sped up along with the vehicle.',
  },
  'thruster.vehicle.length': { ...room, label: 'Length', help: 'Length of the hull along its way.' },
  'thruster.vehicle.drag.dragArea': {
    label: 'Drag area',
    dimension: 'area',
    above: 0,
    max: 1e4,
    optional: true,
    help: 'Drag over the dynamic pressure: drag coefficient times its area.',
  },
  'thruster.vehicle.drag.wettedArea': {
    label: 'Wetted area',
    dimension: 'area',
    above: 0,
    max: 1e5,
    optional: true,
    help: 'Surface of the hull that water runs along.',
  },
  'thruster.vehicle.drag.formFactor': {
    label: 'Form factor',
    dimension: 'number',
    min: 0,
    max: 5,
    optional: true,
    help: 'Drag beyond that of a flat plate of the same wetted area, as a share of it.',
  },
  'thruster.actuator.maxForce': {
    label: 'Largest force',
    dimension: 'force',
    above: 0,
    max: 1e8,
    optional: true,
    help: 'Most the actuator can push on the plunger; empty: no limit.',
  },
  'thruster.actuator.maxSpeed': {
    label: 'Largest speed',
    dimension: 'speed',
    above: 0,
    max: 1000,
    optional: true,
    help: 'Fastest the plunger may move; empty: no limit.',
  },
  'thruster.actuator.maxAcceleration': {
    label: 'Largest acceleration',
    dimension: 'acceleration',
    above: 0,
    max: 1e6,
    optional: true,
    help: 'Hardest the plunger may be sped up; empty: no limit.',
  },
  'thruster.actuator.maxPower': {
    label: 'Largest power',
    dimension: 'power',
    above: 0,
    max: 1e9,
    optional: true,
    help: 'Highest electrical power at any time; empty: no limit.',
  },
  'thruster.actuator.maxTravel': {
    label: 'Largest travel',
    dimension: 'length',
    above: 0,
    max: 100,
    optional: true,
    help: 'Longest way of the plunger; empty: no limit.',
  },
  'thruster.actuator.efficiency': {
    label: 'Actuator efficiency',
    dimension: 'number',
    above: 0,
    max: 1,
    help: 'Work done on the water over the work put in.',
  },
  'thruster.actuator.ejectShare': {
    ...share,
    label: 'Eject share',
    help: 'Share of the period in which the water is pushed out, the lag of the valve included; the rest refills.',
  },
  'thruster.actuator.valveLag': {
    label: 'Valve lag',
    dimension: 'time',
    min: 0,
    max: 100,
    help: 'Dead time each time the valve turns.',
  },
  'thruster.intake.area': {
    label: 'Intake area',
    dimension: 'area',
    above: 0,
    max: 1000,
    optional: true,
    help: 'Opening through which the cavity refills; empty: the exit itself.',
  },
  'thruster.intake.recoveredShare': {
    label: 'Recovered share',
    dimension: 'number',
    min: 0,
    max: 1,
    help: 'Share of the momentum of the water taken in that is not lost.',
  },
  'thruster.intake.lossCoefficient': {
    label: 'Intake loss coefficient',
    dimension: 'number',
    min: 0,
    max: 100,
    help: 'Pressure loss of the intake over the dynamic pressure in its opening.',
  },
  'thruster.bay.length': { ...room, label: 'Bay length', help: 'Room along the axis for cavity and nozzle.' },
  'thruster.bay.diameter': { ...room, label: 'Bay diameter', help: 'Largest plunger or nozzle that fits.' },
  'thruster.energyStore': {
    label: 'Energy store',
    dimension: 'energy',
    above: 0,
    max: 1e13,
    optional: true,
    help: 'Energy on board for the thrusters; empty: no endurance is computed.',
  },
  'thruster.target.speed': {
    label: 'Speed wanted',
    dimension: 'speed',
    above: 0,
    max: 100,
    optional: true,
    help: 'Speed the vehicle must hold, of the first duty point.',
  },
  'thruster.target.thrust': {
    label: 'Thrust wanted',
    dimension: 'force',
    above: 0,
    max: 1e8,
    optional: true,
    help: 'Mean thrust while standing, of the first duty point.',
  },
  'thruster.search.diameter.0': { ...bore, label: 'Least exit diameter', help: 'Smallest exit the search tries.' },
  'thruster.search.diameter.1': { ...bore, label: 'Largest exit diameter', help: 'Largest exit the search tries.' },
  'thruster.search.strokeRatio.0': {
    ...strokes,
    label: 'Least stroke ratio',
    help: 'Shortest stroke over exit diameter the search tries.',
  },
  'thruster.search.strokeRatio.1': {
    ...strokes,
    label: 'Largest stroke ratio',
    help: 'Longest stroke over exit diameter the search tries.',
  },
  'thruster.search.frequency.0': { ...rate, label: 'Least frequency', help: 'Slowest pulsing the search tries.' },
  'thruster.search.frequency.1': { ...rate, label: 'Largest frequency', help: 'Fastest pulsing the search tries.' },
  'thruster.search.count.0': { ...many, label: 'Fewest thrusters', help: 'Fewest thrusters the search tries.' },
  'thruster.search.count.1': { ...many, label: 'Most thrusters', help: 'Most thrusters the search tries.' },
  'thruster.search.ejectShare.0': {
    ...share,
    label: 'Least eject share',
    optional: true,
    help: 'Shortest share of the period that ejects; empty: that of the actuator.',
  },
  'thruster.search.ejectShare.1': {
    ...share,
    label: 'Largest eject share',
    optional: true,
    help: 'Longest share of the period that ejects; empty: that of the actuator.',
  },
  'thruster.search.seed': {
    label: 'Seed of the search',
    dimension: 'number',
    min: 0,
    max: LARGEST_SEED,
    whole: true,
    help: 'Start of the random numbers: the same seed gives the same search.',
  },
  'thruster.manufacture.diameter': {
    ...scatter,
    label: 'Scatter of the diameter',
    help: 'Standard deviation of the exit diameter as made, over the diameter.',
  },
  'thruster.manufacture.stroke': {
    ...scatter,
    label: 'Scatter of the stroke',
    help: 'Standard deviation of the stroke as made, over the stroke.',
  },
  'thruster.manufacture.frequency': {
    ...scatter,
    label: 'Scatter of the frequency',
    help: 'Standard deviation of the pulsing frequency, over the frequency.',
  },
} as const satisfies Readonly<Record<string, FieldDefinition>>

export const THRUSTER_CHOICES = {
  'thruster.vehicle.drag.kind': { area: 'drag area', hull: 'wetted hull', table: 'table of drag' },
  'thruster.search.goal': { power: 'least power', thrust: 'most thrust' },
} as const
