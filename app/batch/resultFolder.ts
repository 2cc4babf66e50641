/**
 * The folder a run writes into: whose files lie there, what may be replaced, and the writing itself.
 */
import { mkdir, open, readFile, readdir, realpath, rename, rm, stat, unlink } from 'node:fs/promises'
import path from 'node:path'
import { createSaver } from '../files/atomicSave'
import { systemCode } from '../files/fileSentence'

export const SUMMARY_NAME = 'summary.json'
export const RECORD_NAME = 'report.html'
/** Lists what a run that has not ended means to write, so that a later one knows it for ours. */
export const MARKER_NAME = '.ringwright-run'

/** A folder that may not be written to, with a sentence that says why. */
export class FolderRefusal extends Error {
  constructor(message: string) {
    super(message)
    this.name = 'FolderRefusal'
  }
}

export interface ResultFolder {
  /**
   * Refuse to touch files that are not an earlier run's, and take away what an interrupted run has left.
   *
   * @param isOurs whether something else than a summary tells that they are; default false
   * @throws {FolderRefusal}
   */
  prepare(names: readonly string[], isOurs?: boolean): Promise<void>
  /** From the first file written to `finish` the folder is marked as that of a run that writes these. */
  begin(names: readonly string[]): void
  /** The run has ended with all its files: take the mark away. */
  finish(): Promise<void>
  /** Write one file under a temporary name and rename it. */
  write(name: string, content: string): Promise<void>
  /** Take away files that an earlier run's summary lists and this run does not write. */
  dropEarlier(keep: readonly string[]): Promise<void>
  /** Take away a summary that no longer describes what lies beside it. */
  dropSummary(): Promise<void>
  /** Take away a record of an earlier run likewise. */
  dropRecord(): Promise<void>
}

/**
 * @param folder absolute path
 * @param shown the folder as the user named it, for sentences
 * @param summaryFormat `format` of a summary that is ours
 */
export function resultFolder(folder: string, shown: string, summaryFormat: string): ResultFolder {
  let count = 0
  /** Files before the first of which the mark is written; null: none, or it is there. */
  let mark: readonly string[] | null = null
  const save = createSaver(
    { open, rename, unlink, stat, realpath },
    { durable: false, syncFolder: false, unique: () => `${process.pid}-${(count += 1)}` },
  )
  const refusal = (name: string): FolderRefusal =>
    new FolderRefusal(
      `${path.join(shown, name)} exists already and ${shown} holds no summary of an earlier run: name another folder or move the file away.`,
    )
  return {
    async prepare(names, isOurs = false) {
      const present = await makeOrList(folder, shown)
      const inTheWay = names.filter((name) => present.includes(name))
      const [first] = inTheWay
      const interrupted = await interruptedFiles(folder, summaryFormat)
      if (first !== undefined && !isOurs && !(await holdsOurSummary(folder, summaryFormat))) {
        const foreign = inTheWay.find((name) => !interrupted.includes(name))
        if (foreign !== undefined) throw refusal(foreign)
      }
      const halves = present.filter((name) => interrupted.some((whole) => isHalfOf(name, whole)))
      for (const name of [...interrupted.filter(isInside), ...halves])
        await rm(path.join(folder, name), { force: true })
      await rm(path.join(folder, MARKER_NAME), { force: true })
    },
    begin(names) {
      mark = names
    },
    async finish() {
      mark = null
      await rm(path.join(folder, MARKER_NAME), { force: true })
    },
    async write(name, content) {
      if (mark?.includes(name) === true) {
        await save(path.join(folder, MARKER_NAME), JSON.stringify({ format: summaryFormat, files: mark }))
        mark = null
      }
      const target = path.join(folder, name)
      if (path.dirname(name) !== '.') await makeFolders(path.dirname(target))
      await save(target, content)
    },
    async dropEarlier(keep) {
      const kept = new Set(keep)
      for (const name of await earlierFiles(folder, summaryFormat))
        if (!kept.has(name) && isInside(name)) await rm(path.join(folder, name), { force: true })
    },
    dropSummary: () => rm(path.join(folder, SUMMARY_NAME), { force: true }),
    dropRecord: () => rm(path.join(folder, RECORD_NAME), { force: true }),
  }
}

async function makeOrList(folder: string, shown: string): Promise<readonly string[]> {
  try {
    await makeFolders(folder)
    return await readdir(folder)
  } catch (error) {
    const code = systemCode(error)
    const why =
      code === 'EEXIST' || code === 'ENOTDIR'
        ? 'a part of that path is a file'
        : code === 'EACCES' || code === 'EPERM'
          ? 'you may not write there'
          : `the system reported ${code === '' ? 'a failure' : code}`
    throw new FolderRefusal(`The folder ${shown} could not be made because ${why}.`)
  }
}

/**
 * Make a folder and those above it, one after another: where the system refuses a folder whose parent stands, Node's own recursive
 * form goes round for ever.
 */
async function makeFolders(folder: string): Promise<void> {
  try {
    await mkdir(folder)
  } catch (error) {
    const parent = path.dirname(folder)
    if (systemCode(error) === 'EEXIST' && (await stat(folder)).isDirectory()) return
    if (systemCode(error) !== 'ENOENT' || parent === folder || (await isFolder(parent))) throw error
    await makeFolders(parent)
    await mkdir(folder)
  }
}

async function isFolder(folder: string): Promise<boolean> {
  return stat(folder).then(
    (found) => found.isDirectory(),
    () => false,
  )
}

async function holdsOurSummary(folder: string, summaryFormat: string): Promise<boolean> {
  return (await earlierSummary(folder, summaryFormat)) !== null
}

/** The summary of an earlier run; null where there is none of ours. */
function earlierSummary(folder: string, summaryFormat: string): Promise<object | null> {
  return readOurs(path.join(folder, SUMMARY_NAME), summaryFormat)
}

/** A JSON file of ours; null where it is not there, or not ours. */
async function readOurs(file: string, summaryFormat: string): Promise<object | null> {
  try {
    const summary: unknown = JSON.parse(await readFile(file, 'utf8'))
    if (typeof summary !== 'object' || summary === null) return null
    return 'format' in summary && summary.format === summaryFormat ? summary : null
  } catch {
    return null
  }
}

async function earlierFiles(folder: string, summaryFormat: string): Promise<readonly string[]> {
  return filesOf(await earlierSummary(folder, summaryFormat))
}

/** What a run that never ended may have left. */
async function interruptedFiles(folder: string, summaryFormat: string): Promise<readonly string[]> {
  return filesOf(await readOurs(path.join(folder, MARKER_NAME), summaryFormat))
}

function filesOf(summary: object | null): readonly string[] {
  if (summary === null || !('files' in summary) || !Array.isArray(summary.files)) return []
  return summary.files.filter((name: unknown): name is string => typeof name === 'string')
}

/** A file that was being written under its temporary name (`write`) when the run was killed. */
function isHalfOf(name: string, whole: string): boolean {
  return name.startsWith(`.${whole}.`) && /^\d+-\d+\.tmp$/.test(name.slice(whole.length + 2))
}

/** Names as this program writes them: in the folder or in its folder `wake`, nowhere else. */
function isInside(name: string): boolean {
  return /^(wake\/)?[a-z0-9][a-z0-9.-]*$/.test(name) && !name.includes('..')
}
