import { beforeAll, describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import type { JetRun, JetSnapshot } from '../../../core/coaxial'
import {
  AGE_STEPS,
  ageColour,
  describeJet,
  emptyLine,
  jetPhase,
  jetReading,
  jetScene,
  jetSceneToSvg,
  jetTimeline,
  layLine,
  sheetRuns,
  type JetSceneModel,
} from '../../../core/report'
import { expectClose } from '../../support/close'
import { DIAMETER, ramped, TIME } from '../coaxial/jet/jets'
import { jetAt } from './jets'
import { readXml } from './xml'

const UNITS = { length: 'mm', time: 'ms' }
let long: JetRun
let short: JetRun
let scene: JetSceneModel

beforeAll(async () => {
  long = (await jetAt(8)).shown
  short = (await jetAt(2)).shown
  scene = jetScene(long, ramped(8), DIAMETER, UNITS)
})

/** A sheet through given nodes, oldest first. */
function shapeOf(x: readonly number[], r: readonly number[], more: Partial<JetSnapshot> = {}): JetSnapshot {
  return {
    time: 1,
    formationTime: 1,
    looseCount: 0,
    x: Float64Array.from(x),
    r: Float64Array.from(r),
    circulation: new Float64Array(x.length).fill(1),
    age: Float64Array.from(x, (_, i) => 1 - i / (x.length - 1)),
    cutX: null,
    ...more,
  }
}

describe('jetTimeline', () => {
  it('runs in formation time during the stroke and on at the peak speed after it', () => {
    const { strokeEnd, strokeRatio, placeOf } = jetTimeline(long, ramped(8), DIAMETER)
    expectClose(strokeEnd, 8 * TIME, 1e-12)
    expectClose(strokeRatio, 8, 1e-12)
    expectClose(placeOf(4 * TIME, 4), 4, 1e-12)
    expectClose(placeOf(9.5 * TIME, 8), 9.5, 1e-12)
  })

  it('has a rising place for every shape', () => {
    const { places, times } = scene.timeline
    expect(places).toHaveLength(long.snapshots.length)
    expect(times).toHaveLength(long.snapshots.length)
    for (let i = 1; i < places.length; i += 1) expect(at(places, i)).toBeGreaterThan(at(places, i - 1))
  })

  it('tells when the ring is full, the stroke ends and the ring pinches off, in that order', () => {
    const { moments } = scene.timeline
    expect(moments.map(({ id }) => id)).toEqual(['ring-full', 'stroke-end', 'pinch-off'])
    expectClose(at(moments, 0).place, long.formationNumber ?? NaN, 1e-9)
    expectClose(at(moments, 1).place, 8, 1e-9)
    expect(at(moments, 2).time).toBe(long.pinchOff?.time)
  })

  it('says that a ring is full in this run only, where the stroke is too short to tell the formation number', async () => {
    const { shown } = await jetAt(5)
    const full = jetTimeline(shown, ramped(5), DIAMETER).moments.find(({ id }) => id === 'ring-full')
    expect(full?.label).toBe('ring full in this run')
    expect(at(scene.timeline.moments, 0).label).toBe('ring full')
  })

  it('has no pinch-off where one ring takes everything', () => {
    expect(short.trailingJet).toBe(false)
    expect(jetTimeline(short, ramped(2), DIAMETER).moments.map(({ id }) => id)).toEqual(['stroke-end'])
  })
})

describe('jetReading', () => {
  it('gives the rows of the history and straight lines between them', () => {
    const { history } = long
    const row = 40
    const [t0, t1] = [at(history.time, row), at(history.time, row + 1)]
    const [a, b] = [at(history.totalCirculation, row), at(history.totalCirculation, row + 1)]
    expect(jetReading(long, t0)?.totalCirculation).toBe(a)
    expectClose(jetReading(long, (t0 + t1) / 2)?.totalCirculation ?? NaN, (a + b) / 2, 1e-9)
  })

  it('has no ring before one is cut, and holds the ends', () => {
    const first = jetReading(long, 0)
    expect(first?.ringCirculation).toBeNull()
    expect(first?.totalCirculation).toBe(at(long.history.totalCirculation, 0))
    const end = jetReading(long, 1e9)
    expect(end?.ringX).toBe(long.history.ringX.at(-1))
  })
})

describe('layLine', () => {
  it('goes through every node and bends between them as a circle does', () => {
    const count = 13
    const angles = Array.from({ length: count }, (_, i) => (Math.PI * i) / (count - 1))
    const shape = shapeOf(
      angles.map((angle) => Math.cos(angle)),
      angles.map((angle) => 2 + Math.sin(angle)),
    )
    const line = emptyLine()
    layLine(line, shape, 0.05)
    expect(line.count).toBeGreaterThan(3 * count)
    for (let node = 0; node < count; node += 1) {
      const found = Array.from({ length: line.count }, (_, i) =>
        Math.hypot(at(line.x, i) - at(shape.x, node), at(line.r, i) - at(shape.r, node)),
      )
      expect(Math.min(...found)).toBeLessThan(1e-12)
    }
    // Chords of 15 degrees are up to 0.0086 inside the circle; the cubic is within a tenth of that, but for the two end pieces.
    for (let i = 0; i < line.count; i += 1) {
      const off = Math.abs(Math.hypot(at(line.x, i), at(line.r, i) - 2) - 1)
      expect(off).toBeLessThan(Math.abs(at(line.x, i)) > 0.96 ? 0.0086 : 0.00086)
    }
  })

  it('starts after the loose filaments and keeps its memory for a shorter shape', () => {
    const line = emptyLine()
    layLine(line, shapeOf([9, 9, 0, 1, 2, 3], [9, 9, 1, 1, 1, 1], { looseCount: 2 }), 0.1)
    expect(at(line.x, 0)).toBe(0)
    const { x } = line
    layLine(line, shapeOf([0, 1], [1, 1]), 0.5)
    expect(line.x).toBe(x)
    expect(line.count).toBe(3)
    layLine(line, shapeOf([], []), 1)
    expect(line.count).toBe(0)
  })
})

describe('sheetRuns', () => {
  it('cuts the line where the colour or the sense changes, and leaves no gap', () => {
    const line = emptyLine()
    const shape = at(long.snapshots, long.snapshots.length - 1)
    layLine(line, shape, Infinity)
    const runs = sheetRuns(line)
    expect(at(runs, 0).first).toBe(0)
    expect(at(runs, runs.length - 1).last).toBe(line.count - 1)
    for (let k = 1; k < runs.length; k += 1) expect(at(runs, k).first).toBe(at(runs, k - 1).last)
    // The tip is the oldest part.
    expect(at(runs, 0).step).toBe(AGE_STEPS - 1)
  })

  it('tells the opposite sense only after the stroke, which sheds a stopping vortex', () => {
    const line = emptyLine()
    for (const shape of long.snapshots) {
      layLine(line, shape, Infinity)
      const counter = sheetRuns(line).some((run) => run.counter)
      if (shape.time <= 8 * TIME) expect(counter, `at ${shape.time}`).toBe(false)
      if (shape.time > 8.2 * TIME) expect(counter, `at ${shape.time}`).toBe(true)
    }
  })
})

describe('ageColour', () => {
  /** Relative luminance after WCAG 2. */
  function luminance(colour: string): number {
    const parts = [1, 3, 5].map((from) => Number.parseInt(colour.slice(from, from + 2), 16) / 255)
    const [red = 0, green = 0, blue = 0] = parts.map((part) =>
      part <= 0.03928 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4,
    )
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue
  }

  it.each([
    [false, '#FFFFFF'],
    [true, '#1A2129'],
  ])('keeps 3 to 1 on its ground at every age (dark: %s)', (dark, ground) => {
    for (let step = 0; step < AGE_STEPS; step += 1) {
      const pair = [luminance(ageColour(step, dark)), luminance(ground)]
      expect((Math.max(...pair) + 0.05) / (Math.min(...pair) + 0.05), `step ${step}`).toBeGreaterThanOrEqual(3)
    }
  })
})

describe('jetScene', () => {
  it('frames every shape at every time', () => {
    const { xMin, xMax, rMax } = scene.extent
    for (const { x, r } of scene.shapes) {
      expect(Math.max(...x)).toBeLessThan(xMax)
      expect(Math.max(...r)).toBeLessThan(rMax)
    }
    expect(xMin).toBeLessThan(0)
  })

  it('goes from forming over a trailing jet to pinched off, and stops', () => {
    const phases = scene.shapes.map((shape) => jetPhase(scene.timeline, shape))
    expect(phases.filter((phase, i) => phase !== phases[i - 1])).toEqual([
      'forming',
      'trailing',
      'stopped',
      'stopped-pinched',
    ])
    const alone = jetScene(short, ramped(2), DIAMETER, UNITS)
    const own = alone.shapes.map((shape) => jetPhase(alone.timeline, shape))
    expect([own[0], own.at(-1)]).toEqual(['forming', 'stopped'])
  })

  it('is told in words in the chosen units', () => {
    const words = describeJet(scene, scene.shapes.length - 1)
    expect(words).toMatch(/formation time 8\.00: the ring has pinched off, and the stroke is over\./)
    expect(words).toMatch(/cut from the trailing jet at [\d.]+\u00A0mm\./)
    expect(describeJet({ ...scene, shapes: [] }, 0)).toMatch(/No shape/)
  })
})

describe('jetSceneToSvg', () => {
  it.each(['light', 'dark', 'print'] as const)('is well formed and drawn inside its frame in %s', (theme) => {
    const [width, height] = [850, 400]
    for (const index of [0, 12, scene.shapes.length - 1]) {
      const svg = jetSceneToSvg(scene, index, { width, height, theme })
      readXml(svg)
      expect(svg).not.toMatch(/NaN|undefined|Infinity/)
      for (const [, x, y] of svg.matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)) {
        expect(Number(x)).toBeGreaterThanOrEqual(0)
        expect(Number(x)).toBeLessThanOrEqual(width)
        expect(Number(y)).toBeGreaterThanOrEqual(0)
        expect(Number(y)).toBeLessThanOrEqual(height)
      }
    }
  })

  it('marks the ring beyond the cut only where there is one', () => {
    const size = { width: 850, height: 400, theme: 'light' } as const
    expect(jetSceneToSvg(scene, 0, size)).not.toContain('beyond the cut')
    expect(jetSceneToSvg(scene, scene.shapes.length - 1, size)).toContain('ring, beyond the cut')
  })

  it('draws both halves of the sheet alike', () => {
    const svg = jetSceneToSvg(scene, 8, { width: 850, height: 400, theme: 'light' })
    const paths = [...svg.matchAll(/<path d="([^"]+)" stroke="(#[0-9a-f]{6})" stroke-width="1.8"/g)]
    expect(paths.length % 2).toBe(0)
    expect(paths.length).toBeGreaterThan(10)
    const colours = paths.map((path) => path[2])
    expect(colours.slice(0, paths.length / 2)).toEqual(colours.slice(paths.length / 2))
  })
})
