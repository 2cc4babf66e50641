/**
 * The shed vortex sheet: a chain of nodes from its tip to the lip, and the filaments that have been cut loose from it. Scaled by
 * exit diameter and peak speed.
 *
 * The chain carries the circulation shed before each node, so that the sheet can be refined without changing what it holds. Loose
 * filaments come first in the arrays, then the chain from its tip on; the last node is held at the lip.
 */
import { TUBE_RADIUS } from './tubeWall'

/** A midpoint is put in where neighbours are farther apart than this over delta. */
const LONGEST_GAP = 0.4
/** Loose filaments of one sign in one cell of this over delta become one. */
const MERGE_CELL = 0.35
/** Share of the chain that is cut loose when the count passes its limit. */
const CUT_SHARE = 1 / 3

export interface SheetOptions {
  readonly delta: number
  /** Filaments, above which the oldest are merged. */
  readonly limit: number
}

export class Sheet {
  x: Float64Array
  r: Float64Array
  /** Circulation of each filament; of the chain written by `weigh`. */
  circulation: Float64Array
  /** When it was shed. */
  birth: Float64Array
  /** Circulation shed before a node; meaningful for the chain. */
  shed: Float64Array
  looseCount = 0
  count = 0
  inserted = 0
  merges = 0
  /** Filaments that merging has taken away. */
  merged = 0
  mostFilaments = 0

  constructor(private readonly options: SheetOptions) {
    const capacity = options.limit + 512
    this.x = new Float64Array(capacity)
    this.r = new Float64Array(capacity)
    this.circulation = new Float64Array(capacity)
    this.birth = new Float64Array(capacity)
    this.shed = new Float64Array(capacity)
    this.append(0, TUBE_RADIUS, 0, 0)
  }

  /** Place of the node at the lip. */
  get lip(): number {
    return this.count - 1
  }

  /** Circulation shed so far. */
  get totalShed(): number {
    return this.shed[this.count - 1] ?? NaN
  }

  /** A copy of the node at the lip leaves it: the old one may move, the new one is held. */
  release(time: number): void {
    this.birth[this.lip] = time
    this.append(0, TUBE_RADIUS, this.totalShed, time)
  }

  /** Circulations of the chain from what was shed before each node, halfway to each neighbour. */
  weigh(): void {
    const { shed, circulation, looseCount, count } = this
    const end = count - 1
    for (let i = looseCount; i <= end; i++) {
      const before = shed[i > looseCount ? i - 1 : i] ?? NaN
      const after = shed[i < end ? i + 1 : i] ?? NaN
      circulation[i] = (after - before) / 2
    }
  }

  /** Put midpoints where the chain has stretched, and merge the oldest filaments where there are too many. */
  tend(): void {
    this.refine()
    if (this.count > this.options.limit) this.cutAndMerge()
    this.weigh()
    this.mostFilaments = Math.max(this.mostFilaments, this.count)
  }

  /** Sum over the filaments of negative circulation. */
  negativeCirculation(): number {
    let sum = 0
    for (let i = 0; i < this.count; i++) sum += Math.min(0, this.circulation[i] ?? NaN)
    return sum
  }

  private append(x: number, r: number, shed: number, birth: number): void {
    if (this.count === this.x.length) this.grow(this.count * 2)
    this.x[this.count] = x
    this.r[this.count] = r
    this.shed[this.count] = shed
    this.birth[this.count] = birth
    this.circulation[this.count] = 0
    this.count++
  }

  private grow(capacity: number): void {
    const longer = (list: Float64Array): Float64Array => {
      const copy = new Float64Array(capacity)
      copy.set(list)
      return copy
    }
    this.x = longer(this.x)
    this.r = longer(this.r)
    this.circulation = longer(this.circulation)
    this.birth = longer(this.birth)
    this.shed = longer(this.shed)
  }

  private refine(): void {
    const { looseCount, count, x, r } = this
    const limit = (LONGEST_GAP * this.options.delta) ** 2
    const gaps: number[] = []
    for (let i = looseCount; i + 1 < count; i++) {
      const dx = (x[i + 1] ?? NaN) - (x[i] ?? NaN)
      const dr = (r[i + 1] ?? NaN) - (r[i] ?? NaN)
      if (dx * dx + dr * dr > limit) gaps.push(i)
    }
    if (gaps.length === 0) return
    if (count + gaps.length > this.x.length) this.grow(2 * (count + gaps.length))
    const middles = gaps.map((i) => this.middle(i))
    // From the end on, so that nothing is overwritten before it has been moved.
    let to = count + gaps.length - 1
    let gap = gaps.length - 1
    for (let i = count - 1; gap >= 0; i--, to--) {
      if (i === gaps[gap]) {
        const middle = middles[gap]
        this.x[to] = middle?.x ?? NaN
        this.r[to] = middle?.r ?? NaN
        this.shed[to] = middle?.shed ?? NaN
        this.birth[to] = middle?.birth ?? NaN
        gap--
        to--
      }
      this.x[to] = this.x[i] ?? NaN
      this.r[to] = this.r[i] ?? NaN
      this.shed[to] = this.shed[i] ?? NaN
      this.birth[to] = this.birth[i] ?? NaN
    }
    this.count += gaps.length
    this.inserted += gaps.length
  }

  /** Midpoint of the chain between node i and the next: a cubic in the chord length for the place, the mean for the rest. */
  private middle(i: number): { x: number; r: number; shed: number; birth: number } {
    const { x, r, shed, birth, looseCount, count } = this
    const before = Math.max(looseCount, i - 1)
    const after = Math.min(count - 1, i + 2)
    const chord = (a: number, b: number): number =>
      Math.hypot((x[b] ?? NaN) - (x[a] ?? NaN), (r[b] ?? NaN) - (r[a] ?? NaN))
    const inner = chord(i, i + 1)
    const left = chord(before, i)
    const right = chord(i + 1, after)
    // Hermite: the mean of the ends and an eighth of the difference of the slopes.
    const of = (list: Float64Array): number => {
      const a = list[i] ?? NaN
      const b = list[i + 1] ?? NaN
      const across = (b - a) / inner
      const atA = left > 0 ? slope((a - (list[before] ?? NaN)) / left, across, left, inner) : across
      const atB = right > 0 ? slope(across, ((list[after] ?? NaN) - b) / right, inner, right) : across
      return (a + b) / 2 + (inner / 8) * (atA - atB)
    }
    return {
      x: of(x),
      r: of(r),
      shed: ((shed[i] ?? NaN) + (shed[i + 1] ?? NaN)) / 2,
      birth: ((birth[i] ?? NaN) + (birth[i + 1] ?? NaN)) / 2,
    }
  }

  private cutAndMerge(): void {
    const { looseCount, count } = this
    const cut = looseCount + Math.floor((count - looseCount) * CUT_SHARE)
    if (cut > looseCount) {
      this.weigh()
      // The chain now begins at the node before which it is cut, whose own weight loses the half that looks back.
      const back = ((this.shed[cut] ?? NaN) - (this.shed[cut - 1] ?? NaN)) / 2
      this.looseCount = cut
      this.openPlace(cut, back)
    }
    this.mergeLoose()
    this.merges++
  }

  /** A loose filament at the place of node `cut` with the half of its weight that belonged to the part cut off. */
  private openPlace(cut: number, circulation: number): void {
    if (this.count === this.x.length) this.grow(this.count * 2)
    for (const list of [this.x, this.r, this.circulation, this.birth, this.shed])
      list.copyWithin(cut + 1, cut, this.count)
    this.circulation[cut] = circulation
    this.count++
    this.looseCount++
  }

  /** Merges loose filaments of one sign in one cell, keeping sum Gamma, sum Gamma r^2 and sum Gamma r^2 x. */
  private mergeLoose(): void {
    const cell = MERGE_CELL * this.options.delta
    const places = new Map<string, number>()
    const { x, r, circulation, birth } = this
    let kept = 0
    for (let i = 0; i < this.looseCount; i++) {
      const gamma = circulation[i] ?? NaN
      if (gamma === 0) continue
      const key = `${Math.floor((x[i] ?? NaN) / cell)} ${Math.floor((r[i] ?? NaN) / cell)} ${gamma > 0}`
      const j = places.get(key)
      if (j === undefined) {
        places.set(key, kept)
        x[kept] = x[i] ?? NaN
        r[kept] = r[i] ?? NaN
        circulation[kept] = gamma
        birth[kept] = birth[i] ?? NaN
        kept++
        continue
      }
      const old = circulation[j] ?? NaN
      const sum = old + gamma
      const square = old * (r[j] ?? NaN) ** 2 + gamma * (r[i] ?? NaN) ** 2
      const moment = old * (r[j] ?? NaN) ** 2 * (x[j] ?? NaN) + gamma * (r[i] ?? NaN) ** 2 * (x[i] ?? NaN)
      birth[j] = (old * (birth[j] ?? NaN) + gamma * (birth[i] ?? NaN)) / sum
      circulation[j] = sum
      x[j] = moment / square
      r[j] = Math.sqrt(square / sum)
    }
    const gone = this.looseCount - kept
    for (const list of [x, r, circulation, birth, this.shed]) list.copyWithin(kept, this.looseCount, this.count)
    this.looseCount = kept
    this.count -= gone
    this.merged += gone
  }
}

/** Slope at a point between two chords, each with its length: that of the parabola through the three points. */
function slope(first: number, second: number, firstLength: number, secondLength: number): number {
  return (first * secondLength + second * firstLength) / (firstLength + secondLength)
}
