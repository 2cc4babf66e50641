import { describe, expect, it } from 'vitest'
import { defaultPlan, setChoice } from '../../../../core/plan'
import { pulseOf } from '../../../../core/run'
import { waterProperties } from '../../../../core/water'
import { rulerModel } from '../../../../renderer/parts/ruler/rulerModel'
import { jetAt } from '../../../core/report/jets'

const JET = {
  formationNumber: 4.12,
  formationNumberLow: 3.86,
  formationNumberHigh: 4.51,
  circulationBeyondSlug: 0,
  impulseBeyondSlug: 0,
  energyBeyondSlug: 0,
}

describe('the computed tick', () => {
  const plan = setChoice(defaultPlan(), 'models.formationNumber', 'computed')
  const pulse = pulseOf(plan, waterProperties(plan.water), JET)
  const tick = (formation: Parameters<typeof rulerModel>[2]) =>
    rulerModel(plan, pulse, formation).estimates.find(({ id }) => id === 'computed')

  it('has its range and one decimal, and is adopted where the plan says so', async () => {
    const formation = { ...(await jetAt(2, 0.2)), ...JET }
    const found = tick(formation)
    expect(found).toMatchObject({ text: 'computed 4.1 (3.9 to 4.5)', adopted: true })
    expect(found?.low).toBeCloseTo(3.86, 12)
    expect(found?.high).toBeCloseTo(4.51, 12)
  })

  it('stands alone where the runs behind it are not at hand, or are one', async () => {
    expect(tick(null)).toMatchObject({ text: 'computed 4.1', low: null })
    const one = { ...(await jetAt(2, 0.2)), ...JET, formationNumberLow: 4.12, formationNumberHigh: 4.12 }
    expect(tick(one)).toMatchObject({ text: 'computed 4.1', high: null })
  })
})
