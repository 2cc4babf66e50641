/**
 * Names and filters of the file dialogs: our own kind first, the ending always there, nothing a disk would refuse.
 */
import type { ExportKind } from './contract'

export interface FileFilter {
  readonly name: string
  /** Endings without the dot. */
  readonly extensions: string[]
}

export type FileKind = 'plan' | 'table' | ExportKind

const PLAN_ENDING = '.ringwright.json'
const ALL_FILES: FileFilter = { name: 'All files', extensions: ['*'] }

const KINDS: Readonly<Record<FileKind, { readonly filter: FileFilter; readonly ending: string }>> = {
  plan: { filter: { name: 'Ringwright plan', extensions: ['ringwright.json', 'json'] }, ending: PLAN_ENDING },
  table: { filter: { name: 'Table', extensions: ['csv', 'tsv', 'txt'] }, ending: '.csv' },
  csv: { filter: { name: 'Comma-separated values', extensions: ['csv'] }, ending: '.csv' },
  svg: { filter: { name: 'Vector drawing', extensions: ['svg'] }, ending: '.svg' },
  png: { filter: { name: 'Picture', extensions: ['png'] }, ending: '.png' },
  vtp: { filter: { name: 'Polygonal data (XML)', extensions: ['vtp'] }, ending: '.vtp' },
  gltf: { filter: { name: 'Three-dimensional scene', extensions: ['gltf'] }, ending: '.gltf' },
  html: { filter: { name: 'Printable page', extensions: ['html'] }, ending: '.html' },
  lists: {
    filter: { name: 'Ringwright parts lists', extensions: ['ringwright-lists.json', 'json'] },
    ending: '.ringwright-lists.json',
  },
  txt: { filter: { name: 'Text', extensions: ['txt'] }, ending: '.txt' },
}

export function filtersOf(kind: FileKind): FileFilter[] {
  return [KINDS[kind].filter, ALL_FILES]
}

/**
 * A file name every platform accepts, with the ending of its kind, from what the page suggests.
 *
 * @param kind decides the ending
 * @param suggested any text; path separators, control characters and names a platform reserves are taken out
 */
export function safeFileName(kind: FileKind, suggested: string): string {
  const { ending } = KINDS[kind]
  const withoutEnding = suggested.toLowerCase().endsWith(ending) ? suggested.slice(0, -ending.length) : suggested
  const bare = kind === 'plan' ? withoutEnding.replace(/\.json$/i, '') : withoutEnding
  const clean = [...bare]
    .map((character) => (isForbidden(character) ? ' ' : character))
    .join('')
    .replace(/\s+/g, ' ')
    .replace(/^[. ]+|[. ]+$/g, '')
  const short = [...clean].slice(0, 100).join('').trimEnd()
  const reserved = /^(con|prn|aux|nul|com[0-9]|lpt[0-9])$/i.test(short.split('.')[0] ?? '')
  return `${short === '' ? 'untitled' : reserved ? `${short} plan` : short}${ending}`
}

/** The chosen path with the ending of its kind, where the user left it out. */
export function withEnding(kind: FileKind, chosen: string): string {
  const { ending } = KINDS[kind]
  const lower = chosen.toLowerCase()
  if (lower.endsWith(ending) || (kind === 'plan' && lower.endsWith('.json'))) return chosen
  return `${chosen}${ending}`
}

function isForbidden(character: string): boolean {
  const code = character.codePointAt(0) ?? 0
  return code < 0x20 || code === 0x7f || '<>:"/\\|?*'.includes(character)
}
