import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { planDocument, readPlan, unknownKeys, writePlan, type Plan } from '../../../core/plan'
import { inProject } from '../../../build/scripts/root.mjs'

/** Files as they were written when version 1 was released; they never change. */
function frozen(name: string): string {
  return readFileSync(inProject(`test/core/plan/frozen/${name}.json`), 'utf8')
}

function read(text: string): Plan {
  const reading = readPlan(text)
  if (!reading.ok) throw new Error(reading.problems.map(({ message }) => message).join('\n'))
  return reading.plan
}

describe('a frozen plan with every section', () => {
  const plan = read(frozen('vehicle-and-tank-1'))
  const saved: unknown = JSON.parse(frozen('vehicle-and-tank-1.saved'))

  it('is saved as it was then: SI numbers, the same keys in the same order, what is unknown kept', () => {
    // Compared as text, so that the order of the keys counts.
    expect(JSON.stringify(planDocument(plan), null, 2)).toBe(JSON.stringify(saved, null, 2))
  })

  it('does not change when what was saved is read and saved again', () => {
    expect(writePlan(read(writePlan(plan)))).toBe(writePlan(plan))
  })

  it('tells the keys it does not know', () => {
    expect(unknownKeys(plan)).toEqual([
      'later',
      'thruster.vehicle.berth',
      'thruster.vehicle.drag.paint',
      'sweep.fields.1.why',
    ])
  })
})
