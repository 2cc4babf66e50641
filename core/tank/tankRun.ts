/**
 * A day at the tank: everything a run needs to be told, from the pulse of the plan and the tank it is fired into.
 */
import { at, type RunStatus } from '../base'
import type { WakeAgeing } from '../coaxial'
import { computePulse, type PulseInput, type PulseResult } from '../pulse'
import { tankArrivals, type Arrivals, type TankArrival } from './arrivals'
import { clearances, type Clearance } from './clearances'
import { judgedMatrix, type CombinedInput } from './combinations'
import { imaging, type Imaging, type RingSeen } from './imaging'
import { solutionsFor, type Solution } from './inverse'
import { pistonProfile, type PistonProfile } from './profile'
import { runMatrix, type RunMatrix } from './runMatrix'
import { settling, type Settling } from './settling'
import type { TankPath } from './tankPath'
import { triggerTable, type TriggerRow } from './triggers'
import type { TankOptions, TankRunSection } from './types'
import { tankWalls, type TankWalls } from './walls'

export interface TankRunInput {
  readonly section: TankRunSection
  readonly pulse: PulseInput
  /** The pulse's own result where it is at hand; it must be that of `pulse`. */
  readonly computed?: PulseResult
  /** As the wake has it; auto: by ring Reynolds number. */
  readonly ageing: 'auto' | WakeAgeing
  /** Kind of water: its refractive index. */
  readonly water: 'fresh' | 'sea' | 'given'
  /** The day at levels of the matrix, in the order of its fields; absent: the order is not held against drive and tank. */
  readonly combined?: (values: readonly number[]) => CombinedInput
}

/** A ring that was followed: one end of the range, or the value itself, which is the first. */
export interface FollowedRing {
  readonly basis: 'adopted' | 'slug' | 'quick start'
  readonly ageing: WakeAgeing
  readonly circulation: number
  readonly reynolds: number
  /** Change of its speed by the walls over its speed without them, at birth. */
  readonly wallShare: number
}

/** Field names of the summary first. */
export interface TankRunResult {
  readonly status: RunStatus
  readonly message: string
  readonly arrivals: readonly TankArrival[]
  /** Time between the frames of a pair [s]; null where it cannot be told. */
  readonly pairInterval: number | null
  /** Frames a second; null where it cannot be told. */
  readonly frameRate: number | null
  /** Bytes of one run; null where they cannot be told. */
  readonly storage: number | null
  /** Between two runs [s]. */
  readonly settlingTime: number
  readonly clearances: readonly Clearance[]
  /** Empty without a target. */
  readonly solutions: readonly Solution[]
  readonly path: TankPath | null
  readonly rings: readonly FollowedRing[]
  readonly walls: TankWalls
  readonly wallShare: number
  readonly profile: PistonProfile
  readonly imaging: Imaging
  readonly triggers: readonly TriggerRow[]
  readonly settling: Settling
  readonly matrix: RunMatrix | null
  readonly notes: readonly string[]
}

/** Share of the work after the arrivals where a target is sought. */
const ARRIVALS_SHARE = 0.3

/**
 * Plan the tank run.
 *
 * @returns status 'done'; 'cancelled' with what was finished: stations or strokes that were not come to are left out
 * @throws {DomainError} with the plan path (tankRun…, nozzle…, programme…) of the first value that breaks its limit
 */
export async function planTankRun(input: TankRunInput, options: TankOptions = {}): Promise<TankRunResult> {
  const { section, pulse } = input
  const { nozzle } = pulse
  const computed = input.computed ?? computePulse(pulse)
  const walls = tankWalls(section, nozzle.diameter)
  const { controllerStep, drive } = section
  const profile = pistonProfile({ programme: pulse.programme, nozzle, controllerStep, drive })
  const hasTarget = section.target !== null
  const arriving = await tankArrivals(
    { ...pulse, pulse: computed, ageing: input.ageing, walls, stations: section.stations },
    withProgress(options, 0, hasTarget ? ARRIVALS_SHARE : 1),
  )
  const seen = ringsSeen(arriving)
  const pictures = imaging({
    camera: section.camera,
    stations: section.stations,
    rings: seen,
    exitSpeed: computed.peakSpeed,
    water: input.water,
    particlesPerWindow: section.practice.particlesPerWindow,
  })
  const waiting = settling({
    practice: section.practice,
    lastArrival: lastArrival(arriving.arrivals),
    jetReynolds: computed.jetReynolds,
    ringReynolds: arriving.variants.map(({ ring }) => ring.reynolds).toSorted((a, b) => a - b),
    kinematicViscosity: pulse.kinematicViscosity,
    startFormationTime: [computed.startFormationTime, profile.rounding.startFormationTime],
  })
  const triggers = triggerTable({
    trigger: section.trigger,
    lag: drive.lag,
    delay: profile.rounding.delay,
    duration: profile.duration,
    arrivals: arriving.arrivals,
    pairInterval: pictures.pairInterval,
    recording: recordingOf(pictures),
  })
  const order =
    section.matrix === null
      ? null
      : runMatrix(section.matrix, { settlingTime: waiting.settlingTime, storage: pictures.storage })
  const asked = order !== null && input.combined !== undefined && arriving.status === 'done'
  const judged = asked ? await judgedMatrix(order, input.combined, withoutProgress(options)) : order
  const solutions =
    section.target === null || arriving.status !== 'done'
      ? []
      : await solutionsFor(
          { target: section.target, pulse, drive, controllerStep, ageing: input.ageing, walls },
          withProgress(options, ARRIVALS_SHARE, 1),
        )
  const matrix = judged ?? order
  const status = options.signal?.aborted === true ? 'cancelled' : arriving.status
  return {
    status,
    message: status === 'done' ? 'Done.' : 'Cancelled: what was finished is kept.',
    arrivals: arriving.arrivals,
    pairInterval: pictures.pairInterval,
    frameRate: pictures.frameRate,
    storage: pictures.storage,
    settlingTime: waiting.settlingTime,
    clearances: clearances({
      walls,
      exitDiameter: nozzle.diameter,
      practice: section.practice.clearance,
      ring: ringForWalls(arriving),
      lastStation: lastInside(section.stations, walls),
    }),
    solutions,
    path: arriving.path,
    rings: arriving.variants.map(({ ring, basis, path, wallShare }) => ({
      basis,
      ageing: path.ageing,
      circulation: ring.circulation,
      reynolds: ring.reynolds,
      wallShare,
    })),
    walls,
    wallShare: arriving.wallShare,
    profile,
    imaging: pictures,
    triggers: triggers.rows,
    settling: waiting,
    matrix,
    notes: [...arriving.notes, ...triggers.notes, ...pictures.notes.map(({ text }) => text), ...jetNotes(input)],
  }
}

/** What the search for a target leaves standing. */
function jetNotes({ section, pulse }: TankRunInput): readonly string[] {
  if (section.target === null || pulse.overPressure !== 'computed') return []
  return [
    "The strokes and peak speeds for the target keep what the computed jet adds to the slug at the plan's own stroke and speed: compute the jet anew with the one you take.",
  ]
}

/** The combinations take little beside a search: what is told of them is in the shares about them. */
function withoutProgress({ kernel, signal, pause }: TankOptions): TankOptions {
  return {
    ...(kernel === undefined ? {} : { kernel }),
    ...(signal === undefined ? {} : { signal }),
    ...(pause === undefined ? {} : { pause }),
  }
}

function withProgress(options: TankOptions, from: number, to: number): TankOptions {
  const { onProgress } = options
  if (onProgress === undefined) return options
  return { ...options, onProgress: ({ share, what }) => onProgress({ share: from + share * (to - from), what }) }
}

/** Every ring of the range at every station; at its birth where it passes none. */
function ringsSeen({ variants }: Arrivals): readonly RingSeen[] {
  const passages = variants.flatMap(({ path }) => path.passages)
  if (passages.length > 0) return passages
  return variants.map(({ ring, path }) => ({
    time: path.birth.time,
    circulation: ring.circulation,
    radius: at(path.radius, 0),
    coreRadius: at(path.coreRadius, 0),
    speed: at(path.speed, 0),
  }))
}

function ringForWalls({ variants, path }: Arrivals): {
  readonly circulation: number
  readonly radius: number
  readonly speed: number
  readonly largestRadius: number
} | null {
  const [adopted] = variants
  if (adopted === undefined || path === null) return null
  return {
    circulation: adopted.ring.circulation,
    radius: at(adopted.path.radius, 0),
    speed: at(adopted.path.speed, 0),
    largestRadius: path.radiusHigh.reduce((a, b) => Math.max(a, b), 0),
  }
}

function lastArrival(arrivals: readonly TankArrival[]): number | null {
  const times = arrivals.flatMap(({ timeHigh }) => (timeHigh === null ? [] : [timeHigh]))
  return times.length === 0 ? null : Math.max(...times)
}

function lastInside(stations: readonly number[], walls: TankWalls): number | null {
  const inside = stations.filter((station) => station <= (walls.end ?? Infinity))
  return inside.length === 0 ? null : Math.max(...inside)
}

/** From the first frame to the last [s]. */
function recordingOf({ pairs, pairRate }: Imaging): number | null {
  return pairs === null || pairRate === null ? null : (pairs - 1) / pairRate
}
