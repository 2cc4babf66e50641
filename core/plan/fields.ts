/**
 * Every number of the plan the user may type: what it is called, what it measures and what it must keep to.
 *
 * The one table behind the decoder's refusals, the window's fields and their help. Limits are the widest for which a formula
 * of the core is meant to answer; where a formula holds only in part of them, a caution says so.
 */
import { LARGEST_DELTA, LEAST_DELTA } from '../coaxial'
import { READINGS_FIELDS } from './fieldsReadings'
import { SPREAD_FIELDS, TANK_RUN_CHOICES, TANK_RUN_FIELDS } from './fieldsTankRun'
import { THRUSTER_CHOICES, THRUSTER_FIELDS } from './fieldsThruster'
import type { FieldDefinition } from './fieldTypes'

export const FIELDS = {
  'water.temperatureCelsius': {
    label: 'Temperature',
    dimension: 'temperature',
    min: 0,
    max: 40,
    help: 'Water temperature; density and viscosity follow from it.',
  },
  'water.salinity': {
    label: 'Salinity',
    dimension: 'salinity',
    min: 0,
    max: 42,
    help: 'Practical salinity of sea water, close to grams of salt per kilogram.',
  },
  'water.depth': {
    label: 'Depth',
    dimension: 'length',
    min: 0,
    max: 11000,
    help: 'Depth of the nozzle below the surface.',
  },
  'water.atmosphericPressure': {
    label: 'Air pressure',
    dimension: 'pressure',
    min: 30000,
    max: 110000,
    help: 'Pressure of the air on the surface.',
  },
  'water.density': {
    label: 'Density',
    dimension: 'density',
    min: 500,
    max: 2000,
    optional: true,
    help: 'Density of the given liquid.',
  },
  'water.kinematicViscosity': {
    label: 'Kinematic viscosity',
    dimension: 'kinematicViscosity',
    min: 1e-8,
    max: 1e-2,
    optional: true,
    help: 'Kinematic viscosity of the given liquid.',
  },
  'water.vapourPressure': {
    label: 'Vapour pressure',
    dimension: 'pressure',
    min: 0,
    max: 101325,
    optional: true,
    help: 'Vapour pressure of the given liquid, for cavitation.',
  },
  'nozzle.diameter': {
    label: 'Exit diameter',
    dimension: 'length',
    min: 1e-4,
    max: 10,
    help: 'Inner diameter at the exit; for an exit that is not round, of the circle of equal area.',
  },
  'nozzle.pistonDiameter': {
    label: 'Piston diameter',
    dimension: 'length',
    min: 1e-4,
    max: 20,
    help: 'Diameter of the piston or plunger that drives the water.',
  },
  'nozzle.axisRatio': {
    label: 'Axis ratio',
    dimension: 'number',
    min: 1,
    max: 10,
    help: 'Long over short axis of the exit, 1 for a round one.',
  },
  'nozzle.contraction': {
    label: 'Jet contraction',
    dimension: 'number',
    min: 0.3,
    max: 1,
    optional: true,
    help: 'Jet area over exit area of a sharp orifice; empty: from the area ratio.',
  },
  'nozzle.radialRatio': {
    label: 'Radial speed ratio',
    dimension: 'number',
    min: 0,
    max: 0.45,
    help: 'Radial over axial speed at the lip of a converging exit, 0 for a parallel jet.',
  },
  'nozzle.length': {
    label: 'Nozzle length',
    dimension: 'length',
    min: 0,
    max: 100,
    help: 'Length of the straight nozzle passage.',
  },
  'nozzle.lossCoefficient': {
    label: 'Loss coefficient',
    dimension: 'number',
    min: 0,
    max: 100,
    help: 'Pressure loss of the nozzle over the dynamic pressure at the exit.',
  },
  'programme.stroke': {
    label: 'Stroke',
    dimension: 'length',
    above: 0,
    max: 1000,
    help: 'Length of the slug pushed out of the exit, typed as a length or in exit diameters (3.2 D); the piston moves less by the ratio of the areas.',
  },
  'programme.peakSpeed': {
    label: 'Peak exit speed',
    dimension: 'speed',
    above: 0,
    max: 100,
    help: 'Highest mean speed at the exit.',
  },
  'programme.riseTime': {
    label: 'Rise time',
    dimension: 'time',
    min: 0,
    max: 1000,
    help: 'From rest to peak speed.',
  },
  'programme.fallTime': { label: 'Fall time', dimension: 'time', min: 0, max: 1000, help: 'From peak speed to rest.' },
  'ambient.axialFlow': {
    label: 'Flow past it',
    dimension: 'speed',
    min: -100,
    max: 100,
    help: 'Flow past the nozzle along the jet: positive with the jet, negative against it.',
  },
  'jet.delta': {
    label: 'Smoothing length',
    dimension: 'number',
    min: LEAST_DELTA,
    max: LARGEST_DELTA,
    optional: true,
    help: 'One smoothing length of the starting jet over the exit diameter; empty: the usual ones.',
  },
  'train.pulses': {
    label: 'Pulses',
    dimension: 'number',
    min: 1,
    max: 1000,
    whole: true,
    help: 'How many pulses follow one another.',
  },
  'train.period': {
    label: 'Period',
    dimension: 'time',
    above: 0,
    max: 100000,
    help: 'From the start of one pulse to the start of the next.',
  },
  'wake.duration': {
    label: 'Duration',
    dimension: 'time',
    above: 0,
    max: 100000,
    help: 'How long the rings are followed.',
  },
  'wake.outputStep': {
    label: 'Output step',
    dimension: 'time',
    above: 0,
    max: 10000,
    help: 'Time between the rows of the trajectories and the pictures.',
  },
  'wake.tolerance': {
    label: 'Tolerance',
    dimension: 'number',
    min: 1e-13,
    max: 1e-2,
    help: 'Error allowed in one step of the march, relative to the size of a ring.',
  },
  'wake.tube': {
    label: 'Tube radius',
    dimension: 'length',
    above: 0,
    max: 1000,
    optional: true,
    help: 'Radius of a round tube about the axis; empty: none.',
  },
  ...THRUSTER_FIELDS,
  ...TANK_RUN_FIELDS,
  ...READINGS_FIELDS,
  ...SPREAD_FIELDS,
} as const satisfies Readonly<Record<string, FieldDefinition>>

export type FieldPath = keyof typeof FIELDS

/** Definition of a field as the wide type. */
export function fieldDefinition(path: FieldPath): FieldDefinition {
  return FIELDS[path]
}

/** Choices of the plan that are not numbers, by path, with the words shown for them. */
export const CHOICES = {
  'water.kind': { fresh: 'fresh', sea: 'sea', given: 'given values' },
  'nozzle.shape': { tube: 'tube', converging: 'converging', orifice: 'sharp orifice' },
  'nozzle.exitProfile': { uniform: 'uniform', parabolic: 'parabolic' },
  'programme.shape': {
    rectangular: 'rectangular',
    trapezoid: 'trapezoid',
    'linear-ramp': 'linear ramp',
    'half-sine': 'half sine',
    'sine-squared': 'sine squared',
    table: 'from a file',
  },
  'models.overPressure': { off: 'slug only', 'quick-start': 'slug and quick start', computed: 'computed jet' },
  'models.formationNumber': {
    energyLimit: 'energy limit',
    carriedVolume: 'carried volume',
    speedMatch: 'speed match',
    published: 'published band',
    computed: 'computed jet',
  },
  'wake.model': { auto: 'by the rings', coaxial: 'rings on one axis', filament: 'rings in space' },
  'wake.start': { matched: 'matched ring', jet: 'computed jet' },
  'wake.law': { thin: 'thin core', regularised: 'regularised' },
  'wake.ageing': { auto: 'by Reynolds number', laminar: 'laminar', turbulent: 'turbulent' },
  ...THRUSTER_CHOICES,
  ...TANK_RUN_CHOICES,
} as const
export type ChoicePath = keyof typeof CHOICES
