/**
 * A sweep: the plan at every combination of the values of some of its fields, the last field fastest.
 *
 * A row is a plan of its own: what is read from it is what the summary of that plan says. A row that is refused or fails is told in its
 * place, with the reason, and the sweep goes on.
 */
import { at, DomainError, type RunStatus } from '../base'
import { loadKernel } from '../kernel'
import {
  rowsOfPart,
  summaryDocument,
  summaryValue,
  sweepResults,
  validatePlan,
  WHOLE_SWEEP,
  type Cell,
  type Plan,
  type SweepField,
  type SweepOutcome,
  type SweepPart,
  type SweepRow,
} from '../plan'
import type { JetRunOptions } from './jet'
import { createJetCache } from './jetCache'
import { requirePeriod } from './thruster'
import type { SweepData } from './sweepData'
import type { RunData, RunRequest, RunResult, Section } from './types'
import { variedPlan, type SetValue } from './variedPlan'

export interface SweepOptions extends JetRunOptions {
  /** The part to compute; default the whole sweep. */
  readonly part?: SweepPart
  /** Rows of the part that are there already, from its first on; default none. */
  readonly from?: number
  /** Told each row when it is finished, and waited for. */
  readonly onRow?: (row: SweepRow) => void | Promise<void>
  /** Whether the rows are kept and returned; default true. Off where `onRow` puts them away. */
  readonly keepRows?: boolean
}

/** How a row is computed: `run`, handed in because it computes sweeps itself. */
export type ComputeRow = (plan: Plan, request: RunRequest, options: JetRunOptions) => Promise<RunResult>

/** Sections whose values may be read. */
const READ: readonly Section[] = ['water', 'pulse', 'jet', 'wake', 'thruster', 'tankRun']

/** What a sweep comes to before a row is computed. */
export interface SweepDesign extends SweepOutcome {
  readonly fields: readonly SweepField[]
  readonly request: RunRequest
}

/**
 * Rows, columns and sections of the sweep of a plan.
 *
 * @throws {DomainError} on sweep.fields or sweep.results: nothing to vary or read, a path that sets nothing, a section that is absent
 */
export function sweepDesign(plan: Plan): SweepDesign {
  const fields = plan.sweep?.fields ?? []
  if (fields.length === 0)
    throw new DomainError('sweep.fields', 'sweep.fields must name at least one field to vary, got none')
  // Tells paths that set nothing before any row is computed.
  const first = variedPlan(plan, settingsOf(fields, 0), fieldName)
  const results = sweepResults(plan)
  if (results.length === 0)
    throw new DomainError('sweep.results', 'sweep.results must name what is read: the plan has no section to read from')
  const sections = new Set<Section>()
  results.forEach((path, i) => {
    const [start] = path.split('.')
    const section = READ.find((name) => name === start)
    if (section === undefined || !holds(first, section))
      throw new DomainError(
        `sweep.results.${i}`,
        `sweep.results.${i} must start with a section that the plan has, one of ${READ.filter((name) => holds(first, name)).join(', ')}; got "${path}"`,
      )
    sections.add(section)
  })
  if (sections.has('thruster')) requirePeriod(first)
  const sizing = results.some((path) => /^thruster\.(?:candidates|front|sizing)\b/.test(path)) ? 'run' : 'off'
  return {
    fields,
    paths: fields.map(({ path }) => path),
    results,
    total: fields.reduce((product, { values }) => product * values.length, 1),
    request: { sections: [...sections], sizing, order: 'plain' },
  }
}

function holds(plan: Plan, section: Section): boolean {
  if (section === 'water') return true
  if (section === 'wake') return plan.wake !== null
  if (plan.absent.length > 0) return false
  return section === 'thruster' ? plan.thruster !== null : section === 'tankRun' ? plan.tankRun !== null : true
}

/** Values of a row, counted from 0; the last field changes fastest. */
function settingsOf(fields: readonly SweepField[], row: number): readonly SetValue[] {
  let rest = row
  const settings: SetValue[] = []
  for (const { path, values } of fields.toReversed()) {
    settings.unshift({ path, value: at(values, rest % values.length) })
    rest = Math.floor(rest / values.length)
  }
  return settings
}

function fieldName(index: number): string {
  return `sweep.fields.${index}.path`
}

/**
 * Compute a sweep, or a part of it.
 *
 * @returns status 'cancelled' with the rows that were finished
 * @throws {DomainError} as `sweepDesign`, and on sweep.results.… where the summary has no such value
 */
export async function sweepRows(plan: Plan, compute: ComputeRow, options: SweepOptions = {}): Promise<SweepData> {
  const design = sweepDesign(plan)
  const { part = WHOLE_SWEEP, from = 0, keepRows = true, onRow, signal, pause } = options
  const shared: JetRunOptions = {
    kernel: options.kernel ?? (await loadKernel()),
    jetCache: options.jetCache ?? createJetCache(),
    ...(signal === undefined ? {} : { signal }),
    ...(pause === undefined ? {} : { pause }),
  }
  const numbers = rowsOfPart(part, design.total)
  const rows: SweepRow[] = []
  const ended = (status: RunStatus, message: string): SweepData => {
    const { paths, results, total } = design
    return { status, message, part, paths, results, total, rows }
  }
  for (let k = from; k < numbers.length; k++) {
    await pause?.()
    if (signal?.aborted === true) return ended('cancelled', `Cancelled: ${k} of ${numbers.length} rows are finished.`)
    const number = at(numbers, k)
    options.onProgress?.({ share: k / numbers.length, what: `row ${number} of ${design.total}` })
    const row = await rowOf(plan, design, number, compute, shared)
    if (row === null) return ended('cancelled', `Cancelled: ${k} of ${numbers.length} rows are finished.`)
    if (keepRows) rows.push(row)
    await onRow?.(row)
  }
  return ended('done', 'Done.')
}

/** @returns null where it was cancelled */
async function rowOf(
  plan: Plan,
  design: SweepDesign,
  row: number,
  compute: ComputeRow,
  options: JetRunOptions,
): Promise<SweepRow | null> {
  const settings = settingsOf(design.fields, row - 1)
  const inputs = settings.map(({ value }) => value)
  const refused = (limit: string): SweepRow => ({
    row,
    inputs,
    results: design.results.map(() => null),
    feasible: false,
    limit,
  })
  // What a row does not read is left out of it: it need not be checked a thousand times.
  const bare: Plan = { ...plan, sweep: null, spread: null, held: [] }
  const varied = variedPlan(bare, settings, fieldName)
  const problems = validatePlan(varied)
  if (problems.length > 0) return refused(problems.map(({ message }) => message).join(' '))
  const result = await compute(varied, design.request, options)
  if (result.status === 'cancelled') return null
  if (result.status === 'failed' || result.data === null) return refused(result.message)
  const broken = brokenLimits(result.data)
  return {
    row,
    inputs,
    results: valuesOf(result.data, design.results),
    feasible: broken.length === 0,
    limit: broken.length === 0 ? null : broken.join('; '),
  }
}

function valuesOf(data: RunData, paths: readonly string[]): readonly Cell[] {
  const document = summaryDocument(data)
  return paths.map((path, i) => {
    const found = summaryValue(document, path)
    if (found.known) return found.value
    throw new DomainError(
      `sweep.results.${i}`,
      `sweep.results.${i} must be the dotted path of one value of the summary, such as pulse.ring.speed; got "${path}"`,
    )
  })
}

/** Limits that are not held, by name, each once. */
function brokenLimits({ thruster, tankRun }: RunData): readonly string[] {
  const names = [
    ...(thruster?.result.limits ?? []).filter(({ ok }) => !ok).map(({ name }) => name),
    ...(tankRun?.profile.limits ?? []).filter(({ ok }) => !ok).map(({ name }) => `piston ${name}`),
  ]
  return [...new Set(names)]
}
