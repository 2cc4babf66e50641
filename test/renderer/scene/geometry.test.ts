import { BufferGeometry } from 'three'
import { describe, expect, it } from 'vitest'
import { drawingColours } from '../../../core/report'
import { createRingMesh, fillBody, fillNozzle, resampled } from '../../../renderer/scene/meshes'
import { createRibbons } from '../../../renderer/scene/ribbons'
import { sceneStrokes } from '../../../renderer/scene/strokes'
import { cross, dot, type Vector } from '../../../renderer/scene/vectors'
import { basisOf, STANDARD_VIEWS } from '../../../renderer/scene/view'
import { expectClose } from '../../support/close'
import { sceneAt } from './scenes'

function vertex(geometry: BufferGeometry, name: string, index: number): Vector {
  const attribute = geometry.getAttribute(name)
  return [attribute.getX(index), attribute.getY(index), attribute.getZ(index)]
}

interface Triangle {
  readonly corners: readonly [Vector, Vector, Vector]
  readonly normal: Vector
}

function triangles(geometry: BufferGeometry): Triangle[] {
  const index = geometry.getIndex()
  const count = index === null ? geometry.getAttribute('position').count : index.count
  return Array.from({ length: count / 3 }, (_, triangle) => {
    const at = (corner: number): number => {
      const place = triangle * 3 + corner
      return index === null ? place : index.getX(place)
    }
    return {
      corners: [
        vertex(geometry, 'position', at(0)),
        vertex(geometry, 'position', at(1)),
        vertex(geometry, 'position', at(2)),
      ],
      normal: vertex(geometry, 'normal', at(0)),
    }
  })
}

/** Volume inside outward-facing triangles, by the divergence theorem. */
function enclosed(geometry: BufferGeometry): number {
  return triangles(geometry).reduce((sum, { corners: [a, b, c] }) => sum + dot(a, cross(b, c)) / 6, 0)
}

function facesAgree(geometry: BufferGeometry): boolean {
  return triangles(geometry).every(({ corners: [a, b, c], normal }) => {
    const face = cross([b[0] - a[0], b[1] - a[1], b[2] - a[2]], [c[0] - a[0], c[1] - a[1], c[2] - a[2]])
    const size = Math.hypot(...face)
    // Slivers next to the axis have no direction worth comparing.
    return size < 1e-13 || dot(face, normal) / size > 0.2
  })
}

describe('the ring as a mesh', () => {
  it.each([0.8, 3, 12])(
    'encloses the core turned about the axis and faces outward at a stroke ratio of %f',
    (ratio) => {
      const { ring } = sceneAt(ratio)
      if (ring === null) throw new Error('a ring was expected')
      const mesh = createRingMesh()
      mesh.shape(ring.core)
      // Pappus: 2 pi times the first moment of the section about the axis.
      const moment = ring.core.reduce((sum, a, index) => {
        const b = ring.core[(index + 1) % ring.core.length] ?? a
        return sum + ((a.x * b.r - b.x * a.r) * (a.r + b.r)) / 6
      }, 0)
      // 80 points round the core and 128 round the axis: chords are short by 0.1 % and 0.04 %; doubled for uneven spacing.
      expectClose(enclosed(mesh.geometry), Math.abs(2 * Math.PI * moment), 3e-3, 'volume')
      expect(facesAgree(mesh.geometry)).toBe(true)
    },
  )

  it('takes another outline in the same buffers', () => {
    const mesh = createRingMesh()
    mesh.shape(sceneAt(1).ring?.core ?? [])
    const { array } = mesh.geometry.getAttribute('position')
    const before = [...array.slice(0, 3)]
    mesh.shape(sceneAt(3).ring?.core ?? [])
    expect(mesh.geometry.getAttribute('position').array).toBe(array)
    expect([...array.slice(0, 3)]).not.toEqual(before)
  })
})

describe('bodies and lines', () => {
  it.each(['tube', 'converging', 'orifice'] as const)('of a %s are finite and face outward', (shape) => {
    const model = sceneAt(3, shape)
    const [nozzle, slug] = [new BufferGeometry(), new BufferGeometry()]
    fillNozzle(nozzle, model.nozzle)
    fillBody(slug, model.slug.outline)
    for (const geometry of [nozzle, slug]) {
      expect(Array.from(geometry.getAttribute('position').array).every(Number.isFinite)).toBe(true)
      expect(facesAgree(geometry)).toBe(true)
    }
    // 72 chords round the axis: 0.13 % short; the slug is drawn 1.5 % narrower than the bore.
    expectClose(enclosed(slug), Math.PI * 0.01 ** 2 * 0.06 * 0.985 ** 2, 3e-3, 'slug')
  })

  it('resample a line at equal lengths with both ends kept', () => {
    const points = resampled(
      [
        { x: 0, r: 0 },
        { x: 3, r: 0 },
        { x: 3, r: 1 },
      ],
      5,
    )
    expect(points).toEqual([
      { x: 0, r: 0 },
      { x: 1, r: 0 },
      { x: 2, r: 0 },
      { x: 3, r: 0 },
      { x: 3, r: 1 },
    ])
  })

  it.each(['side', 'threeQuarter', 'endOn'] as const)(
    'draw finite strips from %s into a buffer that is kept',
    (name) => {
      const basis = basisOf(STANDARD_VIEWS[name])
      const ribbons = createRibbons()
      const colours = drawingColours('light')
      for (const ratio of [0.3, 8]) ribbons.draw(sceneStrokes(sceneAt(ratio), basis, 1e-4), basis, 1e-4, colours)
      const { array, count } = ribbons.geometry.getAttribute('position')
      const drawn = ribbons.geometry.drawRange.count
      expect(drawn).toBeGreaterThan(100)
      expect(drawn).toBeLessThanOrEqual(count)
      expect(Array.from(array).every(Number.isFinite)).toBe(true)
      ribbons.draw(sceneStrokes(sceneAt(8), basis, 1e-4), basis, 1e-4, colours)
      expect(ribbons.geometry.getAttribute('position').array).toBe(array)
    },
  )

  it('face the eye', () => {
    const basis = basisOf(STANDARD_VIEWS.threeQuarter)
    for (const { points } of sceneStrokes(sceneAt(3), basis, 1e-4)) expect(points.length).toBeGreaterThan(0)
    const ribbons = createRibbons()
    ribbons.draw(
      [
        {
          points: [
            [0, 0, 0],
            [0.01, 0, 0],
          ],
          colour: 'ink',
          width: 2,
          dash: [],
          over: false,
          head: 0,
        },
      ],
      basis,
      1e-4,
      drawingColours('light'),
    )
    const corners = [0, 1, 2].map((index) => vertex(ribbons.geometry, 'position', index))
    const [a, b, c] = corners
    if (a === undefined || b === undefined || c === undefined) throw new Error('a triangle was expected')
    const width = Math.abs(dot([c[0] - b[0], c[1] - b[1], c[2] - b[2]], basis.up))
    // Two pixels of 1e-4 m, seen square; the line itself slopes a little on the screen.
    expectClose(Math.hypot(c[0] - b[0], c[1] - b[1], c[2] - b[2]), 2e-4, 1e-5)
    expect(width).toBeGreaterThan(1.9e-4)
  })
})
