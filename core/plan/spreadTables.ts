/**
 * A spread written out: spread.csv and its part of the summary.
 */
import { writeCsv } from './csvWriter'
import type { SpreadOutcome, SpreadQuantity } from './variedTypes'

export const SPREAD_COLUMNS = [
  'quantity',
  'unit',
  'nominal',
  'mean',
  'standard deviation',
  'p05',
  'p50',
  'p95',
  'samples',
] as const

/** spread.csv: one row a quantity. */
export function spreadTable({ quantities }: SpreadOutcome): string {
  return writeCsv(
    SPREAD_COLUMNS,
    quantities.map(({ path, unit, nominal, mean, standardDeviation, p05, p50, p95, samples }) => [
      path,
      unit,
      nominal,
      mean,
      standardDeviation,
      p05,
      p50,
      p95,
      samples,
    ]),
  )
}

/** `spread` of summary.json: figures by dotted path. */
export function spreadSummary({ quantities }: SpreadOutcome): Readonly<Record<string, unknown>> {
  return Object.fromEntries(
    quantities.map(({ path, ...figures }): [string, Omit<SpreadQuantity, 'path'>] => [path, figures]),
  )
}

/** `spreadRun` of summary.json: how the samples were drawn and how many of them count. */
export function spreadRunSummary(spread: SpreadOutcome): object {
  const { status, message, samples, used, refused, refusals, seed, notes } = spread
  return { status, message, samples, used, refused, refusals, seed, notes }
}
