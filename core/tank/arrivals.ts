/**
 * When the ring comes to each station, how fast and how large: a value and its range.
 *
 * The value is that of the adopted ring under the law its ring Reynolds number asks for, laminar where that leaves both open, as in the
 * wake. The range spans both laws there, and for a quick start also the rings with and without the quick-start terms.
 */
import { at, requireRange, type RunStatus } from '../base'
import { THIN_CORE_LIMIT, type WakeAgeing } from '../coaxial'
import { loadKernel } from '../kernel'
import type { PulseResult, PulseRing } from '../pulse'
import { ageingRegime } from '../ring'
import { ringPath, wallMisfit, wallShare, type Passage, type RingPath } from './ringPath'
import { tankPath, type TankPath } from './tankPath'
import type { TankOptions } from './types'
import { slowingTubes, type TankWalls } from './walls'

/** Without a station the ring is followed this many of its radii past its birth. */
const FOLLOWED_RADII = 20
/** A ring nearer to the far wall than this many radii is slowed by it, which is not in the march. */
const FAR_WALL_RADII = 3
/** What the tube in place of a rectangular tank may leave unsaid of the ring's speed before it is told. */
const MISFIT_WORTH_TELLING = 1e-3

export interface ArrivalInput {
  readonly pulse: Pick<PulseResult, 'duration' | 'ring' | 'ringFromSlug' | 'ringWithOverPressure' | 'pinchedOff'>
  readonly density: number
  readonly kinematicViscosity: number
  readonly axialFlow: number
  /** auto: by ring Reynolds number. */
  readonly ageing: 'auto' | WakeAgeing
  readonly walls: TankWalls
  readonly stations: readonly number[]
}

/** One station. Every value is null where the ring is not seen there, and `reason` says why. */
export interface TankArrival {
  readonly station: number
  readonly time: number | null
  readonly timeLow: number | null
  readonly timeHigh: number | null
  readonly speed: number | null
  readonly speedLow: number | null
  readonly speedHigh: number | null
  readonly radius: number | null
  /** Of the thin core that moves as fast as the ring [m]. */
  readonly coreRadius: number | null
  readonly circulation: number | null
  /** Null where every ring of the range comes by. */
  readonly reason: string | null
}

export interface RingVariant {
  readonly ring: PulseRing
  readonly basis: 'adopted' | 'slug' | 'quick start'
  readonly path: RingPath
  /** Change of its speed by the walls over its speed without them, at birth. */
  readonly wallShare: number
}

export interface Arrivals {
  readonly arrivals: readonly TankArrival[]
  /** null: the pulse makes no ring. */
  readonly path: TankPath | null
  /** Every ring followed; the first is the value, all are the range. */
  readonly variants: readonly RingVariant[]
  /** Change of the adopted ring's speed by the walls, over its speed without them. */
  readonly wallShare: number
  readonly notes: readonly string[]
  readonly status: RunStatus
}

/** Laws a ring is followed under: one, or laminar then turbulent. */
export function ageingLaws(
  ring: Pick<PulseRing, 'circulation'>,
  viscosity: number,
  ageing: 'auto' | WakeAgeing,
): readonly WakeAgeing[] {
  if (ageing !== 'auto') return [ageing]
  const regime = ageingRegime(ring.circulation, viscosity)
  return regime === 'between' ? ['laminar', 'turbulent'] : [regime]
}

/** @throws {DomainError} on tankRun.stations… and where the ring does not fit in the tank */
export async function tankArrivals(input: ArrivalInput, options: TankOptions = {}): Promise<Arrivals> {
  input.stations.forEach((station, i) => requireRange(`tankRun.stations.${i}`, station, { above: 0, unit: 'm' }))
  const { ring } = input.pulse
  if (ring === null) return withoutRing(input)
  const kernel = options.kernel ?? (await loadKernel())
  const variants: RingVariant[] = []
  const stations = input.stations.filter((station) => station <= (input.walls.end ?? Infinity))
  const shared = {
    density: input.density,
    kinematicViscosity: input.kinematicViscosity,
    duration: input.pulse.duration,
    axialFlow: input.axialFlow,
    walls: input.walls,
    tubeFor: slowingTubes(input.walls),
    stations: [...new Set(stations)],
    reach: reachOf(input, ring, stations),
  }
  const wanted = ringsOf(input).flatMap((one) =>
    ageingLaws(one.ring, input.kinematicViscosity, input.ageing).map((ageing) => ({ ...one, ageing })),
  )
  for (const [k, one] of wanted.entries()) {
    const path = await ringPath({ ...shared, ring: one.ring, ageing: one.ageing }, { ...options, kernel })
    options.onProgress?.({ share: (k + 1) / wanted.length, what: 'ring on its way' })
    variants.push({ ring: one.ring, basis: one.basis, path, wallShare: wallShare(path, input.walls, input.axialFlow) })
    if (path.status !== 'done') break
  }
  const arrivals = input.stations.map((station) => arrivalAt(station, input, variants))
  return {
    arrivals,
    path: tankPath(
      variants.map(({ path }) => path),
      shared.reach,
    ),
    variants,
    wallShare: at(variants, 0).wallShare,
    notes: [...input.walls.notes, ...notesOf(input, variants, arrivals)],
    status: variants.find(({ path }) => path.status !== 'done')?.path.status ?? 'done',
  }
}

function withoutRing({ stations, walls }: ArrivalInput): Arrivals {
  const reason = 'the pulse makes no ring'
  const nothing = { time: null, timeLow: null, timeHigh: null, speed: null, speedLow: null, speedHigh: null }
  return {
    arrivals: stations.map((station) => ({
      station,
      ...nothing,
      radius: null,
      coreRadius: null,
      circulation: null,
      reason,
    })),
    path: null,
    variants: [],
    wallShare: 0,
    notes: [...walls.notes, 'The pulse makes no ring: there is nothing to wait for at a station.'],
    status: 'done',
  }
}

/** The adopted ring first; the ends of the range where they differ from it. */
function ringsOf({ pulse }: ArrivalInput): { readonly ring: PulseRing; readonly basis: RingVariant['basis'] }[] {
  const all = [
    { ring: pulse.ring, basis: 'adopted' as const },
    // Where the start is not quick the slug is no end of a range unless another basis was adopted.
    { ring: pulse.ringFromSlug, basis: 'slug' as const },
    { ring: pulse.ringWithOverPressure, basis: 'quick start' as const },
  ]
  const kept: { ring: PulseRing; basis: RingVariant['basis'] }[] = []
  for (const { ring, basis } of all)
    if (ring !== null && !kept.some((other) => sameRing(other.ring, ring))) kept.push({ ring, basis })
  return kept
}

function sameRing(a: PulseRing, b: PulseRing): boolean {
  return a.circulation === b.circulation && a.impulse === b.impulse && a.speed === b.speed
}

function reachOf(input: ArrivalInput, ring: PulseRing, stations: readonly number[]): number {
  const furthest = Math.max(...stations)
  const born = ring.speed * input.pulse.duration
  if (stations.length > 0 && furthest > born) return furthest
  const followed = born + FOLLOWED_RADII * ring.radius
  return input.walls.end !== null && input.walls.end > born ? Math.min(followed, input.walls.end) : followed
}

function arrivalAt(station: number, input: ArrivalInput, variants: readonly RingVariant[]): TankArrival {
  const passages = variants.map(({ path }) => path.passages.find((passage) => passage.station === station) ?? null)
  const seen = passages.filter((passage) => passage !== null)
  const first = passages[0] ?? null
  const reasons = variants.flatMap((variant, k) =>
    passages[k] === null ? [`${nameOf(variant, variants)}${whyNotSeen(station, input, variant.path)}`] : [],
  )
  const range = (value: (passage: Passage) => number): { low: number | null; high: number | null } =>
    first === null
      ? { low: null, high: null }
      : { low: Math.min(...seen.map(value)), high: Math.max(...seen.map(value)) }
  const time = range((passage) => passage.time)
  const speed = range((passage) => passage.speed)
  return {
    station,
    time: first?.time ?? null,
    timeLow: time.low,
    timeHigh: time.high,
    speed: first?.speed ?? null,
    speedLow: speed.low,
    speedHigh: speed.high,
    radius: first?.radius ?? null,
    coreRadius: first?.coreRadius ?? null,
    circulation: first?.circulation ?? null,
    reason: seen.length === 0 ? `the ring ${whyNotSeen(station, input, at(variants, 0).path)}` : joined(reasons),
  }
}

function joined(reasons: readonly string[]): string | null {
  return reasons.length === 0 ? null : reasons.join('; ')
}

function nameOf(variant: RingVariant, variants: readonly RingVariant[]): string {
  if (variants.length === 1) return 'the ring '
  return `the ring (${variant.basis}, ${variant.path.ageing}) `
}

function whyNotSeen(station: number, { walls }: ArrivalInput, path: RingPath): string {
  if (walls.end !== null && station > walls.end)
    return `cannot come to ${short(station)} m: the far wall stands at ${short(walls.end)} m`
  if (station <= path.birth.x)
    return `is still forming at ${short(station)} m: it appears at ${short(path.birth.x)} m when the stroke ends, ${short(path.birth.time)} s`
  return `does not come to ${short(station)} m: ${path.shortOf ?? 'it ends before'}`
}

function notesOf(input: ArrivalInput, variants: readonly RingVariant[], arrivals: readonly TankArrival[]): string[] {
  const notes: string[] = []
  const { end } = input.walls
  if (input.pulse.pinchedOff === true)
    notes.push('The trailing jet behind the ring is left out: only the ring is followed.')
  const thickFrom = variants.flatMap(({ path }) => thickOnTheWay(path))
  if (thickFrom.length > 0)
    notes.push(
      `The core is above ${THIN_CORE_LIMIT} of the ring's radius from ${short(Math.min(...thickFrom))} s on, where the thin-core law that times the arrivals is a stand-in.`,
    )
  const misfits = variants.map(({ path }) => wallMisfit(path, input.walls))
  if (misfits.some((misfit) => misfit === null || Math.abs(misfit) > MISFIT_WORTH_TELLING))
    notes.push(
      'The ring grows so large on its way that the walls, which enter as the round tube of equal slowing at its birth, hold it back otherwise by more than 0.1 % of its speed at the last station.',
    )
  const near = arrivals.filter(
    ({ station, radius }) => end !== null && radius !== null && end - station < FAR_WALL_RADII * radius,
  )
  if (near.length > 0)
    notes.push(
      `The far wall slows and widens the ring within ${FAR_WALL_RADII} radii of it, which the arrival at ${near.map(({ station }) => `${short(station)} m`).join(', ')} leaves out.`,
    )
  const { surface, floor } = input.walls
  if (input.walls.kind === 'rectangular' && surface !== null && floor !== null && surface !== floor)
    notes.push(
      'The axis is not in the middle of the depth: a nearer wall also turns the ring towards it slowly, which is left out.',
    )
  return notes
}

/** When the core passes the thin law's limit, if it does before the last station. */
function thickOnTheWay({ thickFrom, passages, time }: RingPath): number[] {
  const end = passages.at(-1)?.time ?? at(time, time.length - 1)
  return thickFrom !== null && thickFrom <= end ? [thickFrom] : []
}

function short(value: number): number {
  return Number(value.toPrecision(4))
}
