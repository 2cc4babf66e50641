/** The sections `train` and `wake` of a plan: rings, nozzles, walls, stations and how they are marched. */
import { PLAIN_NOZZLE, type Vector, type WakeNozzle, type WakeRing, type WakeWall } from '../filament'
import type { Dimension } from '../quantity'
import type { CoreModel } from '../ring'
import {
  decodeChoice,
  decodeFlag,
  decodeNumber,
  decodeOptionalNumber,
  decodeQuantity,
  isObject,
  refuse,
  type Problems,
} from './decodeFields'
import { listOf } from './decodeParts'
import type { Json, JsonObject } from './json'
import type { TrainSection, WakeSection } from './types'
import { CORE_WORDS } from './wakeFields'

/** What a wake is marched with where the plan does not say. */
export const WAKE_DEFAULTS: WakeSection = {
  model: 'auto',
  law: 'thin',
  ageing: 'auto',
  rings: [],
  nozzles: [],
  start: 'matched',
  duration: 10,
  outputStep: 0.05,
  viscous: true,
  tolerance: 1e-8,
  wall: null,
  tube: null,
  stations: [],
}

export function decodeTrain(raw: JsonObject, problems: Problems): TrainSection {
  const pulses = decodeNumber(raw, 'train.pulses', 1, problems)
  const period = decodeNumber(raw, 'train.period', pulses > 1 ? undefined : 1, problems)
  return { pulses, period }
}

export function decodeWake(raw: JsonObject, problems: Problems): WakeSection {
  return {
    model: decodeChoice(raw, 'wake.model', WAKE_DEFAULTS.model, problems),
    law: decodeChoice(raw, 'wake.law', WAKE_DEFAULTS.law, problems),
    ageing: decodeChoice(raw, 'wake.ageing', WAKE_DEFAULTS.ageing, problems),
    rings: listOf(raw['rings'], 'wake.rings', problems, decodeRing),
    nozzles: listOf(raw['nozzles'], 'wake.nozzles', problems, decodeNozzleOfWake),
    start: decodeChoice(raw, 'wake.start', WAKE_DEFAULTS.start, problems),
    duration: decodeNumber(raw, 'wake.duration', WAKE_DEFAULTS.duration, problems),
    outputStep: decodeNumber(raw, 'wake.outputStep', WAKE_DEFAULTS.outputStep, problems),
    viscous: decodeFlag(raw, 'wake.viscous', WAKE_DEFAULTS.viscous, problems),
    tolerance: decodeNumber(raw, 'wake.tolerance', WAKE_DEFAULTS.tolerance, problems),
    wall: decodeWall(raw['wall'], problems),
    tube: decodeOptionalNumber(raw, 'wake.tube', problems) ?? null,
    stations: listOf(raw['stations'], 'wake.stations', problems, (item, field) =>
      decodeQuantity(item, field, 'length', problems),
    ),
  }
}

function decodeRing(item: Json, field: string, problems: Problems): WakeRing | null {
  if (!isObject(item)) {
    refuse(problems, field, item, 'a ring { circulation, radius, coreRadius, core, centre, direction }')
    return null
  }
  const needed = (key: string, dimension: Dimension): number | null =>
    decodeQuantity(item[key], `${field}.${key}`, dimension, problems)
  const beside = (key: string, dimension: Dimension, fallback: number): number | null =>
    item[key] === undefined || item[key] === null ? fallback : needed(key, dimension)
  const curve = decodeCurve(item['curve'], `${field}.curve`, problems)
  const circulation = needed('circulation', 'circulation')
  const radius = curve === null ? needed('radius', 'length') : beside('radius', 'length', 1)
  const coreRadius = needed('coreRadius', 'length')
  const core = decodeCore(item['core'], `${field}.core`, problems)
  const centre = decodeVector(item['centre'], `${field}.centre`, 'length', [0, 0, 0], problems)
  const direction = decodeVector(item['direction'], `${field}.direction`, 'number', [1, 0, 0], problems)
  const axisRatio = beside('axisRatio', 'number', 1)
  const startTime = beside('startTime', 'time', 0)
  if (circulation === null || radius === null || coreRadius === null || axisRatio === null || startTime === null)
    return null
  const ring = { circulation, radius, coreRadius, core, centre, direction, axisRatio, startTime }
  return curve === null ? ring : { ...ring, curve }
}

function decodeCore(raw: Json | undefined, field: string, problems: Problems): CoreModel {
  if (raw === undefined) return 'uniform'
  const words = Object.keys(CORE_WORDS)
  if (typeof raw === 'string' && words.includes(raw)) return raw as CoreModel
  refuse(problems, field, raw, `one of ${words.join(', ')}`)
  return 'uniform'
}

/** Nodes `[[x, y, z], ...]` of a closed curve, flat. */
function decodeCurve(raw: Json | undefined, field: string, problems: Problems): Float64Array | null {
  if (raw === undefined || raw === null) return null
  const points = listOf(raw, field, problems, (item, at) => decodeVector(item, at, 'length', null, problems))
  return Float64Array.from(points.flat())
}

function decodeNozzleOfWake(item: Json, field: string, problems: Problems): WakeNozzle | null {
  if (!isObject(item)) {
    refuse(problems, field, item, 'a nozzle { position, direction, delay }')
    return null
  }
  const delay = item['delay'] === undefined ? 0 : decodeQuantity(item['delay'], `${field}.delay`, 'time', problems)
  if (delay === null) return null
  return {
    position: decodeVector(item['position'], `${field}.position`, 'length', PLAIN_NOZZLE.position, problems),
    direction: decodeVector(item['direction'], `${field}.direction`, 'number', PLAIN_NOZZLE.direction, problems),
    delay,
  }
}

function decodeWall(raw: Json | undefined, problems: Problems): WakeWall | null {
  if (raw === undefined || raw === null) return null
  if (!isObject(raw)) {
    refuse(problems, 'wake.wall', raw, 'a wall { point, normal }')
    return null
  }
  return {
    point: decodeVector(raw['point'], 'wake.wall.point', 'length', null, problems),
    normal: decodeVector(raw['normal'], 'wake.wall.normal', 'number', [1, 0, 0], problems),
  }
}

/** Three numbers; `fallback` null: they must be given. */
function decodeVector(
  raw: Json | undefined,
  field: string,
  dimension: Dimension,
  fallback: Vector | null,
  problems: Problems,
): Vector {
  if (raw === undefined && fallback !== null) return fallback
  if (!Array.isArray(raw) || raw.length !== 3) {
    refuse(problems, field, raw, 'a list of three numbers')
    return [0, 0, 0]
  }
  const [x, y, z] = raw.map((item: Json, axis) => decodeQuantity(item, `${field}.${axis}`, dimension, problems) ?? 0)
  return [x ?? 0, y ?? 0, z ?? 0]
}
