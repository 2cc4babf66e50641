/**
 * March of an initial value problem over a span of time: outputs at given times, events located on the dense output, progress,
 * cancellation.
 */
import { at } from './arrays'
import type { CancelSignal } from './errors'
import { bracketedRoot } from './root'
import type { RungeKuttaStepper, StepOutcome } from './rungeKutta'

/** Functions whose changes of sign are events, all evaluated at once. */
export interface EventFunctions {
  readonly count: number
  /** Writes the value of every function at a time and state. */
  readonly evaluate: (time: number, state: Float64Array, out: Float64Array) => void
  /**
   * Places at which each step is looked at, its end included, default 4: two changes of sign between them are missed. 1 saves the dense
   * output, for steps far shorter than the events are apart.
   */
  readonly looks?: number
}

/** One change of sign: which function, when, to which sign, and the state there (valid during the call). */
export interface Crossing {
  readonly index: number
  readonly time: number
  readonly rising: boolean
  readonly state: Float64Array
}

export interface MarchOptions {
  /** End of the span; may lie before the stepper's time. */
  readonly until: number
  /** Times at which `onOutput` is called, in the order of the march; those outside the span are skipped. */
  readonly outputTimes?: readonly number[]
  readonly onOutput?: (time: number, state: Float64Array) => void
  readonly events?: EventFunctions
  /** Answer 'stop' to end the march at the crossing. */
  readonly onCrossing?: (crossing: Crossing) => 'continue' | 'stop'
  /** Called after every accepted step; 'stop' ends the march at its end. */
  readonly onStep?: (time: number, state: Float64Array) => 'continue' | 'stop'
  readonly signal?: CancelSignal
  /** Awaited after every step, and within a step where `pauseWithinSteps` is set: lets messages in. May return at once. */
  readonly pause?: () => Promise<void>
  readonly pauseWithinSteps?: boolean
}

/** How a march ended: at the end of its span, stopped by an event or step, cancelled, or unable to go on. */
export interface MarchResult {
  readonly ended: 'until' | 'stopped' | 'cancelled' | 'failed'
  /** Time reached. */
  readonly time: number
  /** State there. */
  readonly state: Float64Array
  /** A sentence where it failed. */
  readonly message: string
}

const USUAL_LOOKS = 4

/** March a stepper to `until`. */
export async function march(stepper: RungeKuttaStepper, options: MarchOptions): Promise<MarchResult> {
  const direction = options.until >= stepper.time ? 1 : -1
  const outputs = (options.outputTimes ?? []).filter(
    (time) => direction * (time - stepper.time) > 0 && direction * (options.until - time) >= 0,
  )
  const watch = new EventWatch(stepper, options.events ?? null)
  const inside = new Float64Array(stepper.state.length)
  let nextOutput = 0

  /** Outputs up to and including a time within the last step. */
  const writeOutputs = (upTo: number): void => {
    while (nextOutput < outputs.length && direction * (upTo - at(outputs, nextOutput)) >= 0) {
      const time = at(outputs, nextOutput++)
      stepper.interpolate(time, inside)
      options.onOutput?.(time, inside)
    }
  }

  while (direction * (options.until - stepper.time) > 0) {
    const outcome = await pausedStep(stepper, options)
    if (outcome === 'cancelled') return ended('cancelled', stepper)
    if (outcome !== 'accepted') return { ...ended('failed', stepper), message: failureSentence(outcome, stepper.time) }
    for (const crossing of watch.crossings()) {
      writeOutputs(crossing.time)
      if (options.onCrossing?.(crossing) !== 'stop') continue
      return { ended: 'stopped', time: crossing.time, state: crossing.state.slice(), message: '' }
    }
    writeOutputs(stepper.time)
    if (options.onStep?.(stepper.time, stepper.state) === 'stop') return ended('stopped', stepper)
  }
  return ended('until', stepper)
}

async function pausedStep(stepper: RungeKuttaStepper, options: MarchOptions): Promise<StepOutcome | 'cancelled'> {
  const { signal, pause, pauseWithinSteps = false } = options
  if (pause !== undefined) await pause()
  if (isAborted(signal)) return 'cancelled'
  if (!pauseWithinSteps) return stepper.step(options.until)
  const work = stepper.stepInParts(options.until)
  for (;;) {
    const { done, value } = work.next()
    if (done === true) return value
    if (pause !== undefined) await pause()
    if (isAborted(signal)) return 'cancelled'
  }
}

function ended(how: MarchResult['ended'], stepper: RungeKuttaStepper): MarchResult {
  return { ended: how, time: stepper.time, state: stepper.state.slice(), message: '' }
}

function failureSentence(outcome: StepOutcome, time: number): string {
  return outcome === 'too-small'
    ? `The time step became too small to go on at t = ${time} s.`
    : `The speeds are no longer finite numbers at t = ${time} s.`
}

/** Signs of the event functions along the march. */
class EventWatch {
  private readonly signs: Int8Array
  private readonly values: Float64Array
  private readonly state: Float64Array

  constructor(
    private readonly stepper: RungeKuttaStepper,
    private readonly events: EventFunctions | null,
  ) {
    const count = events?.count ?? 0
    this.signs = new Int8Array(count)
    this.values = new Float64Array(count)
    this.state = new Float64Array(stepper.state.length)
    if (events === null) return
    events.evaluate(stepper.time, stepper.state, this.values)
    for (let i = 0; i < count; i++) this.signs[i] = Math.sign(at(this.values, i))
  }

  /** Crossings within the last step, in the order of the march. */
  *crossings(): Generator<Crossing> {
    const { stepper, events } = this
    if (events === null) return
    const start = stepper.previousTime
    const size = stepper.time - start
    let low = start
    const looks = events.looks ?? USUAL_LOOKS
    for (let look = 1; look <= looks; look++) {
      const high = look === looks ? stepper.time : start + (look / looks) * size
      this.evaluateAt(high)
      const found: { index: number; time: number; rising: boolean }[] = []
      for (let index = 0; index < events.count; index++) {
        const sign = Math.sign(at(this.values, index))
        if (sign === 0) continue
        const before = at(this.signs, index)
        this.signs[index] = sign
        if (before !== 0 && before !== sign) found.push({ index, time: Number.NaN, rising: sign > 0 })
      }
      for (const crossing of found) crossing.time = this.locate(crossing.index, low, high)
      found.sort((a, b) => Math.sign(size) * (a.time - b.time) || a.index - b.index)
      for (const crossing of found) {
        stepper.interpolate(crossing.time, this.state)
        yield { ...crossing, state: this.state }
      }
      low = high
    }
  }

  private evaluateAt(time: number): void {
    this.stepper.interpolate(time, this.state)
    this.events?.evaluate(time, this.state, this.values)
  }

  private locate(index: number, low: number, high: number): number {
    const scratch = new Float64Array(this.values.length)
    const value = (time: number): number => {
      this.stepper.interpolate(time, this.state)
      this.events?.evaluate(time, this.state, scratch)
      return at(scratch, index)
    }
    // No root where the function was zero at the low end's look and has left it since: the crossing is there.
    return bracketedRoot(value, low, high) ?? low
  }
}

function isAborted(signal: CancelSignal | undefined): boolean {
  return signal?.aborted === true
}
