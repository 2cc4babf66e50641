/** What the pulses of a train of jets do to one another, in words. Pure. */
import type { WakeEvent } from '../../../core/coaxial'
import { formatQuantity } from '../../../core/quantity'
import type { WakeData } from '../../../core/run'
import { timeText } from '../../model/wakeRows'
import type { Units } from '../../model/units'

/** Pulses told one by one. */
const MOST_PULSES = 4

/** For each pulse after the first: when it first passes or merges with what an earlier one has left. Empty for wakes of no jet. */
export function jetMeetings({ jet, wake }: WakeData, units: Units): readonly string[] {
  if (jet === null || jet.pulses < 2) return []
  const each = jet.release.rings.length
  const pulseOf = (ring: number): number => Math.ceil(ring / each)
  const name = (ring: number): string =>
    `${(ring - 1) % each === 0 ? 'the ring' : 'a billow'} of pulse ${pulseOf(ring)}`
  const told = Math.min(jet.pulses, MOST_PULSES)
  return Array.from({ length: told - 1 }, (_, k) => {
    const pulse = k + 2
    const meeting = wake.events.find((event) => isMeeting(event) && later(event, pulseOf) === pulse)
    if (meeting === undefined)
      return `Pulse ${pulse} meets nothing of the pulses before it within ${timeText(wake.time, units)}.`
    const [behind, ahead] = meeting.rings.toSorted((a, b) => pulseOf(b) - pulseOf(a))
    const what = meeting.event === 'merge' ? 'merges with' : meeting.event === 'pass' ? 'passes' : 'touches'
    const where = meeting.x === null ? '' : `, x = ${formatQuantity(meeting.x, units.length)}`
    const sentence = `${name(behind ?? 0)} ${what} ${name(ahead ?? 0)} at ${timeText(meeting.time, units)}${where}.`
    return sentence.charAt(0).toUpperCase() + sentence.slice(1)
  })
}

function isMeeting({ event, rings }: WakeEvent): boolean {
  return (event === 'pass' || event === 'merge' || event === 'cores-touch') && rings.length === 2
}

/** The later pulse of a meeting of two; 0 where both rings are of one pulse. */
function later({ rings }: WakeEvent, pulseOf: (ring: number) => number): number {
  const pulses = rings.map(pulseOf)
  return Math.min(...pulses) === Math.max(...pulses) ? 0 : Math.max(...pulses)
}
