/**
 * The plan: one nozzle, its pulses, the water, its vehicle, tank run and readings. SI numbers.
 */
import type { Problem } from '../base'
import type { CoaxialLaw, WakeAgeing } from '../coaxial'
import type { WakeModel, WakeNozzle, WakeRing, WakeWall } from '../filament'
import type { FormationBasis, NozzleInput, OverPressureBasis, ProgrammeInput } from '../pulse'
import type { ReadingsSection, TankRunSection } from '../tank'
import type { ThrusterSection } from '../thruster'
import type { WaterInput } from '../water'
import type { JsonObject } from './json'
import type { HeldDesign, SpreadSection, SweepSection } from './sectionTypes'

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

export type WakeStart = 'matched' | 'jet'

/** What the rings do next: where they start, what stands around them, and how they are marched. */
export interface WakeSection {
  readonly model: WakeModel
  readonly law: CoaxialLaw
  /** `auto`: by ring Reynolds number, both laws where it does not say. */
  readonly ageing: WakeAgeing | 'auto'
  /** Explicit rings; when there are any they replace the train. */
  readonly rings: readonly WakeRing[]
  readonly nozzles: readonly WakeNozzle[]
  /** What a train starts from: the matched steady ring of each pulse, or what the computed jet lets go of. */
  readonly start: WakeStart
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

/** How the starting jet is computed. */
export interface JetSection {
  /** True: three smoothing lengths and their spread; false: one. */
  readonly ensemble: boolean
  /** True: cores grow by viscosity. */
  readonly coreGrowth: boolean
  /** One smoothing length over the exit diameter; null: the usual ones. */
  readonly delta: number | null
}

/**
 * A decoded plan. Keys this version does not know are kept as they came in `source` and written back on save.
 */
export interface Plan {
  readonly title: string
  /** Of the design, as its owner counts: printed in the record; '' for none. */
  readonly revision: string
  readonly notes: string
  readonly water: WaterInput
  readonly nozzle: NozzleInput
  readonly programme: ProgrammeInput
  readonly ambient: { readonly axialFlow: number }
  readonly models: ModelsInput
  /** null: the plan has no such section, and a starting jet is computed only where a model asks for it. */
  readonly jet: JetSection | null
  /** null: the plan has no such section. No train means one pulse. */
  readonly train: TrainSection | null
  readonly wake: WakeSection | null
  readonly thruster: ThrusterSection | null
  readonly tankRun: TankRunSection | null
  readonly readings: ReadingsSection | null
  readonly sweep: SweepSection | null
  readonly spread: SpreadSection | null
  /** Designs kept to be held against this one; empty: none. */
  readonly held: readonly HeldDesign[]
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
