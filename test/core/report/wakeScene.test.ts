import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { trainRings } from '../../../core/coaxial'
import { ringsOfNozzles, type WakeRing } from '../../../core/filament'
import { fromBase } from '../../../core/quantity'
import { counterColour, fieldColour, wakeScene, wakeSceneToSvg, type WakeSceneModel } from '../../../core/report'
import { expectClose, expectNear } from '../../support/close'
import { planOf } from '../../support/plans'
import { straightPath, wakeOfPaths } from '../../support/wakes'
import { readXml } from './xml'

const UNITS = { length: 'mm', speed: 'mm/s' }
/** Rounding of a few sums of numbers below 1. */
const EXACT = 1e-12

const RING: WakeRing = {
  circulation: 0.006,
  radius: 0.02,
  coreRadius: 0.004,
  core: 'uniform',
  centre: [0, 0, 0],
  direction: [1, 0, 0],
}

/** Rings that go straight at a speed along x [m/s], for a second. */
function sceneOf(
  rings: readonly WakeRing[],
  wake: Readonly<Record<string, unknown>> = {},
  speed = 0.1,
): WakeSceneModel {
  const times = Float64Array.from({ length: 21 }, (_, k) => k / 20)
  const paths = rings.map((ring) => straightPath(ring, times, (k) => ring.centre[0] + (speed * k) / 20))
  return wakeScene({ rings, wake: wakeOfPaths(times, paths) }, planOf({ wake }), UNITS)
}

const explicit = { rings: [{ circulation: 0.006, radius: 0.02, coreRadius: 0.004 }] }

describe('the drawing of rings in motion', () => {
  it('tells rings that turn as if they moved toward -x from the others, by circulation and direction together', () => {
    const scene = sceneOf([
      RING,
      { ...RING, circulation: -0.006 },
      { ...RING, direction: [-1, 0, 0] },
      { ...RING, circulation: -0.006, direction: [-1, 0, 0] },
      { ...RING, circulation: -0.006, direction: [0, 1, 0] },
    ])
    expect(scene.rings.map(({ sense }) => sense)).toEqual([1, -1, -1, 1, -1])
    expect(scene.description).toContain('3 rings turn the other way')
  })

  it('outlines everything that is drawn', () => {
    const scene = sceneOf([RING], { ...explicit, stations: [0.05], wall: { point: [0.2, 0, 0], normal: [-1, 0, 0] } })
    const axis = (k: number): number[] => Array.from(scene.reach).filter((_, i) => i % 3 === k)
    // The ring ends at x = 0.1 with its outside at R + a.
    expect(Math.max(...axis(0))).toBeGreaterThanOrEqual(0.2)
    expect(Math.max(...axis(1))).toBeGreaterThanOrEqual(0.024 - 1e-6)
    expect(Math.max(...axis(2))).toBeGreaterThanOrEqual(0.024 - 1e-6)
    expect(Math.min(...axis(1))).toBeLessThanOrEqual(at(scene.datum.from, 1) + 1e-6)
    expect(axis(0).every(Number.isFinite)).toBe(true)
  })

  it('draws the arrows of a round time, the longest one to about three radii of the largest ring', () => {
    const scene = sceneOf([RING, { ...RING, radius: 0.03 }], explicit, 0.13)
    const length = 0.13 * scene.arrowTime
    expect(length).toBeGreaterThan(0.03)
    expect(length).toBeLessThan(3 * 0.03)
    const rung = scene.arrowTime / 10 ** Math.floor(Math.log10(scene.arrowTime) + 1e-9)
    expect([1, 2, 5].some((step) => Math.abs(rung - step) < 1e-9)).toBe(true)
    expect(scene.conventions.join(' ')).toContain('Arrows: the way in')
    expect(sceneOf([RING], explicit, 0).arrowTime).toBe(0)
  })

  it('numbers the x axis at round numbers of the shown unit, from below the first to beyond the last place', () => {
    const { datum } = sceneOf([RING, { ...RING, centre: [0.37, 0, 0] }], explicit)
    const values = datum.ticks.map(({ place }) => fromBase(place[0], 'mm'))
    const step = at(values, 1) - at(values, 0)
    values.forEach((value) => expectNear(value / step, Math.round(value / step), 1e-9))
    datum.ticks.forEach(({ label }, i) => expectNear(Number(label.replace('\u2212', '-')), at(values, i), 1e-9))
    expect(at(values, 0)).toBeLessThanOrEqual(0)
    expect(at(values, values.length - 1)).toBeGreaterThanOrEqual(470)
    expect(datum.title).toBe('x (mm)')
  })

  it('puts the wall where the plan has it and its solid side away from the rings', () => {
    for (const normal of [
      [1, 0, 0],
      [-2, 0, 0],
    ] as const) {
      const { wall } = sceneOf([RING], { ...explicit, wall: { point: [0.2, 0.3, 0], normal } })
      if (wall === null) throw new Error('a wall was expected')
      wall.corners.forEach(([x]) => expectNear(x, 0.2, EXACT))
      expect(wall.behind[0]).toBe(1)
      expect(Math.max(...wall.corners.map(([, y]) => y))).toBeGreaterThan(0.024)
    }
    const plate = sceneOf([RING], { ...explicit, wall: { point: [0, -0.05, 0], normal: [0, 1, 0] } }).wall
    expect(plate?.behind[1]).toBe(-1)
    plate?.corners.forEach(([, y]) => expectNear(y, -0.05, EXACT))
  })

  it('draws each axis once, and tube and stations about it', () => {
    const side = { ...RING, centre: [0, 0, 0.05] as const }
    expect(sceneOf([RING, { ...RING, centre: [0.05, 0, 0] }], explicit).axes).toHaveLength(1)
    expect(sceneOf([RING, side], explicit).axes).toHaveLength(2)
    const { tube, stations } = sceneOf([RING], { ...explicit, tube: 0.06, stations: [0.05, 0.08, 0.05] })
    expect(tube?.label).toBe('tube, 120\u00a0mm')
    expect(stations.map(({ label, centre }) => [label, centre[0]])).toEqual([
      ['station 50\u00a0mm', 0.05],
      ['station 80\u00a0mm', 0.08],
    ])
    expect(at(stations, 0).radius).toBeGreaterThan(0.024)
  })
})

describe('the nozzles of a wake', () => {
  const train = trainRings({
    density: 1000,
    // I = rho pi Gamma R^2 with R = 20 mm.
    ring: { circulation: 0.006, impulse: 1000 * Math.PI * 0.006 * 0.02 ** 2, speed: 0.12 },
    duration: 0.4,
    pulses: 1,
    period: 1,
  })

  it('stand at their exits, point along their jets, and are cut open toward the eye of the side view', () => {
    const nozzles = [
      { position: [0, 0, 0] as const, direction: [1, 0, 0] as const, delay: 0 },
      { position: [0.3, 0, 0] as const, direction: [-1, 0, 0] as const, delay: 0 },
      { position: [0, 0.1, 0] as const, direction: [1, -1, 0] as const, delay: 0 },
    ]
    const scene = sceneOf(ringsOfNozzles(train.rings, nozzles), { nozzles })
    expect(scene.nozzles.map(({ position }) => position)).toEqual(nozzles.map(({ position }) => position))
    for (const { axes } of scene.nozzles) {
      const [x, y, z] = axes
      const cross = [x[1] * y[2] - x[2] * y[1], x[2] * y[0] - x[0] * y[2], x[0] * y[1] - x[1] * y[0]]
      cross.forEach((value, i) => expectNear(value, at(z, i), EXACT))
      expect(z[2]).toBeGreaterThanOrEqual(0)
    }
    expect(scene.nozzles.map(({ label }) => label)).toEqual([
      'nozzle 1, 30\u00a0mm',
      'nozzle 2, 30\u00a0mm',
      'nozzle 3, 30\u00a0mm',
    ])
  })

  it('keep the area of an elliptic exit and are left out where rings are given one by one', () => {
    const nozzle = { shape: 'tube', diameter: 0.03, pistonDiameter: 0.06, axisRatio: 2 }
    const times = Float64Array.of(0, 1)
    const wake = wakeOfPaths(times, [straightPath(RING, times, (k) => 0.1 * k)])
    const [drawn] = wakeScene({ rings: [RING], wake }, planOf({ nozzle, wake: {} }), UNITS).nozzles
    if (drawn === undefined) throw new Error('a nozzle was expected')
    expectClose(drawn.stretch[0] * drawn.stretch[1], 1, EXACT)
    expectClose(drawn.stretch[0] / drawn.stretch[1], 2, EXACT)
    expect(sceneOf([RING], explicit).nozzles).toEqual([])
  })
})

describe('the flat side view of a wake', () => {
  it.each(['light', 'dark', 'print'] as const)('is well formed and finite in %s, at every time', (theme) => {
    const scene = sceneOf([RING, { ...RING, centre: [0.05, 0, 0], circulation: -0.003 }], {
      ...explicit,
      tube: 0.06,
      stations: [0.05],
      wall: { point: [0.2, 0, 0], normal: [-1, 0, 0] },
    })
    for (const index of [0, 7, 20, 99]) {
      const svg = wakeSceneToSvg(
        scene,
        index,
        { width: 720, height: 400, theme },
        { selected: 2, trails: true, stations: true },
      )
      expect(svg).not.toMatch(/NaN|Infinity|undefined/)
      const root = readXml(svg)
      expect(root.children.find(({ name }) => name === 'desc')?.text).toContain('2 vortex rings on one axis')
      const words = root.children.filter(({ name }) => name === 'text').map(({ text }) => text)
      expect(words).toEqual(expect.arrayContaining(['1', 'ring 2', 'station 50\u00a0mm', 'x (mm)']))
      expect(svg).toContain(counterColour(theme === 'dark'))
    }
  })

  it('draws an empty run without rings', () => {
    const scene = wakeScene(
      { rings: [RING], wake: wakeOfPaths(new Float64Array(0), []) },
      planOf({ wake: explicit }),
      UNITS,
    )
    const svg = wakeSceneToSvg(
      scene,
      0,
      { width: 720, height: 400, theme: 'light' },
      { selected: null, trails: true, stations: true },
    )
    expect(svg).not.toMatch(/NaN|Infinity|undefined/)
    expect(() => readXml(svg)).not.toThrow()
  })
})

describe('colours of fields', () => {
  const lightness = ([red, green, blue]: readonly [number, number, number]): number => {
    const part = (value: number): number =>
      value / 255 <= 0.04045 ? value / 255 / 12.92 : ((value / 255 + 0.055) / 1.055) ** 2.4
    return 0.2126 * part(red) + 0.7152 * part(green) + 0.0722 * part(blue)
  }

  it('grow lighter all the way for amounts, so that they read in grey', () => {
    const values = Array.from({ length: 65 }, (_, i) => lightness(fieldColour('amount', i / 64)))
    values.slice(1).forEach((value, i) => expect(value).toBeGreaterThan(at(values, i)))
    // Ends of cividis: #00204D and #FFEA46 (recalled, not re-read).
    expect([fieldColour('amount', -1), fieldColour('amount', 2)]).toEqual([
      [0, 32, 77],
      [255, 234, 70],
    ])
  })

  it('are lightest at zero for signed values and fall alike on both sides', () => {
    const value = (share: number): number => lightness(fieldColour('signed', share))
    for (let i = 1; i <= 32; i += 1) {
      expect(value(0.5 + i / 64)).toBeLessThan(value(0.5 + (i - 1) / 64))
      expect(value(0.5 - i / 64)).toBeLessThan(value(0.5 - (i - 1) / 64))
    }
    // Violet and ochre ends differ in hue, not in weight.
    expect(Math.abs(value(0) - value(1))).toBeLessThan(0.06)
  })
})
