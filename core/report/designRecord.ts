/**
 * The design record: what was designed, from which numbers, by which models, how sure that is, and what to beware of. One document for
 * print, the same from the window and from the runner.
 */
import type { Plan } from '../plan'
import type { DocumentBlock, PrintDocument } from './document/types'
import { adoptedModels, assumptionBlocks } from './record/assumptions'
import { cautionBlocks } from './record/cautions'
import { formulaBlocks, recordExplanations } from './record/formulas'
import { inputBlocks } from './record/inputs'
import { jetBlocks } from './record/jet'
import { limitBlocks, limitRows } from './record/limits'
import { figureTable, formationFigures, pulseBlocks, pulseDrawing, ringFigures, type FigureRow } from './record/pulse'
import { showOf } from './record/show'
import { sourceBlocks } from './record/sources'
import { spreadBlocks, sweepBlocks } from './record/spread'
import { tankBlocks } from './record/tank'
import { thrusterBlocks, thrustFigures } from './record/thruster'
import type { RecordContext, RecordData, RecordMeta } from './record/types'
import { wakeBlocks } from './record/wake'

/** Digits of the hash that stand in the title block; all of it stands in the foot. */
const HASH_SHOWN = 16
/** Properties of water are known better than what is made of them. */
const WATER_DIGITS = 5

/**
 * The design record of a plan and its results.
 *
 * @param data results as a run gives them; a section that was not computed is left out
 * @param meta date as it is to be printed, program, hash of the plan's canonical input
 */
export function designRecord(plan: Plan, data: RecordData, meta: RecordMeta): PrintDocument {
  const context: RecordContext = { plan, data, show: showOf(plan) }
  const { program, inputHash, date } = meta
  const revision = plan.revision === '' ? 'none given' : plan.revision
  return {
    kind: plan.revision === '' ? 'Design record' : `Design record, revision ${plan.revision}`,
    numbered: true,
    title: plan.title.trim() === '' ? 'Untitled plan' : plan.title,
    titleBlock: [
      ['Revision', revision],
      ['Date', date],
      ['Program', `${program.name} ${program.version}`],
      ['Input hash (SHA-256)', inputHash === '' ? 'not known here' : `${inputHash.slice(0, HASH_SHOWN)}…`],
    ],
    blocks: [
      { kind: 'boxes', labels: ['Prepared by (name, date, signature)', 'Checked by (name, date, signature)'] },
      ...summaryBlocks(context),
      ...inputBlocks(context),
      ...assumptionBlocks(context),
      ...resultBlocks(context),
      ...limitBlocks(context),
      ...cautionBlocks(data.cautions),
      ...formulaBlocks(context),
      ...sourceBlocks(
        sourceTexts(context),
        data.cautions.map(({ source }) => source),
      ),
    ],
    foot: `${program.name} ${program.version}. Input hash (SHA-256) ${inputHash === '' ? 'not known here' : inputHash}. The same input gives the same numbers in the same version of the program.`,
  }
}

/** What a reader in a hurry needs: figures with their ranges, the drawing, and what stands against the design. */
function summaryBlocks(context: RecordContext): readonly DocumentBlock[] {
  const { plan, data, show } = context
  const { pulse, thruster, tankRun, wake } = data
  const rows: FigureRow[] = []
  if (pulse !== null) {
    rows.push(...formationFigures(context, pulse))
    if (pulse.ring !== null) rows.push(...ringFigures(pulse, show).filter(([name]) => HEADLINES.has(name)))
  }
  if (thruster !== null) {
    const { result } = thruster
    rows.push(...thrustFigures(result, show).slice(0, 1))
    rows.push(['Total power', '', show.result(result.power.total, 'power'), 'put into all actuators'])
    rows.push([
      'Speed of the vehicle',
      '',
      show.result(result.speed, 'vehicleSpeed'),
      result.dragAtSpeed === null ? 'bench' : 'where thrust meets drag, or as held',
    ])
  }
  const laws = new Set(tankRun?.rings.map(({ ageing }) => ageing)).size
  for (const arrival of tankRun?.arrivals ?? [])
    rows.push([
      `Ring at ${show.result(arrival.station, 'length')}`,
      show.range(arrival.timeLow, arrival.timeHigh, 'wakeTime'),
      show.result(arrival.time, 'wakeTime'),
      laws > 1 ? 'ends of the ring’s range and both ageing laws' : 'ends of the ring’s range',
    ])
  if (tankRun === null)
    for (const { station, ring, time, timeLow, timeHigh } of (wake?.arrivals ?? []).slice(0, 4))
      rows.push([
        `Ring ${ring} at ${show.result(station, 'length')}`,
        timeHigh === null ? `${show.result(timeLow, 'wakeTime')} or later` : show.range(timeLow, timeHigh, 'wakeTime'),
        show.result(time, 'wakeTime'),
        'between the ageing laws where both were run',
      ])
  return [
    { kind: 'heading', text: 'Summary' },
    ...(plan.notes.trim() === '' ? [] : [{ kind: 'paragraph', text: plan.notes } as const]),
    ...verdict(context),
    ...(rows.length === 0 ? [] : [figureTable(null, rows)]),
    ...(pulse === null ? [] : [pulseDrawing(context, pulse)]),
  ]
}

const HEADLINES: ReadonlySet<string> = new Set([
  'Ring circulation',
  'Ring speed',
  'Ring radius',
  'Ring impulse',
  'Ring Reynolds number',
])

/** Whether limits hold, and how much there is to read before the design is relied on. */
function verdict(context: RecordContext): DocumentBlock[] {
  const rows = limitRows(context)
  const broken = rows.filter(({ ok }) => !ok)
  const outside = recordExplanations(context).filter(({ inside }) => !inside).length
  const { length } = context.data.cautions
  const limits =
    rows.length === 0
      ? ''
      : broken.length === 0
        ? `All ${rows.length} limits that were checked hold. `
        : `${broken.length} of ${rows.length} limits are broken: ${broken.map(({ name }) => name).join(', ')}. `
  const formulas =
    outside === 0
      ? ''
      : ` ${outside} of the formulas ${outside === 1 ? 'is' : 'are'} used outside or at the edge of where ${outside === 1 ? 'it holds' : 'they hold'}; each says so.`
  return [
    {
      kind: 'paragraph',
      tone: broken.length === 0 ? 'plain' : 'limit',
      text: `${limits}${length} ${length === 1 ? 'caution applies' : 'cautions apply'}.${formulas}`,
    },
  ]
}

function resultBlocks(context: RecordContext): readonly DocumentBlock[] {
  const { water } = context.data
  const { show } = context
  return [
    { kind: 'heading', text: 'Results' },
    {
      kind: 'paragraph',
      tone: 'small',
      text: 'Ranges stand first, adopted values second. A range is what the models leave open, not a tolerance of manufacture, unless it says so.',
    },
    ...notComputed(context),
    { kind: 'subheading', text: 'Water' },
    {
      kind: 'pairs',
      rows: [
        ['Density', show.result(water.density, 'density', WATER_DIGITS)],
        ['Kinematic viscosity', show.result(water.kinematicViscosity, 'kinematicViscosity', WATER_DIGITS)],
        ['Vapour pressure', show.result(water.vapourPressure, 'pressure', WATER_DIGITS)],
        ['Pressure at the nozzle', show.result(water.absolutePressure, 'pressure', WATER_DIGITS)],
      ],
    },
    ...pulseBlocks(context),
    ...jetBlocks(context),
    ...wakeBlocks(context),
    ...thrusterBlocks(context),
    ...tankBlocks(context),
    ...spreadBlocks(context),
    ...sweepBlocks(context),
  ]
}

const SECTIONS = [
  ['jet', 'starting jet'],
  ['wake', 'wake'],
  ['thruster', 'thrusters'],
  ['tankRun', 'tank run'],
  ['spread', 'spread'],
  ['sweep', 'sweep'],
] as const

/** Sections that stand in the plan and have no results here. */
function notComputed({ plan, data }: RecordContext): DocumentBlock[] {
  const names = SECTIONS.filter(([key]) => plan[key] !== null && data[key] === null).map(([, name]) => name)
  if (names.length === 0) return []
  return [{ kind: 'paragraph', tone: 'small', text: `In the plan, not computed for this record: ${names.join(', ')}.` }]
}

/** Every text of the record that names where something comes from. */
function sourceTexts(context: RecordContext): readonly string[] {
  return [
    ...context.data.water.sources,
    ...adoptedModels(context).map(([, , source]) => source),
    ...recordExplanations(context).map(({ source }) => source),
    ...context.data.cautions.map(({ source }) => source),
  ]
}
