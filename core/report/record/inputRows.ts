/**
 * Every number, choice and text of the plan by its dotted path, as it is printed: read from the document itself, so that nothing that is
 * saved is left out of print.
 */
import { CHOICES, planDocument, quantityDefinition, type FieldDefinition, type Json, type Plan } from '../../plan'
import { NONE, type Show } from './show'

export interface InputRow {
  readonly path: string
  readonly label: string
  readonly value: string
  /** unread: the formulas of this plan do not look at it. absent: not given. moot: both. */
  readonly state: 'read' | 'unread' | 'absent' | 'moot'
}

/** A list of alike objects, one row each. */
export interface InputList {
  readonly path: string
  readonly columns: readonly { readonly title: string; readonly numeric: boolean }[]
  readonly rows: readonly (readonly string[])[]
  /** Rows of the plan beyond those that are printed. */
  readonly further: number
}

export interface InputGroup {
  readonly path: string
  readonly rows: readonly InputRow[]
  readonly lists: readonly InputList[]
}

/** Rows of a list that are printed; the rest stands in the plan. */
const MOST_ROWS = 40

/** Parts of the document that are no inputs of the design. Readings are logs of what was measured, and may be long. */
const BESIDE = new Set(['format', 'version', 'title', 'notes', 'revision', 'readings', 'held', 'view'])

/** Words of what is neither a number nor a choice; the last two are those of true and false. */
const WORDS: Readonly<Record<string, readonly [label: string, yes: string, no: string]>> = {
  'jet.ensemble': ['Smoothing lengths', 'three, with their spread', 'one'],
  'jet.coreGrowth': ['Cores', 'grow by viscosity', 'keep their size'],
  'wake.viscous': ['Viscosity', 'rings age', 'left out'],
  'thruster.inTurn': ['Firing', 'in turn through the period', 'all together'],
  'tankRun.camera.refraction': ['View through a flat window', 'corrected', 'not corrected'],
}

/** Words of parts of the plan that have no definition of their own. */
const LABELS: Readonly<Record<string, string>> = {
  'wake.wall': 'Wall',
  'wake.rings': 'Rings of its own',
  'wake.nozzles': 'Nozzles of its own',
  'wake.stations': 'Stations',
  'wake.wall.point': 'Point of the wall',
  'wake.wall.normal': 'Normal of the wall',
  'thruster.vehicle': 'Vehicle',
  'thruster.vehicle.drag': 'Drag',
  'thruster.target': 'Duty points',
  'thruster.search': 'Search',
  'thruster.search.ejectShare': 'Eject shares tried',
  'thruster.search.stock': 'Stock',
  'thruster.search.stock.diameters': 'Bores in stock',
  'thruster.search.stock.strokes': 'Strokes in stock',
  'tankRun.stations': 'Stations',
  'tankRun.target': 'Target',
  'tankRun.matrix': 'Run matrix',
  'tankRun.matrix.blocks': 'Changes that cost a set-up',
  'sweep.results': 'Results read',
}

/** Dimensions of columns of lists that the table of the plan's quantities does not hold. */
const COLUMNS: Readonly<Record<string, FieldDefinition>> = {
  time: { label: 'Time', dimension: 'time', help: '' },
  speed: { label: 'Speed', dimension: 'speed', help: '' },
  position: { label: 'Position', dimension: 'length', help: '' },
}

/** The groups of the plan in the order of its document. */
export function inputGroups(plan: Plan, show: Show): readonly InputGroup[] {
  const groups = new Map<string, { path: string; rows: InputRow[]; lists: InputList[] }>()
  const groupOf = (path: string): { rows: InputRow[]; lists: InputList[] } => {
    const name = path === 'ambient' ? 'nozzle' : path
    const found = groups.get(name) ?? { path: name, rows: [], lists: [] }
    groups.set(name, found)
    return found
  }
  const walk = (node: Json, path: string, group: string): void => {
    if (isList(node) && node.some(isPart)) {
      groupOf(group).lists.push(listOf(node, path, show))
    } else if (
      isList(node) &&
      (node.length === 0 || quantityDefinition(`${path}.0`)?.label === undefined || !isPlaced(path))
    ) {
      groupOf(group).rows.push(row(plan, path, node, show))
    } else if (isList(node)) {
      node.forEach((item, index) => walk(item, `${path}.${index}`, group))
    } else if (isPart(node)) {
      if (path === 'spread.relative' || path === 'spread.absolute')
        groupOf(group).lists.push(deviations(node, path, show))
      else for (const [key, value] of Object.entries(node)) walk(value, `${path}.${key}`, path)
    } else {
      groupOf(group).rows.push(row(plan, path, node, show))
    }
  }
  for (const [key, value] of Object.entries(planDocument(plan))) if (!BESIDE.has(key)) walk(value, key, key)
  return [...groups.values()]
}

/** Lists whose places have names of their own: the ends of a span, columns and rows of a camera. */
function isPlaced(path: string): boolean {
  return /^(?:thruster\.search\.(?:diameter|strokeRatio|frequency|count|ejectShare)|tankRun\.camera\.pixels)$/u.test(
    path,
  )
}

/** What is known of a number; a lone duty point is saved without its place in the list. */
function definitionOf(path: string): FieldDefinition | null {
  return quantityDefinition(path) ?? quantityDefinition(path.replace(/^thruster\.target\./u, 'thruster.target.0.'))
}

function row(plan: Plan, path: string, value: Json, show: Show): InputRow {
  const label = labelOf(path)
  if (value === null) return { path, label, value: NONE, state: isRead(plan, path) ? 'absent' : 'moot' }
  if (isList(value) && value.length === 0) return { path, label, value: 'none', state: 'absent' }
  return { path, label, value: valueText(path, value, show), state: isRead(plan, path) ? 'read' : 'unread' }
}

function labelOf(path: string): string {
  return LABELS[path] ?? WORDS[path]?.[0] ?? choiceLabel(path) ?? definitionOf(path)?.label ?? lastKey(path)
}

/** A choice is named by what it chooses. */
function choiceLabel(path: string): string | undefined {
  return Object.hasOwn(CHOICES, path) ? CHOICE_LABELS[path] : undefined
}

const CHOICE_LABELS: Readonly<Record<string, string>> = {
  'water.kind': 'Kind',
  'nozzle.shape': 'Shape',
  'nozzle.exitProfile': 'Exit profile',
  'programme.shape': 'Shape',
  'models.overPressure': 'Beyond the slug',
  'models.formationNumber': 'Formation number',
  'wake.model': 'Engine',
  'wake.start': 'Starts from',
  'wake.law': 'Law of motion',
  'wake.ageing': 'Ageing',
  'thruster.vehicle.drag.kind': 'Drag given by',
  'thruster.search.goal': 'Looks for',
  'tankRun.target.kind': 'Wanted',
  'tankRun.matrix.kind': 'Combinations',
}

function valueText(path: string, value: Json, show: Show): string {
  if (typeof value === 'number') {
    const definition = definitionOf(path)
    return definition === null ? String(value) : show.input(value, path, definition)
  }
  if (typeof value === 'boolean') {
    const [, yes, no] = WORDS[path] ?? ['', 'yes', 'no']
    return value ? yes : no
  }
  if (typeof value === 'string') return choiceWord(path, value)
  if (isList(value)) {
    const shown = value.slice(0, MOST_ROWS).map((item, index) => valueText(`${path}.${index}`, item, show))
    return [...shown, ...(value.length > MOST_ROWS ? [`and ${value.length - MOST_ROWS} more`] : [])].join(', ')
  }
  return JSON.stringify(value)
}

function choiceWord(path: string, value: string): string {
  for (const [choice, words] of Object.entries(CHOICES))
    if (choice === path) for (const [key, word] of Object.entries<string>(words)) if (key === value) return word
  return value
}

/** Numbers that formulas of this plan look at; the others are told apart in print. */
function isRead({ water, nozzle, programme }: Plan, path: string): boolean {
  switch (path) {
    case 'water.salinity':
      return water.kind === 'sea'
    case 'water.temperatureCelsius':
      return water.kind !== 'given'
    case 'water.density':
    case 'water.kinematicViscosity':
    case 'water.vapourPressure':
      return water.kind === 'given'
    case 'programme.riseTime':
    case 'programme.fallTime':
      return programme.shape === 'trapezoid'
    case 'nozzle.contraction':
      return nozzle.shape === 'orifice'
    default:
      return true
  }
}

function listOf(items: readonly Json[], path: string, show: Show): InputList {
  const parts = items.filter(isPart)
  const keys = [...new Set(parts.flatMap((item) => Object.keys(item)))]
  const varied = keys.includes('path')
  const cell = (item: { readonly [key: string]: Json }, key: string, index: number): string => {
    const value = item[key] ?? null
    if (value === null) return NONE
    if (key === 'path' && typeof value === 'string') return pathInWords(value)
    if (key === 'curve' && isList(value)) return `${value.length} nodes`
    // The levels of a field are in the field's own unit.
    const named = item['path']
    if (varied && key !== 'count' && typeof named === 'string') return levelText(named, value, show)
    const at = `${path}.${index}.${key}`
    const column = definitionOf(at) === null ? COLUMNS[key] : undefined
    return typeof value === 'number' && column !== undefined
      ? show.input(value, at, column)
      : valueText(at, value, show)
  }
  return {
    path,
    columns: keys.map((key) => ({
      title: KEY_WORDS[key] ?? definitionOf(`${path}.0.${key}`)?.label ?? COLUMNS[key]?.label ?? key,
      numeric: parts.every((item) => typeof (item[key] ?? 0) === 'number'),
    })),
    rows: parts.slice(0, MOST_ROWS).map((item, index) => keys.map((key) => cell(item, key, index))),
    further: Math.max(0, parts.length - MOST_ROWS),
  }
}

const KEY_WORDS: Readonly<Record<string, string>> = {
  path: 'Field',
  values: 'Values',
  from: 'From',
  to: 'To',
  count: 'Steps',
  core: 'Core',
  centre: 'Centre x, y, z',
  direction: 'Direction',
  position: 'Position',
  curve: 'Curve',
}

function levelText(path: string, value: Json, show: Show): string {
  if (isList(value)) return value.map((item) => levelText(path, item, show)).join(', ')
  const definition = quantityDefinition(path)
  return typeof value === 'number' && definition !== null ? show.input(value, path, definition) : String(value)
}

function deviations(node: { readonly [key: string]: Json }, path: string, show: Show): InputList {
  const relative = path === 'spread.relative'
  return {
    path,
    columns: [
      { title: 'Field', numeric: false },
      { title: relative ? 'Standard deviation over the value' : 'Standard deviation', numeric: true },
    ],
    rows: Object.entries(node).map(([field, value]) => [
      pathInWords(field),
      relative && typeof value === 'number'
        ? `${Number((100 * value).toPrecision(6))}\u00A0%`
        : levelText(field, value, show),
    ]),
    further: 0,
  }
}

/** A path with its words: `Exit diameter (nozzle.diameter)`. */
export function pathInWords(path: string): string {
  const definition = quantityDefinition(path)
  return definition === null ? path : `${definition.label} (${path})`
}

function lastKey(path: string): string {
  return path.slice(path.lastIndexOf('.') + 1)
}

function isList(value: Json): value is readonly Json[] {
  return Array.isArray(value)
}

function isPart(value: Json): value is { readonly [key: string]: Json } {
  return typeof value === 'object' && value !== null && !isList(value)
}
