/**
 * Sizing: the best designs that stand apart, each told in full, and the front of power (or thrust) against size.
 *
 * Size is the volume all plungers sweep together at the full stroke: the room in the vehicle that the water of a pulse takes,
 * whatever its number of thrusters and its plungers' diameters.
 */
import type { RunOptions, RunStatus } from '../base'
import { describeDesign, limitScales, type Candidate } from './candidates'
import { compileDesigns, type CompiledDesigns, type DesignOptions } from './design'
import { slackOf } from './designLimits'
import type { Design, DesignProblem } from './designTypes'
import { paretoFront } from './front'
import type { SearchProblem } from './search'
import { searchDistinct } from './searchDistinct'
import { designSpace, type DesignSpace } from './searchVariables'
import type { LimitName, SearchInput } from './types'

export interface SizingOptions extends RunOptions, DesignOptions {
  /** Awaited between generations: lets messages in, so that a cancellation can arrive. It may return at once. */
  readonly pause?: () => Promise<void>
  /** Most candidates, default 5, and most points of the front, default 40; 0 for none. */
  readonly candidates?: number
  readonly frontPoints?: number
}

/** One point of the front. */
export interface FrontDesign {
  readonly design: Design
  /** [m3] */
  readonly sweptVolume: number
  /** [W] */
  readonly power: number
  /** At the first duty point [N]. */
  readonly thrust: number
  /** At each duty point [1/s]. */
  readonly frequencies: readonly number[]
}

/** The limit that stands in the way where no design holds them all. */
export interface LeastViolated {
  readonly name: LimitName
  /** Index of the duty point. */
  readonly point: number
  readonly value: number
  readonly limit: number
  /** How far it is broken, over the limit. */
  readonly excess: number
}

export interface SizingResult {
  readonly status: RunStatus
  /** A sentence on how it ended. */
  readonly message: string
  readonly goal: SearchInput['goal']
  /** Best first: least power or most thrust. Empty where no design holds every limit. */
  readonly candidates: readonly Candidate[]
  /** By rising size; power falls, or thrust rises, from point to point. */
  readonly front: readonly FrontDesign[]
  /** The design nearest to holding every limit, where none does, and the limit it breaks most. */
  readonly nearest: { readonly candidate: Candidate; readonly leastViolated: LeastViolated | null } | null
  readonly counters: { readonly evaluations: number }
}

const MOST_CANDIDATES = 5
const FRONT_POINTS = 40
/** Candidates differ in the number of thrusters, or in a field by this share of its range. */
export const APART = 0.15
const FIRST_BUDGET = 16_000
const LATER_BUDGET = 5_000
/** Relative difference of power or thrust below which swept volume decides: above what the search resolves, below what anyone could measure. */
const TIE = 1e-7
/** Part of the progress that the candidates take. */
const CANDIDATE_SHARE = 0.4

/**
 * Search the ranges of `thruster.search`.
 *
 * Deterministic for `search.seed`. Cancelled, it keeps the candidates and the part of the front that were found.
 *
 * @param input its section must hold a search; its own diameter, stroke and frequency lend their proportions only
 * @throws {DomainError} on thruster.…, nozzle…, programme… or water…
 */
export async function sizeThruster(
  input: DesignProblem & { readonly section: { readonly search: SearchInput | null } },
  options: SizingOptions = {},
): Promise<SizingResult> {
  const { search } = input.section
  if (search === null) return emptyResult()
  const { candidates = MOST_CANDIDATES, frontPoints = FRONT_POINTS, onProgress } = options
  const designs = compileDesigns(input, options)
  const space = designSpace(input, search)
  const problem = searchProblem(designs, space, search)
  const shared = {
    seed: search.seed,
    ...(options.signal === undefined ? {} : { signal: options.signal }),
    ...(options.pause === undefined ? {} : { pause: options.pause }),
  }
  const distinct = await searchDistinct(problem, {
    ...shared,
    count: Math.max(1, candidates),
    apart: APART,
    budget: FIRST_BUDGET,
    laterBudget: LATER_BUDGET,
    distance: (a, b) => space.distance(space.designOf(a), space.designOf(b)),
    onProgress: (share) => onProgress?.({ share: CANDIDATE_SHARE * share, what: 'candidates' }),
  })
  const described = distinct.found.map(({ values }) => describeDesign(designs, space.designOf(values)))
  const counters = { evaluations: distinct.evaluations }
  const [least] = distinct.found
  const common = { goal: search.goal, counters }
  if (least === undefined || least.best.violation > 0) {
    const nothing = { ...nothingFits(designs, described), ...common }
    return distinct.status === 'done'
      ? nothing
      : { ...nothing, status: 'cancelled', message: 'Cancelled before a design inside every limit was found.' }
  }
  const found = { ...common, candidates: described, nearest: null }
  if (distinct.status === 'cancelled')
    return { ...found, status: 'cancelled', message: 'Cancelled while candidates were searched.', front: [] }
  if (frontPoints < 2) return { ...found, status: 'done', message: doneMessage(described.length, 0), front: [] }

  const sizeOf = (values: Float64Array): number => sweptVolume(space.designOf(values))
  const traced = await paretoFront(problem, sizeOf, {
    ...shared,
    least,
    count: frontPoints,
    onProgress: (share) =>
      onProgress?.({ share: CANDIDATE_SHARE + (1 - CANDIDATE_SHARE) * share, what: 'front of power against size' }),
  })
  const front = traced.points.map(({ values }) => frontDesign(designs, space.designOf(values)))
  return {
    ...found,
    status: traced.status,
    message:
      traced.status === 'cancelled'
        ? 'Cancelled while the front was traced: its larger designs are missing.'
        : doneMessage(described.length, front.length),
    front,
    counters: { evaluations: distinct.evaluations + traced.evaluations },
  }
}

/**
 * The search of a space: power or the thrust's opposite to be made least. Without losses and inertia of the column the power does not depend
 * on the stroke ratio at all; of designs that are alike but for a tie's breadth the one of less swept volume is taken.
 */
function searchProblem(designs: CompiledDesigns, space: DesignSpace, search: SearchInput): SearchProblem {
  const sizeShare = sizeShareIn(search)
  return {
    variables: space.variables,
    score: (values) => {
      const design = space.designOf(values)
      const { power, thrust, violation } = designs.evaluate(design)
      const value = search.goal === 'power' ? power : -thrust
      return { value: value + TIE * Math.abs(value) * sizeShare(design), violation }
    },
  }
}

/** Where the swept volume stands between the least and the most of a search's ranges, 0..1 by its logarithm. */
function sizeShareIn({ count, diameter, strokeRatio }: SearchInput): (design: Design) => number {
  const end = (k: 0 | 1): number =>
    Math.log(sweptVolume({ count: count[k], diameter: diameter[k], strokeRatio: strokeRatio[k] }))
  const [least, most] = [end(0), end(1)]
  return (design) => (most > least ? (Math.log(sweptVolume(design)) - least) / (most - least) : 0)
}

/** Volume all plungers of a design sweep together [m3]. */
export function sweptVolume({
  count,
  diameter,
  strokeRatio,
}: Pick<Design, 'count' | 'diameter' | 'strokeRatio'>): number {
  return count * (Math.PI / 4) * diameter * diameter * (strokeRatio * diameter)
}

function frontDesign(designs: CompiledDesigns, design: Design): FrontDesign {
  const { power, thrust, points, sweptVolume: size } = designs.evaluate(design)
  return { design, sweptVolume: size, power, thrust, frequencies: points.map(({ held }) => held.frequency) }
}

function nothingFits(
  designs: CompiledDesigns,
  described: readonly Candidate[],
): Omit<SizingResult, 'goal' | 'counters'> {
  const [candidate] = described
  if (candidate === undefined) return emptyResult()
  const broken = brokenLimits(designs, candidate)
  const leastViolated = broken[0] ?? null
  const nearest = { candidate, leastViolated }
  const told =
    leastViolated === null
      ? 'the nearest one stands right on its limits.'
      : `the nearest one misses ${broken.map(({ name, excess }) => `${name} by ${percent(excess)}`).join(', ')}.`
  return {
    status: 'done',
    message: `No design in the ranges of the search holds every limit; ${told}`,
    candidates: [],
    front: [],
    nearest,
  }
}

/** Every limit that the nearest design breaks, each at the duty point that breaks it most, the most broken first. */
function brokenLimits(designs: CompiledDesigns, { points }: Candidate): readonly LeastViolated[] {
  const broken = new Map<LimitName, LeastViolated>()
  points.forEach(({ limits, frequency }, point) => {
    for (const limit of limits) {
      if (limit.ok) continue
      const { name, value } = limit
      const excess = -slackOf(limit, limitScales(designs, frequency))
      if (excess > (broken.get(name)?.excess ?? -Infinity))
        broken.set(name, { name, point, value, limit: limit.limit, excess })
    }
  })
  return [...broken.values()].sort((a, b) => b.excess - a.excess)
}

function emptyResult(): SizingResult {
  return {
    status: 'failed',
    message: 'The thruster has no search section: there are no ranges to search.',
    goal: 'power',
    candidates: [],
    front: [],
    nearest: null,
    counters: { evaluations: 0 },
  }
}

function doneMessage(candidates: number, points: number): string {
  const found = candidates === 1 ? '1 candidate' : `${candidates} candidates`
  return points === 0 ? `Done: ${found}.` : `Done: ${found}, ${points} points on the front.`
}

function percent(share: number): string {
  return `${Number((100 * share).toPrecision(2))} %`
}
