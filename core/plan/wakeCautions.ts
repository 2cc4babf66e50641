/**
 * Cautions about rings in motion: where the model ends, what a wall does, what was left out.
 */
import type { WakeEventKind } from '../coaxial'
import type { CautionContext, CautionDefinition } from './cautionTypes'

/** First event of a kind, or undefined. */
function first({ wake }: CautionContext, kind: WakeEventKind) {
  return wake?.events.find(({ event }) => event === kind)
}

/** A period this share below the stroke time differs from it by rounding only. */
const ROUNDING = 1e-9

/** Whether a pulse of a train begins before the one before it has ended. Both in s. */
export function pulsesOverlap(period: number, duration: number): boolean {
  return period < duration * (1 - ROUNDING)
}

const seconds = (time: number): string => `${Number(time.toPrecision(3))} s`

export const WAKE_CAUTIONS: readonly CautionDefinition[] = [
  {
    id: 'train-overlap',
    group: 'model',
    source: 'definitions of a train',
    text: ({ plan: { train, wake }, pulse }) => {
      if (wake === null || wake.rings.length > 0 || train === null || train.pulses < 2 || pulse === null) return null
      if (!pulsesOverlap(train.period, pulse.duration)) return null
      return `The period of the train, ${seconds(train.period)}, is shorter than its stroke of ${seconds(pulse.duration)}: the pulses would overlap, which one piston cannot do.`
    },
  },
  {
    id: 'cores-touch',
    group: 'model',
    source: 'reconnection and merging are not modelled',
    text: (context) => {
      const event = first(context, 'cores-touch')
      if (event === undefined) return null
      const what =
        event.rings.length > 1
          ? `The cores of rings ${event.rings.join(' and ')} touch`
          : `The core of ring ${event.rings.join()} reaches the wall`
      return `${what} at ${seconds(event.time)}: what follows is not modelled, and the run ends there.`
    },
  },
  {
    id: 'near-wall',
    group: 'model',
    source: 'Walker et al. 1987; Orlandi & Verzicco 1993 (recalled, not re-read)',
    text: (context) => {
      const event = first(context, 'near-wall')
      if (event === undefined) return null
      return `Ring ${event.rings.join(', ')} comes within about a radius of a wall at ${seconds(event.time)}: a real wall sheds vorticity of its own and the ring rebounds; after that time the path is not to be relied on.`
    },
  },
  {
    id: 'wake-rings',
    group: 'model',
    source: 'Saffman 1970; definitions of a train',
    text: ({ wake, wakeNotes }) => {
      const notes = [...wakeNotes, ...(wake?.notes ?? [])]
      return notes.length === 0 ? null : notes.join(' ')
    },
  },
  {
    id: 'wake-valid-until',
    group: 'model',
    source: 'limits of the ring models',
    text: ({ wake }) =>
      wake !== null && wake.status === 'done' && wake.validUntil < wake.time
        ? `The path of the rings ${wake.validUntil <= ROUNDING * wake.time ? 'does not hold from the start' : `holds until ${seconds(wake.validUntil)}`}: ${wake.reason}`
        : null,
  },
]
