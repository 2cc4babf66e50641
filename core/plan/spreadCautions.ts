/**
 * Cautions about a spread: samples that do not count, and what was held while the plan was drawn.
 */
import type { CautionContext, CautionDefinition } from './cautionTypes'

type Spread = NonNullable<CautionContext['spread']>

function caution(id: string, text: (spread: Spread) => string | null): CautionDefinition {
  return {
    id,
    group: 'model',
    source: 'how the spread is computed',
    text: ({ spread }) => (spread === null ? null : text(spread)),
  }
}

export const SPREAD_CAUTIONS: readonly CautionDefinition[] = [
  caution('spread-refused', ({ refused, used, refusals }) => {
    const [most] = refusals
    if (most === undefined) return null
    const share = Number(((100 * refused) / (refused + used)).toPrecision(2))
    return `${refused} of ${refused + used} samples (${share} %) were refused and do not count, which narrows the spread; most often ${most.field}: ${most.message}.`
  }),
  caution('spread-incomplete', ({ status, message }) => (status === 'done' ? null : message)),
  caution('spread-notes', ({ notes }) => (notes.length === 0 ? null : notes.join(' '))),
]
