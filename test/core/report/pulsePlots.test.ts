import { describe, expect, it } from 'vitest'
import { at, last } from '../../../core/base'
import { computePulse } from '../../../core/pulse'
import { fromBase } from '../../../core/quantity'
import { plotDomain, plotToSvg, pulsePlots, type PlotModel } from '../../../core/report'
import { expectClose } from '../../support/close'
import { atStrokeRatio, PLAIN } from '../pulse/plans'

const UNITS = { speed: 'mm/s', circulation: 'cm²/s' }

function plotsOf(strokeRatio: number, more: Partial<typeof PLAIN> = {}) {
  const pulse = computePulse({ ...atStrokeRatio(strokeRatio), ...more })
  const [speed, circulation, energy] = pulsePlots(pulse, UNITS)
  return { pulse, speed: need(speed), circulation: need(circulation), energy: need(energy) }
}

function need(model: PlotModel | undefined): PlotModel {
  if (model === undefined) throw new Error('a plot is missing')
  return model
}

describe('plots of a pulse', () => {
  it('end at the values of the result, in the shown units', () => {
    const { pulse, circulation, energy } = plotsOf(3)
    const slug = at(circulation.series, 0)
    // The last point of the history is the whole pulse: only rounding of sums lies between.
    expectClose(last(slug.x), 3, 1e-9, 'formation time')
    expectClose(last(slug.y) ?? NaN, fromBase(pulse.slug.circulation, 'cm²/s'), 1e-9, 'circulation')
    expectClose(last(at(energy.series, 0).y) ?? NaN, pulse.dimensionlessEnergy, 1e-9, 'energy')
    expect(circulation.y.unit).toBe('cm²/s')
  })

  it('close the outline of the exit speed down to zero at both ends', () => {
    const { speed } = plotsOf(3)
    const { x, y, filled } = at(speed.series, 0)
    expect(filled).toBe(true)
    expect(y[0]).toBe(0)
    expect(last(y)).toBe(0)
    expect(Math.max(...y.map(Number))).toBeCloseTo(500, 9)
    expect(x).toHaveLength(y.length)
    x.forEach((value, index) => expect(value).toBeGreaterThanOrEqual(x[index - 1] ?? 0))
  })

  it('show the quick start dashed, and only where the start is quick', () => {
    const quick = plotsOf(3).circulation
    expect(quick.series.map(({ id, line, role }) => [id, line, role])).toEqual([
      ['slug', 'solid', 'primary'],
      ['quick-start', 'dashed', 'secondary'],
    ])
    const slow = plotsOf(3, { programme: { ...PLAIN.programme, shape: 'linear-ramp', stroke: 0.06 } })
    expect(slow.pulse.quickStart).toBe(false)
    expect(slow.circulation.series.map(({ id }) => id)).toEqual(['slug'])
  })

  it('draw the limit of dimensionless energy and the published band', () => {
    const { energy } = plotsOf(3)
    // Gharib, Rambod & Shariff 1998: 0.33, band 3.6 to 4.5.
    expect(energy.lines).toEqual([{ axis: 'y', value: 0.33, label: 'limit 0.33', kind: 'limit' }])
    expect(energy.bands).toEqual([{ axis: 'x', from: 3.6, to: 4.5, label: 'published band' }])
  })

  it('leave the band out where no ring is expected', () => {
    const { energy, pulse } = plotsOf(3, { axialFlow: -0.45 * PLAIN.programme.peakSpeed })
    expect(pulse.formationNumber.published).toBeNull()
    expect(energy.bands).toEqual([])
  })

  it.each([0.1, 0.5, 1, 3.2, 4.5, 8, 30])(
    'keep stroke, band and last value inside the axes at a stroke ratio of %f',
    (ratio) => {
      const { pulse, ...plots } = plotsOf(ratio)
      for (const model of [plots.speed, plots.circulation, plots.energy]) {
        const { xMax, yMax } = plotDomain(model)
        expect(xMax).toBeGreaterThanOrEqual(ratio)
        for (const band of model.bands) expect(xMax).toBeGreaterThanOrEqual(band.to)
        for (const { y } of model.series) expect(yMax).toBeGreaterThanOrEqual(last(y) ?? 0)
        expect(plotToSvg(model, { width: 300, height: 200, theme: 'print' })).not.toMatch(/NaN|Infinity/)
      }
      expect(pulse.strokeRatio).toBeCloseTo(ratio, 12)
    },
  )

  it('keep their axis still while a stroke is dragged a little', () => {
    expect(plotsOf(3).speed.x.max).toBe(plotsOf(3.4).speed.x.max)
  })
})
