/**
 * The comparison of readings with the prediction as a printed document, and as further blocks of a design record: the same from the window
 * and from the runner.
 */
import { holdsMeasuredPulse, MEASURED_PULSE, shownUnit, type Plan } from '../plan'
import type { PulseResult } from '../pulse'
import { formatQuantity } from '../quantity'
import { FIT_NAMES, type FieldFiles, type FitName, type ReadingsResult, type ReadingsSource } from '../tank'
import type { DocumentBlock, PrintDocument } from './document/types'
import { measuredPulseRows } from './measuredPulse'
import { plotToSvg } from './plotSvg'
import { cyclePlot, fieldPlot, forcePlot, residualPlot, trackPlots, type ReadingsPlotUnits } from './readingsPlots'
import { showOf, type Show } from './record/show'
import type { RecordMeta } from './record/types'
import { thinPlot } from './thinPlot'
import type { PlotModel } from './types'

const WIDE = { width: 660, height: 340, theme: 'print' } as const
const SMALL = { width: 330, height: 230, theme: 'print' } as const

const FIT_LABELS: Readonly<Record<FitName, readonly [string, 'circulation' | 'wakeTime' | 'length']>> = {
  circulation: ['Circulation', 'circulation'],
  startTime: ['Start time', 'wakeTime'],
  startPosition: ['Start position', 'length'],
  radius: ['Ring radius', 'length'],
  coreRadius: ['Core radius', 'length'],
}

/** @param pulse of the plan, for the measured pulse; null where it was not computed */
export function comparisonRecord(
  plan: Plan,
  result: ReadingsResult,
  pulse: PulseResult | null,
  meta: RecordMeta,
): PrintDocument {
  const { program, inputHash, date } = meta
  return {
    kind: 'Comparison with readings',
    title: plan.title.trim() === '' ? 'Untitled plan' : plan.title,
    titleBlock: [
      ['Date', date],
      ['Program', `${program.name} ${program.version}`],
      ['Rows in the fit', String(result.rows)],
      ['Runs', String(result.perRun.length)],
    ],
    blocks: [
      ...comparisonBlocks(plan, result, pulse),
      { kind: 'boxes', labels: ['Compared by (name, date, signature)', 'Checked by (name, date, signature)'] },
    ],
    foot: `${program.name} ${program.version}. Input hash (SHA-256) ${inputHash}.`,
  }
}

/** The comparison as blocks of a document, under headings of its own. */
export function comparisonBlocks(
  plan: Plan,
  result: ReadingsResult,
  pulse: PulseResult | null,
): readonly DocumentBlock[] {
  const show = showOf(plan)
  return [
    ...verdictBlocks(plan, result, pulse, show),
    ...trackBlocks(plan, result),
    ...fitBlocks(result, show),
    ...fieldBlocks(plan, result, show),
    ...forceBlocks(plan, result, show),
    ...noteBlocks(result),
    ...sourceBlocks(plan.readings?.sources ?? [], plan.readings?.fields ?? null),
  ]
}

function verdictBlocks(
  plan: Plan,
  { verdicts, status, message }: ReadingsResult,
  pulse: PulseResult | null,
  show: Show,
): readonly DocumentBlock[] {
  const measured = holdsMeasuredPulse(plan)
  const shown = verdicts.filter(({ quantity }) => !measured || quantity === 'speed')
  return [
    { kind: 'heading', text: 'Readings against the prediction' },
    ...(status === 'failed' ? [{ kind: 'paragraph' as const, text: message, tone: 'limit' as const }] : []),
    ...(measured ? measuredBlocks(pulse, show) : []),
    ...shown.map((verdict): DocumentBlock => ({
      kind: 'paragraph',
      text: verdict.text,
      tone: verdict.state === 'outside' ? 'limit' : 'plain',
    })),
  ]
}

function measuredBlocks(pulse: PulseResult | null, show: Show): readonly DocumentBlock[] {
  const rows =
    pulse === null
      ? []
      : measuredPulseRows(pulse, {
          energy: show.unit('energy', [pulse.slug.energy]),
          ringSpeed: show.unit('ringSpeed', [MEASURED_PULSE.ringSpeed]),
          time: show.unit('time', [MEASURED_PULSE.halfImpulseTime]),
        })
  return [
    {
      kind: 'table',
      caption: 'Measured, beside the prediction',
      columns: [
        { title: 'Quantity' },
        { title: 'Measured', numeric: true },
        { title: 'Slug', numeric: true },
        { title: 'Slug and quick start', numeric: true },
      ],
      rows: rows.map(({ label, unit, measured, slug, quickStart }) => [
        `${label} (${unit})`,
        measured,
        slug,
        quickStart,
      ]),
    },
    ...MEASURED_PULSE.words.map((text): DocumentBlock => ({ kind: 'paragraph', text })),
    { kind: 'subheading', text: 'Source and licence of the data' },
    ...[MEASURED_PULSE.source, MEASURED_PULSE.paper, ...MEASURED_PULSE.licence].map((text): DocumentBlock => ({
      kind: 'paragraph',
      text,
      tone: 'small',
    })),
  ]
}

function unitsOf(plan: Plan, result: ReadingsResult): ReadingsPlotUnits {
  const chosen = plan.view.units
  const circulation = result.calibrated.reduce((most, row) => Math.max(most, Math.abs(row.circulation ?? 0)), 0)
  return {
    length: shownUnit('length', chosen),
    wakeTime: shownUnit('wakeTime', chosen),
    circulation: shownUnit('circulation', chosen, circulation === 0 ? undefined : circulation),
    force: shownUnit('force', chosen, result.force === null ? undefined : Math.abs(result.force.peak)),
  }
}

function picture(
  model: PlotModel,
  size: typeof WIDE | typeof SMALL,
): { readonly svg: string; readonly caption: string } {
  return { svg: plotToSvg(thinPlot(model), size), caption: model.title }
}

function trackBlocks(plan: Plan, result: ReadingsResult): readonly DocumentBlock[] {
  const options = { units: unitsOf(plan, result), run: null, jet: null }
  const [first, ...others] = trackPlots(result, options)
  if (first === undefined) return []
  const left = residualPlot(result, 'x', options)
  return [
    { kind: 'heading', text: 'Tracks' },
    { kind: 'figure', ...picture(first, WIDE) },
    { kind: 'figures', items: [...others, ...(left === null ? [] : [left])].map((model) => picture(model, SMALL)) },
  ]
}

function fitBlocks(result: ReadingsResult, show: Show): readonly DocumentBlock[] {
  const factor = result.laws[0]?.intervalFactor ?? 1.96
  const found = FIT_NAMES.flatMap((name) => {
    const own = result.fit[name]
    if (own === undefined) return []
    const [label, key] = FIT_LABELS[name]
    const half = factor * own.standardError
    return [
      [
        label,
        show.result(own.value, key),
        // In the unit of the value, not in one of its own size.
        formatQuantity(own.standardError, show.unit(key, [own.value]), 2),
        show.range(own.value - half, own.value + half, key),
      ],
    ]
  })
  if (found.length === 0) return []
  const { perRun, fitted } = result
  return [
    { kind: 'heading', text: 'Fit' },
    {
      kind: 'table',
      caption: `All runs together, ${result.rows} rows; residual of the places ${show.result(result.residualRms, 'length')} (root mean square).`,
      columns: [
        { title: 'Parameter' },
        { title: 'Value', numeric: true },
        { title: 'Standard error', numeric: true },
        { title: '95 % interval', numeric: true },
      ],
      rows: found,
    },
    ...(perRun.length < 2
      ? []
      : [
          {
            kind: 'table' as const,
            caption: 'Run by run',
            columns: [{ title: 'Run' }, ...fitted.map((name) => ({ title: FIT_LABELS[name][0], numeric: true }))],
            rows: [
              ...perRun.map(({ run, fit }) => [
                run,
                ...fitted.map((name) => show.result(fit[name]?.value, FIT_LABELS[name][1])),
              ]),
              ['mean', ...fitted.map((name) => show.result(result.repeats[name]?.mean, FIT_LABELS[name][1]))],
              [
                'scatter',
                ...fitted.map((name) => show.result(result.repeats[name]?.standardDeviation, FIT_LABELS[name][1])),
              ],
            ],
          },
        ]),
    ...result.held.map(({ reason }): DocumentBlock => ({ kind: 'paragraph', text: reason, tone: 'small' })),
  ]
}

function fieldBlocks(plan: Plan, result: ReadingsResult, show: Show): readonly DocumentBlock[] {
  const { fields } = result
  if (fields === null || fields.frames.length === 0) return []
  const { ring, formationNumber, pinchOff } = fields
  const rows: (readonly [string, string])[] = [['Frames', String(fields.frames.length)]]
  if (formationNumber !== null)
    rows.push([
      'Measured formation number',
      `${show.result(formationNumber.value, 'number')}, standard error ${show.result(formationNumber.standardError, 'number')}`,
    ])
  if (pinchOff !== null) rows.push(['Pinched off at', show.result(pinchOff.time, 'wakeTime')])
  if (ring !== null)
    rows.push(
      ['Frames of the ring', `${ring.from + 1} to ${ring.to + 1}`],
      ['Circulation of the ring', show.result(ring.circulation.value, 'circulation')],
      ['Radius', show.result(ring.radius.value, 'length')],
      ['Core radius (median of the frames)', show.result(ring.coreRadius.value, 'length')],
      ['Impulse', show.result(ring.impulse.value, 'impulse')],
    )
  return [
    { kind: 'heading', text: 'Velocity fields' },
    { kind: 'pairs', rows },
    { kind: 'figure', ...picture(fieldPlot(fields, unitsOf(plan, result)), WIDE) },
  ]
}

function forceBlocks(plan: Plan, result: ReadingsResult, show: Show): readonly DocumentBlock[] {
  const { force } = result
  const section = plan.readings
  if (force === null || section === null) return []
  const units = unitsOf(plan, result)
  const within = (value: number, error: number | null, key: 'force' | 'impulse'): string =>
    error === null
      ? show.result(value, key)
      : `${show.result(value, key)}, standard error ${formatQuantity(error, show.unit(key, [value]), 2)}`
  const plots = [forcePlot(section.force, section.calibration, result, units), cyclePlot(result, units)]
  return [
    { kind: 'heading', text: 'Force' },
    {
      kind: 'pairs',
      rows: [
        ...(force.mean === null
          ? []
          : [['Mean over whole periods', within(force.mean, force.errors.mean, 'force')] as const]),
        ['Peak', within(force.peak, force.errors.peak, 'force')],
        ['Impulse a pulse', within(force.impulse, force.errors.impulse, 'impulse')],
        ['Ripple', show.result(force.ripple, 'number')],
        ...(force.mean === null ? [] : [['Whole periods', String(force.periods)] as const]),
        ['Measured over predicted', show.result(force.lossFactor?.value, 'number')],
      ],
    },
    { kind: 'figures', items: plots.flatMap((model) => (model === null ? [] : [picture(model, SMALL)])) },
  ]
}

function noteBlocks({ notes }: ReadingsResult): readonly DocumentBlock[] {
  if (notes.length === 0) return []
  return [
    { kind: 'heading', text: 'To know about this comparison' },
    { kind: 'list', items: [...new Set(notes)] },
  ]
}

function sourceBlocks(sources: readonly ReadingsSource[], fields: FieldFiles | null): readonly DocumentBlock[] {
  if (sources.length === 0) return []
  return [
    { kind: 'subheading', text: 'Files of the readings' },
    {
      kind: 'table',
      caption: null,
      columns: [{ title: 'File' }, { title: 'SHA-256' }],
      rows: sources.map(({ name, hash, kind }) => [
        kind === 'fields' ? setOf(name, fields) : name,
        hash === '' ? 'pasted' : hash,
      ]),
    },
  ]
}

/** The hash of velocity fields is of their set: of the hashes of the files, one a line. */
function setOf(name: string, fields: FieldFiles | null): string {
  const names = [...new Set(fields?.frames.map((frame) => frame.name) ?? [])]
  const [first, last] = [names[0], names.at(-1)]
  if (names.length < 2 || first === undefined || last === undefined) return `${name} (hash of its hash)`
  return `Set of ${names.length} files, ${first} to ${last} (hash of their hashes, one a line)`
}
