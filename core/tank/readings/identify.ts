/**
 * Which parameters the readings can carry: what has no data is not fitted, and what comes out with an error as large as itself is held.
 * Every refusal is a sentence.
 */
import { at } from '../../base'
import { countOf, spanOf, type Measurement } from './measurements'
import type { RingStart, RingSurroundings } from './pathModel'
import { FIT_NAMES, type FitName } from './types'

export interface HeldParameter {
  readonly name: FitName
  readonly reason: string
}

/** Readings of a quantity below which it says nothing of a parameter. */
const FEWEST_READINGS = 3
/** A laminar record is long where the square of the core grows by this factor in it: the speed then tells the core. */
const LONG_GROWTH = 2
/** Standard error above which a parameter is not carried: of the record's time and way, and of the value itself. */
const LARGEST_ERROR = { startTime: 0.25, startPosition: 0.25, circulation: 0.5, radius: 0.3, coreRadius: 0.5 } as const
/** Given up first: of start time and place the place, which the plan knows better than a camera's clock. */
const LEAST_WANTED: readonly FitName[] = ['coreRadius', 'radius', 'startPosition', 'startTime', 'circulation']

export const FIT_WORDS: Readonly<Record<FitName, string>> = {
  circulation: 'circulation',
  startTime: 'start time',
  startPosition: 'start position',
  radius: 'ring radius',
  coreRadius: 'core radius',
}

/** Parameters wanted, less those no reading tells of. */
export function carriedByData(
  wanted: readonly FitName[],
  list: readonly Measurement[],
  start: RingStart,
  around: RingSurroundings,
): { readonly names: readonly FitName[]; readonly held: readonly HeldParameter[] } {
  const held: HeldParameter[] = []
  /** The first reason found is told. */
  const hold = (name: FitName, reason: string): void => {
    if (!held.some((one) => one.name === name)) held.push({ name, reason })
  }
  const radii = countOf(list, 'radius')
  const circulations = countOf(list, 'circulation')
  const places = countOf(list, 'x')
  const seen = list.filter(({ quantity }) => quantity === 'x')
  const oneMoment = spanOf(seen, ({ time }) => time) === 0
  const alike = oneMoment && spanOf(seen, ({ value }) => value) === 0 && seen.every(({ sigma }) => sigma === null)
  const growth = 1 + (4 * around.kinematicViscosity * spanOf(list, ({ time }) => time)) / start.coreRadius ** 2
  const long = around.ageing === 'laminar' && growth >= LONG_GROWTH
  for (const name of wanted) {
    if (name === 'radius' && radii < FEWEST_READINGS && circulations < FEWEST_READINGS)
      hold(
        name,
        `The ring radius is held at the planned one: places alone tell circulation over radius, and there are ${radii} readings of radius and ${circulations} of circulation where ${FEWEST_READINGS} of either are needed.`,
      )
    if (name === 'coreRadius' && radii < FEWEST_READINGS && circulations < FEWEST_READINGS && !long)
      hold(
        name,
        `The core radius is held at the planned one: without readings of radius or circulation it is told from the circulation only by a long laminar record, in which the square of the core grows ${LONG_GROWTH} times; here it grows ${short(around.ageing === 'laminar' ? growth : 1)} times.`,
      )
    if ((name === 'startTime' || name === 'startPosition' || name === 'coreRadius') && places < FEWEST_READINGS)
      hold(
        name,
        `The ${FIT_WORDS[name]} is held: ${places} readings of place are too few, ${FEWEST_READINGS} are needed.`,
      )
    else if (seen.length > 0 && oneMoment && (name === 'startTime' || (name === 'circulation' && circulations === 0)))
      hold(
        name,
        `The ${FIT_WORDS[name]} is held: every place was read at the same time, and a speed needs two times at least.`,
      )
    else if (name === 'startPosition' && alike)
      hold(
        name,
        'The start position is held: every reading is of the same place at the same time, and how far it can be trusted cannot be told.',
      )
    if (name === 'circulation' && places + circulations < FEWEST_READINGS)
      hold(name, `The circulation is held: there are too few readings of place and circulation.`)
  }
  const names = FIT_NAMES.filter((name) => wanted.includes(name) && !held.some((one) => one.name === name))
  const most = Math.max(0, list.length - 1)
  if (names.length <= most) return { names, held }
  const dropped = LEAST_WANTED.filter((name) => names.includes(name)).slice(0, names.length - most)
  for (const name of dropped)
    hold(
      name,
      `The ${FIT_WORDS[name]} is held: ${list.length} readings cannot carry ${names.length} parameters and leave a residual.`,
    )
  return { names: names.filter((name) => !dropped.includes(name)), held }
}

/**
 * The parameter to hold next, with why; null where all are carried.
 *
 * @param errors standard error of each name: of the logarithm for circulation and radii, in SI for time and place; null where the
 *   parameters cannot be told apart
 */
export function notCarried(
  names: readonly FitName[],
  errors: readonly number[] | null,
  list: readonly Measurement[],
): HeldParameter | null {
  const places = list.filter(({ quantity }) => quantity === 'x')
  const limitOf: Readonly<Record<FitName, number>> = {
    ...LARGEST_ERROR,
    startTime: LARGEST_ERROR.startTime * spanOf(list, ({ time }) => time),
    startPosition: LARGEST_ERROR.startPosition * spanOf(places, ({ value }) => value),
  }
  const both = names.includes('startTime') && names.includes('startPosition')
  for (const name of LEAST_WANTED) {
    const k = names.indexOf(name)
    if (k < 0 || names.length === 1) continue
    const time = names.indexOf('startTime')
    // Where the time is not carried beside the place, it is carried without it.
    if (errors !== null && both && name === 'startPosition' && at(errors, time) > limitOf.startTime)
      return {
        name,
        reason: `The start position is held at the planned one, in every run alike: the ring slows so little over this record that the standard error of the start time would be ${short(at(errors, time))} s beside it, above ${short(limitOf.startTime)} s, a quarter of the record.`,
      }
    if (errors === null)
      return {
        name,
        reason: `The ${FIT_WORDS[name]} is held: these readings cannot tell it from the other parameters.`,
      }
    const error = at(errors, k)
    if (!(error > limitOf[name])) continue
    return { name, reason: heldFor(name, error, limitOf[name]) }
  }
  return null
}

function heldFor(name: FitName, error: number, limit: number): string {
  if (name === 'startTime')
    return `The start time is held: the ring slows so little over this record that its standard error would be ${short(error)} s, above ${short(limit)} s, a quarter of the record.`
  if (name === 'startPosition')
    return `The start position is held at the planned one, in every run alike: its standard error would be ${short(error)} m, above ${short(limit)} m, a quarter of the way seen.`
  return `The ${FIT_WORDS[name]} is held: its standard error would be ${short(100 * error)} %, above ${short(100 * limit)} %.`
}

function short(value: number): number {
  return Number(value.toPrecision(3))
}
