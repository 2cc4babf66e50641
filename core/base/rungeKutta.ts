/**
 * Explicit Runge-Kutta stepping with error control and dense output: the pair 8(5,3) of Dormand and Prince.
 *
 * Source: E. Hairer, S. P. Norsett & G. Wanner, Solving Ordinary Differential Equations I, 2nd ed., 1993, sections II.4 to II.6.
 */
import { at } from './arrays'
import {
  DENSE_STAGES,
  DENSE_TERMS,
  ERROR_FIFTH,
  ERROR_THIRD,
  STAGES,
  STEP,
  type StageRow,
} from './dormandPrinceTableau'

/** Writes the slope of a state at a time into `out`. It must not keep or change its arguments otherwise. */
export type Derivative = (time: number, state: Float64Array, out: Float64Array) => void

export interface StepperOptions {
  readonly derivative: Derivative
  readonly time: number
  /** Copied. */
  readonly state: Float64Array
  /** Error allowed in each step over the size of a component. */
  readonly relativeTolerance: number
  /** Error allowed in each step where a component is small: one for all or one for each. */
  readonly absoluteTolerance: number | Float64Array
  /** Size of the first step tried; null lets the stepper find one. */
  readonly firstStep?: number | null
  /** No step is longer. */
  readonly longestStep?: number
}

/** Work done: accepted and rejected steps, slopes computed. */
export interface StepCounters {
  readonly steps: number
  readonly rejected: number
  readonly evaluations: number
}

/** What came of one step: taken, or given up because it became too small or the slopes are not finite numbers. */
export type StepOutcome = 'accepted' | 'too-small' | 'not-finite'

/** Order of the error estimate plus one, the exponent's denominator. */
const ERROR_ORDER = 8
const SAFETY = 0.9
/** A step changes at most by these factors. */
const SMALLEST_FACTOR = 0.333
const LARGEST_FACTOR = 6
/** Share of the previous error in the choice of the next step: it calms the step where stability limits it. */
const MEMORY = 0.04
/** A step shorter than this many units in the last place of the time cannot advance it. */
const SMALLEST_STEP_ULPS = 16
const STAGE_COUNT = 16

/** One initial value problem, advanced step by step, forwards or backwards in time. */
export class RungeKuttaStepper {
  private readonly derivative: Derivative
  private readonly relative: number
  private readonly absolute: Float64Array
  private readonly slopes: Float64Array[]
  private readonly terms: Float64Array[]
  private readonly trial: Float64Array
  private before: Float64Array
  private now: Float64Array
  private nowTime: number
  private beforeTime: number
  private next: number | null
  private readonly longest: number
  private memory = 1e-4
  private denseReady = false
  private accepted = 0
  private rejections = 0
  private slopeCount = 0

  constructor(options: StepperOptions) {
    const n = options.state.length
    this.derivative = options.derivative
    this.relative = options.relativeTolerance
    this.absolute =
      typeof options.absoluteTolerance === 'number'
        ? new Float64Array(n).fill(options.absoluteTolerance)
        : options.absoluteTolerance.slice()
    this.slopes = Array.from({ length: STAGE_COUNT }, () => new Float64Array(n))
    this.terms = Array.from({ length: 7 }, () => new Float64Array(n))
    this.trial = new Float64Array(n)
    this.before = options.state.slice()
    this.now = options.state.slice()
    this.nowTime = options.time
    this.beforeTime = options.time
    this.next = options.firstStep ?? null
    this.longest = options.longestStep ?? Infinity
    this.slope(this.nowTime, this.now, 12)
  }

  get time(): number {
    return this.nowTime
  }

  /** Start of the last accepted step. */
  get previousTime(): number {
    return this.beforeTime
  }

  /** State at `time`; valid until the next step, not to be changed. */
  get state(): Float64Array {
    return this.now
  }

  /** Size the next step would have, for a stepper that takes over; null before the first. */
  get nextStep(): number | null {
    return this.next
  }

  get counters(): StepCounters {
    return { steps: this.accepted, rejected: this.rejections, evaluations: this.slopeCount }
  }

  /** Take one step that ends at or before the limit. */
  step(limit: number): StepOutcome {
    const work = this.stepInParts(limit)
    for (;;) {
      const { done, value } = work.next()
      if (done === true) return value
    }
  }

  /** The same as `step`, handing control back after every slope so that a costly one can be interrupted. */
  *stepInParts(limit: number): Generator<void, StepOutcome> {
    const direction = limit >= this.nowTime ? 1 : -1
    const start = this.slopes[0]
    if (start === undefined) return 'too-small'
    start.set(at(this.slopes, 12))
    this.denseReady = false
    if (!allFinite(start)) return 'not-finite'
    this.next ??= this.firstGuess(direction)
    let size = Math.min(Math.abs(this.next), this.longest)
    let wasRejected = false
    for (;;) {
      const room = Math.abs(limit - this.nowTime)
      const whole = size >= room
      if (whole) size = room
      if (size <= SMALLEST_STEP_ULPS * Number.EPSILON * Math.abs(this.nowTime)) {
        if (!whole) return 'too-small'
        // The limit is here to within rounding.
        this.before.set(this.now)
        this.beforeTime = this.nowTime
        this.nowTime = limit
        return 'accepted'
      }
      const signed = direction * size
      for (let stage = 1; stage <= 11; stage++) {
        const row = at(STAGES, stage - 1)
        this.combine(this.now, row, signed, this.trial)
        this.slope(this.nowTime + row.node * signed, this.trial, stage)
        yield
      }
      this.combine(this.now, STEP, signed, this.trial)
      const error = this.errorNorm(signed)
      if (error <= 1) {
        const end = whole ? limit : this.nowTime + signed
        this.slope(end, this.trial, 12)
        yield
        this.accept(end)
        const factor = clampFactor(SAFETY * error ** (-1 / ERROR_ORDER + 0.2 * MEMORY) * this.memory ** MEMORY)
        this.memory = Math.max(error, 1e-4)
        const grown = size * (wasRejected ? Math.min(factor, 1) : factor)
        // A step cut short by the limit says nothing against the longer one that was meant.
        this.next = whole ? Math.max(grown, Math.abs(this.next)) : grown
        return 'accepted'
      }
      this.rejections++
      wasRejected = true
      size *= Number.isFinite(error) ? Math.max(SMALLEST_FACTOR, SAFETY * error ** (-1 / ERROR_ORDER)) : 0.1
      this.next = size
    }
  }

  /**
   * State inside the last accepted step, of order 7.
   *
   * @param time between previousTime and time
   * @param out written
   */
  interpolate(time: number, out: Float64Array): void {
    const size = this.nowTime - this.beforeTime
    if (size === 0 || time === this.nowTime) {
      out.set(this.now)
      return
    }
    if (!this.denseReady) this.prepareDense(size)
    const s = (time - this.beforeTime) / size
    const rest = 1 - s
    const [f0, f1, f2, f3, f4, f5, f6] = this.terms
    if (!f0 || !f1 || !f2 || !f3 || !f4 || !f5 || !f6) return
    for (let i = 0; i < out.length; i++) {
      const inner = read(f3, i) + s * (read(f4, i) + rest * (read(f5, i) + s * read(f6, i)))
      out[i] = read(this.before, i) + s * (read(f0, i) + rest * (read(f1, i) + s * (read(f2, i) + rest * inner)))
    }
  }

  private accept(end: number): void {
    this.before.set(this.now)
    this.beforeTime = this.nowTime
    this.now.set(this.trial)
    this.nowTime = end
    this.denseReady = false
    this.accepted++
  }

  private prepareDense(size: number): void {
    DENSE_STAGES.forEach((row, i) => {
      this.combine(this.before, row, size, this.trial)
      this.slope(this.beforeTime + row.node * size, this.trial, 13 + i)
    })
    const [f0, f1, f2] = this.terms
    const first = at(this.slopes, 0)
    const final = at(this.slopes, 12)
    if (!f0 || !f1 || !f2) return
    for (let i = 0; i < f0.length; i++) {
      const change = read(this.now, i) - read(this.before, i)
      f0[i] = change
      f1[i] = size * read(first, i) - change
      f2[i] = 2 * change - size * (read(first, i) + read(final, i))
    }
    DENSE_TERMS.forEach((row, k) => this.combine(null, row, size, at(this.terms, 3 + k)))
    this.denseReady = true
  }

  private slope(time: number, state: Float64Array, stage: number): void {
    this.derivative(time, state, at(this.slopes, stage))
    this.slopeCount++
  }

  /** out = base + size * sum of weights times slopes. */
  private combine(base: Float64Array | null, row: StageRow, size: number, out: Float64Array): void {
    if (base === null) out.fill(0)
    else out.set(base)
    for (let k = 0; k < row.stages.length; k++)
      addScaled(out, at(this.slopes, at(row.stages, k)), size * at(row.weights, k))
  }

  private errorNorm(size: number): number {
    const third = at(this.terms, 0)
    const fifth = at(this.terms, 1)
    this.combine(null, ERROR_THIRD, 1, third)
    this.combine(null, ERROR_FIFTH, 1, fifth)
    let thirdSum = 0
    let fifthSum = 0
    for (let i = 0; i < this.now.length; i++) {
      const largest = Math.max(Math.abs(read(this.now, i)), Math.abs(read(this.trial, i)))
      const scale = read(this.absolute, i) + this.relative * largest
      thirdSum += (read(third, i) / scale) ** 2
      fifthSum += (read(fifth, i) / scale) ** 2
    }
    if (!Number.isFinite(thirdSum + fifthSum)) return Number.NaN
    const mixed = fifthSum + 0.01 * thirdSum
    return mixed === 0 ? 0 : (Math.abs(size) * fifthSum) / Math.sqrt(mixed * this.now.length)
  }

  /** First step from the sizes of state, slope and curvature (Hairer, Norsett & Wanner, section II.4). */
  private firstGuess(direction: number): number {
    const slope = at(this.slopes, 0)
    const stateSize = this.scaledNorm(this.now)
    const slopeSize = this.scaledNorm(slope)
    const rough = stateSize < 1e-5 || slopeSize < 1e-5 ? 1e-6 : (0.01 * stateSize) / slopeSize
    this.trial.set(this.now)
    addScaled(this.trial, slope, direction * rough)
    this.slope(this.nowTime + direction * rough, this.trial, 1)
    const change = at(this.slopes, 1)
    addScaled(change, slope, -1)
    const curvature = this.scaledNorm(change) / rough
    const largest = Math.max(slopeSize, curvature)
    const fine = largest <= 1e-15 ? Math.max(1e-6, rough * 1e-3) : (0.01 / largest) ** (1 / ERROR_ORDER)
    const guess = Math.min(100 * rough, fine)
    return Number.isFinite(guess) ? guess : rough
  }

  private scaledNorm(values: Float64Array): number {
    let sum = 0
    for (let i = 0; i < values.length; i++)
      sum += (read(values, i) / (read(this.absolute, i) + this.relative * Math.abs(read(this.now, i)))) ** 2
    return Math.sqrt(sum / Math.max(values.length, 1))
  }
}

function clampFactor(factor: number): number {
  return Math.min(LARGEST_FACTOR, Math.max(SMALLEST_FACTOR, factor))
}

function addScaled(out: Float64Array, values: Float64Array, factor: number): void {
  for (let i = 0; i < out.length; i++) out[i] = read(out, i) + factor * read(values, i)
}

function allFinite(values: Float64Array): boolean {
  for (let i = 0; i < values.length; i++) if (!Number.isFinite(read(values, i))) return false
  return true
}

/** Plain load for inner loops: this function sees one kind of array only. */
function read(list: Float64Array, index: number): number {
  return list[index] ?? Number.NaN
}
