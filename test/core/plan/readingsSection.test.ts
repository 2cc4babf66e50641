import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  decodePlan,
  numberAt,
  planDocument,
  readPlan,
  READINGS_DEFAULTS,
  setField,
  setReadings,
  unknownKeys,
  validatePlan,
  writePlan,
  type Plan,
} from '../../../core/plan'
import { forceLog } from '../../../core/tank'
import { documentOf, planOf } from '../../support/plans'

function refusals(readings: unknown): string {
  const reading = decodePlan(documentOf({ readings }))
  return reading.ok ? '' : reading.problems.map(({ message }) => message).join('\n')
}

function again(plan: Plan): Plan {
  const reading = readPlan(writePlan(plan))
  if (!reading.ok) throw new Error(reading.problems.map(({ message }) => message).join('\n'))
  return reading.plan
}

describe('the section readings', () => {
  it('is null where a plan has none, and is not written', () => {
    expect(planOf().readings).toBeNull()
    expect(planDocument(planOf())['readings']).toBeUndefined()
    expect(planOf({ readings: {} }).readings).toEqual(READINGS_DEFAULTS)
  })

  it('reads the rows of the contract, quantities with units included, and writes only what they hold', () => {
    const rows = [
      { run: '1', time: 0.2, x: 0.05, radius: 0.019, circulation: null, sigmaX: null },
      { run: 2, time: '300 ms', x: '60 mm' },
    ]
    const plan = planOf({ readings: { rows, force: [], fit: ['circulation', 'radius'] } })
    expect(plan.readings?.rows).toEqual([
      { ...NONE, run: '1', time: 0.2, x: 0.05, radius: 0.019 },
      { ...NONE, run: '2', time: 0.3, x: 0.06 },
    ])
    expect(plan.readings?.fit).toEqual(['circulation', 'radius'])
    expect(planDocument(plan)['readings']).toEqual({
      rows: [
        { run: '1', time: 0.2, x: 0.05, radius: 0.019 },
        { run: '2', time: 0.3, x: 0.06 },
      ],
      force: [],
      fit: ['circulation', 'radius'],
    })
    expect(unknownKeys(plan)).toEqual([])
  })

  it('keeps everything through a file: calibration, logs, sources, frames, resonance, unknown keys', () => {
    const plan = planOf({
      readings: {
        rows: [{ run: 'a', time: 1, circulation: '10 cm²/s', sigmaCirculation: 1e-5, lamp: 'red' }],
        force: [
          { time: 0, force: '1 mN' },
          { time: 0.5, force: 2 },
        ],
        piston: [
          { time: 0, position: 0 },
          { time: '0.5 s', position: '10 mm' },
        ],
        calibration: { timeOffset: '5 ms', lengthScale: 0.0001 },
        sources: [
          { name: 'a.csv', hash: 'ab12', kind: 'rows', columns: [{ heading: 't (s)', role: 'time', unit: 's' }] },
        ],
        fields: { frames: [{ name: 'b1.csv', time: 0.1 }], hash: 'cd34' },
        standResonance: '40 Hz',
      },
    })
    expect(plan.readings).toMatchObject({
      calibration: { timeOffset: 0.005, lengthOffset: 0, lengthScale: 0.0001 },
      piston: [
        { time: 0, position: 0 },
        { time: 0.5, position: 0.01 },
      ],
      standResonance: 40,
    })
    expect(plan.readings?.force).toEqual(forceLog([0, 0.5], [0.001, 2]))
    expect(again(plan).readings).toEqual(plan.readings)
    expect(writePlan(again(plan))).toBe(writePlan(plan))
    expect(unknownKeys(plan)).toEqual(['readings.rows.0.lamp'])
    expect(numberAt(plan, 'readings.rows.0.circulation')).toBe(0.001)
    expect(numberAt(plan, 'readings.calibration.timeOffset')).toBe(0.005)
  })

  it.each([
    [{ rows: [{ run: '1', x: 1 }] }, /rows\.0\.time must be given/],
    [{ rows: [{ time: 1 }] }, /rows\.0 must be a row with x, radius or circulation/],
    [{ rows: [{ time: 1, radius: 0 }] }, /rows\.0\.radius must be above 0.m, got 0.m/],
    [{ rows: [{ time: 1, x: 0.1, sigmaX: -1 }] }, /rows\.0\.sigmaX must be above 0.m/],
    [{ rows: [{ time: 1, x: '3 mL' }] }, /rows\.0\.x: Place needs a length.*volume/],
    [{ rows: [{ run: {}, time: 1, x: 1 }] }, /rows\.0\.run must be the name of a run/],
    [
      {
        force: [
          { time: 1, force: 1 },
          { time: 1, force: 2 },
        ],
      },
      /force must be at rising times: sample 2 at 1 s/,
    ],
    [{ force: [{ time: [0, 1], force: [1] }] }, /force\.0\.time must be a list of 1 times/],
    [{ force: [{ start: 0, step: 1, force: [1, null] }] }, /force\.0\.force\.1 must be a number in SI units/],
    [{ force: [3] }, /force\.0 must be a sample/],
    [
      {
        piston: [
          { time: 0, speed: 0 },
          { time: 1, position: 1 },
        ],
      },
      /piston\.1 must be a row with a speed like the first/,
    ],
    [
      {
        piston: [
          { time: 0, speed: 0 },
          { time: 0, speed: 1 },
        ],
      },
      /piston\.1\.time must be later/,
    ],
    [{ fit: ['viscosity'] }, /fit\.0 must be one of circulation, startTime, startPosition, radius, coreRadius/],
    [{ calibration: { lengthScale: 0 } }, /lengthScale must be above 0/],
    [{ sources: [{ kind: 'film' }] }, /sources\.0 must be a file/],
  ])('refuses %j', (readings, why) => {
    expect(refusals(readings)).toMatch(why)
  })

  it('is read or refused, and never throws, whatever it holds', () => {
    const value = fc.oneof(fc.jsonValue({ maxDepth: 3 }), fc.constantFrom('3 mm', '1 s', 0, -1, 0.5))
    const keys = ['rows', 'force', 'piston', 'fit', 'calibration', 'sources', 'fields', 'standResonance']
    const row = fc.dictionary(
      fc.constantFrom('run', 'time', 'x', 'radius', 'force', 'speed', 'position', 'start', 'step'),
      value,
    )
    fc.assert(
      fc.property(
        fc.dictionary(fc.constantFrom(...keys), fc.oneof(value, fc.array(row, { maxLength: 4 }))),
        (readings) => {
          const reading = decodePlan(documentOf({ readings }))
          if (reading.ok) expect(again(reading.plan).readings).toEqual(reading.plan.readings)
          else expect(reading.problems.every(({ message }) => message.length > 0)).toBe(true)
        },
      ),
      { numRuns: 300 },
    )
  })

  it('names twenty bad rows, not a hundred thousand', () => {
    const rows = Array.from({ length: 1000 }, () => ({ time: 'soon', x: 1 }))
    expect(refusals({ rows }).split('\n')).toHaveLength(20)
  })

  it('is set in parts and by paths', () => {
    const plan = setReadings(planOf(), { standResonance: 12 })
    expect(plan.readings).toEqual({ ...READINGS_DEFAULTS, standResonance: 12 })
    expect(setField(planOf(), 'readings.calibration.timeOffset', 0.2).readings?.calibration.timeOffset).toBe(0.2)
    expect(setReadings(plan, null).readings).toBeNull()
    expect(validatePlan(setField(plan, 'readings.standResonance', -1)).map(({ field }) => field)).toEqual([
      'readings.standResonance',
    ])
  })
})

describe('a force log of a million samples', () => {
  const count = 1_000_000
  const time = Float64Array.from({ length: count }, (_, i) => Number((0.25 + i * 1e-4).toFixed(4)))
  const force = Float64Array.from({ length: count }, (_, i) => Number((0.03 * Math.sin(i / 500)).toFixed(6)) + 0)

  it('is saved small, read back as it was, and takes seconds at most', () => {
    const started = performance.now()
    const plan = setReadings(planOf(), { force: forceLog(time, force) })
    const text = writePlan(plan)
    const written = performance.now()
    const reading = readPlan(text)
    const read = performance.now()
    if (!reading.ok) throw new Error('refused')
    const held = reading.plan.readings?.force
    expect(held?.force.every((value, i) => value === force[i])).toBe(true)
    // Equal steps are stored as start and step: within a few roundings of the times as they were.
    expect(held?.time.every((when, i) => Math.abs(when - (time[i] ?? 0)) < 1e-13)).toBe(true)
    expect(writePlan(reading.plan).length).toBe(text.length)
    // The cap of a plan is 50 MB.
    expect(text.length).toBeLessThan(25e6)
    console.info(
      `1e6 samples: ${(text.length / 1e6).toFixed(1)} MB, written in ${(written - started).toFixed(0)} ms, read in ${(read - written).toFixed(0)} ms`,
    )
    // Loose on purpose: a shared machine. What it would catch is a decoder that makes a name for every sample.
    expect(read - written).toBeLessThan(5000)
    expect(unknownKeys(reading.plan)).toEqual([])
  })

  it('at unequal times keeps every time exactly', () => {
    const jittered = time.subarray(0, 1000).map((when, i) => when + (i % 3) * 1e-6)
    const plan = setReadings(planOf(), { force: forceLog(jittered, force.subarray(0, 1000)) })
    expect(again(plan).readings?.force.time).toEqual(jittered)
  })
})

const NONE = {
  x: null,
  radius: null,
  circulation: null,
  sigmaX: null,
  sigmaRadius: null,
  sigmaCirculation: null,
}
