/**
 * Rings as a table: the columns of the window's grid, of copies and of ring files.
 */
import type { WakeRing } from '../filament'
import { formatFull, siUnit } from '../quantity'
import { RING_COLUMNS, type RingColumnKey } from './wakeFields'

/** A column of the ring table: a quantity, or the model of the core. */
export type RingTableKey = RingColumnKey | 'core'

/** Columns of the ring table in the order they are shown, copied and, without a heading, pasted. */
export const RING_TABLE_KEYS: readonly RingTableKey[] = [
  'circulation',
  'radius',
  'coreRadius',
  'core',
  'x',
  'y',
  'z',
  'directionX',
  'directionY',
  'directionZ',
  'axisRatio',
  'startTime',
]

/** Unit of every quantity column. */
export type RingTableUnits = Readonly<Record<RingColumnKey, string>>

/** SI, as files are read whose headings name no unit. */
export const SI_RING_UNITS: RingTableUnits = {
  circulation: siUnit('circulation'),
  radius: siUnit('length'),
  coreRadius: siUnit('length'),
  x: siUnit('length'),
  y: siUnit('length'),
  z: siUnit('length'),
  directionX: '',
  directionY: '',
  directionZ: '',
  axisRatio: '',
  startTime: siUnit('time'),
}

/** Value of a quantity column of a ring [SI]. */
export function ringValue(ring: WakeRing, key: RingColumnKey): number {
  switch (key) {
    case 'circulation':
    case 'radius':
    case 'coreRadius':
      return ring[key]
    case 'x':
      return ring.centre[0]
    case 'y':
      return ring.centre[1]
    case 'z':
      return ring.centre[2]
    case 'directionX':
      return ring.direction[0]
    case 'directionY':
      return ring.direction[1]
    case 'directionZ':
      return ring.direction[2]
    case 'axisRatio':
      return ring.axisRatio ?? 1
    case 'startTime':
      return ring.startTime ?? 0
  }
}

/** A ring with one quantity set [SI]. */
export function withRingValue(ring: WakeRing, key: RingColumnKey, value: number): WakeRing {
  const [x, y, z] = ring.centre
  const [dx, dy, dz] = ring.direction
  switch (key) {
    case 'x':
      return { ...ring, centre: [value, y, z] }
    case 'y':
      return { ...ring, centre: [x, value, z] }
    case 'z':
      return { ...ring, centre: [x, y, value] }
    case 'directionX':
      return { ...ring, direction: [value, dy, dz] }
    case 'directionY':
      return { ...ring, direction: [dx, value, dz] }
    case 'directionZ':
      return { ...ring, direction: [dx, dy, value] }
    default:
      return { ...ring, [key]: value }
  }
}

/** Heading of a column with its unit, as files and copies carry it. */
export function ringHeading(key: RingTableKey, units: RingTableUnits): string {
  if (key === 'core') return 'Core'
  const unit = units[key]
  return unit === '' ? RING_COLUMNS[key].label : `${RING_COLUMNS[key].label} (${unit})`
}

/** Rings as heading and rows of text in these units: full precision, decimal point, no thousands marks. */
export function ringTable(
  rings: readonly WakeRing[],
  units: RingTableUnits,
): { readonly header: readonly string[]; readonly rows: readonly (readonly string[])[] } {
  const number = (value: number, unit: string): string => formatFull(value, unit).split('\u00A0')[0] ?? ''
  return {
    header: RING_TABLE_KEYS.map((key) => ringHeading(key, units)),
    rows: rings.map((ring) =>
      RING_TABLE_KEYS.map((key) => (key === 'core' ? ring.core : number(ringValue(ring, key), units[key]))),
    ),
  }
}
