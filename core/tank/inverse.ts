/**
 * Which stroke and peak speed give what is wanted of the ring: for each of a set of strokes the peak speed, found by a bracketed root
 * through the whole pulse, and for a speed at a station through the ring's march as well.
 */
import { requireRange } from '../base'
import type { WakeAgeing } from '../coaxial'
import { loadKernel, type Kernel } from '../kernel'
import { computePulse, withStroke, type ProgrammeInput, type PulseInput, type PulseResult } from '../pulse'
import { ageingLaws } from './arrivals'
import { driveVerdict } from './driveVerdict'
import { ringPath } from './ringPath'
import { risingRoot } from './risingRoot'
import type { DriveInput, TankOptions, TankTarget } from './types'
import { slowingTubes, type TankWalls } from './walls'

export interface InverseInput {
  readonly target: TankTarget
  readonly pulse: PulseInput
  readonly drive: DriveInput
  readonly controllerStep: number
  readonly ageing: 'auto' | WakeAgeing
  readonly walls: TankWalls
  /** Strokes tried [m]; absent: half to eight exit diameters, and the plan's own. */
  readonly strokes?: readonly number[]
}

/** A stroke and the peak speed that gives what is wanted; every value is null where there is none. */
export interface Solution {
  readonly stroke: number
  readonly strokeRatio: number
  /** Reached at the exit [m/s]. */
  readonly peakSpeed: number | null
  /** What the programme asks for it [m/s]: above the peak reached where a trapezoid is too short for its ramps. */
  readonly askedPeakSpeed: number | null
  readonly circulation: number | null
  /** Gamma / nu of the ring. */
  readonly reynolds: number | null
  /** Of the target's station; null for other targets [m/s]. */
  readonly speedAtStation: number | null
  /** Of the piston at the peak reached, before rounding, leak included [m/s], [m]. */
  readonly pistonSpeed: number | null
  readonly pistonTravel: number | null
  /** Law the ring ages by on its way to the station; null for other targets. */
  readonly ageing: WakeAgeing | null
  /** Whether the stroke ratio lies past the formation number the plan adopts, and that number; null where none is adopted. */
  readonly pinchedOff: boolean | null
  readonly formationNumber: number | null
  /** False where there is no solution, or the drive cannot make it: by the peak reached and by the profile that would run. */
  readonly ok: boolean
  readonly reason: string | null
}

/** Stroke ratios tried where none are given. */
const STROKE_RATIOS = Array.from({ length: 16 }, (_, i) => 0.5 * (i + 1))
/** Peak speeds looked at [m/s]: beyond them no tank runs. */
const SLOWEST = 1e-5
const FASTEST = 100
/** What counts as the target met. */
const MET = 1e-7
const MOST_STROKES = 200
/** Strokes closer than this, relative, are one. */
const ROUNDING = 1e-9

/** @throws {DomainError} on tankRun.target… and what pulse and drive refuse; solutions that cannot be are rows with a reason */
export async function solutionsFor(input: InverseInput, options: TankOptions = {}): Promise<readonly Solution[]> {
  requireTarget(input.target)
  const { diameter } = input.pulse.nozzle
  const own = computePulse(input.pulse)
  const strokes =
    input.strokes === undefined
      ? usualStrokes(diameter, own.stroke)
      : input.strokes.map((stroke) => ({ stroke, strokeRatio: tidy(stroke / diameter) }))
  requireRange('strokes.length', strokes.length, { min: 1, max: MOST_STROKES })
  const kernel = options.kernel ?? (await loadKernel())
  const rising = [...new Map(strokes.map((one) => [one.stroke, one])).values()].toSorted((a, b) => a.stroke - b.stroke)
  const rows: Solution[] = []
  const tubeFor = slowingTubes(input.walls)
  let guess = own.peakSpeed
  for (const [k, tried] of rising.entries()) {
    if (options.signal?.aborted === true) break
    await options.pause?.()
    const found = await allAtStroke({ ...input, tubeFor }, tried, guess, { ...options, kernel })
    guess = found[0]?.peakSpeed ?? guess
    rows.push(...found)
    options.onProgress?.({ share: (k + 1) / rising.length, what: 'strokes for the target' })
  }
  return rows
}

interface TriedStroke {
  readonly stroke: number
  readonly strokeRatio: number
}

/** The usual ratios as they are given, and the plan's own stroke where it is none of them but for rounding. */
function usualStrokes(diameter: number, own: number): readonly TriedStroke[] {
  const usual = STROKE_RATIOS.map((strokeRatio) => ({ stroke: tidy(strokeRatio * diameter), strokeRatio }))
  const known = usual.some(({ stroke }) => Math.abs(stroke - own) <= ROUNDING * own)
  return known ? usual : [...usual, { stroke: tidy(own), strokeRatio: tidy(own / diameter) }]
}

function requireTarget(target: TankTarget): void {
  const units = { circulation: 'm2/s', reynolds: '', speed: 'm/s' } as const
  requireRange(`tankRun.target.${target.kind}`, target.value, { above: 0, unit: units[target.kind] })
  if (target.kind === 'speed') requireRange('tankRun.target.station', target.station, { above: 0, unit: 'm' })
}

/** The same shape at another peak: ramps keep their times, a table is run through faster. */
export function withPeak(programme: ProgrammeInput, peakSpeed: number, from: number): ProgrammeInput {
  if (programme.shape !== 'table') return { ...programme, peakSpeed }
  const faster = peakSpeed / from
  const rows = programme.rows.map((row) =>
    'speed' in row
      ? { time: row.time / faster, speed: row.speed * faster }
      : { time: row.time / faster, position: row.position },
  )
  return { ...programme, peakSpeed, rows }
}

interface Search extends InverseInput {
  readonly tubeFor: (radius: number) => number | null
}

interface Forward {
  readonly value: number
  readonly pulse: PulseResult
}

/**
 * Every peak speed at a stroke. A laminar ring and a turbulent one slow differently, so a speed at a station may be met by one of each:
 * each law is searched by itself, and what its own Reynolds number contradicts is dropped.
 */
async function allAtStroke(
  input: Search,
  tried: TriedStroke,
  guess: number,
  options: TankOptions & { readonly kernel: Kernel },
): Promise<readonly Solution[]> {
  if (input.target.kind !== 'speed') return [await atStroke(input, null, tried, guess, options)]
  const laws = input.ageing === 'auto' ? (['laminar', 'turbulent'] as const) : ([input.ageing] as const)
  const found: Solution[] = []
  for (const law of laws) found.push(await atStroke(input, law, tried, guess, options))
  const [first] = found
  const met = found.filter(({ peakSpeed }) => peakSpeed !== null)
  if (first === undefined || met.length === 0) return found.slice(0, 1)
  const held = met.filter(({ ageing, reynolds }) => {
    if (input.ageing !== 'auto' || reynolds === null) return true
    return lawOf(reynolds * input.pulse.kinematicViscosity, input) === ageing
  })
  if (held.length > 0) return held
  return [
    {
      ...NOTHING,
      stroke: first.stroke,
      strokeRatio: first.strokeRatio,
      reason:
        'a laminar ring that comes to this speed would be turbulent by its Reynolds number, and a turbulent one laminar: no peak speed gives it',
    },
  ]
}

/** The law whose arrival is the value, for a ring of this circulation. */
function lawOf(circulation: number, { pulse, ageing }: InverseInput): WakeAgeing {
  return ageingLaws({ circulation }, pulse.kinematicViscosity, ageing)[0] ?? 'laminar'
}

const NOTHING = {
  peakSpeed: null,
  askedPeakSpeed: null,
  circulation: null,
  reynolds: null,
  speedAtStation: null,
  pistonSpeed: null,
  pistonTravel: null,
  ageing: null,
  pinchedOff: null,
  formationNumber: null,
  ok: false,
}

async function atStroke(
  input: Search,
  law: WakeAgeing | null,
  { stroke, strokeRatio }: TriedStroke,
  guess: number,
  options: TankOptions & { readonly kernel: Kernel },
): Promise<Solution> {
  const { target, pulse } = input
  const base = withStroke(pulse.programme, stroke)
  const planned = computePulse({ ...pulse, programme: base }).peakSpeed
  const programmeAt = (peakSpeed: number): ProgrammeInput =>
    withPeak(base, peakSpeed, pulse.programme.shape === 'table' ? planned : peakSpeed)
  let why: string | null = null
  const forward = async (peakSpeed: number): Promise<Forward | null> => {
    const made = computePulse({ ...pulse, programme: programmeAt(peakSpeed) })
    const value = await valueOf(input, law, made, options)
    if (typeof value === 'number') return { value, pulse: made }
    why = value.reason
    return null
  }
  // A short trapezoid never reaches the peak it is asked for: its value stands still from there on.
  const peakSpeed = await risingRoot(async (speed) => (await forward(speed))?.value ?? null, target.value, {
    guess,
    least: SLOWEST,
    most: FASTEST,
    tolerance: MET / 10,
  })
  const nothing = { ...NOTHING, stroke, strokeRatio }
  if (peakSpeed === null)
    return { ...nothing, reason: why ?? `no peak speed from ${SLOWEST} to ${FASTEST} m/s gives it at this stroke` }
  const met = await forward(peakSpeed)
  if (met === null || Math.abs(met.value / target.value - 1) > MET)
    return { ...nothing, reason: 'the value jumps past the target: no peak speed gives it exactly' }
  return { ...nothing, ...found(input, law, met, peakSpeed, programmeAt(peakSpeed)) }
}

/** What the target is about, or why there is none. */
async function valueOf(
  input: Search,
  law: WakeAgeing | null,
  made: PulseResult,
  options: TankOptions & { readonly kernel: Kernel },
): Promise<number | { readonly reason: string }> {
  const { target, pulse, walls } = input
  const { ring } = made
  if (ring === null) return { reason: 'the pulse makes no ring' }
  if (target.kind === 'circulation') return ring.circulation
  if (target.kind === 'reynolds') return ring.reynolds
  const { station } = target
  if (walls.end !== null && station > walls.end) return { reason: 'the station lies beyond the far wall' }
  const path = await ringPath(
    {
      ring,
      density: pulse.density,
      kinematicViscosity: pulse.kinematicViscosity,
      duration: made.duration,
      ageing: law ?? lawOf(ring.circulation, input),
      axialFlow: pulse.axialFlow,
      walls,
      tubeFor: input.tubeFor,
      stations: [station],
      reach: station,
    },
    options,
  )
  const passage = path.passages[0]
  if (passage !== undefined) return passage.speed
  return {
    reason:
      station <= path.birth.x
        ? `the ring is still forming at the station: it appears at ${Number(path.birth.x.toPrecision(3))} m`
        : `the ring does not come to the station: ${path.shortOf ?? 'it ends before'}`,
  }
}

function found(
  input: InverseInput,
  law: WakeAgeing | null,
  met: Forward,
  peakSpeed: number,
  programme: ProgrammeInput,
): Omit<Solution, 'stroke' | 'strokeRatio'> {
  const { ring, pinchedOff, formationNumber } = met.pulse
  const { drive, controllerStep, pulse } = input
  const verdict = driveVerdict({
    programme,
    nozzle: pulse.nozzle,
    drive,
    controllerStep,
    ...(ring === null ? {} : { circulation: ring.circulation }),
  })
  return {
    peakSpeed: tidy(met.pulse.peakSpeed),
    askedPeakSpeed: tidy(peakSpeed),
    circulation: ring?.circulation ?? null,
    reynolds: ring?.reynolds ?? null,
    speedAtStation: input.target.kind === 'speed' ? met.value : null,
    pistonSpeed: verdict.pistonSpeed,
    pistonTravel: verdict.pistonTravel,
    ageing: law,
    pinchedOff,
    formationNumber: formationNumber.adopted,
    ok: verdict.ok,
    reason: verdict.reason,
  }
}

/** Twelve digits: 0.075, not 0.07500000000000001. */
function tidy(value: number): number {
  return Number(value.toPrecision(12))
}
