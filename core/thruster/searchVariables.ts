/**
 * What the search of a thruster varies, and the design that values of the variables stand for.
 *
 * The stroke is searched as a stroke ratio, or as one of the plunger strokes in stock; then the exit, or the stroke next to it, is
 * moved so that the ratio stays in its range.
 */
import { DomainError, at } from '../base'
import type { DesignProblem, Design } from './designTypes'
import type { Variable } from './searchSpace'
import type { SearchInput, Span } from './types'

export interface DesignSpace {
  readonly variables: readonly Variable[]
  readonly designOf: (values: ArrayLike<number>) => Design
  /** How far two designs stand apart: the largest difference in any field over its range; another number stands fully apart. */
  readonly distance: (a: Design, b: Design) => number
}

/**
 * The space of a search.
 *
 * @throws {DomainError} on thruster.search.stock… where nothing of the stock lies in the ranges
 */
export function designSpace({ section, pulse }: DesignProblem, search: SearchInput): DesignSpace {
  const { nozzle } = pulse
  const perTravel = (nozzle.pistonDiameter / nozzle.diameter) ** 2
  const strokes = rising(search.stock?.strokes ?? []).map((travel) => travel * perTravel)
  const bores = rising(search.stock?.diameters ?? [])
  const ratio = search.strokeRatio
  const fits = (bore: number, stroke: number): boolean =>
    stroke >= ratio[0] * bore * (1 - ROUNDING) && stroke <= ratio[1] * bore * (1 + ROUNDING)
  const reach = (stroke: number): Span => [
    Math.max(search.diameter[0], stroke / ratio[1]),
    Math.min(search.diameter[1], stroke / ratio[0]),
  ]

  const listed = bores.filter((bore) => bore >= search.diameter[0] && bore <= search.diameter[1])
  if (bores.length > 0 && listed.length === 0)
    throw new DomainError(
      'thruster.search.stock.diameters',
      `thruster.search.stock.diameters must hold a bore from ${search.diameter[0]} m to ${search.diameter[1]} m, the range of the search; it holds none`,
    )
  const usableBores = strokes.length === 0 ? listed : listed.filter((bore) => strokes.some((s) => fits(bore, s)))
  const usableStrokes = strokes.filter((stroke) =>
    bores.length > 0 ? usableBores.some((bore) => fits(bore, stroke)) : reach(stroke)[0] <= reach(stroke)[1],
  )
  if (strokes.length > 0 && usableStrokes.length === 0)
    throw new DomainError(
      'thruster.search.stock.strokes',
      `thruster.search.stock.strokes must hold a plunger stroke that gives a stroke ratio of ${ratio[0]} to ${ratio[1]} with an exit of the search; it holds none`,
    )

  const ejectShare = search.ejectShare ?? [section.actuator.ejectShare, section.actuator.ejectShare]
  const variables: Variable[] = [
    usableBores.length > 0 ? { kind: 'list', values: usableBores } : real(search.diameter, 'log'),
    usableStrokes.length > 0 ? { kind: 'list', values: usableStrokes } : real(ratio, 'log'),
    { kind: 'whole', low: search.count[0], high: search.count[1] },
    real(ejectShare, 'linear'),
  ]
  const byFrequency = search.goal === 'thrust'
  if (byFrequency) variables.push(real(search.frequency, 'log'))

  const exitAndRatio = (first: number, second: number): readonly [number, number] => {
    if (usableStrokes.length === 0) return [first, second]
    if (usableBores.length > 0) {
      const fitting = usableStrokes.filter((stroke) => fits(first, stroke))
      return [first, nearest(fitting, second) / first]
    }
    const [low, high] = reach(second)
    const diameter = Math.min(high, Math.max(low, first))
    return [diameter, second / diameter]
  }
  return {
    variables,
    designOf: (values) => {
      const [diameter, strokeRatio] = exitAndRatio(at(values, 0), at(values, 1))
      return {
        diameter,
        strokeRatio,
        count: at(values, 2),
        ejectShare: at(values, 3),
        frequency: byFrequency ? at(values, 4) : null,
      }
    },
    distance: (a, b) => {
      if (a.count !== b.count) return 1
      const inLog = (x: number, y: number, [low, high]: Span) =>
        high > low ? Math.abs(Math.log(x / y)) / Math.log(high / low) : 0
      const [least, most] = ejectShare
      return Math.max(
        inLog(a.diameter, b.diameter, search.diameter),
        inLog(a.strokeRatio, b.strokeRatio, ratio),
        most > least ? Math.abs(a.ejectShare - b.ejectShare) / (most - least) : 0,
        a.frequency !== null && b.frequency !== null ? inLog(a.frequency, b.frequency, search.frequency) : 0,
      )
    },
  }
}

/** Stock is listed in rounded figures: a ratio right at its end is in. */
const ROUNDING = 1e-9

function real([low, high]: Span, scale: 'linear' | 'log'): Variable {
  return { kind: 'real', low, high, scale }
}

function rising(values: readonly number[]): number[] {
  return [...new Set(values)].sort((a, b) => a - b)
}

function nearest(values: readonly number[], to: number): number {
  return values.reduce((a, b) => (Math.abs(b - to) < Math.abs(a - to) ? b : a))
}
