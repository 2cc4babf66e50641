/** The section `tankRun` of a plan: tank, camera, triggers, drive, practice and the matrix of runs. */
import {
  MOST_RUNS,
  type CameraInput,
  type DriveInput,
  type MatrixInput,
  type PracticeInput,
  type TankInput,
  type TankRunSection,
  type TankTarget,
} from '../tank'
import {
  decodeChoice,
  decodeFlag,
  decodeNumber,
  decodeOptionalNumber,
  isObject,
  refuse,
  type Problems,
} from './decodeFields'
import { listOf, numbersAt, partOf } from './decodeParts'
import { decodeLevels } from './decodeSweep'
import type { FieldPath } from './fields'
import type { Json, JsonObject } from './json'

const TANK: TankInput = { length: null, width: null, depth: null, bore: null }

/** A common camera; green light of a doubled neodymium laser. */
const CAMERA: CameraInput = {
  pixels: [1920, 1080],
  pixelPitch: null,
  scale: null,
  window: 32,
  maxFrameRate: null,
  aperture: null,
  refraction: true,
  bytesPerPixel: 1,
  wavelength: 532e-9,
  sheetThickness: null,
  standOff: null,
  waterPath: null,
  windowThickness: null,
  pairs: null,
}

const DRIVE: DriveInput = {
  maxTravel: null,
  maxSpeed: null,
  maxAcceleration: null,
  maxJerk: null,
  leak: 0,
  lag: 0,
}

/** Common practice: rests of minutes, walls 8 diameters away, a start within 0.1 formation times, 8 particles a window. */
const PRACTICE: PracticeInput = { settlingMinutes: 3, clearance: 8, impulsiveStart: 0.1, particlesPerWindow: 8 }

/** The matrix a plan starts from. */
export const MATRIX_DEFAULTS: MatrixInput = {
  fields: [],
  kind: 'grid',
  samples: null,
  repeats: 3,
  seed: 1,
  blocks: [],
  minutesPerRun: 6,
  minutesPerSetUp: 15,
}

/** A tank run of which nothing is told yet. */
export const TANK_RUN_DEFAULTS: TankRunSection = {
  tank: TANK,
  nozzleDepth: null,
  stations: [],
  controllerStep: 0.001,
  target: null,
  camera: CAMERA,
  trigger: { camera: 0, laser: 0 },
  drive: DRIVE,
  practice: PRACTICE,
  matrix: null,
}

export function decodeTankRun(raw: JsonObject, problems: Problems): TankRunSection {
  const trigger = partOf(raw, 'tankRun.trigger', problems) ?? {}
  const matrix = partOf(raw, 'tankRun.matrix', problems)
  const tank = decodeTank(partOf(raw, 'tankRun.tank', problems) ?? {}, problems)
  return {
    tank,
    nozzleDepth: decodeNozzleDepth(raw, tank, problems),
    stations: numbersAt(raw['stations'], 'tankRun.stations', problems),
    controllerStep: decodeNumber(raw, 'tankRun.controllerStep', TANK_RUN_DEFAULTS.controllerStep, problems),
    target: decodeTankTarget(partOf(raw, 'tankRun.target', problems), problems),
    camera: decodeCamera(partOf(raw, 'tankRun.camera', problems) ?? {}, problems),
    trigger: {
      camera: decodeNumber(trigger, 'tankRun.trigger.camera', 0, problems),
      laser: decodeNumber(trigger, 'tankRun.trigger.laser', 0, problems),
    },
    drive: decodeDrive(partOf(raw, 'tankRun.drive', problems) ?? {}, problems),
    practice: decodePractice(partOf(raw, 'tankRun.practice', problems) ?? {}, problems),
    matrix: matrix === null ? null : decodeMatrix(matrix, problems),
  }
}

function optional(section: JsonObject, path: FieldPath, problems: Problems): number | null {
  return decodeOptionalNumber(section, path, problems) ?? null
}

function decodeTank(raw: JsonObject, problems: Problems): TankInput {
  return {
    length: optional(raw, 'tankRun.tank.length', problems),
    width: optional(raw, 'tankRun.tank.width', problems),
    depth: optional(raw, 'tankRun.tank.depth', problems),
    bore: optional(raw, 'tankRun.tank.bore', problems),
  }
}

function decodeNozzleDepth(raw: JsonObject, { depth }: TankInput, problems: Problems): number | null {
  const nozzleDepth = optional(raw, 'tankRun.nozzleDepth', problems)
  if (nozzleDepth !== null && depth !== null && nozzleDepth >= depth)
    refuse(
      problems,
      'tankRun.nozzleDepth',
      nozzleDepth,
      `below ${depth} m`,
      `tankRun.nozzleDepth must be less than the depth of the water, tankRun.tank.depth ${depth} m, got ${nozzleDepth} m.`,
    )
  return nozzleDepth
}

/** `{ circulation }`, `{ reynolds }` or `{ speed, station }`. */
function decodeTankTarget(raw: JsonObject | null, problems: Problems): TankTarget | null {
  if (raw === null) return null
  const before = problems.length
  const circulation = optional(raw, 'tankRun.target.circulation', problems)
  const reynolds = optional(raw, 'tankRun.target.reynolds', problems)
  const speed = optional(raw, 'tankRun.target.speed', problems)
  const station = optional(raw, 'tankRun.target.station', problems)
  if (problems.length > before) return null
  const given = [circulation, reynolds, speed].filter((value) => value !== null)
  if (given.length === 1) {
    if (circulation !== null) return { kind: 'circulation', value: circulation }
    if (reynolds !== null) return { kind: 'reynolds', value: reynolds }
    if (speed !== null && station !== null) return { kind: 'speed', value: speed, station }
    refuse(
      problems,
      'tankRun.target.station',
      null,
      'given',
      'tankRun.target.station must be given where the target is a speed: a ring slows on its way.',
    )
    return null
  }
  refuse(
    problems,
    'tankRun.target',
    raw,
    '{ circulation }, { reynolds } or { speed, station }',
    `tankRun.target must give one of circulation, reynolds and speed; it gives ${given.length}.`,
  )
  return null
}

function decodeCamera(raw: JsonObject, problems: Problems): CameraInput {
  const pixels = decodePixels(raw['pixels'], problems)
  const window = decodeNumber(raw, 'tankRun.camera.window', CAMERA.window, problems)
  const least = Math.min(...pixels)
  if (window > least)
    refuse(
      problems,
      'tankRun.camera.window',
      window,
      `at most ${least} pixels`,
      `tankRun.camera.window must be at most the smaller side of a frame, ${least} pixels, got ${window}.`,
    )
  const refraction = decodeFlag(raw, 'tankRun.camera.refraction', CAMERA.refraction, problems)
  const standOff = optional(raw, 'tankRun.camera.standOff', problems)
  const waterPath = optional(raw, 'tankRun.camera.waterPath', problems)
  if (refraction && standOff === 0 && waterPath === 0)
    refuse(
      problems,
      'tankRun.camera.waterPath',
      waterPath,
      'above 0 m where tankRun.camera.standOff is 0 m',
      'tankRun.camera.waterPath and tankRun.camera.standOff must not both be 0 m: the lens would lie in the light sheet. Give one of them, or leave both empty.',
    )
  return {
    pixels,
    pixelPitch: optional(raw, 'tankRun.camera.pixelPitch', problems),
    scale: optional(raw, 'tankRun.camera.scale', problems),
    window,
    maxFrameRate: optional(raw, 'tankRun.camera.maxFrameRate', problems),
    aperture: optional(raw, 'tankRun.camera.aperture', problems),
    refraction,
    bytesPerPixel: decodeNumber(raw, 'tankRun.camera.bytesPerPixel', CAMERA.bytesPerPixel, problems),
    wavelength: decodeNumber(raw, 'tankRun.camera.wavelength', CAMERA.wavelength, problems),
    sheetThickness: optional(raw, 'tankRun.camera.sheetThickness', problems),
    standOff,
    waterPath,
    windowThickness: optional(raw, 'tankRun.camera.windowThickness', problems),
    pairs: optional(raw, 'tankRun.camera.pairs', problems),
  }
}

function decodePixels(raw: Json | undefined, problems: Problems): CameraInput['pixels'] {
  if (raw === undefined || raw === null) return CAMERA.pixels
  if (!Array.isArray(raw) || raw.length !== 2) {
    refuse(problems, 'tankRun.camera.pixels', raw, 'columns and rows, [columns, rows]')
    return CAMERA.pixels
  }
  const [columns, rows] = numbersAt(raw, 'tankRun.camera.pixels', problems)
  return columns === undefined || rows === undefined ? CAMERA.pixels : [columns, rows]
}

function decodeDrive(raw: JsonObject, problems: Problems): DriveInput {
  return {
    maxTravel: optional(raw, 'tankRun.drive.maxTravel', problems),
    maxSpeed: optional(raw, 'tankRun.drive.maxSpeed', problems),
    maxAcceleration: optional(raw, 'tankRun.drive.maxAcceleration', problems),
    maxJerk: optional(raw, 'tankRun.drive.maxJerk', problems),
    leak: decodeNumber(raw, 'tankRun.drive.leak', DRIVE.leak, problems),
    lag: decodeNumber(raw, 'tankRun.drive.lag', DRIVE.lag, problems),
  }
}

function decodePractice(raw: JsonObject, problems: Problems): PracticeInput {
  return {
    settlingMinutes: decodeNumber(raw, 'tankRun.practice.settlingMinutes', PRACTICE.settlingMinutes, problems),
    clearance: decodeNumber(raw, 'tankRun.practice.clearance', PRACTICE.clearance, problems),
    impulsiveStart: decodeNumber(raw, 'tankRun.practice.impulsiveStart', PRACTICE.impulsiveStart, problems),
    particlesPerWindow: decodeNumber(raw, 'tankRun.practice.particlesPerWindow', PRACTICE.particlesPerWindow, problems),
  }
}

function decodeMatrix(raw: JsonObject, problems: Problems): MatrixInput {
  const before = problems.length
  const matrix: MatrixInput = {
    fields: decodeLevels(raw['fields'], 'tankRun.matrix.fields', problems).map(({ path, values }) => ({
      path,
      values,
    })),
    kind: decodeChoice(raw, 'tankRun.matrix.kind', MATRIX_DEFAULTS.kind, problems),
    samples: optional(raw, 'tankRun.matrix.samples', problems),
    repeats: decodeNumber(raw, 'tankRun.matrix.repeats', MATRIX_DEFAULTS.repeats, problems),
    seed: decodeNumber(raw, 'tankRun.matrix.seed', MATRIX_DEFAULTS.seed, problems),
    blocks: decodeBlocks(raw, problems),
    minutesPerRun: decodeNumber(raw, 'tankRun.matrix.minutesPerRun', MATRIX_DEFAULTS.minutesPerRun, problems),
    minutesPerSetUp: decodeNumber(raw, 'tankRun.matrix.minutesPerSetUp', MATRIX_DEFAULTS.minutesPerSetUp, problems),
  }
  matrix.fields.forEach(({ values }, i) => refuseRepeated(values, `tankRun.matrix.fields.${i}.values`, problems))
  const combinations = rowsOf(matrix)
  const runs = matrix.repeats * combinations
  if (problems.length === before && runs > MOST_RUNS)
    refuse(
      problems,
      'tankRun.matrix.fields',
      runs,
      `at most ${MOST_RUNS} runs`,
      `tankRun.matrix.fields must come to at most ${MOST_RUNS} runs, got ${combinations} combinations x ${matrix.repeats} repeats = ${runs}.`,
    )
  return matrix
}

/** A level given twice would count its combinations twice without saying so. */
function refuseRepeated(values: readonly number[], field: string, problems: Problems): void {
  const again = values.findIndex((value, k) => values.indexOf(value) !== k)
  if (again < 0) return
  const at = `${field}.${again}`
  const value = values[again]
  refuse(problems, at, value, 'a level of its own', `${at} must be a level of its own, got ${value} again.`)
}

function rowsOf({ kind, fields, samples }: MatrixInput): number {
  if (kind === 'grid') return fields.reduce((rows, { values }) => rows * values.length, 1)
  return samples ?? Math.max(1, ...fields.map(({ values }) => values.length))
}

/** Fields that form blocks: each one of the matrix's own. */
function decodeBlocks(raw: JsonObject, problems: Problems): string[] {
  const fields: unknown[] = Array.isArray(raw['fields']) ? raw['fields'] : []
  const paths = fields.map((field) => (isObject(field) ? field['path'] : undefined))
  return listOf(raw['blocks'], 'tankRun.matrix.blocks', problems, (item, at) => {
    if (typeof item === 'string' && paths.includes(item)) return item
    refuse(problems, at, item, 'the path of a field of the matrix')
    return null
  })
}
