/**
 * Does one pulse catch the one before it? Answered from the march, in words. Pure.
 */
import { at } from '../../core/base'
import type { Wake, WakeTrajectory } from '../../core/filament'
import { formatQuantity, formatRange } from '../../core/quantity'
import type { Units } from './units'

/** Sentences said one by one up to this many pairs; of more only what differs. */
const MOST_SENTENCES = 4

/** A time within this share of the whole differs from the start by rounding. */
const AT_ONCE = 1e-9

/** A gap whose change over the run is within this share of it neither opens nor closes. */
const STEADY = 0.01

/**
 * @param pulses rings of one nozzle, numbered nozzle by nozzle; with explicit rings all of them
 * @param word what a ring is called: `Pulse` of a train, `Ring` placed by hand
 * @param other the same rings under the other ageing law, where both were run: the answer is then a range
 */
export function catchInWords(
  wake: Wake,
  pulses: number,
  word: 'Pulse' | 'Ring',
  units: Units,
  other: Wake | null = null,
): readonly string[] {
  const nozzles = Math.max(1, Math.round(wake.trajectories.length / Math.max(1, pulses)))
  const sentences: { readonly caught: boolean; readonly text: string }[] = []
  for (let nozzle = 0; nozzle < nozzles; nozzle++)
    for (let pulse = 1; pulse < pulses; pulse++) {
      const pair = pairOf(wake, nozzle * pulses + pulse - 1)
      if (pair === null) continue
      const name = (ring: number): string =>
        `${word.toLowerCase()} ${ring - nozzle * pulses}${nozzles > 1 ? ` of nozzle ${nozzle + 1}` : ''}`
      if (pair.beside && !doTouch(wake, pair)) sentences.push(besideOf(pair, name))
      else
        sentences.push(
          pair.opposed ? meetingOf(wake, pair, name, units, other) : catchOf(wake, pair, name, units, other),
        )
    }
  const caught = sentences.filter((sentence) => sentence.caught)
  if (sentences.length <= MOST_SENTENCES) return sentences.map(({ text }) => text)
  if (caught.length === 0)
    return [`No ${word.toLowerCase()} catches the one before it within ${formatQuantity(wake.time, units.wakeTime)}.`]
  const rest = caught.length - MOST_SENTENCES
  const shown = caught.slice(0, MOST_SENTENCES).map(({ text }) => text)
  return rest > 0 ? [...shown, `And ${rest} more: see the events.`] : shown
}

interface Pair {
  /** Numbers from 1: the one behind follows the one ahead when both are there for the first time. */
  readonly ahead: number
  readonly behind: number
  /** True where they face one another or away: neither follows. */
  readonly opposed: boolean
  /** True where neither stands in the other's way: their axes lie farther apart than the sum of their radii. */
  readonly beside: boolean
  /** Distance of their centres over the time both are there. */
  readonly gap: { readonly first: number; readonly last: number }
}

/** Ring number `index` + 1 and the one after it; null where they are never there together. */
function pairOf(wake: Wake, index: number): Pair | null {
  const [a, b] = [wake.trajectories[index], wake.trajectories[index + 1]]
  const times = a === undefined || b === undefined ? [] : [a, b].map(({ time }) => time[0] ?? Infinity)
  const start = Math.max(...times)
  if (a === undefined || b === undefined || !Number.isFinite(start)) return null
  const [k, m] = [a.time.indexOf(start), b.time.indexOf(start)]
  if (k < 0 || m < 0) return null
  const facing = ({ circulation, directionX, directionY, directionZ }: WakeTrajectory, i: number): readonly number[] =>
    [directionX, directionY, directionZ].map((column) => Math.sign(at(circulation, i)) * at(column, i))
  const between = (i: number, j: number): readonly number[] => [
    at(a.x, i) - at(b.x, j),
    at(a.y, i) - at(b.y, j),
    at(a.z, i) - at(b.z, j),
  ]
  const way = facing(a, k)
  const leads = dot(between(k, m), way) >= 0
  const gap = {
    first: Math.hypot(...between(k, m)),
    last: Math.hypot(...between(a.time.length - 1, b.time.length - 1)),
  }
  const [ahead, behind] = leads ? [index + 1, index + 2] : [index + 2, index + 1]
  const apart = between(k, m)
  const along = dot(apart, way)
  const sideways = Math.hypot(...apart.map((value, axis) => value - along * at(way, axis)))
  const beside = sideways > at(a.radius, k) + at(b.radius, m)
  return { ahead, behind, opposed: dot(way, facing(b, m)) < 0, beside, gap }
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, value, axis) => sum + value * at(b, axis), 0)
}

type Sentence = { readonly caught: boolean; readonly text: string }
type Name = (ring: number) => string

function firstMeeting(wake: Wake, { ahead, behind }: Pair): Wake['events'][number] | undefined {
  const numbers = [ahead, behind]
  return wake.events.find(
    ({ event, rings }) =>
      (event === 'pass' || event === 'cores-touch') &&
      rings.length === 2 &&
      rings.every((ring) => numbers.includes(ring)),
  )
}

type Meeting = Wake['events'][number]

function otherMeeting(meeting: Meeting, pair: Pair, other: Wake | null): Meeting | undefined {
  return other === null ? meeting : firstMeeting(other, pair)
}

/**
 * When and where rings meet, from one ageing law to the other, and whether the model still holds there.
 *
 * @param second the same meeting under the other law, undefined where there is none; `meeting` itself where one law was run
 */
export function whenAndWhere(wake: Wake, meeting: Meeting, second: Meeting | undefined, units: Units): string {
  const both = [meeting, second ?? meeting]
  const span = (values: readonly number[], unit: string): string => {
    const { text, unit: shown } = formatRange(Math.min(...values), Math.max(...values), unit, 4)
    return `${text}\u00A0${shown}`
  }
  const times = both.map(({ time }) => time)
  const places = both.flatMap(({ x }) => (x === null ? [] : [x]))
  const where = places.length === both.length ? `, x = ${span(places, units.length)}` : ''
  const only = second === undefined ? ', though not under the turbulent law' : ''
  const past = Math.max(...times) > wake.validUntil ? `; ${holdsInWords(wake, units)}` : ''
  return `at ${span(times, units.wakeTime)}${where}${only}${past}`
}

/** Up to when the model holds. */
function holdsInWords({ validUntil, time }: Wake, units: Units): string {
  return validUntil <= AT_ONCE * time
    ? 'the model does not hold from the start'
    : `the model holds only until ${formatQuantity(validUntil, units.wakeTime, 3)}`
}

function catchOf(wake: Wake, pair: Pair, name: Name, units: Units, other: Wake | null): Sentence {
  const [behind, ahead] = [capital(name(pair.behind)), name(pair.ahead)]
  const meeting = firstMeeting(wake, pair)
  if (meeting === undefined)
    return { caught: false, text: `${behind} does not catch ${ahead} ${sinceThen(wake, pair, units)}` }
  const does = meeting.event === 'pass' ? 'catches and passes' : 'catches'
  const end = meeting.event === 'pass' ? '' : ': their cores touch'
  return {
    caught: true,
    text: `${behind} ${does} ${ahead} ${whenAndWhere(wake, meeting, otherMeeting(meeting, pair, other), units)}${end}.`,
  }
}

function doTouch({ events }: Wake, { ahead, behind }: Pair): boolean {
  return events.some(({ event, rings }) => event === 'cores-touch' && rings.includes(ahead) && rings.includes(behind))
}

function besideOf({ ahead, behind }: Pair, name: Name): Sentence {
  const [first, second] = [Math.min(ahead, behind), Math.max(ahead, behind)].map(name)
  return {
    caught: false,
    text: `${capital(first ?? '')} and ${second ?? ''} run side by side: neither is in the other’s way.`,
  }
}

function meetingOf(wake: Wake, pair: Pair, name: Name, units: Units, other: Wake | null): Sentence {
  const both = `${capital(name(Math.min(pair.ahead, pair.behind)))} and ${name(Math.max(pair.ahead, pair.behind))}`
  const meeting = firstMeeting(wake, pair)
  return meeting === undefined
    ? { caught: false, text: `${both} do not meet ${sinceThen(wake, pair, units)}` }
    : { caught: true, text: `${both} meet ${whenAndWhere(wake, meeting, otherMeeting(meeting, pair, other), units)}.` }
}

function sinceThen(wake: Wake, { gap }: Pair, units: Units): string {
  const [first, final] = [gap.first, gap.last].map((value) => formatQuantity(value, units.length, 3))
  const change =
    Math.abs(gap.last - gap.first) < STEADY * gap.first ? 'steady' : gap.last > gap.first ? 'opening' : 'closing'
  const words = change === 'steady' ? `the gap stays near ${final}` : `the gap is ${change}, from ${first} to ${final}`
  return `within ${formatQuantity(wake.time, units.wakeTime, 3)}: ${words}.`
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}
