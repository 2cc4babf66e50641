/**
 * The results of a pulse as rows to show: figures in the chosen units, ranges first. Pure; every number is core's own.
 */
import { formatFixed, formatNumber, formatQuantity, formatRange } from '../../core/quantity'
import type { Plan } from '../../core/plan'
import type { PulseResult, PulseRing } from '../../core/pulse'
import type { JetEnsemble } from '../../core/coaxial'
import { adoptedBasisInWords, type ExplanationId, type JetExplanationId } from '../../core/report'
import type { RunData } from '../../core/run'
import { formationRange } from './jetRows'
import type { Magnitudes, Units } from './units'

export interface ResultRow {
  readonly id: ExplanationId
  readonly label: string
  /** The range, or the one value there is. */
  readonly figure: string
  readonly unit: string
  /** Smaller lines below: what the ends are, the adopted value. */
  readonly notes: readonly string[]
}

/** One estimate of the formation number in a list. */
export interface EstimateRow {
  readonly id: ExplanationId | JetExplanationId
  readonly label: string
  readonly value: string
  readonly note: string
}

/** Sizes of a pulse's results, for units that fit them. */
export function magnitudesOf(pulse: PulseResult): Magnitudes {
  const { circulation, impulse, energy } = pulse.ring ?? pulse.total
  return {
    time: pulse.duration,
    circulation,
    impulse,
    energy,
    ...(pulse.ring === null ? {} : { ringSpeed: pulse.ring.speed }),
    ...(pulse.corePressureDrop === null ? {} : { corePressure: pulse.corePressureDrop }),
  }
}

/** Ends of the range shown for the ring: the slug alone and, for a quick start, with its over-pressure. */
function ringEnds(pulse: PulseResult): readonly PulseRing[] {
  return [pulse.ringFromSlug ?? pulse.ring, pulse.ringWithOverPressure].filter((ring) => ring !== null)
}

function range(values: readonly number[], unit: string, digits = 3): { readonly text: string; readonly unit: string } {
  return formatRange(Math.min(...values), Math.max(...values), unit, digits)
}

/** Two pure numbers in the order of their ends, told once where they look the same. */
function pair(values: readonly number[], digits = 2): string {
  const texts = values.map((value) => value.toFixed(digits))
  return [...new Set(texts)].join(' to ')
}

/** What the two ends stand for. */
function endsInWords(pulse: PulseResult): string {
  return pulse.ringWithOverPressure === null
    ? 'slug; its start is too slow for over-pressure'
    : 'slug, to slug with quick start'
}

/** Rows under "The ring this pulse makes"; empty where no ring is expected. */
export function ringRows(plan: Plan, pulse: PulseResult, units: Units): readonly ResultRow[] {
  const { ring } = pulse
  const ends = ringEnds(pulse)
  if (ring === null || ends.length === 0) return []
  const row = (
    id: ExplanationId,
    label: string,
    key: 'circulation' | 'speed' | 'radius' | 'impulse' | 'energy',
    unit: string,
    notes: readonly string[],
  ): ResultRow => {
    const figure = range(
      ends.map((end) => end[key]),
      unit,
    )
    return { id, label, figure: figure.text, unit: figure.unit, notes }
  }
  const adopted = (value: number, unit: string): string =>
    `adopted ${formatQuantity(value, unit, 3)}, ${adoptedBasisInWords(plan).overPressure}`
  const share = ends.map((end) => end.speed / pulse.peakSpeed)
  return [
    row('ring.circulation', 'Circulation', 'circulation', units.circulation, [
      endsInWords(pulse),
      adopted(ring.circulation, units.circulation),
    ]),
    row('ring.speed', 'Ring speed', 'speed', units.ringSpeed, [`${pair(share)} of the peak exit speed`]),
    row('ring.radius', 'Radius', 'radius', units.length, [`core ${pair(ends.map((end) => end.coreRatio))} of it`]),
    row('ring.impulse', 'Impulse', 'impulse', units.impulse, [
      pulse.ringWithOverPressure === null ? 'of the slug' : 'how much the over-pressure adds is disputed',
    ]),
    row('ring.energy', 'Energy', 'energy', units.energy, []),
  ]
}

/** The stroke left before the ring is full, in exit diameters; null where no estimate has an end. */
export function marginRow(plan: Plan, pulse: PulseResult, units: Units): ResultRow | null {
  const { margin } = pulse
  if (margin === null) return null
  const figure = range([margin.low, margin.high], '', 2)
  const basis = adoptedBasisInWords(plan).formationNumber
  if (margin.adopted === null)
    return {
      id: 'margin',
      label: 'Margin',
      figure: figure.text,
      unit: 'D',
      notes: [`${basis}, adopted: none for this plan`],
    }
  const left = margin.adopted
  const length = formatQuantity(left * plan.nozzle.diameter, units.length, 2)
  return {
    id: 'margin',
    label: 'Margin',
    figure: figure.text,
    unit: 'D',
    notes: ['over every estimate and the published band', `${basis}, adopted: ${formatNumber(left, 2)} D, ${length}`],
  }
}

/**
 * Every estimate of the formation number, also the absent ones with why.
 *
 * @param formation the runs behind the computed one; null leaves it out
 */
export function estimateRows(
  plan: Plan,
  pulse: PulseResult,
  formation: JetEnsemble | null = null,
): readonly EstimateRow[] {
  const numbers = pulse.formationNumber
  const note = (key: 'energyLimit' | 'carriedVolume' | 'speedMatch' | 'computed' | 'published'): string =>
    numbers.notes
      .filter((entry) => entry.estimate === key)
      .map((entry) => entry.text)
      .join(' ')
  const value = (number: number | null): string => (number === null ? 'none' : formatFixed(number))
  const label = (name: string, key: string): string => (plan.models.formationNumber === key ? `${name}, adopted` : name)
  return [
    {
      id: 'formation.energyLimit',
      label: label('Energy limit', 'energyLimit'),
      value: value(numbers.energyLimit),
      note: note('energyLimit'),
    },
    {
      id: 'formation.carriedVolume',
      label: label('Carried volume', 'carriedVolume'),
      value: value(numbers.carriedVolume),
      note: note('carriedVolume'),
    },
    {
      id: 'formation.speedMatch',
      label: label('Speed match', 'speedMatch'),
      value: value(numbers.speedMatch),
      note: note('speedMatch'),
    },
    ...(formation === null
      ? []
      : [
          {
            id: 'jet.formationNumber' as const,
            label: label('Computed jet', 'computed'),
            value: formationRange(formation)?.range ?? 'none',
            note: note('computed'),
          },
        ]),
    {
      id: 'formation.published',
      label: label('Published band', 'published'),
      value: numbers.published === null ? 'none' : pair(numbers.published),
      note: note('published'),
    },
  ]
}

/** What leaves after the ring is full; null while nothing does. */
export function trailingRow(pulse: PulseResult, units: Units): ResultRow | null {
  if (pulse.pinchedOff !== true) return null
  const { circulation, impulse } = pulse.trailingJet
  const share = (part: number, whole: number): string => `${((100 * part) / whole).toFixed(0)} %`
  return {
    id: 'trailingJet',
    label: 'Impulse left behind',
    figure: range([impulse], units.impulse).text,
    unit: units.impulse,
    notes: [
      `${share(impulse, pulse.total.impulse)} of the pulse's impulse and ${share(circulation, pulse.total.circulation)} of its circulation trail behind the ring`,
    ],
  }
}

/** Rows under "Further numbers". */
export function furtherRows(data: RunData, pulse: PulseResult, units: Units): readonly ResultRow[] {
  const rows: ResultRow[] = [
    {
      id: 'dimensionlessEnergy',
      label: 'Dimensionless energy',
      figure: formatNumber(pulse.dimensionlessEnergy, 3),
      unit: '',
      notes: ['of the whole slug'],
    },
  ]
  const { ring } = pulse
  if (pulse.corePressureDrop !== null)
    rows.push({
      id: 'ring.corePressure',
      label: 'Core pressure drop',
      figure: range([pulse.corePressureDrop], units.corePressure).text,
      unit: units.corePressure,
      notes: ['flow loading only'],
    })
  if (ring !== null)
    rows.push({
      id: 'ringReynolds',
      label: 'Ring Reynolds number',
      figure: range(
        ringEnds(pulse).map((end) => end.reynolds),
        '',
      ).text,
      unit: '',
      // An adopted value that is neither end has a Reynolds number of its own.
      notes: ringEnds(pulse).some((end) => end.circulation === ring.circulation)
        ? []
        : [`adopted ${formatNumber(ring.reynolds, 3)}, as the circulation`],
    })
  rows.push({
    id: 'jetReynolds',
    label: 'Jet Reynolds number',
    figure: formatNumber(pulse.jetReynolds, 3),
    unit: '',
    notes: ['peak exit speed and exit diameter'],
  })
  if (pulse.unstableWaveNumber !== null)
    rows.push({
      id: 'ring.waveNumber',
      label: 'Most unstable waves',
      figure: formatNumber(pulse.unstableWaveNumber, 2),
      unit: '',
      notes: ['number of waves around the ring'],
    })
  rows.push({
    id: 'water',
    label: 'Water density',
    figure: range([data.water.density], units.density, 4).text,
    unit: units.density,
    notes: [`kinematic viscosity ${formatQuantity(data.water.kinematicViscosity, units.kinematicViscosity, 4)}`],
  })
  return rows
}
