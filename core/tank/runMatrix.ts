/**
 * Which runs to make and in which order: every combination of the levels or a latin hypercube of them, repeated, in blocks of one set-up,
 * at random within a block and from block to block, the same for the same seed.
 */
import { at, DomainError, randomSource, requireRange, type RandomSource } from '../base'
import type { MatrixInput } from './types'

export const MOST_RUNS = 5000

export interface MatrixRun {
  /** From 1, in the order of the day. */
  readonly run: number
  /** From 1: runs of one set-up. */
  readonly block: number
  /** From 1, of this combination in the order of the day. */
  readonly repeat: number
  /** In the order of the fields. */
  readonly values: readonly number[]
  /** False: the drive cannot make it, or it cannot be. */
  readonly ok: boolean
  readonly reason: string | null
}

/** Between two times after the piston's start [s]. */
export interface ExpectedArrival {
  readonly station: number
  /** null where the ring is not seen. */
  readonly timeLow: number | null
  readonly timeHigh: number | null
}

/** One combination of the levels as the drive and the tank take it. */
export interface Combination {
  /** In the order of the fields. */
  readonly values: readonly number[]
  /** Of the piston before rounding, leak included [m/s], [m]; null for what cannot be. */
  readonly pistonSpeed: number | null
  readonly pistonTravel: number | null
  /** In the order of the stations; null beyond the first combinations, and for what cannot be. */
  readonly arrivals: readonly ExpectedArrival[] | null
  /** From the first motion of the piston to the earliest passage of a station, and from there to the latest [s]. */
  readonly cameraDelay: number | null
  readonly recordLength: number | null
  readonly ok: boolean
  readonly reason: string | null
}

export interface RunMatrix {
  readonly paths: readonly string[]
  readonly runs: readonly MatrixRun[]
  /** Combinations without their repeats. */
  readonly combinations: number
  /** Each combination held against drive and tank, rising in the levels of the fields; empty where that was not asked for. */
  readonly each: readonly Combination[]
  readonly blocks: number
  /** [s]: runs with their waiting, changes of set-up, and the sum. */
  readonly time: { readonly runs: number; readonly setUps: number; readonly total: number }
  /** Bytes of all runs; null where those of one are not known. */
  readonly storage: number | null
  readonly text: string
}

/**
 * @param cost settlingTime between runs [s]; storage of a run [bytes] or null
 * @throws {DomainError} on tankRun.matrix…
 */
export function runMatrix(
  input: MatrixInput,
  cost: { readonly settlingTime: number; readonly storage: number | null },
): RunMatrix {
  requireMatrix(input)
  const random = randomSource(input.seed)
  const combinations = input.kind === 'grid' ? grid(input) : latin(input, random)
  const runs = ordered(input, combinations, random)
  const blocks = runs.at(-1)?.block ?? 0
  // The wait passes while a run is looked at and saved; the longer of the two counts.
  const each = Math.max(60 * input.minutesPerRun, cost.settlingTime)
  const time = { runs: runs.length * each, setUps: blocks * 60 * input.minutesPerSetUp, total: 0 }
  const total = time.runs + time.setUps
  const storage = cost.storage === null ? null : runs.length * cost.storage
  return {
    paths: input.fields.map(({ path }) => path),
    runs,
    combinations: combinations.length,
    each: [],
    blocks,
    time: { ...time, total },
    storage,
    text: `${runs.length} runs of ${combinations.length} combinations in ${blocks} ${blocks === 1 ? 'set-up' : 'set-ups'} take ${short(total / 3600)} hours: ${short(each / 60)} minutes a run, its waiting included, and ${short(time.setUps / 3600)} hours for set-ups.`,
  }
}

function requireMatrix(input: MatrixInput): void {
  const field = (key: string): string => `tankRun.matrix.${key}`
  const paths = input.fields.map(({ path }) => path)
  input.fields.forEach(({ path, values }, i) => {
    if (paths.indexOf(path) !== i)
      throw new DomainError(
        field(`fields.${i}.path`),
        `${field(`fields.${i}.path`)} must name a field once, got ${path} again`,
      )
    if (values.length === 0)
      throw new DomainError(
        field(`fields.${i}.values`),
        `${field(`fields.${i}.values`)} must hold at least one level, got none`,
      )
    values.forEach((value, k) => {
      requireRange(field(`fields.${i}.values.${k}`), value, {})
      if (values.indexOf(value) !== k)
        throw new DomainError(
          field(`fields.${i}.values.${k}`),
          `${field(`fields.${i}.values.${k}`)} must be a level of its own, got ${value} again`,
        )
    })
  })
  input.blocks.forEach((path, i) => {
    if (!paths.includes(path))
      throw new DomainError(
        field(`blocks.${i}`),
        `${field(`blocks.${i}`)} must be one of the matrix's fields, got ${path}`,
      )
  })
  requireWhole(field('repeats'), input.repeats)
  requireRange(field('minutesPerRun'), input.minutesPerRun, { min: 0, unit: 'min' })
  requireRange(field('minutesPerSetUp'), input.minutesPerSetUp, { min: 0, unit: 'min' })
  requireRange(field('seed'), input.seed, { min: 0, max: Number.MAX_SAFE_INTEGER })
  if (input.samples !== null) requireWhole(field('samples'), input.samples)
  const levels = input.fields.map(({ values }) => values.length)
  const combinations = input.kind === 'grid' ? levels.reduce((product, count) => product * count, 1) : samplesOf(input)
  const count = combinations * input.repeats
  if (count > MOST_RUNS)
    throw new DomainError(
      field('fields'),
      `${field('fields')} must come to at most ${MOST_RUNS} runs, got ${combinations} combinations x ${input.repeats} repeats = ${count}`,
    )
}

function requireWhole(field: string, value: number): void {
  requireRange(field, value, { min: 1 })
  if (!Number.isInteger(value)) throw new DomainError(field, `${field} must be a whole number, got ${value}`)
}

function samplesOf({ fields, samples }: MatrixInput): number {
  return samples ?? Math.max(1, ...fields.map(({ values }) => values.length))
}

/** Every combination, the last field fastest. */
function grid({ fields }: MatrixInput): readonly (readonly number[])[] {
  return fields.reduce<readonly (readonly number[])[]>(
    (rows, { values }) => rows.flatMap((row) => values.map((value) => [...row, value])),
    [[]],
  )
}

/** Rows in which each level of a field comes equally often, or once more than another where the rows do not divide. */
function latin(input: MatrixInput, random: RandomSource): readonly (readonly number[])[] {
  const count = samplesOf(input)
  const columns = input.fields.map(({ values }) => {
    const whole = Math.floor(count / values.length)
    const even = Array.from({ length: whole * values.length }, (_, i) => at(values, i % values.length))
    return shuffled([...even, ...shuffled(values, random).slice(0, count - even.length)], random)
  })
  return Array.from({ length: count }, (_, row) => columns.map((column) => at(column, row)))
}

function ordered(
  input: MatrixInput,
  combinations: readonly (readonly number[])[],
  random: RandomSource,
): readonly MatrixRun[] {
  const places = input.fields.flatMap(({ path }, i) => (input.blocks.includes(path) ? [i] : []))
  const setUps = new Map<string, (readonly number[])[]>()
  for (const values of combinations) {
    const key = places.map((i) => at(values, i)).join(' ')
    const rows = setUps.get(key) ?? []
    for (let k = 0; k < input.repeats; k++) rows.push(values)
    setUps.set(key, rows)
  }
  const runs: MatrixRun[] = []
  const seen = new Map<readonly number[], number>()
  shuffled([...setUps.values()], random).forEach((rows, block) => {
    for (const values of shuffled(rows, random)) {
      const repeat = (seen.get(values) ?? 0) + 1
      seen.set(values, repeat)
      runs.push({ run: runs.length + 1, block: block + 1, repeat, values, ok: true, reason: null })
    }
  })
  return runs
}

/** The list in random order, each order alike (Fisher & Yates; Durstenfeld 1964). */
function shuffled<T>(list: readonly T[], random: RandomSource): T[] {
  const out = [...list]
  for (let i = out.length - 1; i > 0; i--) {
    const k = Math.floor(random.uniform() * (i + 1))
    const kept = at(out, i)
    out[i] = at(out, k)
    out[k] = kept
  }
  return out
}

function short(value: number): number {
  return Number(value.toPrecision(3))
}
