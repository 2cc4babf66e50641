/** The section `jet` of a plan: how the starting jet is computed. */
import { decodeFlag, decodeOptionalNumber, type Problems } from './decodeFields'
import type { JsonObject } from './json'
import type { JetSection } from './types'

/** How a starting jet is computed where the plan does not say, or a model is `computed` without a section. */
export const JET_DEFAULTS: JetSection = { ensemble: true, coreGrowth: true, delta: null }

export function decodeJet(raw: JsonObject, problems: Problems): JetSection {
  return {
    ensemble: decodeFlag(raw, 'jet.ensemble', JET_DEFAULTS.ensemble, problems),
    coreGrowth: decodeFlag(raw, 'jet.coreGrowth', JET_DEFAULTS.coreGrowth, problems),
    delta: decodeOptionalNumber(raw, 'jet.delta', problems) ?? null,
  }
}
