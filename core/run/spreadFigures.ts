/**
 * Figures of many samples: mean, standard deviation, percentiles, bands.
 */
import { at } from '../base'
import type { SpreadBand, SpreadFigures } from '../plan'

/**
 * Percentile of sorted values: straight between order statistics at (n - 1) p (Hyndman & Fan 1996, Am. Stat. 50:361, type 7).
 *
 * @param sorted rising, at least one
 * @param p 0 to 1
 */
export function percentile(sorted: Float64Array, p: number): number {
  const place = (sorted.length - 1) * p
  const below = Math.floor(place)
  const low = at(sorted, below)
  const high = at(sorted, Math.min(below + 1, sorted.length - 1))
  return low + (place - below) * (high - low)
}

/** @param values of the samples; NaN where a sample has none */
export function figuresOf(values: Float64Array, nominal: number | null): SpreadFigures {
  const sorted = values.filter((value) => !Number.isNaN(value)).sort()
  const samples = sorted.length
  if (samples === 0) return { mean: null, standardDeviation: null, p05: null, p50: null, p95: null, nominal, samples }
  // About the middle of the values, so that a small scatter of a large value keeps its digits.
  const middle = percentile(sorted, 0.5)
  let sum = 0
  for (const value of sorted) sum += value - middle
  const mean = middle + sum / samples
  let squares = 0
  for (const value of sorted) squares += (value - mean) ** 2
  return {
    mean,
    standardDeviation: samples > 1 ? Math.sqrt(squares / (samples - 1)) : null,
    p05: percentile(sorted, 0.05),
    p50: middle,
    p95: percentile(sorted, 0.95),
    nominal,
    samples,
  }
}

/** Curves of the samples over one x, gathered point by point. */
export interface BandGatherer {
  /** @param value of the sample at x */
  add(value: (x: number) => number): void
  /** null before the first sample. */
  band(): SpreadBand | null
}

/** @param samples most that will be added */
export function gatherBand(x: readonly number[], nominal: (x: number) => number, samples: number): BandGatherer {
  const columns = x.map(() => new Float64Array(samples))
  let count = 0
  return {
    add(value) {
      x.forEach((place, i) => {
        at(columns, i)[count] = value(place)
      })
      count++
    },
    band() {
      if (count === 0) return null
      const sorted = columns.map((column) => column.slice(0, count).sort())
      const curve = (p: number): number[] => sorted.map((values) => percentile(values, p))
      return { x, nominal: x.map(nominal), p05: curve(0.05), p50: curve(0.5), p95: curve(0.95) }
    },
  }
}
