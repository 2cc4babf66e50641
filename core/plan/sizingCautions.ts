/**
 * Cautions about a sizing: candidates that only just hold their limits, and a search that found none or was cut short.
 */
import type { CautionContext, CautionDefinition } from './cautionTypes'

type Sizing = NonNullable<CautionContext['sizing']>

function caution(id: string, source: string, text: (sizing: Sizing) => string | null): CautionDefinition {
  return { id, group: 'model', source, text: ({ sizing }) => (sizing === null ? null : text(sizing)) }
}

export const SIZING_CAUTIONS: readonly CautionDefinition[] = [
  caution('sizing-within-spread', 'limits and deviations given in the plan', ({ candidates }) => {
    const near = candidates[0]?.withinSpread ?? []
    return near.length === 0
      ? null
      : `The best candidate lies within the spread of manufacture of a limit (${near.join(', ')}): check by test before relying on it.`
  }),
  caution('sizing-nothing-fits', 'limits given in the plan', ({ nearest, message }) =>
    nearest === null ? null : message,
  ),
  caution('sizing-incomplete', 'how results are kept', ({ status, message }) => (status === 'done' ? null : message)),
]
