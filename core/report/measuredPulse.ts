/** The measured pulse beside what the models make of its programme, in the shown units. */
import { MEASURED_PULSE, type Units } from '../plan'
import type { PulseResult } from '../pulse'
import { formatNumber, fromBase } from '../quantity'

export interface MeasuredPulseRow {
  readonly label: string
  readonly unit: string
  readonly measured: string
  readonly slug: string
  readonly quickStart: string
}

const NONE = '—'

/** @param pulse of the plan with the measured programme, without over-pressure adopted */
export function measuredPulseRows(
  pulse: PulseResult,
  units: Pick<Units, 'energy' | 'ringSpeed' | 'time'>,
): readonly MeasuredPulseRow[] {
  const show = (value: number | null, unit: string): string =>
    value === null ? NONE : formatNumber(fromBase(value, unit), 3)
  const { value, scatter } = MEASURED_PULSE.fieldEnergy
  return [
    {
      label: 'Energy of the field',
      unit: units.energy,
      measured: `${show(value, units.energy)}\u00A0±\u00A0${formatNumber(fromBase(scatter, units.energy), 2)}`,
      slug: show(pulse.slug.energy, units.energy),
      quickStart: show(pulse.slug.energy + pulse.overPressure.energy, units.energy),
    },
    {
      label: 'Ring speed',
      unit: units.ringSpeed,
      measured: show(MEASURED_PULSE.ringSpeed, units.ringSpeed),
      slug: show(pulse.ringFromSlug?.speed ?? null, units.ringSpeed),
      quickStart: show(pulse.ringWithOverPressure?.speed ?? null, units.ringSpeed),
    },
    {
      label: 'Half the impulse at',
      unit: units.time,
      measured: show(MEASURED_PULSE.halfImpulseTime, units.time),
      slug: show(halfImpulse(pulse), units.time),
      quickStart: NONE,
    },
  ]
}

/** When half of the slug's impulse was there, straight between samples [s]. */
function halfImpulse({ history: { time, impulse } }: PulseResult): number | null {
  const half = (impulse.at(-1) ?? 0) / 2
  const index = impulse.findIndex((value) => value >= half)
  const [t0, t1, i0, i1] = [time[index - 1], time[index], impulse[index - 1], impulse[index]]
  if (t0 === undefined || t1 === undefined || i0 === undefined || i1 === undefined || i1 === i0) return null
  return t0 + ((half - i0) * (t1 - t0)) / (i1 - i0)
}
