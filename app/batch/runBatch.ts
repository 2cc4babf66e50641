/**
 * The headless runner: a plan in, the contract's files out, an exit code that says how it went.
 */
import { createHash } from 'node:crypto'
import path from 'node:path'
import type { Problem } from '../../core/base'
import { canonicalInput, pulseTable, readPlan, SUMMARY_FORMAT, summaryText, type Plan } from '../../core/plan'
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
  const sections = sectionsOf(plan, request.only)
  if (request.only === null) noteUncomputed(plan, environment)

  const folder = resultFolder(path.resolve(environment.folder, request.out), request.out, SUMMARY_FORMAT)
  await folder.prepare([...fileNames(sections), SUMMARY_NAME])
  stopWhenInterrupted(environment)

  const result = await run(plan, { sections }, { signal: environment.signal })
  if (result.status === 'cancelled') throw new Stop(EXIT.interrupted, 'The run was interrupted.')
  if (result.status === 'failed' || result.data === null) {
    const code = result.field === undefined ? EXIT.failed : EXIT.refused
    throw new Stop(code, `${request.plan}: ${result.message}`)
  }
  await writeResults(folder, request.out, plan, result.data, environment)
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

/** One line per problem: the file, then field, value and limit in a sentence. */
function refusalText(given: string, problems: readonly Problem[]): string {
  const name = given === '-' ? 'standard input' : given
  return problems.map(({ message }) => `${name}: ${message}`).join('\n')
}

function sectionsOf(plan: Plan, only: readonly string[] | null): readonly Section[] {
  const available = availableSections(plan)
  if (only === null) return available
  return only.map((name) => {
    const section = SECTIONS.find((known) => known === name)
    if (section === undefined) throw new Stop(EXIT.refused, `Section ${name} is not computed by this version.`)
    if (!available.includes(section))
      throw new Stop(
        EXIT.refused,
        `Section ${name} cannot be computed: the plan has no ${plan.absent.join(' and no ')}.`,
      )
    return section
  })
}

/** Sections a plan may hold that later versions compute: said, so that their absence is no surprise. */
function noteUncomputed(plan: Plan, environment: BatchEnvironment): void {
  const later = ['wake', 'thruster', 'tankRun', 'readings', 'sweep', 'spread']
  const held = later.filter((name) => typeof plan.source[name] === 'object' && plan.source[name] !== null)
  if (held.length > 0) environment.note(`Not computed by this version, and left out: ${held.join(', ')}.`)
}

function fileNames(sections: readonly Section[]): readonly string[] {
  return sections.includes('pulse') ? ['pulse.csv'] : []
}

async function writeResults(
  folder: ResultFolder,
  shown: string,
  plan: Plan,
  data: RunData,
  environment: BatchEnvironment,
): Promise<void> {
  const files: string[] = []
  const write = async (name: string, content: string): Promise<void> => {
    stopWhenInterrupted(environment)
    try {
      await folder.write(name, content)
    } catch (error) {
      throw new Stop(EXIT.failed, fileSentence('save', path.join(shown, name), error))
    }
    files.push(name)
    environment.writtenLine(path.join(shown, name))
  }
  const { water, pulse, cautions } = data
  try {
    if (pulse !== null) await write('pulse.csv', pulseTable(pulse))
    const summary = summaryText({
      water,
      pulse,
      cautions,
      title: plan.title,
      files: [...files, SUMMARY_NAME],
      program: PROGRAM,
      inputHash: createHash('sha256').update(canonicalInput(plan)).digest('hex'),
    })
    await write(SUMMARY_NAME, summary)
  } catch (error) {
    // What was finished stays, but an earlier run's summary does not describe it.
    if (files.length > 0) await folder.dropSummary().catch(() => undefined)
    throw error
  }
}

function stopWhenInterrupted(environment: BatchEnvironment): void {
  if (environment.signal.aborted)
    throw new Stop(EXIT.interrupted, 'The run was interrupted; what was finished is kept.')
}
