/**
 * Parts of a sweep in folders, found and made one table.
 */
import { readdir } from 'node:fs/promises'
import path from 'node:path'
import { DomainError } from '../../core/base'
import { mergeSweepParts, readPartNote, sweepFileNames, type FoundPart } from '../../core/plan'
import { fileSentence } from '../files/fileSentence'
import { EXIT, Stop, type BatchEnvironment } from './environment'
import { textOf } from './sweepFile'

/**
 * sweep.csv from the parts that lie in folders.
 *
 * @param folders as given
 * @throws {Stop} where a folder cannot be read, or the parts do not make one whole
 */
export async function mergedSweep(
  folders: readonly string[],
  inputHash: string,
  environment: BatchEnvironment,
): Promise<string> {
  const parts: FoundPart[] = []
  const seen = new Set<string>()
  for (const shown of folders) {
    const folder = path.resolve(environment.folder, shown)
    // A folder that is named twice does not hold its parts twice.
    if (seen.has(folder)) continue
    seen.add(folder)
    parts.push(...(await partsIn(folder, shown)))
  }
  try {
    return mergeSweepParts(parts, inputHash)
  } catch (error) {
    if (error instanceof DomainError) throw new Stop(EXIT.refused, error.message)
    throw error
  }
}

const NOTE_NAME = /^sweep\.([1-9]\d*)-of-([1-9]\d*)\.json$/

async function partsIn(folder: string, shown: string): Promise<readonly FoundPart[]> {
  try {
    const found: FoundPart[] = []
    for (const name of (await readdir(folder)).toSorted()) {
      const [, index, of] = NOTE_NAME.exec(name) ?? []
      if (index === undefined || of === undefined) continue
      const note = readPartNote((await textOf(path.join(folder, name))) ?? '')
      const part = { index: Number(index), of: Number(of) }
      if (note === null || note.part.index !== part.index || note.part.of !== part.of)
        throw new Stop(EXIT.refused, `${path.join(shown, name)} is no note of a part of a sweep.`)
      const { table } = sweepFileNames(part)
      found.push({ name: path.join(shown, table), note, text: await textOf(path.join(folder, table)) })
    }
    return found
  } catch (error) {
    if (error instanceof Stop) throw error
    throw new Stop(EXIT.refused, fileSentence('open', shown, error))
  }
}
