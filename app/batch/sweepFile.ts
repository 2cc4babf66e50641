/**
 * A sweep, or a part of one, on disk: rows go into a file beside the result as they are computed, and the file is renamed when it is
 * whole. A run that was killed leaves its finished rows; the next one of the same plan, program and part goes on from there.
 */
import { open, readFile, rename, rm, type FileHandle } from 'node:fs/promises'
import path from 'node:path'
import { DomainError } from '../../core/base'
import {
  csvLine,
  keptRows,
  partNoteText,
  readPartNote,
  rowsOfPart,
  sweepColumns,
  sweepFileNames,
  sweepLine,
  WHOLE_SWEEP,
  type KeptRows,
  type Plan,
  type SweepPart,
  type SweepPartNote,
} from '../../core/plan'
import { sweepDesign, sweepOf } from '../../core/run'
import { fileSentence, systemCode } from '../files/fileSentence'
import { PROGRAM } from '../program'
import { EXIT, Stop, type BatchEnvironment } from './environment'

/** Time between two waits for the disk [ms]: what a loss of power may cost; a killed process loses nothing. */
const FLUSH_EVERY = 2000

export interface SweepJob {
  readonly plan: Plan
  readonly part: SweepPart | null
  /** The plan as the user named it, for sentences. */
  readonly planName: string
  /** Folder to write into, and as the user named it. */
  readonly folder: string
  readonly shown: string
  /** Writes a whole file of the folder at once. */
  readonly save: (name: string, content: string) => Promise<void>
  readonly inputHash: string
}

/** Whether a note of an unfinished or finished part of ours lies in the folder, so that its files may be replaced. */
export async function holdsOurPart(folder: string, part: SweepPart | null): Promise<boolean> {
  return (await noteIn(folder, part)) !== null
}

/**
 * Compute and write.
 *
 * @returns names of the files written; none where a part was finished already
 * @throws {Stop} when it is interrupted, refused, or cannot be written; finished rows are kept
 */
export async function writeSweep(job: SweepJob, environment: BatchEnvironment): Promise<readonly string[]> {
  const names = sweepFileNames(job.part)
  try {
    const note = noteOf(job)
    const before = await noteIn(job.folder, job.part)
    const same = before !== null && partNoteText(before) === partNoteText(note)
    if (job.part !== null && same && (await isFinished(job, note))) {
      environment.note(
        `${path.join(job.shown, names.table)} is finished already, from the same plan: it stays as it is.`,
      )
      return []
    }
    const kept = same ? await keptOf(job, note) : NOTHING_KEPT
    if (kept.rows === 0) await begin(job, note)
    else environment.note(`${kept.rows} finished rows of ${path.join(job.shown, names.unfinished)} are kept.`)
    await writeRows(job, note, kept, environment)
    await rename(path.join(job.folder, names.unfinished), path.join(job.folder, names.table))
  } catch (error) {
    if (error instanceof Stop) throw error
    if (error instanceof DomainError) throw new Stop(EXIT.refused, `${job.planName}: ${error.message}`)
    if (systemCode(error) === '') throw error
    throw new Stop(EXIT.failed, fileSentence('save', path.join(job.shown, names.table), error))
  }
  // A whole sweep is told of by the summary.
  const written = job.part === null ? [names.table] : [names.note, names.table]
  for (const name of written) environment.writtenLine(path.join(job.shown, name))
  return written
}

/** Take away the note of a whole sweep, once the summary tells of it. */
export function dropSweepNote(folder: string): Promise<void> {
  return rm(path.join(folder, sweepFileNames(null).note), { force: true })
}

function noteOf({ plan, part, inputHash }: SweepJob): SweepPartNote {
  const design = sweepDesign(plan)
  return {
    program: PROGRAM,
    inputHash,
    part: part ?? WHOLE_SWEEP,
    total: design.total,
    columns: sweepColumns(design),
  }
}

const NOTHING_KEPT: KeptRows = { text: '', rows: 0 }

/** A fresh start: rows of another plan go before the note that would make them ours. */
async function begin({ folder, part, save }: SweepJob, note: SweepPartNote): Promise<void> {
  const names = sweepFileNames(part)
  await rm(path.join(folder, names.unfinished), { force: true })
  // An earlier whole sweep stays until the new one takes its place; nobody merges it.
  if (part !== null) await rm(path.join(folder, names.table), { force: true })
  await save(names.note, partNoteText(note))
}

async function writeRows(
  job: SweepJob,
  note: SweepPartNote,
  kept: KeptRows,
  environment: BatchEnvironment,
): Promise<void> {
  const names = sweepFileNames(job.part)
  const file = path.join(job.folder, names.unfinished)
  const handle = await open(file, kept.rows === 0 ? 'w' : 'r+')
  let written = kept.rows
  let isWhole = false
  try {
    const text = kept.rows === 0 ? csvLine(note.columns) : kept.text
    if (kept.rows === 0) await handle.writeFile(text)
    // What was cut off in the middle of a row goes.
    else await handle.truncate(Buffer.byteLength(text))
    const append = appender(handle, Buffer.byteLength(text))
    const { status, message } = await sweepOf(job.plan, {
      part: note.part,
      from: kept.rows,
      keepRows: false,
      signal: environment.signal,
      pause: environment.pause,
      onRow: async (row) => {
        await append(sweepLine(row))
        written++
      },
    })
    await handle.datasync()
    if (status === 'cancelled') throw new Stop(EXIT.interrupted, interruptedSentence(job, note, written))
    if (status !== 'done') throw new Stop(EXIT.failed, message)
    isWhole = true
  } finally {
    await handle.close()
    // A sweep that stops before its first row leaves nothing behind.
    if (!isWhole && written === 0) await forget(job)
  }
}

async function forget({ folder, part }: SweepJob): Promise<void> {
  const names = sweepFileNames(part)
  await rm(path.join(folder, names.unfinished), { force: true })
  await rm(path.join(folder, names.note), { force: true })
}

function interruptedSentence({ shown, part }: SweepJob, note: SweepPartNote, written: number): string {
  const count = rowsOfPart(note.part, note.total).length
  const name = path.join(shown, sweepFileNames(part).unfinished)
  return `The run was interrupted: ${written} of ${count} rows are kept in ${name}, and the same command goes on from there.`
}

/** Appends text, and waits for the disk now and then. */
function appender(handle: FileHandle, from: number): (text: string) => Promise<void> {
  let end = from
  let flushed = Date.now()
  return async (text) => {
    const bytes = Buffer.from(text)
    await handle.write(bytes, 0, bytes.byteLength, end)
    end += bytes.byteLength
    if (Date.now() - flushed < FLUSH_EVERY) return
    await handle.datasync()
    flushed = Date.now()
  }
}

async function keptOf({ folder, part }: SweepJob, note: SweepPartNote): Promise<KeptRows> {
  const text = await textOf(path.join(folder, sweepFileNames(part).unfinished))
  return text === null ? NOTHING_KEPT : keptRows(text, note)
}

async function isFinished({ folder, part }: SweepJob, note: SweepPartNote): Promise<boolean> {
  const text = await textOf(path.join(folder, sweepFileNames(part).table))
  if (text === null) return false
  const kept = keptRows(text, note)
  return kept.text.length === text.length && kept.rows === rowsOfPart(note.part, note.total).length
}

async function noteIn(folder: string, part: SweepPart | null): Promise<SweepPartNote | null> {
  const text = await textOf(path.join(folder, sweepFileNames(part).note))
  return text === null ? null : readPartNote(text)
}

/** @returns null where there is no such file */
export async function textOf(file: string): Promise<string | null> {
  try {
    return await readFile(file, 'utf8')
  } catch (error) {
    if (['ENOENT', 'ENOTDIR'].includes(systemCode(error))) return null
    throw error
  }
}
