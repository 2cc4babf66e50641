/**
 * Everything the readings of a plan say: fits, force, fields, and how they stand to the prediction.
 */
import { at } from '../../base'
import type { WakeAgeing } from '../../coaxial'
import { formatQuantity } from '../../quantity'
import { computePulse, type PulseInput, type PulseResult } from '../../pulse'
import type { WaterInput } from '../../water'
import type { TankWalls } from '../walls'
import type { FieldResult, MeasuredValue } from './fieldTypes'
import type { FittedValue, ReadingResidual, RingFit } from './fitTypes'
import { analyseForce, type ForceResult } from './forceAnalysis'
import type { HeldParameter } from './identify'
import { ringAt, type RingStart } from './pathModel'
import { programmeOfLog, type AsRunProgramme } from './pistonLog'
import {
  COMPARED,
  meanSpeed,
  predictionOf,
  type ComparedQuantity,
  type PredictedRing,
  type Prediction,
  type PredictionInput,
} from './predicted'
import { fitRepeats, type RepeatValue, type Repeats, type RunFit } from './repeats'
import { sensitivitiesOf, type Sensitivity } from './sensitivities'
import { student95 } from './student'
import { calibrated, forceLog, type FitName, type ReadingRow, type ReadingsSection } from './types'
import { verdictOf, type ComparedValue, type Verdict } from './verdict'

export interface ReadingsInput {
  readonly section: ReadingsSection
  readonly pulse: PulseInput
  /** Of `pulse`, where it is at hand; not read where a piston log says what was really done. */
  readonly computed?: PulseResult
  /** As the wake has it; auto: by ring Reynolds number. */
  readonly ageing: 'auto' | WakeAgeing
  /** null: far from all walls. */
  readonly walls: TankWalls | null
  /** Of the plan; null: the temperature explains nothing. */
  readonly water: WaterInput | null
  /** From pulse to pulse [s] and their number, of the train; null: one pulse. */
  readonly train: { readonly period: number; readonly pulses: number } | null
  /** Mean thrust as the thruster computes it [N]; null: the impulse of a pulse over the period. */
  readonly meanThrust: number | null
  /** Share of the piston's displacement that leaks past it. */
  readonly leak: number
  /** What the velocity fields gave; null: none were read. */
  readonly fields: FieldResult | null
}

/** A ring's way by the model, for a plot; every list has one length. */
export interface ReadingsPath {
  readonly basis: PredictedRing['basis'] | 'fit'
  readonly ageing: WakeAgeing
  readonly time: readonly number[]
  readonly x: readonly number[]
  readonly radius: readonly number[]
  readonly circulation: readonly number[]
}

/** Field names of the summary first. */
export interface ReadingsResult {
  readonly status: 'done' | 'failed'
  readonly message: string
  readonly fit: Readonly<Partial<Record<FitName, FittedValue>>>
  /** Of what was fitted, in the order of `fitted`. */
  readonly correlation: readonly (readonly number[])[]
  /** Of the places [m]; null where nothing was fitted. */
  readonly residualRms: number | null
  /** Rows in the fit. */
  readonly rows: number
  readonly perRun: readonly RunFit[]
  readonly force: ForceResult | null
  readonly fitted: readonly FitName[]
  readonly held: readonly HeldParameter[]
  readonly repeats: Readonly<Partial<Record<FitName, RepeatValue>>>
  readonly residuals: readonly ReadingResidual[]
  /** The pooled fit under each law that may hold; the first is `fit`. Empty without rows. */
  readonly laws: readonly RingFit[]
  readonly ring: RingStart | null
  /** Rows with the calibration in, as they were fitted. */
  readonly calibrated: readonly ReadingRow[]
  readonly fields: FieldResult | null
  /** null: no piston log. */
  readonly asRun: AsRunProgramme | null
  /** Of the pulse as planned, or as run where the log could be read. */
  readonly prediction: Prediction
  readonly paths: readonly ReadingsPath[]
  readonly sensitivities: readonly Sensitivity[]
  readonly verdicts: readonly Verdict[]
  readonly notes: readonly string[]
}

/** Points of a path. */
const PATH_POINTS = 200
const OPEN: TankWalls = {
  kind: 'open',
  bore: null,
  side: null,
  surface: null,
  floor: null,
  end: null,
  section: null,
  notes: [],
}

/**
 * Compare.
 *
 * @returns status 'failed' with what could still be told where there are rows and nothing could be fitted to them
 * @throws {DomainError} with the plan path of the first value that breaks its limit
 */
export function compareReadings(input: ReadingsInput): ReadingsResult {
  const { section } = input
  const notes: string[] = []
  const rows = calibrated(section.rows, section.calibration)
  const asRun = section.piston.length === 0 ? null : asRunOf(input, notes)
  const planned = predictionInput(input, rows, asRun)
  const { prediction, rings } = predictionOf(planned)
  const { computed } = planned
  const fits = fitsOf(rows, section, rings, computed.duration, notes)
  const first = fits[0] ?? null
  const force = forceOf(input, computed, prediction)
  const measured = measuredValues(first, planned.seen, rings, force, input.fields)
  const sensitivities = sensitivitiesOf(planned, input.water)
  const verdicts = COMPARED.flatMap((quantity): Verdict[] => {
    const [value, band] = [measured[quantity], prediction[quantity]]
    return value === undefined || band === undefined ? [] : [verdictOf(quantity, value, band, sensitivities)]
  })
  const pooled = first?.pooled ?? null
  return {
    status: pooled?.status ?? 'done',
    message: pooled?.message ?? 'Done.',
    fit: pooled?.fit ?? {},
    correlation: pooled?.correlation ?? [],
    residualRms: pooled?.residualRms ?? null,
    rows: pooled?.rows ?? 0,
    perRun: first?.perRun ?? [],
    force,
    fitted: pooled?.fitted ?? [],
    held: pooled?.held ?? [],
    repeats: first?.repeats ?? {},
    residuals: pooled?.residuals ?? [],
    laws: fits.map((one) => one.pooled),
    ring: pooled?.ring ?? null,
    calibrated: rows,
    fields: input.fields,
    asRun,
    prediction,
    paths: pathsOf(rings, pooled, timeSpan(rows)),
    sensitivities,
    verdicts,
    notes: [
      ...notes,
      ...(pooled?.notes ?? []),
      ...(first?.notes ?? []),
      ...(force?.notes ?? []),
      ...(input.fields?.notes ?? []),
    ],
  }
}

function asRunOf({ section, pulse, leak }: ReadingsInput, notes: string[]): AsRunProgramme {
  const asRun = programmeOfLog(section.piston, pulse.nozzle, { leak })
  if (!asRun.ok) notes.push(`The piston log is not used: ${asRun.message}`)
  else {
    notes.push('The prediction is that of the piston as it really moved.', ...asRun.notes)
    if (pulse.jet !== null)
      notes.push('The computed jet is that of the planned programme, not of the piston as it really moved.')
  }
  return asRun
}

function predictionInput(
  input: ReadingsInput,
  rows: readonly ReadingRow[],
  asRun: AsRunProgramme | null,
): PredictionInput & { readonly computed: PulseResult } {
  const changed = asRun?.ok === true
  const pulse = changed ? { ...input.pulse, programme: asRun.programme } : input.pulse
  const computed = (changed ? undefined : input.computed) ?? computePulse(pulse)
  return {
    pulse,
    computed,
    ageing: input.ageing,
    walls: input.walls ?? OPEN,
    seen: timeSpan(rows.filter(({ time }) => time >= computed.duration)),
    period: input.train?.period ?? null,
    // A thrust computed for the plan does not hold for another programme.
    meanForce: changed ? null : input.meanThrust,
  }
}

/** First and last time of rows; null for none. */
function timeSpan(rows: readonly ReadingRow[]): readonly [number, number] | null {
  const times = rows.map(({ time }) => time)
  return times.length === 0 ? null : [times.reduce((a, b) => Math.min(a, b)), times.reduce((a, b) => Math.max(a, b))]
}

/** Fits under each law of the adopted ring; none without rows or without a ring. */
function fitsOf(
  rows: readonly ReadingRow[],
  { fit }: ReadingsSection,
  rings: readonly PredictedRing[],
  formedAt: number,
  notes: string[],
): readonly Repeats[] {
  if (rows.length === 0) return []
  const adopted = rings.filter(({ basis }) => basis === at(rings, 0).basis)
  if (adopted.length === 0) {
    notes.push('The pulse makes no ring: there is nothing to fit the readings to.')
    return []
  }
  if (adopted.length > 1)
    notes.push('The ring Reynolds number leaves laminar and turbulent ageing open: the fit is under the laminar law.')
  const fits = adopted.map(({ start, around }) => fitRepeats({ rows, names: fit, start, around, formedAt }))
  for (const { pooled } of fits.slice(1)) notes.push(otherLaw(pooled))
  return fits
}

function otherLaw({ ageing, status, message, fit, ring, residualRms }: RingFit): string {
  if (status === 'failed') return `Under the ${ageing} law nothing is fitted: ${message}`
  const error = fit.circulation?.standardError ?? null
  const told = error === null ? 'held at' : 'fitted as'
  const circulation = formatQuantity(ring.circulation, 'cm²/s', 3)
  const also = error === null ? '' : ` (standard error ${formatQuantity(error, 'cm²/s', 2)})`
  const rms = residualRms === null ? '' : `, and the places lie ${formatQuantity(residualRms, 'mm', 3)} RMS off it`
  return `Under the ${ageing} law the circulation is ${told} ${circulation}${also}${rms}.`
}

function forceOf(input: ReadingsInput, computed: PulseResult, prediction: Prediction): ForceResult | null {
  const { force, calibration, standResonance } = input.section
  if (force.time.length === 0) return null
  const { timeOffset } = calibration
  const shifted = timeOffset === 0 ? force.time : force.time.map((time) => time + timeOffset)
  return analyseForce({
    log: timeOffset === 0 ? force : forceLog(shifted, force.force),
    period: input.train?.period ?? null,
    pulses: input.train?.pulses ?? 1,
    duration: computed.duration,
    standResonance,
    predictedMean: prediction.meanForce?.value ?? null,
  })
}

/** What was measured of each quantity: fields before the fit where both tell it, since they need no law of the ring's way. */
function measuredValues(
  fits: Repeats | null,
  seen: readonly [number, number] | null,
  rings: readonly PredictedRing[],
  force: ForceResult | null,
  fields: FieldResult | null,
): Partial<Record<ComparedQuantity, ComparedValue>> {
  const found: Partial<Record<ComparedQuantity, ComparedValue>> = {}
  const pooled = fits?.pooled
  if (pooled?.status === 'done') {
    const { fit, intervalFactor } = pooled
    if (fit.circulation !== undefined) found.circulation = { ...fit.circulation, intervalFactor }
    if (fit.radius !== undefined) found.radius = { ...fit.radius, intervalFactor }
    const [ring] = rings
    if (ring !== undefined && seen !== null && seen[1] > seen[0] && fit.circulation !== undefined) {
      const value = meanSpeed({ start: pooled.ring, around: ring.around }, seen)
      // Two readings of the residual's scatter at the ends bound it from above.
      const standardError = pooled.residualRms === null ? null : (Math.SQRT2 * pooled.residualRms) / (seen[1] - seen[0])
      found.speed = { value, standardError, intervalFactor }
    }
  }
  if (fields !== null) {
    if (fields.ring !== null) {
      // The mean of few frames scatters as Student's distribution; one frame tells no scatter.
      const { frames } = fields.ring
      const told = ({ value, standardError }: MeasuredValue): ComparedValue =>
        frames < 2 ? { value, standardError: null } : { value, standardError, intervalFactor: student95(frames - 1) }
      found.circulation = told(fields.ring.circulation)
      found.radius = told(fields.ring.radius)
    }
    if (fields.formationNumber !== null) found.formationNumber = fields.formationNumber
  }
  if (force !== null && force.mean !== null) found.meanForce = { value: force.mean, standardError: force.errors.mean }
  return found
}

function pathsOf(
  rings: readonly PredictedRing[],
  fit: RingFit | null,
  seen: readonly [number, number] | null,
): ReadingsPath[] {
  if (seen === null) return []
  const ways: {
    readonly basis: ReadingsPath['basis']
    readonly start: RingStart
    readonly around: PredictedRing['around']
  }[] = [...rings]
  const [first] = rings
  if (fit?.status === 'done' && first !== undefined) ways.push({ basis: 'fit', start: fit.ring, around: first.around })
  return ways.map(({ basis, start, around }) => {
    const from = Math.min(seen[1], Math.max(seen[0], start.time))
    const time = Array.from({ length: PATH_POINTS + 1 }, (_, k) => from + ((seen[1] - from) * k) / PATH_POINTS)
    const states = time.map((when) => ringAt(start, around, when))
    return {
      basis,
      ageing: around.ageing,
      time,
      x: states.map(({ x }) => x),
      radius: states.map(({ radius }) => radius),
      circulation: states.map(({ circulation }) => circulation),
    }
  })
}
