import { describe, expect, it } from 'vitest'
import { at } from '../../../../core/base'
import { wakeFrame } from '../../../../core/filament'
import { sharedArea } from '../../../../core/report'
import { toBase } from '../../../../core/quantity'
import { basisOf, project, STANDARD_VIEWS } from '../../../../renderer/scene/view'
import { dot } from '../../../../renderer/scene/vectors'
import { nextRing, ringAt } from '../../../../renderer/scene/wake/picking'
import { ringStrokes, trailsOf, trailStrokes } from '../../../../renderer/scene/wake/ringStrokes'
import { surroundingStrokes } from '../../../../renderer/scene/wake/surroundingStrokes'
import { wakeLabels } from '../../../../renderer/scene/wake/wakeLabels'
import { scaleBar, wakeOverlay } from '../../../../renderer/scene/wake/wakeOverlay'
import { centredOn, fittedRing, fittedWake } from '../../../../renderer/scene/wake/wakeView'
import { expectNear } from '../../../support/close'
import { manyScene, pairScene, shapeAt } from './wakeModels'

const SIZE = { width: 850, height: 500 }
const MARGINS = { left: 56, right: 64, top: 66, bottom: 84 }
const measure = (text: string): number => text.length * 6.4
const LOOK = { size: SIZE, accent: '#0A5F78', counter: '#7A3B66', measure }

describe('the view of a wake', () => {
  it.each(['side', 'threeQuarter', 'endOn', 'above'] as const)('fits everything that is ever drawn from %s', (name) => {
    const model = pairScene()
    const view = fittedWake(model, STANDARD_VIEWS[name], SIZE, MARGINS)
    for (let i = 0; i < model.reach.length; i += 3) {
      const place = [at(model.reach, i), at(model.reach, i + 1), at(model.reach, i + 2)] as const
      const { x, y } = project(place, basisOf(view), view, SIZE)
      expect(x).toBeGreaterThan(MARGINS.left - 1e-6)
      expect(x).toBeLessThan(SIZE.width - MARGINS.right + 1e-6)
      expect(y).toBeGreaterThan(MARGINS.top - 1e-6)
      expect(y).toBeLessThan(SIZE.height - MARGINS.bottom + 1e-6)
    }
  })

  it('holds a followed ring in the middle at an unchanged scale', () => {
    const ring = shapeAt(1, 0.123)
    const view = fittedRing(ring, STANDARD_VIEWS.threeQuarter, SIZE, MARGINS)
    const after = centredOn(view, shapeAt(1, 0.3))
    expect(after.scale).toBe(view.scale)
    const { x, y } = project([0.3, 0, 0], basisOf(after), after, SIZE)
    expectNear(x, SIZE.width / 2, 1e-9)
    expectNear(y, SIZE.height / 2, 1e-9)
  })
})

describe('picking', () => {
  const view = fittedWake(pairScene(), STANDARD_VIEWS.threeQuarter, SIZE, MARGINS)
  const shapes = [shapeAt(1, 0), shapeAt(2, 0.06)]

  it('finds the ring whose tube is under the pixel, and none beside or inside it', () => {
    const pixel = (x: number, y: number) => project([x, y, 0], basisOf(view), view, SIZE)
    expect(ringAt(shapes, pixel(0, 0.02), view, SIZE)).toBe(1)
    expect(ringAt(shapes, pixel(0.06, -0.022), view, SIZE)).toBe(2)
    expect(ringAt(shapes, pixel(0.06, 0), view, SIZE)).toBeNull()
    expect(ringAt(shapes, pixel(0.2, 0.02), view, SIZE)).toBeNull()
  })

  it('takes the nearer of two rings at one pixel', () => {
    const ends = fittedWake(pairScene(), STANDARD_VIEWS.endOn, SIZE, MARGINS)
    // Facing the oncoming rings the one further along x is nearer to the eye.
    const pixel = project([0.06, 0.02, 0], basisOf(ends), ends, SIZE)
    expect(ringAt(shapes, pixel, ends, SIZE)).toBe(2)
  })

  it('goes round the rings that are there in both senses', () => {
    const numbers = [shapeAt(2, 0), shapeAt(5, 0), shapeAt(7, 0)]
    expect(nextRing(numbers, null, 1)).toBe(2)
    expect(nextRing(numbers, null, -1)).toBe(7)
    expect(nextRing(numbers, 7, 1)).toBe(2)
    expect(nextRing(numbers, 2, -1)).toBe(7)
    expect(nextRing(numbers, 3, 1)).toBe(2)
    expect(nextRing([], 3, 1)).toBeNull()
  })
})

describe('lines that move with the rings', () => {
  const model = pairScene()
  const basis = basisOf(STANDARD_VIEWS.side)

  it('turn forward next to the axis and back outside for a ring that moves along +x, and the other way for another', () => {
    for (const circulation of [0.006, -0.006]) {
      const strokes = ringStrokes(model, [{ ...shapeAt(1, 0), circulation }], null, basis, 1e-4)
      const arcs = strokes.filter(({ colour }) => colour === 'ink')
      expect(arcs).toHaveLength(2)
      for (const { points } of arcs) {
        // Halfway round, where the arc is outermost, the fluid goes against the ring's way.
        const outermost = points.reduce((best, [, y], i) => (Math.abs(y) > Math.abs(at(points, best)[1]) ? i : best), 0)
        const step = at(points, outermost + 1)[0] - at(points, outermost - 1)[0]
        expect(Math.sign(step)).toBe(-Math.sign(circulation))
      }
    }
  })

  it('show the speed by an arrow of the way in the arrow time, and mark the picked ring over everything', () => {
    const strokes = ringStrokes(model, [shapeAt(1, 0.01)], 1, basis, 1e-4)
    const arrow = strokes.find(({ colour }) => colour === 'accent')
    expectNear(at(at(arrow?.points ?? [], 1), 0), 0.01 + 0.1 * model.arrowTime, 1e-12)
    expect(strokes.filter(({ over }) => over)).toHaveLength(2)
  })

  it('leave a trail from where a ring set out to where it is', () => {
    const shapes = wakeFrame(model.wake, 5)
    const trails = trailStrokes(trailsOf(model), shapes, 0.5)
    expect(trails).toHaveLength(2)
    expect(at(at(trails, 1).points, 0)[0]).toBe(0.06)
    expectNear(at(at(trails, 1).points, at(trails, 1).points.length - 1)[0], 0.11, 1e-12)
    expect(trails.every(({ dash }) => dash.length > 0)).toBe(true)
  })

  it('are finite around walls, tubes, stations and nozzles from every side', () => {
    for (const angles of Object.values(STANDARD_VIEWS)) {
      const strokes = surroundingStrokes(model, true, basisOf(angles), 1e-4)
      expect(strokes.flatMap(({ points }) => points.flat()).every(Number.isFinite)).toBe(true)
      expect(strokes.length).toBeGreaterThan(30)
    }
  })
})

describe('words and keys on the drawing of rings', () => {
  it.each(['side', 'threeQuarter', 'above', 'endOn'] as const)(
    'do not collide and stay inside, seen from %s',
    (name) => {
      for (const model of [pairScene(), manyScene()]) {
        const view = fittedWake(model, STANDARD_VIEWS[name], SIZE, MARGINS)
        const shapes = wakeFrame(model.wake, 4)
        const bounds = { left: 4, top: 30, width: SIZE.width - 8, height: SIZE.height - 50 }
        const { taken } = wakeOverlay(model, view, false, LOOK)
        const labels = wakeLabels(model, shapes, 2, true, { view, size: SIZE, measure, bounds, taken })
        labels.forEach((label, index) => {
          expect(sharedArea(label, bounds), label.text).toBeCloseTo(label.width * label.height, 6)
          for (const other of labels.slice(index + 1)) {
            // Numbers of rings that stand in one another may touch at the margin of their targets.
            const both = label.act !== null && other.act !== null
            expect(sharedArea(label, other), `${label.text} on ${other.text}`).toBeLessThanOrEqual(both ? 60 : 8)
          }
        })
        // Seen along the axis twenty rings share one place, and most numbers give way.
        const named = labels.filter(({ act }) => act !== null).length
        if (name === 'endOn' && shapes.length > 8) expect(named).toBeGreaterThan(2)
        else expect(named).toBe(shapes.length)
        expect(labels.find(({ chosen }) => chosen === true)?.text).toBe('ring 2')
      }
    },
  )

  it('make targets of ring numbers, at least 24 pixels each way', () => {
    const model = pairScene()
    const view = fittedWake(model, STANDARD_VIEWS.threeQuarter, SIZE, MARGINS)
    const bounds = { left: 4, top: 30, width: SIZE.width - 8, height: SIZE.height - 50 }
    const labels = wakeLabels(model, wakeFrame(model.wake, 4), null, true, {
      view,
      size: SIZE,
      measure,
      bounds,
      taken: [],
    })
    for (const { act, width, height } of labels) {
      if (act === null) continue
      expect(width).toBeGreaterThanOrEqual(24)
      expect(height).toBeGreaterThanOrEqual(24)
    }
  })

  it('give the scale bar a round length that is true at any magnification', () => {
    const base = fittedWake(pairScene(), STANDARD_VIEWS.threeQuarter, SIZE, MARGINS)
    for (const factor of [0.13, 0.5, 1, 1.9, 3.3, 7, 41]) {
      const view = { ...base, scale: base.scale * factor }
      const bar = scaleBar(view, 'mm', LOOK)
      const line = at(bar.lines, 0)
      const length = (line.to.x - line.from.x) / view.scale
      const shown = Number(
        at(bar.texts, 0)
          .text.replace(/\u00a0mm$/u, '')
          .replace(/×10.*$/u, ''),
      )
      expectNear(length, toBase(shown, 'mm'), 1e-9)
      expect(line.to.x - line.from.x).toBeLessThanOrEqual(150.001)
      expect(line.to.x - line.from.x).toBeGreaterThan(50)
      expect([1, 2, 5]).toContain(Number((shown / 10 ** Math.floor(Math.log10(shown) + 1e-9)).toFixed(6)))
    }
  })

  it('explain the colours only where both occur, and scale the field from end to end', () => {
    const pair = pairScene()
    const view = fittedWake(pair, STANDARD_VIEWS.side, SIZE, MARGINS)
    const words = (model: typeof pair, plane: boolean): string =>
      wakeOverlay(model, view, plane, LOOK)
        .overlay.texts.map(({ text }) => text)
        .join('; ')
    expect(words(pair, false)).not.toContain('turns as')
    expect(words(manyScene(), false)).toContain('toward \u2212x')
    const values = [new Float32Array(4)]
    const plane = {
      quantity: 'stream function',
      unit: 'cm²/s',
      columns: 2,
      rows: 2,
      low: -2e-4,
      high: 2e-4,
      values,
    } as const
    const places = { origin: [0, 0, 0], along: [1, 0, 0], across: [0, 1, 0] } as const
    const text = words({ ...pair, plane: { ...plane, ...places } }, true)
    expect(text).toContain('stream function (cm²/s); \u22122; 0; 2')
  })

  it('see the x axis rise toward the eye nowhere: its ticks hang below it', () => {
    const model = pairScene()
    const basis = basisOf(STANDARD_VIEWS.threeQuarter)
    const ticks = surroundingStrokes(model, true, basis, 1e-4).filter(
      ({ points, colour }) => colour === 'ink' && points.length === 2 && points[0] !== model.datum.from,
    )
    expect(ticks.length).toBe(model.datum.ticks.length)
    for (const { points } of ticks) expect(dot(at(points, 1), basis.up)).toBeLessThan(dot(at(points, 0), basis.up))
  })
})
