/**
 * The headless runner: a plan in, the contract's files out, an exit code that says how it went.
 */
import { createHash } from 'node:crypto'
import path from 'node:path'
import type { Problem } from '../../core/base'
import {
  canonicalInput,
  eventTable,
  jetTable,
  pulseTable,
  readPlan,
  SUMMARY_FORMAT,
  summaryText,
  trajectoryTable,
  unknownKeysInWords,
  wakeFile,
  wakeFileName,
  wakeTimesTable,
  type Plan,
} from '../../core/plan'
import { availableSections, run, SECTIONS, type RunData, type Section } from '../../core/run'
import { fileSentence } from '../files/fileSentence'
import { decodeText, readText } from '../files/readText'
import { PROGRAM } from '../program'
import { readBatchArguments } from './arguments'
import { FolderRefusal, resultFolder, SUMMARY_NAME, type ResultFolder } from './resultFolder'

export const EXIT = { done: 0, failed: 1, refused: 2, interrupted: 130 } as const
export type ExitCode = (typeof EXIT)[keyof typeof EXIT]

export interface BatchEnvironment {
  /** Folder that paths on the command line are relative to. */
  readonly folder: string
  readonly signal: AbortSignal
  /** Lets an interrupt in between the steps of a long computation. */
  readonly pause: () => Promise<void>
  readStandardInput(): Promise<Uint8Array>
  /** One line per file written. */
  writtenLine(text: string): void
  /** Everything else: refusals, notes. */
  note(text: string): void
}

/** A stop with its exit code and the sentence for standard error. */
class Stop extends Error {
  readonly code: ExitCode

  constructor(code: ExitCode, message: string) {
    super(message)
    this.name = 'Stop'
    this.code = code
  }
}

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
  const plan = planOf(await readInput(request.plan, environment), request.plan)
  const unknown = unknownKeysInWords(plan)
  if (unknown !== null) environment.note(`${inputName(request.plan)}: ${unknown}`)
  const sections = sectionsOf(plan, request.only)
  if (request.only === null) noteUncomputed(plan, environment)

  const folder = resultFolder(path.resolve(environment.folder, request.out), request.out, SUMMARY_FORMAT)
  await folder.prepare([...fileNames(sections), SUMMARY_NAME])
  stopWhenInterrupted(environment)

  const result = await run(plan, { sections }, { signal: environment.signal, pause: environment.pause })
  if (result.status === 'cancelled') throw new Stop(EXIT.interrupted, 'The run was interrupted.')
  if (result.status === 'done' && result.data !== null) {
    await writeResults(folder, request.out, plan, wanted(result.data, sections), environment)
    return
  }
  const refused = result.field !== undefined
  // What was finished before a failure is kept, without a summary: that comes last and tells of a whole run.
  if (!refused && result.data !== null)
    await writeTables(folder, request.out, plan, wanted(result.data, sections), environment)
  throw new Stop(refused ? EXIT.refused : EXIT.failed, `${request.plan}: ${result.message}`)
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

function missing(plan: Plan, section: Section): string {
  return section === 'pulse' ? plan.absent.join(' and no ') : section
}

/** What was asked for: a section computed only because another needs it is not written. */
function wanted(data: RunData, sections: readonly Section[]): RunData {
  return sections.includes('pulse') ? data : { ...data, pulse: null }
}

/** Sections a plan may hold that later versions compute: said, so that their absence is no surprise. */
function noteUncomputed(plan: Plan, environment: BatchEnvironment): void {
  const later = ['thruster', 'tankRun', 'readings', 'sweep', 'spread']
  const held = later.filter((name) => typeof plan.source[name] === 'object' && plan.source[name] !== null)
  if (held.length > 0) environment.note(`Not computed by this version, and left out: ${held.join(', ')}.`)
}

function fileNames(sections: readonly Section[]): readonly string[] {
  return [
    ...(sections.includes('pulse') ? ['pulse.csv'] : []),
    ...(sections.includes('jet') ? ['jet.csv'] : []),
    ...(sections.includes('wake') ? ['trajectory.csv', 'wake', 'wake-times.csv'] : []),
    ...(sections.includes('jet') || sections.includes('wake') ? ['events.csv'] : []),
  ]
}

/** Tables of the finished sections in the order they are written, each made when its turn comes. */
function* tablesOf(plan: Plan, { pulse, jet, wake }: RunData): Generator<readonly [name: string, content: string]> {
  const ofPulse = plan.wake === null || plan.wake.rings.length === 0
  if (pulse !== null) yield ['pulse.csv', pulseTable(pulse)]
  if (jet !== null) yield ['jet.csv', jetTable(jet)]
  if (wake !== null) yield ['trajectory.csv', trajectoryTable(wake.wake)]
  if (jet !== null || wake !== null) yield ['events.csv', eventTable(wake?.wake ?? null, jet, ofPulse)]
  if (wake === null) return
  for (let index = 0; index < wake.wake.outputTimes.length; index++)
    yield [`wake/${wakeFileName(index)}`, wakeFile(wake.wake, index)]
  yield ['wake-times.csv', wakeTimesTable(wake.wake)]
}

/** Write the tables of what was finished. @returns their names */
async function writeTables(
  folder: ResultFolder,
  shown: string,
  plan: Plan,
  data: RunData,
  environment: BatchEnvironment,
): Promise<readonly string[]> {
  const files: string[] = []
  try {
    for (const [name, content] of tablesOf(plan, data)) {
      await writeFile(folder, shown, name, content, environment)
      files.push(name)
    }
    return files
  } catch (error) {
    // What was finished stays, but an earlier run's summary does not describe it.
    if (files.length > 0) await folder.dropSummary().catch(() => undefined)
    throw error
  }
}

async function writeFile(
  folder: ResultFolder,
  shown: string,
  name: string,
  content: string,
  environment: BatchEnvironment,
): Promise<void> {
  stopWhenInterrupted(environment)
  try {
    await folder.write(name, content)
  } catch (error) {
    throw new Stop(EXIT.failed, fileSentence('save', path.join(shown, name), error))
  }
  environment.writtenLine(path.join(shown, name))
}

async function writeResults(
  folder: ResultFolder,
  shown: string,
  plan: Plan,
  data: RunData,
  environment: BatchEnvironment,
): Promise<void> {
  const tables = await writeTables(folder, shown, plan, data, environment)
  const files = [...tables, SUMMARY_NAME]
  await folder.dropEarlier(files)
  const summary = summaryText({
    ...data,
    title: plan.title,
    files,
    program: PROGRAM,
    inputHash: createHash('sha256').update(canonicalInput(plan)).digest('hex'),
  })
  try {
    await writeFile(folder, shown, SUMMARY_NAME, summary, environment)
  } catch (error) {
    if (tables.length > 0) await folder.dropSummary().catch(() => undefined)
    throw error
  }
}

function stopWhenInterrupted(environment: BatchEnvironment): void {
  if (environment.signal.aborted)
    throw new Stop(EXIT.interrupted, 'The run was interrupted; what was finished is kept.')
}
