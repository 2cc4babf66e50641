/**
 * The starting jet at several smoothing lengths: its numbers with the spread that the smoothing leaves.
 *
 * The formation number is a sawtooth in delta, for the cut falls between discrete billows: it is told as a mean and a range, never as
 * one value with two decimals.
 */
import { at, type RunStatus } from '../../base'
import { compileProgramme, type ComputedJet } from '../../pulse'
import { startingJet } from './startingJet'
import type { JetOptions, JetRun, StartingJetInput } from './types'

/** Smoothing lengths of the ensemble, over D, and the one that is shown. */
export const ENSEMBLE_DELTAS = [0.08, 0.1, 0.12] as const
export const SHOWN_DELTA = 0.1
/** Strokes below this are run at the smaller delta alone: at 0.1 D half the energy of a young ring is smoothed away. */
export const SHORT_STROKE = 2
export const SHORT_STROKE_DELTA = 0.05

export interface JetEnsembleInput extends Omit<StartingJetInput, 'delta'> {
  /** True: three smoothing lengths, or one where the stroke is short; false: one. */
  readonly ensemble: boolean
  /** One smoothing length over D, whatever the stroke; null: the usual ones. */
  readonly delta: number | null
}

/** One member of the ensemble, in short. */
export interface JetByDelta {
  readonly delta: number
  readonly formationNumber: number | null
  readonly ringCirculation: number | null
  readonly ringDimensionlessEnergy: number | null
  readonly ringSpeed: number | null
}

/** Means over the members that came to their end; null, or 0 beyond the slug, where none has the value. */
export interface JetEnsemble extends ComputedJet {
  readonly status: RunStatus
  readonly message: string
  readonly byDelta: readonly JetByDelta[]
  /** Of the ring [m2/s]. */
  readonly ringCirculation: number | null
  /** Everything shed at the end of the stroke [m2/s]. */
  readonly totalCirculation: number | null
  readonly ringDimensionlessEnergy: number | null
  /** Gamma / ((I / rho)^1/3 speed^2/3) */
  readonly ringLimitingCirculation: number | null
  readonly ringSpeed: number | null
  /** When the total circulation equalled the ring's [s]. */
  readonly formationInstant: number | null
  /** When pinch-off was seen [s]. */
  readonly pinchOffTime: number | null
  /** True: a jet trails behind the ring; null where members differ or do not know. */
  readonly trailingJet: boolean | null
  /** Most filaments at any time of any member. */
  readonly filaments: number
  /** Largest of the members. */
  readonly drift: { readonly impulse: number; readonly energy: number } | null
  /** The member whose history and shapes are shown. */
  readonly shown: JetRun
  /** Every run, in the order of delta. */
  readonly runs: readonly JetRun[]
}

/** Smoothing lengths to run for a plan. */
export function ensembleDeltas(
  input: Pick<JetEnsembleInput, 'delta' | 'ensemble'>,
  strokeRatio: number,
): readonly number[] {
  if (input.delta !== null) return [input.delta]
  if (strokeRatio < SHORT_STROKE) return [SHORT_STROKE_DELTA]
  return input.ensemble ? ENSEMBLE_DELTAS : [SHOWN_DELTA]
}

/**
 * Compute the starting jet at the smoothing lengths that suit its stroke.
 *
 * @returns 'cancelled' or 'failed' where a member was: what had been computed is in it
 * @throws {DomainError} as `startingJet`
 */
export async function startingJetEnsemble(input: JetEnsembleInput, options: JetOptions): Promise<JetEnsemble> {
  const strokeRatio = compileProgramme(input.programme).stroke / input.diameter
  const deltas = ensembleDeltas(input, strokeRatio)
  // The cost of a member goes with the square of its filaments, and these with 1 / delta.
  const cost = deltas.map((delta) => delta ** -2)
  const all = cost.reduce((sum, one) => sum + one, 0)
  const runs: JetRun[] = []
  let done = 0
  for (let k = 0; k < deltas.length; k++) {
    const share = at(cost, k) / all
    const from = done
    const run = await startingJet(
      { ...input, delta: at(deltas, k) },
      {
        ...options,
        onProgress: ({ share: inside, what }) => options.onProgress?.({ share: from + share * inside, what }),
      },
    )
    runs.push(run)
    done += share
    if (run.status !== 'done') break
  }
  return summarise(runs)
}

function summarise(runs: readonly JetRun[]): JetEnsemble {
  const shown = runs.find((run) => run.delta === SHOWN_DELTA) ?? at(runs, runs.length - 1)
  const ended = runs.find((run) => run.status !== 'done')
  const complete = runs.filter((run) => run.status === 'done')
  const values = (read: (run: JetRun) => number | null): number[] =>
    complete.flatMap((run) => {
      const value = read(run)
      return value === null ? [] : [value]
    })
  const mean = (read: (run: JetRun) => number | null): number | null => {
    const list = values(read)
    return list.length === 0 ? null : list.reduce((sum, value) => sum + value, 0) / list.length
  }
  const numbers = values((run) => run.formationNumber)
  const trailing = new Set(complete.map((run) => run.trailingJet))
  const drifts = complete.flatMap((run) => (run.drift === null ? [] : [run.drift]))
  return {
    status: ended?.status ?? 'done',
    message: ended?.message ?? shown.message,
    formationNumber: mean((run) => run.formationNumber),
    formationNumberLow: numbers.length === 0 ? null : Math.min(...numbers),
    formationNumberHigh: numbers.length === 0 ? null : Math.max(...numbers),
    byDelta: runs.map((run) => ({
      delta: run.delta,
      formationNumber: run.formationNumber,
      ringCirculation: run.ring?.circulation ?? null,
      ringDimensionlessEnergy: run.ring?.dimensionlessEnergy ?? null,
      ringSpeed: run.ring?.speed ?? null,
    })),
    ringCirculation: mean((run) => run.ring?.circulation ?? null),
    totalCirculation: mean((run) => run.atStrokeEnd?.circulation ?? null),
    ringDimensionlessEnergy: mean((run) => run.ring?.dimensionlessEnergy ?? null),
    ringLimitingCirculation: mean((run) => run.ring?.limitingCirculation ?? null),
    ringSpeed: mean((run) => run.ring?.speed ?? null),
    formationInstant: mean((run) => run.formationInstant),
    pinchOffTime: mean((run) => run.pinchOff?.time ?? null),
    trailingJet: trailing.size === 1 ? (complete[0]?.trailingJet ?? null) : null,
    circulationBeyondSlug: mean((run) => run.beyondSlug?.circulation ?? null) ?? 0,
    impulseBeyondSlug: mean((run) => run.beyondSlug?.impulse ?? null) ?? 0,
    energyBeyondSlug: mean((run) => run.beyondSlug?.energy ?? null) ?? 0,
    filaments: Math.max(...runs.map((run) => run.counters.filaments)),
    drift:
      drifts.length === 0
        ? null
        : {
            impulse: Math.max(...drifts.map((drift) => drift.impulse)),
            energy: Math.max(...drifts.map((drift) => drift.energy)),
          },
    shown,
    runs,
  }
}
