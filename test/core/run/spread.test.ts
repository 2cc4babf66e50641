import { describe, expect, it } from 'vitest'
import { setSpread, spreadTable, type SpreadQuantity } from '../../../core/plan'
import { pulseOf, run, type SpreadData } from '../../../core/run'
import { figuresOf, percentile } from '../../../core/run/spreadFigures'
import { waterProperties } from '../../../core/water'
import { expectClose } from '../../support/close'
import { planOf } from '../../support/plans'
import { CONSTANT_SPEED } from '../../support/thrusterPlans'

async function spreadOf(parts: Readonly<Record<string, unknown>>): Promise<SpreadData> {
  const { data, status, message } = await run(planOf(parts), { sections: ['spread'] })
  if (status !== 'done' || data?.spread === null || data?.spread === undefined) throw new Error(message)
  return data.spread
}

function quantity({ quantities }: SpreadData, path: string): SpreadQuantity {
  const found = quantities.find((one) => one.path === path)
  if (found === undefined) throw new Error(`no ${path}`)
  return found
}

const SPEED = { relative: { 'programme.peakSpeed': 0.01 }, samples: 2000, seed: 1 }
const rectangular = (stroke: number): object => ({ shape: 'rectangular', stroke, peakSpeed: 0.2 })

describe('a spread', () => {
  it('of the speed alone gives the circulation of a slug its relative deviation, and its impulse', async () => {
    const spread = await spreadOf({ programme: rectangular(0.06), spread: SPEED })
    // Gamma = U L / 2 and I = rho A U L go with the speed. The deviation of n samples is known to 1 / sqrt(2 n), 1.6 %; three of those.
    for (const path of ['pulse.total.circulation', 'pulse.total.impulse']) {
      const { mean, standardDeviation, nominal, p05, p95 } = quantity(spread, path)
      expectClose((standardDeviation ?? 0) / (nominal ?? 1), 0.01, 0.048, path)
      // The mean to 3 x 0.01 / sqrt(2000).
      expectClose(mean ?? 0, nominal ?? 1, 6.8e-4, path)
      // Normal: 1.645 deviations to either side; the 5 % point of 2000 samples is known to about 0.048 deviations, three of those.
      expect(Math.abs(((p95 ?? 0) - (mean ?? 0)) / (standardDeviation ?? 1) - 1.645)).toBeLessThan(0.15)
      expect(Math.abs(((mean ?? 0) - (p05 ?? 0)) / (standardDeviation ?? 1) - 1.645)).toBeLessThan(0.15)
    }
    expect(quantity(spread, 'pulse.strokeRatio').standardDeviation).toBe(0)
  })

  it('comes close to linear propagation of several deviations', async () => {
    const deviations = { 'nozzle.diameter': 0.002, 'programme.peakSpeed': 0.004, 'programme.stroke': 0.003 }
    const spread = await spreadOf({ spread: { relative: deviations, samples: 2000, seed: 3 } })
    const plan = planOf()
    const water = waterProperties(plan.water)
    const speedAt = (changes: Readonly<Record<string, number>>): number => {
      const by = (path: string): number => 1 + (changes[path] ?? 0)
      const nozzle = { ...plan.nozzle, diameter: plan.nozzle.diameter * by('nozzle.diameter') }
      const programme = {
        ...plan.programme,
        peakSpeed: plan.programme.peakSpeed * by('programme.peakSpeed'),
        stroke: plan.programme.stroke * by('programme.stroke'),
      }
      return pulseOf({ ...plan, nozzle, programme }, water).ring?.speed ?? Number.NaN
    }
    const squares = Object.entries(deviations).map(([path, deviation]) => {
      const slope = (speedAt({ [path]: 1e-4 }) - speedAt({ [path]: -1e-4 })) / 2e-4
      return (slope * deviation) ** 2
    })
    const linear = Math.sqrt(squares.reduce((sum, square) => sum + square, 0))
    // Three times the 1.6 % that the deviation of 2000 samples is known to; the bend of the curve is far smaller.
    expectClose(quantity(spread, 'pulse.ring.speed').standardDeviation ?? 0, linear, 0.048)
  })

  it('repeats for a seed to the bit, whatever the order of its fields, and is another for another seed', async () => {
    const relative = { 'nozzle.diameter': 0.01, 'programme.stroke': 0.01 }
    const turned = { 'programme.stroke': 0.01, 'nozzle.diameter': 0.01 }
    const first = await spreadOf({ spread: { relative, samples: 50, seed: 7 } })
    const second = await spreadOf({ spread: { relative: turned, samples: 50, seed: 7 } })
    const other = await spreadOf({ spread: { relative, samples: 50, seed: 8 } })
    expect(second.quantities).toEqual(first.quantities)
    expect(spreadTable(second)).toBe(spreadTable(first))
    expect(spreadTable(other)).not.toBe(spreadTable(first))
  })

  it('of an absolute deviation scatters by it', async () => {
    const spread = await spreadOf({ spread: { absolute: { 'programme.stroke': 0.001 }, samples: 1000 } })
    // In diameters of 0.03 m; the deviation of 1000 samples is known to 2.2 %, three of those.
    expectClose(quantity(spread, 'pulse.strokeRatio').standardDeviation ?? 0, 0.001 / 0.03, 0.067)
  })

  it('of thruster and tank run has thrust, power and arrivals, each about its nominal value', async () => {
    const tankRun = { tank: { length: 1.2, width: 0.4, depth: 0.5 }, stations: [0.1] }
    const spread = await spreadOf({
      ...CONSTANT_SPEED,
      tankRun,
      spread: { relative: { 'train.period': 0.01, 'programme.peakSpeed': 0.005 }, samples: 60, seed: 2 },
    })
    const { data } = await run(planOf({ ...CONSTANT_SPEED, tankRun }), { sections: ['thruster', 'tankRun'] })
    expect(quantity(spread, 'thruster.meanThrust').nominal).toBe(data?.thruster?.result.meanThrust)
    expect(quantity(spread, 'thruster.power.total').nominal).toBe(data?.thruster?.result.power.total)
    expect(quantity(spread, 'tankRun.arrivals.0.time').nominal).toBe(data?.tankRun?.arrivals[0]?.time)
    const thrust = quantity(spread, 'thruster.meanThrust')
    // f U L: 1.1 % together; the deviation of 60 samples is known to 9 %, three of those.
    expectClose((thrust.standardDeviation ?? 0) / (thrust.nominal ?? 1), Math.hypot(0.01, 0.005), 0.28)
    expect(spread.position?.p05.length).toBe(51)
    expect(spread.notes.join(' ')).toMatch(/Arrivals scatter about the adopted ring/)
  })

  it('has bands that hold the nominal curve and open with the stroke', async () => {
    const { circulation } = await spreadOf({ programme: rectangular(0.06), spread: { ...SPEED, samples: 300 } })
    if (circulation === null) throw new Error('no band')
    expect(circulation.x[0]).toBe(0)
    expect(circulation.x.length).toBe(51)
    const width = circulation.x.map((_, i) => (circulation.p95[i] ?? 0) - (circulation.p05[i] ?? 0))
    expect(width[0]).toBe(0)
    expect(width[40]).toBeGreaterThan(width[20] ?? 0)
    circulation.nominal.forEach((value, i) => {
      expect(value).toBeGreaterThanOrEqual(circulation.p05[i] ?? Infinity)
      expect(value).toBeLessThanOrEqual(circulation.p95[i] ?? -Infinity)
    })
  })

  it('counts refused samples, tells why, and says so in a caution', async () => {
    // Half of the draws lie above the largest radial ratio the formulas hold for.
    const nozzle = { shape: 'converging', diameter: 0.03, pistonDiameter: 0.06, radialRatio: 0.45 }
    const plan = planOf({ nozzle, spread: { absolute: { 'nozzle.radialRatio': 0.01 }, samples: 200 } })
    const { data, status } = await run(plan, { sections: ['spread'] })
    const spread = data?.spread
    expect(status).toBe('done')
    expect((spread?.used ?? 0) + (spread?.refused ?? 0)).toBe(200)
    expect(spread?.refused).toBeGreaterThan(70)
    expect(spread?.refusals[0]).toMatchObject({ field: 'nozzle.radialRatio', count: spread?.refused })
    expect(spread?.quantities[0]?.samples).toBe(spread?.used)
    expect(data?.cautions.find(({ id }) => id === 'spread-refused')?.text).toMatch(/of 200 samples .* were refused/)
  })

  it('is cancelled with the samples that were come to, marked as cut short', async () => {
    const signal = { aborted: false }
    const onProgress = ({ what }: { readonly what: string }): void => {
      if (what.startsWith('sample 31 ')) signal.aborted = true
    }
    const plan = planOf({ spread: { ...SPEED, samples: 500 } })
    const { status, data } = await run(plan, { sections: ['spread'] }, { signal, onProgress })
    expect(status).toBe('cancelled')
    expect(data?.spread).toMatchObject({ status: 'cancelled', used: 31, samples: 500 })
    expect(data?.cautions.find(({ id }) => id === 'spread-incomplete')?.text).toMatch(/31 of 500 samples/)
    // What was come to is what a spread of so many samples is.
    const short = await spreadOf({ spread: { ...SPEED, samples: 31 } })
    expect(data?.spread?.quantities).toEqual(short.quantities)
  })

  it('of a plan that adopts the computed jet runs it once and says what it held', async () => {
    const parts = {
      programme: { shape: 'rectangular', stroke: 0.24, peakSpeed: 0.2 },
      jet: { ensemble: false, delta: 0.2 },
      models: { overPressure: 'computed', formationNumber: 'computed' },
      spread: { ...SPEED, samples: 50 },
    }
    const spread = await spreadOf(parts)
    expect(spread.notes[0]).toMatch(/^The computed jet is run once/)
    // Scaled by the speed, all of the circulation goes with it: each sample has the relative deviation of the speed.
    const { standardDeviation, nominal } = quantity(spread, 'pulse.total.circulation')
    expectClose((standardDeviation ?? 0) / (nominal ?? 1), 0.01, 0.3)
    const { data: whole } = await run(planOf(parts), { sections: ['spread'] })
    expect(whole?.cautions.find(({ id }) => id === 'spread-notes')?.text).toBe(spread.notes.join(' '))
    const { data } = await run(planOf({ ...parts, spread: undefined }), { sections: ['pulse'] })
    expect(nominal).toBe(data?.pulse?.total.circulation)
  }, 30_000)

  it.each([
    ['nothing that scatters', {}, 'spread.relative'],
    ['a number that is not given', { relative: { 'nozzle.contraction': 0.1 } }, 'spread.relative.nozzle.contraction'],
    ['an item that is not there', { absolute: { 'wake.stations.3': 0.1 } }, 'spread.absolute.wake.stations.3'],
  ])('is refused with its field for %s', async (_, spread, field) => {
    // Set in the open plan: a file that says so is refused when it is read.
    const result = await run(setSpread(planOf(), spread), { sections: ['spread'] })
    expect(result).toMatchObject({ status: 'failed', field })
  })
})

describe('figures of samples', () => {
  it('take percentiles straight between order statistics at (n - 1) p', () => {
    // Type 7 of Hyndman & Fan 1996 worked by hand: 1..5 at 0.05 lies 0.2 past the first.
    expect(percentile(Float64Array.of(1, 2, 3, 4, 5), 0.05)).toBeCloseTo(1.2, 15)
    expect(percentile(Float64Array.of(1, 2, 3, 4, 5), 0.95)).toBeCloseTo(4.8, 15)
    expect(percentile(Float64Array.of(7), 0.95)).toBe(7)
  })

  it('count only samples with a value, and have no deviation of one', () => {
    const figures = figuresOf(Float64Array.of(2, Number.NaN, 4, 6), 4)
    expect(figures).toEqual({ mean: 4, standardDeviation: 2, p05: 2.2, p50: 4, p95: 5.8, nominal: 4, samples: 3 })
    expect(figuresOf(Float64Array.of(3), null)).toMatchObject({ mean: 3, standardDeviation: null, samples: 1 })
    expect(figuresOf(Float64Array.of(Number.NaN), null)).toMatchObject({ mean: null, p95: null, samples: 0 })
  })

  it('keep the digits of a small scatter about a large value', () => {
    const figures = figuresOf(Float64Array.of(1e9, 1e9 + 1, 1e9 + 2), null)
    expect(figures.standardDeviation).toBeCloseTo(1, 12)
  })
})
