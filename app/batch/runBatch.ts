/**
 * The headless runner: a plan in, the contract's files out, an exit code that says how it went.
 */
import { createHash } from 'node:crypto'
import path from 'node:path'
import { DomainError, type Problem } from '../../core/base'
import {
  canonicalInput,
  readPlan,
  SUMMARY_FORMAT,
  summaryText,
  sweepFileNames,
  unknownKeysInWords,
  type Plan,
  type SweepOutcome,
} from '../../core/plan'
import type { RecordData } from '../../core/report'
import { availableSections, run, SECTIONS, sweepDesign, type RunData, type Section } from '../../core/run'
import { fileSentence } from '../files/fileSentence'
import { decodeText, readText } from '../files/readText'
import { PROGRAM } from '../program'
import { HELP, readBatchArguments, type BatchRequest } from './arguments'
import { EXIT, Stop, stopWhenInterrupted, type BatchEnvironment, type ExitCode } from './environment'
import { mergedSweep } from './mergeParts'
import { makesRecord, recordText } from './recordFile'
import { readingsData, type ReadingsData } from './readingsData'
import { FolderRefusal, RECORD_NAME, resultFolder, SUMMARY_NAME, type ResultFolder } from './resultFolder'
import { fileNames, resultFiles, wanted } from './resultTables'
import { dropSweepNote, holdsOurPart, writeSweep } from './sweepFile'

export { EXIT, type BatchEnvironment, type ExitCode } from './environment'

/** Run the runner. Every refusal and failure becomes a sentence and an exit code; nothing is thrown. */
export async function runBatch(list: readonly string[], environment: BatchEnvironment): Promise<ExitCode> {
  try {
    await runOnce(list, environment)
    return EXIT.done
  } catch (error) {
    if (error instanceof Stop) {
      environment.note(error.message)
      return error.code
    }
    if (error instanceof FolderRefusal) {
      environment.note(error.message)
      return EXIT.refused
    }
    environment.note(`The run failed unexpectedly: ${error instanceof Error ? error.message : String(error)}`)
    return EXIT.failed
  }
}

async function runOnce(list: readonly string[], environment: BatchEnvironment): Promise<void> {
  const reading = readBatchArguments(list)
  if (!reading.ok) throw new Stop(EXIT.refused, reading.message)
  const { request } = reading
  if (request === 'help') {
    environment.writtenLine(HELP)
    return
  }
  const plan = planOf(await readInput(request.plan, environment), request.plan)
  const unknown = unknownKeysInWords(plan)
  if (unknown !== null) environment.note(`${inputName(request.plan)}: ${unknown}`)
  const absolute = path.resolve(environment.folder, request.out)
  const target: Target = {
    plan,
    planName: inputName(request.plan),
    inputHash: createHash('sha256').update(canonicalInput(plan)).digest('hex'),
    absolute,
    shown: request.out,
    folder: resultFolder(absolute, request.out, SUMMARY_FORMAT),
    environment,
  }
  if (request.merge !== null) await mergeRun(target, request.merge)
  else if (request.part !== null) await partRun(target, request)
  else {
    const asked = request.only === null || request.only.includes('readings')
    const read = asked ? await readingsData(plan, request.data, environment) : { plan, fields: null }
    await wholeRun({ ...target, plan: read.plan }, request, read.fields)
  }
}

/** What is computed, and where it goes. */
interface Target {
  readonly plan: Plan
  readonly planName: string
  readonly inputHash: string
  readonly absolute: string
  /** The folder as the user named it. */
  readonly shown: string
  readonly folder: ResultFolder
  readonly environment: BatchEnvironment
}

async function wholeRun(target: Target, { only }: BatchRequest, fields: ReadingsData['fields']): Promise<void> {
  const { plan, planName, folder, absolute, environment } = target
  const sections = sectionsOf(plan, only)
  if (only === null) noteUncomputed(plan, sections, environment)
  const sweeps = sections.includes('sweep')
  // A sweep that cannot be is told before anything is computed.
  if (sweeps) designOf(target)
  const beside = sweeps ? [sweepFileNames(null).note, sweepFileNames(null).unfinished] : []
  const names = [...fileNames(sections), SUMMARY_NAME]
  await folder.prepare([...names, ...beside], sweeps && (await holdsOurPart(absolute, null)))
  // Rows of a sweep that was stopped are known by its own note, and kept to go on from.
  const { table } = sweepFileNames(null)
  folder.begin(names.filter((name) => name !== table))
  stopWhenInterrupted(environment)

  // Rows of a sweep are written as they come, after what is computed once.
  const once = sections.filter((section) => section !== 'sweep')
  const result = await run(plan, { sections: once, fields }, { signal: environment.signal, pause: environment.pause })
  if (result.status === 'cancelled') throw new Stop(EXIT.interrupted, 'The run was interrupted.')
  if (result.status === 'done' && result.data !== null) {
    const { readings } = result.data
    if (readings?.status === 'failed') environment.note(`The readings: ${readings.message}`)
    await writeResults(target, wanted(result.data, sections), sections)
    return
  }
  const refused = result.field !== undefined
  // What was finished before a failure is kept, without a summary: that comes last and tells of a whole run.
  if (!refused && result.data !== null) await writeTables(target, wanted(result.data, sections))
  throw new Stop(refused ? EXIT.refused : EXIT.failed, `${planName}: ${result.message}`)
}

/** One part of the sweep, with its note; no summary, since other parts may lie in the same folder. */
async function partRun(target: Target, { part }: BatchRequest): Promise<void> {
  const { plan, folder, absolute } = target
  sectionsOf(plan, ['sweep'])
  const { table, note, unfinished } = sweepFileNames(part)
  await folder.prepare([table, note, unfinished], await holdsOurPart(absolute, part))
  await writeRows(target, part)
}

/** The parts as one sweep, with a summary. */
async function mergeRun(target: Target, folders: readonly string[]): Promise<void> {
  const { plan, folder, environment } = target
  sectionsOf(plan, ['sweep'])
  const sweep = designOf(target)
  const text = await mergedSweep(folders, target.inputHash, environment)
  const { table } = sweepFileNames(null)
  await folder.prepare([table, SUMMARY_NAME])
  folder.begin([table, SUMMARY_NAME])
  const { data, message } = await run(plan, { sections: [] })
  if (data === null) throw new Stop(EXIT.failed, `${target.planName}: ${message}`)
  await writeFile(target, table, text)
  await writeSummary(target, data, [table], sweep)
}

function writeRows(target: Target, part: BatchRequest['part']): Promise<readonly string[]> {
  const { absolute, folder, environment } = target
  return writeSweep({ ...target, folder: absolute, part, save: (name, text) => folder.write(name, text) }, environment)
}

/** @throws {Stop} where the sweep of the plan is refused */
function designOf({ plan, planName }: Target): SweepOutcome {
  try {
    return sweepDesign(plan)
  } catch (error) {
    if (error instanceof DomainError) throw new Stop(EXIT.refused, `${planName}: ${error.message}`)
    throw error
  }
}

async function readInput(given: string, environment: BatchEnvironment): Promise<string> {
  try {
    if (given === '-') return decodeText(await environment.readStandardInput())
    return await readText(path.resolve(environment.folder, given))
  } catch (error) {
    stopWhenInterrupted(environment)
    throw new Stop(EXIT.refused, fileSentence('open', given === '-' ? 'standard input' : given, error))
  }
}

function planOf(text: string, given: string): Plan {
  const reading = readPlan(text)
  if (!reading.ok) throw new Stop(EXIT.refused, refusalText(given, reading.problems))
  return reading.plan
}

function inputName(given: string): string {
  return given === '-' ? 'standard input' : given
}

/** One line per problem: the file, then field, value and limit in a sentence. */
function refusalText(given: string, problems: readonly Problem[]): string {
  const name = inputName(given)
  return problems.map(({ message }) => `${name}: ${message}`).join('\n')
}

function sectionsOf(plan: Plan, only: readonly string[] | null): readonly Section[] {
  const available = availableSections(plan)
  if (only === null) return available
  return only.map((name) => {
    const section = SECTIONS.find((known) => known === name)
    if (section === undefined) throw new Stop(EXIT.refused, `Section ${name} is not computed by this version.`)
    if (!available.includes(section))
      throw new Stop(EXIT.refused, `Section ${name} cannot be computed: the plan has no ${missing(plan, section)}.`)
    return section
  })
}

/** How a number is made to scatter. */
const SPREAD_KEYS =
  'spread.relative must name one and its relative deviation, or spread.absolute, for instance "relative": { "programme.stroke": 0.01 }'

function missing(plan: Plan, section: Section): string {
  if (section === 'water' || section === 'pulse') return plan.absent.join(' and no ')
  if (plan[section] === null) return section
  if (section === 'sweep') return 'field to sweep'
  if (section === 'readings' && plan.absent.length === 0) return 'rows, logs or fields among its readings'
  return plan.absent.length > 0 ? plan.absent.join(' and no ') : `number that scatters: ${SPREAD_KEYS}`
}

/** Sections a plan holds that are not computed: said, so that their absence is no surprise. */
function noteUncomputed(
  { readings, sweep, spread }: Plan,
  sections: readonly Section[],
  environment: BatchEnvironment,
): void {
  if (readings !== null && !sections.includes('readings'))
    environment.note('The readings hold nothing to compare, and are left out.')
  if (sweep !== null && !sections.includes('sweep'))
    environment.note('The sweep names no field to vary, and is left out.')
  if (spread !== null && !sections.includes('spread'))
    environment.note(`The spread names no number that scatters, and is left out: ${SPREAD_KEYS}.`)
}

/** Write the tables of what was finished. @returns their names */
async function writeTables(target: Target, data: RunData): Promise<readonly string[]> {
  const files: string[] = []
  try {
    for (const [name, content] of resultFiles(target.plan, data)) {
      await writeFile(target, name, content)
      files.push(name)
    }
    return files
  } catch (error) {
    // What was finished stays, but an earlier run's summary and record do not describe it.
    if (files.length > 0) await dropTellers(target, true)
    throw error
  }
}

async function writeFile({ folder, shown, environment }: Target, name: string, content: string): Promise<void> {
  stopWhenInterrupted(environment)
  try {
    await folder.write(name, content)
  } catch (error) {
    throw new Stop(EXIT.failed, fileSentence('save', path.join(shown, name), error))
  }
  environment.writtenLine(path.join(shown, name))
}

async function writeResults(target: Target, data: RunData, sections: readonly Section[]): Promise<void> {
  const tables = await writeTables(target, data)
  let record: readonly string[] = []
  try {
    const sweeps = sections.includes('sweep')
    const rows = sweeps ? await writeRows(target, null) : []
    const sweep = sweeps ? designOf(target) : null
    if (makesRecord(sections)) record = await writeRecord(target, { ...data, sweep })
    await writeSummary(target, data, [...tables, ...rows, ...record], sweep)
    if (sweeps) await dropSweepNote(target.absolute)
  } catch (error) {
    if (tables.length > 0) await dropTellers(target, record.length === 0)
    throw error
  }
}

/** Take away the summary of an earlier run, and its record unless this run has written its own. */
async function dropTellers({ folder }: Target, withRecord: boolean): Promise<void> {
  await folder.dropSummary().catch(() => undefined)
  if (withRecord) await folder.dropRecord().catch(() => undefined)
}

/** @returns its name */
async function writeRecord(target: Target, data: RecordData): Promise<readonly string[]> {
  const { plan, inputHash, environment } = target
  await writeFile(target, RECORD_NAME, recordText(plan, data, inputHash, environment.date ?? 'not given'))
  return [RECORD_NAME]
}

async function writeSummary(
  target: Target,
  data: RunData,
  tables: readonly string[],
  sweep: SweepOutcome | null,
): Promise<void> {
  const { plan, folder, inputHash } = target
  const files = [...tables, SUMMARY_NAME]
  await folder.dropEarlier(files)
  const summary = summaryText({ ...data, sweep, title: plan.title, files, program: PROGRAM, inputHash })
  try {
    await writeFile(target, SUMMARY_NAME, summary)
  } catch (error) {
    if (tables.length > 0) await folder.dropSummary().catch(() => undefined)
    throw error
  }
  await folder.finish()
}
