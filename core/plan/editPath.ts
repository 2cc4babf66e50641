/**
 * One value of a plan replaced by its dotted path, everything on the way copied and all else shared with the old plan.
 */
import type { DragInput, DutyPoint } from '../thruster'
import type { TankTarget } from '../tank'
import { SPREAD_DEFAULTS } from './decodeSweep'
import { READINGS_DEFAULTS } from './decodeReadings'
import { JET_DEFAULTS } from './decodeJet'
import { MATRIX_DEFAULTS, TANK_RUN_DEFAULTS } from './decodeTankRun'
import { SEARCH_DEFAULTS, THRUSTER_DEFAULTS, VEHICLE_DEFAULTS } from './decodeThruster'
import { WAKE_DEFAULTS } from './decodeWake'
import { isRecord } from './planNumbers'
import { COMPUTED_SECTIONS } from './sectionOrder'
import type { Plan } from './types'

/** What an absent part starts from when one of its values is set. */
const STARTS: Readonly<Record<string, unknown>> = {
  jet: JET_DEFAULTS,
  train: { pulses: 1, period: 1 },
  wake: WAKE_DEFAULTS,
  thruster: THRUSTER_DEFAULTS,
  'thruster.vehicle': VEHICLE_DEFAULTS,
  'thruster.search': SEARCH_DEFAULTS,
  'thruster.search.stock': { diameters: [], strokes: [] },
  tankRun: TANK_RUN_DEFAULTS,
  'tankRun.matrix': MATRIX_DEFAULTS,
  readings: READINGS_DEFAULTS,
  spread: SPREAD_DEFAULTS,
}

/** The plan with another value at a path. A place in a list that the list does not have changes nothing. */
export function withValue(plan: Plan, path: string, value: unknown): Plan {
  const [section = '', ...keys] = path.split('.')
  if (!isEdited(section)) return plan
  const changed = replaced(plan[section], keys, value, section)
  return { ...present(plan, section), [section]: changed }
}

/** Every section that is computed but the sweep, of which no single value is edited. */
type Edited = Exclude<(typeof COMPUTED_SECTIONS)[number], 'sweep'>

function isEdited(name: string): name is Edited {
  return name !== 'sweep' && COMPUTED_SECTIONS.some((section) => section === name)
}

/** A plan with one section present again after a change in it. */
export function present(plan: Plan, section: string): Plan {
  return plan.absent.some((name) => name === section)
    ? { ...plan, absent: plan.absent.filter((name) => name !== section) }
    : plan
}

function replaced(node: unknown, keys: readonly string[], value: unknown, path: string): unknown {
  const [key, ...rest] = keys
  if (key === undefined) return value
  const held = node ?? STARTS[path] ?? (path === 'thruster.search.ejectShare' ? startOfShare(value) : undefined)
  const below = `${path}.${key}`
  if (Array.isArray(held))
    return held.map((item: unknown, index) => (String(index) === key ? replaced(item, rest, value, below) : item))
  return isRecord(held) ? { ...held, [key]: replaced(held[key], rest, value, below) } : node
}

/** A span of one value, until its other end is set. */
function startOfShare(value: unknown): readonly unknown[] {
  return [value, value]
}

const WAY_OF_DRAG = 'thruster.vehicle.drag'

/** Drag of a kind, keeping what the old one shares with it. */
export function dragOfKind(old: DragInput | null, kind: string): DragInput {
  if (old?.kind === kind) return old
  if (kind === 'hull') return { kind, wettedArea: 0.5, formFactor: 0.2 }
  if (kind === 'area') return { kind, dragArea: 0.01 }
  return {
    kind: 'table',
    rows: [
      { speed: 0, drag: 0 },
      { speed: 1, drag: 5 },
    ],
  }
}

/** What the day wants, of a kind; a speed is wanted at the first station. */
export function tankTargetOfKind(plan: Plan, kind: string): TankTarget {
  const old = plan.tankRun?.target ?? null
  if (old?.kind === kind) return old
  if (kind === 'circulation') return { kind, value: 0.01 }
  if (kind === 'reynolds') return { kind, value: 5000 }
  return { kind: 'speed', value: 0.1, station: plan.tankRun?.stations[0] ?? 0.1 }
}

/** Setting a number of one kind of drag or target makes it of that kind; null for every other path. */
export function withKindOf(plan: Plan, path: string, value: number | null): Plan | null {
  const vehicle = plan.thruster?.vehicle ?? VEHICLE_DEFAULTS
  switch (path) {
    case 'thruster.vehicle.drag.dragArea':
      return withValue(plan, WAY_OF_DRAG, { ...dragOfKind(vehicle.drag, 'area'), dragArea: value })
    case 'thruster.vehicle.drag.wettedArea':
      return withValue(plan, WAY_OF_DRAG, { ...dragOfKind(vehicle.drag, 'hull'), wettedArea: value })
    case 'thruster.vehicle.drag.formFactor':
      return withValue(plan, WAY_OF_DRAG, { ...dragOfKind(vehicle.drag, 'hull'), formFactor: value })
    case 'tankRun.target.circulation':
    case 'tankRun.target.reynolds':
    case 'tankRun.target.speed': {
      const target = tankTargetOfKind(plan, path.slice('tankRun.target.'.length))
      return withValue(plan, 'tankRun.target', value === null ? null : { ...target, value })
    }
    case 'tankRun.target.station':
      return withValue(plan, 'tankRun.target', { ...tankTargetOfKind(plan, 'speed'), station: value })
    case 'thruster.target.speed':
      return withDuty(plan, value === null ? null : { speed: value, share: firstShare(plan) })
    case 'thruster.target.thrust':
      return withDuty(plan, value === null ? null : { thrust: value, share: firstShare(plan) })
    default:
      return null
  }
}

function firstShare(plan: Plan): number {
  return plan.thruster?.target[0]?.share ?? 1
}

/** Another first duty point; null takes it out. */
function withDuty(plan: Plan, first: DutyPoint | null): Plan {
  const others = plan.thruster?.target.slice(1) ?? []
  return withValue(plan, 'thruster.target', first === null ? others : [first, ...others])
}
