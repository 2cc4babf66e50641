/** Fits of start time and start position together run along a valley where a ring hardly slows: the start must stay where it can be. */
import { describe, expect, it } from 'vitest'
import { at, randomSource } from '../../../../core/base'
import type { FitName } from '../../../../core/tank'
import { fitRing } from '../../../../core/tank/readings/fitRing'
import type { RingStart } from '../../../../core/tank/readings/pathModel'
import { fitRepeats } from '../../../../core/tank/readings/repeats'
import { expectNear } from '../../../support/close'
import { LAMINAR, LAMINAR_AROUND, madeRows, NO_ROW } from './made'

const THREE: readonly FitName[] = ['circulation', 'startTime', 'startPosition']
const PLAN: RingStart = { circulation: 0.005, radius: 0.0177, coreRadius: 0.0057, time: 0.59, x: 0.038 }

/** Places of rings that slow by `slowing` [m/s2] twice over, each run 20 ms later than the one before. */
function placesOf(slowing: number, sigma: number) {
  const random = randomSource(5)
  return [1, 2, 3].flatMap((run) =>
    Array.from({ length: 60 }, (_, k) => {
      const time = 1 + 0.06 * k
      const x = 0.039 + 0.066 * (time - 0.59 - 0.02 * run) - slowing * (time - 0.59) ** 2 + sigma * random.normal()
      return { ...NO_ROW, run: String(run), time, x }
    }),
  )
}

describe('a start that the readings do not tell', () => {
  it.each([
    ['that do not slow', 0, 8e-4],
    ['that slow a little', 8e-4, 8e-4],
    ['that slow as a laminar ring does at first, seen well', 1e-3, 3e-4],
    ['that slow faster', 1.4e-3, 8e-4],
  ])('is before the first reading, and fitted alike in all runs, of rings %s', (_name, slowing, sigma) => {
    const rows = placesOf(slowing, sigma)
    const { pooled, perRun, repeats } = fitRepeats({
      rows,
      names: THREE,
      start: PLAN,
      around: LAMINAR_AROUND,
      formedAt: 0.59,
    })
    expect(pooled.status).toBe('done')
    expect(pooled.fitted).toEqual(['circulation', 'startTime'])
    expect(pooled.held.map(({ name }) => name)).toEqual(['startPosition'])
    expect(at(pooled.held, 0).reason).toMatch(/held at the planned one, in every run alike/)
    for (const one of perRun) {
      expect([one.status, one.fitted]).toEqual(['done', pooled.fitted])
      expect(one.fit.startTime?.value ?? NaN).toBeLessThan(1)
      expect(one.fit.startTime?.value ?? NaN).toBeGreaterThan(0)
    }
    expect(repeats.startTime?.runs).toBe(3)
    const [first, , third] = perRun.map(({ fit }) => fit.startTime ?? { value: NaN, standardError: NaN })
    // Two steps of 20 ms; four standard errors of a difference of two.
    const error = 4 * Math.hypot(first?.standardError ?? NaN, third?.standardError ?? NaN)
    expectNear((third?.value ?? NaN) - (first?.value ?? NaN), 0.04, error)
  })

  it('is not held where the record tells it', () => {
    const rows = madeRows(LAMINAR, LAMINAR_AROUND, { from: 0.4, to: 8, count: 60, noise: { x: 2e-4 } })
    const fit = fitRing({ rows, names: THREE, start: LAMINAR, around: LAMINAR_AROUND, formedAt: LAMINAR.time })
    expect(fit.fitted).toEqual(THREE)
  })

  it('gives no numbers where the time alone is fitted and lies where it cannot be', () => {
    const rows = placesOf(0, 1e-4).map((row) => ({ ...row, x: row.x - 0.2 }))
    const fit = fitRing({
      rows,
      names: ['circulation', 'startTime'],
      start: PLAN,
      around: LAMINAR_AROUND,
      formedAt: 0.59,
    })
    // The place is not to be fitted, and circulation from a wrong place would mean nothing.
    expect([fit.status, fit.fit, fit.fitted]).toEqual(['failed', {}, []])
    expect(fit.message).toMatch(/the start would lie at .* s, .*Check the time and length offsets/)
  })
})
