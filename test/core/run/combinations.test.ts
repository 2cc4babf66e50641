import { describe, expect, it } from 'vitest'
import { examplePlan, MATRIX_DEFAULTS, setField, setTankRun, shownUnits } from '../../../core/plan'
import { runSheet } from '../../../core/report'
import { run } from '../../../core/run'
import { expectClose } from '../../support/close'

const SECTIONS = ['pulse', 'tankRun'] as const
const BASE = examplePlan('tank-day')

function withLevels(peaks: readonly number[]) {
  const drive = BASE.tankRun?.drive
  if (drive === undefined) throw new Error('no drive')
  const fields = [{ path: 'programme.peakSpeed', values: peaks }]
  return setTankRun(BASE, {
    drive: { ...drive, maxSpeed: 0.1 },
    matrix: { ...MATRIX_DEFAULTS, fields, repeats: 2 },
  })
}

async function computed(plan: typeof BASE, order: 'judged' | 'plain' = 'judged') {
  const { data, message } = await run(plan, { sections: SECTIONS, order })
  if (data === null || data.tankRun === null) throw new Error(message)
  return { data, tankRun: data.tankRun }
}

describe('the combinations of a run matrix', () => {
  it('are held against the drive, run by run', async () => {
    const plan = withLevels([0.1, 5])
    const { data, tankRun } = await computed(plan)
    // A piston of twice the exit's diameter moves at a quarter of the exit speed; ramps of 20 ms to 5 m/s take more than the stroke of
    // 62.5 mm, so that their share of sqrt(2 L / (U (t1 + t2))) of the peak is reached: a triangle of equal slopes.
    const reached = (5 / 4) * Math.sqrt((2 * 0.0625) / (5 * 0.04))
    expect(tankRun.matrix?.each.map(({ ok }) => ok)).toEqual([true, false])
    expectClose(tankRun.matrix?.each[0]?.pistonSpeed ?? NaN, 0.025, 1e-12)
    expectClose(tankRun.matrix?.each[1]?.pistonSpeed ?? NaN, reached, 1e-11)
    for (const { values, ok, reason } of tankRun.matrix?.runs ?? []) {
      expect(ok).toBe(values[0] === 0.1)
      if (!ok) expect(reason).toMatch(/Piston speed 0\.9882 m\/s is above the drive's 0\.1 m\/s/)
    }
    expect(data.cautions.find(({ id }) => id === 'tank-matrix-limits')?.text).toMatch(/^2 of the 4 runs in the order/)
    const sheet = runSheet({
      plan,
      result: tankRun,
      cautions: data.cautions,
      units: shownUnits({}),
      date: 'today',
      foot: 'foot',
    })
    const tables = sheet?.blocks.flatMap((block) => (block.kind === 'table' ? [block] : [])) ?? []
    const listed = tables.find(({ columns }) => columns[0]?.title === 'No.')
    expect(listed?.rows.map((row) => row.at(-1))).toEqual(['yes', 'NO'])
    const order = tables.at(-1)
    const place = order?.columns.findIndex(({ title }) => title === 'Can be made') ?? -1
    expect(order?.rows.filter((row) => row[place] === 'NO')).toHaveLength(2)
    expect(JSON.stringify(sheet?.blocks)).toContain("profile.csv is for the plan's own stroke and speed only")
  })

  it('arrive when a plan with those levels does, its rounding included', async () => {
    const { tankRun } = await computed(withLevels([0.1, 0.14]))
    const alone = await computed(setTankRun(setField(withLevels([0.1]), 'programme.peakSpeed', 0.14), { matrix: null }))
    const { arrivals, profile } = alone.tankRun
    const found = tankRun.matrix?.each[1]?.arrivals ?? []
    expect(found).toHaveLength(3)
    found.forEach(({ timeLow, timeHigh }, i) => {
      expectClose(timeLow ?? NaN, (arrivals[i]?.timeLow ?? NaN) + profile.rounding.delay, 1e-12)
      expectClose(timeHigh ?? NaN, (arrivals[i]?.timeHigh ?? NaN) + profile.rounding.delay, 1e-12)
    })
  })

  it('tell why one cannot be, and are left out where they are not asked for', async () => {
    const { tankRun } = await computed(withLevels([-1, 0.1]))
    expect(tankRun.matrix?.each[0]).toMatchObject({ ok: false, pistonSpeed: null, arrivals: null })
    expect(tankRun.matrix?.each[0]?.reason).toMatch(/programme\.peakSpeed must be/)
    expect((await computed(withLevels([0.1, 5]), 'plain')).tankRun.matrix?.each).toEqual([])
  })
})
