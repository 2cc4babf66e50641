import { describe, expect, it } from 'vitest'
import { examplePlan } from '../../../core/plan'
import {
  comparisonRecord,
  cyclePlot,
  documentHtml,
  forcePlot,
  markedPoints,
  markerPath,
  MARKERS,
  plotDomain,
  plotLabels,
  plotScale,
  plotTable,
  plotToSvg,
  residualPlot,
  thinPlot,
  trackPlots,
  type PlotModel,
} from '../../../core/report'
import { run } from '../../../core/run'
import type { ReadingsResult } from '../../../core/tank'
import type { PulseResult } from '../../../core/pulse'

const UNITS = { length: 'mm', wakeTime: 's', circulation: 'cm²/s', force: 'mN' }
const META = { date: '4 June 2031', program: { name: 'Ringwright', version: '0' }, inputHash: 'f'.repeat(64) }

async function resultsOf(id: string): Promise<{ result: ReadingsResult; pulse: PulseResult }> {
  const { data } = await run(examplePlan(id), { sections: ['pulse', 'readings'] })
  if (data === null || data.readings === null || data.pulse === null) throw new Error('nothing was compared')
  return { result: data.readings, pulse: data.pulse }
}

const MEASURED: PlotModel = {
  id: 'measured',
  title: 'Measured',
  x: { title: 'Time', unit: 's' },
  y: { title: 'Place', unit: 'mm' },
  series: [
    { id: 'line', name: 'line', x: [0, 2], y: [0, 8], role: 'primary', line: 'solid', filled: false },
    {
      id: 'points',
      name: 'run 1',
      x: [1, 1, 2],
      y: [4, 5, null],
      error: [2, null, 1],
      marker: 'square',
      role: 'reference',
      line: 'solid',
      filled: false,
    },
  ],
  bands: [],
  lines: [],
}

describe('measured points of a plot', () => {
  it('are drawn as marks of different shapes, with error bars where there is one', () => {
    expect(new Set(MARKERS.map((marker) => markerPath(marker, 10, 10))).size).toBe(MARKERS.length)
    const svg = plotToSvg(MEASURED, { width: 400, height: 300, theme: 'print' })
    // Two marks and one in the legend, in square shape; one bar with two caps.
    expect(svg.match(/h6\.12v6\.12h-6\.12Z/g)).toHaveLength(3)
    const scale = plotScale(plotDomain(MEASURED), { left: 0, top: 0, width: 200, height: 200 })
    const points = MEASURED.series.slice(1).flatMap((one) => markedPoints(one, scale))
    expect(points.map(({ bar }) => bar !== '')).toEqual([true, false])
  })

  it('keep their uncertainty in the table, repeats in rows of their own', () => {
    const { headings, rows } = plotTable(MEASURED)
    expect(headings).toEqual([
      'Time (s)',
      'Measured, line (mm)',
      'Measured, run 1 (mm)',
      'Measured, run 1, uncertainty (mm)',
    ])
    expect(rows).toEqual([
      [0, 0, null, null],
      [1, null, 4, 2],
      [1, null, 5, null],
      [2, 8, null, 1],
    ])
  })

  it('stretch the axis by their error bars', () => {
    const tall: PlotModel = {
      ...MEASURED,
      series: MEASURED.series.map((one) => (one.error === undefined ? one : { ...one, error: [20, null, null] })),
    }
    expect(plotDomain(tall).yMax).toBeGreaterThanOrEqual(24)
    expect(plotDomain(tall).yMin).toBeLessThanOrEqual(-16)
  })

  it('are named in a legend that lies inside the frame', () => {
    const frame = { left: 40, top: 20, width: 300, height: 200 }
    const labels = plotLabels(MEASURED, plotScale(plotDomain(MEASURED), frame), (text) => 6 * text.length, 14)
    const legend = labels.find(({ text }) => text === 'run 1')
    expect(legend?.marker?.marker).toBe('square')
    expect(legend?.marker?.x).toBeGreaterThanOrEqual(frame.left)
    expect((legend?.place.left ?? 0) + (legend?.place.width ?? 1000)).toBeLessThanOrEqual(frame.left + frame.width)
  })

  it('keep their errors when they are thinned', () => {
    const many = Array.from({ length: 5000 }, (_, k) => k)
    const long: PlotModel = {
      ...MEASURED,
      series: [
        {
          id: 'p',
          name: 'p',
          x: many,
          y: many,
          error: many,
          marker: 'circle',
          role: 'reference',
          line: 'solid',
          filled: false,
        },
      ],
    }
    const [thin] = thinPlot(long).series
    expect(thin?.x.length).toBeLessThan(1000)
    expect(thin?.error).toEqual(thin?.y)
  })
})

describe('plots of a comparison', () => {
  it('show prediction, band, fit and each run for what was read', async () => {
    const { result } = await resultsOf('tank-day-measured')
    const plots = trackPlots(result, { units: UNITS, run: null, jet: null })
    expect(plots.map(({ id }) => id)).toEqual(['readings-x', 'readings-radius', 'readings-circulation'])
    const names = plots[0]?.series.map(({ name }) => name) ?? []
    expect(names).toEqual(expect.arrayContaining(['prediction', 'band', 'fit', 'run 1', 'run 2', 'run 3']))
    expect(plots[0]?.series.find(({ name }) => name === 'run 2')?.x).toHaveLength(12)
    const lone = trackPlots(result, { units: UNITS, run: '2', jet: null })[0]
    expect(lone?.series.filter(({ marker }) => marker !== undefined)).toHaveLength(1)
  })

  it('show residuals whose root mean square is the one that is told', async () => {
    const { result } = await resultsOf('tank-day-measured')
    const plot = residualPlot(result, 'x', { units: UNITS, run: null })
    const values = plot?.series.flatMap(({ y }) => y.filter((value) => value !== null)) ?? []
    const rms = Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length)
    // Millimetres against metres: the same numbers through one sum.
    expect(rms).toBeCloseTo(1000 * (result.residualRms ?? Number.NaN), 9)
  })

  it('show the force with its zero taken off, and its mean over each period', async () => {
    const plan = examplePlan('tank-day-measured')
    const { result } = await resultsOf('tank-day-measured')
    const { readings } = plan
    if (readings === null) throw new Error('the example has no readings')
    const plot = forcePlot(readings.force, readings.calibration, result, UNITS)
    const before = plot?.series[0]?.y.slice(0, 25).map(Number) ?? []
    // Noise of 0.22 mN over 25 samples: the mean of the quiet part is within three standard errors of 0.
    expect(Math.abs(before.reduce((sum, value) => sum + value, 0) / 25)).toBeLessThan((3 * 0.22) / 5)
    expect(plot?.series[1]?.x).toHaveLength(8)
    expect(cyclePlot(result, UNITS)?.lines.map(({ label }) => label)).toEqual(['mean', 'predicted mean'])
  })
})

describe('the comparison in print', () => {
  it('tells verdicts, fit, runs and force of the invented day', async () => {
    const { result, pulse } = await resultsOf('tank-day-measured')
    const html = documentHtml(comparisonRecord(examplePlan('tank-day-measured'), result, pulse, META), 'A4')
    for (const text of ['Readings against the prediction', 'Run by run', 'Mean over whole periods', 'Standard error'])
      expect(html).toContain(text)
    expect(html).not.toMatch(/NaN|undefined|Infinity/)
  })

  it('carries words and licence of the measured pulse', async () => {
    const { result, pulse } = await resultsOf('measured-pulse')
    const html = documentHtml(comparisonRecord(examplePlan('measured-pulse'), result, pulse, META), 'A4')
    expect(html).toContain('Copyright (c) 2026 Bhamla Lab at Georgia Tech')
    expect(html).toContain('never as a test of it')
    // X03: the slug of the transcribed table holds 2.454e-5 J, an arithmetic check of the transcription at 0.5 %.
    expect(html).toContain('24.5')
  })
})
