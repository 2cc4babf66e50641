/**
 * What was learned carried back into the plan: each offer says what it changes, from what to what, and why; taken, it is one step of undo.
 */
import { setField, type FieldPath, type Plan } from '../../../core/plan'
import { formatQuantity } from '../../../core/quantity'
import type { ReadingsResult } from '../../../core/tank'
import type { Units } from '../units'

export interface CarryOffer {
  readonly id: 'stroke' | 'lag' | 'clock' | 'leak' | 'loss'
  /** Name of the step of undo. */
  readonly step: string
  readonly title: string
  readonly why: string
  readonly changes: readonly { readonly label: string; readonly before: string; readonly after: string }[]
  readonly next: Plan
}

/** Digits that a fitted factor is carried with: more would be noise. */
const DIGITS = 4
/** A change smaller than this, relative, is none. */
const LEAST = 5e-4

function rounded(value: number): number {
  return Number(value.toPrecision(DIGITS))
}

/** @param plannedStart when the ring of the plan sets off [s]; null where the piston log rules it */
export function carryOffers(
  plan: Plan,
  result: ReadingsResult,
  plannedStart: number | null,
  units: Units,
): readonly CarryOffer[] {
  return [
    strokeOffer(plan, result, units),
    leakOffer(plan, result),
    ...startOffers(plan, result, plannedStart, units),
    lossOffer(plan, result),
  ].filter((offer) => offer !== null)
}

/** How a cause must change for the prediction's circulation to become the measured one, relative; null where it cannot be told. */
function needed(result: ReadingsResult, cause: 'stroke' | 'leak'): number | null {
  const verdict = result.verdicts.find(({ quantity }) => quantity === 'circulation')
  const effect = result.sensitivities.find((one) => one.cause === cause)?.change.circulation ?? 0
  if (verdict === undefined || effect === 0) return null
  const ratio = verdict.measured.value / verdict.predicted.value
  return ratio > 0 ? Math.expm1(Math.log(ratio) / effect) : null
}

function strokeOffer(plan: Plan, result: ReadingsResult, units: Units): CarryOffer | null {
  const change = needed(result, 'stroke')
  if (change === null || Math.abs(change) < LEAST || plan.programme.shape === 'table' || result.asRun?.ok === true)
    return null
  const factor = 1 + change
  const { stroke, peakSpeed } = plan.programme
  const after = { stroke: rounded(stroke * factor), peakSpeed: rounded(peakSpeed * factor) }
  const next = setField(setField(plan, 'programme.peakSpeed', after.peakSpeed), 'programme.stroke', after.stroke)
  return {
    id: 'stroke',
    step: 'stroke factor',
    title: `Stroke factor ${factor.toFixed(3)}`,
    why: 'Stroke and speed as they would have to be for the measured circulation: the plan then says what was done.',
    changes: [
      lengthRow('Stroke', stroke, after.stroke, units.length),
      lengthRow('Peak exit speed', peakSpeed, after.peakSpeed, units.speed),
    ],
    next,
  }
}

function lengthRow(label: string, before: number, after: number, unit: string) {
  return { label, before: formatQuantity(before, unit, DIGITS), after: formatQuantity(after, unit, DIGITS) }
}

function leakOffer(plan: Plan, result: ReadingsResult): CarryOffer | null {
  const change = needed(result, 'leak')
  if (change === null || change < LEAST || change > 0.5) return null
  const before = plan.tankRun?.drive.leak ?? 0
  const after = rounded(1 - (1 - before) * (1 - change))
  if (after > 0.5) return null
  return {
    id: 'leak',
    step: 'piston leak',
    title: `Leak ${(100 * change).toFixed(1)} %`,
    why: 'As much of the displacement lost past the piston: its profile is then drawn that much longer, so that the exit does what is planned.',
    changes: [{ label: 'Piston leak', before: percent(before), after: percent(after) }],
    next: setField(plan, 'tankRun.drive.leak', after),
  }
}

function percent(share: number): string {
  return `${Number((100 * share).toPrecision(3))}\u00A0%`
}

/** A start is carried back where it is this many standard errors off. */
const SIGNIFICANT = 2
/** Above this correlation the start time may be a start position. */
const ENTANGLED = 0.95

function isEntangled({ fitted, correlation }: ReadingsResult): boolean {
  const [time, place] = [fitted.indexOf('startTime'), fitted.indexOf('startPosition')]
  return time >= 0 && place >= 0 && Math.abs(correlation[time]?.[place] ?? 0) > ENTANGLED
}

/** The start came late: the drive's lag, or the clock of the readings. */
function startOffers(
  plan: Plan,
  result: ReadingsResult,
  plannedStart: number | null,
  units: Units,
): readonly CarryOffer[] {
  const fitted = result.fit.startTime
  if (fitted === undefined || plannedStart === null) return []
  const late = fitted.value - plannedStart
  if (Math.abs(late) < Math.max(SIGNIFICANT * fitted.standardError, 1e-4) || isEntangled(result)) return []
  const show = (value: number): string => formatQuantity(value, units.rampTime, 3)
  const offset = plan.readings?.calibration.timeOffset ?? 0
  const lag = plan.tankRun?.drive.lag ?? 0
  const offers: CarryOffer[] = []
  if (late > 0)
    offers.push({
      id: 'lag',
      step: 'drive lag',
      title: `Start ${show(late)} late: lag of the drive`,
      why: 'The profile is then sent that much earlier, so that the piston moves when it should.',
      changes: [{ label: 'Drive lag', before: show(lag), after: show(rounded(lag + late)) }],
      next: setField(plan, 'tankRun.drive.lag', rounded(lag + late)),
    })
  offers.push({
    id: 'clock',
    step: 'time offset',
    title:
      late > 0
        ? `Start ${show(late)} late: clock of the readings`
        : `Start ${show(-late)} early: clock of the readings`,
    why: 'The camera’s zero was not the first motion of the piston: all readings are shifted.',
    changes: [{ label: 'Time offset', before: show(offset), after: show(rounded(offset - late)) }],
    next: setField(plan, 'readings.calibration.timeOffset', rounded(offset - late)),
  })
  return offers
}

function lossOffer(plan: Plan, { force }: ReadingsResult): CarryOffer | null {
  const factor = force?.lossFactor?.value ?? null
  const path: FieldPath = 'nozzle.lossCoefficient'
  if (factor === null || !(factor > 0) || factor >= 1 - LEAST) return null
  const before = plan.nozzle.lossCoefficient
  const after = rounded((1 + before) / factor - 1)
  return {
    id: 'loss',
    step: 'loss coefficient',
    title: `Thrust ${(100 * factor).toFixed(1)} % of the prediction`,
    why: 'The loss at the nozzle that takes as much thrust at the same pressure in the cavity; sizing then pays for it.',
    changes: [{ label: 'Loss coefficient', before: String(before), after: String(after) }],
    next: setField(plan, path, after),
  }
}
