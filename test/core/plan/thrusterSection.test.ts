import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  canonicalInput,
  decodePlan,
  numberAt,
  planDocument,
  setChoice,
  setField,
  setThruster,
  THRUSTER_DEFAULTS,
  validatePlan,
  writePlan,
} from '../../../core/plan'
import { documentOf, planOf } from '../../support/plans'

const AREA = { kind: 'area', dragArea: 0.01 }

function refusals(thruster: unknown): string {
  const reading = decodePlan(documentOf({ thruster }))
  return reading.ok ? '' : reading.problems.map(({ message }) => message).join('\n')
}

describe('the section thruster', () => {
  it('is null where a plan has none, and is not written', () => {
    expect(planOf().thruster).toBeNull()
    expect(planDocument(planOf())['thruster']).toBeUndefined()
  })

  it('is one thruster on a bench where it says nothing', () => {
    expect(planOf({ thruster: {} }).thruster).toEqual(THRUSTER_DEFAULTS)
    expect(THRUSTER_DEFAULTS).toMatchObject({
      count: 1,
      vehicle: null,
      actuator: { efficiency: 1, ejectShare: 0.5, valveLag: 0 },
      intake: { recoveredShare: 0, lossCoefficient: 0.5 },
      target: [],
      search: null,
    })
  })

  it('reads texts with units wherever a number is', () => {
    const plan = planOf({
      thruster: {
        cant: '30 deg',
        energyStore: '1 kWh',
        vehicle: {
          speed: '2 kn',
          drag: {
            kind: 'table',
            rows: [
              { speed: 0, drag: 0 },
              { speed: '1 m/s', drag: '0.5 kN' },
            ],
          },
        },
        actuator: { maxAcceleration: '200 cm/s^2', valveLag: '5 ms' },
        search: { frequency: ['30 rpm', '120 1/min'] },
      },
    })
    expect(plan.thruster?.cant).toBe(Math.PI / 6)
    expect(plan.thruster?.energyStore).toBe(3600000)
    // 2 x 1852 m / 3600 s.
    expect(plan.thruster?.vehicle?.speed).toBe(3704 / 3600)
    expect(plan.thruster?.vehicle?.drag).toEqual({
      kind: 'table',
      rows: [
        { speed: 0, drag: 0 },
        { speed: 1, drag: 500 },
      ],
    })
    expect(plan.thruster?.actuator).toMatchObject({ maxAcceleration: 2, valveLag: 0.005 })
    expect(plan.thruster?.search?.frequency).toEqual([0.5, 2])
  })

  it.each([
    ['nothing', null, []],
    ['one speed', { speed: 0.5 }, [{ speed: 0.5, share: 1 }]],
    ['one thrust', { thrust: '20 mN' }, [{ thrust: 0.02, share: 1 }]],
    [
      'a list without shares',
      [{ speed: 0.5 }, { thrust: 1 }],
      [
        { speed: 0.5, share: 0.5 },
        { thrust: 1, share: 0.5 },
      ],
    ],
    [
      'a list with shares',
      [
        { speed: 0.5, share: '80 %' },
        { speed: 1, share: 0.2 },
      ],
      [
        { speed: 0.5, share: 0.8 },
        { speed: 1, share: 0.2 },
      ],
    ],
  ])('takes as target %s', (_, target, points) => {
    const plan = planOf({ thruster: { vehicle: { drag: AREA }, target } })
    expect(plan.thruster?.target).toEqual(points)
    expect(planOf(planDocument(plan)).thruster?.target).toEqual(points)
  })

  it.each([
    [{ count: 1.5 }, /thruster\.count must be a whole number between 1 and 100, got 1\.5/],
    [{ cant: '90 deg' }, /thruster\.cant must be between -1\.55.*rad and 1\.55.*rad, got 1\.57.*rad/],
    [{ target: { speed: 1 } }, /thruster\.vehicle\.drag must be given where thruster\.target has a speed/],
    [{ vehicle: [] }, /thruster\.vehicle must be an object of values/],
    [{ vehicle: { speed: null } }, /thruster\.vehicle\.drag must be given where thruster\.vehicle\.speed is not/],
    [{ vehicle: { drag: { kind: 'area' } } }, /thruster\.vehicle\.drag\.dragArea must be given/],
    [{ vehicle: { drag: { dragArea: 1 } } }, /drag\.kind must be one of area, hull, table, got nothing/],
    [{ vehicle: { drag: { kind: 'hull', wettedArea: 1 } } }, /thruster\.vehicle\.length must be given where .* hull/],
    [{ vehicle: { mass: -1, drag: AREA } }, /thruster\.vehicle\.mass must be above 0.kg.*got -1.kg/],
    [
      { vehicle: { mass: '3 m', drag: AREA } },
      /thruster\.vehicle\.mass: Mass needs a mass such as 2 kg; 3.m is a length/,
    ],
    [{ vehicle: { drag: { kind: 'table', rows: [{ speed: 0, drag: 0 }] } } }, /rows must have at least 2 rows, got 1/],
    [
      {
        vehicle: {
          drag: {
            kind: 'table',
            rows: [
              { speed: 1, drag: 1 },
              { speed: 1, drag: 2 },
            ],
          },
        },
      },
      /rows\.1\.speed must be above 1 m\/s, the speed of the row before, got 1/,
    ],
    [
      { vehicle: { drag: { kind: 'table', rows: [{ speed: 0 }, { speed: 1, drag: 2 }] } } },
      /thruster\.vehicle\.drag\.rows\.0\.drag must be given/,
    ],
    [{ actuator: { efficiency: 1.1 } }, /thruster\.actuator\.efficiency must be above 0 and at most 1, got 1\.1/],
    [{ target: 3 }, /thruster\.target must be a duty point/],
    [{ target: {} }, /thruster\.target must give a speed or a thrust, one of the two; it gives neither/],
    [{ target: [{ speed: 1, thrust: 1 }] }, /thruster\.target\.0 must give a speed or a thrust.*it gives both/],
    [
      { search: { diameter: [0.1, 0.02] } },
      /thruster\.search\.diameter must run from low to high, got 0\.1.m before 0\.02.m/,
    ],
    [{ search: { diameter: 0.1 } }, /thruster\.search\.diameter must be a low and a high end/],
    [{ search: { count: [1, 2.5] } }, /thruster\.search\.count\.1 must be a whole number between 1 and 100, got 2\.5/],
    [{ search: { count: [1, null] } }, /thruster\.search\.count\.1 must be given/],
    [{ search: { stock: { diameters: [0.02, -1] } } }, /stock\.diameters\.1 must be between .* got -1.m/],
    [{ search: { goal: 'speed' } }, /thruster\.search\.goal must be one of power, thrust, got "speed"/],
  ])('refuses %j with field, value and limit', (thruster, message) => {
    expect(refusals(thruster)).toMatch(message)
  })

  it('does not need a period: without one the run tells it', () => {
    expect(refusals({ count: 2 })).toBe('')
  })

  it('never throws, whatever JSON stands at any key of it', () => {
    const keys = [...Object.keys(THRUSTER_DEFAULTS), 'vehicle.drag', 'search.diameter', 'search.stock']
    fc.assert(
      fc.property(fc.jsonValue(), fc.constantFrom(...keys), (value, key) => {
        const [first = '', second] = key.split('.')
        const reading = decodePlan(
          documentOf({ thruster: { [first]: second === undefined ? value : { [second]: value } } }),
        )
        return reading.ok || reading.problems.every(({ field, message }) => field !== '' && message.length > 10)
      }),
      { numRuns: 500 },
    )
  })

  it('starts from its defaults when one of its numbers is set', () => {
    const plan = planOf()
    expect(setField(plan, 'thruster.actuator.maxForce', 12).thruster).toEqual({
      ...THRUSTER_DEFAULTS,
      actuator: { ...THRUSTER_DEFAULTS.actuator, maxForce: 12 },
    })
    expect(setField(plan, 'thruster.vehicle.speed', 0.4).thruster?.vehicle).toMatchObject({ speed: 0.4, drag: AREA })
    expect(setField(plan, 'thruster.search.diameter.1', 0.2).thruster?.search?.diameter).toEqual([0.01, 0.2])
    expect(setField(plan, 'thruster.search.ejectShare.0', 0.3).thruster?.search?.ejectShare).toEqual([0.3, 0.3])
    expect(plan.thruster).toBeNull()
  })

  it('shares what did not change with the plan before', () => {
    const plan = planOf({ thruster: { vehicle: { speed: 1 } } })
    const changed = setField(plan, 'thruster.vehicle.mass', 4)
    expect(changed.thruster?.actuator).toBe(plan.thruster?.actuator)
    expect(plan.thruster?.vehicle?.mass).toBeNull()
  })

  it('becomes the kind of drag whose number is set or that is chosen, and drops what another kind needed', () => {
    const plan = planOf({ thruster: { vehicle: { length: 1, drag: { ...AREA, colour: 'red' } } } })
    const hull = setField(plan, 'thruster.vehicle.drag.wettedArea', 2)
    expect(hull.thruster?.vehicle?.drag).toEqual({ kind: 'hull', wettedArea: 2, formFactor: 0.2 })
    expect(planDocument(hull)).toMatchObject({ thruster: { vehicle: { drag: { kind: 'hull', colour: 'red' } } } })
    expect(writePlan(hull)).not.toContain('dragArea')
    const table = setChoice(hull, 'thruster.vehicle.drag.kind', 'table')
    expect(validatePlan(table)).toEqual([])
    expect(setChoice(table, 'thruster.vehicle.drag.kind', 'table')).toEqual(table)
  })

  it('is changed and taken out by edits, and decides the results', () => {
    const plan = setThruster(planOf(), { count: 3 })
    expect(plan.thruster).toEqual({ ...THRUSTER_DEFAULTS, count: 3 })
    expect(canonicalInput(plan)).not.toBe(canonicalInput(planOf()))
    expect(planDocument(setThruster(planOf({ thruster: {} }), null))['thruster']).toBeUndefined()
  })

  it('reads its duty point by either of the two paths', () => {
    const plan = setField(
      planOf({ thruster: { vehicle: { drag: AREA }, target: [{ speed: 1, share: 0.3 }] } }),
      'thruster.target.thrust',
      2,
    )
    expect(plan.thruster?.target).toEqual([{ thrust: 2, share: 0.3 }])
    expect(numberAt(plan, 'thruster.target.thrust')).toBe(2)
    expect(numberAt(plan, 'thruster.target.0.thrust')).toBe(2)
    expect(numberAt(plan, 'thruster.target.speed')).toBeNull()
  })
})
