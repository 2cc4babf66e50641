/**
 * March of rings on one axis through their appearances, passes, arrivals and touches.
 */
import { at, march, RungeKuttaStepper } from '../base'
import { TURBULENT_GROWTH_RATE } from '../ring'
import { checkCoaxialInput } from './checkInput'
import { RingEvents, type RingEventOutcome } from './ringEvents'
import { RingFlow } from './ringFlow'
import { fallsOnOutput, outputTimesInside, TrajectoryWriter } from './trajectoryWriter'
import type { CoaxialOptions, CoaxialWake, CoaxialWakeInput } from './types'
import type { WakeCounters, WakeDrift, WakeEvent } from './wakeTypes'

/**
 * Rings on one axis in time.
 *
 * @param input see `CoaxialWakeInput`; refused with the plan path of the first value that breaks its limit
 * @returns status 'done' where the duration is reached or an event ends the run; 'cancelled' and 'failed' keep what was computed
 * @throws {DomainError}
 */
export async function marchCoaxialRings(input: CoaxialWakeInput, options: CoaxialOptions): Promise<CoaxialWake> {
  checkCoaxialInput(input)
  return await marchUnchecked(input, options)
}

/** As `marchCoaxialRings`, for rings a march has brought where its door would refuse them: cores grow, and rings shrink as they pass. */
export async function marchUnchecked(input: CoaxialWakeInput, options: CoaxialOptions): Promise<CoaxialWake> {
  return await new CoaxialMarch(input, options).run()
}

interface ActiveState {
  readonly time: number
  readonly state: Float64Array
}

class CoaxialMarch {
  /** Indices of the rings that have appeared, in the order of the state. */
  private active: number[] = []
  private readonly events: WakeEvent[] = []
  private readonly writer: TrajectoryWriter
  private readonly nearTold = new Set<number>()
  private counters: WakeCounters = { steps: 0, rejected: 0, evaluations: 0 }
  private drift = { circulation: 0, impulse: 0, energy: 0 }
  private limit: { time: number; reason: string } | null = null
  private stopSentence: string | null = null
  private readonly conserved: boolean

  constructor(
    private readonly input: CoaxialWakeInput,
    private readonly options: CoaxialOptions,
  ) {
    this.writer = new TrajectoryWriter(input.rings.length)
    const { viscous, kinematicViscosity, wall, tubeRadius, axialFlow } = input
    const ages = viscous && (kinematicViscosity > 0 || input.ageing === 'turbulent')
    this.conserved = !ages && wall === null && tubeRadius === null && axialFlow === 0
  }

  async run(): Promise<CoaxialWake> {
    const { rings, duration } = this.input
    const births = [...new Set(rings.map((ring) => ring.startTime))].filter((time) => time < duration)
    births.sort((a, b) => a - b)
    let now: ActiveState = { time: 0, state: new Float64Array(0) }
    for (let k = 0; k <= births.length; k++) {
      const until = births[k] ?? duration
      if (now.time < until || this.active.length > 0) {
        const result = await this.span(now, until)
        if (result.status !== null) return this.finish(result.status, result.message, result.time)
        now = { time: until, state: result.state }
      }
      if (k < births.length) now = this.admit(now.state, until)
    }
    return this.finish('done', `Done: ${duration} s.`, duration)
  }

  /** State with the rings that appear at a time. */
  private admit(state: Float64Array, time: number): ActiveState {
    const { rings } = this.input
    const before = this.active.length
    const born = rings.flatMap((ring, i) => (ring.startTime === time ? [i] : []))
    this.active = [...this.active, ...born]
    const grown = new Float64Array(4 * this.active.length)
    for (let part = 0; part < 4; part++)
      grown.set(state.subarray(part * before, (part + 1) * before), part * this.active.length)
    born.forEach((index, k) => {
      const { x, radius, coreRadius, circulation } = at(rings, index)
      const place = before + k
      grown[place] = x
      grown[this.active.length + place] = radius
      grown[2 * this.active.length + place] = coreRadius * coreRadius * radius
      grown[3 * this.active.length + place] = circulation
    })
    return { time, state: grown }
  }

  /** March the active rings to a time. status null: go on. */
  private async span(
    start: ActiveState,
    until: number,
  ): Promise<{ status: CoaxialWake['status'] | null; message: string; time: number; state: Float64Array }> {
    const { input, options } = this
    const outputTimes = outputTimesInside(start.time, until, input.outputStep)
    const outputAtStart = fallsOnOutput(start.time, input.outputStep)
    if (this.active.length === 0) {
      if (outputAtStart) this.writer.time(start.time)
      for (const time of outputTimes) this.writer.time(time)
      return { status: null, message: '', time: until, state: start.state }
    }
    const rings = this.active.map((index) => at(input.rings, index))
    const laminar = input.ageing === 'laminar'
    const flow = new RingFlow({
      ...input,
      rings,
      coreGrowth: input.viscous && laminar ? 4 * input.kinematicViscosity : 0,
      sizeGrowth: input.viscous && !laminar ? TURBULENT_GROWTH_RATE : 0,
      kernel: options.kernel,
    })
    const numbers = this.active.map((index) => index + 1)
    const watch = new RingEvents({ ...input, flow, numbers, nearTold: this.nearTold })
    const slope = new Float64Array(start.state.length)
    const write = (time: number, state: Float64Array): void => {
      flow.derivative(time, state, slope)
      this.writer.write(time, this.active, state, slope)
    }
    for (const outcome of watch.atStart(start.time, start.state)) this.take(outcome, start.time)
    if (outputAtStart || this.stopSentence !== null) write(start.time, start.state)
    if (this.stopSentence !== null)
      return { status: 'done', message: this.stopped(start.time), time: start.time, state: start.state }

    const sums = this.conserved ? new ConservedSums(flow, start.state) : null
    const stepper = new RungeKuttaStepper({
      derivative: flow.derivative,
      time: start.time,
      state: start.state,
      relativeTolerance: 0,
      absoluteTolerance: tolerances(
        start.state,
        input.tolerance,
        input.viscous && laminar ? 4 * input.kinematicViscosity : 0,
      ),
      firstStep: firstStep(start.state),
    })
    const result = await march(stepper, {
      until,
      outputTimes,
      onOutput: write,
      events: watch.functions,
      onCrossing: (crossing) => {
        this.take(watch.tell(crossing), crossing.time)
        return this.stopSentence === null ? 'continue' : 'stop'
      },
      onStep: (time, state) => {
        sums?.note(state, this.drift)
        options.onProgress?.({ share: time / input.duration, what: 'rings in motion' })
        return 'continue'
      },
      ...(options.signal === undefined ? {} : { signal: options.signal }),
      ...(options.pause === undefined ? {} : { pause: options.pause }),
    })
    this.count(stepper)
    if (result.ended === 'until') {
      if (until === input.duration && !this.writer.endsAt(until)) write(until, result.state)
      return { status: null, message: '', time: until, state: result.state }
    }
    if (!this.writer.endsAt(result.time)) write(result.time, result.state)
    const time = result.time
    if (result.ended === 'stopped') return { status: 'done', message: this.stopped(time), time, state: result.state }
    if (result.ended === 'cancelled')
      return { status: 'cancelled', message: `Cancelled at t = ${time} s.`, time, state: result.state }
    return { status: 'failed', message: result.message, time, state: result.state }
  }

  private count(stepper: RungeKuttaStepper): void {
    const { steps, rejected, evaluations } = stepper.counters
    this.counters = {
      steps: this.counters.steps + steps,
      rejected: this.counters.rejected + rejected,
      evaluations: this.counters.evaluations + evaluations,
    }
  }

  private take(outcome: RingEventOutcome, time: number): void {
    if (outcome.event !== null) this.events.push(outcome.event)
    if (outcome.limit !== null) this.limit ??= { time, reason: outcome.limit }
    this.stopSentence ??= outcome.stop
  }

  private stopped(time: number): string {
    return `Ended at t = ${time} s: ${this.stopSentence ?? ''}.`
  }

  private finish(status: CoaxialWake['status'], message: string, time: number): CoaxialWake {
    this.events.push({ time, event: 'end', rings: [], x: null, detail: message })
    this.options.onProgress?.({ share: status === 'done' ? 1 : time / this.input.duration, what: 'rings in motion' })
    const drift: WakeDrift = this.conserved ? this.drift : { circulation: null, impulse: null, energy: null }
    return {
      status,
      message,
      time,
      outputTimes: this.writer.outputTimes(),
      events: this.events,
      drift,
      counters: this.counters,
      validUntil: this.limit?.time ?? time,
      reason: this.limit?.reason ?? 'the model holds to the last time',
      trajectories: this.writer.trajectories(),
    }
  }
}

/**
 * Error allowed in a step: relative to the ring's radius for places and radii, to its own size for core volume and circulation. The core volume
 * of a thin core is held to what viscosity adds to it while the ring turns once: relative to itself alone it would be ruled by rounding.
 *
 * @param coreGrowth growth of a^2 [m2/s], 4 nu where the cores grow by it
 */
function tolerances(state: Float64Array, tolerance: number, coreGrowth: number): Float64Array {
  const count = state.length / 4
  return state.map((value, k) => {
    if (k < count) return tolerance * at(state, count + k)
    if (k < 2 * count || k >= 3 * count) return tolerance * Math.abs(value)
    const radius = at(state, k - count)
    return tolerance * Math.max(value, (coreGrowth * radius ** 3) / Math.abs(at(state, k + count)))
  })
}

/** A hundredth of the shortest R^2/Gamma: it scales with the rings and knows nothing of where the axis begins. */
function firstStep(state: Float64Array): number {
  const count = state.length / 4
  const times = Array.from({ length: count }, (_, i) => at(state, count + i) ** 2 / Math.abs(at(state, 3 * count + i)))
  return 0.01 * Math.min(...times)
}

/** The sums at the start of a span, and how far they have strayed since. */
class ConservedSums {
  private readonly impulse: number
  private readonly impulseScale: number
  private readonly energy: number
  private readonly energyScale: number

  constructor(
    private readonly flow: RingFlow,
    state: Float64Array,
  ) {
    const impulse = flow.impulse(state)
    const energy = flow.energy(state)
    this.impulse = impulse.sum
    this.impulseScale = impulse.scale
    this.energy = energy.sum
    this.energyScale = Math.max(energy.scale, Math.abs(energy.sum))
  }

  note(state: Float64Array, drift: { impulse: number; energy: number }): void {
    const impulse = Math.abs(this.flow.impulse(state).sum - this.impulse) / this.impulseScale
    const energy = Math.abs(this.flow.energy(state).sum - this.energy) / this.energyScale
    drift.impulse = Math.max(drift.impulse, impulse)
    drift.energy = Math.max(drift.energy, energy)
  }
}
