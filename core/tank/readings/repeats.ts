/** Repeats: every run fitted by itself, all together, and what the runs say of one another. */
import type { FittedValue, RingFit } from './fitTypes'
import { fitRing, type RingFitInput } from './fitRing'
import { FIT_WORDS, type HeldParameter } from './identify'
import { mean, standardDeviation } from './robust'
import { FIT_NAMES, type FitName } from './types'

export interface RunFit extends RingFit {
  readonly run: string
  /** Index in all rows of each row of this run. */
  readonly rowIndices: readonly number[]
}

/** One parameter over the runs in which it was fitted. */
export interface RepeatValue {
  readonly mean: number
  /** From run to run; null for a single run. */
  readonly standardDeviation: number | null
  /** Of the mean, from the scatter of the runs. */
  readonly standardError: number | null
  readonly runs: number
}

export interface Repeats {
  /** All rows under one set of parameters. */
  readonly pooled: RingFit
  readonly perRun: readonly RunFit[]
  readonly repeats: Readonly<Partial<Record<FitName, RepeatValue>>>
  readonly notes: readonly string[]
}

/** Scatter of the runs over their own errors, from which it is told. */
const TELL_SCATTER = 2

export function fitRepeats(input: RingFitInput): Repeats {
  const indices = new Map<string, number[]>()
  input.rows.forEach(({ run }, index) => {
    const own = indices.get(run)
    if (own === undefined) indices.set(run, [index])
    else own.push(index)
  })
  const single = indices.size === 1
  const runsOf = (pooled: RingFit): readonly RunFit[] =>
    [...indices].map(([run, rowIndices]): RunFit => {
      const own = new Set(rowIndices)
      const rows = input.rows.filter((_, index) => own.has(index))
      const told = pooled.fitted.length > 0
      const alike = told ? { names: pooled.fitted, all: true, alsoHeld: pooled.held } : {}
      return { ...(single ? pooled : fitRing({ ...input, rows, ...alike })), run, rowIndices }
    })
  let pooled = fitRing(input)
  let perRun = runsOf(pooled)
  const both = pooled.fitted.includes('startTime') && pooled.fitted.includes('startPosition')
  // A mean over runs of which some fit the place and others hold it would mix two things.
  if (both && perRun.some(({ status }) => status === 'failed')) {
    const held: HeldParameter = {
      name: 'startPosition',
      reason:
        'The start position is held at the planned one, in every run alike: not every run can tell it from the start time.',
    }
    const names = input.names.filter((name) => name !== 'startPosition')
    pooled = fitRing({ ...input, names, alsoHeld: [held] })
    perRun = runsOf(pooled)
  }
  const repeats: Partial<Record<FitName, RepeatValue>> = {}
  const notes: string[] = []
  for (const name of FIT_NAMES) {
    const values = perRun.flatMap(({ fit, status }) => (status === 'done' ? valueIn(fit[name]) : []))
    if (values.length === 0) continue
    const scatter = standardDeviation(values.map(({ value }) => value))
    repeats[name] = {
      mean: mean(values.map(({ value }) => value)),
      standardDeviation: scatter,
      standardError: scatter === null ? null : scatter / Math.sqrt(values.length),
      runs: values.length,
    }
    const own = Math.sqrt(mean(values.map(({ standardError }) => standardError ** 2)))
    if (scatter !== null && scatter > TELL_SCATTER * own)
      notes.push(
        `The ${FIT_WORDS[name]} changes from run to run by ${(scatter / own).toFixed(1)} times its error within a run: take the mean over the runs and its error, not those of the pooled fit.`,
      )
  }
  return { pooled, perRun, repeats, notes }
}

function valueIn(value: FittedValue | undefined): FittedValue[] {
  return value === undefined ? [] : [value]
}
