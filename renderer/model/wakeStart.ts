/** The plan as it is when a wake begins, or changes where its rings come from. Pure. */
import type { WakeRing } from '../../core/filament'
import { setTrain, setWake, type Plan, type WakeSection } from '../../core/plan'
import type { PulseResult } from '../../core/pulse'

/** Rings of a plain start, where no pulse makes one: about the size of a bench generator's. */
const PLAIN_RING: WakeRing = {
  circulation: 0.01,
  radius: 0.02,
  coreRadius: 0.004,
  core: 'uniform',
  centre: [0, 0, 0],
  direction: [1, 0, 0],
  axisRatio: 1,
  startTime: 0,
}

/** Core radius over ring radius up to which a ring is placed by hand: the range of the thin-core law. */
const THICKEST = 0.3

/** Time over which rings of this size and strength show what they do: some tens of their radii of way. */
function usualSpan(radius: number, speed: number): Pick<WakeSection, 'duration' | 'outputStep'> {
  const duration = rounded((30 * radius) / speed)
  return { duration, outputStep: rounded(duration / 200) }
}

/** To one of 1, 2, 5 times a power of ten. */
function rounded(value: number): number {
  const decade = 10 ** Math.floor(Math.log10(value))
  const step = [5, 2, 1].find((candidate) => candidate * decade <= value * (1 + 1e-9)) ?? 1
  return Number((step * decade).toPrecision(1))
}

/** Two digits, as one would type it. */
function typed(value: number): number {
  return Number(value.toPrecision(2))
}

/** Follow the rings of the pulse. A first train is three pulses with as long a rest as the stroke. */
export function startTrain(plan: Plan, pulse: PulseResult | null): Plan {
  const ring = pulse?.ring ?? null
  const train = plan.train ?? { pulses: 3, period: pulse === null ? 1 : typed(2 * pulse.duration) }
  const following = setTrain(setWake(plan, { rings: [] }), train)
  if (plan.wake !== null || ring === null) return following
  const span = usualSpan(ring.radius, ring.speed)
  const needed = pulse === null ? 0 : train.pulses * train.period + pulse.duration
  const duration = rounded(Math.max(span.duration, 2 * needed))
  return setWake(following, { duration, outputStep: rounded(duration / 200) })
}

/** Place rings by hand: those held from before, or one like the ring of the pulse and a second behind it. */
export function startByHand(plan: Plan, pulse: PulseResult | null, held: readonly WakeRing[]): Plan {
  if (held.length > 0) return setWake(plan, { rings: held })
  const made = pulse?.ring ?? null
  const radius = made === null ? PLAIN_RING.radius : typed(made.radius)
  const first: WakeRing = {
    ...PLAIN_RING,
    radius,
    circulation: made === null ? PLAIN_RING.circulation : typed(made.circulation),
    coreRadius: made === null ? PLAIN_RING.coreRadius : typed(Math.min(THICKEST * radius, made.meanCoreRadius)),
  }
  return withRings(plan, [first, nextRing([first])])
}

/** The plan with its list of rings; a wake that begins with them lasts as long as the first needs to show what it does. */
export function withRings(plan: Plan, rings: readonly WakeRing[]): Plan {
  const [first] = rings
  if (plan.wake !== null || first === undefined) return setWake(plan, { rings })
  return setWake(plan, { rings, ...usualSpan(first.radius, Math.abs(first.circulation) / (4 * first.radius)) })
}

/** A ring like the last, two radii ahead of it the way it faces. */
export function nextRing(rings: readonly WakeRing[]): WakeRing {
  return placedClear(rings.at(-1) ?? PLAIN_RING, rings)
}

/** The rings with copies of some after the last of them, each moved on until no two coincide. */
export function duplicated(rings: readonly WakeRing[], which: readonly number[]): readonly WakeRing[] {
  const next = [...rings]
  for (const index of which) {
    const ring = rings[index]
    if (ring !== undefined) next.push(placedClear(ring, next))
  }
  return next
}

/** A ring moved on by two radii, as often as it takes to stand clear of all centres. */
function placedClear(ring: WakeRing, others: readonly WakeRing[]): WakeRing {
  const step = 2 * ring.radius
  for (let steps = 1; ; steps++) {
    const centre = ahead(ring, steps * step)
    const near = others.some(
      (other) => Math.hypot(...centre.map((value, axis) => value - (other.centre[axis] ?? 0))) < step / 2,
    )
    // More steps than rings: one of them was clear.
    if (!near || steps > others.length) return { ...ring, centre }
  }
}

function ahead({ centre, direction }: WakeRing, by: number): WakeRing['centre'] {
  const share = by / (Math.hypot(...direction) || 1)
  const moved = centre.map((value, axis) => Number((value + share * (direction[axis] ?? 0)).toPrecision(12)))
  return [moved[0] ?? 0, moved[1] ?? 0, moved[2] ?? 0]
}

/** A list with some rows moved one place. */
export function moved<T>(list: readonly T[], rows: readonly number[], by: 1 | -1): readonly T[] {
  const next = [...list]
  const order = by < 0 ? rows : [...rows].reverse()
  for (const row of order) {
    const [one] = next.splice(row, 1)
    if (one !== undefined) next.splice(row + by, 0, one)
  }
  return next
}
