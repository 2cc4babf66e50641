/**
 * Dotted paths of the plan's numbers: the fields, and the items of lists, `wake.stations.0`, `wake.rings.1.circulation`.
 *
 * Sweeps, spread and matrices name what they vary by them.
 */
import { siUnit } from '../quantity'
import { FIELDS, fieldDefinition, type FieldPath } from './fields'
import type { FieldDefinition } from './fieldTypes'
import { READING_NUMBERS } from './fieldsReadings'
import { RING_COLUMNS } from './wakeFields'

const place = { label: 'Place', dimension: 'length', help: 'Place along one axis.' } as const
const direction = { label: 'Direction', dimension: 'number', help: 'Part of a direction along one axis.' } as const

/** Numbers inside lists; `*` stands for the place in the list, counted from 0. */
const LISTED: Readonly<Record<string, FieldDefinition>> = {
  'wake.rings.*.circulation': RING_COLUMNS.circulation,
  'wake.rings.*.radius': { ...RING_COLUMNS.radius, above: 0 },
  'wake.rings.*.coreRadius': { ...RING_COLUMNS.coreRadius, above: 0 },
  'wake.rings.*.axisRatio': { ...RING_COLUMNS.axisRatio, above: 0 },
  'wake.rings.*.startTime': { ...RING_COLUMNS.startTime, min: 0 },
  'wake.rings.*.centre.*': place,
  'wake.rings.*.direction.*': direction,
  'wake.nozzles.*.position.*': place,
  'wake.nozzles.*.direction.*': direction,
  'wake.nozzles.*.delay': { label: 'Delay', dimension: 'time', help: 'When this nozzle starts after the first.' },
  'wake.wall.point.*': place,
  'wake.wall.normal.*': direction,
  'wake.stations.*': { label: 'Station', dimension: 'length', help: 'Distance from the exit plane.' },
  'tankRun.stations.*': {
    label: 'Station',
    dimension: 'length',
    above: 0,
    max: 1000,
    help: 'Distance from the exit plane at which the ring is measured.',
  },
  ...Object.fromEntries(Object.entries(READING_NUMBERS).map(([key, known]) => [`readings.rows.*.${key}`, known])),
  'thruster.target.*.speed': FIELDS['thruster.target.speed'],
  'thruster.target.*.thrust': FIELDS['thruster.target.thrust'],
  'thruster.target.*.share': {
    label: 'Share',
    dimension: 'number',
    above: 0,
    max: 1,
    help: 'Share of the time spent at this duty point, against the others.',
  },
  'thruster.vehicle.drag.rows.*.speed': {
    label: 'Speed',
    dimension: 'speed',
    min: 0,
    max: 100,
    help: 'Speed at which the drag was measured.',
  },
  'thruster.vehicle.drag.rows.*.drag': {
    label: 'Drag',
    dimension: 'force',
    min: 0,
    max: 1e9,
    help: 'Drag of the vehicle at this speed.',
  },
  'thruster.search.stock.diameters.*': {
    label: 'Bore in stock',
    dimension: 'length',
    min: 1e-4,
    max: 10,
    help: 'Exit diameter that can be had.',
  },
  'thruster.search.stock.strokes.*': {
    label: 'Stroke in stock',
    dimension: 'length',
    above: 0,
    max: 100,
    help: 'Plunger stroke that can be had.',
  },
}

/** Whether a text is the path of a field. */
export function isFieldPath(path: string): path is FieldPath {
  return Object.hasOwn(FIELDS, path)
}

/** What is known of the number at a path, items of lists included; null where the plan has no such number. */
export function quantityDefinition(path: string): FieldDefinition | null {
  if (isFieldPath(path)) return fieldDefinition(path)
  const pattern = path.replace(/\.(?:0|[1-9]\d*)(?=\.|$)/gu, '.*')
  return Object.hasOwn(LISTED, pattern) ? (LISTED[pattern] ?? null) : null
}

/** Numbers that say how the plan is varied, or what was measured, and so are not varied themselves. */
const HOW_VARIED = ['spread.', 'sweep.', 'tankRun.matrix.', 'readings.']

/** As quantityDefinition, for a number that a sweep, a spread or a matrix may vary. */
export function variedDefinition(path: string): FieldDefinition | null {
  return HOW_VARIED.some((start) => path.startsWith(start)) ? null : quantityDefinition(path)
}

/** A plan path with its SI unit as the heading of a column; the bare path where the plan has no such number, or a pure one. */
export function pathHeading(path: string): string {
  const definition = quantityDefinition(path)
  if (definition === null) return path
  // Plain digits, as in the heads of the other tables.
  const si = siUnit(definition.dimension).replace('²', '2').replace('³', '3').replace('·', ' ')
  const unit = definition.minutes === true ? 'min' : si
  return unit === '' ? path : `${path} (${unit})`
}
