/**
 * Fewer points for drawing: what a screen cannot show is left out, what can be seen stays.
 */
import { at } from '../base'
import type { PlotModel, PlotSeries } from './types'

/**
 * A plot with at most about `most` points a series. Of every run of points the first, lowest, highest and last stay, so that no
 * extreme is lost; gaps stay gaps. Exports keep the whole plot.
 */
export function thinPlot(model: PlotModel, most = 800): PlotModel {
  if (model.series.every(({ x }) => x.length <= most)) return model
  return { ...model, series: model.series.map((series) => thinSeries(series, most)) }
}

function thinSeries(series: PlotSeries, most: number): PlotSeries {
  const count = series.x.length
  if (count <= most) return series
  const runs = Math.max(1, Math.floor(most / 4))
  const kept: number[] = []
  for (let run = 0; run < runs; run++) {
    const from = Math.floor((run * count) / runs)
    const to = Math.floor(((run + 1) * count) / runs) - 1
    const marks = new Set([from, extreme(series, from, to, -1), extreme(series, from, to, 1), to])
    const gap = firstGap(series, from, to)
    if (gap !== null) marks.add(gap)
    kept.push(...[...marks].sort((a, b) => a - b))
  }
  const { error } = series
  return {
    ...series,
    x: kept.map((index) => at(series.x, index)),
    y: kept.map((index) => series.y[index] ?? null),
    ...(error === undefined ? {} : { error: kept.map((index) => error[index] ?? null) }),
  }
}

function extreme(series: PlotSeries, from: number, to: number, sign: 1 | -1): number {
  let best = from
  let most = -Infinity
  for (let index = from; index <= to; index++) {
    const value = series.y[index] ?? null
    if (value === null || !(sign * value > most)) continue
    best = index
    most = sign * value
  }
  return best
}

function firstGap(series: PlotSeries, from: number, to: number): number | null {
  for (let index = from; index <= to; index++) if ((series.y[index] ?? null) === null) return index
  return null
}
