import { describe, expect, it } from 'vitest'
import type { JetSnapshot } from '../../../../core/coaxial'
import type { WakeJet } from '../../../../core/run'
import { createJetSheet, drawnNodes, sheetAt, sheetsAt } from '../../../../renderer/scene/wake/jetSheet'
import { expectClose } from '../../../support/close'

/** A made-up sheet: a straight line of nodes from its tip to the lip, after some loose filaments. */
function shape(time: number, nodes: number, looseCount = 0): JetSnapshot {
  const count = nodes + looseCount
  const column = (of: (i: number) => number): Float64Array => Float64Array.from({ length: count }, (_, i) => of(i))
  return {
    time,
    formationTime: time,
    looseCount,
    x: column((i) => (time * (count - 1 - i)) / count),
    r: column(() => 0.5),
    circulation: column(() => 0.01),
    age: column(() => 0),
    cutX: null,
  }
}

const RELEASE_TIME = 3
const NOTHING = { circulation: 0, square: 0, moment: 0 }
const JET: WakeJet = {
  pulses: 3,
  period: 2,
  release: { time: RELEASE_TIME, rings: [], total: NOTHING, leftOut: NOTHING, takenIn: 0 },
  pinchOff: null,
  pinchOffX: null,
  delta: 0.1,
  snapshots: [0.5, 1, 1.5, 2, 2.5, RELEASE_TIME].map((time) => shape(time, 50, time > 2 ? 4 : 0)),
}

describe('the sheet of a pulse', () => {
  it('is the last shape kept, none before the first and from the release on', () => {
    expect(sheetAt(JET, 0.2)).toBeNull()
    expect(sheetAt(JET, 1.2)?.time).toBe(1)
    expect(sheetAt(JET, 2.99)?.time).toBe(2.5)
    expect(sheetAt(JET, RELEASE_TIME)).toBeNull()
    // A time that is a rounding short of it is the release as well: its rings are there.
    expect(sheetAt(JET, RELEASE_TIME * (1 - 1e-12))).toBeNull()
  })

  it('forms anew with every pulse, while the one before may still form, and with none after the last', () => {
    expect(sheetsAt(JET, 1).map(({ time }) => time)).toEqual([1])
    expect(sheetsAt(JET, 2.6).map(({ time }) => time)).toEqual([2.5, 0.5])
    expect(sheetsAt(JET, 5.5).map(({ time }) => time)).toEqual([1.5])
    expect(sheetsAt(JET, 8)).toEqual([])
  })

  it('is drawn through its tip and its lip, thinned where it has more nodes than rows', () => {
    expect(drawnNodes(shape(1, 4, 2))).toEqual([2, 3, 4, 5])
    const thinned = drawnNodes(shape(1, 900, 30), 200)
    expect(thinned).toHaveLength(200)
    expect(thinned[0]).toBe(30)
    expect(thinned.at(-1)).toBe(929)
    expect(new Set(thinned).size).toBe(200)
  })
})

describe('the drawing of forming sheets', () => {
  it('writes the shapes of a time in place, turned about the axis, and only when they change', () => {
    const sheet = createJetSheet()
    sheet.setJet(JET)
    expect(sheet.show(1)).toBe(true)
    const attribute = sheet.surface.getAttribute('position')
    const { array, count } = attribute
    // Every vertex keeps its distance from the axis.
    for (let i = 0; i < 40; i += 1) expectClose(Math.hypot(attribute.getY(i), attribute.getZ(i)), 0.5, 1e-6)
    const one = sheet.surface.drawRange.count
    expect(sheet.strokes()).toHaveLength(2)
    const lines = sheet.strokes()
    sheet.show(1.2)
    expect(sheet.strokes()).toBe(lines)
    sheet.show(2.6)
    expect(sheet.surface.drawRange.count).toBe(2 * one)
    expect(sheet.strokes()).toHaveLength(4)
    // Four loose filaments of the older sheet, a point at each edge of the cut.
    expect(sheet.loose.drawRange.count).toBe(8)
    expect(sheet.surface.getAttribute('position').array).toBe(array)
    expect(sheet.surface.getAttribute('position').count).toBe(count)
  })

  it('is empty after the last release, and for a wake that starts from no jet', () => {
    const sheet = createJetSheet()
    sheet.setJet(JET)
    sheet.show(1)
    expect(sheet.show(20)).toBe(false)
    expect(sheet.surface.drawRange.count).toBe(0)
    expect(sheet.strokes()).toEqual([])
    sheet.setJet(null)
    expect(sheet.show(1)).toBe(false)
  })
})
