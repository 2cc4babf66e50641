/** Core names fields by their path in the plan; the window calls them what stands beside them. */
import { fieldDefinition, FIELDS, RING_COLUMNS, type FieldPath } from '../../core/plan'

const OTHER_NAMES: Readonly<Record<string, string>> = {
  'water.kind': 'the kind of water',
  'nozzle.shape': 'the exit shape',
  'nozzle.exitProfile': 'the exit profile',
  'programme.shape': 'the speed programme',
  'wake.model': 'the engine',
  'wake.law': 'the law of motion',
  'wake.ageing': 'the ageing law',
  'wake.wall': 'the wall',
  'wake.wall.point': 'the point of the wall',
  'wake.wall.normal': 'the normal of the wall',
  'wake.rings': 'the rings',
  'wake.rings.length': 'the number of rings',
  'wake.nozzles': 'the nozzles',
  'wake.stations': 'the stations',
}

const AXES = ['x', 'y', 'z'] as const

function isFieldPath(path: string): path is FieldPath {
  return path in FIELDS
}

/** A sentence of the core with every path replaced by the field's name; the first letter stays a capital. */
export function problemInWords(message: string): string {
  return message.replace(
    /\b(?:water|nozzle|programme|ambient|models|train|wake)(?:\.\w+)+/gu,
    (path, offset: number) => {
      const name = isFieldPath(path) ? fieldDefinition(path).label : (OTHER_NAMES[path] ?? listName(path) ?? path)
      return offset === 0 ? capital(name) : isFieldPath(path) ? name.toLowerCase() : name
    },
  )
}

/** Name of a value in a list of the wake, counted from 1 as the window does; null for another path. */
function listName(path: string): string | null {
  const wall = /^wake\.wall\.(point|normal)\.(\d)$/u.exec(path)
  if (wall !== null) return `${wall[1] ?? ''} ${AXES[Number(wall[2])] ?? ''} of the wall`
  const found = /^wake\.(rings|nozzles|stations)\.(\d+)(?:\.(\w+))?(?:\.(\d+))?$/u.exec(path)
  if (found === null) return null
  const [, list = '', index = '0', key, axis] = found
  const one = `${list.slice(0, -1)} ${Number(index) + 1}`
  if (key === undefined) return one
  const name = key in RING_COLUMNS ? (labelOf(key) ?? key) : key
  return `${[name, axis === undefined ? '' : (AXES[Number(axis)] ?? '')].filter((part) => part !== '').join(' ')} of ${one}`
}

function labelOf(key: string): string | undefined {
  return Object.entries(RING_COLUMNS)
    .find(([name]) => name === key)?.[1]
    .label.toLowerCase()
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}
