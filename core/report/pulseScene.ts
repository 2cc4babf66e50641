/**
 * The drawing of one pulse: nozzle, slug, ring, carried fluid, trailing jet and the dimensions on it, all to one scale.
 *
 * Shapes and sizes are results; where the ring stands along the axis is a convention of the drawing and is told as one.
 */
import { at } from '../base'
import { formatQuantity, formatRange, fromBase, toBase } from '../quantity'
import { steadyRingOutline, type MeridionalCurve, type SteadyRingOutline } from '../ring'
import type { NozzleInput, PulseResult, PulseRing } from '../pulse'
import { nozzleOutline } from './nozzleOutline'
import type {
  PulseSceneModel,
  SceneArrow,
  SceneBar,
  SceneCallout,
  SceneColumn,
  SceneExtent,
  SceneNozzle,
  ScenePoint,
  SceneRing,
  SceneSlug,
} from './sceneTypes'
import { tickStep } from './ticks'

export interface PulseSceneUnits {
  /** Symbol of the shown unit, for instance `mm`. */
  readonly length: string
  /** For instance `mm/s`: of the ring. */
  readonly speed: string
  /** Of the exit speed where that is shown in another unit. */
  readonly exitSpeed?: string
}

/** Farthest a ring is drawn from the exit plane, in exit diameters. */
const FARTHEST = 14
/** Gap kept between the nozzle or trailing jet and the carried fluid, in exit diameters. */
const CLEARANCE = 0.35

/**
 * Geometry of the drawing of a pulse.
 *
 * The ring is drawn at its speed times the duration of the stroke, moved on where it would cover the nozzle or the trailing jet.
 */
export function pulseScene(pulse: PulseResult, nozzle: NozzleInput, units: PulseSceneUnits): PulseSceneModel {
  const { diameter } = nozzle
  const drawn = nozzleOutline(nozzle, pulse.stroke)
  const trailingJet = trailingColumn(pulse, diameter)
  const conventions: string[] = []
  let ring: SceneRing | null = null
  let ghost: SceneRing | null = null
  if (pulse.ring !== null) {
    const outline = steadyRingOutline(pulse.ring.coreRatio)
    const place = ringPlace(pulse.ring, outline, pulse.duration, diameter, trailingJet)
    ring = sceneRing(pulse.ring, outline, place.x)
    const other = pulse.ringWithOverPressure
    ghost = other === null ? null : sceneRing(other, steadyRingOutline(other.coreRatio), place.x)
    conventions.push(place.sentence)
    if (ghost !== null) conventions.push('Dotted: the core with start over-pressure.')
  }
  if (nozzle.shape !== 'tube' || nozzle.length === 0) conventions.push('Nozzle upstream of its exit: a convention.')
  else if (nozzle.length > drawn.nozzle.length) conventions.push('Nozzle drawn shorter than it is.')
  if (drawn.slug.shortened) conventions.push('The slug is longer than drawn.')
  const speed = ring === null ? null : speedArrow(pulse, ring, diameter, units.speed)
  const extent = sceneExtent(drawn.nozzle, ring, ghost, speed, trailingJet)
  return {
    ...drawn,
    ring,
    ghost,
    speed,
    trailingJet,
    scaleBar: scaleBar(extent, diameter, units.length),
    callouts: callouts(pulse, drawn.nozzle, drawn.slug, units),
    labels: { core: 'core to scale', carried: 'fluid carried along' },
    extent,
    description: describe(pulse, nozzle, units),
    conventions,
  }
}

function sceneRing(ring: PulseRing, outline: SteadyRingOutline, x: number): SceneRing {
  const curve = (part: MeridionalCurve): ScenePoint[] =>
    Array.from(part.x, (value, index) => ({ x: x + value * ring.radius, r: at(part.r, index) * ring.radius }))
  return {
    x,
    radius: ring.radius,
    meanCoreRadius: ring.meanCoreRadius,
    coreRatio: ring.coreRatio,
    core: curve(outline.core),
    carried: curve(outline.carried),
  }
}

function ringPlace(
  ring: PulseRing,
  { core, carried }: SteadyRingOutline,
  duration: number,
  diameter: number,
  jet: SceneColumn | null,
): { readonly x: number; readonly sentence: string } {
  const half = [...core.x, ...carried.x].reduce((most, x) => Math.max(most, Math.abs(x)), 0) * ring.radius
  const clear = half + CLEARANCE * diameter + (jet?.length ?? 0)
  const farthest = Math.max(clear, FARTHEST * diameter)
  const travelled = ring.speed * duration
  if (travelled < clear)
    return { x: clear, sentence: `Ring drawn clear of the ${jet === null ? 'nozzle' : 'trailing jet'}: a convention.` }
  if (travelled > farthest)
    return { x: farthest, sentence: 'Ring drawn nearer than its speed times the stroke time: a convention.' }
  return { x: travelled, sentence: 'Ring at its speed times the stroke time: a convention.' }
}

/** What the stroke pushes out beyond the adopted formation number, as a column of its own length. */
function trailingColumn(pulse: PulseResult, diameter: number): SceneColumn | null {
  const { adopted } = pulse.formationNumber
  if (pulse.pinchedOff !== true || adopted === null) return null
  const length = Math.min((pulse.strokeRatio - adopted) * diameter, FARTHEST * diameter)
  return { length, diameter, label: 'trailing jet' }
}

/** An arrow of two exit diameters would be a ring as fast as the exit flow. */
function speedArrow(pulse: PulseResult, ring: SceneRing, diameter: number, unit: string): SceneArrow | null {
  if (pulse.ring === null) return null
  const front = [...ring.core, ...ring.carried].reduce((most, point) => Math.max(most, point.x), ring.x)
  const from = front + 0.12 * diameter
  const length = Math.max(0.35, Math.min(2, (2 * pulse.ring.speed) / pulse.peakSpeed)) * diameter
  const other = pulse.ringWithOverPressure?.speed ?? pulse.ring.speed
  const { text } = formatRange(pulse.ring.speed, other, unit)
  return { from, to: from + length, label: `${text}\u00a0${unit}` }
}

function sceneExtent(
  nozzle: SceneNozzle,
  ring: SceneRing | null,
  ghost: SceneRing | null,
  speed: SceneArrow | null,
  jet: SceneColumn | null,
): SceneExtent {
  const points = [
    ...nozzle.stations.flatMap(({ inner, outer }) => [inner, outer]),
    ...(ring === null ? [] : [...ring.core, ...ring.carried]),
    ...(ghost === null ? [] : [...ghost.core, ...ghost.carried]),
    { x: speed?.to ?? nozzle.diameter, r: 0 },
    { x: jet?.length ?? 0, r: (jet?.diameter ?? 0) / 2 },
  ]
  let [xMin, xMax, rMax] = [0, 0, 0]
  for (const { x, r } of points) {
    xMin = Math.min(xMin, x)
    xMax = Math.max(xMax, x)
    rMax = Math.max(rMax, r)
  }
  return { xMin: xMin - 0.25 * nozzle.diameter, xMax, rMax: rMax + 0.45 * nozzle.diameter }
}

/** A bar of 1, 2 or 5 in the shown unit, near a quarter of the drawing, under the ring. */
function scaleBar(extent: SceneExtent, diameter: number, unit: string): SceneBar {
  const wanted = (extent.xMax - extent.xMin) * 0.24
  const step = tickStep(fromBase(wanted, unit), 1)
  // tickStep rounds up; the next lower rung keeps the bar within the space right of the nozzle.
  const shown = step > fromBase(extent.xMax * 0.9, unit) ? tickStep(fromBase(wanted, unit) * 0.45, 1) : step
  const length = toBase(shown, unit)
  const r = -extent.rMax
  const from = Math.max(0.1 * diameter, 0)
  return { from: { x: from, r }, to: { x: from + length, r }, label: formatQuantity(length, unit, 3) }
}

function outerRadius(nozzle: SceneNozzle): number {
  return nozzle.stations.reduce((most, { outer }) => Math.max(most, outer.r), 0)
}

function callouts(pulse: PulseResult, nozzle: SceneNozzle, slug: SceneSlug, units: PulseSceneUnits): SceneCallout[] {
  const d = nozzle.diameter
  const rear = slug.outline[0]?.x ?? -d
  const below = -outerRadius(nozzle) - 0.3 * d
  const diameterAt = nozzle.shape === 'tube' ? -nozzle.length - 0.14 * d : 0.14 * d
  const exitUnit = units.exitSpeed ?? units.speed
  return [
    {
      path: 'nozzle.diameter',
      ends: 'ticks',
      from: { x: diameterAt, r: d / 2 },
      to: { x: diameterAt, r: -d / 2 },
      label: `diameter ${formatQuantity(d, units.length)}`,
    },
    {
      path: 'programme.stroke',
      ends: 'ticks',
      from: { x: rear, r: below },
      to: { x: 0, r: below },
      label: strokeLabel(slug, rear, units.length),
    },
    {
      path: 'programme.peakSpeed',
      ends: 'arrow',
      from: { x: -0.85 * d, r: 0 },
      to: { x: -0.05 * d, r: 0 },
      label: `peak ${formatQuantity(pulse.peakSpeed, exitUnit)}`,
    },
  ]
}

/** In a wide chamber the slug is shorter than the stroke it makes at the exit: both lengths are told. */
function strokeLabel(slug: SceneSlug, rear: number, unit: string): string {
  const text = `stroke ${formatQuantity(slug.stroke, unit)}`
  const wide = slug.outline.some(({ r }) => r > (slug.diameter / 2) * (1 + 1e-9))
  return wide ? `${text} (${formatQuantity(-rear, unit, 3)} in the nozzle)` : text
}

function describe(pulse: PulseResult, nozzle: NozzleInput, units: PulseSceneUnits): string {
  const shape = { tube: 'a tube', converging: 'a converging nozzle', orifice: 'an orifice' }[nozzle.shape]
  const parts = [
    `Drawing to scale: ${shape} of exit diameter ${formatQuantity(nozzle.diameter, units.length)} with a slug of ${formatQuantity(pulse.stroke, units.length)}.`,
  ]
  if (pulse.ring === null) parts.push('No ring is expected.')
  else {
    const other = pulse.ringWithOverPressure ?? pulse.ring
    const radius = formatRange(pulse.ring.radius, other.radius, units.length)
    const core = formatRange(pulse.ring.meanCoreRadius, other.meanCoreRadius, units.length)
    const speed = formatRange(pulse.ring.speed, other.speed, units.speed)
    parts.push(
      `The ring has radius ${radius.text} ${radius.unit}, core radius ${core.text} ${core.unit}, and moves away from the nozzle at ${speed.text} ${speed.unit}.`,
    )
    parts.push('Its fluid turns forward through the middle and back around the outside.')
  }
  if (pulse.pinchedOff === true) parts.push('The stroke is past pinch-off: the rest of it trails behind as a jet.')
  return parts.join(' ')
}
