/**
 * A ring's start fitted to what was read off on its way.
 */
import { at } from '../../base'
import type { FittedValue, ReadingResidual, RingFit } from './fitTypes'
import { fitNotes, OUTLIER_ABOVE } from './fitNotes'
import { carriedByData, FIT_WORDS, notCarried, type HeldParameter } from './identify'
import { leastSquares, type LeastSquaresResult } from './leastSquares'
import { countOf, MEASURED, measurementsOf, spanOf, type MeasuredQuantity, type Measurement } from './measurements'
import { ringAt, type RingStart, type RingSurroundings } from './pathModel'
import { median, robustDeviation } from './robust'
import { correlationOf } from './smallMatrix'
import { startBounds, startNotTold, type StartBounds } from './startBounds'
import { NORMAL_95, student95 } from './student'
import { FIT_NAMES, type FitName, type ReadingRow } from './types'

/** Scatters of the quantities are estimated in this many turns: each reweights the next. */
const TURNS = 5
/** Scatter taken at first, over radius or circulation, and the least that is believed. */
const FIRST_SCATTER = 0.02
const LEAST_SCATTER = 1e-9

export interface RingFitInput {
  /** Calibrated rows: time from the piston's start, SI. */
  readonly rows: readonly ReadingRow[]
  readonly names: readonly FitName[]
  /** The planned ring: where the search starts, and what is held. */
  readonly start: RingStart
  readonly around: RingSurroundings
  /** Rows before this time [s] see a ring that is still forming and are left out. */
  readonly formedAt: number
  /** Fit every name or nothing: for the runs of a set, so that all of them fit the same. Default false. */
  readonly all?: boolean
  /** What is held for reasons that were found elsewhere. */
  readonly alsoHeld?: readonly HeldParameter[]
}

interface Attempt {
  readonly names: readonly FitName[]
  readonly ring: RingStart
  readonly solved: LeastSquaresResult
  readonly sigmas: Readonly<Record<MeasuredQuantity, number>>
}

const LOGARITHMIC: readonly FitName[] = ['circulation', 'radius', 'coreRadius']

/** Fit; a status where the readings are too few or the fit does not converge. */
export function fitRing(input: RingFitInput): RingFit {
  const { rows, start, around, formedAt } = input
  const used = ({ time }: ReadingRow): boolean => time >= formedAt
  const { list, borrowed } = measurementsOf(rows, used)
  const forming = rows.filter((row) => !used(row)).length
  const first = carriedByData(input.names, list, start, around)
  const held: HeldParameter[] = [...(input.alsoHeld ?? []), ...first.held]
  if (first.names.length === 0 || list.length < 2) return nothingFitted(input, list, held, forming)
  const refused = (why: string): RingFit => ({ ...nothingFitted(input, list, held, forming), message: why })
  const [lost] = first.held
  if (input.all === true && lost !== undefined) return refused(`This run is not fitted by itself. ${lost.reason}`)
  const bounds = startBounds(list, start, formedAt)
  let names = first.names
  let attempt = bestAttempt(names, list, start, around, bounds)
  for (;;) {
    const astray = startNotTold(names, factsOf(attempt), bounds)
    if (astray !== null && input.all === true) return refused(`This run is not fitted by itself. ${astray.reason}`)
    const drop = astray ?? (input.all === true ? null : notCarried(names, errorsOf(attempt), list))
    if (drop === null) break
    const next = names.filter((name) => name !== drop.name)
    const position = held.findIndex(({ name }) => name === 'startPosition')
    if (astray?.name === 'startTime' && first.names.includes('startPosition') && position >= 0) {
      // The ring did not pass the planned place in time: then the place is fitted and the planned time is held.
      held.splice(position, 1)
      names = FIT_NAMES.filter((name) => name === 'startPosition' || next.includes(name))
    } else if (next.length === 0 || astray?.name === 'startTime')
      return refused(`${astray?.reason ?? drop.reason} Check the time and length offsets.`)
    else names = next
    held.push(drop)
    attempt = bestAttempt(names, list, start, around, bounds)
  }
  if (attempt.solved.status === 'failed') return refused(`${attempt.solved.message} No numbers are given.`)
  const errors = errorsOf(attempt)
  if (errors === null) {
    const untold = names.map((name) => ({
      name,
      reason: `The ${FIT_WORDS[name]} is held: it does not change what these readings show.`,
    }))
    return nothingFitted(input, list, [...held, ...untold], forming)
  }
  const freedom = list.length - names.length
  const given = MEASURED.filter((quantity) => countOf(list, quantity) > 0).map((quantity) => hasSigma(list, quantity))
  const sigma = given.every(Boolean) ? 'given' : given.some(Boolean) ? 'mixed' : 'estimated'
  const residuals = residualsOf(list, attempt.ring, around)
  const chi = sigma === 'given' && freedom > 0 ? attempt.solved.sumOfSquares / freedom : null
  const inferred = names.includes('circulation') && !names.includes('radius') && countOf(list, 'circulation') === 0
  const correlation = attempt.solved.covariance === null ? [] : correlationOf(attempt.solved.covariance)
  return {
    status: attempt.solved.status,
    message: attempt.solved.message,
    ageing: around.ageing,
    fitted: names,
    fit: valuesOf(names, attempt.ring, errors),
    held,
    ring: attempt.ring,
    correlation,
    intervalFactor: sigma === 'given' || freedom < 1 ? NORMAL_95 : student95(freedom),
    sigma,
    degreesOfFreedom: freedom,
    reducedChiSquare: chi,
    residualRms: rmsOf(residuals, 'x'),
    residuals,
    rows: new Set(list.map(({ row }) => row)).size,
    forming,
    iterations: attempt.solved.iterations,
    notes: fitNotes({ names, correlation, chi, freedom, sigma, borrowed, forming, residuals, inferred }),
  }
}

function nothingFitted(
  { start, around, rows }: RingFitInput,
  list: readonly Measurement[],
  held: readonly HeldParameter[],
  forming: number,
): RingFit {
  const why =
    forming > 0 ? ` ${forming} of ${rows.length} rows lie before the ring has formed: check the time offset.` : ''
  const atOnce = list.length > 1 && spanOf(list, ({ time }) => time) === 0
  return {
    status: 'failed',
    message: `Nothing can be fitted to ${list.length} readings${atOnce ? ', all of one moment' : ''}.${why}`,
    ageing: around.ageing,
    fitted: [],
    fit: {},
    held,
    ring: start,
    correlation: [],
    intervalFactor: NORMAL_95,
    sigma: 'given',
    degreesOfFreedom: 0,
    reducedChiSquare: null,
    residualRms: null,
    residuals: residualsOf(list, start, around),
    rows: new Set(list.map(({ row }) => row)).size,
    forming,
    iterations: 0,
    notes: [],
  }
}

/** From the planned start and, where that runs away, from another: the first that converges to a start that can be. */
function bestAttempt(
  names: readonly FitName[],
  list: readonly Measurement[],
  start: RingStart,
  around: RingSurroundings,
  bounds: StartBounds | null,
): Attempt {
  const first = stagedAttempt(names, list, start, around, 'startPosition')
  const good = (one: Attempt): boolean => startNotTold(names, factsOf(one), bounds) === null
  if (!names.includes('startTime') || good(first)) return first
  const second = stagedAttempt(names, list, start, around, 'startTime')
  return good(second) ? second : first
}

function factsOf({ ring, solved, ...one }: Attempt): Parameters<typeof startNotTold>[1] {
  const errors = errorsOf({ ...one, ring, solved })
  const correlation = solved.covariance === null ? [] : correlationOf(solved.covariance)
  return { ring, errors, correlation, converged: solved.status === 'done' }
}

/** Circulation and place, or time, first, which any record tells; then all from there. */
function stagedAttempt(
  names: readonly FitName[],
  list: readonly Measurement[],
  start: RingStart,
  around: RingSurroundings,
  before: 'startPosition' | 'startTime',
): Attempt {
  const plain = names.filter((name) => name === 'circulation' || name === before)
  const staged = plain.length > 0 && plain.length < names.length
  const from = staged ? weighted(plain, list, start, around).ring : start
  return weighted(names, list, from, around)
}

/** Fit with the uncertainties given, and with estimated scatters where there are none: each turn reweights the next. */
function weighted(
  names: readonly FitName[],
  list: readonly Measurement[],
  start: RingStart,
  around: RingSurroundings,
): Attempt {
  let sigmas: Record<MeasuredQuantity, number> = {
    x: FIRST_SCATTER * start.radius,
    radius: FIRST_SCATTER * start.radius,
    circulation: FIRST_SCATTER * start.circulation,
  }
  const floors = { x: start.radius, radius: start.radius, circulation: start.circulation }
  const unknown = MEASURED.filter((quantity) => countOf(list, quantity) > 0 && !hasSigma(list, quantity))
  // The scatter of a single quantity only scales the errors: one turn tells it.
  const alone = list.every(({ quantity }) => quantity === unknown[0])
  const turns = unknown.length === 0 ? 0 : alone ? 1 : TURNS
  let ring = start
  let iterations = 0
  for (let turn = 0; ; turn++) {
    const last = solve(names, list, ring, around, sigmas)
    iterations += last.iterations
    const solved = { ...last, iterations }
    ring = ringOf(names, solved.parameters, start)
    if (turn === turns) return { names, ring, solved, sigmas }
    const share = Math.max(1, list.length - names.length) / list.length
    const next = { ...sigmas }
    for (const quantity of unknown) {
      const scatter = rmsOf(residualsOf(list, ring, around), quantity) ?? 0
      next[quantity] = Math.max(scatter / Math.sqrt(share), LEAST_SCATTER * floors[quantity])
    }
    sigmas = next
  }
}

function solve(
  names: readonly FitName[],
  list: readonly Measurement[],
  start: RingStart,
  around: RingSurroundings,
  sigmas: Readonly<Record<MeasuredQuantity, number>>,
): LeastSquaresResult {
  const speed = Math.abs(ringAt(start, around, start.time).speed) || start.circulation / start.radius
  return leastSquares({
    start: names.map((name) => parameterOf(name, start)),
    scale: names.map((name) => {
      if (LOGARITHMIC.includes(name)) return 0.1
      return name === 'startTime' ? (0.1 * start.radius) / speed : 0.1 * start.radius
    }),
    residuals: (parameters) => {
      const ring = ringOf(names, parameters, start)
      return Float64Array.from(list, ({ quantity, time, value, sigma }) => {
        const model = ringAt(ring, around, time)[quantity]
        return (model - value) / (sigma ?? sigmas[quantity])
      })
    },
  })
}

function parameterOf(name: FitName, ring: RingStart): number {
  if (name === 'startTime') return ring.time
  if (name === 'startPosition') return ring.x
  return Math.log(ring[name])
}

function ringOf(names: readonly FitName[], parameters: readonly number[], base: RingStart): RingStart {
  const value = (name: FitName): number => {
    const k = names.indexOf(name)
    if (k < 0) return name === 'startTime' ? base.time : name === 'startPosition' ? base.x : base[name]
    const parameter = at(parameters, k)
    return LOGARITHMIC.includes(name) ? Math.exp(parameter) : parameter
  }
  return {
    circulation: value('circulation'),
    radius: value('radius'),
    coreRadius: value('coreRadius'),
    time: value('startTime'),
    x: value('startPosition'),
  }
}

function hasSigma(list: readonly Measurement[], quantity: MeasuredQuantity): boolean {
  return list.every((one) => one.quantity !== quantity || one.sigma !== null)
}

/** Standard errors in the parameters of the search; null where they cannot be told apart. */
function errorsOf({ solved }: Attempt): readonly number[] | null {
  return solved.covariance?.map((row, k) => Math.sqrt(at(row, k))) ?? null
}

function valuesOf(
  names: readonly FitName[],
  ring: RingStart,
  errors: readonly number[],
): Partial<Record<FitName, FittedValue>> {
  const fit: Partial<Record<FitName, FittedValue>> = {}
  for (const [k, name] of names.entries()) {
    const value = name === 'startTime' ? ring.time : name === 'startPosition' ? ring.x : ring[name]
    const error = at(errors, k)
    fit[name] = { value, standardError: LOGARITHMIC.includes(name) ? value * error : error }
  }
  return fit
}

function residualsOf(list: readonly Measurement[], ring: RingStart, around: RingSurroundings): ReadingResidual[] {
  const plain = list.map((one) => {
    const model = ringAt(ring, around, one.time)[one.quantity]
    return { ...one, model, residual: one.value - model }
  })
  const scatter = Object.fromEntries(
    MEASURED.map((quantity) => {
      const own = plain.filter((one) => one.quantity === quantity).map(({ residual }) => residual)
      const centre = own.length === 0 ? 0 : median(own)
      return [quantity, { centre, deviation: own.length === 0 ? 0 : robustDeviation(own, centre) }]
    }),
  )
  return plain.map(({ row, quantity, time, value, model, residual }) => {
    const { centre, deviation } = scatter[quantity] ?? { centre: 0, deviation: 0 }
    const normalised = deviation > 0 ? (residual - centre) / deviation : 0
    return {
      row,
      quantity,
      time,
      measured: value,
      model,
      residual,
      normalised,
      outlier: Math.abs(normalised) > OUTLIER_ABOVE,
    }
  })
}

function rmsOf(residuals: readonly ReadingResidual[], quantity: MeasuredQuantity): number | null {
  const own = residuals.filter((one) => one.quantity === quantity)
  return own.length === 0
    ? null
    : Math.sqrt(own.reduce((sum, { residual }) => sum + residual * residual, 0) / own.length)
}
