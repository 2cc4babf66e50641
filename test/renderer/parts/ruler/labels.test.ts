import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  labelBox,
  layOutLabels,
  type LabelSpace,
  type Rectangle,
  type RulerLabel,
} from '../../../../renderer/parts/ruler/labels'

function overlap(a: Rectangle, b: Rectangle): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom
}

/** Everything that may not happen, looked for without the layout's own helpers for it. */
function collisions(labels: readonly RulerLabel[], space: LabelSpace): string[] {
  const { placed } = layOutLabels(labels, space)
  const boxes = placed.map((label) => {
    const request = labels.find((candidate) => candidate.id === label.id)
    if (request === undefined) throw new Error(`${label.id} was never asked for`)
    return { ...label, request, box: labelBox(space, label.row, label.x, request.width) }
  })
  const found: string[] = []
  for (const a of boxes) {
    if (a.box.left < 0 || a.box.right > space.width) found.push(`${a.id} leaves the ruler`)
    if (a.row < 0 || a.row >= space.rows) found.push(`${a.id} leaves its rows`)
    for (const obstacle of space.obstacles) if (overlap(a.box, obstacle)) found.push(`${a.id} covers an obstacle`)
    for (const b of boxes) {
      if (a.id === b.id) continue
      if (overlap(a.box, b.box)) found.push(`${a.id} covers ${b.id}`)
      const { stem } = b.request
      if (stem === null) continue
      const drawnStem = { left: stem - 0.5, right: stem + 0.5, top: b.box.top + space.rowHeight / 2, bottom: 1e6 }
      if (overlap(a.box, drawnStem)) found.push(`${a.id} covers the stem of ${b.id}`)
      const middle = b.box.top + space.rowHeight / 2
      const leader = {
        left: Math.min(stem, b.box.right),
        right: Math.max(stem, b.box.left),
        top: middle - 0.5,
        bottom: middle + 0.5,
      }
      if (overlap(a.box, leader)) found.push(`${a.id} covers the leader of ${b.id}`)
    }
    for (const b of boxes) {
      const { reach } = b.request
      if (reach === undefined) continue
      const middle = b.box.top + space.rowHeight / 2
      const range = { left: reach[0], right: reach[1], top: middle - 1, bottom: middle + 1 }
      // Its own text, too, keeps clear of it.
      if (overlap(a.box, range)) found.push(`${a.id} covers the range of ${b.id}`)
    }
  }
  return found
}

/** A ruler as drawn: 1440 px window, ten diameters. */
const SPACE: LabelSpace = {
  width: 1212,
  rows: 5,
  rowHeight: 13,
  top: 2,
  obstacles: [{ left: 354, right: 376, top: 20, bottom: 76 }],
  stops: [417, 515],
}
const label = (id: string, stem: number | null, width: number, row: number | null = null, anchor = 0): RulerLabel => ({
  id,
  stem,
  anchor,
  width,
  row,
})
const TYPICAL: readonly RulerLabel[] = [
  label('speed match 3.06', 350, 96),
  label('energy limit 3.80', 430, 94),
  label('carried volume 3.91', 442, 112),
  label('published band', null, 84, 0, 423),
]

describe('layOutLabels', () => {
  it('places every label of a typical ruler without a collision', () => {
    expect(layOutLabels(TYPICAL, SPACE).left).toEqual([])
    expect(collisions(TYPICAL, SPACE)).toEqual([])
  })

  it('gives the same layout for the same labels in another order', () => {
    const order = (labels: readonly RulerLabel[]) =>
      [...layOutLabels(labels, SPACE).placed].sort((a, b) => a.id.localeCompare(b.id))
    expect(order([...TYPICAL].reverse())).toEqual(order(TYPICAL))
  })

  it('keeps labels apart whose stems coincide', () => {
    const same = ['a', 'b', 'c', 'd'].map((id) => label(id, 500, 100))
    expect(layOutLabels(same, SPACE).left).toEqual([])
    expect(collisions(same, SPACE)).toEqual([])
  })

  it('leaves out what has no room and says which', () => {
    const wide = ['a', 'b', 'c'].map((id) => label(id, 50, 90))
    const narrow: LabelSpace = { ...SPACE, width: 100, rows: 1, obstacles: [], stops: [] }
    const layout = layOutLabels(wide, narrow)
    expect(layout.placed.length + layout.left.length).toBe(3)
    expect(layout.left.length).toBeGreaterThan(0)
    expect(collisions(wide, narrow)).toEqual([])
  })

  it('never lets two labels, a label and the handle, or a label and another stem meet, whatever the values', () => {
    const widths = fc.integer({ min: 10, max: 180 })
    const places = fc.integer({ min: 0, max: 1212 })
    fc.assert(
      fc.property(
        fc.array(fc.record({ stem: places, width: widths }), { maxLength: 5 }),
        places,
        fc.tuple(places, places),
        fc.boolean(),
        fc.integer({ min: 200, max: 1700 }),
        (estimates, handle, band, withBand, width) => {
          const [from, to] = [...band].sort((a, b) => a - b)
          if (from === undefined || to === undefined) return
          const labels = estimates.map(({ stem, width: w }, i) => label(`estimate ${i}`, Math.min(stem, width), w))
          if (withBand) labels.push(label('band', null, 84, 0, Math.min(from, width) + 6))
          const space: LabelSpace = {
            ...SPACE,
            width,
            obstacles: [{ left: handle - 11, right: handle + 11, top: 20, bottom: 76 }],
            stops: [from, to],
          }
          expect(collisions(labels, space)).toEqual([])
        },
      ),
      { numRuns: 400 },
    )
  })

  it('finds room for all four estimates and the band at every stroke of a wide ruler', () => {
    for (let handle = 20; handle <= 1120; handle += 4) {
      const space = { ...SPACE, obstacles: [{ left: handle - 11, right: handle + 11, top: 20, bottom: 76 }] }
      const computed = { ...label('computed 3.9 (3.6 to 4.3)', 441, 140), reach: [411, 484] as const }
      const labels = [...TYPICAL, computed]
      expect(layOutLabels(labels, space).left, `handle at ${handle}`).toEqual([])
      expect(collisions(labels, space)).toEqual([])
    }
  })
})
