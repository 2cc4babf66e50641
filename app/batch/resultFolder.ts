/**
 * The folder a run writes into: whose files lie there, what may be replaced, and the writing itself.
 */
import { mkdir, open, readFile, readdir, realpath, rename, rm, stat, unlink } from 'node:fs/promises'
import path from 'node:path'
import { createSaver } from '../files/atomicSave'
import { systemCode } from '../files/fileSentence'

export const SUMMARY_NAME = 'summary.json'
export const RECORD_NAME = 'report.html'

/** A folder that may not be written to, with a sentence that says why. */
export class FolderRefusal extends Error {
  constructor(message: string) {
    super(message)
    this.name = 'FolderRefusal'
  }
}

export interface ResultFolder {
  /**
   * Refuse to touch files that are not an earlier run's.
   *
   * @param isOurs whether something else than a summary tells that they are; default false
   * @throws {FolderRefusal}
   */
  prepare(names: readonly string[], isOurs?: boolean): Promise<void>
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
  const save = createSaver(
    { open, rename, unlink, stat, realpath },
    { durable: false, syncFolder: false, unique: () => `${process.pid}-${(count += 1)}` },
  )
  return {
    async prepare(names, isOurs = false) {
      const present = await makeOrList(folder, shown)
      const inTheWay = names.filter((name) => present.includes(name))
      const [first] = inTheWay
      if (first === undefined || isOurs || (await holdsOurSummary(folder, summaryFormat))) return
      throw new FolderRefusal(
        `${path.join(shown, first)} exists already and ${shown} holds no summary of an earlier run: name another folder or move the file away.`,
      )
    },
    async write(name, content) {
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
async function earlierSummary(folder: string, summaryFormat: string): Promise<object | null> {
  try {
    const summary: unknown = JSON.parse(await readFile(path.join(folder, SUMMARY_NAME), 'utf8'))
    if (typeof summary !== 'object' || summary === null) return null
    return 'format' in summary && summary.format === summaryFormat ? summary : null
  } catch {
    return null
  }
}

async function earlierFiles(folder: string, summaryFormat: string): Promise<readonly string[]> {
  const summary = await earlierSummary(folder, summaryFormat)
  if (summary === null || !('files' in summary) || !Array.isArray(summary.files)) return []
  return summary.files.filter((name: unknown): name is string => typeof name === 'string')
}

/** Names as this program writes them: in the folder or in its folder `wake`, nowhere else. */
function isInside(name: string): boolean {
  return /^(wake\/)?[a-z0-9][a-z0-9.-]*$/.test(name) && !name.includes('..')
}
