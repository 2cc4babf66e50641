/**
 * Cautions about a sizing: candidates that only just hold their limits, and a search that found none, was cut short or has nothing to aim at.
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
  {
    id: 'sizing-no-target',
    group: 'model',
    source: 'how the search is asked for',
    text: ({ plan, thruster }) => {
      const section = plan.thruster
      if (thruster === null || section === null || section.search === null) return null
      if (section.search.goal !== 'power' || section.target.length > 0) return null
      return 'The search makes no sizing: least power is asked for without anything to reach. Give a duty point, a thrust or a speed to hold with its share of the time, or search for most thrust.'
    },
  },
  caution('sizing-incomplete', 'how results are kept', ({ status, message }) => (status === 'done' ? null : message)),
]
