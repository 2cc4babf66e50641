import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { examplePlan, setDesign, setTrain } from '../../../core/plan'
import { createJetCache, designOfPlan, run, thrusterMap, type ThrusterMapRequest } from '../../../core/run'
import { expectClose, expectNear } from '../../support/close'

const PLAN = examplePlan('survey-vehicle')
const REQUEST: ThrusterMapRequest = {
  x: { field: 'diameter', span: [0.03, 0.09] },
  y: { field: 'strokeRatio', span: [2, 6] },
  count: 25,
  pulsing: 'asked',
}

function mapOf(plan = PLAN, request: Partial<ThrusterMapRequest> = {}) {
  const made = thrusterMap(plan, { ...REQUEST, ...request }, createJetCache())
  if (made.status !== 'done') throw new Error(made.message)
  return made
}

describe('thrusterMap', () => {
  it.each(['asked', 'planned'] as const)(
    'leaves room to every limit exactly where its choice is feasible, pulsing as %s',
    (pulsing) => {
      const { map } = mapOf(PLAN, { pulsing })
      map.feasible.forEach((feasible, cell) => {
        const rooms = [...map.rooms.values()].map((room) => at(room, cell)).filter((room) => !Number.isNaN(room))
        // Sums that meet a limit exactly may differ in their last digits.
        expect(Math.min(...rooms) >= -1e-12).toBe(feasible === 1)
      })
    },
  )

  it('gives the figures of the plan itself at its own place, pulsing as planned', async () => {
    const { map, present } = mapOf(PLAN, {
      pulsing: 'planned',
      x: { field: 'diameter', span: [0.05, 0.06] },
      y: { field: 'strokeRatio', span: [4, 5] },
      count: 2,
    })
    const { data } = await run(PLAN, { sections: ['thruster'], sizing: 'off' })
    const result = data?.thruster?.result
    expect(present).toEqual(designOfPlan(PLAN, 'planned'))
    // The map holds the speeds of the duty points; its power does not depend on speed.
    expectClose(at(map.power, 0), result?.power.total ?? NaN, 1e-12)
    expectClose(at(map.thrust, 0), result?.duties[0]?.thrust ?? NaN, 1e-12)
  })

  it('is the same for a plan that was moved on it', () => {
    const moved = setDesign(PLAN, {
      diameter: 0.07,
      strokeRatio: 3,
      count: 2,
      frequency: 1 / 0.45,
      duration: Math.PI / 16,
    })
    const [before, after] = [mapOf().map, mapOf(moved).map]
    // Scaling there and back rounds in the last digits.
    before.power.forEach((power, cell) => expectNear(at(after.power, cell), power, 1e-9 * power))
  })

  it('answers with the field that gives no map', () => {
    expect(thrusterMap(setTrain(PLAN, null), REQUEST, createJetCache())).toMatchObject({
      status: 'failed',
      field: 'train.period',
    })
    const twice = { ...REQUEST, y: REQUEST.x }
    expect(thrusterMap(PLAN, twice, createJetCache())).toMatchObject({ status: 'failed', field: 'map' })
    const timed: ThrusterMapRequest = { ...REQUEST, x: { field: 'frequency', span: [1, 2] } }
    expect(thrusterMap(PLAN, timed, createJetCache())).toMatchObject({ status: 'failed', field: 'map' })
    expect(thrusterMap(examplePlan('bench-generator'), REQUEST, createJetCache()).status).toBe('failed')
  })
})
