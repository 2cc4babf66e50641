/**
 * The drawing of a starting jet: the tube, the shed sheet at each computed time, the cut behind the ring.
 *
 * Both the window's drawing and the SVG writer draw from this; the sheet is the computed one, to scale.
 */
import type { JetRun, JetSnapshot } from '../coaxial'
import { formatQuantity } from '../quantity'
import type { ProgrammeInput } from '../pulse'
import type { JetSceneModel, JetSceneRing, JetSceneUnits } from './jetSceneTypes'
import { jetReading, jetTimeline, type JetTimeline } from './jetTimeline'
import type { SceneExtent, SceneNozzle } from './sceneTypes'

/** Tube drawn, in exit diameters: a convention, for the computed tube is four diameters and a solenoid beyond. */
const TUBE_SHOWN = 0.75
/** Wall drawn, in exit diameters; the computed wall has no thickness. */
const WALL = 0.05
/** Least reach of the drawing beyond the exit and from the axis, in exit diameters. */
const LEAST_REACH = 1.6
const LEAST_RADIUS = 0.72
/** Room beyond the sheet, in exit diameters. */
const ROOM = 0.12

/** @throws {DomainError} on a programme that breaks its limits */
export function jetScene(
  run: JetRun,
  programme: ProgrammeInput,
  diameter: number,
  units: JetSceneUnits,
): JetSceneModel {
  const timeline = jetTimeline(run, programme, diameter)
  return {
    diameter,
    diameterText: formatQuantity(diameter, units.length),
    nozzle: tube(diameter),
    timeline,
    shapes: run.snapshots,
    rings: run.snapshots.map(({ time }) => ringAt(run, time)),
    extent: extentOf(run.snapshots, diameter),
    units,
    conventions: [
      'Crosses: centroid of the ring.',
      ...(run.snapshots.some(({ circulation }) => circulation.some((value) => value < 0))
        ? ['Dotted: circulation of the opposite sense, as in the stopping vortex.']
        : []),
      ...(run.snapshots.some(({ looseCount }) => looseCount > 0)
        ? ['Dots: the oldest part of the sheet, merged into single rings.']
        : []),
      'Wall thickness and length of the tube: conventions.',
    ],
  }
}

function tube(diameter: number): SceneNozzle {
  const [inner, outer] = [diameter / 2, diameter / 2 + WALL * diameter]
  const station = (x: number) => ({ inner: { x, r: inner }, outer: { x, r: outer } })
  const length = TUBE_SHOWN * diameter
  return {
    shape: 'tube',
    diameter,
    wall: WALL * diameter,
    length,
    stations: [station(-length), station(-0.2 * diameter), station(0)],
  }
}

function ringAt(run: JetRun, time: number): JetSceneRing | null {
  const reading = jetReading(run, time)
  if (reading === null || reading.ringX === null || reading.ringRadius === null) return null
  return { x: reading.ringX, radius: reading.ringRadius }
}

function extentOf(shapes: readonly JetSnapshot[], diameter: number): SceneExtent {
  let [xMax, rMax] = [LEAST_REACH * diameter, LEAST_RADIUS * diameter]
  for (const { x, r } of shapes) {
    for (const value of x) xMax = Math.max(xMax, value + ROOM * diameter)
    for (const value of r) rMax = Math.max(rMax, value + ROOM * diameter)
  }
  return { xMin: -TUBE_SHOWN * diameter, xMax, rMax }
}

/** What a time of the jet is called. */
export type JetPhase = 'forming' | 'trailing' | 'pinched' | 'stopped' | 'stopped-pinched'

/**
 * Which state the jet is in at one of its shapes: filling with the sheet still one, filling with a trailing jet behind the ring,
 * pinched off, or the stroke over.
 */
export function jetPhase({ moments, strokeEnd }: JetTimeline, shape: JetSnapshot): JetPhase {
  const pinched = moments.some(({ id, time }) => id === 'pinch-off' && shape.time >= time * (1 - 1e-9))
  const stopped = shape.time > strokeEnd * (1 + 1e-9)
  if (pinched) return stopped ? 'stopped-pinched' : 'pinched'
  if (stopped) return 'stopped'
  return shape.cutX === null ? 'forming' : 'trailing'
}

/** In a word or two, for a figure. */
export function phaseInWords(phase: JetPhase): string {
  const words: Readonly<Record<JetPhase, string>> = {
    forming: 'forming',
    trailing: 'trailing jet',
    pinched: 'pinched off',
    stopped: 'stopped',
    'stopped-pinched': 'pinched off',
  }
  return words[phase]
}

/** In a sentence. */
function phaseSentence(phase: JetPhase): string {
  const words: Readonly<Record<JetPhase, string>> = {
    forming: 'all of the sheet is in one ring that still fills',
    trailing: 'a jet trails behind the ring',
    pinched: 'the ring has pinched off and takes no more',
    stopped: 'the stroke is over, and the lip sheds a stopping vortex',
    'stopped-pinched': 'the ring has pinched off, and the stroke is over',
  }
  return words[phase]
}

/** One shape in words, for those who do not see it. */
export function describeJet(model: JetSceneModel, index: number): string {
  const shape = model.shapes[index]
  if (shape === undefined) return 'No shape of the sheet has been computed.'
  const { length, time } = model.units
  const ring = model.rings[index] ?? null
  const parts = [
    `Section through the starting jet at ${formatQuantity(shape.time, time)}, formation time ${shape.formationTime.toFixed(2)}: ${phaseSentence(jetPhase(model.timeline, shape))}.`,
    `The shed sheet reaches ${formatQuantity(Math.max(...shape.x), length, 3)} from the exit plane.`,
  ]
  if (ring !== null)
    parts.push(
      `The ring is ${formatQuantity(ring.x, length, 3)} from it and has radius ${formatQuantity(ring.radius, length, 3)}.`,
    )
  if (shape.cutX !== null) parts.push(`It is cut from the trailing jet at ${formatQuantity(shape.cutX, length, 3)}.`)
  return parts.join(' ')
}
