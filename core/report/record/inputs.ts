/** Inputs of the plan in print: each group under its words, what is not given and what is not read told apart. */
import type { DocumentBlock } from '../document/types'
import { inputGroups, type InputGroup, type InputList } from './inputRows'
import type { RecordContext } from './types'

const TITLES: Readonly<Record<string, string>> = {
  water: 'Water',
  nozzle: 'Nozzle',
  programme: 'Speed programme',
  models: 'Adopted models',
  jet: 'Starting jet',
  train: 'Pulse train',
  wake: 'Wake',
  'wake.wall': 'Wall',
  thruster: 'Thrusters',
  'thruster.vehicle': 'Vehicle',
  'thruster.vehicle.drag': 'Drag of the vehicle',
  'thruster.actuator': 'Actuator of one thruster',
  'thruster.intake': 'Intake',
  'thruster.bay': 'Bay of one thruster',
  'thruster.target': 'Duty point',
  'thruster.search': 'Search',
  'thruster.search.stock': 'Stock',
  'thruster.manufacture': 'Scatter of manufacture, standard deviation over the value',
  tankRun: 'Tank run',
  'tankRun.tank': 'Tank',
  'tankRun.target': 'Target of the tank run',
  'tankRun.camera': 'Camera',
  'tankRun.trigger': 'Trigger',
  'tankRun.drive': 'Drive',
  'tankRun.practice': 'Practice of the laboratory',
  'tankRun.matrix': 'Run matrix',
  sweep: 'Sweep',
  spread: 'Spread',
}

const LISTS: Readonly<Record<string, string>> = {
  'programme.rows': 'Rows of the programme',
  'wake.rings': 'Rings given',
  'wake.nozzles': 'Nozzles given',
  'thruster.target': 'Duty points',
  'thruster.vehicle.drag.rows': 'Drag against speed',
  'tankRun.matrix.fields': 'Levels',
  'sweep.fields': 'Fields swept',
  'spread.relative': 'Relative deviations',
  'spread.absolute': 'Absolute deviations',
}

export function inputBlocks({ plan, show }: RecordContext): readonly DocumentBlock[] {
  return [{ kind: 'heading', text: 'Inputs' }, ...inputGroups(plan, show).flatMap(groupBlocks), ...besideBlocks(plan)]
}

function groupBlocks({ path, rows, lists }: InputGroup): DocumentBlock[] {
  const read = rows.filter(({ state }) => state === 'read')
  const others = [
    ...told(
      'Not given',
      rows.filter(({ state }) => state === 'absent').map(({ label }) => label),
    ),
    ...told(
      'Not read by this plan, as given or by default',
      rows.filter(({ state }) => state === 'unread').map(({ label, value }) => `${label} ${value}`),
    ),
  ]
  return [
    { kind: 'subheading', text: TITLES[path] ?? path },
    ...(read.length === 0
      ? []
      : [{ kind: 'pairs', rows: read.map(({ label, value }) => [label, value] as const) } as const]),
    ...lists.flatMap(listBlocks),
    ...(others.length === 0 ? [] : [{ kind: 'paragraph', tone: 'small', text: others.join(' ') } as const]),
  ]
}

function told(words: string, items: readonly string[]): string[] {
  return items.length === 0
    ? []
    : [`${words}: ${items.map((item, index) => (index === 0 ? item : lowered(item))).join(', ')}.`]
}

/** A label inside a sentence; names of one letter stay. */
function lowered(label: string): string {
  return /^[A-Z][a-z]/u.test(label) ? label.charAt(0).toLowerCase() + label.slice(1) : label
}

function listBlocks({ path, columns, rows, further }: InputList): DocumentBlock[] {
  const table: DocumentBlock = { kind: 'table', caption: LISTS[path] ?? path, columns, rows }
  if (further === 0) return [table]
  return [table, { kind: 'paragraph', tone: 'small', text: `${further} further rows stand in the plan file.` }]
}

function besideBlocks({ held, readings }: RecordContext['plan']): DocumentBlock[] {
  const names = held.map(({ name }) => name).join(', ')
  const sentences = [
    ...(readings === null
      ? []
      : ['Readings stand in the plan file; they are no inputs of the design and are not printed here.']),
    ...(held.length === 0 ? [] : [`Designs held beside this one, not printed here: ${names}.`]),
  ]
  return sentences.length === 0 ? [] : [{ kind: 'paragraph', tone: 'small', text: sentences.join(' ') }]
}
