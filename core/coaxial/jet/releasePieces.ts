/**
 * The shape of a jet cut into a ring and the billows behind it.
 */
import { at } from '../../base'
import { axialDensity, ringCut } from './ringCut'
import type { JetSums } from './releaseTypes'
import type { JetSnapshot } from './types'

/** Filaments of a shape, by index. */
export type Piece = readonly number[]

export interface JetPieces {
  readonly ring: Piece
  /** Downstream first. */
  readonly billows: readonly Piece[]
  readonly leftOut: Piece
}

/** A valley parts two billows where the density rises upstream of it by this share of the billow before, as for the ring itself. */
const RISE_SHARE = 0.1

/**
 * The ring is all beyond the cut. Upstream of it what turns like the ring is parted at the valleys of circulation per length; what turns the
 * other way is the stopping vortex. It sits in the mouth of the tube, half inside, and is left out: without its tube it would run
 * upstream through the piston. Where there is no jet behind the ring all upstream of it is left out.
 *
 * @param diameter [m], the scale of the smoothing
 * @returns null where nothing turns like a ring
 */
export function jetPieces(shape: JetSnapshot, diameter: number): JetPieces | null {
  const scaled = shape.x.map((x) => x / diameter)
  const density = axialDensity(scaled, shape.circulation, scaled.length)
  const cut = ringCut(density)
  if (cut === null) return null
  const valleys = cut.trailingJet ? valleysBehind(density, cut.x) : []
  const ring: number[] = []
  const leftOut: number[] = []
  const billows: number[][] = Array.from({ length: valleys.length + 1 }, () => [])
  scaled.forEach((x, i) => {
    if (x > cut.x) ring.push(i)
    else if (!cut.trailingJet || at(shape.circulation, i) <= 0) leftOut.push(i)
    else at(billows, valleys.filter((valley) => x <= valley).length).push(i)
  })
  return { ring, billows: billows.filter((billow) => billow.length > 0), leftOut }
}

/** Places of the valleys upstream of a place, downstream first. */
function valleysBehind({ start, step, values }: ReturnType<typeof axialDensity>, from: number): number[] {
  const valleys: number[] = []
  let peak = 0
  let lowest = Infinity
  let place = from
  for (let k = Math.round((start - from) / step); k < values.length; k++) {
    const value = Math.max(0, at(values, k))
    if (value < lowest) {
      lowest = value
      place = start - k * step
    }
    if (peak > 0 && value - lowest > RISE_SHARE * peak) {
      valleys.push(place)
      peak = 0
    }
    if (value > peak) {
      peak = value
      lowest = value
    }
  }
  return valleys
}

/** Sums over filaments of a shape. */
export function pieceSums(shape: JetSnapshot, piece: Piece): JetSums {
  let [circulation, square, moment] = [0, 0, 0]
  for (const i of piece) {
    const gamma = at(shape.circulation, i)
    const area = gamma * at(shape.r, i) ** 2
    circulation += gamma
    square += area
    moment += area * at(shape.x, i)
  }
  return { circulation, square, moment }
}

/** A piece cut across the axis at its middle of circulation; null where all of it would be on one side. */
export function halves(shape: JetSnapshot, piece: Piece): readonly [Piece, Piece] | null {
  let [sum, weight] = [0, 0]
  for (const i of piece) {
    sum += at(shape.circulation, i) * at(shape.x, i)
    weight += at(shape.circulation, i)
  }
  const middle = sum / weight
  const down = piece.filter((i) => at(shape.x, i) > middle)
  const up = piece.filter((i) => at(shape.x, i) <= middle)
  return down.length === 0 || up.length === 0 ? null : [down, up]
}

/** Spread of circulation along the axis about its middle, one standard deviation [m]. */
export function axialSpread(shape: JetSnapshot, piece: Piece): number {
  let [sum, square, weight] = [0, 0, 0]
  for (const i of piece) {
    const gamma = at(shape.circulation, i)
    const x = at(shape.x, i)
    sum += gamma * x
    square += gamma * x * x
    weight += gamma
  }
  return Math.sqrt(Math.max(0, square / weight - (sum / weight) ** 2))
}
