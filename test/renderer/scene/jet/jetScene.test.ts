import { mount } from '@vue/test-utils'
import { BufferAttribute } from 'three'
import { beforeAll, describe, expect, it } from 'vitest'
import { nextTick } from 'vue'
import { at } from '../../../../core/base'
import { emptyLine, jetScene, layLine, type JetSceneModel } from '../../../../core/report'
import { fittedJet } from '../../../../renderer/scene/jet/jetFit'
import { jetOverlay } from '../../../../renderer/scene/jet/jetOverlay'
import JetScene from '../../../../renderer/scene/jet/JetScene.vue'
import { shapeStrokes } from '../../../../renderer/scene/jet/jetStrokes'
import { jetWords } from '../../../../renderer/scene/jet/jetWords'
import { createSheetSurface } from '../../../../renderer/scene/jet/sheetSurface'
import { basisOf, project, STANDARD_VIEWS } from '../../../../renderer/scene/view'
import { DIAMETER, ramped } from '../../../core/coaxial/jet/jets'
import { jetAt } from '../../../core/report/jets'

const MARGINS = { left: 20, right: 20, top: 54, bottom: 54 }
const SIZE = { width: 850, height: 400 }
let model: JetSceneModel

beforeAll(async () => {
  model = jetScene((await jetAt(8, 0.15)).shown, ramped(8), DIAMETER, { length: 'mm', time: 'ms' })
})

function positions(geometry: ReturnType<typeof createSheetSurface>['geometry']): BufferAttribute {
  const attribute = geometry.getAttribute('position')
  if (!(attribute instanceof BufferAttribute)) throw new Error('no positions')
  return attribute
}

describe('the surface of the sheet', () => {
  it('stands at the radius of the sheet all around, but for the part cut open toward the viewer', () => {
    const surface = createSheetSurface()
    const line = emptyLine()
    layLine(line, at(model.shapes, 20), Infinity)
    surface.draw(line)
    const place = positions(surface.geometry)
    const around = surface.geometry.drawRange.count / 6 / (line.count - 1)
    for (let i = 0; i < line.count; i += 7)
      for (let j = 0; j <= around; j += 5) {
        const k = i * (around + 1) + j
        // Single precision of lengths below a metre.
        expect(Math.abs(place.getX(k) - at(line.x, i))).toBeLessThan(1e-7)
        expect(Math.abs(Math.hypot(place.getY(k), place.getZ(k)) - at(line.r, i))).toBeLessThan(1e-7)
        // Straight toward someone at the side there is nothing.
        expect(Math.atan2(place.getY(k), place.getZ(k))).not.toBeCloseTo(0, 1)
      }
  })

  it('is written anew in place for the next shape', () => {
    const surface = createSheetSurface()
    const line = emptyLine()
    layLine(line, at(model.shapes, model.shapes.length - 1), Infinity)
    surface.draw(line)
    const before = positions(surface.geometry).array
    const drawn = surface.geometry.drawRange.count
    layLine(line, at(model.shapes, 3), Infinity)
    surface.draw(line)
    expect(positions(surface.geometry).array).toBe(before)
    expect(surface.geometry.drawRange.count).toBeLessThan(drawn)
  })
})

describe('the picture of a jet', () => {
  it.each(['side', 'threeQuarter', 'endOn'] as const)('holds every shape at every time from %s', (name) => {
    const view = fittedJet(model, STANDARD_VIEWS[name], SIZE, MARGINS)
    const basis = basisOf(view)
    for (const shape of model.shapes)
      for (let i = 0; i < shape.x.length; i += 5)
        for (const angle of [0, 1.5, 3, 4.5]) {
          const r = at(shape.r, i)
          const pixel = project([at(shape.x, i), r * Math.cos(angle), r * Math.sin(angle)], basis, view, SIZE)
          expect(pixel.x).toBeGreaterThanOrEqual(MARGINS.left - 1)
          expect(pixel.x).toBeLessThanOrEqual(SIZE.width - MARGINS.right + 1)
          expect(pixel.y).toBeGreaterThanOrEqual(MARGINS.top - 1)
          expect(pixel.y).toBeLessThanOrEqual(SIZE.height - MARGINS.bottom + 1)
        }
  })

  it('has words that meet neither one another nor the sheet in the section, at any time', () => {
    const view = fittedJet(model, STANDARD_VIEWS.side, SIZE, MARGINS)
    const basis = basisOf(view)
    const measure = (text: string): number => 6.5 * text.length
    model.shapes.forEach((shape, index) => {
      const words = jetWords(model, index, true, { view, size: SIZE, measure })
      const meets = (x: number, y: number) =>
        words.some(({ left, top, width, height }) => x > left && x < left + width && y > top && y < top + height)
      for (let i = 0; i < shape.x.length; i += 1) {
        const pixel = project([at(shape.x, i), at(shape.r, i), 0], basis, view, SIZE)
        expect(meets(pixel.x, pixel.y), `shape ${index}`).toBe(false)
      }
      const [tube, ring] = words
      if (tube === undefined || ring === undefined) return
      expect(tube.left + tube.width < ring.left || tube.top > ring.top + ring.height).toBe(true)
    })
  })

  it('marks the cut only where there is one, and the sheet twice', () => {
    const line = emptyLine()
    const dashes = (index: number) => {
      layLine(line, at(model.shapes, index), Infinity)
      return shapeStrokes(model, index, line, true, 1e-4).filter(({ colour }) => colour === 'accent').length
    }
    expect(dashes(0)).toBe(0)
    expect(dashes(model.shapes.length - 1)).toBe(1)
  })

  it('has a scale of lengths along its foot whose ticks are where they say', () => {
    const view = fittedJet(model, STANDARD_VIEWS.side, SIZE, MARGINS)
    const look = { size: SIZE, dark: false, measure: (text: string) => 6.5 * text.length }
    const { texts } = jetOverlay(model, 5, true, view, look)
    const ticks = texts.filter(({ text }) => /^[\u2212\d.]+$/.test(text))
    expect(ticks.length).toBeGreaterThan(3)
    for (const { text, at: place } of ticks) {
      const x = Number(text.replace('\u2212', '-')) / 1000
      // The label is a decimal of the tick itself: a thousandth of a pixel covers its binary noise.
      expect(Math.abs(project([x, 0, 0], basisOf(view), view, SIZE).x - place.x)).toBeLessThan(1e-3)
    }
  })
})

describe('the drawing where there is no WebGL', () => {
  it('is the flat section of the shape shown, with the same description', async () => {
    const scene = mount(JetScene, { props: { model, index: 2, flat: true }, attachTo: document.body })
    await nextTick()
    const image = scene.get('img')
    expect(image.attributes('alt')).toMatch(/^Section through the starting jet/)
    const before = image.attributes('src')
    await scene.setProps({ index: 30 })
    expect(scene.get('img').attributes('src')).not.toBe(before)
    await scene.get('button[aria-label="Section as SVG"]').trigger('click')
    expect(scene.emitted('export')?.[0]?.[0]).toMatchObject({ kind: 'svg', name: 'jet.svg' })
    scene.unmount()
  })
})
