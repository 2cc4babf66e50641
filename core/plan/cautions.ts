/**
 * The one table of cautions: it feeds the window, the summary, the reports and the text beside a piston profile.
 */
import type { CautionContext, CautionDefinition, CautionGroup } from './cautionTypes'
import { HAZARD_CAUTIONS } from './hazardCautions'
import { JET_CAUTIONS } from './jetCautions'
import { MODEL_CAUTIONS } from './modelCautions'
import { SIZING_CAUTIONS } from './sizingCautions'
import { SPREAD_CAUTIONS } from './spreadCautions'
import { TANK_CAUTIONS } from './tankCautions'
import { THRUSTER_CAUTIONS } from './thrusterCautions'
import { WAKE_CAUTIONS } from './wakeCautions'
import type { Caution } from './types'

export const CAUTIONS: readonly CautionDefinition[] = [
  ...MODEL_CAUTIONS,
  ...JET_CAUTIONS,
  ...WAKE_CAUTIONS,
  ...THRUSTER_CAUTIONS,
  ...SIZING_CAUTIONS,
  ...TANK_CAUTIONS,
  ...SPREAD_CAUTIONS,
  ...HAZARD_CAUTIONS,
]

/** The cautions that hold for a plan and its results, in the table's order; of one group where it is named. */
export function cautionsFor(context: CautionContext, group?: CautionGroup): Caution[] {
  return CAUTIONS.filter((caution) => group === undefined || caution.group === group).flatMap((caution) => {
    const text = caution.text(context)
    return text === null ? [] : [{ id: caution.id, group: caution.group, text, source: caution.source }]
  })
}
