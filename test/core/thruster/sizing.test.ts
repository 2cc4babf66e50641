import { beforeAll, describe, expect, it } from 'vitest'
import { at, equallySpaced, last } from '../../../core/base'
import { describeDesign } from '../../../core/thruster/candidates'
import { compileDesigns } from '../../../core/thruster/design'
import { thrusterInputOf } from '../../../core/thruster/designInput'
import type { Design, DesignProblem } from '../../../core/thruster/designTypes'
import { APART, sizeThruster, type SizingResult } from '../../../core/thruster/searchThruster'
import { designSpace } from '../../../core/thruster/searchVariables'
import { analyseThruster } from '../../../core/thruster/thruster'
import type { SearchInput } from '../../../core/thruster/types'
import { expectClose } from '../../support/close'
import { SEARCH, problemWith } from './sizingProblem'

const ONE = problemWith({ target: [{ speed: 0.5, share: 1 }] })
const TWO = problemWith({
  target: [
    { thrust: 1.5, share: 0.7 },
    { speed: 0.5, share: 0.3 },
  ],
})
const MOST = problemWith({ search: { ...SEARCH, goal: 'thrust' } })
const STOCK: SearchInput = {
  ...SEARCH,
  stock: { diameters: [0.012, 0.02, 0.025, 0.032, 0.04, 0.05, 0.12], strokes: [0.02, 0.03, 0.05, 0.08] },
}
const LISTED = problemWith({ target: TWO.section.target, search: STOCK }, { overPressure: 'quick-start' })

/** Least power, or the least of minus thrust, over a grid of designs inside every limit. */
function bestOfGrid(problem: DesignProblem, grid: readonly Design[]): number {
  const designs = compileDesigns(problem)
  const goal = problem.section.search?.goal
  let best = Number.POSITIVE_INFINITY
  for (const design of grid) {
    const figures = designs.evaluate(design)
    if (figures.violation === 0) best = Math.min(best, goal === 'thrust' ? -figures.thrust : figures.power)
  }
  return best
}

function gridOf(search: SearchInput, parts: number, frequencies: readonly (number | null)[]): Design[] {
  const log = ([low, high]: readonly [number, number]) =>
    equallySpaced(0, 1, parts).map((share) => low * (high / low) ** share)
  return [1, 2, 3, 4].flatMap((count) =>
    log(search.diameter).flatMap((diameter) =>
      log(search.strokeRatio).flatMap((strokeRatio) =>
        equallySpaced(0.3, 0.7, 9).flatMap((ejectShare) =>
          frequencies.map((frequency) => ({ diameter, strokeRatio, count, ejectShare, frequency })),
        ),
      ),
    ),
  )
}

describe('sizeThruster', () => {
  let one: SizingResult
  let two: SizingResult
  let most: SizingResult
  let listed: SizingResult
  beforeAll(async () => {
    one = await sizeThruster(ONE)
    two = await sizeThruster(TWO)
    most = await sizeThruster(MOST)
    listed = await sizeThruster(LISTED)
  }, 60_000)
  const all = (): [SizingResult, DesignProblem][] => [
    [one, ONE],
    [two, TWO],
    [most, MOST],
    [listed, LISTED],
  ]

  it('gives candidates that hold every limit in the full analysis of every duty point', () => {
    for (const [result, problem] of all()) {
      expect(result.status).toBe('done')
      expect(result.candidates.length).toBe(5)
      const designs = compileDesigns(problem)
      for (const candidate of result.candidates) {
        expect(candidate.feasible).toBe(true)
        let power = 0
        designs.evaluate(candidate.design).points.forEach((point, i) => {
          const whole = analyseThruster(thrusterInputOf(designs, point))
          expect(whole.limits.filter(({ ok }) => !ok)).toEqual([])
          const told = at(candidate.points, i)
          expectClose(told.thrust, whole.meanThrust, 1e-9)
          expectClose(told.power.total, whole.power.total, 1e-9)
          if (told.thrustAsked !== null) expectClose(whole.meanThrust, told.thrustAsked, 1e-9)
          power += told.share * whole.power.total
          for (const limit of told.limits) {
            const other = whole.limits.find(({ name }) => name === limit.name)
            expectClose(limit.value, other?.value ?? Number.NaN, 1e-9, limit.name)
          }
        })
        expectClose(candidate.power, power, 1e-9)
      }
    }
  })

  it('leaves nothing better to a grid over all fields: one duty point, two, most thrust, stock', () => {
    const grid = gridOf(SEARCH, 30, [null])
    // The aim of the search is 0.5 %; a grid point is never allowed to be better by more.
    expect(at(one.candidates, 0).power).toBeLessThanOrEqual(bestOfGrid(ONE, grid) * 1.005)
    expect(at(two.candidates, 0).power).toBeLessThanOrEqual(bestOfGrid(TWO, grid) * 1.005)
    const fast = equallySpaced(0, 1, 12).map((share) => 0.2 * 25 ** share)
    const coarse = gridOf(SEARCH, 14, fast)
    expect(-at(most.candidates, 0).thrust).toBeLessThanOrEqual(bestOfGrid(MOST, coarse) * 0.995)
    const perTravel = (0.05 / 0.03) ** 2
    const stock = [0.012, 0.02, 0.025, 0.032, 0.04, 0.05].flatMap((diameter) =>
      [0.02, 0.03, 0.05, 0.08]
        .map((travel) => (travel * perTravel) / diameter)
        .filter((strokeRatio) => strokeRatio >= 1 && strokeRatio <= 6)
        .flatMap((strokeRatio) =>
          [1, 2, 3, 4].flatMap((count) =>
            equallySpaced(0.3, 0.7, 81).map((ejectShare) => ({
              diameter,
              strokeRatio,
              count,
              ejectShare,
              frequency: null,
            })),
          ),
        ),
    )
    const best = bestOfGrid(LISTED, stock)
    expectClose(at(listed.candidates, 0).power, best, 5e-3)
    expect(at(listed.candidates, 0).power).toBeLessThanOrEqual(best * (1 + 1e-6))
  })

  it('orders candidates, keeps them apart, and tells what holds each back', () => {
    for (const [result, problem] of all()) {
      const { distance } = designSpace(problem, problem.section.search ?? SEARCH)
      result.candidates.forEach((candidate, i) => {
        if (i > 0) {
          const before = at(result.candidates, i - 1)
          if (result.goal === 'power') expect(candidate.power).toBeGreaterThanOrEqual(before.power)
          else expect(candidate.thrust).toBeLessThanOrEqual(before.thrust)
        }
        for (const other of result.candidates.slice(0, i))
          expect(distance(candidate.design, other.design)).toBeGreaterThanOrEqual(APART * (1 - 1e-9))
        // In these problems something always stands in the way.
        expect(candidate.binding !== null || candidate.rangeEnds.length > 0).toBe(true)
      })
    }
    // Worked by hand from the limits of the section: 0.09 m of bay over 5/3 is the largest exit, 0.4 m/s the plunger's speed.
    expect(at(most.candidates, 0).design.diameter).toBeLessThanOrEqual(0.054 * (1 + 1e-12))
    expect(at(most.candidates, 0).design.diameter).toBeGreaterThan(0.0539)
    expect(at(one.candidates, 0).binding?.name).toMatch(/plunger (speed|travel)/)
    expect(at(one.candidates, 0).rangeEnds).toContainEqual({ field: 'count', end: 'high' })
  })

  it('takes bores and plunger strokes from stock', () => {
    for (const { design, plungerTravel } of listed.candidates) {
      expect(STOCK.stock?.diameters).toContain(design.diameter)
      expect(
        Math.min(...(STOCK.stock?.strokes ?? []).map((stroke) => Math.abs(stroke / plungerTravel - 1))),
      ).toBeLessThan(1e-12)
      expect(design.strokeRatio).toBeLessThanOrEqual(6)
    }
  })

  it('takes the least swept volume where the power does not depend on the stroke ratio', async () => {
    // No losses, no column, nothing that limits the plunger: thrust and power then hang on exit and exit speed alone.
    const free = {
      ...ONE.section.actuator,
      maxForce: null,
      maxSpeed: null,
      maxPower: null,
      maxTravel: null,
      valveLag: 0,
    }
    const search: SearchInput = { ...SEARCH, diameter: [0.02, 0.04], strokeRatio: [2, 4], ejectShare: null }
    const tied = problemWith(
      {
        actuator: free,
        intake: { ...ONE.section.intake, lossCoefficient: 0 },
        bay: { length: null, diameter: null },
        search,
        target: [{ thrust: 0.02, share: 1 }],
      },
      {
        nozzle: { ...ONE.pulse.nozzle, shape: 'tube', length: 0, lossCoefficient: 0 },
        programme: { ...ONE.pulse.programme, shape: 'rectangular' },
      },
    )
    const { candidates } = await sizeThruster(tied, { frontPoints: 0 })
    expectClose(at(candidates, 1).power, at(candidates, 0).power, 1e-9)
    expectClose(at(candidates, 0).design.strokeRatio, 2, 1e-9)
    const volumes = candidates.map(({ sweptVolume }) => sweptVolume)
    expect(volumes).toEqual(volumes.toSorted((a, b) => a - b))
  })

  it('repeats to the bit for a seed, and comes to the same power from another', async () => {
    const again = await sizeThruster(TWO, { pause: () => Promise.resolve() })
    expect(again).toEqual(two)
    const other = await sizeThruster(problemWith({ ...TWO.section, search: { ...SEARCH, seed: 77 } }))
    expectClose(at(other.candidates, 0).power, at(two.candidates, 0).power, 1e-4) // the aim of the search
  })

  it('traces a front that rises in size and falls in power, and that a grid does not pass', () => {
    for (const [result] of all()) {
      result.front.slice(1).forEach((point, i) => {
        const before = at(result.front, i)
        expect(point.sweptVolume).toBeGreaterThan(before.sweptVolume)
        if (result.goal === 'power') expect(point.power).toBeLessThan(before.power)
        else expect(point.thrust).toBeGreaterThan(before.thrust)
      })
      expect(result.front.length).toBeLessThanOrEqual(40)
    }
    expect(two.front.length).toBeGreaterThan(30)
    expectClose(last(two.front).power, at(two.candidates, 0).power, 1e-12)
    const designs = compileDesigns(TWO)
    for (const design of gridOf(SEARCH, 24, [null])) {
      const { violation, power, sweptVolume } = designs.evaluate(design)
      if (violation > 0) continue
      const under = two.front.filter((point) => point.sweptVolume <= sweptVolume)
      // Between two points the front is a step: a design under the next cap is no worse than that cap's by more than 0.5 %.
      const next = two.front.find((point) => point.sweptVolume > sweptVolume) ?? last(two.front)
      expect(power).toBeGreaterThan(next.power * 0.995)
      expect(under.length > 0 || sweptVolume > at(two.front, 0).sweptVolume * 0.995).toBe(true)
    }
  })

  it('tells the least violated limit where no design holds them all', async () => {
    const asked = problemWith({ target: [{ speed: 1.1, share: 1 }] })
    const result = await sizeThruster(asked)
    expect(result.candidates).toEqual([])
    expect(result.front).toEqual([])
    const { candidate, leastViolated } = result.nearest ?? { candidate: null, leastViolated: null }
    expect(candidate?.feasible).toBe(false)
    const broken = candidate?.points.flatMap(({ limits }) => limits.filter(({ ok }) => !ok).map(({ name }) => name))
    expect(broken).toContain(leastViolated?.name)
    expect(result.message).toContain(`misses ${leastViolated?.name ?? ''} by`)
    for (const name of broken ?? []) expect(result.message).toContain(`${name} by`)
    // No design of a grid comes nearer.
    const designs = compileDesigns(asked)
    const least = Math.min(...gridOf(SEARCH, 14, [null]).map((design) => designs.evaluate(design).violation))
    expect(candidate === null ? Infinity : designs.evaluate(candidate.design).violation).toBeLessThanOrEqual(
      least * 1.005,
    )
  })

  it('refuses a stroke past the formation number only when asked to', async () => {
    expect(at(one.candidates, 0).points[0]?.formationMargin?.adopted).toBeLessThan(0)
    const held = await sizeThruster(ONE, { holdFormationNumber: true, frontPoints: 0 })
    for (const { points } of held.candidates)
      for (const { formationMargin } of points)
        // The table of formation numbers is good to 5e-4 of about 2.
        expect(formationMargin?.adopted ?? Number.NaN).toBeGreaterThan(-1e-3)
    expect(at(held.candidates, 0).power).toBeGreaterThan(at(one.candidates, 0).power)
    expect(held.front).toEqual([])
  })

  it('cancels at the next pause and keeps the candidates found', async () => {
    const signal = { aborted: false }
    let share = 0
    const result = await sizeThruster(TWO, {
      signal,
      onProgress: (progress) => {
        expect(progress.share).toBeGreaterThanOrEqual(share)
        share = progress.share
        if (share > 0.6) signal.aborted = true
      },
    })
    expect(result.status).toBe('cancelled')
    expect(result.candidates).toEqual(two.candidates)
    expect(result.front.length).toBeGreaterThan(0)
    expect(result.front.length).toBeLessThan(two.front.length)
    const early = await sizeThruster(TWO, { signal: { aborted: true } })
    expect(early.status).toBe('cancelled')
    expect(early.counters.evaluations).toBeLessThan(1000)
  })

  it('says so where there is no search', async () => {
    const result = await sizeThruster(problemWith({ search: null, target: [] }))
    expect(result.status).toBe('failed')
    expect(result.message).toMatch(/no search section/)
  })

  it('refuses stock outside the ranges', async () => {
    const bores = { ...SEARCH, stock: { diameters: [0.2], strokes: [] } }
    await expect(sizeThruster(problemWith({ search: bores }))).rejects.toThrow(
      /must hold a bore from 0\.01 m to 0\.08 m/,
    )
    const strokes = { ...SEARCH, stock: { diameters: [], strokes: [3] } }
    await expect(sizeThruster(problemWith({ search: strokes }))).rejects.toThrow(/stroke ratio of 1 to 6/)
  })

  it('marks a candidate that stands within the spread of a limit, and not one that stands clear', () => {
    expect(at(one.candidates, 0).withinSpread).toContain('plunger speed')
    const { design } = at(one.candidates, 0)
    const exact = compileDesigns(problemWith({ ...ONE.section, manufacture: { diameter: 0, stroke: 0, frequency: 0 } }))
    // Without scatter only a limit met to the last digit could be within it.
    expect(describeDesign(exact, { ...design, strokeRatio: 3 }).withinSpread).toEqual([])
    const gentle = compileDesigns(problemWith({ target: [{ thrust: 0.3, share: 1 }] }))
    const clear = describeDesign(gentle, { diameter: 0.04, strokeRatio: 2, count: 4, ejectShare: 0.4, frequency: null })
    // Every limit but those met by construction leaves a tenth; the scatter is a few per cent.
    expect(clear.feasible).toBe(true)
    expect(clear.binding).toBeNull()
    expect(clear.withinSpread).toEqual([])
  })
})
