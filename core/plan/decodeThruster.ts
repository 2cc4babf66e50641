/** The section `thruster` of a plan: vehicle, actuator, intake, duty points and what the search may try. */
import { formatFull, siUnit } from '../quantity'
import type {
  ActuatorInput,
  BayInput,
  DragInput,
  DutyPoint,
  IntakeInput,
  SearchInput,
  Span,
  ThrusterSection,
  VehicleInput,
} from '../thruster'
import {
  decodeChoice,
  decodeFlag,
  decodeNumber,
  decodeOptionalNumber,
  decodeValue,
  isObject,
  limitInWords,
  refuse,
  type Problems,
} from './decodeFields'
import { listOf, numbersAt, partOf } from './decodeParts'
import { fieldDefinition, type FieldPath } from './fields'
import type { Json, JsonObject } from './json'
import { quantityDefinition } from './planPaths'

/** An actuator without limits that ejects for half the period. */
const ACTUATOR: ActuatorInput = {
  maxForce: null,
  maxSpeed: null,
  maxAcceleration: null,
  maxPower: null,
  maxTravel: null,
  efficiency: 1,
  ejectShare: 0.5,
  valveLag: 0,
}

const INTAKE: IntakeInput = { area: null, recoveredShare: 0, lossCoefficient: 0.5 }

const BAY: BayInput = { length: null, diameter: null }

/** Scatter of careful workshop practice; a field to change by who knows the machine. */
const MANUFACTURE = { diameter: 0.005, stroke: 0.01, frequency: 0.01 }

/** The vehicle a plan starts from: its speed is found from a drag area. */
export const VEHICLE_DEFAULTS: VehicleInput = {
  speed: null,
  mass: null,
  addedMass: null,
  length: null,
  drag: { kind: 'area', dragArea: 0.01 },
}

/** The search a plan starts from. */
export const SEARCH_DEFAULTS: SearchInput = {
  diameter: [0.01, 0.1],
  strokeRatio: [1, 6],
  frequency: [0.2, 5],
  count: [1, 4],
  ejectShare: null,
  stock: null,
  seed: 1,
  goal: 'power',
}

/** One thruster on a bench. */
export const THRUSTER_DEFAULTS: ThrusterSection = {
  count: 1,
  spacing: null,
  inTurn: false,
  cant: 0,
  arm: null,
  vehicle: null,
  actuator: ACTUATOR,
  intake: INTAKE,
  bay: BAY,
  energyStore: null,
  target: [],
  search: null,
  manufacture: MANUFACTURE,
}

export function decodeThruster(raw: JsonObject, problems: Problems): ThrusterSection {
  const vehicle = partOf(raw, 'thruster.vehicle', problems)
  const search = partOf(raw, 'thruster.search', problems)
  const bay = partOf(raw, 'thruster.bay', problems) ?? {}
  const made = partOf(raw, 'thruster.manufacture', problems) ?? {}
  const target = decodeTarget(raw['target'], problems)
  if (target.some((point) => 'speed' in point) && !isGiven(vehicle?.['drag']))
    refuse(
      problems,
      'thruster.vehicle.drag',
      null,
      'given',
      'thruster.vehicle.drag must be given where thruster.target has a speed: holding it costs the drag at that speed.',
    )
  return {
    count: decodeNumber(raw, 'thruster.count', THRUSTER_DEFAULTS.count, problems),
    spacing: optional(raw, 'thruster.spacing', problems),
    inTurn: decodeFlag(raw, 'thruster.inTurn', THRUSTER_DEFAULTS.inTurn, problems),
    cant: decodeNumber(raw, 'thruster.cant', THRUSTER_DEFAULTS.cant, problems),
    arm: optional(raw, 'thruster.arm', problems),
    vehicle: vehicle === null ? null : decodeVehicle(vehicle, problems),
    actuator: decodeActuator(partOf(raw, 'thruster.actuator', problems) ?? {}, problems),
    intake: decodeIntake(partOf(raw, 'thruster.intake', problems) ?? {}, problems),
    bay: {
      length: optional(bay, 'thruster.bay.length', problems),
      diameter: optional(bay, 'thruster.bay.diameter', problems),
    },
    energyStore: optional(raw, 'thruster.energyStore', problems),
    target,
    search: search === null ? null : decodeSearch(search, problems),
    manufacture: {
      diameter: decodeNumber(made, 'thruster.manufacture.diameter', MANUFACTURE.diameter, problems),
      stroke: decodeNumber(made, 'thruster.manufacture.stroke', MANUFACTURE.stroke, problems),
      frequency: decodeNumber(made, 'thruster.manufacture.frequency', MANUFACTURE.frequency, problems),
    },
  }
}

function optional(section: JsonObject, path: FieldPath, problems: Problems): number | null {
  return decodeOptionalNumber(section, path, problems) ?? null
}

function decodeVehicle(raw: JsonObject, problems: Problems): VehicleInput {
  const drag = partOf(raw, 'thruster.vehicle.drag', problems)
  const vehicle: VehicleInput = {
    speed: optional(raw, 'thruster.vehicle.speed', problems),
    mass: optional(raw, 'thruster.vehicle.mass', problems),
    addedMass: optional(raw, 'thruster.vehicle.addedMass', problems),
    length: optional(raw, 'thruster.vehicle.length', problems),
    drag: drag === null ? null : decodeDrag(drag, problems),
  }
  if (vehicle.drag?.kind === 'hull' && !isGiven(raw['length']))
    refuse(
      problems,
      'thruster.vehicle.length',
      null,
      'given',
      'thruster.vehicle.length must be given where thruster.vehicle.drag is that of a hull: the friction line needs it.',
    )
  if (!isGiven(raw['speed']) && !isGiven(raw['drag']))
    refuse(
      problems,
      'thruster.vehicle.drag',
      null,
      'given',
      'thruster.vehicle.drag must be given where thruster.vehicle.speed is not: the speed is found where thrust and drag are equal.',
    )
  return vehicle
}

function isGiven(raw: Json | undefined): boolean {
  return raw !== undefined && raw !== null
}

function decodeDrag(raw: JsonObject, problems: Problems): DragInput {
  const kind = decodeChoice(raw, 'thruster.vehicle.drag.kind', undefined, problems)
  if (kind === 'table') return { kind, rows: decodeDragRows(raw['rows'], problems) }
  if (kind === 'area') return { kind, dragArea: needed(raw, 'thruster.vehicle.drag.dragArea', problems) }
  return {
    kind,
    wettedArea: needed(raw, 'thruster.vehicle.drag.wettedArea', problems),
    formFactor: decodeNumber(raw, 'thruster.vehicle.drag.formFactor', 0, problems),
  }
}

/** A number that its kind of drag needs, though another kind does without. */
function needed(raw: JsonObject, path: FieldPath, problems: Problems): number {
  const value = decodeOptionalNumber(raw, path, problems)
  if (typeof value === 'number') return value
  const { help } = fieldDefinition(path)
  if (!problems.some((problem) => problem.field === path))
    refuse(problems, path, value, limitInWords(fieldDefinition(path)), `${path} must be given: ${help}`)
  return Number.NaN
}

function decodeDragRows(raw: Json | undefined, problems: Problems): { speed: number; drag: number }[] {
  const field = 'thruster.vehicle.drag.rows'
  const before = problems.length
  const rows = listOf(raw, field, problems, (item, at) => {
    if (!isObject(item)) {
      refuse(problems, at, item, 'a row { speed, drag }')
      return null
    }
    const speed = decodeListed(item['speed'], `${at}.speed`, problems)
    const drag = decodeListed(item['drag'], `${at}.drag`, problems)
    return speed === null || drag === null ? null : { speed, drag }
  })
  if (problems.length > before) return rows
  if (rows.length < 2)
    refuse(problems, field, rows.length, 'at least 2 rows', `${field} must have at least 2 rows, got ${rows.length}.`)
  rows.forEach((row, index) => {
    const last = rows[index - 1]
    if (last !== undefined && row.speed <= last.speed)
      refuse(problems, `${field}.${index}.speed`, row.speed, `above ${last.speed} m/s, the speed of the row before`)
  })
  return rows
}

/** One number of a list, by its path; a missing one is refused. */
function decodeListed(raw: Json | undefined, path: string, problems: Problems): number | null {
  const definition = quantityDefinition(path)
  if (definition === null) throw new RangeError(`no quantity is known at ${path}`)
  if (raw === undefined || raw === null) {
    refuse(problems, path, raw, limitInWords(definition), `${path} must be given: ${definition.help}`)
    return null
  }
  return decodeValue(raw, definition, path, problems)
}

function decodeActuator(raw: JsonObject, problems: Problems): ActuatorInput {
  return {
    maxForce: optional(raw, 'thruster.actuator.maxForce', problems),
    maxSpeed: optional(raw, 'thruster.actuator.maxSpeed', problems),
    maxAcceleration: optional(raw, 'thruster.actuator.maxAcceleration', problems),
    maxPower: optional(raw, 'thruster.actuator.maxPower', problems),
    maxTravel: optional(raw, 'thruster.actuator.maxTravel', problems),
    efficiency: decodeNumber(raw, 'thruster.actuator.efficiency', ACTUATOR.efficiency, problems),
    ejectShare: decodeNumber(raw, 'thruster.actuator.ejectShare', ACTUATOR.ejectShare, problems),
    valveLag: decodeNumber(raw, 'thruster.actuator.valveLag', ACTUATOR.valveLag, problems),
  }
}

function decodeIntake(raw: JsonObject, problems: Problems): IntakeInput {
  return {
    area: optional(raw, 'thruster.intake.area', problems),
    recoveredShare: decodeNumber(raw, 'thruster.intake.recoveredShare', INTAKE.recoveredShare, problems),
    lossCoefficient: decodeNumber(raw, 'thruster.intake.lossCoefficient', INTAKE.lossCoefficient, problems),
  }
}

/** One duty point, or a list of them; without shares they count alike. */
function decodeTarget(raw: Json | undefined, problems: Problems): DutyPoint[] {
  if (raw === undefined || raw === null) return []
  if (isObject(raw)) {
    const point = decodeDutyPoint(raw, 'thruster.target', 1, problems)
    return point === null ? [] : [point]
  }
  if (!Array.isArray(raw)) {
    refuse(problems, 'thruster.target', raw, 'a duty point { speed } or { thrust }, or a list of them')
    return []
  }
  const alike = 1 / raw.length
  return listOf(raw, 'thruster.target', problems, (item, at) => {
    if (isObject(item)) return decodeDutyPoint(item, at, alike, problems)
    refuse(problems, at, item, 'a duty point { speed } or { thrust }')
    return null
  })
}

function decodeDutyPoint(raw: JsonObject, field: string, alike: number, problems: Problems): DutyPoint | null {
  const bySpeed = isGiven(raw['speed'])
  const byThrust = isGiven(raw['thrust'])
  if (bySpeed === byThrust) {
    const why = bySpeed ? 'both' : 'neither'
    refuse(
      problems,
      field,
      raw,
      'a duty point { speed } or { thrust }',
      `${field} must give a speed or a thrust, one of the two; it gives ${why}.`,
    )
    return null
  }
  const listed = (key: string): string => (field === 'thruster.target' ? `${field}.0.${key}` : `${field}.${key}`)
  const value = decodeListed(raw[bySpeed ? 'speed' : 'thrust'], listed(bySpeed ? 'speed' : 'thrust'), problems)
  const share = isGiven(raw['share']) ? decodeListed(raw['share'], listed('share'), problems) : alike
  if (value === null || share === null) return null
  return bySpeed ? { speed: value, share } : { thrust: value, share }
}

function decodeSearch(raw: JsonObject, problems: Problems): SearchInput {
  const stock = partOf(raw, 'thruster.search.stock', problems)
  return {
    diameter: decodeSpan(raw['diameter'], 'thruster.search.diameter', problems) ?? SEARCH_DEFAULTS.diameter,
    strokeRatio: decodeSpan(raw['strokeRatio'], 'thruster.search.strokeRatio', problems) ?? SEARCH_DEFAULTS.strokeRatio,
    frequency: decodeSpan(raw['frequency'], 'thruster.search.frequency', problems) ?? SEARCH_DEFAULTS.frequency,
    count: decodeSpan(raw['count'], 'thruster.search.count', problems) ?? SEARCH_DEFAULTS.count,
    ejectShare: decodeSpan(raw['ejectShare'], 'thruster.search.ejectShare', problems),
    stock:
      stock === null
        ? null
        : {
            diameters: numbersAt(stock['diameters'], 'thruster.search.stock.diameters', problems),
            strokes: numbersAt(stock['strokes'], 'thruster.search.stock.strokes', problems),
          },
    seed: decodeNumber(raw, 'thruster.search.seed', SEARCH_DEFAULTS.seed, problems),
    goal: decodeChoice(raw, 'thruster.search.goal', SEARCH_DEFAULTS.goal, problems),
  }
}

/** A low and a high end in that order; null where nothing is given or it is refused. */
function decodeSpan(raw: Json | undefined, path: string, problems: Problems): Span | null {
  if (raw === undefined || raw === null) return null
  if (!Array.isArray(raw) || raw.length !== 2) {
    refuse(problems, path, raw, 'a low and a high end, [low, high]')
    return null
  }
  const [low = null, high = null] = raw.map((item: Json, end) => decodeListed(item, `${path}.${end}`, problems))
  if (low === null || high === null) return null
  if (low > high) {
    const unit = siUnit(quantityDefinition(`${path}.0`)?.dimension ?? 'number')
    const [first, second] = [formatFull(low, unit), formatFull(high, unit)]
    refuse(problems, path, raw, 'from low to high', `${path} must run from low to high, got ${first} before ${second}.`)
  }
  return [low, high]
}
