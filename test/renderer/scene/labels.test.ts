import { describe, expect, it } from 'vitest'
import { sharedArea } from '../../../core/report'
import { sceneLabels } from '../../../renderer/scene/labels'
import { fitted, STANDARD_VIEWS } from '../../../renderer/scene/view'
import { sceneAt } from './scenes'

const MARGINS = { left: 64, right: 64, top: 64, bottom: 56 }

function labelsAt(
  ratio: number,
  view: keyof typeof STANDARD_VIEWS,
  width = 850,
  height = 517,
  shape: 'tube' | 'orifice' = 'tube',
) {
  const model = sceneAt(ratio, shape)
  const size = { width, height }
  const bounds = { left: 4, top: 32, width: width - 8, height: height - 54 }
  const labels = sceneLabels(
    model,
    fitted(model, STANDARD_VIEWS[view], size, MARGINS),
    size,
    (text) => text.length * 6.4,
    bounds,
  )
  return { labels, bounds }
}

describe('words on the drawing', () => {
  it.each([
    [0.8, 'threeQuarter', 'tube'],
    [3, 'threeQuarter', 'tube'],
    [3, 'side', 'tube'],
    [3, 'endOn', 'tube'],
    [3, 'threeQuarter', 'orifice'],
    [8, 'threeQuarter', 'tube'],
  ] as const)('neither collide nor leave the picture at a stroke ratio of %f, %s, %s', (ratio, view, shape) => {
    const { labels, bounds } = labelsAt(ratio, view, 850, 517, shape)
    expect(labels.length).toBeGreaterThan(2)
    labels.forEach((label, index) => {
      expect(sharedArea(label, bounds), label.text).toBeCloseTo(label.width * label.height, 6)
      for (const other of labels.slice(index + 1))
        expect(sharedArea(label, other), `${label.text} on ${other.text}`).toBe(0)
    })
  })

  it('make targets of editable dimensions at least 24 pixels high', () => {
    const editable = labelsAt(3, 'threeQuarter').labels.filter(({ path }) => path !== null)
    expect(editable.map(({ path }) => path)).toEqual(['nozzle.diameter', 'programme.stroke', 'programme.peakSpeed'])
    for (const { width, height } of editable) {
      expect(height).toBeGreaterThanOrEqual(24)
      expect(width).toBeGreaterThanOrEqual(24)
    }
  })

  it('leave out plain words where the picture is small, never the dimensions, the speed and the scale', () => {
    const ids = labelsAt(3, 'threeQuarter', 400, 220).labels.map(({ id }) => id)
    expect(ids).toEqual(['nozzle.diameter', 'programme.stroke', 'programme.peakSpeed', 'scale', 'speed'])
  })
})
