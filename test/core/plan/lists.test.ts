import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  ALL_LIST_KINDS,
  examplePlan,
  LIST_KINDS,
  mergeLists,
  NO_PARTS,
  planDocument,
  putIntoPlan,
  readLists,
  sampleLists,
  takeFromPlan,
  withoutPart,
  withPart,
  withPartNamed,
  writeLists,
  type Json,
  type ListEntry,
  type ListKind,
  type PartsLists,
} from '../../../core/plan'

const TUBE: ListEntry = { name: 'Tube', values: { shape: 'tube', diameter: 0.03, pistonDiameter: 0.06 } }

function file(change: Readonly<Record<string, unknown>> = {}): string {
  return JSON.stringify({ format: 'ringwright-lists', version: 1, ...change })
}

function firstProblem(text: string) {
  const reading = readLists(text)
  if (reading.ok) throw new Error('the lists were read')
  return reading.problems[0]
}

/** The part a plan's document holds. */
function partOf(plan: ReturnType<typeof examplePlan>, kind: ListKind): Json | undefined {
  return LIST_KINDS[kind].path
    .split('.')
    .reduce<Json | undefined>(
      (node, key) =>
        typeof node === 'object' && node !== null && !Array.isArray(node)
          ? Object.entries(node).find(([name]) => name === key)?.[1]
          : undefined,
      planDocument(plan),
    )
}

describe('reading parts lists', () => {
  it('reads what it writes, for the invented samples of every kind', () => {
    const samples = sampleLists()
    for (const kind of ALL_LIST_KINDS) expect(samples[kind].length).toBeGreaterThan(0)
    const text = writeLists(samples)
    expect(text.endsWith('}\n')).toBe(true)
    expect(readLists(text)).toEqual({ ok: true, lists: samples })
  })

  it('takes quantities with a unit and fills in what a plan would, kinds that are absent being empty', () => {
    const reading = readLists(file({ nozzles: [{ name: ' Tube ', values: { shape: 'tube', diameter: '30 mm' } }] }))
    if (!reading.ok) throw new Error(reading.problems[0]?.message)
    expect(reading.lists.nozzles).toMatchObject([{ name: 'Tube', values: { diameter: 0.03, pistonDiameter: 0.03 } }])
    expect(reading.lists.cameras).toEqual([])
  })

  it('keeps a key of a part that this version does not know', () => {
    const reading = readLists(file({ tanks: [{ name: 'A', values: { length: 1, glass: 'float' } }] }))
    if (!reading.ok) throw new Error(reading.problems[0]?.message)
    expect(reading.lists.tanks[0]?.values).toMatchObject({ length: 1, glass: 'float' })
  })

  it.each([
    ['not JSON', '{', /not valid JSON/],
    [
      'a plan',
      JSON.stringify({ format: 'ringwright-plan', version: 1 }),
      /format must be "ringwright-lists", got "ringwright-plan"/,
    ],
    ['no version', JSON.stringify({ format: 'ringwright-lists' }), /version must be a whole number from 1/],
    ['a newer version', file({ version: 2 }), /made by a newer version \(2\); this program reads up to 1/],
    ['a kind that is no list', file({ tanks: {} }), /tanks must be a list of at most 1000 parts/],
    ['a part without a name', file({ tanks: [{ name: ' ', values: {} }] }), /tanks\.0\.name must be a text/],
    ['a name that is too long', file({ tanks: [{ name: 'x'.repeat(121), values: {} }] }), /1 to 120 characters/],
    [
      'a name twice',
      file({
        tanks: [
          { name: 'A', values: {} },
          { name: 'A', values: {} },
        ],
      }),
      /"A" stands twice/,
    ],
    ['no values', file({ nozzles: [{ name: 'A' }] }), /nozzles\.0\.values must be an object of values/],
    ['a nozzle without a diameter', file({ nozzles: [{ name: 'A', values: {} }] }), /nozzles\.0\.values\.diameter/],
    [
      'a value past its limit',
      file({ cameras: [{ name: 'A', values: { window: 2 } }] }),
      /cameras\.0\.values\.window must be a whole number between 4 and 1024, got 2/,
    ],
    [
      'a value of the wrong dimension',
      file({ actuators: [{ name: 'A', values: { maxForce: '3 mm' } }] }),
      /actuators\.0\.values\.maxForce/,
    ],
  ])('refuses %s in a sentence with its place', (_, text, message) => {
    expect(firstProblem(text)?.message).toMatch(message)
  })

  it('refuses a file of more than 5 MB unread', () => {
    expect(firstProblem(' '.repeat(5 * 1024 * 1024 + 1))?.message).toMatch(/at most 5 MB/)
  })

  it('never throws, whatever the document holds', () => {
    fc.assert(
      fc.property(fc.jsonValue(), fc.constantFrom(...ALL_LIST_KINDS), (values, kind) => {
        expect(typeof readLists(file({ [kind]: [{ name: 'A', values }] })).ok).toBe('boolean')
        expect(typeof readLists(file({ [kind]: values })).ok).toBe('boolean')
      }),
      { numRuns: 60 },
    )
  })
})

describe('parts and plans', () => {
  const plans = { vehicle: examplePlan('survey-vehicle'), tank: examplePlan('tank-day') }
  const homes: readonly (readonly [ListKind, keyof typeof plans])[] = [
    ['nozzles', 'vehicle'],
    ['actuators', 'vehicle'],
    ['vehicles', 'vehicle'],
    ['tanks', 'tank'],
    ['cameras', 'tank'],
  ]

  it.each(homes)('%s: what is taken and put back is the same plan', (kind, home) => {
    const plan = plans[home]
    const entry = takeFromPlan(plan, kind, ' Mine ')
    if (entry === null) throw new Error('the example has no such part')
    expect(entry.name).toBe('Mine')
    const back = putIntoPlan(plan, kind, entry)
    expect(back === null ? null : planDocument(back)).toEqual(planDocument(plan))
  })

  it.each(homes)('%s: a sample is copied in and nothing else changes', (kind, home) => {
    const plan = plans[home]
    const entry = sampleLists()[kind].at(-1)
    if (entry === undefined) throw new Error('no sample')
    const next = putIntoPlan(plan, kind, entry)
    if (next === null) throw new Error('no place')
    expect(partOf(next, kind)).toEqual(entry.values)
    const [section = ''] = LIST_KINDS[kind].path.split('.')
    const others = Object.entries(planDocument(next)).filter(([key]) => key !== section)
    expect(planDocument(plan)).toMatchObject(Object.fromEntries(others))
  })

  it('has no place for an actuator, a vehicle, a tank or a camera where the plan has no such section', () => {
    const plan = examplePlan('bench-generator')
    const samples = sampleLists()
    for (const kind of ['actuators', 'vehicles', 'tanks', 'cameras'] as const) {
      const entry = samples[kind][0]
      if (entry === undefined) throw new Error('no sample')
      expect(putIntoPlan(plan, kind, entry)).toBeNull()
      expect(takeFromPlan(plan, kind, 'Mine')).toBeNull()
    }
    expect(takeFromPlan(plan, 'nozzles', '  ')).toBeNull()
    expect(takeFromPlan(examplePlan('bench-thruster'), 'vehicles', 'None')).toBeNull()
  })

  it('refuses a part that a plan would refuse', () => {
    expect(putIntoPlan(plans.tank, 'nozzles', { name: 'A', values: { diameter: -1 } })).toBeNull()
  })
})

describe('changing lists', () => {
  const lists: PartsLists = withPart(NO_PARTS, 'nozzles', TUBE)

  it('gives a name that is taken a number, in adding and in renaming', () => {
    const two = withPart(lists, 'nozzles', { ...TUBE, values: { ...TUBE.values, diameter: 0.04 } })
    expect(two.nozzles.map(({ name }) => name)).toEqual(['Tube', 'Tube (2)'])
    expect(withPartNamed(two, 'nozzles', 'Tube (2)', 'Tube').nozzles[1]?.name).toBe('Tube (2)')
    expect(withPartNamed(two, 'nozzles', 'Tube (2)', ' Wide tube ').nozzles[1]?.name).toBe('Wide tube')
    expect(withPartNamed(two, 'nozzles', 'Tube', '  ')).toBe(two)
    expect(withoutPart(two, 'nozzles', 'Tube').nozzles.map(({ name }) => name)).toEqual(['Tube (2)'])
  })

  it('merges: what both have stands once, another part under the same name gets a number', () => {
    const other: PartsLists = {
      ...NO_PARTS,
      nozzles: [TUBE, { name: 'Plate', values: { shape: 'orifice', diameter: 0.02 } }],
    }
    const clash: PartsLists = { ...NO_PARTS, nozzles: [{ ...TUBE, values: { ...TUBE.values, diameter: 0.05 } }] }
    expect(mergeLists(lists, other)).toMatchObject({ added: 1, renamed: 0 })
    const merged = mergeLists(lists, clash)
    expect(merged).toMatchObject({ added: 1, renamed: 1 })
    expect(merged.lists.nozzles.map(({ name }) => name)).toEqual(['Tube', 'Tube (2)'])
    // The same file once more brings nothing.
    expect(mergeLists(merged.lists, clash)).toMatchObject({ added: 0, renamed: 0 })
    expect(mergeLists(sampleLists(), sampleLists()).lists).toEqual(sampleLists())
  })
})
