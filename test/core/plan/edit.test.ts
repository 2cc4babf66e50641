import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  CHOICES,
  fieldDefinition,
  FIELDS,
  numberAt,
  readPlan,
  setChoice,
  setField,
  setRows,
  setStrokeRatio,
  setUnit,
  validatePlan,
  writePlan,
  type FieldPath,
} from '../../../core/plan'
import { expectClose } from '../../support/close'
import { planOf } from '../../support/plans'

const ROWS = [
  { time: 0, speed: 0 },
  { time: 0.1, speed: 0.2 },
  { time: 0.3, speed: 0 },
]

/** A vehicle whose hull can be judged, so that any one number may change. */
const BEGUN = planOf({ thruster: { vehicle: { length: 2, drag: { kind: 'area', dragArea: 1 } }, search: {} } })

/** Fields of the sections of vehicle and tank that need no other beside them: no end of a span, no depth that must hold another. */
function isFree(path: FieldPath): boolean {
  return /^(?:thruster|tankRun|spread)\./u.test(path) && !/search\.\w+\.\d$|tank\.depth$|camera\.pixels/u.test(path)
}

function insideOf(path: FieldPath): fc.Arbitrary<number> {
  const { min, max = 1e6, above, whole } = fieldDefinition(path)
  if (whole === true) return fc.integer({ min: min ?? 0, max })
  const from = above === undefined ? (min ?? -max) : above + max * 1e-6
  // A file knows no minus zero.
  return fc.double({ min: from, max, noNaN: true, noDefaultInfinity: true }).map((value) => (value === 0 ? 0 : value))
}

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
    for (const path of Object.keys(FIELDS) as (keyof typeof FIELDS)[])
      expect(numberAt(setField(plan, path, 0.0123), path), path).toBe(0.0123)
    for (const path of Object.keys(CHOICES) as (keyof typeof CHOICES)[])
      for (const word of Object.keys(CHOICES[path])) {
        const changed: unknown = setChoice(plan, path, word)
        const value = path.split('.').reduce((held, key) => (held as Record<string, unknown>)[key], changed)
        expect(value, path).toBe(word)
      }
  })

  it('keep every number that is set inside its limits through a save', () => {
    const paths = (Object.keys(FIELDS) as (keyof typeof FIELDS)[]).filter(isFree)
    const edit = fc.constantFrom(...paths).chain((path) => insideOf(path).map((value) => ({ path, value })))
    fc.assert(
      fc.property(fc.array(edit, { maxLength: 12 }), (edits) => {
        const plan = edits.reduce((changed, { path, value }) => setField(changed, path, value), BEGUN)
        const reading = readPlan(writePlan(plan))
        if (!reading.ok) throw new Error(reading.problems.map(({ message }) => message).join('\n'))
        expect(reading.plan.thruster).toEqual(plan.thruster)
        expect(reading.plan.tankRun).toEqual(plan.tankRun)
        expect(reading.plan.spread).toEqual(plan.spread)
        expect(writePlan(reading.plan)).toBe(writePlan(plan))
      }),
    )
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
