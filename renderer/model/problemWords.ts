/** Core names fields by their path in the plan; the window calls them what stands beside them. */
import { fieldDefinition, FIELDS, quantityDefinition, RING_COLUMNS, type FieldPath } from '../../core/plan'

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
  'thruster.vehicle': 'the vehicle',
  'thruster.vehicle.drag': 'the drag of the vehicle',
  'thruster.vehicle.drag.kind': 'the kind of drag',
  'thruster.vehicle.drag.rows': 'the table of drag',
  'thruster.target': 'the duty points',
  'thruster.search': 'the search',
  'thruster.search.diameter': 'the range of exit diameters',
  'thruster.search.strokeRatio': 'the range of stroke ratios',
  'thruster.search.frequency': 'the range of frequencies',
  'thruster.search.count': 'the numbers of thrusters',
  'thruster.search.ejectShare': 'the range of eject shares',
  'thruster.search.goal': 'the goal of the search',
  'tankRun.stations': 'the stations in the tank',
  'tankRun.target': 'what is wanted in the tank',
  'tankRun.matrix': 'the run matrix',
  'tankRun.matrix.fields': 'the fields of the run matrix',
  'sweep.fields': 'the fields of the sweep',
  'sweep.results': 'the results of the sweep',
}

const AXES = ['x', 'y', 'z'] as const

function isFieldPath(path: string): path is FieldPath {
  return path in FIELDS
}

/** A number with more digits than anyone reads. */
const LONG = /\b\d+\.\d{6,}(?:e[-+]?\d+)?/gu

/** A sentence of the core with every path replaced by the field's name and long numbers cut; the first letter stays a capital. */
export function problemInWords(message: string): string {
  const short = message.replace(LONG, (digits) => String(Number(Number(digits).toPrecision(5))))
  return short.replace(
    /\b(?:water|nozzle|programme|ambient|models|jet|train|wake|thruster|tankRun|sweep|spread)(?:\.\w+)+/gu,
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
  const listed = otherListName(path)
  if (listed !== null) return listed
  const found = /^wake\.(rings|nozzles|stations)\.(\d+)(?:\.(\w+))?(?:\.(\d+))?$/u.exec(path)
  if (found === null) return null
  const [, list = '', index = '0', key, axis] = found
  const one = `${list.slice(0, -1)} ${Number(index) + 1}`
  if (key === undefined) return one
  const name = key in RING_COLUMNS ? (labelOf(key) ?? key) : key
  return `${[name, axis === undefined ? '' : (AXES[Number(axis)] ?? '')].filter((part) => part !== '').join(' ')} of ${one}`
}

/** What the rows of other lists are called. */
const ROWS: readonly (readonly [pattern: RegExp, row: string])[] = [
  [/^thruster\.target\.(\d+)(?:\.|$)/u, 'duty point'],
  [/^thruster\.vehicle\.drag\.rows\.(\d+)(?:\.|$)/u, 'row of the drag table'],
  [/^thruster\.search\.stock\.\w+\.(\d+)$/u, 'size in stock'],
  [/^tankRun\.stations\.(\d+)$/u, 'station in the tank'],
  [/^tankRun\.matrix\.fields\.(\d+)(?:\.|$)/u, 'field of the run matrix'],
  [/^sweep\.fields\.(\d+)(?:\.|$)/u, 'field of the sweep'],
]

function otherListName(path: string): string | null {
  for (const [pattern, row] of ROWS) {
    const found = pattern.exec(path)
    if (found === null) continue
    const one = `${row.includes(' of ') ? row.replace(' of ', ` ${Number(found[1]) + 1} of `) : `${row} ${Number(found[1]) + 1}`}`
    const key = path.slice(found[0].length)
    return key === '' ? one : `${quantityDefinition(path)?.label.toLowerCase() ?? key} of ${one}`
  }
  return null
}

function labelOf(key: string): string | undefined {
  return Object.entries(RING_COLUMNS)
    .find(([name]) => name === key)?.[1]
    .label.toLowerCase()
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}
