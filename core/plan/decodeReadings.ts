/** The section `readings` of a plan: rows, force and piston logs, what is fitted, calibration and where it all came from. */
import type { ProgrammeRow } from '../pulse'
import {
  FIT_NAMES,
  forceLog,
  type FieldFiles,
  type FitName,
  type ReadingRow,
  type ReadingsCalibration,
  type ReadingsColumn,
  type ReadingsSection,
  type ReadingsSource,
} from '../tank'
import {
  decodeNumber,
  decodeOptionalNumber,
  decodeQuantity,
  decodeValue,
  insideLimits,
  isObject,
  refuse,
  type Problems,
} from './decodeFields'
import { decodeForce } from './decodeForceLog'
import { listOf, partOf } from './decodeParts'
import { READING_NUMBERS, type ReadingNumberKey } from './fieldsReadings'
import type { FieldDefinition } from './fieldTypes'
import type { Json, JsonObject } from './json'

/** Most rows of a trajectory; logs have limits of their own. */
export const LARGEST_READING_ROWS = 100_000
/** Most rows of a piston log. */
export const LARGEST_PISTON_ROWS = 100_000
/** After this many refusals in one list the rest is more of the same. */
const MOST_PROBLEMS = 20

const CALIBRATION: ReadingsCalibration = { timeOffset: 0, lengthOffset: 0, lengthScale: 1 }

/** Readings of which nothing is there yet. */
export const READINGS_DEFAULTS: ReadingsSection = {
  rows: [],
  force: forceLog([], []),
  piston: [],
  fit: ['circulation', 'startTime', 'startPosition'],
  calibration: CALIBRATION,
  sources: [],
  fields: null,
  standResonance: null,
}

export function decodeReadings(raw: JsonObject, problems: Problems): ReadingsSection {
  const calibration = partOf(raw, 'readings.calibration', problems) ?? {}
  const fields = partOf(raw, 'readings.fields', problems)
  return {
    rows: decodeReadingRows(raw['rows'], problems),
    force: decodeForce(raw['force'], problems),
    piston: decodePiston(raw['piston'], problems),
    fit: decodeFit(raw['fit'], problems),
    calibration: {
      timeOffset: decodeNumber(calibration, 'readings.calibration.timeOffset', CALIBRATION.timeOffset, problems),
      lengthOffset: decodeNumber(calibration, 'readings.calibration.lengthOffset', CALIBRATION.lengthOffset, problems),
      lengthScale: decodeNumber(calibration, 'readings.calibration.lengthScale', CALIBRATION.lengthScale, problems),
    },
    sources: listOf(raw['sources'], 'readings.sources', problems, decodeSource),
    fields: fields === null ? null : decodeFiles(fields, problems),
    standResonance: decodeOptionalNumber(raw, 'readings.standResonance', problems) ?? null,
  }
}

/** A list that is long enough to be read until too much of it is wrong. */
function longList<T>(
  raw: Json | undefined,
  field: string,
  most: number,
  problems: Problems,
  decode: (item: Json, field: string, problems: Problems) => T | null,
): T[] {
  if (Array.isArray(raw) && raw.length > most) {
    refuse(
      problems,
      field,
      raw.length,
      `at most ${most} rows`,
      `${field} must have at most ${most} rows, got ${raw.length}.`,
    )
    return []
  }
  const before = problems.length
  return listOf(raw, field, problems, (item, at) =>
    problems.length - before >= MOST_PROBLEMS ? null : decode(item, at, problems),
  )
}

function decodeReadingRows(raw: Json | undefined, problems: Problems): ReadingRow[] {
  return longList(raw, 'readings.rows', LARGEST_READING_ROWS, problems, (item, at) => {
    if (!isObject(item)) {
      refuse(problems, at, item, 'a row { run, time, x, radius, circulation }')
      return null
    }
    const before = problems.length
    const number = (key: ReadingNumberKey): number | null => readingNumber(item[key], key, at, problems)
    const time = number('time')
    const row = {
      run: decodeRun(item['run'], `${at}.run`, problems),
      x: number('x'),
      radius: number('radius'),
      circulation: number('circulation'),
      sigmaX: number('sigmaX'),
      sigmaRadius: number('sigmaRadius'),
      sigmaCirculation: number('sigmaCirculation'),
    }
    if (problems.length > before) return null
    if (time === null) {
      refuse(problems, `${at}.time`, null, 'given', `${at}.time must be given: when the row was read off.`)
      return null
    }
    if (row.x === null && row.radius === null && row.circulation === null) {
      refuse(problems, at, item, 'a row with x, radius or circulation')
      return null
    }
    return { ...row, time }
  })
}

/** The usual case, a plain number inside its limits, without a name being made for it. */
function readingNumber(raw: unknown, key: ReadingNumberKey, at: string, problems: Problems): number | null {
  if (raw === undefined || raw === null) return null
  const definition: FieldDefinition = READING_NUMBERS[key]
  if (typeof raw === 'number' && insideLimits(definition, raw)) return raw
  return decodeValue(raw, definition, `${at}.${key}`, problems)
}

/** A run's name; a number is its name. */
function decodeRun(raw: unknown, field: string, problems: Problems): string {
  if (raw === undefined || raw === null) return '1'
  if (typeof raw === 'string') return raw
  if (typeof raw === 'number' && Number.isFinite(raw)) return String(raw)
  refuse(problems, field, raw, 'the name of a run')
  return ''
}

/** Rows of the piston, all with a speed or all with a position, at rising times. */
function decodePiston(raw: Json | undefined, problems: Problems): ProgrammeRow[] {
  let last = Number.NEGATIVE_INFINITY
  let kind: 'speed' | 'position' | null = null
  return longList(raw, 'readings.piston', LARGEST_PISTON_ROWS, problems, (item, at) => {
    if (!isObject(item)) {
      refuse(problems, at, item, 'a row { time, speed } or { time, position } of the piston')
      return null
    }
    const own: 'speed' | 'position' =
      item['speed'] !== undefined || item['position'] === undefined ? 'speed' : 'position'
    kind ??= own
    const time = decodeQuantity(item['time'], `${at}.time`, 'time', problems)
    const value = decodeQuantity(item[own], `${at}.${own}`, own === 'speed' ? 'speed' : 'length', problems)
    if (time === null || value === null) return null
    if (own !== kind) {
      refuse(problems, at, item, `a row with a ${kind} like the first`)
      return null
    }
    if (!(time > last)) {
      refuse(
        problems,
        `${at}.time`,
        time,
        'later than the row before',
        `${at}.time must be later than the row before it, got ${time} s.`,
      )
      return null
    }
    last = time
    return own === 'speed' ? { time, speed: value } : { time, position: value }
  })
}

function isFitName(value: unknown): value is FitName {
  return FIT_NAMES.some((name) => name === value)
}

function decodeFit(raw: Json | undefined, problems: Problems): readonly FitName[] {
  if (raw === undefined || raw === null) return READINGS_DEFAULTS.fit
  const names = listOf(raw, 'readings.fit', problems, (item, at) => {
    if (isFitName(item)) return item
    refuse(problems, at, item, `one of ${FIT_NAMES.join(', ')}`)
    return null
  })
  return [...new Set(names)]
}

function textOf(raw: unknown, field: string, problems: Problems): string {
  if (raw === undefined || raw === null) return ''
  if (typeof raw === 'string') return raw
  refuse(problems, field, raw, 'a text')
  return ''
}

const KINDS = ['rows', 'force', 'piston', 'fields'] as const

function decodeSource(item: Json, at: string, problems: Problems): ReadingsSource | null {
  const kind = isObject(item) ? KINDS.find((one) => one === item['kind']) : undefined
  if (!isObject(item) || kind === undefined) {
    refuse(problems, at, item, `a file { name, hash, kind, columns }, kind one of ${KINDS.join(', ')}`)
    return null
  }
  return {
    name: textOf(item['name'], `${at}.name`, problems),
    hash: textOf(item['hash'], `${at}.hash`, problems),
    kind,
    columns: listOf(item['columns'], `${at}.columns`, problems, decodeColumn),
  }
}

function decodeColumn(item: Json, at: string, problems: Problems): ReadingsColumn | null {
  if (!isObject(item)) {
    refuse(problems, at, item, 'a column { heading, role, unit }')
    return null
  }
  const role = item['role']
  return {
    heading: textOf(item['heading'], `${at}.heading`, problems),
    role: role === undefined || role === null ? null : textOf(role, `${at}.role`, problems),
    unit: textOf(item['unit'], `${at}.unit`, problems),
  }
}

function decodeFiles(raw: JsonObject, problems: Problems): FieldFiles {
  const frames = listOf(raw['frames'], 'readings.fields.frames', problems, (item, at) => {
    if (!isObject(item)) {
      refuse(problems, at, item, 'a frame { name, time }')
      return null
    }
    const time = decodeQuantity(item['time'], `${at}.time`, 'time', problems)
    return time === null ? null : { name: textOf(item['name'], `${at}.name`, problems), time }
  })
  return { frames, hash: textOf(raw['hash'], 'readings.fields.hash', problems) }
}
