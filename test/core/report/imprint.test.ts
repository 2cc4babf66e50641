import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../core/base'
import { examplePlan } from '../../../core/plan'
import {
  drawingColours,
  fittedLine,
  imprintColour,
  imprintSvg,
  plotToSvg,
  pulseScene,
  sceneToSvg,
  textWidth,
  type DrawingTheme,
} from '../../../core/report'
import { run } from '../../../core/run'
import { PLOT } from './models'
import { readXml, textsOf } from './xml'

const LINE = 'Bench ring generator, Ringwright 0.1.0'
const THEMES: readonly DrawingTheme[] = ['light', 'dark', 'print']

describe('the imprint of a drawing', () => {
  it.each(THEMES)('stands below a plot on its ground in the %s theme and leaves the plot as it was', (theme) => {
    const plain = plotToSvg(PLOT, { width: 640, height: 400, theme })
    const svg = imprintSvg(plain, LINE)
    const root = readXml(svg)
    expect(root.attributes).toMatchObject({ width: '640', height: '418', viewBox: '0 0 640 418' })
    const texts = textsOf(root)
    expect(texts.slice(0, -1)).toEqual(textsOf(readXml(plain)))
    const print = texts.at(-1)
    expect(print?.text).toBe(LINE)
    // Below everything the plot may write on, and inside the picture.
    expect((print?.y ?? 0) - (print?.size ?? 0)).toBeGreaterThan(400)
    expect(print?.y).toBeLessThan(418)
    expect(svg).toContain(`<rect y="400" width="640" height="18" fill="${drawingColours(theme).ground}"/>`)
  })

  it('goes below the drawing of a pulse', async () => {
    const plan = examplePlan('bench-generator')
    const { data } = await run(plan, { sections: ['pulse'] })
    const pulse = data?.pulse ?? null
    if (pulse === null) throw new Error('the example makes a pulse')
    const scene = pulseScene(pulse, plan.nozzle, { length: 'mm', speed: 'mm/s', exitSpeed: 'm/s' })
    const svg = imprintSvg(sceneToSvg(scene, { width: 960, height: 540, theme: 'light' }), LINE)
    expect(readXml(svg).attributes['viewBox']).toBe('0 0 960 558')
    expect(textsOf(readXml(svg)).at(-1)?.text).toBe(LINE)
  })

  it('writes a title as text whatever it holds, also what a replacement would read', () => {
    const odd = 'a < b & "c" $& $1 $$'
    const svg = imprintSvg(plotToSvg(PLOT, { width: 640, height: 400, theme: 'light' }), odd)
    expect(textsOf(readXml(svg)).at(-1)?.text).toBe(odd)
  })

  it('cuts a long title with an ellipsis before the edge', () => {
    const long = 'A very long title of a plan '.repeat(12)
    const svg = imprintSvg(plotToSvg(PLOT, { width: 320, height: 200, theme: 'light' }), long)
    const text = textsOf(readXml(svg)).at(-1)?.text ?? ''
    expect(text).toMatch(/^A very long title.*…$/)
    expect(textWidth(text, 10)).toBeLessThanOrEqual(300)
    expect(fittedLine('ab', 0, () => 1)).toBe('')
  })

  it('is legible on light and on dark', () => {
    expect(imprintColour('#ffffff')).toBe(drawingColours('light').muted)
    expect(imprintColour('#1A2129')).toBe(drawingColours('dark').muted)
  })

  it('refuses what is no drawing of the program', () => {
    expect(() => imprintSvg('<svg/>', LINE)).toThrow(DomainError)
  })
})
