/**
 * An exit speed that is a polynomial of degree two or less piece by piece, with its exact moments.
 *
 * Straight pieces are closed shapes and speed tables; quadratic ones are the slope of a cubic through positions.
 */
import { at, bracket, bracketedRoot, gaussLegendre, last } from '../base'
import { NO_MOMENTS, type Moments } from './moments'

/** Speed c0 + c1 s + c2 s^2 with s the time since the start of the piece [s]. */
export interface SpeedPiece {
  readonly start: number
  readonly length: number
  readonly c0: number
  readonly c1: number
  readonly c2: number
}

/** Pieces end to end in rising time, with the moments up to each start. */
export interface SpeedPieces {
  readonly pieces: readonly SpeedPiece[]
  readonly starts: Float64Array
  readonly before: readonly Moments[]
  readonly whole: Moments
  readonly end: number
}

/** Four points are exact to degree seven; the cube of a quadratic is of degree six. */
const RULE = gaussLegendre(4)

/** Pieces with their running moments. @param pieces at least one, end to end, of positive length. */
export function joinPieces(pieces: readonly SpeedPiece[]): SpeedPieces {
  const before: Moments[] = []
  let sum = NO_MOMENTS
  for (const piece of pieces) {
    before.push(sum)
    sum = add(sum, pieceMoments(piece, piece.length))
  }
  const end = last(pieces).start + last(pieces).length
  return { pieces, starts: Float64Array.from([...pieces.map((piece) => piece.start), end]), before, whole: sum, end }
}

/** Straight pieces through speeds at rising times; a repeated time is a jump. */
export function straightPieces(times: readonly number[], speeds: readonly number[]): SpeedPiece[] {
  const pieces: SpeedPiece[] = []
  for (let i = 0; i + 1 < times.length; i++) {
    const start = at(times, i)
    const length = at(times, i + 1) - start
    const c0 = at(speeds, i)
    if (length > 0) pieces.push({ start, length, c0, c1: (at(speeds, i + 1) - c0) / length, c2: 0 })
  }
  return pieces
}

/** Speed at a time; 0 before the first piece and after the last, the inner value at both ends. */
export function speedOfPieces(joined: SpeedPieces, time: number): number {
  if (time < at(joined.starts, 0) || time > joined.end) return 0
  const piece = at(joined.pieces, bracket(joined.starts, time))
  // A monotone table keeps the speed at or above zero; what is below is rounding.
  return Math.max(0, speedOfPiece(piece, time - piece.start))
}

/** Moments from the first piece to a time. */
export function momentsOfPieces(joined: SpeedPieces, time: number): Moments {
  if (time <= at(joined.starts, 0)) return NO_MOMENTS
  if (time >= joined.end) return joined.whole
  const i = bracket(joined.starts, time)
  const piece = at(joined.pieces, i)
  return add(at(joined.before, i), pieceMoments(piece, time - piece.start))
}

/** Highest speed and the first time it is reached. */
export function peakOfPieces(joined: SpeedPieces): { readonly speed: number; readonly time: number } {
  let speed = 0
  let time = at(joined.starts, 0)
  for (const piece of joined.pieces) {
    const top = topOfPiece(piece)
    const value = speedOfPiece(piece, top)
    // A later piece that only repeats the value to rounding is not a new peak.
    if (value > speed * (1 + 1e-14)) {
      speed = value
      time = piece.start + top
    }
  }
  return { speed, time }
}

/** First time at which a speed is reached; the end where it never is. */
export function firstTimeAtSpeed(joined: SpeedPieces, target: number): number {
  for (const piece of joined.pieces) {
    if (piece.c0 >= target) return piece.start
    const top = topOfPiece(piece)
    if (speedOfPiece(piece, top) < target) continue
    return piece.start + (bracketedRoot((s) => speedOfPiece(piece, s) - target, 0, top) ?? top)
  }
  return joined.end
}

/** Times where the slope of the speed, or the speed itself, jumps: first start, last end and what lies between. */
export function cornersOfPieces(joined: SpeedPieces): number[] {
  const peak = peakOfPieces(joined).speed
  const corners = [at(joined.starts, 0)]
  for (let i = 1; i < joined.pieces.length; i++) {
    const left = at(joined.pieces, i - 1)
    const right = at(joined.pieces, i)
    const jump = Math.abs(speedOfPiece(left, left.length) - right.c0)
    // A bend counts by the speed it makes up along the shorter piece; less than this is one line written in two parts.
    const bend = Math.abs(left.c1 + 2 * left.c2 * left.length - right.c1) * Math.min(left.length, right.length)
    if (jump + bend > 1e-9 * peak) corners.push(right.start)
  }
  corners.push(joined.end)
  return corners
}

function speedOfPiece(piece: SpeedPiece, s: number): number {
  return piece.c0 + s * (piece.c1 + s * piece.c2)
}

/** Time since the start of a piece at which it is fastest. */
function topOfPiece(piece: SpeedPiece): number {
  const vertex = piece.c2 < 0 ? -piece.c1 / (2 * piece.c2) : -1
  if (vertex > 0 && vertex < piece.length) return vertex
  return speedOfPiece(piece, piece.length) > piece.c0 ? piece.length : 0
}

function pieceMoments(piece: SpeedPiece, length: number): Moments {
  const half = length / 2
  let displacement = 0
  let square = 0
  let cube = 0
  for (let i = 0; i < 4; i++) {
    const speed = speedOfPiece(piece, half * (1 + at(RULE.nodes, i)))
    const weighted = at(RULE.weights, i) * half * speed
    displacement += weighted
    square += weighted * speed
    cube += weighted * speed * speed
  }
  return { displacement, square, cube }
}

function add(a: Moments, b: Moments): Moments {
  return { displacement: a.displacement + b.displacement, square: a.square + b.square, cube: a.cube + b.cube }
}
