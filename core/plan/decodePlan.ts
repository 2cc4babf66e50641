/**
 * An unknown JSON document becomes a plan, or a list of refusals: what, what was given, what must hold.
 */
import { DomainError, type Problem } from '../base'
import { compileProgramme, type NozzleInput, type ProgrammeInput, type ProgrammeRow } from '../pulse'
import type { WaterInput } from '../water'
import {
  decodeChoice,
  decodeNumber,
  decodeOptionalNumber,
  decodeQuantity,
  decodeText,
  describeValue,
  isObject,
  refuse,
  type Problems,
} from './decodeFields'
import { decodeJet } from './decodeJet'
import { decodeHeld, decodeSpread, decodeSweep } from './decodeSweep'
import { decodeReadings } from './decodeReadings'
import { decodeTankRun } from './decodeTankRun'
import { decodeThruster } from './decodeThruster'
import { decodeTrain, decodeWake } from './decodeWake'
import type { JsonObject } from './json'
import { refuseLostPaths } from './lostPaths'
import { migrate } from './migrations'
import { PLAN_FORMAT, PLAN_VERSION, type Plan, type PlanReading } from './types'

/** Largest plan read [characters]. */
export const LARGEST_PLAN = 50 * 1024 * 1024

/** Deepest nesting read; a plan needs six. */
const DEEPEST_NESTING = 64

/**
 * Read a plan from its text.
 *
 * @returns the plan, or every refusal with field, value and limit. Never throws for any text.
 */
export function readPlan(text: string): PlanReading {
  if (text.length > LARGEST_PLAN)
    return refusal(
      '',
      `${(text.length / 1048576).toFixed(1)} MB`,
      'at most 50 MB',
      'A plan file must be at most 50 MB.',
    )
  let document: unknown
  try {
    document = JSON.parse(text.replace(/^\uFEFF/, ''))
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error)
    return refusal(
      '',
      'text that is not JSON',
      'a JSON document',
      `This file is not a plan: it is not valid JSON (${why}).`,
    )
  }
  return decodePlan(document)
}

/** As readPlan, from parsed JSON. */
export function decodePlan(document: unknown): PlanReading {
  if (!isObject(document) || document['format'] !== PLAN_FORMAT) {
    const given = isObject(document) ? document['format'] : document
    return refusal(
      'format',
      describeValue(given),
      `"${PLAN_FORMAT}"`,
      `This file is not a plan: its format must be "${PLAN_FORMAT}", got ${describeValue(given)}.`,
    )
  }
  const version = document['version']
  if (typeof version !== 'number' || !Number.isInteger(version) || version < 1)
    return refusal(
      'version',
      describeValue(version),
      'a whole number from 1',
      `version must be a whole number from 1, got ${describeValue(version)}.`,
    )
  if (version > PLAN_VERSION)
    return refusal(
      'version',
      String(version),
      `at most ${PLAN_VERSION}`,
      `This plan was made by a newer version (${version}); this program reads up to ${PLAN_VERSION}.`,
    )
  if (nesting(document) > DEEPEST_NESTING)
    return refusal(
      '',
      'a document nested too deep',
      `at most ${DEEPEST_NESTING} levels`,
      `A plan must be nested at most ${DEEPEST_NESTING} levels deep.`,
    )
  const current = migrate(document, version)
  const problems: Problems = []
  const plan = decodeSections(current, problems)
  if (problems.length > 0) return { ok: false, problems }
  return { ok: true, plan, migratedFrom: version === PLAN_VERSION ? null : version }
}

function refusal(field: string, value: string, limit: string, message: string): PlanReading {
  const problem: Problem = { field, value, limit, message }
  return { ok: false, problems: [problem] }
}

function nesting(value: unknown): number {
  let deepest = 0
  const stack: { value: unknown; depth: number }[] = [{ value, depth: 1 }]
  for (let item = stack.pop(); item !== undefined && deepest <= DEEPEST_NESTING; item = stack.pop()) {
    if (typeof item.value !== 'object' || item.value === null) continue
    deepest = Math.max(deepest, item.depth)
    // Plain values nest no deeper; a long log of them would only fill the stack.
    for (const child of Object.values(item.value))
      if (typeof child === 'object') stack.push({ value: child, depth: item.depth + 1 })
  }
  return deepest
}

function decodeSections(document: JsonObject, problems: Problems): Plan {
  const wakeOfRings = hasExplicitRings(document)
  const water = section(document, 'water', problems, true)
  const nozzle = section(document, 'nozzle', problems, !wakeOfRings)
  const programme = section(document, 'programme', problems, !wakeOfRings)
  const ambient = section(document, 'ambient', problems, false) ?? {}
  const models = section(document, 'models', problems, false) ?? {}
  const jet = section(document, 'jet', problems, false)
  const train = section(document, 'train', problems, false)
  const wake = section(document, 'wake', problems, false)
  const thruster = section(document, 'thruster', problems, false)
  const tankRun = section(document, 'tankRun', problems, false)
  const readings = section(document, 'readings', problems, false)
  const sweep = section(document, 'sweep', problems, false)
  const spread = section(document, 'spread', problems, false)
  const plan: Plan = {
    title: decodeText(document, 'title', problems),
    revision: decodeText(document, 'revision', problems),
    notes: decodeText(document, 'notes', problems),
    water: water === null ? FRESH : decodeWater(water, problems),
    nozzle: nozzle === null ? ABSENT_NOZZLE : decodeNozzle(nozzle, problems),
    programme: programme === null ? ABSENT_PROGRAMME : decodeProgramme(programme, problems),
    ambient: { axialFlow: decodeNumber(ambient, 'ambient.axialFlow', 0, problems) },
    models: {
      overPressure: decodeChoice(models, 'models.overPressure', 'off', problems),
      formationNumber: decodeChoice(models, 'models.formationNumber', 'energyLimit', problems),
    },
    jet: jet === null ? null : decodeJet(jet, problems),
    train: train === null ? null : decodeTrain(train, problems),
    wake: wake === null ? null : decodeWake(wake, problems),
    thruster: thruster === null ? null : decodeThruster(thruster, problems),
    tankRun: tankRun === null ? null : decodeTankRun(tankRun, problems),
    readings: readings === null ? null : decodeReadings(readings, problems),
    sweep: sweep === null ? null : decodeSweep(sweep, problems),
    spread: spread === null ? null : decodeSpread(spread, problems),
    held: decodeHeld(document['held'], problems),
    view: { units: decodeUnits(document['view']) },
    absent: [
      ...(nozzle === null ? (['nozzle'] as const) : []),
      ...(programme === null ? (['programme'] as const) : []),
    ],
    source: document,
  }
  refuseLostPaths(plan, problems)
  return plan
}

/** Stand-ins for sections a wake of explicit rings does without; never computed with while `absent` names them. */
const FRESH: WaterInput = {
  kind: 'fresh',
  temperatureCelsius: 20,
  salinity: 35,
  depth: 0,
  atmosphericPressure: 101325,
  density: null,
  kinematicViscosity: null,
  vapourPressure: null,
}
const ABSENT_NOZZLE: NozzleInput = {
  shape: 'tube',
  diameter: 0.03,
  pistonDiameter: 0.03,
  axisRatio: 1,
  exitProfile: 'uniform',
  contraction: null,
  radialRatio: 0,
  length: 0,
  lossCoefficient: 0,
}
const ABSENT_PROGRAMME: ProgrammeInput = {
  shape: 'rectangular',
  stroke: 0.06,
  peakSpeed: 0.1,
  riseTime: 0,
  fallTime: 0,
  rows: [],
}

function section(document: JsonObject, key: string, problems: Problems, needed: boolean): JsonObject | null {
  const raw = document[key]
  if (isObject(raw)) return raw
  if (raw === undefined || raw === null) {
    if (needed) refuse(problems, key, raw, 'given', `A plan needs the section ${key}; this one has none.`)
    return null
  }
  refuse(problems, key, raw, 'an object of values')
  return null
}

function hasExplicitRings(document: JsonObject): boolean {
  const wake = document['wake']
  return isObject(wake) && Array.isArray(wake['rings']) && wake['rings'].length > 0
}

function decodeWater(raw: JsonObject, problems: Problems): WaterInput {
  const kind = decodeChoice(raw, 'water.kind', undefined, problems)
  const water: WaterInput = {
    kind,
    temperatureCelsius: decodeNumber(raw, 'water.temperatureCelsius', 20, problems),
    salinity: decodeNumber(raw, 'water.salinity', 35, problems),
    depth: decodeNumber(raw, 'water.depth', 0, problems),
    atmosphericPressure: decodeNumber(raw, 'water.atmosphericPressure', 101325, problems),
    density: decodeOptionalNumber(raw, 'water.density', problems) ?? null,
    kinematicViscosity: decodeOptionalNumber(raw, 'water.kinematicViscosity', problems) ?? null,
    vapourPressure: decodeOptionalNumber(raw, 'water.vapourPressure', problems) ?? null,
  }
  if (kind === 'given') {
    if (water.density === null && !problems.some((p) => p.field === 'water.density'))
      refuse(problems, 'water.density', null, 'given', 'water.density must be given where water.kind is "given".')
    if (water.kinematicViscosity === null && !problems.some((p) => p.field === 'water.kinematicViscosity'))
      refuse(
        problems,
        'water.kinematicViscosity',
        null,
        'given',
        'water.kinematicViscosity must be given where water.kind is "given".',
      )
  }
  return water
}

function decodeNozzle(raw: JsonObject, problems: Problems): NozzleInput {
  const shape = decodeChoice(raw, 'nozzle.shape', 'tube', problems)
  const diameter = decodeNumber(raw, 'nozzle.diameter', undefined, problems)
  const nozzle: NozzleInput = {
    shape,
    diameter,
    pistonDiameter: decodeNumber(raw, 'nozzle.pistonDiameter', diameter, problems),
    axisRatio: decodeNumber(raw, 'nozzle.axisRatio', 1, problems),
    exitProfile: decodeChoice(raw, 'nozzle.exitProfile', 'uniform', problems),
    contraction: decodeOptionalNumber(raw, 'nozzle.contraction', problems) ?? null,
    radialRatio: decodeNumber(raw, 'nozzle.radialRatio', 0, problems),
    length: decodeNumber(raw, 'nozzle.length', 0, problems),
    lossCoefficient: decodeNumber(raw, 'nozzle.lossCoefficient', 0, problems),
  }
  return nozzle
}

function decodeProgramme(raw: JsonObject, problems: Problems): ProgrammeInput {
  const shape = decodeChoice(raw, 'programme.shape', undefined, problems)
  const table = shape === 'table'
  const before = problems.length
  const programme: ProgrammeInput = {
    shape,
    stroke: decodeNumber(raw, 'programme.stroke', table ? ABSENT_PROGRAMME.stroke : undefined, problems),
    peakSpeed: decodeNumber(raw, 'programme.peakSpeed', table ? ABSENT_PROGRAMME.peakSpeed : undefined, problems),
    riseTime: decodeNumber(raw, 'programme.riseTime', 0, problems),
    fallTime: decodeNumber(raw, 'programme.fallTime', 0, problems),
    rows: decodeRows(raw['rows'], problems),
  }
  if (!table || problems.length > before) return programme
  try {
    const { stroke, peakSpeed } = compileProgramme(programme)
    return { ...programme, stroke, peakSpeed }
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    refuse(problems, error.field, describeValue(raw['rows']), 'a usable table', error.message)
    return programme
  }
}

function decodeRows(raw: unknown, problems: Problems): ProgrammeRow[] {
  if (raw === undefined || raw === null) return []
  if (!Array.isArray(raw)) {
    refuse(problems, 'programme.rows', raw, 'a list of rows { time, speed } or { time, position }')
    return []
  }
  const rows: ProgrammeRow[] = []
  for (const [index, row] of raw.entries()) {
    const decoded = decodeRow(row, `programme.rows.${index}`, problems)
    if (decoded === null) break
    rows.push(decoded)
  }
  return rows
}

function decodeRow(row: unknown, field: string, problems: Problems): ProgrammeRow | null {
  if (!isObject(row)) {
    refuse(problems, field, row, 'a row { time, speed } or { time, position }')
    return null
  }
  const time = decodeQuantity(row['time'], `${field}.time`, 'time', problems)
  const bySpeed = row['speed'] !== undefined || row['position'] === undefined
  const value = bySpeed
    ? decodeQuantity(row['speed'], `${field}.speed`, 'speed', problems)
    : decodeQuantity(row['position'], `${field}.position`, 'length', problems)
  if (time === null || value === null) return null
  return bySpeed ? { time, speed: value } : { time, position: value }
}

/** Shown units: texts only; anything else is not a unit and falls back to the default. */
function decodeUnits(view: unknown): Record<string, string> {
  if (!isObject(view) || !isObject(view['units'])) return {}
  const entries = Object.entries(view['units']).filter(
    (entry): entry is [string, string] => typeof entry[1] === 'string',
  )
  return Object.fromEntries(entries)
}
