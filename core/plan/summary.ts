/**
 * Results as the contract's summary: the document that summary.json, sweeps and spread read their values from.
 */
import type { PulseResult } from '../pulse'
import type { SizingResult, ThrusterResult } from '../thruster'
import type { ReadingsResult, TankRunResult } from '../tank'
import type { WaterProperties } from '../water'
import { jetSummary, type JetOutcome } from './jetTables'
import { readingsSummary } from './readingsTables'
import { spreadRunSummary, spreadSummary } from './spreadTables'
import type { SpreadOutcome, SweepOutcome } from './variedTypes'
import type { Caution } from './types'
import { wakeSectionSummary, type WakeOutcome } from './wakeSummary'

export const SUMMARY_FORMAT = 'ringwright-summary'
export const SUMMARY_VERSION = 1

/** A thruster with the sizing beside it; null where none was made. */
export interface ThrusterOutcome {
  readonly result: ThrusterResult
  readonly sizing: SizingResult | null
}

/** Results by section; null where a section was not computed. */
export interface SummaryResults {
  readonly water: WaterProperties
  readonly pulse: PulseResult | null
  readonly jet: JetOutcome | null
  readonly wake: WakeOutcome | null
  readonly thruster: ThrusterOutcome | null
  readonly tankRun: TankRunResult | null
  readonly readings?: ReadingsResult | null
  readonly sweep: SweepOutcome | null
  readonly spread: SpreadOutcome | null
  readonly cautions: readonly Caution[]
}

export interface SummaryInput extends SummaryResults {
  readonly title: string
  readonly files: readonly string[]
  readonly program: { readonly name: string; readonly version: string }
  readonly inputHash: string
}

/** summary.json: two-space indent, SI, null where an estimate is absent or not finite; sections not computed are left out. */
export function summaryText(input: SummaryInput): string {
  const document = {
    format: SUMMARY_FORMAT,
    version: SUMMARY_VERSION,
    title: input.title,
    program: input.program,
    inputHash: input.inputHash,
    files: input.files,
    ...summaryDocument(input),
  }
  return `${JSON.stringify(document, null, 2)}\n`
}

/** The sections of the summary as one object; undefined where one was not computed. Dotted paths of results are read in it. */
export function summaryDocument(results: SummaryResults): Readonly<Record<string, unknown>> {
  const { water, pulse, jet, wake, thruster, tankRun, readings = null, sweep, spread, cautions } = results
  return {
    water: waterSummary(water),
    pulse: pulse === null ? undefined : pulseSummary(pulse),
    jet: jet === null ? undefined : jetSummary(jet),
    wake: wake === null ? undefined : wakeSectionSummary(wake),
    thruster: thruster === null ? undefined : thrusterSummary(thruster),
    tankRun: tankRun === null ? undefined : tankRunSummary(tankRun, cautions),
    readings: readings === null ? undefined : readingsSummary(readings),
    sweep: sweep === null ? undefined : { rows: sweep.total, fields: sweep.paths, results: sweep.results },
    spread: spread === null ? undefined : spreadSummary(spread),
    spreadRun: spread === null ? undefined : spreadRunSummary(spread),
    cautions,
  }
}

function waterSummary(water: WaterProperties): object {
  return {
    density: water.density,
    kinematicViscosity: water.kinematicViscosity,
    vapourPressure: water.vapourPressure ?? undefined,
    absolutePressure: water.absolutePressure,
    sources: water.sources,
    notes: water.notes,
  }
}

/** The pulse section: everything but the histories, which are pulse.csv. */
export function pulseSummary(pulse: PulseResult): object {
  const { history, ...rest } = pulse
  return { ...rest, samples: history.time.length }
}

/** The thruster section: no histories, no curves, and not the pulse again, which differs from `pulse` by the stream alone. */
export function thrusterSummary({ result, sizing }: ThrusterOutcome): object {
  const { startUp, ringImpulsePerWork, pulse } = result
  return {
    ...without(result, ['cycle', 'startUp', 'ringImpulsePerWork', 'pulse']),
    candidates: sizing?.candidates,
    front: sizing?.front,
    sizing: sizing === null ? undefined : sizingSummary(sizing),
    startUp: startUp === null ? null : without(startUp, ['history']),
    bestStrokeRatio: ringImpulsePerWork?.best ?? null,
    formationNumber: pulse.formationNumber.adopted,
    pinchedOff: pulse.pinchedOff,
  }
}

function sizingSummary({ status, message, goal, nearest, counters }: SizingResult): object {
  return { status, message, goal, nearest, counters }
}

/** The section of the tank run: no paths and no rows of a table of their own. */
function tankRunSummary(run: TankRunResult, cautions: readonly Caution[]): object {
  const { profile, matrix } = run
  return {
    ...without(run, ['path']),
    profile: { ...without(profile, ['time', 'position', 'speed', 'acceleration']), rows: profile.time.length },
    matrix: matrix === null ? null : { ...without(matrix, ['each']), runs: matrix.runs.length },
    cautions: cautions.filter(isOfTankRun),
  }
}

/** A part without some of its keys. */
function without<T extends object>(part: T, keys: readonly (keyof T & string)[]): object {
  const left: readonly string[] = keys
  return Object.fromEntries(Object.entries(part).filter(([key]) => !left.includes(key)))
}

/** Cautions about the run itself, the machine that moves and the laboratory around it. */
function isOfTankRun({ id, group }: Caution): boolean {
  return id.startsWith('tank-') || group === 'machine' || group === 'laboratory'
}
