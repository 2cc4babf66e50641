import { beforeAll, describe, expect, it } from 'vitest'
import { at, last } from '../../../core/base'
import { examplePlan, EXAMPLES, type Plan } from '../../../core/plan'
import { fromBase } from '../../../core/quantity'
import {
  explainThruster,
  plotToSvg,
  powerBar,
  sizePlot,
  THRUSTER_EXPLANATION_IDS,
  thrusterPlots,
  type PlotModel,
} from '../../../core/report'
import { run } from '../../../core/run'
import { expectClose, expectNear } from '../../support/close'
import { readXml } from './xml'

const UNITS = { time: 's', speed: 'm/s', pressure: 'kPa', force: 'mN', power: 'mW' }

async function analysed(plan: Plan) {
  const { data, message } = await run(plan, { sections: ['thruster'], sizing: 'off' })
  const section = plan.thruster
  if (data === null || data.thruster === null || section === null) throw new Error(message)
  const thruster = data.thruster.result
  return {
    plan,
    section,
    water: data.water,
    thruster,
    plots: thrusterPlots({ section, nozzle: plan.nozzle, water: data.water, thruster, units: UNITS }),
  }
}

function need(plots: readonly PlotModel[], id: string): PlotModel {
  const found = plots.find((plot) => plot.id === id)
  if (found === undefined) throw new Error(`no plot ${id}`)
  return found
}

describe('plots of a thruster', () => {
  let vehicle: Awaited<ReturnType<typeof analysed>>
  let bench: Awaited<ReturnType<typeof analysed>>
  beforeAll(async () => {
    vehicle = await analysed(examplePlan('survey-vehicle'))
    bench = await analysed(examplePlan('bench-thruster'))
  })

  it('show one period of the plan in the shown units, with the limits in reach', () => {
    const { cycle } = vehicle.plots
    expect(cycle.map(({ title }) => title)).toEqual([
      'Exit speed',
      'Cavity pressure',
      'Plunger force',
      'Power of one thruster',
    ])
    const speed = need(cycle, 'thruster-exit-speed')
    expectClose(last(at(speed.series, 0).x), 0.45, 1e-12)
    expectNear(Math.max(...at(speed.series, 0).y.map(Number)), 1.6, 1e-6)
    // Plunger of 100 mm behind an exit of 50 mm: 1 m/s of it is 4 m/s of the jet.
    expect(speed.lines.map(({ value }) => value)).toEqual([4])
    // 150 N is more than four times what is drawn: the curve keeps the room.
    expect(need(cycle, 'thruster-plunger-force').lines).toEqual([])
  })

  it('meet thrust and drag at the cruise speed', () => {
    const plot = need(vehicle.plots.travel, 'thruster-speed')
    const of = (name: string) => {
      const found = plot.series.find((series) => series.name === name)
      if (found === undefined) throw new Error(`no ${name}`)
      return found
    }
    const [thrust, drag] = [of('thrust'), of('drag')]
    const { speed } = vehicle.thruster
    // Both straight to second order between 61 places.
    const i = thrust.x.findIndex((x) => x > speed)
    const gap = (index: number): number => Number(at(thrust.y, index)) - Number(at(drag.y, index))
    const share = gap(i - 1) / (gap(i - 1) - gap(i))
    const crossing = at(thrust.x, i - 1) + share * (at(thrust.x, i) - at(thrust.x, i - 1))
    expectNear(crossing, speed, 1e-3)
    expect(plot.lines.map(({ label }) => label)).toEqual(['cruise', 'duty point 1', 'duty point 2'])
  })

  it('give the thrust that the duty points find at their speeds', () => {
    const [thrust] = need(vehicle.plots.travel, 'thruster-speed').series
    const { x, y } = thrust ?? { x: [], y: [] }
    // The thrust is a straight line, so two of its places tell it anywhere.
    const slope = (Number(last(y)) - Number(at(y, 0))) / (last(x) - at(x, 0))
    for (const { speed, thrust: found } of vehicle.thruster.duties)
      expectClose(Number(at(y, 0)) + slope * (speed ?? 0), fromBase(found, 'mN'), 1e-9)
  })

  it('have neither drag nor start on a bench, and the measured best stroke beside the ring', () => {
    expect(bench.plots.travel.map(({ id }) => id)).toEqual(['thruster-thrust', 'thruster-ring-per-work'])
    const ring = need(bench.plots.travel, 'thruster-ring-per-work')
    expect(ring.bands).toEqual([{ axis: 'x', from: 4, to: 5.5, label: 'measured best' }])
    expect(ring.lines.map(({ value }) => value)).toEqual([bench.thruster.pulse.strokeRatio])
  })

  it('are drawn as SVG', () => {
    const { cycle, travel } = vehicle.plots
    for (const plot of [...cycle, ...travel]) readXml(plotToSvg(plot, { width: 400, height: 260, theme: 'print' }))
  })

  it('draw the front of a sizing with its candidates', async () => {
    const { data } = await run(examplePlan('survey-vehicle'), { sections: ['thruster'] })
    const sizing = data?.thruster?.sizing
    if (sizing === undefined || sizing === null) throw new Error('not sized')
    const [plot] = sizePlot(sizing, { force: 'N', power: 'W', volume: 'L' })
    const front = plot?.series[0]
    expect(front?.x.length).toBe(sizing.front.length)
    // Power falls from point to point of the front.
    front?.y.forEach((value, i) => expect(Number(value)).toBeLessThanOrEqual(Number(front.y[i - 1] ?? Infinity)))
    expect(plot?.series).toHaveLength(1 + sizing.candidates.length)
  }, 30_000)

  it('split the power into parts that sum to it', () => {
    const parts = powerBar(vehicle.thruster)
    expectClose(
      parts.reduce((sum, { power }) => sum + power, 0),
      vehicle.thruster.power.total,
      1e-12,
    )
    expect(parts.map(({ id }) => id)).toEqual(['jet', 'nozzleLoss', 'refill', 'column', 'actuator'])
    // Efficiency 0.7.
    expectClose(at(parts, 4).share, 0.3, 1e-12)
    // Water carried along is a part of its own, and the actuator's loss stays 0.3 of the whole.
    const { power } = vehicle.thruster
    const more = powerBar({ power: { ...power, carried: 0.7, total: power.total + 1 } })
    expect(more.map(({ id }) => id)).toEqual(['jet', 'nozzleLoss', 'refill', 'column', 'carried', 'actuator'])
    expectClose(at(more, 5).share, 0.3, 1e-12)
  })

  it('need no values that have no bound', async () => {
    const plan = examplePlan('survey-vehicle')
    const jumping = await analysed({ ...plan, programme: { ...plan.programme, shape: 'rectangular', peakSpeed: 1 } })
    expect(jumping.thruster.cavity.pressureHigh).toBe(Infinity)
    for (const { series } of jumping.plots.cycle)
      for (const value of series.flatMap(({ y }) => y)) expect(value === null || Number.isFinite(value)).toBe(true)
  })
})

describe('explainThruster', () => {
  const held = EXAMPLES.filter(({ id }) => examplePlan(id).thruster !== null)

  it.each(held.map(({ id }) => id))(
    'answers every figure of %s with formula, source, range and verdict',
    async (id) => {
      const context = await analysed(examplePlan(id))
      for (const figure of THRUSTER_EXPLANATION_IDS) {
        const answer = explainThruster(figure, context)
        expect(answer.formula.length, figure).toBeGreaterThan(10)
        expect(answer.source.length, figure).toBeGreaterThan(5)
        expect(answer.range.length, figure).toBeGreaterThan(5)
        expect(answer.verdict, figure).toMatch(/\.$/)
        expect(answer.verdict, figure).not.toMatch(/NaN|undefined|null|Infinity/)
        for (const { name, value } of answer.values) expect(Number.isFinite(value), `${figure}: ${name}`).toBe(true)
        const open: string[] = []
        for (const [, closing, name] of answer.mathml.matchAll(/<(\/?)([a-z]+)[^>]*>/g)) {
          if (closing === '') open.push(name ?? '')
          else expect(open.pop(), figure).toBe(name)
        }
        expect(open, figure).toEqual([])
      }
    },
  )

  it('tells a thruster at rest from one under way', async () => {
    const bench = await analysed(examplePlan('bench-thruster'))
    const vehicle = await analysed(examplePlan('survey-vehicle'))
    expect(explainThruster('froude', bench).inside).toBe(false)
    expect(explainThruster('froude', vehicle).inside).toBe(true)
    expect(explainThruster('overall', vehicle).verdict).toMatch(/21\.3 % of the power/)
  })
})
