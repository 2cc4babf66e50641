/**
 * The runner's command line.
 */
export interface BatchRequest {
  /** Plan file as given; '-' is standard input. */
  readonly plan: string
  /** Folder for the results as given. */
  readonly out: string
  /** Sections asked for; null asks for all that the plan holds and this version computes. */
  readonly only: readonly string[] | null
}

export type BatchReading =
  { readonly ok: true; readonly request: BatchRequest } | { readonly ok: false; readonly message: string }

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
  'npm run --silent batch -- PLAN.json --out DIR [--only LIST] (LIST: water, pulse, jet, wake; PLAN - reads standard input)'

const NOT_YET = ['--part', '--merge', '--checks']

/** @returns the request, or a sentence that says which argument is wrong and what it must be */
export function readBatchArguments(list: readonly string[]): BatchReading {
  const named = new Map<string, string>()
  const plans: string[] = []
  const rest = [...list]
  for (let word = rest.shift(); word !== undefined; word = rest.shift()) {
    const [name = '', ...joined] = word.split('=')
    if (NOT_YET.includes(name)) return refuse(`${name} is not in this version of the runner.`)
    if (name === '--out' || name === '--only') {
      const value = joined.length > 0 ? joined.join('=') : rest.shift()
      if (value === undefined || value === '' || (joined.length === 0 && value.startsWith('--')))
        return refuse(`${name} needs a value.`)
      if (named.has(name)) return refuse(`${name} may be given once.`)
      named.set(name, value)
    } else if (word !== '-' && word.startsWith('-')) {
      return refuse(`${name} is not an argument of the runner. Use: ${USAGE}`)
    } else {
      plans.push(word)
    }
  }
  const [plan, second] = plans
  if (plan === undefined || plan === '') return refuse(`A plan file must be given. Use: ${USAGE}`)
  if (second !== undefined) return refuse(`One plan may be given, got ${plan} and ${second}.`)
  const out = named.get('--out')
  if (out === undefined) return refuse(`--out must name the folder for the results. Use: ${USAGE}`)
  const only = readList(named.get('--only'))
  return typeof only === 'string' ? refuse(only) : { ok: true, request: { plan, out, only } }
}

function readList(text: string | undefined): readonly string[] | null | string {
  if (text === undefined) return null
  const names = text.split(',').map((name) => name.trim())
  const unknown = names.find((name) => !KNOWN_SECTIONS.some((known) => known === name))
  if (unknown === undefined) return [...new Set(names)]
  return `--only may list ${KNOWN_SECTIONS.join(', ')}; got ${unknown === '' ? 'an empty name' : unknown}.`
}

function refuse(message: string): BatchReading {
  return { ok: false, message }
}
