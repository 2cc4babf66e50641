/**
 * A wake that starts from the computed jet: what each pulse lets go of, and the shapes of the sheet until then.
 */
import { at, DomainError } from '../base'
import {
  releaseJet,
  startingJetEnsemble,
  type CoaxialRing,
  type JetPinchOff,
  type JetRelease,
  type JetRun,
  type JetSnapshot,
  type WakeEvent,
} from '../coaxial'
import type { Wake } from '../filament'
import { loadKernel, type Kernel } from '../kernel'
import { JET_DEFAULTS, pulsesOverlap, type Plan, type WakeSection } from '../plan'
import type { PulseResult } from '../pulse'
import type { WaterProperties } from '../water'
import { jetInput, type JetRunOptions } from './jet'
import { createJetCache } from './jetCache'
import type { JetData } from './jetTypes'

/** How a wake began as jets: beside its rings, for drawing and for telling. */
export interface WakeJet {
  readonly pulses: number
  /** [s] */
  readonly period: number
  /** What one pulse lets go of; ring k n + i of the wake is ring i of pulse k. */
  readonly release: JetRelease
  /** When the ring was seen to pinch off; null where one ring took everything. */
  readonly pinchOff: JetPinchOff | null
  /** Centroid of the ring then [m]; null where no ring is known. */
  readonly pinchOffX: number | null
  /** Smoothing over D of the run. */
  readonly delta: number
  /** Shapes of the sheet of one pulse, up to the release. */
  readonly snapshots: readonly JetSnapshot[]
}

/** A ring that has gained or lost this share of its circulation between pinch-off and release is told. */
const TOLD_SHARE = 0.03

/**
 * The run a wake starts from: the shown smoothing length alone, since the others are read for their spread only.
 *
 * @param formed a jet of the plan that is there already, or null
 * @returns status 'cancelled' or 'failed' with what had been computed
 * @throws {DomainError} for a plan whose wake cannot start from a jet, and as `jetOf`
 */
export async function wakeJetRun(
  plan: Plan,
  section: WakeSection,
  water: WaterProperties,
  formed: JetData | null,
  options: JetRunOptions,
): Promise<JetRun> {
  refuseOthers(plan, section)
  if (formed !== null && formed.own.status === 'done') return formed.own.shown
  const whole = jetInput(plan, water)
  const single = { ...whole, ensemble: false }
  const cache = options.jetCache ?? createJetCache()
  const known = cache.find(whole) ?? cache.find(single)
  if (known !== null) return known.shown
  let most = 0
  const made = await startingJetEnsemble(single, {
    ...options,
    kernel: options.kernel ?? (await loadKernel()),
    // Where a jet ends is learnt on the way: what has been told of its progress is not taken back.
    onProgress: ({ share, what }) => {
      most = Math.max(most, share)
      options.onProgress?.({ share: most, what })
    },
  })
  if (made.status === 'done') cache.keep(single, made)
  return made.shown
}

/** @throws {DomainError} where rings do not stay on the axis of a round tube, which is all the jet knows */
function refuseOthers({ nozzle }: Plan, section: WakeSection): void {
  const why =
    section.nozzles.length > 0
      ? `the computed jet starts on the axis of one nozzle, got ${section.nozzles.length} under wake.nozzles`
      : nozzle.shape !== 'tube'
        ? `the computed jet is that of a tube, got nozzle.shape ${nozzle.shape}`
        : nozzle.axisRatio !== 1
          ? `the computed jet is that of a round tube, got nozzle.axisRatio ${nozzle.axisRatio}`
          : section.model === 'filament'
            ? 'rings of the computed jet merge on their axis, got wake.model filament'
            : section.wall !== null && !isSquare(section.wall.normal)
              ? 'rings of the computed jet merge on their axis, which a wall that is not square to it makes them leave'
              : null
  if (why !== null) throw new DomainError('wake.start', `wake.start must be matched here: ${why}`)
}

function isSquare([, y, z]: readonly [number, number, number]): boolean {
  return y === 0 && z === 0
}

/**
 * Rings of a train of jets: those of pulse k (from 0) appear at k period + the time of release.
 *
 * @throws {DomainError} where the jet let go of no ring
 */
export function jetRings(
  plan: Plan,
  water: WaterProperties,
  pulse: PulseResult,
  run: JetRun,
  kernel: Kernel,
): { readonly rings: readonly CoaxialRing[]; readonly jet: WakeJet; readonly notes: readonly string[] } {
  const { pulses, period } = plan.train ?? { pulses: 1, period: 1 }
  const release = releaseJet({
    run,
    density: water.density,
    kinematicViscosity: water.kinematicViscosity,
    diameter: plan.nozzle.diameter,
    coreGrowth: (plan.jet ?? JET_DEFAULTS).coreGrowth,
    strokeDuration: pulse.duration,
    kernel,
  })
  if (release === null)
    throw new DomainError(
      'wake.start',
      `wake.start must be matched here: the computed jet let go of no ring. ${run.message}`,
    )
  const rings = Array.from({ length: pulses }, (_, k) =>
    release.rings.map(({ circulation, radius, coreRadius, x }) => ({
      circulation,
      radius,
      coreRadius,
      core: 'uniform' as const,
      x,
      startTime: k * period + release.time,
    })),
  ).flat()
  const snapshots = run.snapshots.filter(({ time }) => time <= release.time)
  return {
    rings,
    jet: {
      pulses,
      period,
      release,
      pinchOff: run.pinchOff,
      pinchOffX: run.ring?.x ?? null,
      delta: run.delta,
      snapshots,
    },
    notes: notesOf(release, run, pulses, period, pulse.duration),
  }
}

function notesOf(
  release: JetRelease,
  run: JetRun,
  pulses: number,
  period: number,
  duration: number,
): readonly string[] {
  const billows = release.rings.length - 1
  const share = Math.abs(release.leftOut.square / release.total.square)
  const behind =
    billows === 0 ? '' : billows === 1 ? ' and the billow behind it' : ` and the ${billows} billows behind it`
  const notes = [
    `The wake starts from the computed jet at a smoothing of ${run.delta} D: its ring${behind} appear as rings ${number(release.time)} s after each pulse begins, with the circulation, impulse and centroid of the sheet. Each core gives the speed of the steady ring of the same energy; the shape of the sheet is not kept.`,
    `What stays at the lip, ${percent(share)} of the impulse, is left out: the stopping vortex and threads too weak for a ring.`,
    'Rings of the jet have thick cores and are marched under the regularised law; where cores touch they merge, with circulation, impulse and centroid kept.',
  ]
  if (Math.abs(release.takenIn) > TOLD_SHARE * at(release.rings, 0).circulation)
    notes.push(
      `Between pinch-off and release the ring ${release.takenIn > 0 ? 'swallowed' : 'lost'} ${number(Math.abs(release.takenIn))} m2/s.`,
    )
  if (pulses > 1)
    notes.push(
      `Each jet is computed alone: what earlier rings do to the sheet while it forms is left out${pulsesOverlap(period, duration) ? ', though the pulses overlap' : ''}.`,
    )
  return notes
}

function number(value: number): string {
  return String(Number(value.toPrecision(3)))
}

function percent(share: number): string {
  return share < 0.001 ? 'less than 0.1 %' : `${number(100 * Number(share.toPrecision(2)))} %`
}

/** The wake with its pinch-offs among the events, as far as it came. */
export function withPinchOffs(wake: Wake, jet: WakeJet): Wake {
  const { pinchOff, pinchOffX, release, pulses, period } = jet
  if (pinchOff === null) return wake
  const formation = pinchOff.formationTime.toFixed(2)
  const told = Array.from({ length: pulses }, (_, k): WakeEvent => {
    const number = k * release.rings.length + 1
    return {
      time: k * period + pinchOff.time,
      event: 'pinch-off',
      rings: [number],
      x: pinchOffX,
      detail: `pulse ${k + 1}, seen at formation time ${formation}; cut at x = ${Number(pinchOff.cutX.toPrecision(4))} m`,
    }
  }).filter(({ time }) => time <= wake.time)
  const ends = wake.events.filter(({ event }) => event === 'end')
  const others = wake.events.filter(({ event }) => event !== 'end')
  // Sorting keeps the order of events at one time.
  return { ...wake, events: [...[...told, ...others].sort((a, b) => a.time - b.time), ...ends] }
}
