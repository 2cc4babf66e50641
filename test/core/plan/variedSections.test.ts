import { describe, expect, it } from 'vitest'
import {
  decodePlan,
  planDocument,
  quantityDefinition,
  setField,
  setHeld,
  setNumber,
  setSpread,
  setSweep,
  numberAt,
  canonicalInput,
} from '../../../core/plan'
import { documentOf, planOf } from '../../support/plans'
import { expectClose } from '../../support/close'

function refusals(parts: Readonly<Record<string, unknown>>): string {
  const reading = decodePlan(documentOf(parts))
  return reading.ok ? '' : reading.problems.map(({ message }) => message).join('\n')
}

const sweepOf = (...fields: unknown[]): Readonly<Record<string, unknown>> => ({ sweep: { fields } })

describe('the section sweep', () => {
  it('makes equal steps from ends and count, ends exact, and writes them back as given', () => {
    const plan = planOf(sweepOf({ path: 'nozzle.diameter', from: '20 mm', to: 0.04, count: 5 }))
    expect(plan.sweep?.fields).toEqual([
      { path: 'nozzle.diameter', values: [0.02, 0.025, 0.03, 0.035, 0.04], given: { from: 0.02, to: 0.04, count: 5 } },
    ])
    expect(planDocument(plan)['sweep']).toEqual({
      fields: [{ path: 'nozzle.diameter', from: 0.02, to: 0.04, count: 5 }],
      results: [],
    })
  })

  it('takes a list of values with units, and one step is where it starts', () => {
    const plan = planOf(
      sweepOf({ path: 'programme.stroke', values: ['5 cm', 0.06] }, { path: 'train.pulses', from: 3, to: 9, count: 1 }),
    )
    expect(plan.sweep?.fields.map(({ values }) => values)).toEqual([[0.05, 0.06], [3]])
    expect(plan.sweep?.fields[0]?.given).toBeNull()
  })

  it('names numbers in lists, and fields of sections the plan does not have yet', () => {
    const plan = planOf({
      wake: { stations: [0.1, 0.2], rings: [{ circulation: 0.01, radius: 0.02, coreRadius: 0.004 }] },
      ...sweepOf(
        { path: 'wake.stations.1', values: [0.3] },
        { path: 'wake.rings.0.centre.2', values: ['1 mm'] },
        { path: 'thruster.vehicle.speed', values: ['1 kn'] },
      ),
    })
    const set = (plan.sweep?.fields ?? []).reduce(
      (changed, { path, values }) => setNumber(changed, path, values[0] ?? Number.NaN),
      plan,
    )
    expect(set.wake?.stations).toEqual([0.1, 0.3])
    expect(set.wake?.rings[0]?.centre).toEqual([0, 0, 0.001])
    expectClose(set.thruster?.vehicle?.speed ?? 0, 1852 / 3600, 1e-15, 'one knot')
    expect(plan.wake?.stations).toEqual([0.1, 0.2])
  })

  it.each([
    [
      sweepOf({ path: 'nozzle.bore', values: [1] }),
      /sweep\.fields\.0\.path must be the dotted path .* got "nozzle\.bore"/,
    ],
    [sweepOf({ path: 'water.kind', values: [1] }), /sweep\.fields\.0\.path must be the dotted path/],
    [sweepOf({ path: '__proto__', values: [1] }), /sweep\.fields\.0\.path must be the dotted path/],
    [sweepOf({ path: 'spread.seed', values: [1] }), /sweep\.fields\.0\.path must be the dotted path/],
    [sweepOf({ path: 'wake.stations.3', values: [1] }), /names wake\.stations\.3, which this plan does not have/],
    [
      sweepOf({ path: 'nozzle.diameter', values: [0.02, -1] }),
      /sweep\.fields\.0\.values\.1 must be between .* got -1.m/,
    ],
    [
      sweepOf({ path: 'nozzle.diameter', from: 0.02, to: 50, count: 2 }),
      /sweep\.fields\.0\.to must be between .* got 50.m/,
    ],
    [
      sweepOf({ path: 'nozzle.diameter', from: 0.02, count: 2 }),
      /must give values, or from, to and count; it has no to/,
    ],
    [
      sweepOf({ path: 'nozzle.diameter', from: 0.02, to: 0.03, count: 2.5 }),
      /count must be a whole number between 1 and 100000, got 2\.5/,
    ],
    [sweepOf({ path: 'nozzle.diameter', from: 0.02, values: [0.03] }), /not both; it gives values and from/],
    [
      sweepOf({ path: 'nozzle.diameter', values: [0.02] }, { path: 'nozzle.diameter', values: [0.03] }),
      /fields\.1\.path must be a path that no field before it has/,
    ],
    [
      sweepOf({ path: 'train.pulses', from: 1, to: 4, count: 3 }),
      /whole numbers of train\.pulses; 3 values .* give 2\.5/,
    ],
    [
      sweepOf(
        { path: 'nozzle.diameter', from: 0.02, to: 0.03, count: 1000 },
        { path: 'programme.stroke', from: 0.02, to: 0.03, count: 101 },
      ),
      /sweep\.fields must make at most 100000 rows together, got 101000/,
    ],
    [{ sweep: { fields: [], results: [3] } }, /sweep\.results\.0 must be a dotted path of the summary/],
    [{ sweep: { fields: [7] } }, /sweep\.fields\.0 must be a field/],
    [{ sweep: { fields: 'all' } }, /sweep\.fields must be a list/],
  ])('refuses %j with field, value and limit', (parts, message) => {
    expect(refusals(parts)).toMatch(message)
  })

  it('refuses to set a number at a path the plan does not know', () => {
    expect(() => setNumber(planOf(), 'water.kind', 1)).toThrow(
      /path must be the dotted path of a number .* "water\.kind"/,
    )
    expect(quantityDefinition('wake.stations.01')).toBeNull()
    expect(quantityDefinition('constructor')).toBeNull()
  })

  it('is added, changed and taken out by edits', () => {
    const fields = [{ path: 'nozzle.diameter', values: [0.02], given: null }]
    const plan = setSweep(planOf(), { fields })
    expect(planDocument(plan)['sweep']).toEqual({ fields: [{ path: 'nozzle.diameter', values: [0.02] }], results: [] })
    expect(planDocument(setSweep(plan, null))['sweep']).toBeUndefined()
    expect(setField(plan, 'nozzle.diameter', 0.05).sweep).toBe(plan.sweep)
  })
})

describe('the section spread', () => {
  it('has 500 samples of seed 1 where it does not say', () => {
    expect(planOf({ spread: {} }).spread).toEqual({ relative: {}, absolute: {}, samples: 500, seed: 1 })
  })

  it('reads shares, and deviations in the unit of their field', () => {
    const plan = planOf({
      spread: {
        relative: { 'nozzle.diameter': '0.2 %' },
        absolute: { 'programme.stroke': '1 mm', 'water.temperatureCelsius': '9 °F' },
      },
    })
    expect(plan.spread?.relative).toEqual({ 'nozzle.diameter': 0.002 })
    expect(plan.spread?.absolute['programme.stroke']).toBe(0.001)
    // A difference of 9 degrees Fahrenheit is one of 5 kelvin; both ends of the difference round once, near 18.
    expectClose(plan.spread?.absolute['water.temperatureCelsius'] ?? 0, 5, 1e-14, 'difference of temperature')
    expect(refusals({ spread: { absolute: { 'water.temperatureCelsius': '0.5 K' } } })).toBe('')
  })

  it.each([
    [{ relative: { 'nozzle.bore': 0.1 } }, /spread\.relative must name numbers .* got "nozzle\.bore"/],
    [{ relative: { 'nozzle.diameter': 1.5 } }, /spread\.relative\.nozzle\.diameter must be between 0 and 1, got 1\.5/],
    [{ relative: { 'water.temperatureCelsius': 0.1 } }, /must be given in spread\.absolute, in kelvin/],
    [{ relative: { 'train.pulses': 0.1 } }, /must name a number that can scatter; train\.pulses is whole/],
    [{ absolute: { 'nozzle.diameter': -1 } }, /spread\.absolute\.nozzle\.diameter must be at least 0.m, got -1.m/],
    [{ absolute: { 'nozzle.diameter': '1 s' } }, /1.s is a time/],
    [
      { relative: { 'nozzle.diameter': 0.1 }, absolute: { 'nozzle.diameter': 0.1 } },
      /nozzle\.diameter must stand in spread\.relative or in spread\.absolute, not in both/,
    ],
    [{ relative: { 'wake.stations.0': 0.1 } }, /names wake\.stations\.0, which this plan does not have/],
    [{ samples: 1 }, /spread\.samples must be a whole number between 2 and 100000, got 1/],
    [{ seed: 0.5 }, /spread\.seed must be a whole number between 0 and 4294967295, got 0\.5/],
  ])('refuses %j with field, value and limit', (spread, message) => {
    expect(refusals({ spread })).toMatch(message)
  })

  it('loses a path that an edit takes out', () => {
    const plan = planOf({ spread: { relative: { 'nozzle.diameter': 0.1, 'programme.stroke': 0.1 }, kept: 1 } })
    expect(planDocument(setSpread(plan, { relative: { 'programme.stroke': 0.2 } }))['spread']).toEqual({
      relative: { 'programme.stroke': 0.2 },
      absolute: {},
      samples: 500,
      seed: 1,
      kept: 1,
    })
    expect(planDocument(setSpread(plan, null))['spread']).toBeUndefined()
  })
})

describe('held designs', () => {
  it('are none where the plan has none, and come back as they were', () => {
    expect(planOf().held).toEqual([])
    expect(planDocument(planOf())['held']).toBeUndefined()
    const held = [{ name: 'Wide', plan: { nozzle: { diameter: 0.05 } }, colour: 'blue' }]
    const plan = planOf({ held })
    expect(plan.held).toEqual([{ name: 'Wide', plan: { nozzle: { diameter: 0.05 } } }])
    expect(planDocument(plan)['held']).toEqual(held)
    expect(planDocument(setHeld(plan, []))['held']).toEqual([])
  })

  it('do not decide the results', () => {
    const plan = planOf()
    expect(canonicalInput(setHeld(plan, [{ name: 'A', plan: {} }]))).toBe(canonicalInput(plan))
  })

  it.each([
    [3, /held must be a list/],
    [[3], /held\.0 must be a held design \{ name, plan \}, got 3/],
    [[{ name: 3, plan: {} }], /held\.0 must be a held design/],
    [[{ name: 'A' }], /held\.0 must be a held design/],
  ])('are refused as %j', (held, message) => {
    expect(refusals({ held })).toMatch(message)
  })
})

describe('numberAt', () => {
  it('finds fields, items of lists, and nothing else', () => {
    const plan = planOf({ wake: { stations: [0.1] } })
    expect(numberAt(plan, 'nozzle.diameter')).toBe(0.03)
    expect(numberAt(plan, 'wake.stations.0')).toBe(0.1)
    expect(numberAt(plan, 'wake.stations.length')).toBeNull()
    expect(numberAt(plan, 'water.kind')).toBeNull()
    expect(numberAt(plan, 'thruster.count')).toBeNull()
  })
})
