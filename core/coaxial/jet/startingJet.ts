/**
 * The starting jet: a vortex sheet shed from the lip of a tube, as coaxial filaments, that rolls up into a ring and pinches off.
 *
 * Method after M. Nitsche & R. Krasny 1994, J. Fluid Mech. 276:139: bound rings on the wall, a smoothed kernel for everything free,
 * the Kutta rule at the lip. One constant is chosen, the averaging length of that rule (see `LIP_AVERAGE`); nothing else is fitted.
 *
 * Not in it: waves round the ring, turbulence, the boundary layer in the tube, cancellation of opposite vorticity. The smoothing makes
 * the ring 5 to 9 % slow at delta = 0.1 D, and takes energy from it: half of a young ring's at that delta.
 */
import { at, last, type RunStatus } from '../../base'
import { checkJetInput } from './checkJetInput'
import { freeFlight } from './freeFlight'
import { JetFlow } from './jetFlow'
import { jetScales, JetRecorder, type JetRow, type JetScales } from './jetRecorder'
import { meanRing } from './jetRing'
import { StepMemory, stepSheet } from './jetStep'
import { nextStep, scaleProgramme, type ScaledProgramme } from './scaledProgramme'
import { Sheet } from './sheet'
import { TubeWall } from './tubeWall'
import type { JetOptions, JetRun, JetSettings, StartingJetInput } from './types'

const DEFAULTS: Required<JetSettings> = {
  timeStep: 0.025,
  panelFactor: 1,
  filamentLimit: 1500,
  snapshotStep: 0.25,
  followTime: 0.5,
  wholeStroke: true,
  settleTime: 3,
  freeFlight: 0.25,
}
/** A step is at most this share of delta. */
const STEP_OVER_DELTA = 0.25
/** Time between two rows of the history, D / U. */
const LOOK_STEP = 0.1
/** A jet that has not let go of its ring so long after the stroke is left, D / U. */
const LEFT_AFTER = 8
/** delta^2 gained over nu times age: stands in for viscosity (our choice among 1.65 for the speed of a ring, 4 for its peak vorticity and 5.03 for its peak swirl). */
export const DELTA_GROWTH = 4.5

/**
 * Compute a starting jet.
 *
 * @returns status 'done', or 'cancelled' or 'failed' with what was computed so far
 * @throws {DomainError} with the dotted plan path of a value that breaks its limit, the programme's included
 */
export async function startingJet(input: StartingJetInput, options: JetOptions): Promise<JetRun> {
  return await new JetMarch(input, options).run()
}

class JetMarch {
  private readonly settings: Required<JetSettings>
  private readonly programme: ScaledProgramme
  private readonly scales: JetScales
  private readonly sheet: Sheet
  private readonly flow: JetFlow
  private readonly recorder: JetRecorder
  private readonly deltaGrowth: number
  private readonly longestStep: number
  private time = 0
  private steps = 0
  private strokeEnd: JetRow | null = null
  /** Progress: where the run is thought to end. */
  private expectedEnd: number

  constructor(
    private readonly input: StartingJetInput,
    private readonly options: JetOptions,
  ) {
    const compiled = checkJetInput(input)
    this.settings = { ...DEFAULTS, ...input.settings }
    const { delta, diameter } = input
    this.programme = scaleProgramme(compiled, diameter)
    this.scales = jetScales(input.density, diameter, compiled.peakSpeed)
    const reynolds = (compiled.peakSpeed * diameter) / input.kinematicViscosity
    this.deltaGrowth = input.coreGrowth ? DELTA_GROWTH / reynolds : 0
    this.longestStep = Math.min(this.settings.timeStep, STEP_OVER_DELTA * delta)
    this.sheet = new Sheet({ delta, limit: this.settings.filamentLimit })
    this.flow = new JetFlow({
      kernel: options.kernel,
      delta,
      deltaGrowth: this.deltaGrowth,
      stream: input.axialFlow / compiled.peakSpeed,
      wall: new TubeWall({ delta, panelFactor: this.settings.panelFactor }),
    })
    this.recorder = new JetRecorder(this.sheet, this.flow, options.kernel, this.programme, this.scales)
    this.expectedEnd = this.programme.duration + this.settings.settleTime
  }

  async run(): Promise<JetRun> {
    const { programme, recorder, settings } = this
    const memory = new StepMemory()
    let nextLook = LOOK_STEP
    let nextShape = settings.snapshotStep
    while (!this.over()) {
      if (await this.stopped()) return this.finish('cancelled', `Cancelled at ${this.where()}.`, null)
      const length = nextStep(this.time, this.longestStep, programme.stops)
      const end = this.time + length
      const span = {
        time: this.time,
        length,
        speedBefore: programme.after(this.time),
        speedAfter: programme.before(end),
      }
      if (!stepSheet(this.sheet, this.flow, memory, span, true))
        return this.finish('failed', `The speeds are no longer finite numbers at ${this.where()}.`, null)
      this.sheet.tend()
      this.time = end
      this.steps++
      const strokeEnds = this.strokeEnd === null && end >= programme.duration * (1 - 1e-12)
      if (end > nextLook - 1e-9 || strokeEnds) {
        const row = recorder.look(end)
        if (strokeEnds) this.strokeEnd = row
        while (nextLook <= end + 1e-9) nextLook += LOOK_STEP
      }
      if (settings.snapshotStep > 0 && end > nextShape - 1e-9) {
        recorder.keepShape(end)
        while (nextShape <= end + 1e-9) nextShape += settings.snapshotStep
      }
      this.tellProgress()
    }
    return await this.finishDone()
  }

  private over(): boolean {
    const { time, recorder, programme, settings } = this
    const { plateau, rows } = recorder
    const strokeOver = time >= programme.duration * (1 - 1e-12)
    if (plateau !== null) {
      const followed = at(rows, plateau.to).time + settings.followTime
      this.expectedEnd = settings.wholeStroke ? Math.max(programme.duration, followed) : followed
      return time >= this.expectedEnd * (1 - 1e-12)
    }
    if (!strokeOver) return false
    const left = programme.duration + Math.max(LEFT_AFTER, settings.settleTime)
    this.expectedEnd = Math.min(this.singleSince() + settings.settleTime, left)
    return time >= this.expectedEnd - 1e-9
  }

  /** Since when there has been one ring and nothing behind it: the last look at a trailing jet, or the end of the stroke. */
  private singleSince(): number {
    const jet = this.recorder.rows.findLast((row) => row.trailingJet)
    return Math.max(this.programme.duration, jet?.time ?? 0)
  }

  private async finishDone(): Promise<JetRun> {
    const { settings, recorder } = this
    if (settings.snapshotStep > 0 && last(recorder.snapshots).time < this.time * this.scales.time * (1 - 1e-9))
      recorder.keepShape(this.time)
    const result = this.outcome()
    const message = result.message(this.where())
    const drift =
      settings.freeFlight > 0
        ? await freeFlight(this.sheet, {
            kernel: this.options.kernel,
            delta: this.input.delta,
            deltaGrowth: this.deltaGrowth,
            time: this.time,
            duration: settings.freeFlight,
            timeStep: this.longestStep,
            stop: () => this.stopped(),
          })
        : null
    this.options.onProgress?.({ share: 1, what: PROGRESS })
    return { ...this.finish('done', message, result.ringRows), drift }
  }

  /** What the run showed: pinch-off, one ring, or neither. */
  private outcome(): { ringRows: readonly JetRow[] | null; message: (where: string) => string } {
    const { recorder, programme } = this
    const { plateau, rows } = recorder
    if (plateau !== null)
      return {
        ringRows: rows.slice(plateau.from, plateau.to + 1),
        message: (where) => `The ring pinched off; followed to ${where}.`,
      }
    // A billow that the ring has just drawn in may leave it again: one ring is what has stayed one.
    if (this.time >= this.singleSince() + this.settings.settleTime - 1e-9) {
      const from = Math.max(programme.duration, this.time - 1) - 1e-9
      return {
        ringRows: rows.filter((row) => row.time >= from),
        message: (where) => `One ring took everything; followed to ${where}.`,
      }
    }
    return {
      ringRows: null,
      message: (where) => `No pinch-off was seen; followed to ${where}.`,
    }
  }

  private finish(status: RunStatus, message: string, ringRows: readonly JetRow[] | null): JetRun {
    const { recorder, scales, programme, sheet, strokeEnd } = this
    const { plateau, rows } = recorder
    const pinchedRows = plateau === null ? null : rows.slice(plateau.from, plateau.to + 1)
    const ring = meanRing(pinchedRows ?? ringRows ?? [], scales)
    const reached =
      pinchedRows === null || ring === null ? null : recorder.reached(ring.circulation / scales.circulation)
    const pinched = plateau === null ? null : at(rows, plateau.to)
    const laterCirculation = rows[rows.length - 1]?.ring?.circulation ?? null
    const total = strokeEnd?.total ?? null
    return {
      status,
      message,
      delta: this.input.delta,
      time: this.time * scales.time,
      strokeRatio: programme.strokeRatio,
      history: recorder.history(),
      snapshots: recorder.snapshots,
      ring,
      trailingJet: pinchedRows !== null ? true : ringRows !== null ? false : null,
      pinchOff:
        pinched === null
          ? null
          : {
              time: pinched.time * scales.time,
              formationTime: pinched.formationTime,
              cutX: (pinched.cutX ?? NaN) * scales.length,
              takenInLater:
                laterCirculation === null || ring === null
                  ? 0
                  : laterCirculation * scales.circulation - ring.circulation,
            },
      formationNumber: reached?.formationTime ?? null,
      formationInstant: reached === null ? null : reached.time * scales.time,
      atStrokeEnd:
        total === null
          ? null
          : {
              circulation: total.circulation * scales.circulation,
              impulse: total.impulse * scales.impulse,
              energy: total.energy * scales.energy,
            },
      beyondSlug:
        total === null
          ? null
          : {
              circulation: (total.circulation - programme.square / 2) * scales.circulation,
              impulse: (total.impulse - (Math.PI / 4) * programme.square) * scales.impulse,
              energy: (total.energy - (Math.PI / 8) * programme.cube) * scales.energy,
            },
      stoppingCirculation: sheet.negativeCirculation() * scales.circulation,
      counters: {
        steps: this.steps,
        evaluations: this.flow.evaluations,
        filaments: sheet.mostFilaments,
        inserted: sheet.inserted,
        merges: sheet.merges,
        merged: sheet.merged,
      },
      drift: null,
    }
  }

  private async stopped(): Promise<boolean> {
    await this.options.pause?.()
    return this.options.signal?.aborted === true
  }

  /** The cost of a step grows with the square of what has been shed. */
  private tellProgress(): void {
    const share = Math.min(1, this.time / Math.max(this.time, this.expectedEnd)) ** 3
    this.options.onProgress?.({ share: 0.98 * share, what: PROGRESS })
  }

  private where(): string {
    const formation = this.programme.formationTime(this.time)
    return `t = ${(this.time * this.scales.time).toPrecision(4)} s, formation time ${formation.toFixed(2)}`
  }
}

const PROGRESS = 'starting jet'
