import { describe, expect, it } from 'vitest'
import { examplePlan, setField, setJet, setThruster, setTitle } from '../../../core/plan'
import { samePulse, sameTankRun, sameThruster } from '../../../renderer/model/sameInputs'

const TANK = examplePlan('tank-day')
const VEHICLE = examplePlan('survey-vehicle')

describe('the same results of two plans', () => {
  it('stand where a starting jet is added that neither adopts, or the title changes', () => {
    for (const same of [samePulse, sameThruster, sameTankRun])
      for (const plan of [TANK, VEHICLE]) {
        expect(same(plan, setJet(plan, {}))).toBe(true)
        expect(same(plan, setTitle(plan, 'Another'))).toBe(true)
      }
  })

  it('do not stand where an adopted jet changes', () => {
    const adopted = { ...TANK, models: { ...TANK.models, formationNumber: 'computed' } } as const
    for (const same of [samePulse, sameThruster, sameTankRun]) expect(same(adopted, setJet(adopted, {}))).toBe(false)
  })

  it('do not stand where the stroke changes', () => {
    const other = setField(VEHICLE, 'programme.stroke', 0.05)
    for (const same of [samePulse, sameThruster, sameTankRun]) expect(same(VEHICLE, other)).toBe(false)
  })

  it('stand for the pulse where only the thruster changes', () => {
    const other = setThruster(VEHICLE, { count: 3 })
    expect(samePulse(VEHICLE, other)).toBe(true)
    expect(sameThruster(VEHICLE, other)).toBe(false)
  })
})
