import { BufferGeometry } from 'three'
import { describe, expect, it } from 'vitest'
import { at } from '../../../../core/base'
import { cross, dot, unit, type Vector } from '../../../../renderer/scene/vectors'
import { createTubes, sidesFor, type TubeLook, type TubeRing } from '../../../../renderer/scene/wake/tubes'
import { expectClose, expectNear } from '../../../support/close'
import { circleNodes } from '../../../support/wakes'

const PAINT = [0.1, 0.2, 0.3] as const
const ROUND: TubeLook = { sides: 24, least: 0, toward: [0, 0, 1] }
const STRIP: TubeLook = { sides: 0, least: 0, toward: [0, 0, 1] }

function ring(nodes: Float64Array, coreRadius: number): TubeRing {
  return { nodes, coreRadius, paint: PAINT }
}

function vector(geometry: BufferGeometry, name: string, index: number): Vector {
  const attribute = geometry.getAttribute(name)
  return [attribute.getX(index), attribute.getY(index), attribute.getZ(index)]
}

interface Face {
  readonly corners: readonly [Vector, Vector, Vector]
  /** Of length twice the area. */
  readonly across: Vector
  readonly normal: Vector
}

function faces(geometry: BufferGeometry): Face[] {
  const index = geometry.getIndex()
  if (index === null) throw new Error('an index was expected')
  return Array.from({ length: geometry.drawRange.count / 3 }, (_, face) => {
    const corner = (k: number): number => index.getX(3 * face + k)
    const [a, b, c] = [0, 1, 2].map((k) => vector(geometry, 'position', corner(k)))
    if (a === undefined || b === undefined || c === undefined) throw new Error('three corners were expected')
    const across = cross([b[0] - a[0], b[1] - a[1], b[2] - a[2]], [c[0] - a[0], c[1] - a[1], c[2] - a[2]])
    return { corners: [a, b, c], across, normal: vector(geometry, 'normal', corner(0)) }
  })
}

/** Area of the shadow that front faces throw along the line of sight. */
function shadow(geometry: BufferGeometry, toward: Vector): number {
  return faces(geometry).reduce((sum, { across }) => sum + Math.max(0, dot(across, toward) / 2), 0)
}

/** A curve that is neither plane nor evenly spaced. */
function bentCurve(count: number): Float64Array {
  return Float64Array.from({ length: 3 * count }, (_, i) => {
    const angle = (2 * Math.PI * Math.floor(i / 3)) / count
    return (
      [0.01 * Math.sin(2 * angle), 0.03 * Math.cos(angle), 0.02 * Math.sin(angle + 0.3 * Math.sin(angle))][i % 3] ?? 0
    )
  })
}

describe('rings as tubes', () => {
  it('enclose a torus of the core radius and face outward', () => {
    const tubes = createTubes()
    tubes.draw([ring(circleNodes([0.1, 0, 0], 0.02, 128), 0.004)], ROUND)
    const volume = faces(tubes.geometry).reduce((sum, { corners: [a, b, c] }) => sum + dot(a, cross(b, c)) / 6, 0)
    // 2 pi^2 R a^2; a regular 24-gon is 1.1 % smaller than its circle, 128 chords 0.1 % shorter.
    const polygon = (24 / (2 * Math.PI)) * Math.sin((2 * Math.PI) / 24)
    expectClose(volume, 2 * Math.PI ** 2 * 0.02 * 0.004 ** 2 * polygon, 2e-3, 'volume')
    for (const { across, normal } of faces(tubes.geometry)) expect(dot(unit(across), normal)).toBeGreaterThan(0.9)
  })

  it.each([6, 8, 24])('close without a twist round a curve that is not plane, with %i corners', (sides) => {
    const tubes = createTubes()
    const count = 120
    const nodes = bentCurve(count)
    tubes.draw([ring(nodes, 0.002)], { ...ROUND, sides })
    // A step from one section to the next turns no corner by more than the mean twist: last to first is like all others.
    const step = (i: number): number => {
      const a = vector(tubes.geometry, 'normal', i * sides)
      const b = vector(tubes.geometry, 'normal', ((i + 1) % count) * sides)
      return Math.acos(Math.min(1, dot(a, b)))
    }
    const steps = Array.from({ length: count }, (_, i) => step(i))
    expect(at(steps, count - 1)).toBeLessThanOrEqual(1.2 * Math.max(...steps.slice(0, -1)))
    for (const { across, normal } of faces(tubes.geometry)) expect(dot(across, normal)).toBeGreaterThan(0)
  })

  it('keep their buffers from frame to frame and take new shapes in place', () => {
    const tubes = createTubes()
    const frame = (x: number): TubeRing[] => [0, 1].map((k) => ring(circleNodes([x + k, 0, 0], 0.02, 64), 0.004))
    tubes.draw(frame(0), ROUND)
    const { array } = tubes.geometry.getAttribute('position')
    const before = at(array, 0)
    tubes.draw(frame(0.5), ROUND)
    expect(tubes.geometry.getAttribute('position').array).toBe(array)
    expectNear(at(array, 0) - before, 0.5, 1e-6)
    // Fewer rings and coarser sections fit the same buffers.
    tubes.draw(frame(0).slice(1), { ...ROUND, sides: 6 })
    expect(tubes.geometry.getAttribute('position').array).toBe(array)
    expect(tubes.geometry.drawRange.count).toBe(64 * 6 * 6)
  })

  it('are never thinner than asked', () => {
    const tubes = createTubes()
    tubes.draw([ring(circleNodes([0, 0, 0], 0.02, 64), 1e-6)], { ...ROUND, least: 0.001 })
    const [x, y, z] = vector(tubes.geometry, 'position', 0)
    expectClose(Math.hypot(Math.hypot(y, z) - 0.02, x), 0.001, 1e-5)
  })

  it('have as many corners as the budget of vertices allows, and never fewer than six', () => {
    expect(sidesFor(192, 31_000)).toBe(24)
    expect(sidesFor(20 * 256, 31_000)).toBe(6)
    expect(sidesFor(1e6, 31_000)).toBe(6)
  })
})

describe('rings as strips that face the eye', () => {
  it.each([
    ['face on', [1, 0, 0], 0],
    ['from the side', [0, 0, 1], 2],
    ['at a slant', [0.6, 0.48, 0.64], 0],
  ] as const)('cover what tubes cover, seen %s', (_, toward, caps) => {
    const [strip, tube] = [createTubes(), createTubes()]
    const rings = [ring(circleNodes([0.1, 0, 0], 0.02, 128), 0.003)]
    strip.draw(rings, { ...STRIP, toward })
    tube.draw(rings, { ...ROUND, toward })
    // Front faces alone: what they hide of one another counts twice alike; the octagons that cap a shell come on top.
    const capped = caps * 2 * Math.SQRT2 * 0.003 ** 2
    // The section of the tube is a 24-gon, 0.9 % narrower, and it narrows where the ring bends: 1 % more.
    expectClose(shadow(strip.geometry, toward), shadow(tube.geometry, toward) + capped, 0.02, 'area seen')
    // Where the shell turns over, one quad is crossed and half of it faces away.
    const away = faces(strip.geometry).reduce((sum, { across }) => sum - Math.min(0, dot(across, toward) / 2), 0)
    expect(away).toBeLessThan(0.001 * shadow(tube.geometry, toward))
  })

  it('reach as far as tubes at the ends of a ring seen from the side, wherever its first node lies', () => {
    for (const start of [0, 13, 32]) {
      const nodes = circleNodes([0, 0, 0], 0.02, 128)
      const turned = Float64Array.from(nodes, (_, i) => at(nodes, (i + 3 * start) % nodes.length))
      const strip = createTubes()
      strip.draw([ring(turned, 0.004)], STRIP)
      const ys = faces(strip.geometry).flatMap(({ corners }) => corners.map(([, y]) => y))
      // Eight corners of a cap: its top is at worst cos(pi / 8) of the radius up.
      expect(Math.max(...ys)).toBeGreaterThan(0.02 + 0.004 * 0.92)
      expect(Math.min(...ys)).toBeLessThan(-0.02 - 0.004 * 0.92)
    }
  })

  it('take over from tubes and give back in the same buffers', () => {
    const tubes = createTubes()
    const rings = [ring(circleNodes([0, 0, 0], 0.02, 128), 0.004)]
    tubes.draw(rings, ROUND)
    const { array } = tubes.geometry.getAttribute('position')
    tubes.draw(rings, STRIP)
    tubes.draw(rings, ROUND)
    expect(tubes.geometry.getAttribute('position').array).toBe(array)
    expect(faces(tubes.geometry).every(({ across, normal }) => dot(across, normal) > 0)).toBe(true)
  })
})
