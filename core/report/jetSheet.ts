/**
 * The shed sheet as a line to draw: smooth through its computed nodes, in pieces of one colour step and one sense.
 */
import { at } from '../base'
import type { JetSnapshot } from '../coaxial'
import { fieldColour } from './fieldColours'

/** Colour steps from just shed to the oldest. */
export const AGE_STEPS = 20
/**
 * Ends of the colour map that keep 3 to 1 on the drawing's ground: what has just been shed is the fainter end, and the oldest, in
 * the core of the ring, the strongest.
 */
const MAP_ON_LIGHT = [0.63, 0.05] as const
const MAP_ON_DARK = [0.4, 1] as const

/** The line from the tip of the sheet to the lip. Reused from shape to shape: read `count` points, not the length. */
export interface SheetLine {
  count: number
  x: Float64Array
  r: Float64Array
  /** Age over that of the oldest, 0 to 1. */
  age: Float64Array
  /** 1 where the circulation is negative, as in a stopping vortex; else 0. */
  counter: Uint8Array
}

/** Points of one line of one look: from first to last, both drawn; neighbours share a point. */
export interface SheetRun {
  readonly first: number
  readonly last: number
  readonly step: number
  readonly counter: boolean
}

export function emptyLine(): SheetLine {
  return {
    count: 0,
    x: new Float64Array(0),
    r: new Float64Array(0),
    age: new Float64Array(0),
    counter: new Uint8Array(0),
  }
}

/** Most parts a piece between two nodes is drawn in. */
const MOST_PARTS = 6

/**
 * Lay a shape into a line, by a cubic through neighbouring nodes where they are farther apart than `finest` [m].
 *
 * @param line written over, and made longer where it must be
 */
export function layLine(line: SheetLine, shape: JetSnapshot, finest: number): void {
  const { x, r, age, circulation, looseCount } = shape
  const end = x.length - 1
  const oldest = oldestAge(shape)
  const room = Math.max(0, end - looseCount) * MOST_PARTS + 1
  if (line.x.length < room) grow(line, room)
  line.count = 0
  const put = (px: number, pr: number, page: number, counter: boolean): void => {
    line.x[line.count] = px
    line.r[line.count] = Math.max(0, pr)
    line.age[line.count] = oldest > 0 ? Math.min(1, Math.max(0, page / oldest)) : 0
    line.counter[line.count] = counter ? 1 : 0
    line.count += 1
  }
  for (let i = looseCount; i < end; i += 1) {
    const before = Math.max(looseCount, i - 1)
    const after = Math.min(end, i + 2)
    const [x1, r1, x2, r2] = [at(x, i), at(r, i), at(x, i + 1), at(r, i + 1)]
    const gap = Math.hypot(x2 - x1, r2 - r1)
    const parts = Math.max(1, Math.min(MOST_PARTS, Math.ceil(gap / finest)))
    // Tangents by the chords on both sides, so that uneven nodes make no loops.
    const [tx1, tr1] = tangent(at(x, before), at(r, before), x1, r1, x2, r2, gap)
    const [tx2, tr2] = tangent(x1, r1, x2, r2, at(x, after), at(r, after), gap)
    for (let part = 0; part < parts; part += 1) {
      const s = part / parts
      const [a, b, c, d] = [1 - s * s * (3 - 2 * s), s * s * (3 - 2 * s), s * (1 - s) * (1 - s), s * s * (s - 1)]
      put(
        a * x1 + b * x2 + c * tx1 + d * tx2,
        a * r1 + b * r2 + c * tr1 + d * tr2,
        at(age, i) + s * (at(age, i + 1) - at(age, i)),
        at(circulation, i) < 0,
      )
    }
  }
  if (end >= looseCount) put(at(x, end), at(r, end), at(age, end), at(circulation, end) < 0)
}

/** Direction at the middle of three points, times the length of the piece it is for. */
function tangent(
  xa: number,
  ra: number,
  xb: number,
  rb: number,
  xc: number,
  rc: number,
  length: number,
): readonly [number, number] {
  const [before, after] = [Math.hypot(xb - xa, rb - ra), Math.hypot(xc - xb, rc - rb)]
  if (before === 0 && after === 0) return [0, 0]
  if (before === 0) return [((xc - xb) / after) * length, ((rc - rb) / after) * length]
  if (after === 0) return [((xb - xa) / before) * length, ((rb - ra) / before) * length]
  // The nearer neighbour counts for more.
  const weight = before / (before + after)
  const slope = (a: number, b: number, c: number): number =>
    length * (((b - a) / before) * (1 - weight) + ((c - b) / after) * weight)
  return [slope(xa, xb, xc), slope(ra, rb, rc)]
}

function grow(line: SheetLine, room: number): void {
  const size = Math.ceil(room * 1.5)
  line.x = new Float64Array(size)
  line.r = new Float64Array(size)
  line.age = new Float64Array(size)
  line.counter = new Uint8Array(size)
}

/** Age of the oldest part of a shape [s]. */
export function oldestAge({ age }: JetSnapshot): number {
  return age.reduce((most, value) => Math.max(most, value), 0)
}

/** Colour step of an age over the oldest. */
export function ageStep(age: number): number {
  return Math.min(AGE_STEPS - 1, Math.max(0, Math.floor(age * AGE_STEPS)))
}

/** The line cut into runs of one look. */
export function sheetRuns(line: SheetLine): readonly SheetRun[] {
  const runs: SheetRun[] = []
  let first = 0
  for (let i = 1; i < line.count; i += 1) {
    const here = ageStep(at(line.age, i - 1))
    const counter = at(line.counter, i - 1) === 1
    const ends = i === line.count - 1 || ageStep(at(line.age, i)) !== here || (at(line.counter, i) === 1) !== counter
    if (!ends) continue
    runs.push({ first, last: i, step: here, counter })
    first = i
  }
  return runs
}

/** Colour of a step as `#rrggbb`. */
export function ageColour(step: number, dark: boolean): string {
  const [young, old] = dark ? MAP_ON_DARK : MAP_ON_LIGHT
  const share = (step + 0.5) / AGE_STEPS
  const paint = fieldColour('amount', young + (old - young) * share)
  return `#${paint.map((part) => part.toString(16).padStart(2, '0')).join('')}`
}
