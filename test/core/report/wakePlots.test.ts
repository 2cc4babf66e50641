import { beforeAll, describe, expect, it } from 'vitest'
import { at, last } from '../../../core/base'
import { marchWake, type Wake, type WakeInput, type WakeRing } from '../../../core/filament'
import { typescriptKernel } from '../../../core/kernel'
import {
  nearestPair,
  neighbourSeparations,
  plotToSvg,
  thinPlot,
  totalImpulse,
  wakePlots,
  type PlotModel,
  type WakePlotOptions,
} from '../../../core/report'
import { expectClose } from '../../support/close'

const RING: WakeRing = {
  circulation: 0.01,
  radius: 0.02,
  coreRadius: 0.002,
  core: 'uniform',
  centre: [0, 0, 0],
  direction: [1, 0, 0],
}

const PAIR: readonly WakeRing[] = [RING, { ...RING, centre: [0.02, 0, 0] }]
/** The second appears between two output times. */
const LATER: readonly WakeRing[] = [RING, { ...RING, centre: [-0.05, 0, 0], startTime: 0.52 }]
const MANY = Array.from({ length: 12 }, (_, k): WakeRing => ({ ...RING, centre: [0.2 * k, 0, 0] }))

function inputOf(rings: readonly WakeRing[], more: Partial<WakeInput> = {}): WakeInput {
  return {
    model: 'auto',
    law: 'thin',
    rings,
    kinematicViscosity: 1e-6,
    viscous: false,
    ageing: 'laminar',
    axialFlow: 0,
    wall: null,
    tube: null,
    stations: [],
    duration: 1,
    outputStep: 0.05,
    tolerance: 1e-8,
    ...more,
  }
}

const OPTIONS: WakePlotOptions = {
  units: { length: 'mm', time: 's', impulse: 'mN·s' },
  density: 1000,
  duration: 1,
  selected: null,
}

function need(model: PlotModel | undefined): PlotModel {
  if (model === undefined) throw new Error('a plot is missing')
  return model
}

describe('plots of a wake', () => {
  /** Two equal rings one behind the other, the second appearing later: they leapfrog. */
  let pair: Wake
  let later: Wake
  beforeAll(async () => {
    const options = { kernel: typescriptKernel }
    pair = await marchWake(inputOf(PAIR), options)
    later = await marchWake(inputOf(LATER), options)
  })

  it('show every output time of every ring in the shown units', () => {
    const [position, radius] = wakePlots(pair, PAIR, OPTIONS)
    const line = at(need(position).series, 1)
    expect(line.x).toHaveLength(pair.outputTimes.length)
    expectClose(last(line.y) ?? NaN, 1000 * last(at(pair.trajectories, 1).x), 1e-12, 'x in mm')
    expect(need(radius).y).toMatchObject({ unit: 'mm', min: 0 })
    expect(need(position).series.map(({ name }) => name)).toEqual(['1', '2'])
  })

  it('give neighbouring lines looks that differ without colour', () => {
    const [position] = wakePlots(pair, PAIR, OPTIONS)
    const looks = need(position).series.map(({ role, line }) => `${role} ${line}`)
    expect(new Set(looks).size).toBe(2)
    expect(new Set(need(position).series.map(({ line }) => line)).size).toBe(2)
  })

  it('show the gap to the next ring with a change of sign at each pass', () => {
    const gap = at(neighbourSeparations(pair), 0).separation.values
    expectClose(at(gap, 0), -0.02, 1e-12, 'gap at the start')
    const passes = pair.events.filter(({ event }) => event === 'pass').length
    const changes = Array.from(gap).filter((value, i, all) => i > 0 && value * at(all, i - 1) < 0).length
    expect(passes).toBeGreaterThan(0)
    expect(changes).toBe(passes)
    expect(at(nearestPair(pair).values, 0)).toBe(0.02)
  })

  it('begin a ring and its gap at the first output after it appears', () => {
    const [position, , separation] = wakePlots(later, LATER, OPTIONS)
    expect(at(at(need(position).series, 1).x, 0)).toBe(0.55)
    expect(at(at(need(separation).series, 0).x, 0)).toBe(0.55)
  })

  it('show the impulse conserved without viscosity, stepping where a ring appears', () => {
    const { now, born } = totalImpulse(later, LATER, 1000)
    const one = 1000 * Math.PI * 0.01 * 0.02 ** 2
    expectClose(at(born.values, 0), one, 1e-12, 'one ring')
    expectClose(last(born.values), 2 * one, 1e-12, 'two rings')
    // The march holds a relative error of 1e-8 a step; a few tens of steps.
    Array.from(now.values).forEach((value, i) => expectClose(value, at(born.values, i), 1e-6, `at ${i}`))
    const [, , , impulse] = wakePlots(later, LATER, OPTIONS)
    expectClose(last(at(need(impulse).series, 0).y) ?? NaN, 2000 * one, 1e-6, 'in mN s')
  })

  it('show the impulse as the rings appeared beside it only where it is another', async () => {
    const rings: readonly WakeRing[] = [{ ...RING, centre: [0, 0, 0] }]
    const toWall = await marchWake(
      inputOf(rings, { wall: { point: [0.06, 0, 0], normal: [1, 0, 0] }, duration: 0.8 }),
      { kernel: typescriptKernel },
    )
    const [, , wall] = wakePlots(toWall, rings, OPTIONS)
    expect(need(wall).series.map(({ id }) => id)).toEqual(['as-born', 'now'])
    const [, , , free] = wakePlots(later, LATER, OPTIONS)
    expect(need(free).series.map(({ id }) => id)).toEqual(['now'])
  })

  it('take the distance of centres for rings in space, and the nearest pair where there are many', async () => {
    const side = await marchWake(
      inputOf([RING, { ...RING, centre: [0, 0.1, 0] }], { duration: 0.05, tolerance: 1e-4 }),
      { kernel: typescriptKernel },
    )
    expect(side.model).toBe('filament')
    expectClose(at(at(neighbourSeparations(side), 0).separation.values, 0), 0.1, 1e-9, 'distance')
    const many = await marchWake(inputOf(MANY, { duration: 0.1 }), { kernel: typescriptKernel })
    const [, , separation] = wakePlots(many, MANY, OPTIONS)
    expect(need(separation).series.map(({ name }) => name)).toEqual(['nearest pair'])
    const [position] = wakePlots(many, MANY, { ...OPTIONS, selected: 4 })
    const named = need(position).series.filter(({ unnamed }) => unnamed !== true)
    expect(named.map(({ name }) => name)).toEqual(['1', '3', '4', '5', '7', '9', '11', '12'])
  })

  it('pick out the selected ring', () => {
    const [position] = wakePlots(pair, PAIR, { ...OPTIONS, selected: 2 })
    expect(need(position).series.map(({ role }) => role)).toEqual(['secondary', 'primary'])
  })

  it('are written as SVG like every other plot', () => {
    for (const plot of wakePlots(pair, PAIR, OPTIONS))
      expect(plotToSvg(plot, { width: 480, height: 300, theme: 'light' })).toMatch(/^<svg/)
  })
})

describe('thinPlot', () => {
  const x = Array.from({ length: 100_000 }, (_, i) => i)
  const y = x.map((value) => (value === 54_321 ? 7 : Math.sin(value / 5000)))
  const model: PlotModel = {
    id: 'long',
    title: 'Long',
    x: { title: 'Time', unit: 's' },
    y: { title: 'Long', unit: '' },
    series: [{ id: 'a', name: 'a', x, y, role: 'primary', line: 'solid', filled: false }],
    bands: [],
    lines: [],
  }

  it('keeps both ends and every extreme, in order', () => {
    const thin = at(thinPlot(model, 400).series, 0)
    expect(thin.x.length).toBeLessThanOrEqual(400)
    expect([at(thin.x, 0), last(thin.x)]).toEqual([0, 99_999])
    expect(Math.max(...thin.y.map(Number))).toBe(7)
    expect(thin.x).toEqual([...thin.x].sort((a, b) => a - b))
  })

  it('leaves short plots as they are', () => {
    const short = { ...model, series: [{ ...at(model.series, 0), x: x.slice(0, 10), y: y.slice(0, 10) }] }
    expect(thinPlot(short)).toBe(short)
  })

  it('keeps gaps', () => {
    const gap = y.map((value, i) => (i === 70_003 ? null : value))
    const thin = thinPlot({ ...model, series: [{ ...at(model.series, 0), y: gap }] }, 400)
    expect(at(thin.series, 0).y.filter((value) => value === null)).toHaveLength(1)
  })
})
