import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { computePulse, type NozzleInput, type PulseInput } from '../../../core/pulse'
import { offAxisRuns, pulseScene, sceneToSvg, swirlArc, textWidth, type ScenePoint } from '../../../core/report'
import { expectClose } from '../../support/close'
import { atStrokeRatio, PLAIN, TUBE } from '../pulse/plans'
import { readXml, textsOf } from './xml'

const UNITS = { length: 'mm', speed: 'mm/s', exitSpeed: 'm/s' }

function sceneOf(strokeRatio: number, nozzle: Partial<NozzleInput> = {}, more: Partial<PulseInput> = {}) {
  const input = { ...atStrokeRatio(strokeRatio), ...more, nozzle: { ...TUBE, ...nozzle } }
  const pulse = computePulse(input)
  return { pulse, scene: pulseScene(pulse, input.nozzle, UNITS) }
}

/** Volume of a body of revolution from its meridian, by frustums. */
function volume(meridian: readonly ScenePoint[]): number {
  return meridian.slice(1).reduce((sum, b, index) => {
    const a = at(meridian, index)
    return sum + (Math.PI / 3) * (b.x - a.x) * (a.r * a.r + a.r * b.r + b.r * b.r)
  }, 0)
}

describe('the drawing of a pulse', () => {
  it('draws the ring with the radius, core and area of the result', () => {
    const { pulse, scene } = sceneOf(3)
    const { ring } = scene
    if (ring === null || pulse.ring === null) throw new Error('a ring was expected')
    expect(ring.radius).toBe(pulse.ring.radius)
    const radii = ring.core.map(({ r }) => r)
    // L_r is by definition the mean of the inner and outer radius of the core; outlines are good to 1e-4.
    expectClose((Math.max(...radii) + Math.min(...radii)) / 2, pulse.ring.radius, 1e-4, 'mean radius')
    const area = ring.core.reduce((sum, a, index) => {
      const b = at(ring.core, (index + 1) % ring.core.length)
      return sum + (a.x * b.r - b.x * a.r) / 2
    }, 0)
    // meanCoreRadius is by definition sqrt(area / pi); a polygon of 256 corners is 1e-4 short of a circle.
    expectClose(Math.abs(area), Math.PI * pulse.ring.meanCoreRadius ** 2, 4e-4, 'core area')
  })

  it('draws the carried fluid around the core', () => {
    const { scene } = sceneOf(3)
    const most = (points: readonly ScenePoint[]): number => Math.max(...points.map(({ r }) => r))
    expect(most(scene.ring?.carried ?? [])).toBeGreaterThan(most(scene.ring?.core ?? []))
  })

  it.each(['tube', 'converging', 'orifice'] as const)('draws a slug of the volume that leaves a %s', (shape) => {
    for (const ratio of [0.05, 1, 3.5]) {
      const { scene, pulse } = sceneOf(ratio, { shape })
      // Stroke times exit area; frustums of a cone and a cylinder are exact.
      expectClose(volume(scene.slug.outline), pulse.stroke * (Math.PI / 4) * TUBE.diameter ** 2, 1e-12, 'slug volume')
      expect(at(scene.slug.outline, scene.slug.outline.length - 1).x).toBe(0)
      expect(scene.nozzle.length).toBeGreaterThanOrEqual(-at(scene.slug.outline, 0).x)
    }
  })

  it('keeps ring and carried fluid clear of the nozzle and of the trailing jet', () => {
    for (const ratio of [0.3, 2, 3.5, 6, 12, 40]) {
      const { scene } = sceneOf(ratio)
      const rear = Math.min(...(scene.ring?.carried ?? []).map(({ x }) => x))
      expect(rear, `stroke ratio ${ratio}`).toBeGreaterThan(scene.trailingJet?.length ?? 0)
      for (const { x, r } of scene.ring?.carried ?? []) {
        expect(x).toBeLessThanOrEqual(scene.extent.xMax)
        expect(r).toBeLessThanOrEqual(scene.extent.rMax)
      }
    }
  })

  it('draws a trailing jet as long as the stroke beyond the adopted formation number', () => {
    expect(sceneOf(3).scene.trailingJet).toBeNull()
    const { scene, pulse } = sceneOf(6)
    const expected = (6 - (pulse.formationNumber.adopted ?? NaN)) * TUBE.diameter
    expectClose(scene.trailingJet?.length ?? NaN, expected, 1e-12)
  })

  it('says where the place of the ring is a convention, and that a long slug is cut short', () => {
    expect(sceneOf(3).scene.conventions.join(' ')).toMatch(/convention/)
    expect(sceneOf(3).scene.slug.shortened).toBe(false)
    const long = sceneOf(40).scene
    expect(long.slug.shortened).toBe(true)
    expect(long.conventions.join(' ')).toContain('longer than drawn')
  })

  it('draws a long tube shorter than it is and says so, a short one whole', () => {
    const long = sceneOf(1, { length: 0.5 }).scene
    expect(long.nozzle.length).toBeLessThan(0.5)
    expect(long.conventions.join(' ')).toContain('shorter than it is')
    const short = sceneOf(1, { length: 0.03 }).scene
    expect(short.nozzle.length).toBeGreaterThanOrEqual(0.03)
    expect(short.conventions.join(' ')).not.toContain('shorter')
  })

  it('measures with a bar of 1, 2 or 5 that is as long as it says', () => {
    for (const ratio of [0.3, 3, 8]) {
      const { scaleBar } = sceneOf(ratio).scene
      const [value = '', unit] = scaleBar.label.split('\u00a0')
      expect(unit).toBe('mm')
      expect(['1', '2', '5']).toContain(value.replace(/[0.]/g, ''))
      expectClose(scaleBar.to.x - scaleBar.from.x, Number(value) / 1000, 1e-12)
    }
  })

  it('offers diameter, stroke and peak speed for editing, with dimension lines as long as they say', () => {
    const { scene } = sceneOf(3)
    expect(scene.callouts.map(({ path, label }) => [path, label])).toEqual([
      ['nozzle.diameter', 'diameter 20\u00a0mm'],
      ['programme.stroke', 'stroke 60\u00a0mm'],
      ['programme.peakSpeed', 'peak 0.5\u00a0m/s'],
    ])
    const [diameter, stroke] = scene.callouts
    expectClose((diameter?.from.r ?? 0) - (diameter?.to.r ?? 0), 0.02, 1e-12)
    expectClose((stroke?.to.x ?? 0) - (stroke?.from.x ?? 0), 0.06, 1e-12)
  })

  it('tells both lengths of a slug that stands in a wide chamber', () => {
    const { scene } = sceneOf(3, { shape: 'orifice' })
    expect(scene.callouts[1]?.label).toMatch(/^stroke 60\u00a0mm \(\d+(\.\d+)?\u00a0mm in the nozzle\)$/)
  })

  it('shows the range of the ring speed on a quick start, and the other ring as a ghost', () => {
    const { scene, pulse } = sceneOf(3)
    expect(pulse.ringWithOverPressure).not.toBeNull()
    expect(scene.speed?.label).toMatch(/^\d+ to \d+\u00a0mm\/s$/)
    expect(scene.ghost?.radius).toBe(pulse.ringWithOverPressure?.radius)
  })

  it('draws nozzle and slug alone where no ring is expected', () => {
    const { scene, pulse } = sceneOf(3, {}, { axialFlow: -0.45 * PLAIN.programme.peakSpeed })
    expect(pulse.ring).toBeNull()
    expect([scene.ring, scene.ghost, scene.speed]).toEqual([null, null, null])
    expect(scene.description).toContain('No ring is expected')
  })

  it('turns forward inside and back outside', () => {
    const { ring } = sceneOf(3).scene
    if (ring === null) throw new Error('a ring was expected')
    const arc = swirlArc(ring, 0.001)
    const top = arc.reduce((best, point, index) => (point.r > at(arc, best).r ? index : best), 0)
    // On the outside the fluid goes back, against +x.
    expect(at(arc, top + 1).x).toBeLessThan(at(arc, top - 1).x)
  })
})

describe('an outline without its part on the axis', () => {
  it('is one open line for a body that meets the axis and a closed one for a torus', () => {
    const half = [
      { x: 1, r: 0 },
      { x: 0, r: 1 },
      { x: -1, r: 0 },
    ]
    expect(offAxisRuns(half)).toEqual([half])
    const torus = half.map(({ x, r }) => ({ x, r: r + 1 }))
    expect(offAxisRuns(torus)).toEqual([[...torus, torus[0]]])
  })
})

describe('the flat drawing', () => {
  it.each(['tube', 'converging', 'orifice'] as const)('of a %s is well formed and keeps its words inside', (shape) => {
    for (const ratio of [0.3, 3, 8]) {
      const [width, height] = [720, 400]
      const svg = sceneToSvg(sceneOf(ratio, { shape }).scene, { width, height, theme: 'print' })
      expect(svg).not.toMatch(/NaN|Infinity|undefined/)
      const root = readXml(svg)
      expect(root.children.find(({ name }) => name === 'desc')?.text).toContain('convention')
      for (const { text, x, y, size } of textsOf(root)) {
        expect(x, text).toBeGreaterThanOrEqual(0)
        expect(x + textWidth(text, size), text).toBeLessThanOrEqual(width)
        expect(y - size, text).toBeGreaterThanOrEqual(0)
        expect(y, text).toBeLessThanOrEqual(height)
      }
    }
  })
})
