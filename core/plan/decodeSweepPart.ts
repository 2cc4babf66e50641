/** Reading what lies beside a part of a sweep. */
import { isObject } from './decodeFields'
import { SWEEP_PART_FORMAT, SWEEP_PART_VERSION, type SweepPartNote } from './sweepParts'

/** @returns null where the text is none of ours */
export function readPartNote(text: string): SweepPartNote | null {
  const document = parsed(text)
  if (!isObject(document) || document['format'] !== SWEEP_PART_FORMAT || document['version'] !== SWEEP_PART_VERSION)
    return null
  const { program, inputHash, part, of, rows, columns } = document
  if (!isObject(program) || typeof program['name'] !== 'string' || typeof program['version'] !== 'string') return null
  if (typeof inputHash !== 'string' || !isCount(part) || !isCount(of) || part > of || !isCount(rows)) return null
  if (!Array.isArray(columns)) return null
  const names = columns.filter((name): name is string => typeof name === 'string')
  if (names.length !== columns.length) return null
  return {
    program: { name: program['name'], version: program['version'] },
    inputHash,
    part: { index: part, of },
    total: rows,
    columns: names,
  }
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return null
  }
}

function isCount(value: unknown): value is number {
  return typeof value === 'number' && Number.isInteger(value) && value >= 1
}
