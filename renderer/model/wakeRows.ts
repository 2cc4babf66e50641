/**
 * A wake as the rows of its results: events, the picked ring, arrivals, how it was marched. Pure; values in the shown units.
 */
import { at } from '../../core/base'
import type { WakeEvent } from '../../core/coaxial'
import type { Wake } from '../../core/filament'
import { formatNumber, formatQuantity, formatRange, fromBase } from '../../core/quantity'
import { pathIndex, pathOffsets } from '../../core/report'
import type { WakeArrival, WakeData } from '../../core/run'
import { inShownUnits } from './shownSentence'
import type { Units } from './units'

export interface EventRow {
  readonly key: string
  readonly time: number
  readonly timeText: string
  readonly what: string
  readonly place: string
  readonly detail: string
  /** After the time up to which the model holds. */
  readonly beyond: boolean
}

const EVENT_WORDS: Readonly<Record<WakeEvent['event'], string>> = {
  pass: 'pass',
  arrival: 'arrives',
  'cores-touch': 'cores touch',
  'near-wall': 'near the wall',
  'pinch-off': 'pinches off',
  merge: 'merge',
  end: 'end',
}

/** `rings 1 and 2`, `ring 3`, or nothing. */
export function ringsInWords(rings: readonly number[]): string {
  if (rings.length === 0) return ''
  return rings.length === 1 ? `ring ${rings[0] ?? ''}` : `rings ${rings.join(' and ')}`
}

export function timeText(time: number, units: Units): string {
  return formatQuantity(time, units.wakeTime, 4)
}

/** A time with as many decimals as the output step needs, so that a running clock does not jitter. */
export function clockText(time: number, step: number, unit: string): string {
  const [shownTime, shownStep] = [fromBase(time, unit), fromBase(step, unit)]
  // Beyond the usual sizes a clock of fixed decimals would be all zeros, or longer than its place.
  if (shownTime >= 1e6 || (shownStep > 0 && shownStep < 1e-6)) return formatQuantity(time, unit)
  const decimals = Math.min(6, Math.max(0, -Math.floor(Math.log10(shownStep > 0 ? shownStep : 1) + 1e-9)))
  return `${shownTime.toFixed(decimals)}\u00A0${unit}`
}

export function eventRows(wake: Wake, units: Units): readonly EventRow[] {
  return wake.events.map((event, index) => {
    const rings = ringsInWords(event.rings)
    const beyond = event.time > wake.validUntil
    const lone = event.event === 'cores-touch' && event.rings.length === 1
    const words =
      event.event === 'end' ? 'End of the run' : `${rings} ${lone ? 'core touches' : EVENT_WORDS[event.event]}`
    return {
      key: `${index} ${event.time}`,
      time: event.time,
      timeText: timeText(event.time, units),
      what: words.charAt(0).toUpperCase() + words.slice(1),
      place: event.x === null ? '' : `x = ${formatQuantity(event.x, units.length)}`,
      detail: [beyond ? 'after “holds until”' : '', detailInWords(event, units)]
        .filter((part) => part !== '')
        .join(', '),
      beyond,
    }
  })
}

function detailInWords({ event, detail, x }: WakeEvent, units: Units): string {
  if (event === 'arrival') return x === null ? detail : `station ${formatQuantity(x, units.length)}`
  return inShownUnits(detail, units, 4)
}

export interface FigureRow {
  readonly id: string
  readonly label: string
  readonly figure: string
  readonly unit: string
  readonly note: string
}

/** The numbers of one ring at one output; null where it is not there. */
export function ringFigures(
  wake: Wake,
  ring: number,
  index: number,
  viscosity: number,
  units: Units,
): readonly FigureRow[] | null {
  const path = wake.trajectories[ring - 1]
  const offset = pathOffsets(wake)[ring - 1]
  if (path === undefined || offset === undefined) return null
  const k = pathIndex(path, offset, index)
  if (k === null) return null
  const circulation = at(path.circulation, k)
  const [radius, core] = [at(path.radius, k), at(path.coreRadius, k)]
  const place = [at(path.x, k), at(path.y, k), at(path.z, k)]
  const direction = [at(path.directionX, k), at(path.directionY, k), at(path.directionZ, k)]
  const row = (id: string, label: string, value: number, unit: string, note = ''): FigureRow => ({
    id,
    label,
    figure: formatRange(value, value, unit, 4).text,
    unit,
    note,
  })
  return [
    row('circulation', 'Circulation', circulation, units.circulation),
    row('speed', 'Speed', at(path.speed, k), units.ringSpeed, 'along its direction, as seen from the tank'),
    row('radius', 'Radius', radius, units.length),
    row('core', 'Core radius', core, units.length, `${formatNumber(core / radius, 2)} of the radius`),
    { id: 'place', label: 'Centre', figure: vectorText(place, units.length), unit: units.length, note: 'x, y, z' },
    { id: 'direction', label: 'Direction', figure: vectorText(direction, ''), unit: '', note: 'x, y, z' },
    {
      id: 'reynolds',
      label: 'Ring Reynolds number',
      figure: formatNumber(Math.abs(circulation) / viscosity, 3),
      unit: '',
      note: 'circulation over kinematic viscosity',
    },
  ]
}

function vectorText(vector: readonly number[], unit: string): string {
  const size = Math.hypot(...vector)
  // A component that is nothing but rounding is shown as 0.
  return vector
    .map((value) => (Math.abs(value) < 1e-9 * size ? '0' : formatRange(value, value, unit, 3).text))
    .join(', ')
}

export interface ArrivalRow {
  readonly key: string
  readonly station: string
  readonly ring: number
  readonly time: number
  readonly timeText: string
}

/** Arrivals by station and time; a range where two ageing laws were run. */
export function arrivalRows(arrivals: readonly WakeArrival[], units: Units): readonly ArrivalRow[] {
  return arrivals
    .toSorted((a, b) => a.station - b.station || a.time - b.time)
    .map(({ station, ring, time, timeLow, timeHigh }, index) => {
      const range = formatRange(timeLow, timeHigh ?? timeLow, units.wakeTime, 4)
      return {
        key: `${index} ${ring}`,
        station: formatQuantity(station, units.length),
        ring,
        time,
        timeText: `${range.text}\u00A0${range.unit}${timeHigh === null ? ' or later' : ''}`,
      }
    })
}

export interface FactRow {
  readonly label: string
  readonly text: string
}

const AGEING_WORDS = {
  laminar: 'laminar: cores grow by viscosity',
  turbulent: 'turbulent: rings grow with their way',
} as const

/** How the wake was marched and how well it held. */
export function runFacts(data: WakeData, viscous: boolean, units: Units): readonly FactRow[] {
  const { wake, turbulent, ageing } = data
  const facts: FactRow[] = [
    { label: 'Engine', text: engineInWords(wake) },
    { label: 'Ageing', text: ageingInWords(viscous, turbulent === null ? null : wake, ageing) },
    { label: 'Passes', text: String(wake.events.filter(({ event }) => event === 'pass').length) },
    ...(data.jet === null
      ? []
      : [{ label: 'Mergers', text: String(wake.events.filter(({ event }) => event === 'merge').length) }]),
    { label: 'Drift', text: driftInWords(wake) },
    {
      label: 'Holds until',
      text: `${wake.validUntil <= 1e-9 * wake.time ? 'not from the start' : timeText(wake.validUntil, units)}: ${inShownUnits(wake.reason, units, 4).replace(/\.$/u, '')}`,
    },
    {
      label: 'Work',
      text: `${wake.counters.steps} steps, ${wake.counters.rejected} taken back, ${wake.counters.evaluations} evaluations`,
    },
  ]
  return facts
}

function engineInWords({ model, modelReason }: Wake): string {
  return model === 'coaxial' ? `Rings on one axis. ${modelReason}` : modelReason
}

function ageingInWords(viscous: boolean, both: Wake | null, ageing: WakeData['ageing']): string {
  if (!viscous) return 'none: without viscosity'
  if (both === null) return AGEING_WORDS[ageing]
  return 'laminar as drawn; turbulent run as well, since the Reynolds number does not say which'
}

function driftInWords({ drift }: Wake): string {
  const parts = (['circulation', 'impulse', 'energy'] as const).flatMap((name) => {
    const value = drift[name]
    return value === null ? [] : [`${name} ${value === 0 ? '0' : formatNumber(value, 2)}`]
  })
  return parts.length === 0 ? 'not told: with viscosity, walls or a stream these sums change' : parts.join(', ')
}
