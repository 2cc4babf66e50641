import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  EXAMPLES,
  examplePlan,
  unknownKeys,
  unknownKeysInWords,
  decodePlan,
  planDocument,
  readPlan,
  validatePlan,
  writePlan,
} from '../../../core/plan'
import { documentOf, planOf } from '../../support/plans'

function messagesOf(document: unknown): string {
  const reading = decodePlan(document)
  return reading.ok ? '' : reading.problems.map((problem) => problem.message).join('\n')
}

describe('readPlan', () => {
  it('reads a plan of the three needed sections and fills the defaults', () => {
    const plan = planOf()
    expect(plan.nozzle).toEqual({
      shape: 'tube',
      diameter: 0.03,
      pistonDiameter: 0.06,
      axisRatio: 1,
      exitProfile: 'uniform',
      contraction: null,
      radialRatio: 0,
      length: 0,
      lossCoefficient: 0,
    })
    expect(plan.models).toEqual({ overPressure: 'off', formationNumber: 'energyLimit' })
    expect(plan.water.atmosphericPressure).toBe(101325)
  })

  it('takes a text with a unit wherever a quantity is, and saves the number', () => {
    const plan = planOf({ nozzle: { diameter: '30 mm', pistonDiameter: '6 cm' } })
    expect(plan.nozzle.diameter).toBe(0.03)
    expect(writePlan(plan)).toContain('"diameter": 0.03,')
  })

  it('keeps keys it does not know, in the document and inside sections, when it saves', () => {
    const reading = decodePlan(
      documentOf({
        future: { a: [1, 2] },
        water: { kind: 'fresh', temperatureCelsius: 20, colour: 'green' },
        train: { pulses: 4, period: 1.5 },
      }),
    )
    if (!reading.ok) throw new Error('refused')
    const saved: unknown = JSON.parse(writePlan(reading.plan))
    expect(saved).toMatchObject({
      future: { a: [1, 2] },
      water: { colour: 'green' },
      train: { pulses: 4, period: 1.5 },
    })
  })

  it('writes the same text again after reading what it wrote', () => {
    const text = writePlan(planOf({ zeta: 1, notes: 'µ – “x”' }))
    const again = readPlan(text)
    if (!again.ok) throw new Error('refused')
    expect(writePlan(again.plan)).toBe(text)
    expect(text.endsWith('}\n')).toBe(true)
  })

  it('orders the sections as the contract lists them', () => {
    const keys = Object.keys(planDocument(planOf({ spread: {}, alien: 1, train: {} })))
    expect(keys).toEqual([
      'format',
      'version',
      'title',
      'notes',
      'water',
      'nozzle',
      'programme',
      'ambient',
      'models',
      'train',
      'spread',
      'view',
      'alien',
    ])
  })

  it.each([
    [
      'a stroke of nothing',
      { programme: { shape: 'rectangular', stroke: 0, peakSpeed: 0.2 } },
      /programme\.stroke must be above 0.m.*got 0.m/,
    ],
    ['a missing diameter', { nozzle: { shape: 'tube' } }, /nozzle\.diameter must be given/],
    [
      'a temperature above the range',
      { water: { kind: 'sea', temperatureCelsius: 55 } },
      /water\.temperatureCelsius must be between 0.°C and 40.°C, got 55.°C/,
    ],
    [
      'an unknown shape',
      { programme: { shape: 'saw', stroke: 1, peakSpeed: 1 } },
      /programme\.shape must be one of rectangular.*got "saw"/,
    ],
    [
      'a length in litres',
      { nozzle: { diameter: '12 mL' } },
      /nozzle\.diameter: Exit diameter needs a length such as 12 mm; 12.mL is a volume/,
    ],
    [
      'a radial ratio past the measurements',
      { nozzle: { diameter: 0.03, radialRatio: 0.5 } },
      /nozzle\.radialRatio must be between 0 and 0\.45, got 0\.5/,
    ],
    ['a section that is a list', { water: [] }, /water must be an object of values/],
    [
      'given water without its density',
      { water: { kind: 'given', kinematicViscosity: 1e-6 } },
      /water\.density must be given/,
    ],
  ])('refuses %s with field, value and limit', (_, parts, message) => {
    expect(messagesOf(documentOf(parts))).toMatch(message)
  })

  it('names every refusal at once', () => {
    const reading = decodePlan(
      documentOf({ nozzle: { diameter: -1 }, programme: { shape: 'rectangular', stroke: -1, peakSpeed: 0 } }),
    )
    expect(reading.ok ? [] : reading.problems.map((problem) => problem.field)).toEqual(
      expect.arrayContaining(['nozzle.diameter', 'programme.stroke', 'programme.peakSpeed']),
    )
  })

  it('refuses a plan of a newer version and names both numbers', () => {
    expect(messagesOf(documentOf({ version: 7 }))).toMatch(/newer version \(7\).*reads up to 1/)
  })

  it('refuses another format and text that is not JSON', () => {
    expect(messagesOf({ format: 'something' })).toMatch(/format must be "ringwright-plan", got "something"/)
    const reading = readPlan('{ "format": ')
    expect(reading.ok).toBe(false)
  })

  it('does without nozzle and programme where the wake has rings of its own', () => {
    const reading = decodePlan({
      format: 'ringwright-plan',
      version: 1,
      water: { kind: 'fresh' },
      wake: { rings: [{ circulation: 0.01, radius: 0.02, coreRadius: 0.004 }], duration: 0.1 },
    })
    if (!reading.ok) throw new Error('refused')
    expect(reading.plan.absent).toEqual(['nozzle', 'programme'])
    expect(planDocument(reading.plan)['nozzle']).toBeUndefined()
    expect(messagesOf({ format: 'ringwright-plan', version: 1, water: { kind: 'fresh' } })).toMatch(/section nozzle/)
  })

  it('lets a table of rows rule its stroke and peak, and names the row that is wrong', () => {
    const rows = [
      { time: 0, speed: 0 },
      { time: 0.1, speed: 0.2 },
      { time: 0.2, speed: 0 },
    ]
    const plan = planOf({ programme: { shape: 'table', rows, stroke: 9 } })
    expect(plan.programme.stroke).toBeCloseTo(0.02, 12)
    expect(plan.programme.peakSpeed).toBe(0.2)
    const wrong = [...rows.slice(0, 2), { time: 0.05, speed: 0 }]
    expect(messagesOf(documentOf({ programme: { shape: 'table', rows: wrong } }))).toMatch(/row 3/i)
    expect(messagesOf(documentOf({ programme: { shape: 'table', rows: rows.slice(0, 2) } }))).toMatch(/at least 3 rows/)
  })

  it('never throws, whatever JSON stands where a plan is expected', () => {
    fc.assert(
      fc.property(
        fc.jsonValue(),
        fc.constantFrom('water', 'nozzle', 'programme', 'ambient', 'models', 'view', 'title'),
        (value, key) => {
          const reading = decodePlan({ ...documentOf(), [key]: value })
          return reading.ok || reading.problems.every((problem) => problem.message.length > 10)
        },
      ),
      { numRuns: 500 },
    )
    fc.assert(fc.property(fc.string(), (text) => typeof readPlan(text).ok === 'boolean'))
  })

  it('is not fooled by keys that mean something to the language', () => {
    const text = JSON.stringify(documentOf()).replace('{', '{"__proto__":{"polluted":1},')
    const reading = readPlan(text)
    expect(reading.ok).toBe(true)
    expect(Object.prototype).not.toHaveProperty('polluted')
  })
})

describe('unknownKeys', () => {
  it('names misspelt fields and sections nobody knows, and none of a plan this version knows or later ones will', () => {
    const plan = planOf({
      programme: { shape: 'trapezoid', stroke: 0.096, peakSpeed: 0.2, riseTme: 5 },
      water: { kind: 'given', density: 1000, kinematicViscosity: 1e-6, vapourPressure: 2000, colour: 'green' },
      nozle: {},
      thruster: { count: 1 },
      wake: { duration: 1, steps: 3 },
    })
    expect(unknownKeys(plan)).toEqual(['nozle', 'water.colour', 'programme.riseTme', 'wake.steps'])
    expect(unknownKeysInWords(plan)).toMatch(
      /kept and not read: nozle, water\.colour, programme\.riseTme, wake\.steps\./,
    )
    expect(unknownKeysInWords(planOf())).toBeNull()
  })

  it('finds none in any example', () => {
    for (const { id } of EXAMPLES) expect(unknownKeys(examplePlan(id)), id).toEqual([])
  })
})

describe('validatePlan', () => {
  it('judges an edited plan by the decoder that reads files', () => {
    const plan = planOf()
    expect(validatePlan(plan)).toEqual([])
    const problems = validatePlan({ ...plan, nozzle: { ...plan.nozzle, diameter: 50 } })
    expect(problems.map((problem) => problem.field)).toEqual(['nozzle.diameter'])
    expect(problems[0]?.message).toMatch(/at most|between/)
  })
})
