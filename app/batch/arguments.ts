/**
 * The runner's command line.
 *
 * Words are options (`--out DIR` or `--out=DIR`) or the one plan. `--merge` takes every word after it, up to the next option, as a folder.
 */
import type { SweepPart } from '../../core/plan'

export interface BatchRequest {
  /** Plan file as given; '-' is standard input. */
  readonly plan: string
  /** Folder for the results as given. */
  readonly out: string
  /** Sections asked for; null asks for all that the plan holds and this version computes. */
  readonly only: readonly string[] | null
  /** The part of the sweep to compute; null: no part is asked for, and a sweep is computed whole. */
  readonly part: SweepPart | null
  /** Folders whose parts of the sweep become one table; null: nothing is merged. */
  readonly merge: readonly string[] | null
  /** Folder with the files of the readings; null: what the plan itself holds is all there is. */
  readonly data: string | null
}

export type BatchReading =
  { readonly ok: true; readonly request: BatchRequest | 'help' } | { readonly ok: false; readonly message: string }

/** Every section the contract knows, whether or not this version computes it. */
export const KNOWN_SECTIONS = [
  'water',
  'pulse',
  'jet',
  'wake',
  'thruster',
  'tankRun',
  'readings',
  'sweep',
  'spread',
] as const

export const USAGE =
  'npm run --silent batch -- PLAN.json --out DIR [--only LIST] [--part i/n] [--merge DIR...] [--data FOLDER] (PLAN - reads standard input)'

/** What `--help` prints. */
export const HELP = [
  `Use: ${USAGE}`,
  '',
  'PLAN.json      a plan; - reads it from standard input',
  '--out DIR      folder for the results; files of an earlier run in it are replaced',
  '--only LIST    sections to compute and write, with commas between: water, pulse, jet, wake, thruster, tankRun, readings, sweep,',
  '               spread; all that the plan holds where it is not given',
  '--part i/n     only the sweep, and of it only part i of n: sweep.i-of-n.csv; run again, a part that was stopped goes on',
  '--merge DIR... the parts found in these folders as the one sweep.csv in --out; words up to the next option are folders',
  '--data FOLDER  where the files lie that the readings name: tracks, logs and velocity fields that are not in the plan itself',
  '--help         this text',
  '',
  'Exit: 0 done; 2 bad arguments, an unreadable file or a plan that is refused; 1 a computation or a write that failed;',
  '130 interrupted. One line per file written goes to standard output, everything else to standard error.',
].join('\n')

const NOT_YET = ['--checks']
const WITH_VALUE = ['--out', '--only', '--part', '--data']

/** What stands on the line, before it is judged. */
interface Words {
  readonly named: ReadonlyMap<string, string>
  readonly plans: readonly string[]
  readonly merge: readonly string[] | null
}

/** @returns the request, or a sentence that says which argument is wrong and what it must be */
export function readBatchArguments(list: readonly string[]): BatchReading {
  if (list.some((word) => word === '--help' || word === '-h')) return { ok: true, request: 'help' }
  const words = sortWords(list)
  if (typeof words === 'string') return refuse(words)
  const { named, plans, merge } = words
  const [plan, second] = plans
  if (plan === undefined || plan === '')
    return refuse(
      merge === null
        ? `A plan file must be given. Use: ${USAGE}`
        : `A plan file must be given, before --merge: all words after it are folders. Use: ${USAGE}`,
    )
  if (second !== undefined) return refuse(`One plan may be given, got ${plan} and ${second}.`)
  const out = named.get('--out')
  if (out === undefined) return refuse(`--out must name the folder for the results. Use: ${USAGE}`)
  const only = readList(named.get('--only'))
  if (typeof only === 'string') return refuse(only)
  const part = readPart(named.get('--part'))
  if (typeof part === 'string') return refuse(part)
  const data = named.get('--data') ?? null
  const clash = clashOf(only, part, merge, data)
  return clash === null ? { ok: true, request: { plan, out, only, part, merge, data } } : refuse(clash)
}

/** @returns the words by what they are, or a sentence */
function sortWords(list: readonly string[]): Words | string {
  const named = new Map<string, string>()
  const plans: string[] = []
  let merge: string[] | null = null
  let merging = false
  const rest = [...list]
  for (let word = rest.shift(); word !== undefined; word = rest.shift()) {
    if (word === '-' || !word.startsWith('-')) {
      if (merging && word !== '-') merge?.push(word)
      else plans.push(word)
      continue
    }
    merging = false
    const [name = '', ...joined] = word.split('=')
    if (NOT_YET.includes(name)) return `${name} is not in this version of the runner.`
    if (name === '--merge') {
      if (merge !== null) return '--merge may be given once, with all its folders after it.'
      merge = joined.length > 0 ? [joined.join('=')] : []
      merging = true
    } else if (WITH_VALUE.includes(name)) {
      const value = joined.length > 0 ? joined.join('=') : rest.shift()
      if (value === undefined || value === '' || (joined.length === 0 && value.startsWith('--')))
        return `${name} needs a value.`
      if (named.has(name)) return `${name} may be given once.`
      named.set(name, value)
    } else {
      return `${name} is not an argument of the runner. Use: ${USAGE}`
    }
  }
  if (merge !== null && (merge.length === 0 || merge.includes('')))
    return '--merge must be followed by the folders that hold the parts.'
  return { named, plans, merge }
}

function readList(text: string | undefined): readonly string[] | null | string {
  if (text === undefined) return null
  const names = text.split(',').map((name) => name.trim())
  const unknown = names.find((name) => !KNOWN_SECTIONS.some((known) => known === name))
  if (unknown === undefined) return [...new Set(names)]
  return `--only may list ${KNOWN_SECTIONS.join(', ')}; got ${unknown === '' ? 'an empty name' : unknown}.`
}

function readPart(text: string | undefined): SweepPart | null | string {
  if (text === undefined) return null
  const [, first, second] = /^([1-9]\d{0,5})\/([1-9]\d{0,5})$/.exec(text) ?? []
  const [index, of] = [Number(first), Number(second)]
  return index <= of ? { index, of } : `--part must be i/n with i from 1 to n, such as 2/8; got ${text}.`
}

function clashOf(
  only: readonly string[] | null,
  part: SweepPart | null,
  merge: readonly string[] | null,
  data: string | null,
): string | null {
  if (data !== null && (part !== null || merge !== null))
    return '--data may not stand with --part or --merge, which compute the sweep alone.'
  if (part !== null && merge !== null)
    return '--part and --merge may not stand together: first all parts, then the merge.'
  if (merge !== null && only !== null) return '--only may not stand with --merge, which writes the sweep alone.'
  if (part !== null && only !== null && only.some((name) => name !== 'sweep' && name !== 'water'))
    return `--only may list water and sweep with --part, which computes rows of the sweep alone; got ${only.join(', ')}.`
  return null
}

function refuse(message: string): BatchReading {
  return { ok: false, message }
}
