/**
 * The run sheet: what the laboratory has beside the tank on paper. What to check, how to set piston, camera and light, what to expect,
 * in what order to run, and room for what is read.
 */
import type { Caution, Plan, SpreadQuantity, Units } from '../plan'
import { formatNumber, formatQuantity } from '../quantity'
import type { MatrixRun, TankRunResult } from '../tank'
import { drawingColours } from './colours'
import type { DocumentBlock, PrintDocument } from './document/types'
import { combinationBlocks, fieldColumn } from './runSheetCombinations'
import { cameraBlocks, pistonBlocks, shownNumber, stationBlocks, triggerBlocks } from './runSheetBlocks'
import { tankScene } from './tankScene'
import { tankSceneToSvg } from './tankSceneSvg'

export interface RunSheetInput {
  readonly plan: Plan
  readonly result: TankRunResult
  /** Every caution of the plan and its results; each is printed. */
  readonly cautions: readonly Caution[]
  /** Shown units. */
  readonly units: Units
  /** Figures of a spread of this plan; absent where none was made. */
  readonly spread?: readonly SpreadQuantity[]
  /** As it is to stand on the sheet. */
  readonly date: string
  /** Program, version and the hash of the inputs. */
  readonly foot: string
}

/** Runs printed; a longer matrix stands in its file. */
const MOST_ROWS = 300
/** Rows to fill in by hand where the plan has no matrix. */
const BLANK_ROWS = 8
/** Columns of the order that a page has room for: levels and stations. */
const MOST_COLUMNS = 5

/** @returns null for a plan without a tank run */
export function runSheet(input: RunSheetInput): PrintDocument | null {
  const { plan, result, cautions, units, date, foot } = input
  const section = plan.tankRun
  if (section === null) return null
  const scene = tankScene({ section, nozzle: plan.nozzle, stroke: plan.programme.stroke, result }, units)
  const drawing = (part: 'whole' | 'path', height: number, caption: string): DocumentBlock => ({
    kind: 'figure',
    svg: tankSceneToSvg(scene, { width: 700, height, colours: drawingColours('print'), part, id: `run-sheet-${part}` }),
    caption,
  })
  return {
    kind: 'Run sheet',
    title: plan.title === '' ? 'Untitled plan' : plan.title,
    titleBlock: [
      ['Date', date],
      ['Nozzle', `${plan.nozzle.shape}, exit ${formatQuantity(plan.nozzle.diameter, units.length)}`],
      ['Water', waterText(plan, units)],
      ['Stroke', strokeText(plan, units)],
      ['Runs', result.matrix === null ? 'as written in below' : String(result.matrix.runs.length)],
      ['Time of the day', result.matrix === null ? 'not planned' : dayText(result.matrix.time.total)],
    ],
    blocks: [
      { kind: 'boxes', labels: ['Run by', 'Second person', 'Water temperature read', 'First run at'] },
      drawing('whole', 250, `Tank, ring and camera to scale; D is the exit diameter. ${scene.conventions.join(' ')}`),
      drawing('path', 250, 'Where the ring runs, to a larger scale. Bars: where it may be at the time it is expected.'),
      ...cautionBlocks(cautions, HAZARDS),
      ...pistonBlocks(plan, result, units),
      ...triggerBlocks(result, units),
      ...stationBlocks(result, units, input.spread ?? []),
      ...cameraBlocks(result, units),
      ...waitingBlocks(result, cautions),
      ...cautionBlocks(cautions, MODELS),
      ...combinationBlocks(result, section.stations, units),
      ...orderBlocks(result, section.stations, units),
      { kind: 'lines', label: 'Notes', count: 8 },
    ],
    foot,
  }
}

function waterText({ water }: Plan, { temperature }: Units): string {
  return water.kind === 'given' ? 'as given' : `${water.kind}, ${formatQuantity(water.temperatureCelsius, temperature)}`
}

function strokeText({ programme, nozzle }: Plan, { length, speed }: Units): string {
  const ratio = formatNumber(programme.stroke / nozzle.diameter, 3)
  return `${formatQuantity(programme.stroke, length)} (${ratio} D), peak ${formatQuantity(programme.peakSpeed, speed)}`
}

/** `3 h 51 min`. @param seconds >= 0 */
export function dayText(seconds: number): string {
  const minutes = Math.round(seconds / 60)
  const hours = Math.floor(minutes / 60)
  return hours === 0 ? `${minutes} min` : `${hours} h ${String(minutes % 60).padStart(2, '0')} min`
}

interface CautionPart {
  readonly group: Caution['group']
  readonly title: string
  /** Things that move or hurt have a box to tick. */
  readonly ticked: boolean
}

const HAZARDS: readonly CautionPart[] = [
  { group: 'machine', title: 'Before the piston moves', ticked: true },
  { group: 'laboratory', title: 'Before anyone starts', ticked: true },
  { group: 'vehicle', title: 'For vehicle and bench', ticked: true },
]
const MODELS: readonly CautionPart[] = [{ group: 'model', title: 'What these numbers do not tell', ticked: false }]

/** Every caution of some groups; a last sentence that all of a group share is printed once, over them. */
function cautionBlocks(cautions: readonly Caution[], parts: readonly CautionPart[]): DocumentBlock[] {
  return parts.flatMap(({ group, title, ticked }): DocumentBlock[] => {
    const texts = cautions.filter((caution) => caution.group === group).map(({ text }) => text)
    if (texts.length === 0) return []
    const shared = sharedEnding(texts)
    const items = texts.map((text) => text.slice(0, text.length - shared.length).trim())
    return [
      { kind: 'heading', text: title },
      ...(shared === '' ? [] : [{ kind: 'paragraph', text: `For each line: ${shared}` } as const]),
      { kind: ticked ? 'checklist' : 'list', items },
    ]
  })
}

/** The last sentence of every text, where it is the same and not the whole of one; '' else. */
function sharedEnding(texts: readonly string[]): string {
  const ending = texts.length < 2 ? null : /[.!?] ([^.!?]+[.!?])$/u.exec(texts[0] ?? '')
  const sentence = ending?.[1] ?? ''
  return sentence !== '' && texts.every((text) => text.endsWith(` ${sentence}`)) ? sentence : ''
}

/** What is told among the cautions as well stands there. */
function waitingBlocks({ settling, clearances, matrix }: TankRunResult, cautions: readonly Caution[]): DocumentBlock[] {
  const { start, jet, ring } = settling
  const items = [settling.text, start.text, jet.text, ring.text, ...clearances.map(({ text }) => text)]
  return [
    { kind: 'heading', text: 'Waiting and walls' },
    {
      kind: 'list',
      items: items.filter((item) => item === settling.text || !cautions.some(({ text }) => text.includes(item))),
    },
    ...(matrix === null ? [] : [{ kind: 'paragraph', text: matrix.text } as const]),
  ]
}

function orderBlocks({ matrix }: TankRunResult, stations: readonly number[], units: Units): DocumentBlock[] {
  const fields = (matrix?.paths ?? []).map((path) => fieldColumn(path, units))
  const runs = matrix?.runs ?? Array.from({ length: BLANK_ROWS }, (_, i) => blankRun(i + 1))
  const several = (matrix?.blocks ?? 1) > 1
  const marked = runs.some(({ ok }) => !ok)
  const read = stations.slice(0, Math.max(1, MOST_COLUMNS - fields.length))
  return [
    // The table of combinations has taken the order to a page of its own already.
    ...((matrix?.each.length ?? 0) < 2 ? [{ kind: 'pageBreak' } as const] : []),
    { kind: 'heading', text: 'Order of the runs' },
    {
      kind: 'table',
      caption: `To be read: the time (${units.wakeTime}) each ring comes by a station.${marked ? ' Runs with NO cannot be made as they stand: the combinations say why.' : ''}`,
      columns: [
        { title: 'Run', numeric: true },
        ...(several ? [{ title: 'Set-up', numeric: true }] : []),
        ...(matrix === null ? [] : [{ title: 'Repeat', numeric: true }]),
        ...fields.map(({ title }) => ({ title, numeric: true })),
        ...(marked ? [{ title: 'Can be made' }] : []),
        ...read.map((x) => ({ title: `at ${formatQuantity(x, units.length)}`, blank: true })),
        { title: 'File', blank: true },
        { title: 'Seen', blank: true },
      ],
      rows: runs
        .slice(0, MOST_ROWS)
        .map(({ run, block, repeat, values, ok }) => [
          String(run),
          ...(several ? [String(block)] : []),
          ...(matrix === null ? [] : [String(repeat)]),
          ...fields.map(({ unit }, i) => shownNumber(values[i] ?? null, unit)),
          ...(marked ? [ok ? 'yes' : 'NO'] : []),
          ...read.map(() => ''),
          '',
          '',
        ]),
    },
    ...(runs.length > MOST_ROWS
      ? [{ kind: 'paragraph', text: `Runs ${MOST_ROWS + 1} to ${runs.length} stand in run-matrix.csv.` } as const]
      : []),
  ]
}

function blankRun(run: number): MatrixRun {
  return { run, block: 1, repeat: 1, values: [], ok: true, reason: null }
}
