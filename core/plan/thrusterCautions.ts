/**
 * Cautions about what the models can tell of a thruster: the sentence is the thruster's own, the source stands here.
 */
import { THRUSTER_NOTES, type ThrusterNoteId, type ThrusterResult } from '../thruster'

/** What these cautions look at. */
export interface ThrusterCautionContext {
  readonly thruster: ThrusterResult | null
}

export interface ThrusterCaution {
  readonly id: ThrusterNoteId
  readonly group: 'model'
  readonly source: string
  /** The sentence for this thruster, or null where the caution does not hold. */
  readonly text: (context: ThrusterCautionContext) => string | null
}

const SOURCES: Readonly<Record<ThrusterNoteId, string>> = {
  'thruster-does-not-start': 'balance of thrust and drag',
  'thruster-shortfall': 'balance of thrust and drag',
  'thruster-several-speeds': 'balance of thrust and drag',
  'thruster-limits': 'limits given in the plan',
  'thruster-speed-jumps': 'inertia of the plunger and of the water in the nozzle',
  'thruster-no-column': 'inertia of the water in the nozzle',
  'thruster-braking-suction': 'inertia of the water in the nozzle; vapour pressure by IAPWS-IF97 or as given',
  'thruster-close-nozzles': 'Athanassiadis & Hart 2016, arXiv 1604.05382',
  'thruster-close-rings': 'common practice',
  'thruster-past-ring': 'Gharib, Rambod & Shariff 1998, J. Fluid Mech. 360:121 (recalled, not re-read)',
  'thruster-strong-stream': 'Zhu, Zhang, Gao & Yu 2023, J. Fluid Mech.',
  'thruster-refill-by-exit': 'limits of the slug model',
  'thruster-hull-reynolds': 'ITTC 1957 line; the limit is common practice',
  'thruster-light-vehicle': 'common practice',
  'thruster-no-added-mass': 'common practice',
  'thruster-jet-other-stream': 'limits of the computed starting jet',
}

function cautionOf(id: ThrusterNoteId): ThrusterCaution {
  return {
    id,
    group: 'model',
    source: SOURCES[id],
    text: ({ thruster }) => thruster?.notes.find((note) => note.id === id)?.text ?? null,
  }
}

export const THRUSTER_CAUTIONS: readonly ThrusterCaution[] = THRUSTER_NOTES.map(cautionOf)
