import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { availableSections, pulseOf, run } from '../../../core/run'
import { defaultPlan, setWake, validatePlan, type Plan } from '../../../core/plan'
import { waterProperties } from '../../../core/water'
import { duplicated, moved, nextRing, startByHand, startTrain } from '../../../renderer/model/wakeStart'

const PLAN = defaultPlan()
const PULSE = pulseOf(PLAN, waterProperties(PLAN.water))

async function marches(plan: Plan): Promise<void> {
  expect(validatePlan(plan)).toEqual([])
  expect(availableSections(plan)).toContain('wake')
  const { status, message, data } = await run(plan, { sections: ['wake'] })
  expect(status, message).toBe('done')
  expect(data?.wake?.wake.outputTimes.length).toBeGreaterThan(50)
}

describe('where a wake begins', () => {
  it('a train follows the pulse for as long as there is something to see', async () => {
    const plan = startTrain(PLAN, PULSE)
    expect(plan.train).toMatchObject({ pulses: 3 })
    expect(plan.train?.period).toBeGreaterThan(PULSE.duration)
    expect(plan.wake?.duration).toBeGreaterThan(3 * (plan.train?.period ?? Infinity))
    await marches(plan)
  })

  it('rings by hand are like the pulse’s ring, apart, and march', async () => {
    const plan = startByHand(PLAN, PULSE, [])
    const rings = plan.wake?.rings ?? []
    expect(rings).toHaveLength(2)
    expect(at(rings, 0).radius / (PULSE.ring?.radius ?? 1)).toBeCloseTo(1, 1)
    await marches(plan)
    await marches(startByHand(PLAN, null, []))
  })

  it('rings placed by hand come back after the train was followed', () => {
    const plan = startByHand(PLAN, PULSE, [])
    const rings = plan.wake?.rings ?? []
    const train = startTrain(plan, PULSE)
    expect(train.wake?.rings).toEqual([])
    expect(train.wake?.duration).toBe(plan.wake?.duration)
    expect(startByHand(train, PULSE, rings).wake?.rings).toBe(rings)
  })
})

describe('rows of a list of rings', () => {
  const rings = startByHand(PLAN, PULSE, []).wake?.rings ?? []

  it('a further ring never coincides with one that is there', async () => {
    const added = [...rings, nextRing(rings)]
    const more = duplicated(added, [0, 1])
    expect(more).toHaveLength(5)
    expect(new Set(more.map(({ centre }) => centre.join())).size).toBe(5)
    const { status, message } = await run(setWake(PLAN, { rings: more, duration: 0.1 }), { sections: ['wake'] })
    expect(status, message).toBe('done')
  })

  it('moves marked rows by one place', () => {
    expect(moved(['a', 'b', 'c', 'd'], [1, 2], -1)).toEqual(['b', 'c', 'a', 'd'])
    expect(moved(['a', 'b', 'c', 'd'], [1, 2], 1)).toEqual(['a', 'd', 'b', 'c'])
  })
})
