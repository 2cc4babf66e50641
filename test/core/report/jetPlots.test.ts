import { beforeAll, describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import type { JetEnsemble } from '../../../core/coaxial'
import { defaultPlan } from '../../../core/plan'
import {
  explainJet,
  JET_EXPLANATION_IDS,
  jetPlots,
  jetTimeline,
  plotToCsv,
  plotToSvg,
  PUBLISHED_RING_ENERGY,
  type PlotModel,
} from '../../../core/report'
import { expectClose } from '../../support/close'
import { DENSITY, DIAMETER, ramped } from '../coaxial/jet/jets'
import { jetAt, pulseAt } from './jets'
import { readXml } from './xml'

let long: JetEnsemble
let short: JetEnsemble

beforeAll(async () => {
  long = await jetAt(8)
  short = await jetAt(2)
})

function plotsOf(jet: JetEnsemble, strokeRatio: number, formation: JetEnsemble | null): readonly PlotModel[] {
  return jetPlots(jet.shown, {
    pulse: pulseAt(strokeRatio),
    density: DENSITY,
    timeline: jetTimeline(jet.shown, ramped(strokeRatio), DIAMETER),
    formation,
    units: { circulation: 'cm²/s', impulse: 'mN·s' },
  })
}

function plotCalled(plots: readonly PlotModel[], id: string): PlotModel {
  const found = plots.find((plot) => plot.id === id)
  if (found === undefined) throw new Error(`no plot ${id}`)
  return found
}

function values(plot: PlotModel, id: string): readonly (number | null)[] {
  return plot.series.find((series) => series.id === id)?.y ?? []
}

describe('jetPlots', () => {
  it('has circulation of all, of the ring, of the slug and of a quick start in the shown unit', () => {
    const plot = plotCalled(plotsOf(long, 8, long), 'jet-circulation')
    expect(plot.series.map(({ id }) => id)).toEqual(['total', 'ring', 'slug', 'over-pressure'])
    const { history } = long.shown
    const row = 50
    expectClose(Number(at(values(plot, 'total'), row)), at(history.totalCirculation, row) * 1e4, 1e-12)
    // Slug of a constant speed: U^2 t / 2 = U D L/D / 2.
    expectClose(Number(values(plot, 'slug').at(-1)), 0.5 * 0.5 * DIAMETER * 8 * 1e4, 1e-9)
  })

  it('marks stop, pinch-off and where the ring is full, and leaves room for their names', () => {
    for (const plot of plotsOf(long, 8, long)) {
      expect(plot.lines.filter(({ kind }) => kind === 'mark').map(({ label }) => label)).toEqual(['stop', 'pinch-off'])
      expect(at(plot.bands, 0).from).toBe(long.formationNumber)
      expect(plot.x.max).toBeGreaterThan(1.4 * Math.max(...at(plot.series, 0).x))
    }
    expect(at(plotsOf(short, 2, null), 0).bands).toEqual([])
  })

  it('holds the slug from the stop to the end of the run', () => {
    const plot = plotCalled(plotsOf(short, 2, null), 'jet-impulse')
    const slug = plot.series.find(({ id }) => id === 'slug')
    const y = slug?.y ?? []
    expect(y.at(-1)).toBe(y.at(-2))
    expect(slug?.x.at(-1)).toBe(at(plot.series, 0).x.at(-1))
  })

  it('has the energies of all and of the ring with the published value', () => {
    const plot = plotCalled(plotsOf(long, 8, long), 'jet-energy')
    expect(plot.lines.at(-1)).toMatchObject({ value: PUBLISHED_RING_ENERGY, kind: 'limit' })
    const ring = values(plot, 'ring').filter((value) => value !== null)
    // The mean over the plateau is of the same kind: the last row lies near it.
    expect(Math.abs((ring.at(-1) ?? NaN) - (long.ringDimensionlessEnergy ?? NaN))).toBeLessThan(0.03)
  })

  it('does without the pulse', () => {
    const plots = jetPlots(long.shown, {
      pulse: null,
      density: DENSITY,
      timeline: jetTimeline(long.shown, ramped(8), DIAMETER),
      formation: null,
      units: { circulation: 'cm²/s', impulse: 'mN·s' },
    })
    expect(plots.map(({ series }) => series.length)).toEqual([2, 2, 2])
  })

  it('is written as SVG and CSV like every plot', () => {
    for (const plot of plotsOf(long, 8, long)) {
      const svg = plotToSvg(plot, { width: 640, height: 400, theme: 'print' })
      readXml(svg)
      expect(svg).not.toMatch(/NaN|undefined/)
      expect(plotToCsv(plot)).not.toMatch(/NaN|null/)
    }
  })
})

describe('explainJet', () => {
  it('answers every value with formula, source, range and verdict', () => {
    const plan = defaultPlan()
    for (const formation of [long, null])
      for (const id of JET_EXPLANATION_IDS) {
        const answer = explainJet(id, { plan, own: short, formation })
        expect(answer.formula.length, id).toBeGreaterThan(10)
        expect(answer.source.length, id).toBeGreaterThan(5)
        expect(answer.range.length, id).toBeGreaterThan(5)
        expect(answer.verdict, id).toMatch(/\.$/)
        expect(answer.verdict, id).not.toMatch(/NaN|undefined|null/)
        for (const { name, value } of answer.values) expect(Number.isFinite(value), `${id}: ${name}`).toBe(true)
        const tags = [...answer.mathml.matchAll(/<(\/?)([a-z]+)[^>]*>/g)]
        expect(tags.filter(([, closing]) => closing === '').length, id).toBe(tags.length / 2)
      }
  })

  it('says that an orifice is outside, and when the number comes from a longer stroke', () => {
    const plan = defaultPlan()
    const orifice = { ...plan, nozzle: { ...plan.nozzle, shape: 'orifice' as const } }
    expect(explainJet('jet.formationNumber', { plan: orifice, own: long, formation: long }).inside).toBe(false)
    const borrowed = explainJet('jet.formationNumber', { plan, own: short, formation: long })
    expect(borrowed.verdict).toMatch(/stroke of 8 D/)
  })
})
