import { describe, expect, it } from 'vitest'
import {
  basisOf,
  fitted,
  followed,
  magnified,
  project,
  projectedFrame,
  shifted,
  STANDARD_VIEWS,
  turned,
  type Margins,
} from '../../../renderer/scene/view'
import { cross, dot } from '../../../renderer/scene/vectors'
import { expectNear } from '../../support/close'
import { sceneAt } from './scenes'

const SIZE = { width: 800, height: 500 }
const MARGINS: Margins = { left: 60, right: 60, top: 50, bottom: 50 }
/** Rounding of a few multiplications of numbers near 1000. */
const EXACT = 1e-9

describe('the view', () => {
  it('keeps right, up and toward square to one another and right-handed, however it is turned', () => {
    for (const azimuth of [-3, -0.4, 0, 0.4, 1.57, 2.9]) {
      for (const elevation of [-1.4, 0, 0.2, 1.4]) {
        const { right, up, toward, radial } = basisOf({ azimuth, elevation })
        expectNear(dot(right, up), 0, EXACT)
        expectNear(dot(cross(right, up), toward), 1, EXACT)
        expectNear(Math.hypot(...radial), 1, EXACT)
        expectNear(radial[0], 0, EXACT)
        expect(radial[1]).toBeGreaterThanOrEqual(0)
      }
    }
  })

  it('draws outlines square to the eye and upright', () => {
    const basis = basisOf(STANDARD_VIEWS.threeQuarter)
    expectNear(dot(basis.radial, basis.toward), 0, EXACT)
    expect(dot(basis.radial, basis.up)).toBeGreaterThan(0)
  })

  it('shows the jet going right from the side and toward the eye end on', () => {
    expect(dot([1, 0, 0], basisOf(STANDARD_VIEWS.side).right)).toBe(1)
    expectNear(dot([1, 0, 0], basisOf(STANDARD_VIEWS.endOn).toward), 1, EXACT)
  })

  it.each(['side', 'threeQuarter', 'endOn'] as const)('fits everything drawn inside its margins from %s', (name) => {
    for (const ratio of [0.3, 3, 8]) {
      const model = sceneAt(ratio)
      const view = fitted(model, STANDARD_VIEWS[name], SIZE, MARGINS)
      const frame = projectedFrame(model, basisOf(view))
      const left = SIZE.width / 2 + (frame.left - view.centre.right) * view.scale
      const right = SIZE.width / 2 + (frame.right - view.centre.right) * view.scale
      const top = SIZE.height / 2 - (frame.top - view.centre.up) * view.scale
      const bottom = SIZE.height / 2 - (frame.bottom - view.centre.up) * view.scale
      expect(left).toBeGreaterThanOrEqual(MARGINS.left - EXACT)
      expect(right).toBeLessThanOrEqual(SIZE.width - MARGINS.right + EXACT)
      expect(top).toBeGreaterThanOrEqual(MARGINS.top - EXACT)
      expect(bottom).toBeLessThanOrEqual(SIZE.height - MARGINS.bottom + EXACT)
    }
  })

  it('keeps its scale while a stroke grows a little and fits anew when it no longer does', () => {
    const view = fitted(sceneAt(3), STANDARD_VIEWS.side, SIZE, { ...MARGINS, left: 90, right: 90 })
    expect(followed(view, sceneAt(3.05), SIZE, MARGINS).scale).toBe(view.scale)
    expect(followed(view, sceneAt(8), SIZE, MARGINS).scale).toBeLessThan(view.scale)
    expect(followed(view, sceneAt(0.5), SIZE, MARGINS).scale).toBeGreaterThan(view.scale)
  })

  it('magnifies about a pixel and stays within its limits', () => {
    const view = fitted(sceneAt(3), STANDARD_VIEWS.threeQuarter, SIZE, MARGINS)
    const basis = basisOf(view)
    const about = project([0.01, 0.02, 0.03], basis, view, SIZE)
    const near = magnified(view, 2.5, about, SIZE, [1, 1e9])
    const after = project([0.01, 0.02, 0.03], basis, near, SIZE)
    expectNear(after.x, about.x, 1e-6)
    expectNear(after.y, about.y, 1e-6)
    expect(magnified(view, 1e9, about, SIZE, [10, 5000]).scale).toBe(5000)
  })

  it('moves with the hand and never turns over the top', () => {
    const view = fitted(sceneAt(3), STANDARD_VIEWS.side, SIZE, MARGINS)
    const basis = basisOf(view)
    const before = project([0, 0, 0], basis, view, SIZE)
    const after = project([0, 0, 0], basis, shifted(view, 12, -7), SIZE)
    expectNear(after.x - before.x, 12, 1e-6)
    expectNear(after.y - before.y, -7, 1e-6)
    expect(turned(view, 0, 99).elevation).toBeLessThan(Math.PI / 2)
  })
})
