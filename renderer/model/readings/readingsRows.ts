/** What a comparison says, in the shown units, row by row. */
import { formatNumber, formatQuantity, formatRange, fromBase } from '../../../core/quantity'
import { FIT_NAMES, type ComparedQuantity, type FitName, type ReadingsResult, type RingFit } from '../../../core/tank'
import type { Units } from '../units'

export interface VerdictRow {
  readonly id: ComparedQuantity
  readonly label: string
  /** Measured with half its 95 % interval. */
  readonly figure: string
  readonly unit: string
  readonly state: 'inside' | 'touching' | 'outside'
  readonly band: string
  readonly text: string
}

const QUANTITIES: Readonly<Record<ComparedQuantity, { readonly label: string; readonly unit: keyof Units }>> = {
  circulation: { label: 'Circulation', unit: 'circulation' },
  radius: { label: 'Ring radius', unit: 'length' },
  speed: { label: 'Ring speed', unit: 'ringSpeed' },
  formationNumber: { label: 'Formation number', unit: 'number' },
  meanForce: { label: 'Mean force', unit: 'force' },
}

/** Of a normal distribution, where a value brings no factor of its own. */
const NORMAL = 1.96

export function verdictRows({ verdicts }: ReadingsResult, units: Units): readonly VerdictRow[] {
  return verdicts.map(({ quantity, measured, predicted, state, text }) => {
    const { label, unit: key } = QUANTITIES[quantity]
    const unit = units[key]
    const half = measured.standardError === null ? null : measured.standardError * (measured.intervalFactor ?? NORMAL)
    const range = formatRange(predicted.low, predicted.high, unit)
    return {
      id: quantity,
      label,
      figure: valueWithError(measured.value, half, unit),
      unit: half === null || !(half > 0) ? unit : `${unit} (95\u00A0%)`.trim(),
      state,
      band: `the predicted ${range.text}${range.unit === '' ? '' : `\u00A0${range.unit}`}`,
      text: text.replaceAll(' %', '\u00A0%'),
    }
  })
}

/** A value to the digits its error leaves, two of the error. */
export function valueWithError(value: number, error: number | null, unit: string): string {
  const shown = fromBase(value, unit)
  if (error === null || !(error > 0)) return formatNumber(shown, 3)
  const half = Math.abs(fromBase(value + error, unit) - shown)
  const places = Math.max(0, Math.min(6, 1 - Math.floor(Math.log10(half))))
  return `${shown.toFixed(places).replace('-', '\u2212')} ± ${half.toFixed(places)}`
}

export interface FitRow {
  readonly id: FitName
  readonly label: string
  readonly unit: string
  readonly value: string
  readonly error: string
  readonly interval: string
}

const FITS: Readonly<Record<FitName, { readonly label: string; readonly unit: keyof Units }>> = {
  circulation: { label: 'Circulation', unit: 'circulation' },
  startTime: { label: 'Start time', unit: 'wakeTime' },
  startPosition: { label: 'Start at x', unit: 'length' },
  radius: { label: 'Ring radius', unit: 'length' },
  coreRadius: { label: 'Core radius', unit: 'length' },
}

/** The fit of all runs, or of one. */
export function fitRows(result: ReadingsResult, run: string | null, units: Units): readonly FitRow[] {
  const own: Pick<RingFit, 'fit' | 'intervalFactor'> | undefined =
    run === null
      ? { fit: result.fit, intervalFactor: result.laws[0]?.intervalFactor ?? NORMAL }
      : result.perRun.find((one) => one.run === run)
  if (own === undefined) return []
  return FIT_NAMES.flatMap((id) => {
    const found = own.fit[id]
    if (found === undefined) return []
    const { label, unit: key } = FITS[id]
    const unit = units[key]
    const half = own.intervalFactor * found.standardError
    const shown = (value: number): number => fromBase(value, unit)
    const size = Math.abs(shown(found.value + found.standardError) - shown(found.value))
    const places = size > 0 ? Math.max(0, Math.min(6, 1 - Math.floor(Math.log10(size)))) : 3
    const text = (value: number): string => shown(value).toFixed(places).replace('-', '\u2212')
    return [
      {
        id,
        label,
        unit,
        value: text(found.value),
        error: size.toFixed(places),
        interval: `${text(found.value - half)} to ${text(found.value + half)}`,
      },
    ]
  })
}

export interface RunTable {
  readonly columns: readonly string[]
  readonly rows: readonly { readonly run: string; readonly values: readonly string[] }[]
  readonly foot: readonly { readonly label: string; readonly values: readonly string[] }[]
}

/** Fitted values of each run, their mean and scatter: at most three columns, in the order of the fit. */
export function runRows({ perRun, repeats }: ReadingsResult, units: Units): RunTable {
  const names = FIT_NAMES.filter((name) => repeats[name] !== undefined).slice(0, 3)
  const show = (name: FitName, value: number | null | undefined): string =>
    value === null || value === undefined ? '' : formatNumber(fromBase(value, units[FITS[name].unit]), 4)
  return {
    columns: names.map((name) => `${FITS[name].label} (${units[FITS[name].unit]})`),
    rows: perRun.map(({ run, fit }) => ({ run, values: names.map((name) => show(name, fit[name]?.value)) })),
    foot: [
      { label: 'mean', values: names.map((name) => show(name, repeats[name]?.mean)) },
      { label: 'scatter', values: names.map((name) => show(name, repeats[name]?.standardDeviation)) },
    ],
  }
}

export interface FactRow {
  readonly label: string
  readonly text: string
}

function measured(value: number, error: number | null, unit: string): string {
  const text = valueWithError(value, error, unit)
  const whole = unit === '' ? text : `${text}\u00A0${unit}`
  return error === null || !(error > 0) ? whole : `${whole} (standard error)`
}

export function forceRows({ force }: ReadingsResult, units: Units): readonly FactRow[] {
  if (force === null) return []
  const { errors, zero, resonance } = force
  return [
    ...(force.mean === null ? [] : [{ label: 'Mean', text: measured(force.mean, errors.mean, units.force) }]),
    { label: 'Peak', text: measured(force.peak, errors.peak, units.force) },
    { label: 'Impulse a pulse', text: measured(force.impulse, errors.impulse, units.impulse) },
    ...(force.ripple === null ? [] : [{ label: 'Ripple', text: formatNumber(force.ripple, 3) }]),
    ...(force.mean === null ? [] : [{ label: 'Whole periods', text: String(force.periods) }]),
    ...(force.lossFactor === null
      ? []
      : [
          {
            label: 'Measured over predicted',
            text: measured(force.lossFactor.value, force.lossFactor.standardError, ''),
          },
        ]),
    {
      label: 'Zero and drift',
      text: `${formatQuantity(zero.zero, units.force, 3)}, ${formatNumber(fromBase(zero.drift, units.force), 2)}\u00A0${units.force}/s`,
    },
    ...(resonance.frequency === null
      ? []
      : [{ label: 'Stand resonance', text: formatQuantity(resonance.frequency, units.frequency, 3) }]),
  ]
}

function framesOf({
  frames,
  from,
  to,
}: {
  readonly frames: number
  readonly from: number
  readonly to: number
}): string {
  if (frames === 1) return `frame ${from + 1}`
  const whole = to - from + 1
  return `frames ${from + 1} to ${to + 1}${frames < whole ? `, ${frames} of ${whole} with a ring` : ''}`
}

export function fieldRows({ fields }: ReadingsResult, units: Units): readonly FactRow[] {
  if (fields === null) return []
  const { ring, formationNumber, pinchOff, frames } = fields
  const rows: FactRow[] = [{ label: 'Frames', text: String(frames.length) }]
  if (formationNumber !== null)
    rows.push({ label: 'Formation number', text: measured(formationNumber.value, formationNumber.standardError, '') })
  if (pinchOff !== null) rows.push({ label: 'Pinched off at', text: formatQuantity(pinchOff.time, units.wakeTime, 3) })
  if (ring !== null)
    rows.push(
      { label: 'Ring over', text: framesOf(ring) },
      {
        label: 'Ring circulation',
        text: measured(ring.circulation.value, ring.circulation.standardError, units.circulation),
      },
      { label: 'Ring radius', text: measured(ring.radius.value, ring.radius.standardError, units.length) },
      {
        label: 'Core radius, median',
        text: measured(ring.coreRadius.value, ring.coreRadius.standardError, units.length),
      },
      { label: 'Impulse', text: measured(ring.impulse.value, ring.impulse.standardError, units.impulse) },
      ...(ring.speed === null ? [] : [{ label: 'Ring speed', text: formatQuantity(ring.speed, units.ringSpeed, 3) }]),
    )
  return rows
}
