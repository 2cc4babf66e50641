/**
 * Publications named anywhere in the record, each once: the longest form of a reference wins, and one that was recalled and not re-read
 * says so.
 */
import type { DocumentBlock } from '../document/types'

/** Authors, year, and the place in print that may follow. */
const CITATION =
  /((?:de |van |von )?\p{Lu}[\p{L}’'-]+(?:(?:, | & | and )(?:de |van |von )?\p{Lu}[\p{L}’'-]+| et al\.)*),? (1[89]\d\d|20\d\d)(?: and (1[89]\d\d|20\d\d))?(?:, ((?:[\p{L}.]+ ?)+ \d+:[\dA-Z]+|arXiv \d+\.\d+|[A-Z][\p{L}. ]+?(?=[;,.(]|$)))?/gu
const STANDARD =
  /IAPWS[ -][A-Z0-9-]+|EOS-80|UNESCO 44|ITTC[ -]1957|Lamb, Hydrodynamics(?:, [^;.]*?art\. \d+)?|Norbury/gu
const RECALLED = /\(recalled, not re-read\)|\(recalled\)/u

export interface SourceList {
  /** References, alphabetical. */
  readonly references: readonly string[]
  /** What is no publication: practice, definitions, the plan itself. */
  readonly others: readonly string[]
}

/** References out of texts that name them, and the texts that name none. */
export function sourceList(texts: readonly string[]): SourceList {
  const found = new Map<string, { text: string; recalled: boolean }>()
  const others = new Set<string>()
  const keep = (key: string, text: string, recalled: boolean): void => {
    const known = found.get(key)
    found.set(key, {
      text: known === undefined || text.length > known.text.length ? text : known.text,
      recalled: recalled || (known?.recalled ?? false),
    })
  }
  for (const text of texts) {
    let named = false
    for (const match of text.matchAll(CITATION)) {
      const [, authors = '', year = '', second, place] = match
      const rest = text.slice(match.index + match[0].length, match.index + match[0].length + 40)
      keep(
        `${authors} ${year}`,
        `${authors} ${year}${place === undefined ? '' : `, ${place.trim()}`}`,
        RECALLED.test(firstClause(rest)),
      )
      if (second !== undefined) keep(`${authors} ${second}`, `${authors} ${second}`, false)
      named = true
    }
    for (const [standard] of text.matchAll(STANDARD)) {
      if (standard !== 'Norbury') keep(standard, standard, false)
      named = true
    }
    if (!named) others.add(text.replace(/\.$/u, ''))
  }
  const references = [...found.values()].map(({ text, recalled }) =>
    recalled ? `${text} (recalled, not re-read)` : text,
  )
  return { references: references.sort((a, b) => a.localeCompare(b, 'en')), others: [...others] }
}

/** Up to the next reference. */
function firstClause(text: string): string {
  return text.split(';')[0] ?? ''
}

/** @param texts that name sources, @param besides those of them whose own words are worth listing where they name no publication */
export function sourceBlocks(texts: readonly string[], besides: readonly string[]): readonly DocumentBlock[] {
  const { references } = sourceList(texts)
  const { others } = sourceList(besides)
  return [
    { kind: 'heading', text: 'Sources' },
    { kind: 'list', items: references },
    ...(others.length === 0
      ? []
      : [{ kind: 'paragraph', tone: 'small', text: `Besides publications: ${others.join('; ')}.` } as const]),
  ]
}
