import { describe, expect, it } from 'vitest'
import { compileDrag, ittcFriction } from '../../../core/thruster'
import { expectClose, expectNear } from '../../support/close'

const drag = (input: Parameters<typeof compileDrag>[0], length: number | null = 1) =>
  compileDrag(input, 1000, 1e-6, length)

describe('drag', () => {
  // T5: ITTC 1957, 0.075/(7 - 2)^2 = 0.003 exactly.
  it('of the friction line at Reynolds number 1e7 is 0.0030000', () => {
    expectNear(ittcFriction(1e7), 0.003, 1e-15)
  })

  it('of an area is rho V^2/2 on it', () => {
    expectClose(drag({ kind: 'area', dragArea: 0.01 }).dragAt(2), 20, 1e-14)
  })

  it('of a hull is (1 + k) C_F on its wetted area', () => {
    const law = drag({ kind: 'hull', wettedArea: 1.5, formFactor: 0.2 })
    expectClose(law.dragAt(10), 0.5 * 1000 * 100 * 1.5 * 1.2 * 0.003, 1e-13)
  })

  it('of a hull holds its coefficient below Reynolds number 1e4, where the line has its pole', () => {
    const law = drag({ kind: 'hull', wettedArea: 1, formFactor: 0 })
    expectClose(ittcFriction(50), 0.075 / 4, 1e-14)
    expectClose(law.dragAt(0.001) / law.dragAt(0.0005), 4, 1e-13)
    expect(law.dragAt(0)).toBe(0)
  })

  it('of a table goes through its rows without overshoot, from nothing at rest', () => {
    const rows = [
      { speed: 0.1, drag: 0.2 },
      { speed: 0.2, drag: 0.9 },
      { speed: 0.4, drag: 1 },
    ]
    const law = drag({ kind: 'table', rows })
    for (const row of rows) expectClose(law.dragAt(row.speed), row.drag, 1e-14)
    expect(law.dragAt(0)).toBe(0)
    let before = 0
    for (let i = 1; i <= 400; i++) {
      const value = law.dragAt(i / 1000)
      expect(value).toBeGreaterThanOrEqual(before)
      before = value
    }
    expect(() => law.dragAt(0.41)).toThrow(/last row is at 0\.4 m\/s, got 0\.41 m\/s/)
  })

  it('refuses what cannot be a drag', () => {
    expect(() => drag({ kind: 'area', dragArea: 0 })).toThrow(/dragArea must be above 0 m2/)
    expect(() => drag({ kind: 'hull', wettedArea: 1, formFactor: 0.1 }, null)).toThrow(/length must be given/)
    expect(() => drag({ kind: 'table', rows: [{ speed: 1, drag: 1 }] })).toThrow(/at least 2 rows/)
    const falling = [
      { speed: 1, drag: 1 },
      { speed: 1, drag: 2 },
    ]
    expect(() => drag({ kind: 'table', rows: falling })).toThrow(/row 2 has 1 m\/s after 1 m\/s/)
  })
})
