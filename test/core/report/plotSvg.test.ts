import { describe, expect, it } from 'vitest'
import {
  axisTicks,
  drawingColours,
  plotToSvg,
  textWidth,
  type DrawingTheme,
  type PlotModel,
} from '../../../core/report'
import { PLOT } from './models'
import { readXml, textsOf } from './xml'

const THEMES: readonly DrawingTheme[] = ['light', 'dark', 'print']

function writtenTexts(svg: string) {
  return textsOf(readXml(svg))
}

describe('a plot written as SVG', () => {
  it.each(THEMES)('is well formed, named and described in the %s theme', (theme) => {
    const svg = plotToSvg(PLOT, { width: 640, height: 400, theme })
    const root = readXml(svg)
    expect(root.name).toBe('svg')
    expect(root.attributes['viewBox']).toBe('0 0 640 400')
    expect(root.attributes['role']).toBe('img')
    expect(root.children.find(({ name }) => name === 'title')?.text).toBe('Energy & "loss"')
    expect(root.children.find(({ name }) => name === 'desc')?.text).toContain('Energy (mJ) against Formation time')
    expect(svg).not.toMatch(/NaN|Infinity|undefined/)
  })

  it('escapes what a name may hold', () => {
    const svg = plotToSvg(PLOT, { width: 640, height: 400, theme: 'light' })
    expect(svg).toContain('a &lt; b')
    expect(svg).not.toContain('a < b')
    expect(writtenTexts(svg).map(({ text }) => text)).toContain('a < b')
  })

  it.each([
    [640, 400],
    [240, 160],
    [160, 120],
  ])('keeps every word inside the picture at %i x %i', (width, height) => {
    for (const { text, x, y, size, anchor, turned } of writtenTexts(
      plotToSvg(PLOT, { width, height, theme: 'print' }),
    )) {
      const length = textWidth(text, size)
      const left = anchor === 'end' ? x - length : anchor === 'middle' ? x - length / 2 : x
      expect(y, text).toBeLessThanOrEqual(height)
      if (turned) {
        expect(y - length, text).toBeGreaterThanOrEqual(0)
        expect(x, text).toBeLessThanOrEqual(width)
      } else {
        expect(left, text).toBeGreaterThanOrEqual(0)
        expect(left + length, text).toBeLessThanOrEqual(width)
        expect(y - size, text).toBeGreaterThanOrEqual(-1)
      }
    }
  })

  it('shows title, both axes with units, limit, band and series names', () => {
    const words = writtenTexts(plotToSvg(PLOT, { width: 640, height: 400, theme: 'light' })).map(({ text }) => text)
    for (const word of [
      'Energy & "loss"',
      'Energy (mJ)',
      'Formation time',
      'limit 0.33',
      'published band',
      'a < b',
      'second',
    ])
      expect(words).toContain(word)
  })

  it('tells lines apart by dash as well as by colour, and keeps the limit colour from series', () => {
    const { limit, accent, muted } = drawingColours('light')
    const svg = plotToSvg({ ...PLOT, lines: [], bands: [] }, { width: 640, height: 400, theme: 'light' })
    expect(svg).not.toContain(limit)
    expect(svg).toMatch(new RegExp(`stroke="${muted}"[^>]*stroke-dasharray="5 4"`))
    expect(svg).toMatch(new RegExp(`stroke="${accent}"[^>]*stroke-linejoin="round" fill="none"`))
  })

  it('draws a plot without a single value', () => {
    const empty: PlotModel = {
      ...PLOT,
      x: { title: 'x', unit: '' },
      series: PLOT.series.map((series) => ({ ...series, x: [], y: [] })),
      bands: [],
      lines: [],
    }
    const svg = plotToSvg(empty, { width: 300, height: 200, theme: 'light' })
    expect(readXml(svg).name).toBe('svg')
    expect(svg).not.toMatch(/NaN|Infinity/)
  })

  it('uses no font, script or picture from elsewhere', () => {
    const svg = plotToSvg(PLOT, { width: 640, height: 400, theme: 'light' })
    expect(svg).not.toMatch(/<script|<image|@import|@font-face|href|url\(/)
  })
})

describe('ticks of an axis', () => {
  it('are at least two, however few the room is for', () => {
    // Two steps of 1 would leave only the zero.
    for (const [min, max] of [
      [-0.9, 0.98],
      [-4, 9.9],
      [-0.4, 0.45],
      [0.31, 0.49],
    ] as const) {
      const ticks = axisTicks(min, max, 2)
      expect(ticks.length).toBeGreaterThanOrEqual(2)
      expect(new Set(ticks.map(({ label }) => label)).size).toBe(ticks.length)
    }
    expect(axisTicks(0, 10, 5).map(({ label }) => label)).toEqual(['0', '2', '4', '6', '8', '10'])
  })
})
