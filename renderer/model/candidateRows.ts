/** Candidates of a sizing as rows of a table that can be sorted. Pure. */
import { at } from '../../core/base'
import { MAP_FIELDS } from '../../core/report'
import { formatQuantity } from '../../core/quantity'
import type { Candidate } from '../../core/thruster'
import type { Units } from './units'

export const CANDIDATE_COLUMNS = [
  'number',
  'power',
  'thrust',
  'count',
  'diameter',
  'plunger',
  'nozzleLength',
  'strokeRatio',
  'frequency',
  'overall',
  'swept',
] as const
export type CandidateColumn = (typeof CANDIDATE_COLUMNS)[number]

export interface CandidateRow {
  /** From 1, best first, as on the map. */
  readonly number: number
  readonly candidate: Candidate
  readonly cells: Readonly<Record<CandidateColumn, string>>
  readonly values: Readonly<Record<CandidateColumn, number>>
  /** What holds it back, and what to be careful about. */
  readonly note: string
}

/** Headings with the unit shown. */
export function candidateHeadings(units: Units): Readonly<Record<CandidateColumn, string>> {
  return {
    number: 'No.',
    power: `Power (${units.power})`,
    thrust: `Thrust (${units.force})`,
    count: 'Thrusters',
    diameter: `Exit (${units.length})`,
    plunger: `Plunger (${units.length})`,
    nozzleLength: `Nozzle length (${units.length})`,
    strokeRatio: 'Stroke ratio',
    frequency: `Frequency (${units.frequency})`,
    overall: 'Overall (%)',
    swept: `Swept (${units.volume})`,
  }
}

/** @param nozzle of the plan they were sized for: its length grows with the exit in every candidate */
export function candidateRows(
  candidates: readonly Candidate[],
  units: Units,
  nozzle: { readonly diameter: number; readonly length: number },
): readonly CandidateRow[] {
  return candidates.map((candidate, index) => {
    const first = at(candidate.points, 0)
    const values = {
      number: index + 1,
      power: candidate.power,
      thrust: candidate.thrust,
      count: candidate.design.count,
      diameter: candidate.design.diameter,
      plunger: candidate.pistonDiameter,
      nozzleLength: nozzle.length * (candidate.design.diameter / nozzle.diameter),
      strokeRatio: candidate.design.strokeRatio,
      frequency: first.frequency,
      overall: first.overallEfficiency ?? Number.NaN,
      swept: candidate.sweptVolume,
    }
    // The unit stands in the heading.
    const bare = (value: number, unit: string): string => formatQuantity(value, unit, 3).split('\u00A0')[0] ?? ''
    return {
      number: index + 1,
      candidate,
      values,
      cells: {
        number: `${index + 1}`,
        power: bare(values.power, units.power),
        thrust: bare(values.thrust, units.force),
        count: `${values.count}`,
        diameter: bare(values.diameter, units.length),
        plunger: bare(values.plunger, units.length),
        nozzleLength: bare(values.nozzleLength, units.length),
        strokeRatio: bare(values.strokeRatio, ''),
        frequency: bare(values.frequency, units.frequency),
        overall: Number.isNaN(values.overall) ? '—' : bare(100 * values.overall, ''),
        swept: bare(values.swept, units.volume),
      },
      note: noteOf(candidate),
    }
  })
}

export interface Sorting {
  readonly column: CandidateColumn
  readonly falling: boolean
}

/** The rows in the order of a column; what has no value stands last. */
export function sortedRows(rows: readonly CandidateRow[], { column, falling }: Sorting): readonly CandidateRow[] {
  const sign = falling ? -1 : 1
  return [...rows].sort((a, b) => {
    const [x, y] = [a.values[column], b.values[column]]
    if (Number.isNaN(x) || Number.isNaN(y)) return Number(Number.isNaN(x)) - Number(Number.isNaN(y))
    return sign * (x - y) || a.number - b.number
  })
}

function noteOf({ binding, rangeEnds, withinSpread, feasible, points }: Candidate): string {
  const parts: string[] = []
  if (!feasible) {
    const broken = new Set(points.flatMap(({ limits }) => limits.filter(({ ok }) => !ok).map(({ name }) => name)))
    parts.push(`breaks ${[...broken].join(', ')}`)
  } else if (binding !== null) parts.push(binding.name)
  parts.push(
    ...rangeEnds.map(({ field, end }) => {
      if (field === 'count') return `${end === 'low' ? 'fewest' : 'most'} thrusters searched`
      return `${end === 'low' ? 'least' : 'largest'} ${MAP_FIELDS[field].title.toLowerCase()} searched`
    }),
  )
  if (withinSpread.length > 0) parts.push(`within the spread of ${withinSpread.join(', ')}: check by test`)
  return parts.length === 0 ? 'no limit: the best of the range' : parts.join('; ')
}
