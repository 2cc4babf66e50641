/**
 * The plan: one nozzle, its pulses, the water, and later its vehicle, tank run and readings. SI numbers.
 */
import type { Problem } from '../base'
import type { CoaxialLaw, WakeAgeing } from '../coaxial'
import type { WakeModel, WakeNozzle, WakeRing, WakeWall } from '../filament'
import type { FormationBasis, NozzleInput, OverPressureBasis, ProgrammeInput } from '../pulse'
import type { WaterInput } from '../water'

export const PLAN_FORMAT = 'ringwright-plan'
export const PLAN_VERSION = 1

export interface ModelsInput {
  readonly overPressure: OverPressureBasis
  readonly formationNumber: FormationBasis
}

export interface ViewInput {
  /** Shown unit by dimension, for instance `{ "length": "mm" }`. */
  readonly units: Readonly<Record<string, string>>
}

/** Pulses in a row. */
export interface TrainSection {
  readonly pulses: number
  /** From one pulse to the next [s]. */
  readonly period: number
}

/** What the rings do next: where they start, what stands around them, and how they are marched. */
export interface WakeSection {
  readonly model: WakeModel
  readonly law: CoaxialLaw
  /** `auto`: by ring Reynolds number, both laws where it does not say. */
  readonly ageing: WakeAgeing | 'auto'
  /** Explicit rings; when there are any they replace the train. */
  readonly rings: readonly WakeRing[]
  readonly nozzles: readonly WakeNozzle[]
  readonly duration: number
  readonly outputStep: number
  readonly viscous: boolean
  readonly tolerance: number
  readonly wall: WakeWall | null
  /** Radius of a round tube about the axis [m]. */
  readonly tube: number | null
  /** x of the stations [m]. */
  readonly stations: readonly number[]
}

/** Anything JSON can hold. */
export type Json = null | boolean | number | string | readonly Json[] | JsonObject
export interface JsonObject {
  readonly [key: string]: Json
}

/**
 * A decoded plan. Sections that later capabilities read (jet, thruster, tankRun, readings, sweep, spread, held) and keys this version does not know are kept as they came in `source` and written back on save.
 */
export interface Plan {
  readonly title: string
  readonly notes: string
  readonly water: WaterInput
  readonly nozzle: NozzleInput
  readonly programme: ProgrammeInput
  readonly ambient: { readonly axialFlow: number }
  readonly models: ModelsInput
  /** null: the plan has no such section. No train means one pulse. */
  readonly train: TrainSection | null
  readonly wake: WakeSection | null
  readonly view: ViewInput
  /** Sections a wake of explicit rings did without; what stands in for them is not computed with. */
  readonly absent: readonly ('nozzle' | 'programme')[]
  /** The document as it was read, migrated to this version: what is unknown here is saved from it. */
  readonly source: JsonObject
}

export type PlanReading =
  | { readonly ok: true; readonly plan: Plan; readonly migratedFrom: number | null }
  | { readonly ok: false; readonly problems: readonly Problem[] }

/** One caution that holds for a plan and its results. */
export interface Caution {
  readonly id: string
  /** model, machine, laboratory or vehicle: where it is shown. */
  readonly group: 'model' | 'machine' | 'laboratory' | 'vehicle'
  readonly text: string
  /** Where it comes from: a publication, or "common practice". */
  readonly source: string
}
