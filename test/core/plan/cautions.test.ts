import { describe, expect, it } from 'vitest'
import { CAUTIONS, cautionsFor, pulsesOverlap } from '../../../core/plan'
import { run } from '../../../core/run'
import { planOf } from '../../support/plans'

async function idsOf(parts: Readonly<Record<string, unknown>>): Promise<readonly string[]> {
  const plan = planOf(parts)
  const result = await run(plan, { sections: plan.wake === null ? ['pulse'] : ['pulse', 'wake'] })
  if (result.data === null) throw new Error(result.message)
  return result.data.cautions.map((caution) => caution.id)
}

const quick = (stroke: number, more: object = {}): object => ({ shape: 'rectangular', stroke, peakSpeed: 0.2, ...more })

const RING = { circulation: 0.01, radius: 0.02, coreRadius: 0.004 }

/** A plan that fires each caution of the model group. */
const TRIGGERS: Readonly<Record<string, Readonly<Record<string, unknown>>>> = {
  'estimates-disagree': { programme: quick(0.03 * 3.3) },
  'pinched-off': { programme: quick(0.03 * 6) },
  'ring-not-laminar': { programme: quick(0.06) },
  'low-reynolds': { nozzle: { diameter: 0.001 }, programme: { shape: 'half-sine', stroke: 0.002, peakSpeed: 0.14 } },
  'boundary-layer': { nozzle: { diameter: 0.001 }, programme: { shape: 'half-sine', stroke: 0.002, peakSpeed: 0.14 } },
  'no-steady-ring': {
    programme: { shape: 'linear-ramp', stroke: 0.3, peakSpeed: 0.2 },
    models: { formationNumber: 'carriedVolume' },
  },
  'elliptic-exit': { nozzle: { diameter: 0.03, axisRatio: 2 } },
  'stream-left-out': { ambient: { axialFlow: 0.02 } },
  'slow-start': { programme: { shape: 'linear-ramp', stroke: 0.06, peakSpeed: 0.2 } },
  'reduced-peak': { programme: { shape: 'trapezoid', stroke: 0.001, peakSpeed: 0.2, riseTime: 0.05, fallTime: 0.05 } },
  'modified-formation-number': { nozzle: { shape: 'orifice', diameter: 0.03, pistonDiameter: 0.06 } },
  'radial-inflow': { nozzle: { shape: 'converging', diameter: 0.03, pistonDiameter: 0.06, radialRatio: 0.2 } },
  'table-read': {
    programme: {
      shape: 'table',
      rows: [
        { time: 1, speed: 0 },
        { time: 1.2, speed: 0.1 },
        { time: 1.8, speed: 0 },
      ],
    },
  },
  'no-start-over-pressure': {
    programme: { shape: 'linear-ramp', stroke: 0.06, peakSpeed: 0.2 },
    models: { overPressure: 'quick-start' },
  },
  'parabolic-start': { nozzle: { diameter: 0.03, exitProfile: 'parabolic' }, programme: quick(0.02) },
  'parallel-jet-assumed': { nozzle: { shape: 'converging', diameter: 0.03, pistonDiameter: 0.06 } },
  'no-matching-ring': { programme: quick(0.03 * 0.002) },
  'thin-core': { programme: quick(0.03 * 0.3) },
  'cores-touch': {
    wake: { rings: [RING, { ...RING, circulation: -0.01, centre: [0.1, 0, 0] }], duration: 20, outputStep: 0.5 },
  },
  'near-wall': {
    wake: { rings: [RING], wall: { point: [0.1, 0, 0], normal: [1, 0, 0] }, duration: 3, outputStep: 0.1 },
  },
  'train-overlap': { programme: quick(0.06), train: { pulses: 2, period: 0.1 }, wake: { duration: 0.05 } },
  'wake-rings': { programme: quick(0.03 * 6), wake: { duration: 0.1 } },
  'wake-valid-until': {
    wake: { rings: [RING], wall: { point: [0.1, 0, 0], normal: [1, 0, 0] }, duration: 3, outputStep: 0.1 },
  },
  'given-water': { water: { kind: 'given', density: 1000, kinematicViscosity: 1e-6, vapourPressure: 2300 } },
}

describe('cautions', () => {
  it('do not take a period that is the stroke time but for rounding for an overlap', () => {
    expect(pulsesOverlap(0.82, 0.8200000000000001)).toBe(false)
    expect(pulsesOverlap(0.8, 0.82)).toBe(true)
  })

  // Those of the starting jet, the thruster, the tank, sizing and spread have their triggers in tests of their own.
  const elsewhere = /^(?:jet|thruster|tank|sizing|spread)-/
  const ids = CAUTIONS.filter(({ group }) => group === 'model').map(({ id }) => id)
  it.each(ids.filter((id) => !elsewhere.test(id)))('%s fires on its trigger', async (id) => {
    const trigger = TRIGGERS[id]
    if (trigger === undefined) throw new Error(`no trigger is written down for ${id}`)
    expect(await idsOf(trigger)).toContain(id)
  })

  it('a stream faster than the jet is told to make no such ring', async () => {
    const { data } = await run(planOf({ ambient: { axialFlow: 0.25 } }), { sections: ['pulse'] })
    expect(data?.cautions.find(({ id }) => id === 'stream-left-out')?.text).toMatch(/do not expect this ring/)
  })

  it('a calm pulse in fresh water has none of them', async () => {
    expect(
      await idsOf({
        nozzle: { diameter: 0.02, pistonDiameter: 0.04 },
        programme: { shape: 'rectangular', stroke: 0.04, peakSpeed: 0.08 },
      }),
    ).toEqual([])
  })

  it('hazards of laboratory and machine stand with a tank run, those of vehicle and bench with a thruster', async () => {
    const groups = (group: string): readonly string[] =>
      CAUTIONS.filter((caution) => caution.group === group).map((caution) => caution.id)
    const tank = await idsOf({ tankRun: {} })
    const vehicle = await idsOf({ thruster: {} })
    expect(tank).toEqual(expect.arrayContaining([...groups('laboratory'), ...groups('machine')]))
    expect(vehicle).toEqual(expect.arrayContaining([...groups('vehicle')]))
    expect(vehicle.some((id) => groups('laboratory').includes(id))).toBe(false)
  })

  it('every hazard leaves the decision to local rules and qualified people', () => {
    const context = {
      plan: planOf({ tankRun: {}, thruster: {} }),
      water: null,
      pulse: null,
      wake: null,
      jet: null,
      jetMissing: null,
      wakeNotes: [],
      thruster: null,
      sizing: null,
      tankRun: null,
      spread: null,
    }
    const hazards = [
      ...cautionsFor(context, 'laboratory'),
      ...cautionsFor(context, 'machine'),
      ...cautionsFor(context, 'vehicle'),
    ]
    expect(hazards.length).toBe(27)
    for (const hazard of hazards) expect(hazard.text).toMatch(/local rules.*qualified person decide/)
  })

  it('ids are unique', () => {
    expect(new Set(CAUTIONS.map((caution) => caution.id)).size).toBe(CAUTIONS.length)
  })
})
