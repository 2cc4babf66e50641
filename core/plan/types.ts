/**
 * The plan: one nozzle, its pulses, the water, and later its vehicle, tank run and readings. SI numbers.
 */
import type { Problem } from '../base'
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

/** Anything JSON can hold. */
export type Json = null | boolean | number | string | readonly Json[] | JsonObject
export interface JsonObject {
  readonly [key: string]: Json
}

/**
 * A decoded plan. Sections that later capabilities read (jet, train, wake, thruster, tankRun, readings, sweep, spread, held)
 * and keys this version does not know are kept as they came in `source` and written back on save.
 */
export interface Plan {
  readonly title: string
  readonly notes: string
  readonly water: WaterInput
  readonly nozzle: NozzleInput
  readonly programme: ProgrammeInput
  readonly ambient: { readonly axialFlow: number }
  readonly models: ModelsInput
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
