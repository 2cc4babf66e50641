/** What the pulses of a train of jets do to one another, in words. Pure. */
import type { WakeEvent } from '../../../core/coaxial'
import type { Wake } from '../../../core/filament'
import type { WakeData } from '../../../core/run'
import { whenAndWhere } from '../../model/wakeCatch'
import { timeText } from '../../model/wakeRows'
import type { Units } from '../../model/units'

/** Pulses told one by one. */
const MOST_PULSES = 4

/**
 * For each pulse after the first: whether its ring catches one of an earlier pulse, then what else it first passes or merges with. Empty
 * for wakes of no jet.
 */
export function jetMeetings({ jet, wake, turbulent }: WakeData, units: Units): readonly string[] {
  if (jet === null || jet.pulses < 2) return []
  const each = jet.release.rings.length
  const naming: Naming = {
    pulseOf: (ring) => Math.ceil(ring / each),
    isRing: (ring) => (ring - 1) % each === 0,
  }
  const told = Math.min(jet.pulses, MOST_PULSES)
  return Array.from({ length: told - 1 }, (_, k) => k + 2).flatMap((pulse) => {
    const path = wake.trajectories[(pulse - 1) * each]
    if (path === undefined || path.time.length === 0)
      return [`Pulse ${pulse} has no ring yet when the run ends, at ${timeText(wake.time, units)}.`]
    return meetingsOf(pulse, naming, wake, turbulent, units)
  })
}

interface Naming {
  readonly pulseOf: (ring: number) => number
  /** False for a billow. */
  readonly isRing: (ring: number) => boolean
}

function meetingsOf(
  pulse: number,
  naming: Naming,
  wake: Wake,
  turbulent: Wake | null,
  units: Units,
): readonly string[] {
  const { pulseOf, isRing } = naming
  const isOf = (event: WakeEvent): boolean => isMeeting(event) && later(event, pulseOf) === pulse
  const ofRings = (event: WakeEvent): boolean => isOf(event) && event.rings.every(isRing)
  const rings = wake.events.find(ofRings)
  const first = wake.events.find(isOf)
  const sentence = (meeting: WakeEvent, find: (event: WakeEvent) => boolean): string => {
    const [behind, ahead] = meeting.rings.toSorted((a, b) => pulseOf(b) - pulseOf(a))
    const name = (ring: number): string => `${isRing(ring) ? 'the ring' : 'a billow'} of pulse ${pulseOf(ring)}`
    const what = meeting.event === 'merge' ? 'merges with' : meeting.event === 'pass' ? 'passes' : 'touches'
    const second = turbulent === null ? meeting : turbulent.events.find(find)
    const text = `${name(behind ?? 0)} ${what} ${name(ahead ?? 0)} ${whenAndWhere(wake, meeting, second, units)}.`
    return text.charAt(0).toUpperCase() + text.slice(1)
  }
  if (first === undefined)
    return [`Pulse ${pulse} meets nothing of the pulses before it within ${timeText(wake.time, units)}.`]
  const before = first === rings ? [] : [sentence(first, isOf)]
  if (rings !== undefined) return [sentence(rings, ofRings), ...before]
  const none = `The ring of pulse ${pulse} catches no ring of an earlier pulse within ${timeText(wake.time, units)}.`
  return [none, ...before]
}

function isMeeting({ event, rings }: WakeEvent): boolean {
  return (event === 'pass' || event === 'merge' || event === 'cores-touch') && rings.length === 2
}

/** The later pulse of a meeting of two; 0 where both rings are of one pulse. */
function later({ rings }: WakeEvent, pulseOf: (ring: number) => number): number {
  const pulses = rings.map(pulseOf)
  return Math.min(...pulses) === Math.max(...pulses) ? 0 : Math.max(...pulses)
}
