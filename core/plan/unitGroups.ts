/**
 * Units as shown, in the window and in print. A group of quantities shares one choice: ramps are read in milliseconds where strokes
 * take seconds, and depths in metres beside diameters in millimetres. Choices are saved with the plan (`view.units`) under the
 * group's key; where there is none, a result far from one moves to a neighbouring unit.
 */
import { defaultUnit, fromBase, unitsOf, type Dimension } from '../quantity'
import type { FieldPath } from './fields'

interface UnitGroup {
  readonly label: string
  readonly dimension: Dimension
  /** Shown unless the user chose another; absent: the dimension's own. */
  readonly usual?: string
}

export const UNIT_GROUPS = {
  length: { label: 'Lengths of nozzle, stroke and ring', dimension: 'length' },
  depth: { label: 'Depth of water', dimension: 'length', usual: 'm' },
  time: { label: 'Duration of the stroke', dimension: 'time' },
  wakeTime: { label: 'Times of the wake', dimension: 'time', usual: 's' },
  rampTime: { label: 'Rise and fall times', dimension: 'time', usual: 'ms' },
  speed: { label: 'Exit speed and flow', dimension: 'speed' },
  ringSpeed: { label: 'Ring speed', dimension: 'speed', usual: 'mm/s' },
  circulation: { label: 'Circulation', dimension: 'circulation' },
  impulse: { label: 'Impulse', dimension: 'impulse' },
  energy: { label: 'Energy', dimension: 'energy' },
  volume: { label: 'Volume', dimension: 'volume' },
  corePressure: { label: 'Core pressure drop', dimension: 'pressure', usual: 'Pa' },
  pressure: { label: 'Air and vapour pressure', dimension: 'pressure' },
  temperature: { label: 'Temperature', dimension: 'temperature' },
  salinity: { label: 'Salinity', dimension: 'salinity' },
  density: { label: 'Density', dimension: 'density' },
  kinematicViscosity: { label: 'Kinematic viscosity', dimension: 'kinematicViscosity' },
  bodyLength: { label: 'Lengths of vehicle and tank', dimension: 'length', usual: 'm' },
  area: { label: 'Areas of openings', dimension: 'area' },
  hullArea: { label: 'Areas of the hull', dimension: 'area', usual: 'm²' },
  vehicleSpeed: { label: 'Vehicle speed', dimension: 'speed' },
  acceleration: { label: 'Acceleration', dimension: 'acceleration' },
  jerk: { label: 'Jerk', dimension: 'jerk' },
  force: { label: 'Force and thrust', dimension: 'force', usual: 'N' },
  power: { label: 'Power', dimension: 'power' },
  storedEnergy: { label: 'Energy on board', dimension: 'energy', usual: 'kJ' },
  mass: { label: 'Mass', dimension: 'mass' },
  frequency: { label: 'Frequency', dimension: 'frequency' },
  flowRate: { label: 'Flow', dimension: 'flowRate' },
  angle: { label: 'Angle', dimension: 'angle' },
  imageScale: { label: 'Image scale', dimension: 'imageScale' },
  number: { label: 'Pure numbers', dimension: 'number', usual: '' },
} as const satisfies Readonly<Record<string, UnitGroup>>

export type UnitKey = keyof typeof UNIT_GROUPS

/** Groups a user may choose a unit for. */
export const UNIT_KEYS: readonly UnitKey[] = [
  'length',
  'depth',
  'time',
  'rampTime',
  'wakeTime',
  'speed',
  'ringSpeed',
  'circulation',
  'impulse',
  'energy',
  'volume',
  'corePressure',
  'pressure',
  'temperature',
  'salinity',
  'density',
  'kinematicViscosity',
  'bodyLength',
  'area',
  'hullArea',
  'vehicleSpeed',
  'acceleration',
  'jerk',
  'force',
  'power',
  'storedEnergy',
  'mass',
  'frequency',
  'flowRate',
  'angle',
  'imageScale',
]

/** Shown unit of every group. */
export type Units = Readonly<Record<UnitKey, string>>

/** Fields whose group is not simply their dimension. */
const FIELD_GROUPS: Readonly<Record<string, UnitKey>> = {
  'water.depth': 'depth',
  'programme.riseTime': 'rampTime',
  'programme.fallTime': 'rampTime',
  'train.period': 'wakeTime',
  'wake.duration': 'wakeTime',
  'wake.outputStep': 'wakeTime',
  'thruster.vehicle.speed': 'vehicleSpeed',
  'thruster.vehicle.length': 'bodyLength',
  'thruster.vehicle.drag.dragArea': 'hullArea',
  'thruster.vehicle.drag.wettedArea': 'hullArea',
  'thruster.target.speed': 'vehicleSpeed',
  'thruster.energyStore': 'storedEnergy',
  'tankRun.tank.length': 'bodyLength',
  'tankRun.tank.width': 'bodyLength',
  'tankRun.tank.depth': 'bodyLength',
  'tankRun.tank.bore': 'bodyLength',
  'tankRun.nozzleDepth': 'bodyLength',
} satisfies Partial<Record<FieldPath, UnitKey>>

/** Group of a number of the plan. */
export function unitKeyOf(path: string, dimension: Dimension): UnitKey {
  return FIELD_GROUPS[path] ?? (isUnitKey(dimension) ? dimension : 'number')
}

export function isUnitKey(text: string): text is UnitKey {
  return text in UNIT_GROUPS
}

/** Units a result's group moves between, smallest first, where nobody chose one and the usual one fits badly. */
const SCALES: Partial<Record<UnitKey, readonly string[]>> = {
  time: ['µs', 'ms', 's'],
  ringSpeed: ['mm/s', 'm/s'],
  circulation: ['mm²/s', 'cm²/s', 'm²/s'],
  impulse: ['µN·s', 'mN·s', 'N·s'],
  energy: ['µJ', 'mJ', 'J', 'kJ'],
  corePressure: ['Pa', 'kPa', 'MPa'],
  force: ['µN', 'mN', 'N', 'kN'],
  power: ['µW', 'mW', 'W', 'kW'],
  storedEnergy: ['J', 'kJ', 'MJ'],
  flowRate: ['µL/s', 'mL/s', 'L/s', 'm³/s'],
  bodyLength: ['mm', 'm', 'km'],
}
/** The usual unit stands while its number is between these. */
const FITS = [0.1, 10000] as const

/** Sizes of the results at hand [base units], by group; what is absent keeps its usual unit. */
export type Magnitudes = Partial<Readonly<Record<UnitKey, number>>>

/** The unit of a group under the plan's choices; a choice that is no unit of its dimension is passed over. */
export function shownUnit(
  key: UnitKey,
  choices: Readonly<Record<string, string>>,
  magnitude: number | undefined = undefined,
): string {
  const group: UnitGroup = UNIT_GROUPS[key]
  const chosen = choices[key]
  if (chosen !== undefined && unitsOf(group.dimension).includes(chosen)) return chosen
  const usual = group.usual ?? defaultUnit(group.dimension)
  const scale = SCALES[key]
  if (scale === undefined || magnitude === undefined || magnitude === 0) return usual
  const inUsual = Math.abs(fromBase(magnitude, usual))
  if (inUsual >= FITS[0] && inUsual < FITS[1]) return usual
  return scale.findLast((unit) => Math.abs(fromBase(magnitude, unit)) >= 1) ?? scale[0] ?? usual
}

/** Every group's unit under the plan's choices and the sizes of its results. */
export function shownUnits(choices: Readonly<Record<string, string>>, magnitudes: Magnitudes = {}): Units {
  const unit = (key: UnitKey): string => shownUnit(key, choices, magnitudes[key])
  return {
    length: unit('length'),
    depth: unit('depth'),
    time: unit('time'),
    rampTime: unit('rampTime'),
    wakeTime: unit('wakeTime'),
    speed: unit('speed'),
    ringSpeed: unit('ringSpeed'),
    circulation: unit('circulation'),
    impulse: unit('impulse'),
    energy: unit('energy'),
    volume: unit('volume'),
    corePressure: unit('corePressure'),
    pressure: unit('pressure'),
    temperature: unit('temperature'),
    salinity: unit('salinity'),
    density: unit('density'),
    kinematicViscosity: unit('kinematicViscosity'),
    bodyLength: unit('bodyLength'),
    area: unit('area'),
    hullArea: unit('hullArea'),
    vehicleSpeed: unit('vehicleSpeed'),
    acceleration: unit('acceleration'),
    jerk: unit('jerk'),
    force: unit('force'),
    power: unit('power'),
    storedEnergy: unit('storedEnergy'),
    mass: unit('mass'),
    frequency: unit('frequency'),
    flowRate: unit('flowRate'),
    angle: unit('angle'),
    imageScale: unit('imageScale'),
    number: unit('number'),
  }
}
