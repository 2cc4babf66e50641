import { describe, expect, it } from 'vitest'
import {
  CHOICES,
  FIELDS,
  setChoice,
  setField,
  setRows,
  setStrokeRatio,
  setUnit,
  validatePlan,
} from '../../../core/plan'
import { expectClose } from '../../support/close'
import { planOf } from '../../support/plans'

const ROWS = [
  { time: 0, speed: 0 },
  { time: 0.1, speed: 0.2 },
  { time: 0.3, speed: 0 },
]

describe('edits of a plan', () => {
  it('set one number and leave the old plan as it was', () => {
    const plan = planOf()
    const changed = setField(plan, 'nozzle.diameter', 0.04)
    expect(changed.nozzle.diameter).toBe(0.04)
    expect(plan.nozzle.diameter).toBe(0.03)
    expect(changed.water).toBe(plan.water)
  })

  it('reach every field and every choice', () => {
    const plan = planOf()
    for (const path of Object.keys(FIELDS) as (keyof typeof FIELDS)[]) {
      const [section = '', key = ''] = path.split('.')
      expect(
        (setField(plan, path, 0.0123) as unknown as Record<string, Record<string, unknown>>)[section]?.[key],
        path,
      ).toBe(0.0123)
    }
    for (const path of Object.keys(CHOICES) as (keyof typeof CHOICES)[]) {
      const [section = '', key = ''] = path.split('.')
      for (const word of Object.keys(CHOICES[path]))
        expect(
          (setChoice(plan, path, word) as unknown as Record<string, Record<string, unknown>>)[section]?.[key],
          path,
        ).toBe(word)
    }
  })

  it('do not check: what a value breaks is told by validatePlan, a table with a stroke of nothing included', () => {
    expect(validatePlan(setField(planOf(), 'programme.stroke', -1)).map((problem) => problem.field)).toEqual([
      'programme.stroke',
    ])
    const table = setRows(planOf(), ROWS)
    expect(validatePlan(setField(table, 'programme.stroke', -1)).map((problem) => problem.field)).toEqual([
      'programme.stroke',
    ])
  })

  it('stretch a table in time to another stroke and keep its speeds', () => {
    const table = setRows(planOf(), ROWS)
    expectClose(table.programme.stroke, 0.03, 1e-15, 'stroke of the rows')
    expect(table.programme.peakSpeed).toBe(0.2)
    const longer = setStrokeRatio(table, 2)
    expect(longer.programme.stroke).toBe(0.06)
    expect(longer.programme.rows.map((row) => ('speed' in row ? row.speed : null))).toEqual([0, 0.2, 0])
    expectClose(longer.programme.rows[2]?.time ?? 0, 0.6, 1e-15, 'end of the stretched table')
  })

  it('keep the rows when another shape is chosen, and let them rule again when the table comes back', () => {
    const away = setField(setChoice(setRows(planOf(), ROWS), 'programme.shape', 'half-sine'), 'programme.stroke', 0.9)
    expect(away.programme.rows).toEqual(ROWS)
    const back = setChoice(away, 'programme.shape', 'table')
    expectClose(back.programme.stroke, 0.03, 1e-15, 'stroke of the rows')
  })

  it('start given water from what the water was', () => {
    const given = setChoice(planOf(), 'water.kind', 'given').water
    expect(given.density).toBeCloseTo(998.2, 1)
    expect(given.kinematicViscosity).toBeCloseTo(1.003e-6, 8)
    expect(validatePlan(setChoice(planOf(), 'water.kind', 'given'))).toEqual([])
  })

  it('remember a shown unit', () => {
    expect(setUnit(planOf(), 'length', 'cm').view.units).toEqual({ length: 'cm' })
  })
})
