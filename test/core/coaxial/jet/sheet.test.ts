import { describe, expect, it } from 'vitest'
import { at } from '../../../../core/base'
import { Sheet } from '../../../../core/coaxial/jet/sheet'
import { expectClose, expectNear } from '../../../support/close'

/** What merging has to keep. */
function sums(sheet: Sheet): { circulation: number; impulse: number; moment: number } {
  let [circulation, impulse, moment] = [0, 0, 0]
  for (let i = 0; i < sheet.count; i++) {
    const gamma = at(sheet.circulation, i)
    const area = gamma * at(sheet.r, i) ** 2
    circulation += gamma
    impulse += area
    moment += area * at(sheet.x, i)
  }
  return { circulation, impulse, moment }
}

/** A chain along a curve, its circulation growing evenly with the number of the node. */
function chain(
  count: number,
  delta: number,
  limit: number,
  place: (share: number) => readonly [number, number],
  shed: (share: number) => number = (share) => share,
): Sheet {
  const sheet = new Sheet({ delta, limit })
  for (let i = 1; i < count; i++) sheet.release(i)
  for (let i = 0; i < count; i++) {
    const share = i / (count - 1)
    const [x, r] = place(share)
    sheet.x[i] = x
    sheet.r[i] = r
    sheet.shed[i] = shed(share)
  }
  sheet.weigh()
  return sheet
}

const spiral = (share: number): readonly [number, number] => {
  const angle = 14 * share
  return [1 + 0.4 * (1 - 0.8 * share) * Math.cos(angle), 0.8 + 0.4 * (1 - 0.8 * share) * Math.sin(angle)]
}

describe('the shed sheet', () => {
  it('gives its nodes half of what was shed on either side, all of it together', () => {
    const sheet = chain(
      5,
      0.1,
      1000,
      (share) => [share, 0.5],
      (share) => share * share,
    )
    expectClose(sums(sheet).circulation, 1, 1e-15)
    expectClose(at(sheet.circulation, 2), (0.75 ** 2 - 0.25 ** 2) / 2, 1e-14)
  })

  it('puts midpoints where it has stretched, on the curve to third order, and keeps its circulation', () => {
    const error = (count: number): number => {
      const sheet = chain(count, 0.01, 5000, (share) => [Math.cos(3 * share), 2 + Math.sin(3 * share)])
      sheet.tend()
      expect(sheet.count).toBe(2 * count - 1)
      expectClose(sums(sheet).circulation, 1, 1e-14)
      let worst = 0
      // Away from the ends, where the slope is one-sided.
      for (let i = 4; i < sheet.count - 4; i++)
        worst = Math.max(worst, Math.abs(Math.hypot(at(sheet.x, i), at(sheet.r, i) - 2) - 1))
      return worst
    }
    // A cubic with slopes of second order: fourth order at the midpoint of an even chain.
    expectNear(Math.log2(error(41) / error(81)), 4, 0.2, 'order')
  })

  it('keeps circulation, impulse and its moment when the oldest filaments are merged', () => {
    const sheet = chain(900, 0.12, 600, spiral, (share) => Math.sin(5 * share))
    const before = sums(sheet)
    const lipX = at(sheet.x, sheet.lip)
    sheet.tend()
    expect(sheet.merged).toBeGreaterThan(100)
    expect(sheet.merges).toBe(1)
    const after = sums(sheet)
    // Rounding of sums over 900 values.
    expectClose(after.circulation, before.circulation, 1e-12, 'circulation')
    expectClose(after.impulse, before.impulse, 1e-12, 'impulse')
    expectClose(after.moment, before.moment, 1e-12, 'moment')
    expect(at(sheet.x, sheet.lip)).toBe(lipX)
    expect(sheet.looseCount).toBeGreaterThan(0)
  })

  it('merges no filaments of opposite sign: each sign keeps its circulation', () => {
    const sheet = chain(900, 0.12, 600, spiral, (share) => Math.sin(40 * share))
    const before = sheet.negativeCirculation()
    sheet.tend()
    // The node at the cut is split in two of the signs of its sides, which can only add to both signs.
    expectNear(sheet.negativeCirculation(), before, 40 / 900)
    expect(sheet.negativeCirculation()).toBeLessThanOrEqual(before + 1e-12)
  })

  it('grows beyond the room it began with', () => {
    const sheet = chain(2000, 0.5, 1000, (share) => [share, 1])
    expect(sheet.count).toBe(2000)
    expectClose(sums(sheet).circulation, 1, 1e-12)
  })
})
