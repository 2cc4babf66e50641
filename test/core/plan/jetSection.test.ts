import { describe, expect, it } from 'vitest'
import {
  canonicalInput,
  decodePlan,
  planDocument,
  readPlan,
  setField,
  setJet,
  unknownKeys,
  validatePlan,
  writePlan,
} from '../../../core/plan'
import { documentOf, planOf } from '../../support/plans'

function fieldsRefused(jet: unknown): readonly string[] {
  const reading = decodePlan(documentOf({ jet }))
  return reading.ok ? [] : reading.problems.map((problem) => problem.message)
}

describe('the section jet', () => {
  it('is null where a plan has none, and is not written', () => {
    const plan = planOf()
    expect(plan.jet).toBeNull()
    expect(planDocument(plan)['jet']).toBeUndefined()
  })

  it('has three smoothing lengths and growing cores where it does not say', () => {
    expect(planOf({ jet: {} }).jet).toEqual({ ensemble: true, coreGrowth: true, delta: null })
  })

  it('comes back from the text it was written to, what is unknown in it included', () => {
    const plan = planOf({ jet: { ensemble: false, coreGrowth: false, delta: 0.05, shade: 'blue' } })
    const again = readPlan(writePlan(plan))
    if (!again.ok) throw new Error('refused')
    expect(again.plan.jet).toEqual({ ensemble: false, coreGrowth: false, delta: 0.05 })
    expect(planDocument(again.plan)['jet']).toEqual({ ensemble: false, coreGrowth: false, delta: 0.05, shade: 'blue' })
    expect(unknownKeys(again.plan)).toEqual(['jet.shade'])
    expect(writePlan(again.plan)).toBe(writePlan(plan))
  })

  it.each([
    [{ delta: 0.01 }, /jet\.delta must be between 0\.03 and 0\.2, got 0\.01/],
    [{ delta: 0.3 }, /jet\.delta must be between 0\.03 and 0\.2, got 0\.3/],
    [{ ensemble: 'yes' }, /jet\.ensemble must be true or false, got "yes"/],
    [{ coreGrowth: 1 }, /jet\.coreGrowth must be true or false, got 1/],
    [[], /jet must be an object of values/],
  ])('refuses %j with field, value and limit', (jet, message) => {
    expect(fieldsRefused(jet).join('\n')).toMatch(message)
  })

  it('is added, changed and taken out by edits', () => {
    const plan = planOf()
    const added = setJet(plan, { ensemble: false })
    expect(added.jet).toEqual({ ensemble: false, coreGrowth: true, delta: null })
    expect(setJet(added, { delta: 0.08 }).jet).toEqual({ ensemble: false, coreGrowth: true, delta: 0.08 })
    expect(setField(plan, 'jet.delta', 0.1).jet).toEqual({ ensemble: true, coreGrowth: true, delta: 0.1 })
    expect(validatePlan(setField(plan, 'jet.delta', 0.9)).map(({ field }) => field)).toEqual(['jet.delta'])
    expect(planDocument(setJet(planOf({ jet: {} }), null))['jet']).toBeUndefined()
  })

  it('is part of what decides the results', () => {
    const plan = planOf()
    expect(canonicalInput(setJet(plan, {}))).not.toBe(canonicalInput(plan))
    expect(canonicalInput(setJet(plan, { delta: 0.05 }))).not.toBe(canonicalInput(setJet(plan, {})))
  })
})
