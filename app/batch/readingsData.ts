/**
 * Files that the readings of a plan name, read from a folder: tracks and logs that are not in the plan itself, and velocity fields one file
 * after another, so that memory does not grow with their number.
 */
import { createHash } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import path from 'node:path'
import {
  choicesOfColumns,
  readReadings,
  withReadings,
  type FieldFrameChoices,
  type Plan,
  type ReadingsReading,
} from '../../core/plan'
import { fieldSession, type RunRequest } from '../../core/run'
import { fileSentence } from '../files/fileSentence'
import { decodeText } from '../files/readText'
import { EXIT, Stop, stopWhenInterrupted, type BatchEnvironment } from './environment'

export interface ReadingsData {
  readonly plan: Plan
  readonly fields: NonNullable<RunRequest['fields']> | null
}

type Section = NonNullable<Plan['readings']>
type Source = Section['sources'][number]

/**
 * @param given folder as the user named it; null: none, and what lies outside the plan is left out with a note
 * @throws {Stop} for a file that cannot be read, or not as the plan says
 */
export async function readingsData(
  plan: Plan,
  given: string | null,
  environment: BatchEnvironment,
): Promise<ReadingsData> {
  const { readings } = plan
  if (readings === null) {
    if (given !== null) throw new Stop(EXIT.refused, '--data needs readings in the plan, and it has none.')
    return { plan, fields: null }
  }
  if (given === null) {
    if (readings.fields !== null)
      environment.note(
        `The ${readings.fields.frames.length} velocity fields of the readings are left out: --data must name their folder.`,
      )
    return { plan, fields: null }
  }
  const folder = { given, absolute: path.resolve(environment.folder, given) }
  let whole = plan
  for (const source of readings.sources) {
    if (source.kind === 'fields' || isHeld(readings, source)) continue
    const { text, hash } = await fileIn(folder, source.name, environment)
    noteOtherFile(source, hash, environment)
    whole = withTable(whole, source, readReadings(text, { kind: source.kind, ...choicesOfColumns(source.columns) }))
  }
  return { plan: whole, fields: await fieldsIn(whole, folder, environment) }
}

/** Whether the plan itself has what the file holds. */
function isHeld({ rows, force, piston }: Section, { kind }: Source): boolean {
  return kind === 'rows' ? rows.length > 0 : kind === 'force' ? force.time.length > 0 : piston.length > 0
}

function withTable(plan: Plan, source: Source, reading: ReadingsReading): Plan {
  if (!reading.ok) throw new Stop(EXIT.refused, `${source.name}: ${reading.message}`)
  return withReadings(plan, reading, { name: source.name, hash: source.hash }, 'add')
}

interface Folder {
  readonly given: string
  readonly absolute: string
}

async function fieldsIn(plan: Plan, folder: Folder, environment: BatchEnvironment): Promise<ReadingsData['fields']> {
  const fields = plan.readings?.fields ?? null
  if (fields === null) return null
  const source = plan.readings?.sources.find(({ kind }) => kind === 'fields')
  const choices: FieldFrameChoices = source === undefined ? {} : choicesOfColumns(source.columns)
  const session = fieldSession(plan, false)
  const times = new Map<string, number[]>()
  for (const { name, time } of fields.frames) times.set(name, [...(times.get(name) ?? []), time])
  const hashes: string[] = []
  for (const [name, list] of times) {
    stopWhenInterrupted(environment)
    const { text, hash } = await fileIn(folder, name, environment)
    hashes.push(hash)
    const outcome = session.add(text, (frame) => list[frame] ?? list.at(-1) ?? 0, choices)
    if (!outcome.ok) throw new Stop(EXIT.refused, `${name}: ${outcome.message}`)
    for (const sentence of outcome.skipped) environment.note(`${name}: ${sentence}`)
    await environment.pause()
  }
  if (fields.hash !== '' && hashOf(hashes.join('\n')) !== fields.hash)
    environment.note('The velocity fields are not those the plan was made with: their hash differs.')
  return session.result()
}

async function fileIn(
  folder: Folder,
  name: string,
  environment: BatchEnvironment,
): Promise<{ readonly text: string; readonly hash: string }> {
  // A plan names files, never ways to them.
  if (name === '' || name !== path.basename(name) || name === '..' || name.includes('\\'))
    throw new Stop(EXIT.refused, `A file of the readings must be named without a folder, got ${JSON.stringify(name)}.`)
  stopWhenInterrupted(environment)
  try {
    const bytes = await readFile(path.join(folder.absolute, name))
    return { text: decodeText(bytes), hash: hashOf(bytes) }
  } catch (error) {
    throw new Stop(EXIT.refused, fileSentence('open', path.join(folder.given, name), error))
  }
}

function noteOtherFile(source: Source, hash: string, environment: BatchEnvironment): void {
  if (source.hash !== '' && source.hash !== hash)
    environment.note(`${source.name} is not the file the plan was made with: its hash differs.`)
}

function hashOf(text: string | Uint8Array): string {
  return createHash('sha256').update(text).digest('hex')
}
