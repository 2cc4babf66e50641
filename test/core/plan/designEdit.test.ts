import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { examplePlan, setDesign, setRows, validatePlan, type Plan } from '../../../core/plan'
import { compileProgramme } from '../../../core/pulse'
import { run } from '../../../core/run'
import { expectClose } from '../../support/close'

async function analysed(plan: Plan) {
  const { data, message } = await run(plan, { sections: ['thruster'], sizing: 'off' })
  if (data?.thruster == null) throw new Error(message)
  return data.thruster.result
}

describe('setDesign', () => {
  const plan = examplePlan('survey-vehicle')
  const design = { diameter: 0.04, strokeRatio: 5, count: 3, frequency: 2, duration: 0.2, ejectShare: 0.45 }

  it('keeps the proportions of the nozzle and the shape of the programme', () => {
    const next = setDesign(plan, design)
    expectClose(next.nozzle.pistonDiameter, 0.08, 1e-12)
    expectClose(next.nozzle.length, 0.048, 1e-12)
    const { stroke, duration } = compileProgramme(next.programme)
    expectClose(stroke, 0.2, 1e-12)
    expectClose(duration, 0.2, 1e-12)
    expect(next.programme.shape).toBe('half-sine')
    expect(next.train).toEqual({ pulses: 6, period: 0.5 })
    expect([next.thruster?.count, next.thruster?.actuator.ejectShare]).toEqual([3, 0.45])
    expect(validatePlan(next)).toEqual([])
  })

  it('stretches a table in time and way', () => {
    const rows = [
      { time: 0, speed: 0 },
      { time: 0.1, speed: 1 },
      { time: 0.3, speed: 0 },
    ]
    const next = setDesign(setRows(plan, rows), design)
    const { stroke, duration } = compileProgramme(next.programme)
    expectClose(stroke, 0.2, 1e-12)
    expectClose(duration, 0.2, 1e-12)
    expect(validatePlan(next)).toEqual([])
  })

  it('makes a plan that gives what the candidate of a sizing promised', async () => {
    const { data } = await run(plan, { sections: ['thruster'] })
    const candidate = data?.thruster?.sizing?.candidates[0]
    if (candidate === undefined) throw new Error('not sized')
    const { design: found, points } = candidate
    for (const point of points) {
      const { strokeRatio, frequency, duration } = point
      const opened = setDesign(plan, { ...found, strokeRatio, frequency, duration })
      const result = await analysed(opened)
      // One law of thrust and drag: the duty point's speed is where they meet, to the tolerance of that root.
      expectClose(result.speed, point.speed, 1e-9)
      expectClose(result.meanThrust, point.thrust, 1e-9)
      expectClose(result.power.total, point.power.total, 1e-9)
      expect(result.limits.filter(({ name, ok }) => name !== 'thrust' && !ok)).toEqual([])
    }
    expect(at(points, 0).speed).toBe(0.5)
  }, 30_000)
})
