import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import {
  placeLabels,
  plotDomain,
  plotLabels,
  plotScale,
  seriesParts,
  sharedArea,
  type Place,
} from '../../../core/report'
import { PLOT } from './models'

function place(left: number, top: number, width = 40, height = 10): Place {
  return { left, top, width, height, vertical: false }
}

const BOUNDS = { left: 0, top: 0, width: 200, height: 100 }

describe('placing labels', () => {
  it('takes the first place when it stands free', () => {
    const [label] = placeLabels([{ id: 'a', places: [place(10, 10), place(90, 50)] }], {
      bounds: BOUNDS,
      boxes: [],
      points: [],
    })
    expect(label?.place).toEqual(place(10, 10))
    expect(label?.overlap).toBe(0)
  })

  it('moves the later of two that would collide', () => {
    const requests = [
      { id: 'a', places: [place(10, 10)] },
      { id: 'b', places: [place(20, 12), place(10, 40)] },
    ]
    const [a, b] = placeLabels(requests, { bounds: BOUNDS, boxes: [], points: [] })
    expect(sharedArea(at([a?.place ?? BOUNDS], 0), b?.place ?? BOUNDS)).toBe(0)
  })

  it('leaves neither the bounds nor the side of an obstacle while another place is free', () => {
    const boxes = [{ left: 0, top: 0, width: 80, height: 30 }]
    const requests = [{ id: 'a', places: [place(180, 10), place(20, 10), place(100, 60)] }]
    expect(placeLabels(requests, { bounds: BOUNDS, boxes, points: [] })[0]?.place).toEqual(place(100, 60))
  })

  it('keeps off lines', () => {
    const points = [{ x: 30, y: 15 }]
    const requests = [{ id: 'a', places: [place(10, 10), place(10, 40)] }]
    expect(placeLabels(requests, { bounds: BOUNDS, boxes: [], points })[0]?.place).toEqual(place(10, 40))
  })
})

describe('direct labels of a plot', () => {
  it('stand inside the frame, apart from one another, and name every line, limit and band', () => {
    for (const [width, height] of [
      [230, 110],
      [600, 360],
    ] as const) {
      const scale = plotScale(plotDomain(PLOT), { left: 30, top: 10, width, height })
      const labels = plotLabels(PLOT, scale, (text) => text.length * 6, 14)
      expect(labels.map(({ text }) => text).sort()).toEqual(['a < b', 'limit 0.33', 'published band', 'second'])
      labels.forEach(({ place: box }, index) => {
        expect(sharedArea(box, scale.frame)).toBeCloseTo(box.width * box.height, 6)
        for (const other of labels.slice(index + 1)) expect(sharedArea(box, other.place)).toBe(0)
      })
    }
  })

  it('leave out the name of a lone series, which the title gives', () => {
    const model = { ...PLOT, series: PLOT.series.slice(0, 1) }
    const scale = plotScale(plotDomain(model), { left: 0, top: 0, width: 300, height: 200 })
    expect(plotLabels(model, scale, (text) => text.length * 6, 14).map(({ text }) => text)).not.toContain('a < b')
  })
})

describe('lines in pixels', () => {
  it('are cut where they leave the frame and broken where a value is missing', () => {
    const model = {
      ...PLOT,
      y: { ...PLOT.y, min: 0, max: 10 },
      series: [{ ...at(PLOT.series, 0), x: [0, 1, 2, 3, 4], y: [20, 0, null, 5, 15] }],
    }
    const scale = plotScale(plotDomain(model), { left: 0, top: 0, width: 400, height: 100 })
    const parts = seriesParts(at(model.series, 0), scale)
    expect(parts).toHaveLength(2)
    // From (0, 20) to (1, 0) the line comes in at y = 10, half-way.
    expect(at(at(parts, 0), 0).x).toBeCloseTo(scale.toX(0.5), 9)
    expect(at(at(parts, 0), 0).y).toBeCloseTo(0, 9)
    expect(at(at(parts, 1), 1).x).toBeCloseTo(scale.toX(3.5), 9)
  })
})
