/**
 * A force log of a train of pulses: zero and drift, mean over whole periods, peak, impulse a pulse, ripple, and what the stand adds.
 */
import { at, bracket, requireRange } from '../../base'
import { resonanceOf, type StandResonance } from './forceSpectrum'
import { mean, standardDeviation } from './robust'
import type { ForceLog } from './types'

/** Samples a quiet part needs to tell the zero. */
const FEWEST_QUIET = 5
/** After the last stroke the stand is left to settle for this many strokes before it counts as quiet. */
const SETTLED_AFTER = 2
/** Where the log ends before, for fewer, as long as what follows is flat to so many standard errors. */
const SETTLED_SOONER = [1, 0.5, 0.25, 0.1] as const
const FLAT_WITHIN = 3
/**
 * Peaks are read off the mean cycle at this many phases, each a mean over this share of the period: the highest of many noisy values would be
 * too high.
 */
const PHASES = 400
const PEAK_WINDOW = 0.01

export interface ForceInput {
  /** Times from the first motion of the piston [s]. */
  readonly log: ForceLog
  /** From one pulse to the next [s]; null: one pulse, whose period is the log from its start to its end. */
  readonly period: number | null
  readonly pulses: number
  /** Of one stroke [s]. */
  readonly duration: number
  /** [Hz]; null: not told. */
  readonly standResonance: number | null
  /** Mean thrust as computed [N]; null: none. */
  readonly predictedMean: number | null
}

/** Straight line taken off the log: zero + drift x time. */
export interface ForceZero {
  /** [N] at time 0 */
  readonly zero: number
  /** [N/s] */
  readonly drift: number
  /** Samples of the quiet parts. */
  readonly samples: number
  /** Their standard deviation about the line [N]; null where there are none. */
  readonly noise: number | null
  readonly from: 'before and after' | 'before' | 'after' | 'none'
}

export interface ForceValue {
  readonly value: number
  /** null where there is one period only. */
  readonly standardError: number | null
}

export interface ForceResult {
  /** Over a whole number of periods [N]; null for one pulse, which has no period. */
  readonly mean: number | null
  /** Highest force of the mean cycle [N]. */
  readonly peak: number
  /** Of one pulse [N s]. */
  readonly impulse: number
  /** Standard errors of the three, from the scatter of the periods; null where there is one period only. */
  readonly errors: { readonly mean: number | null; readonly peak: number | null; readonly impulse: number | null }
  /** (highest - lowest) / mean, of the mean cycle; null where the mean is not above 0. */
  readonly ripple: number | null
  readonly zero: ForceZero
  readonly periods: number
  /** [s] */
  readonly period: number
  /** Mean of each period [N]. */
  readonly perPeriod: readonly { readonly mean: number }[]
  /** Force at equal phases of the period, the mean over the periods [N]. */
  readonly cycle: readonly number[]
  readonly resonance: StandResonance
  /** Measured over predicted mean: what the sizing may take over as a loss factor; null without a prediction. */
  readonly lossFactor: ForceValue | null
  readonly notes: readonly string[]
}

/**
 * @returns null where the log holds no whole period
 * @throws {DomainError} for a period or a duration outside its range
 */
export function analyseForce(input: ForceInput): ForceResult | null {
  const { log, pulses, duration } = input
  requireRange('duration', duration, { above: 0, unit: 's' })
  if (input.period !== null) requireRange('train.period', input.period, { above: 0, unit: 's' })
  const { length } = log.time
  if (length < 2) return null
  const last = at(log.time, length - 1)
  const single = input.period === null || pulses <= 1
  const period = single ? last : (input.period ?? last)
  const zero = zeroOf(log, single ? duration : (pulses - 1) * period + duration, duration)
  const corrected = Float64Array.from(log.force, (force, i) => force - zero.zero - zero.drift * at(log.time, i))
  const periods = wholePeriods(log.time, period, pulses)
  if (periods.length === 0) return null
  const sums = runningSum(log.time, corrected)
  const integral = (from: number, to: number): number =>
    upTo(log.time, corrected, sums, to) - upTo(log.time, corrected, sums, from)
  const perPeriod = periods.map((k) => ({ mean: integral(k * period, (k + 1) * period) / period }))
  const phases = periods.map((k) => phasesOf(integral, k * period, period))
  const cycle = Array.from({ length: PHASES }, (_, phase) => mean(phases.map((one) => at(one, phase))))
  const whole = valueOf(perPeriod.map((one) => one.mean))
  const top = cycle.indexOf(cycle.reduce((a, b) => Math.max(a, b)))
  const highest = valueOf(phases.map((one) => at(one, top)))
  const lowest = cycle.reduce((a, b) => Math.min(a, b))
  const first = at(periods, 0) * period
  const resonance = resonanceOf(log.time, corrected, {
    from: first,
    to: first + periods.length * period,
    period,
    given: input.standResonance,
  })
  // One pulse is held against its impulse: its mean would be over whatever the log lasts.
  const predicted = single && input.period !== null ? times(whole, period / input.period) : single ? null : whole
  const { predictedMean } = input
  return {
    mean: single ? null : whole.value,
    peak: highest.value,
    impulse: whole.value * period,
    errors: {
      mean: single ? null : whole.standardError,
      peak: highest.standardError,
      impulse: times(whole, period).standardError,
    },
    ripple: whole.value > 0 ? (highest.value - lowest) / whole.value : null,
    zero,
    periods: periods.length,
    period,
    perPeriod,
    cycle,
    resonance,
    lossFactor:
      predictedMean === null || !(predictedMean > 0) || predicted === null ? null : times(predicted, 1 / predictedMean),
    notes: [...notesOf(zero, periods.length, pulses, single), ...resonance.notes],
  }
}

function valueOf(values: readonly number[]): ForceValue {
  const scatter = standardDeviation(values)
  return { value: mean(values), standardError: scatter === null ? null : scatter / Math.sqrt(values.length) }
}

function times({ value, standardError }: ForceValue, factor: number): ForceValue {
  return { value: value * factor, standardError: standardError === null ? null : standardError * factor }
}

/** The line through what was logged before the first stroke and after the stand has settled again. */
function zeroOf({ time, force }: ForceLog, end: number, duration: number): ForceZero {
  let [count, before, after] = [0, 0, 0]
  let [sumT, sumF] = [0, 0]
  const settled = settledFrom({ time, force }, end, duration)
  const quiet = (t: number): boolean => t < 0 || t > settled
  for (let i = 0; i < time.length; i++) {
    const t = at(time, i)
    if (!quiet(t)) continue
    if (t < 0) before++
    else after++
    count++
    sumT += t
    sumF += at(force, i)
  }
  const from =
    before >= FEWEST_QUIET && after >= FEWEST_QUIET
      ? 'before and after'
      : before >= FEWEST_QUIET
        ? 'before'
        : after >= FEWEST_QUIET
          ? 'after'
          : 'none'
  if (from === 'none') return { zero: 0, drift: 0, samples: count, noise: null, from }
  const [meanT, meanF] = [sumT / count, sumF / count]
  let [across, square] = [0, 0]
  for (let i = 0; i < time.length; i++) {
    const t = at(time, i)
    if (!quiet(t)) continue
    across += (t - meanT) * (at(force, i) - meanF)
    square += (t - meanT) ** 2
  }
  // From one side alone a slope would be carried far beyond where it was seen.
  const drift = from === 'before and after' && square > 0 ? across / square : 0
  const zero = meanF - drift * meanT
  let squares = 0
  for (let i = 0; i < time.length; i++) {
    const t = at(time, i)
    if (quiet(t)) squares += (at(force, i) - zero - drift * t) ** 2
  }
  return { zero, drift, samples: count, noise: Math.sqrt(squares / Math.max(1, count - 2)), from }
}

/** From when on the stand is quiet after the last stroke [s]; infinity where it is not seen to be. */
function settledFrom({ time, force }: ForceLog, end: number, duration: number): number {
  const usual = end + SETTLED_AFTER * duration
  const after = (from: number): number[] => Array.from(force).filter((_, i) => at(time, i) > from)
  if (after(usual).length >= FEWEST_QUIET) return usual
  for (const share of SETTLED_SOONER) {
    const values = after(end + share * duration)
    const half = values.length >> 1
    if (half < FEWEST_QUIET) continue
    const [early, late] = [values.slice(0, half), values.slice(half)]
    const error = Math.hypot(standardErrorOf(early), standardErrorOf(late))
    // Exactly alike where the log is without noise.
    if (Math.abs(mean(late) - mean(early)) <= FLAT_WITHIN * error) return end + share * duration
  }
  return Number.POSITIVE_INFINITY
}

function standardErrorOf(values: readonly number[]): number {
  return (standardDeviation(values) ?? 0) / Math.sqrt(values.length)
}

/** Which of the train's periods lie wholly inside the log. */
function wholePeriods(time: Float64Array, period: number, pulses: number): number[] {
  const [first, last] = [at(time, 0), at(time, time.length - 1)]
  const slack = 1e-6 * period
  return Array.from({ length: Math.max(1, Math.floor(pulses)) }, (_, k) => k).filter(
    (k) => k * period >= first - slack && (k + 1) * period <= last + slack,
  )
}

/** Integral of the log up to each of its times, straight between samples [N s]. */
function runningSum(time: Float64Array, force: Float64Array): Float64Array {
  const sums = new Float64Array(time.length)
  for (let i = 1; i < time.length; i++)
    sums[i] = at(sums, i - 1) + ((at(time, i) - at(time, i - 1)) * (at(force, i) + at(force, i - 1))) / 2
  return sums
}

/** Means over a short window about each phase of a period, the window kept inside the period. */
function phasesOf(integral: (from: number, to: number) => number, start: number, period: number): number[] {
  const window = PEAK_WINDOW * period
  return Array.from({ length: PHASES }, (_, phase) => {
    const middle = window / 2 + ((period - window) * phase) / (PHASES - 1)
    return integral(start + middle - window / 2, start + middle + window / 2) / window
  })
}

/** The integral up to any time inside the log. */
function upTo(time: Float64Array, force: Float64Array, sums: Float64Array, when: number): number {
  if (when <= at(time, 0)) return 0
  if (when >= at(time, time.length - 1)) return at(sums, sums.length - 1)
  const i = bracket(time, when)
  const [t0, t1, f0, f1] = [at(time, i), at(time, i + 1), at(force, i), at(force, i + 1)]
  const share = (when - t0) / (t1 - t0)
  return at(sums, i) + (when - t0) * (f0 + (share * (f1 - f0)) / 2)
}

function notesOf(zero: ForceZero, periods: number, pulses: number, single: boolean): string[] {
  const notes: string[] = []
  if (zero.from === 'none')
    notes.push(
      'The log has no quiet part before or after the pulses: its zero is taken as it is, and a drift is not seen.',
    )
  else if (zero.from !== 'before and after')
    notes.push(`The zero is that ${zero.from} the pulses: a drift is not seen.`)
  if (single) notes.push('One pulse: its impulse is told, and no mean, which would be over whatever the log lasts.')
  else if (periods < pulses) notes.push(`The log holds ${periods} of the ${pulses} periods.`)
  return notes
}
