import { describe, expect, it } from 'vitest'
import { planDocument, readPlan, startsFromJet } from '../../../core/plan'
import { documentOf, planOf } from '../../support/plans'

describe('wake.start', () => {
  it('is written and read back, and stands by default', () => {
    expect(planOf({ wake: {} }).wake?.start).toBe('matched')
    const plan = planOf({ wake: { start: 'jet' } })
    expect(planDocument(plan)['wake']).toMatchObject({ start: 'jet' })
    const again = readPlan(JSON.stringify(planDocument(plan)))
    expect(again.ok && again.plan.wake?.start).toBe('jet')
  })

  it('is refused with its words where it is neither', () => {
    const reading = readPlan(JSON.stringify(documentOf({ wake: { start: 'slug' } })))
    expect(reading.ok).toBe(false)
    const problem = reading.ok ? undefined : reading.problems[0]
    expect(problem?.field).toBe('wake.start')
    expect(problem?.message).toMatch(/matched.*jet/)
  })

  it('counts only for a train', () => {
    expect(startsFromJet(null)).toBe(false)
    expect(startsFromJet(planOf({ wake: { start: 'jet' } }).wake)).toBe(true)
    const rings = [{ circulation: 0.01, radius: 0.02, coreRadius: 0.004 }]
    expect(startsFromJet(planOf({ wake: { start: 'jet', rings } }).wake)).toBe(false)
  })
})
