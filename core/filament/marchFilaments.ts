/**
 * March of rings in space through their appearances, meshings and events.
 */
import { at, DomainError, march, RungeKuttaStepper, type MarchResult } from '../base'
import { deltaOverCore, fallsOnOutput, outputTimesInside, type WakeCounters, type WakeEvent } from '../coaxial'
import { curveSums, evenlySpaced, tangents } from './closedCurve'
import { FilamentEvents, viewRings, type FilamentEventOutcome } from './filamentEvents'
import { FilamentDrift } from './filamentDrift'
import { FilamentFlow } from './filamentFlow'
import { SplitWatch } from './splitWatch'
import { firstShape, LEAST_RATIO, NODE_LIMIT, nodeCounts, nodesNeeded, wantsMesh } from './mesh'
import { ShapeWriter } from './shapeWriter'
import type { Wake, WakeInput, WakeOptions, WakeRing, WakeWall } from './types'
import { length, unit } from './vector'

/** Memory the shapes of all outputs may take. */
const MOST_SHAPE_BYTES = 1e9

/** What the filament engine gives; the dispatcher adds which engine it was and why. */
export type FilamentWake = Omit<Wake, 'model' | 'modelReason'>

/** Short over long axis at and below which an elliptic ring splits (Dhanak & de Bernardinis 1981, J. Fluid Mech. 109:189). */
const SPLITS_BELOW = 0.2
/** Core radius over radius of the sharpest bend: above the first the run is no longer told as valid, above the second it ends. */
const KINKED = 1
const TOO_KINKED = 2.5

/** A ring in the march: its shape and what it keeps. */
interface LiveRing {
  readonly index: number
  readonly nodes: Float64Array
  /** a^2 length [m3] */
  readonly volume: number
}

/**
 * March rings in space. The input has passed `checkWakeInput`.
 *
 * @throws {DomainError} where the shapes of all outputs would not fit into the memory
 */
export async function marchFilaments(input: WakeInput, options: WakeOptions): Promise<FilamentWake> {
  checkShapes(input, options.nodeLimit ?? NODE_LIMIT)
  return await new FilamentMarch(input, options).run()
}

class FilamentMarch {
  private live: LiveRing[] = []
  private readonly events: WakeEvent[] = []
  private readonly writer: ShapeWriter
  private readonly nearTold = new Set<number>()
  private readonly sides = new Map<string, number>()
  /** Rings that split, by index. */
  private readonly slender = new Map<number, SplitWatch>()
  private readonly notes: string[] = []
  private readonly wall: WakeWall | null
  private counters: WakeCounters = { steps: 0, rejected: 0, evaluations: 0 }
  /** null where nothing is conserved. */
  private readonly drift: FilamentDrift | null
  private limit: { time: number; reason: string } | null = null
  private stopSentence: string | null = null
  private nextStep: number | null = null
  private meshings = 0

  constructor(
    private readonly input: WakeInput,
    private readonly options: WakeOptions,
  ) {
    const { wall, viscous, kinematicViscosity, axialFlow, rings } = input
    this.wall = wall === null ? null : { point: wall.point, normal: unit(wall.normal) }
    const conserved = !(viscous && kinematicViscosity > 0) && wall === null && axialFlow === 0
    this.drift = conserved ? new FilamentDrift(input.duration) : null
    this.writer = new ShapeWriter(rings.length)
    rings.forEach((ring, i) => {
      if (slenderness(ring) > SPLITS_BELOW * (1 + 1e-9)) return
      this.slender.set(i, new SplitWatch())
      this.notes.push(
        `Ring ${i + 1} has an axis ratio of ${SPLITS_BELOW} or less: such a ring splits in two (Dhanak & de Bernardinis 1981), which is not modelled; the run ends where its sides come nearest.`,
      )
    })
  }

  async run(): Promise<FilamentWake> {
    const { rings, duration } = this.input
    const births = [...new Set(rings.map((ring) => ring.startTime ?? 0))].filter((time) => time < duration)
    births.sort((a, b) => a - b)
    let time = 0
    for (let k = 0; k <= births.length; k++) {
      const until = births[k] ?? duration
      while (time < until) {
        const span = await this.span(time, until)
        time = span.time
        if (span.status !== null) return this.finish(span.status, span.message, time)
      }
      if (k < births.length) this.admit(until)
    }
    return this.finish('done', `Done: ${duration} s.`, duration)
  }

  private admit(time: number): void {
    const born = this.input.rings.flatMap((ring, index) =>
      (ring.startTime ?? 0) === time ? [{ index, nodes: firstShape(ring), coreRadius: ring.coreRadius }] : [],
    )
    this.live = [
      ...this.live,
      ...born.map(({ index, nodes, coreRadius }) => ({ index, nodes, volume: coreRadius ** 2 * sumsOf(nodes).length })),
    ]
    this.drift?.restart()
    this.nextStep = null
    this.mesh(time)
  }

  /** Mesh every live ring as its length and core need. */
  private mesh(time: number): void {
    const flow = this.flow()
    const state = this.state(flow)
    const views = viewRings(flow, state)
    const needed = views.map(({ sums, coreRadius }, i) => nodesNeeded(sums.length, flow.delta(i, coreRadius)))
    const counts = nodeCounts(needed, this.options.nodeLimit ?? NODE_LIMIT)
    this.live = this.live.map((ring, i) => {
      const { sums, coreRadius } = at(views, i)
      const count = at(counts, i)
      const ratio = (flow.delta(i, coreRadius) * count) / sums.length
      if (ratio < LEAST_RATIO)
        this.note(
          time,
          `the smoothing length of ring ${ring.index + 1} is shorter than a segment: it needs ${at(needed, i)} segments and has ${count}`,
        )
      return { ...ring, nodes: evenlySpaced(ring.nodes, count) }
    })
    this.meshings++
  }

  private flow(): FilamentFlow {
    const { rings, viscous, kinematicViscosity, axialFlow } = this.input
    return new FilamentFlow({
      rings: this.live.map(({ index, nodes }) => ({ ...at(rings, index), nodeCount: nodes.length / 3 })),
      axialFlow,
      wall: this.wall,
      coreGrowth: viscous ? 4 * kinematicViscosity : 0,
      kernel: this.options.kernel,
    })
  }

  private state(flow: FilamentFlow): Float64Array {
    const state = new Float64Array(flow.stateSize)
    this.live.forEach(({ nodes, volume }, i) => {
      state.set(nodes, 3 * at(flow.starts, i))
      state[3 * flow.nodeCount + i] = volume
    })
    return state
  }

  /** March the live rings until a time, or until one of them wants a new mesh. status null: go on. */
  private async span(
    start: number,
    until: number,
  ): Promise<{ status: Wake['status'] | null; message: string; time: number }> {
    const { input, options } = this
    const outputAtStart = fallsOnOutput(start, input.outputStep)
    const outputTimes = outputTimesInside(start, until, input.outputStep)
    if (this.live.length === 0) {
      for (const time of outputAtStart ? [start, ...outputTimes] : outputTimes) this.writer.emptyTime(time)
      return { status: null, message: '', time: until }
    }
    const flow = this.flow()
    const state = this.state(flow)
    const numbers = this.live.map(({ index }) => index + 1)
    const { wall, nearTold, sides } = this
    const watch = new FilamentEvents({
      flow,
      rings: input.rings,
      numbers,
      wall,
      nearTold,
      sides,
      stations: input.stations,
    })
    flow.updateStrides(state)
    const slope = new Float64Array(state.length)
    const write = (time: number, now: Float64Array): void => {
      flow.derivative(time, now, slope)
      this.writer.write(time, numbers, flow, now, slope)
    }
    if (outputAtStart) write(start, state)
    watch.completed(state)
    for (const outcome of watch.atStart(start, state)) this.take(outcome, start)
    this.drift?.look(flow, state, start)
    if (this.stopSentence !== null) {
      write(start, state)
      return { status: 'done', message: this.stopped(start), time: start }
    }

    const stepper = new RungeKuttaStepper({
      derivative: flow.derivative,
      time: start,
      state,
      relativeTolerance: 0,
      absoluteTolerance: this.tolerances(flow, state),
      firstStep: this.nextStep ?? this.firstStep(flow, state),
    })
    let wanted = false
    const result = await march(stepper, {
      until,
      outputTimes,
      onOutput: write,
      events: watch.functions,
      onCrossing: (crossing) => {
        this.take(watch.tell(crossing), crossing.time)
        return this.stopSentence === null ? 'continue' : 'stop'
      },
      onStep: (time, now) => {
        this.events.push(...watch.completed(now))
        flow.updateStrides(now)
        this.drift?.look(flow, now, time)
        options.onProgress?.({ share: time / input.duration, what: 'rings in motion' })
        this.watchShapes(flow, now, time)
        wanted = this.stopSentence === null && this.wantsMesh(flow, now, time)
        return wanted || this.stopSentence !== null ? 'stop' : 'continue'
      },
      pauseWithinSteps: true,
      ...(options.signal === undefined ? {} : { signal: options.signal }),
      ...(options.pause === undefined ? {} : { pause: options.pause }),
    })
    this.count(stepper)
    this.nextStep = stepper.nextStep
    this.keep(flow, result)
    return this.after(result, wanted, until, write)
  }

  private after(
    result: MarchResult,
    wanted: boolean,
    until: number,
    write: (time: number, state: Float64Array) => void,
  ): { status: Wake['status'] | null; message: string; time: number } {
    const { time } = result
    const goesOn = result.ended === 'until' || (result.ended === 'stopped' && this.stopSentence === null)
    if (goesOn && wanted) this.mesh(time)
    if (goesOn && time < this.input.duration)
      return { status: null, message: '', time: result.ended === 'until' ? until : time }
    if (!this.writer.endsAt(time)) write(time, result.state)
    if (goesOn) return { status: null, message: '', time }
    if (result.ended === 'stopped') return { status: 'done', message: this.stopped(time), time }
    if (result.ended === 'cancelled') return { status: 'cancelled', message: `Cancelled at t = ${time} s.`, time }
    return { status: 'failed', message: result.message, time }
  }

  /** Take shapes and cores over from the end of a march. */
  private keep(flow: FilamentFlow, result: MarchResult): void {
    this.live = this.live.map((ring, i) => ({
      ...ring,
      nodes: flow.nodes(result.state, i).slice(),
      volume: flow.volume(result.state, i),
    }))
  }

  private wantsMesh(flow: FilamentFlow, state: Float64Array, time: number): boolean {
    let wanted = false
    for (let ring = 0; ring < flow.count; ring++) {
      const sums = flow.sums(state, ring)
      const delta = flow.delta(ring, flow.coreRadius(state, ring, sums))
      const nodes = flow.nodes(state, ring).length / 3
      const needed = nodesNeeded(sums.length, delta)
      const { longestSegment: longest, shortestSegment: shortest } = sums
      if (!wantsMesh({ delta, longest, shortest, nodes, needed })) continue
      // A ring that the node limit holds coarse is meshed again only to even it out.
      const limited = flow.nodeCount >= 0.98 * (this.options.nodeLimit ?? NODE_LIMIT)
      if (limited && longest < 1.5 * shortest) {
        if (delta < LEAST_RATIO * longest)
          this.note(time, `the smoothing length of ring ${at(this.live, ring).index + 1} is shorter than a segment`)
        continue
      }
      wanted = true
    }
    return wanted
  }

  /** Kinks sharper than the core is wide, and slender rings about to split. */
  private watchShapes(flow: FilamentFlow, state: Float64Array, time: number): void {
    this.live.forEach(({ index }, i) => {
      const sums = flow.sums(state, i)
      const kink = flow.sharpestBend(state, i) * flow.coreRadius(state, i, sums)
      const name = `ring ${index + 1}`
      const split = this.slender.get(index)
      const fate = split === undefined ? '' : '; a ring so slender splits in two (Dhanak & de Bernardinis 1981)'
      if (kink > KINKED)
        this.note(time, `${name} bends within its own core radius, which a filament cannot describe${fate}`)
      if (kink > TOO_KINKED) this.stopSentence ??= `${name} has kinked far within its own core radius${fate}`
      if (split === undefined || !split.isNearest(flow.nodes(state, i), sums)) return
      const why = `the sides of ${name} come nearest, where a ring so slender splits in two`
      this.note(time, `${why} (Dhanak & de Bernardinis 1981); reconnection is not modelled`)
      this.stopSentence ??= why
    })
  }

  private tolerances(flow: FilamentFlow, state: Float64Array): Float64Array {
    const allowed = new Float64Array(state.length)
    this.live.forEach((_ring, i) => {
      const radius = Math.sqrt(length(flow.sums(state, i).area) / Math.PI)
      flow.nodes(allowed, i).fill(this.input.tolerance * radius)
      allowed[3 * flow.nodeCount + i] = this.input.tolerance * flow.volume(state, i)
    })
    return allowed
  }

  private firstStep(flow: FilamentFlow, state: Float64Array): number {
    const times = this.live.map(({ index }, i) => {
      const { area } = flow.sums(state, i)
      return length(area) / Math.PI / Math.abs(at(this.input.rings, index).circulation)
    })
    return 0.01 * Math.min(...times)
  }

  private count(stepper: RungeKuttaStepper): void {
    const { steps, rejected, evaluations } = stepper.counters
    this.counters = {
      steps: this.counters.steps + steps,
      rejected: this.counters.rejected + rejected,
      evaluations: this.counters.evaluations + evaluations,
    }
  }

  private note(time: number, reason: string): void {
    this.limit ??= { time, reason }
  }

  private take(outcome: FilamentEventOutcome, time: number): void {
    if (outcome.event !== null) this.events.push(outcome.event)
    if (outcome.limit !== null) this.note(time, outcome.limit)
    this.stopSentence ??= outcome.stop
  }

  private stopped(time: number): string {
    return `Ended at t = ${time} s: ${this.stopSentence ?? ''}.`
  }

  private finish(status: Wake['status'], message: string, time: number): FilamentWake {
    this.events.sort((a, b) => a.time - b.time)
    this.events.push({ time, event: 'end', rings: [], x: null, detail: message })
    this.options.onProgress?.({ share: status === 'done' ? 1 : time / this.input.duration, what: 'rings in motion' })
    return {
      status,
      message,
      time,
      events: this.events,
      drift: this.drift?.found ?? { circulation: null, impulse: null, energy: null },
      counters: this.counters,
      validUntil: this.limit?.time ?? time,
      reason: this.limit?.reason ?? 'the model holds to the last time',
      notes: this.notes,
      ...this.writer.result(),
    }
  }
}

/** Refuse more shapes than can be kept. */
function checkShapes(input: WakeInput, limit: number): void {
  const needed = input.rings.map((ring) =>
    nodesNeeded(sumsOf(firstShape(ring)).length, ring.coreRadius * deltaOverCore(ring.core)),
  )
  const nodes = nodeCounts(needed, limit).reduce((sum, count) => sum + count, 0)
  const most = Math.floor(MOST_SHAPE_BYTES / (3 * Float64Array.BYTES_PER_ELEMENT * nodes))
  const outputs = Math.floor(input.duration / input.outputStep)
  if (outputs <= most) return
  throw new DomainError(
    'wake.outputStep',
    `wake.outputStep must leave at most ${most} outputs of ${nodes} segments in wake.duration, got ${outputs}`,
  )
}

function sumsOf(nodes: Float64Array): ReturnType<typeof curveSums> {
  const tangent = new Float64Array(nodes.length)
  tangents(nodes, tangent)
  return curveSums(nodes, tangent)
}

/** Short over long axis of a ring when it appears; 1 for a given curve. */
function slenderness(ring: WakeRing): number {
  const ratio = ring.curve === undefined ? (ring.axisRatio ?? 1) : 1
  return Math.min(ratio, 1 / ratio)
}
