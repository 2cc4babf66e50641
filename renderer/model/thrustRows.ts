/**
 * The figures of a thruster as rows to show, in the chosen units, ranges first. Pure; every number is core's own.
 */
import { formatNumber, formatQuantity, formatRange } from '../../core/quantity'
import type { ThrusterExplanationId } from '../../core/report'
import { CRUISE_REACHED, slackOf, type LimitName, type ThrusterResult, type ThrusterSection } from '../../core/thruster'
import type { Magnitudes, Units } from './units'

export interface ThrustRow {
  readonly id: ThrusterExplanationId
  readonly label: string
  readonly figure: string
  readonly unit: string
  readonly notes: readonly string[]
  /** The value behind the figure, to be held against another design's; null where there is none. */
  readonly value: number | null
}

/** Stands where a value has no bound. */
export const NO_BOUND = 'no bound'

/** Sizes of a thruster's results, for units that fit them. */
export function thrustMagnitudes({ meanThrust, power, flow, cavity, endurance }: ThrusterResult): Magnitudes {
  return {
    force: meanThrust,
    power: power.total,
    flowRate: flow,
    ...(Number.isFinite(cavity.pressureHigh) ? { corePressure: cavity.pressureHigh } : {}),
    ...(endurance === null ? {} : { storedEnergy: endurance * power.total }),
  }
}

/** A value with its unit; a limit without bound in words. */
export function bounded(value: number, unit: string, digits = 3): string {
  if (Number.isNaN(value)) return '—'
  return Number.isFinite(value) ? formatQuantity(value, unit, digits) : NO_BOUND
}

/** A span of time as one would say it. */
export function timeInWords(seconds: number): string {
  if (seconds < 120) return formatQuantity(seconds, 's', 3)
  if (seconds < 7200) return formatQuantity(seconds, 'min', 3)
  if (seconds < 172800) return formatQuantity(seconds, 'h', 3)
  return `${formatNumber(seconds / 86400, 3)}\u00A0days`
}

/** A way as one would say it. */
export function wayInWords(metres: number): string {
  return formatQuantity(metres, metres < 2000 ? 'm' : 'km', 3)
}

function percent(share: number | null): { readonly figure: string; readonly unit: string } {
  return share === null ? { figure: 'none', unit: '' } : { figure: formatNumber(100 * share, 3), unit: '%' }
}

function range(
  values: readonly number[],
  unit: string,
  digits = 3,
): { readonly figure: string; readonly unit: string } {
  const { text, unit: shown } = formatRange(Math.min(...values), Math.max(...values), unit, digits)
  return { figure: text, unit: shown }
}

/** Rows under "Thrust and speed". */
export function thrustRows(section: ThrusterSection, result: ThrusterResult, units: Units): readonly ThrustRow[] {
  const [low, high] = result.meanThrustRange
  const thrust = range([low, high], units.force)
  const total = section.count === 1 ? 'of one thruster' : `of ${section.count} thrusters`
  return [
    {
      id: 'meanThrust',
      label: 'Mean thrust',
      ...thrust,
      notes: [
        thrust.figure.includes(' ')
          ? `slug, to slug with quick start; adopted ${formatQuantity(result.meanThrust, units.force, 3)}`
          : result.quickStart
            ? total
            : 'slug; its start is too slow for over-pressure',
        `${formatQuantity(result.thrustPerPulse, units.impulse, 3)} a pulse, ${formatQuantity(result.frequency, units.frequency, 3)}`,
      ],
      value: result.meanThrust,
    },
    ...speedRow(section, result, units),
    {
      id: 'totalPower',
      label: 'Total power',
      ...range([result.power.total], units.power),
      notes: [result.costOfTransport === null ? total : `cost of transport ${formatNumber(result.costOfTransport, 3)}`],
      value: result.power.total,
    },
    ...efficiencyRows(section, result),
  ]
}

/** By name, never one for the other; a bench has neither. */
function efficiencyRows(section: ThrusterSection, result: ThrusterResult): readonly ThrustRow[] {
  if (section.vehicle === null) return []
  return [
    {
      id: 'froude',
      label: 'Froude efficiency',
      ...percent(result.froudeEfficiency),
      notes: [result.froudeEfficiency === null ? 'at rest or without thrust there is none' : 'of the jet alone'],
      value: result.froudeEfficiency,
    },
    {
      id: 'overall',
      label: 'Overall efficiency',
      ...percent(result.overallEfficiency),
      notes: [result.overallEfficiency === null ? 'at rest or without thrust there is none' : 'of the power put in'],
      value: result.overallEfficiency,
    },
  ]
}

function speedRow(section: ThrusterSection, result: ThrusterResult, units: Units): readonly ThrustRow[] {
  const { vehicle } = section
  if (vehicle === null) return []
  const notes: string[] = []
  const { cruise, startUp, dragAtSpeed, excessThrust } = result
  if (vehicle.speed !== null && dragAtSpeed !== null && excessThrust !== null)
    notes.push(
      `drag ${formatQuantity(dragAtSpeed, units.force, 3)}: ${formatQuantity(Math.abs(excessThrust), units.force, 3)} ${excessThrust < 0 ? 'missing' : 'to spare'}`,
    )
  if (vehicle.speed === null && cruise?.fromRest === 0) notes.push('it does not start from rest')
  if (cruise !== null && cruise.speeds.length > 1) notes.push(`thrust meets drag at ${cruise.speeds.length} speeds`)
  if (vehicle.speed === null && startUp !== null && startUp.time !== null && startUp.distance !== null)
    notes.push(
      `${formatNumber(100 * CRUISE_REACHED, 2)} % of it after ${timeInWords(startUp.time)} and ${wayInWords(startUp.distance)}`,
    )
  return [
    {
      id: 'speed',
      label: vehicle.speed === null ? 'Cruise speed' : 'Held speed',
      ...range([result.speed], units.vehicleSpeed),
      notes,
      value: result.speed,
    },
  ]
}

/** Rows under "Further numbers". */
export function furtherThrustRows(
  section: ThrusterSection,
  result: ThrusterResult,
  units: Units,
): readonly ThrustRow[] {
  const rows: ThrustRow[] = [
    {
      id: 'peakThrust',
      label: 'Peak thrust',
      ...range([result.peakThrust], units.force),
      notes: result.ripple === null ? [] : [`ripple ${formatNumber(result.ripple, 3)} of the mean`],
      value: result.peakThrust,
    },
    {
      id: 'thrustRatio',
      label: 'Against a steady jet',
      figure: formatNumber(result.thrustRatio, 3),
      unit: '',
      notes: [`of equal flow; duty cycle ${formatNumber(100 * result.duty, 3)} %`],
      value: result.thrustRatio,
    },
    {
      id: 'cavity',
      label: 'Cavity pressure',
      figure: Number.isFinite(result.cavity.pressureHigh)
        ? range([result.cavity.pressureHigh], units.corePressure).figure
        : NO_BOUND,
      unit: Number.isFinite(result.cavity.pressureHigh) ? units.corePressure : '',
      notes: [`lowest ${bounded(result.cavity.pressureLow, units.corePressure)}; flow loading only`],
      value: result.cavity.pressureHigh,
    },
  ]
  if (result.endurance !== null)
    rows.push({
      id: 'endurance',
      label: 'Endurance',
      ...split(timeInWords(result.endurance)),
      notes: result.range === null ? [] : [`${wayInWords(result.range)} at this speed`],
      value: result.endurance,
    })
  if (result.cavitationMargin !== null)
    rows.push({
      id: 'cavitationMargin',
      label: 'Cavitation margin',
      ...range([result.cavitationMargin], units.pressure),
      notes: ['ring core or intake, over vapour pressure'],
      value: result.cavitationMargin,
    })
  if (result.ringShare.adopted !== null) {
    const { low, high, adopted } = result.ringShare
    rows.push({
      id: 'ringImpulse',
      label: 'Share in the ring',
      ...range([100 * (low ?? adopted), 100 * (high ?? adopted)], ''),
      unit: '%',
      notes: ['of the impulse; the rest trails and pushes too'],
      value: adopted,
    })
  }
  if (result.ringSpacing !== null)
    rows.push({
      id: 'ringSpacing',
      label: 'Ring spacing',
      ...range([result.ringSpacing.distance], units.length),
      notes: [`${formatNumber(result.ringSpacing.ratio, 3)} ring radii`],
      value: result.ringSpacing.distance,
    })
  if (result.turning !== null)
    rows.push({
      id: 'turning',
      label: 'Turning moment',
      figure: formatNumber(result.turning.oneOff, 3),
      unit: 'N·m',
      notes: [
        `one of a pair off; opposed ${formatNumber(result.turning.opposed, 3)} N·m`,
        ...(section.cant === 0 ? [] : [`both turned to one side ${formatNumber(result.turning.vectored, 3)} N·m`]),
      ],
      value: result.turning.oneOff,
    })
  return rows
}

/** Number and unit of a quantity in words. */
function split(text: string): { readonly figure: string; readonly unit: string } {
  const [figure = '', unit = ''] = text.split('\u00A0')
  return { figure, unit }
}

export interface LimitRow {
  readonly key: string
  readonly name: string
  readonly value: string
  readonly limit: string
  readonly ok: boolean
  /** Room left over the limit, 0 to 1; negative where it is broken. */
  readonly room: number
}

/** Limits with the least room first. */
export function limitRows(section: ThrusterSection, result: ThrusterResult, units: Units): readonly LimitRow[] {
  const scales = {
    period: result.period,
    pressure: result.cavitation.ambientPressure - (result.cavitation.vapourPressure ?? 0),
  }
  // The last thrusts are those of the duty points; one before them is that of a held speed.
  const thrusts = result.limits.filter(({ name }) => name === 'thrust').length
  let thrust = thrusts > result.duties.length ? -1 : 0
  return result.limits
    .map((limit, index): LimitRow => {
      const unit = limitUnit(limit.name, units)
      const name = limit.name === 'thrust' ? thrustName(thrust++, section) : limit.name
      return {
        key: `${index}`,
        name,
        value: bounded(limit.value, unit),
        limit: `${asked(limit.name)} ${bounded(limit.limit, unit)}`,
        ok: limit.ok,
        room: slackOf(limit, scales),
      }
    })
    .sort((a, b) => Number(a.ok) - Number(b.ok) || a.room - b.room)
}

function thrustName(index: number, { target }: ThrusterSection): string {
  if (index < 0) return 'thrust at the held speed'
  return target.length > 1 ? `thrust, duty point ${index + 1}` : 'thrust, duty point'
}

/** Unit a limit's value is shown in. */
export function limitUnit(name: LimitName, units: Units): string {
  const known: Readonly<Record<LimitName, string>> = {
    'plunger force': units.force,
    'plunger speed': units.speed,
    'plunger acceleration': units.acceleration,
    'actuator power': units.power,
    'plunger travel': units.length,
    'eject time': units.time,
    'refill time': units.time,
    'bay length': units.length,
    'bay diameter': units.length,
    'core cavitation': units.pressure,
    'intake cavitation': units.pressure,
    thrust: units.force,
    'formation number': '',
  }
  return known[name]
}

/** What a limit asks of the value. */
function asked(name: LimitName): string {
  if (name === 'thrust') return 'at least'
  return name.endsWith('cavitation') || name === 'refill time' ? 'above' : 'at most'
}

/** What a value is against a held one, in words; null where they cannot be compared. */
export function differenceInWords(value: number | null, held: number | null): string | null {
  if (value === null || held === null || !Number.isFinite(value) || !Number.isFinite(held) || held === 0) return null
  const share = 100 * (value / held - 1)
  if (Math.abs(share) < 0.05) return 'the same'
  return `${share > 0 ? '+' : '−'}${formatNumber(Math.abs(share), share < 10 && share > -10 ? 2 : 3)} %`
}
