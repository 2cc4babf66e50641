/** Part of the run sheet: what piston, ring and camera do at each combination of the run matrix. */
import { isFieldPath, isUnitKey, quantityDefinition, unitKeyOf, type Units } from '../plan'
import { formatNumber, formatQuantity, formatRange, fromBase } from '../quantity'
import type { Combination, TankRunResult } from '../tank'
import type { DocumentBlock } from './document/types'

/** Combinations listed: as many as are followed down the tank, so that the table can be read beside it. */
const MOST_LISTED = 60
/** Levels and stations that have columns of their own; further stations stand in one cell. */
const MOST_COLUMNS = 6

/** Nothing for a single combination, which is the plan itself, and where none were held against drive and tank. */
export function combinationBlocks(
  { matrix, profile }: TankRunResult,
  stations: readonly number[],
  units: Units,
): DocumentBlock[] {
  if (matrix === null || matrix.each.length < 2) return []
  const { length, speed, wakeTime } = units
  const fields = matrix.paths.map((path) => fieldColumn(path, units))
  const listed = matrix.each.slice(0, MOST_LISTED)
  const apart = fields.length + stations.length <= MOST_COLUMNS
  const at = (x: number): string => formatQuantity(x, length)
  const arrivals = apart
    ? stations.map((x) => ({ title: `at ${at(x)} (${wakeTime})`, numeric: true }))
    : [{ title: `Arrivals (${wakeTime})` }]
  return [
    { kind: 'heading', text: 'Combinations' },
    {
      kind: 'paragraph',
      text: `profile.csv is for the plan's own stroke and speed only, a piston travel of ${formatQuantity(profile.travel, length)}: each other combination needs a profile of its own.`,
    },
    {
      kind: 'table',
      flows: true,
      caption: `Piston speed before rounding. Arrivals after the first motion of the piston, earliest to latest, the rounding of the profile included. Camera: from the first motion to the earliest arrival; record: from there to the latest.`,
      columns: [
        { title: 'No.', numeric: true },
        ...fields.map(({ title }) => ({ title, numeric: true })),
        { title: `Piston travel (${length})`, numeric: true },
        { title: `Piston speed (${speed})`, numeric: true },
        ...arrivals,
        { title: `Camera (${wakeTime})`, numeric: true },
        { title: `Record (${wakeTime})`, numeric: true },
        { title: 'Can be made' },
      ],
      rows: listed.map((one, i) => [
        String(i + 1),
        ...fields.map(({ unit }, k) => shown(one.values[k] ?? null, unit, 4)),
        shown(one.pistonTravel, length),
        shown(one.pistonSpeed, speed),
        ...(apart ? stations.map((_, k) => arrivalText(one, k, wakeTime)) : [everyArrival(one, stations, units)]),
        shown(one.cameraDelay, wakeTime),
        shown(one.recordLength, wakeTime),
        one.ok ? 'yes' : 'NO',
      ]),
    },
    ...(matrix.each.length > MOST_LISTED
      ? [
          {
            kind: 'paragraph',
            text: `Only the first ${MOST_LISTED} of ${matrix.each.length} combinations are listed.`,
          } as const,
        ]
      : []),
    ...listed.flatMap(({ reason }, i): DocumentBlock[] =>
      reason === null ? [] : [{ kind: 'paragraph', tone: 'limit', text: `Combination ${i + 1}: ${reason}` }],
    ),
  ]
}

function arrivalText({ arrivals }: Combination, index: number, unit: string): string {
  const found = arrivals?.[index]
  if (found === undefined) return ''
  const { timeLow, timeHigh } = found
  if (timeLow === null || timeHigh === null) return 'not seen'
  return formatRange(timeLow, timeHigh, unit).text.replaceAll(' ', '\u00a0')
}

function everyArrival(one: Combination, stations: readonly number[], { length, wakeTime }: Units): string {
  if (one.arrivals === null) return ''
  return stations.map((x, k) => `${formatQuantity(x, length)}: ${arrivalText(one, k, wakeTime)}`).join('; ')
}

function shown(value: number | null, unit: string, digits = 3): string {
  return value === null ? '' : formatNumber(fromBase(value, unit), digits)
}

/** Heading and unit of a field of the matrix. */
export function fieldColumn(path: string, units: Units): { readonly title: string; readonly unit: string } {
  const definition = quantityDefinition(path)
  if (definition === null) return { title: path, unit: '' }
  const { dimension, label } = definition
  const key = isFieldPath(path) ? unitKeyOf(path, dimension) : dimension
  const unit = isUnitKey(key) ? units[key] : ''
  return { title: unit === '' ? label : `${label} (${unit})`, unit }
}
