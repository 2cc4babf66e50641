/**
 * The end of a starting jet as the beginning of a wake: the ring and the billows behind it as rings of their own.
 *
 * Circulation, impulse and its centroid are kept piece by piece, so that with what is left out at the lip the sums are those of the
 * sheet. The shape of each piece is not: a ring has a round core where the jet has a rolled sheet.
 */
import { at, last } from '../../base'
import type { Kernel } from '../../kernel'
import { matchSteadyRing } from '../../ring'
import { THICKEST_CORE } from '../checkInput'
import { coresTouch, mergeRings } from '../mergeRings'
import { coreRatioOfSpeed } from '../smoothedRing'
import { axialSpread, halves, jetPieces, pieceSums, type Piece } from './releasePieces'
import type { JetRelease, JetReleaseInput, JetSums, ReleasedRing } from './releaseTypes'
import { DELTA_GROWTH } from './startingJet'
import type { JetRun, JetSnapshot } from './types'

/** Times of the run are sums of steps. */
const SAME_TIME = 1e-9
/** A piece with a core thicker than this over its radius is cut in two, if it is long: it is a stretch of sheet rather than a ring. */
const THICK = 1
/** Long: spread of circulation along the axis over the radius. */
const LONG = 0.5
/** The last pieces upstream are scraps below this share of the ring's circulation: threads between the last billow and the lip. */
const SCRAP = 0.05
/** U R / Gamma of Hill's vortex: U = Gamma / (5 a) and R = a sqrt(2 / 5) (Lamb, Hydrodynamics, 6th ed., art. 165). */
const HILL_SPEED = Math.sqrt(2 / 5) / 5

/**
 * Rings that stand for a finished jet.
 *
 * They are released at the first kept shape at which pinch-off has been seen and the stroke is over, so that nothing is shed after it but the
 * rest of the stopping vortex; where one ring takes everything, at the end of the run.
 *
 * @returns null where the run let go of no ring: it was not finished, or no pinch-off was seen
 */
export function releaseJet(input: JetReleaseInput): JetRelease | null {
  const shape = releaseShape(input.run, input.strokeDuration)
  const pieces = shape === null ? null : jetPieces(shape, input.diameter)
  if (shape === null || pieces === null) return null
  const ring = ringOfPiece(shape, pieces.ring, input)
  const billows = pieces.billows.flatMap((billow) => ringsOfBillow(shape, billow, input))
  const kept = 1 + billows.findLastIndex(({ circulation }) => circulation > SCRAP * ring.circulation)
  const everything = Array.from(shape.x, (_, i) => i)
  const scraps = billows.slice(kept).map(sumsOfRing)
  return {
    time: shape.time,
    rings: [ring, ...joined(billows.slice(0, kept), input.kernel)].map(
      ({ circulation, radius, coreRadius, x, energyKept }) => ({
        circulation,
        radius,
        coreRadius,
        x,
        energyKept,
      }),
    ),
    total: pieceSums(shape, everything),
    leftOut: [pieceSums(shape, pieces.leftOut), ...scraps].reduce(sumOfSums),
    takenIn: ring.circulation - (input.run.ring?.circulation ?? ring.circulation),
  }
}

function sumsOfRing({ circulation, radius, x }: ReleasedRing): JetSums {
  const square = circulation * radius ** 2
  return { circulation, square, moment: square * x }
}

function sumOfSums(a: JetSums, b: JetSums): JetSums {
  return { circulation: a.circulation + b.circulation, square: a.square + b.square, moment: a.moment + b.moment }
}

function releaseShape(run: JetRun, strokeDuration: number): JetSnapshot | null {
  if (run.status !== 'done' || run.ring === null || run.snapshots.length === 0) return null
  if (run.pinchOff === null) return last(run.snapshots)
  const from = Math.max(run.pinchOff.time, strokeDuration) * (1 - SAME_TIME)
  return run.snapshots.find(({ time }) => time >= from) ?? last(run.snapshots)
}

/** With what tells whether it is long. */
interface MeasuredRing extends ReleasedRing {
  readonly spread: number
}

function ringsOfBillow(shape: JetSnapshot, piece: Piece, input: JetReleaseInput): MeasuredRing[] {
  const ring = ringOfPiece(shape, piece, input)
  if (ring.coreRadius <= THICK * ring.radius || ring.spread <= LONG * ring.radius) return [ring]
  const parts = halves(shape, piece)
  return parts === null ? [ring] : parts.flatMap((part) => ringsOfBillow(shape, part, input))
}

function ringOfPiece(shape: JetSnapshot, piece: Piece, input: JetReleaseInput): MeasuredRing {
  const { circulation, square, moment } = pieceSums(shape, piece)
  const radius = Math.sqrt(square / circulation)
  const { density } = input
  const energy = density * ownEnergy(shape, piece, input)
  const impulse = density * Math.PI * square
  const steady = energy > 0 ? matchSteadyRing({ density, circulation, impulse, energy }).ring : null
  const speed = steady === null ? (HILL_SPEED * circulation) / radius : steady.speed
  const ratio = coreRatioOfSpeed(circulation, radius, speed, input.kernel)
  return {
    circulation,
    radius,
    coreRadius: ratio * radius,
    x: moment / square,
    energyKept: steady !== null,
    spread: axialSpread(shape, piece),
  }
}

/** Energy over density of the filaments of a piece under themselves, smoothed as the run smoothed them: pi sum Gamma psi. */
function ownEnergy(shape: JetSnapshot, piece: Piece, input: JetReleaseInput): number {
  const count = piece.length
  const take = (list: Float64Array): Float64Array => Float64Array.from(piece, (i) => at(list, i))
  const growth = input.coreGrowth ? DELTA_GROWTH * input.kinematicViscosity : 0
  const delta = input.run.delta * input.diameter
  const [x, r, circulation] = [take(shape.x), take(shape.r), take(shape.circulation)]
  const deltaSquared = take(shape.age).map((age) => delta * delta + growth * age)
  const psi = new Float64Array(count)
  input.kernel.coaxialStream(
    {
      targetCount: count,
      targetX: x,
      targetR: r,
      targetDeltaSquared: deltaSquared,
      rings: { count, x, r, circulation, deltaSquared },
      skipSelf: false,
    },
    psi,
  )
  return Math.PI * psi.reduce((sum, value, i) => sum + value * at(circulation, i), 0)
}

/** Neighbours whose cores overlap as one, again and again until none do. */
function joined(billows: readonly MeasuredRing[], kernel: Kernel): readonly MeasuredRing[] {
  for (let i = 0; i + 1 < billows.length; i++) {
    const [a, b] = [at(billows, i), at(billows, i + 1)]
    const [first, second] = [
      { ...a, core: 'uniform' as const },
      { ...b, core: 'uniform' as const },
    ]
    if (!coresTouch(first, second)) continue
    const { ring } = mergeRings(first, second, kernel)
    const coreRadius = Math.min(ring.coreRadius, THICKEST_CORE * ring.radius)
    const one = { ...a, ...ring, coreRadius, energyKept: false, spread: a.spread + b.spread }
    return joined([...billows.slice(0, i), one, ...billows.slice(i + 2)], kernel)
  }
  return billows
}
