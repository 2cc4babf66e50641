/** Every limit that was checked, with how the design stands to it; broken ones first. */
import type { UnitKey } from '../../plan'
import type { LimitName } from '../../thruster'
import type { DocumentBlock } from '../document/types'
import { NONE, percent } from './show'
import type { RecordContext } from './types'

export interface LimitRow {
  readonly name: string
  readonly value: string
  readonly limit: string
  /** Room left over the limit; null where there is no such share. */
  readonly room: number | null
  readonly ok: boolean
}

const THRUSTER_UNITS: Readonly<Record<LimitName, UnitKey>> = {
  'plunger force': 'force',
  'plunger speed': 'speed',
  'plunger acceleration': 'acceleration',
  'actuator power': 'power',
  'plunger travel': 'length',
  'eject time': 'time',
  'refill time': 'time',
  'bay length': 'length',
  'bay diameter': 'length',
  'core cavitation': 'pressure',
  'intake cavitation': 'pressure',
  thrust: 'force',
  'formation number': 'number',
}

/** Values that must not fall below their limit. */
const LEAST: ReadonlySet<string> = new Set<LimitName>(['refill time', 'core cavitation', 'intake cavitation', 'thrust'])

/** Every limit that was checked, broken ones first. */
export function limitRows({ plan, data, show }: RecordContext): readonly LimitRow[] {
  const checked = data.thruster?.result.limits ?? []
  // Thrust at the duty points stands with their numbers below.
  const thruster = checked
    .filter(({ name }) => name !== 'thrust')
    .map(({ name, value, limit, ok }): LimitRow => ({
      name: sentence(name),
      value: show.result(value, THRUSTER_UNITS[name]),
      limit: `${LEAST.has(name) ? 'at least' : 'at most'} ${show.result(limit, THRUSTER_UNITS[name])}`,
      room: roomOf(value, limit, LEAST.has(name)),
      ok,
    }))
  const duties = (data.thruster?.result.duties ?? []).map(({ thrust, needed, shortfall }, i): LimitRow => ({
    name: `Thrust at duty point ${i + 1}`,
    value: show.result(thrust, 'force'),
    limit: `at least ${show.result(needed, 'force')}`,
    room: roomOf(thrust, needed, true),
    ok: shortfall === 0,
  }))
  const drive = (data.tankRun?.profile.limits ?? []).flatMap(({ name, value, limit, ok }): LimitRow[] => {
    const key = { travel: 'length', speed: 'speed', acceleration: 'acceleration', jerk: 'jerk' } as const
    if (limit === null) return []
    return [
      {
        name: `Piston ${name}`,
        value: show.result(value, key[name]),
        limit: `at most ${show.result(limit, key[name])}`,
        room: roomOf(value, limit, false),
        ok,
      },
    ]
  })
  const practice = plan.tankRun?.practice.clearance ?? 0
  const walls = (data.tankRun?.clearances ?? []).map(({ wall, overDiameter, ok }): LimitRow => ({
    name: `Clearance, ${wall} (D)`,
    value: show.result(overDiameter, 'number'),
    limit: `at least ${show.result(practice, 'number')}, practice`,
    room: roomOf(overDiameter, practice, true),
    ok,
  }))
  const rows = [...thruster, ...duties, ...drive, ...walls]
  return [...rows.filter(({ ok }) => !ok), ...rows.filter(({ ok }) => ok)]
}

function roomOf(value: number, limit: number, least: boolean): number | null {
  if (limit === 0 || !Number.isFinite(value)) return null
  return least ? value / limit - 1 : 1 - value / limit
}

function sentence(name: string): string {
  return name.charAt(0).toUpperCase() + name.slice(1)
}

export function limitBlocks(context: RecordContext): readonly DocumentBlock[] {
  const rows = limitRows(context)
  if (rows.length === 0) return []
  return [
    { kind: 'heading', text: 'Limits' },
    {
      kind: 'table',
      caption: null,
      columns: [
        { title: 'Limit' },
        { title: 'Value', numeric: true },
        { title: 'Must be', numeric: true },
        { title: 'Room', numeric: true },
        { title: 'State' },
      ],
      rows: rows.map(({ name, value, limit, room, ok }) => [
        name,
        value,
        limit,
        room === null ? NONE : percent(room),
        ok ? 'holds' : 'BROKEN',
      ]),
    },
  ]
}
