import { describe, expect, it } from 'vitest'
import { THRUSTER_CAUTIONS } from '../../../core/plan/thrusterCautions'
import { analyseThruster, type ThrusterInput, type ThrusterNoteId } from '../../../core/thruster'
import { CONSTANT } from '../pulse/plans'
import { BENCH, ON_BENCH, PUSH, UNDER_WAY, VEHICLE, withSection, withVehicle } from '../thruster/plans'

const table = (...rows: readonly (readonly [number, number])[]) => ({
  kind: 'table' as const,
  rows: rows.map(([speed, drag]) => ({ speed, drag })),
})

/** A thruster that fires each caution. */
const TRIGGERS: Readonly<Record<ThrusterNoteId, ThrusterInput>> = {
  'thruster-does-not-start': withVehicle({ drag: table([0, 0.5], [1, 2]) }),
  'thruster-shortfall': withVehicle({ speed: 0.4 }),
  'thruster-several-speeds': withVehicle({ drag: table([0, 0], [0.05, 0.06], [0.12, 0.01], [0.4, 0.2]) }),
  'thruster-limits': withSection({ actuator: { ...BENCH.actuator, maxForce: 0.001 } }),
  'thruster-speed-jumps': { ...ON_BENCH, pulse: { ...PUSH, programme: CONSTANT } },
  'thruster-no-column': { ...ON_BENCH, pulse: { ...PUSH, nozzle: { ...PUSH.nozzle, length: 0 } } },
  'thruster-braking-suction': withSection({ intake: { ...BENCH.intake, area: 4e-6 } }),
  'thruster-close-nozzles': withSection({ count: 2, spacing: 0.025 }),
  'thruster-close-rings': {
    ...ON_BENCH,
    frequency: 5,
    pulse: { ...PUSH, programme: { ...PUSH.programme, stroke: 0.05, riseTime: 0.02, fallTime: 0.02 } },
  },
  'thruster-past-ring': {
    ...ON_BENCH,
    frequency: 1,
    pulse: { ...PUSH, programme: { ...PUSH.programme, stroke: 0.16 } },
  },
  'thruster-strong-stream': withVehicle({ speed: 0.3 }),
  'thruster-refill-by-exit': ON_BENCH,
  'thruster-hull-reynolds': withVehicle({ drag: { kind: 'hull', wettedArea: 5, formFactor: 1 }, length: 0.3 }),
  'thruster-light-vehicle': withVehicle({ mass: 0.2, addedMass: 0 }),
  'thruster-no-added-mass': withVehicle({ addedMass: null }),
  'thruster-jet-other-stream': {
    ...UNDER_WAY,
    pulse: {
      ...PUSH,
      jet: {
        formationNumber: 4,
        formationNumberLow: 3.8,
        formationNumberHigh: 4.2,
        circulationBeyondSlug: 0,
        impulseBeyondSlug: 0,
        energyBeyondSlug: 0,
      },
    },
  },
}

describe('cautions of a thruster', () => {
  it.each(THRUSTER_CAUTIONS.map(({ id }) => id))('%s fires on its trigger and is a whole sentence', (id) => {
    const thruster = analyseThruster(TRIGGERS[id])
    const caution = THRUSTER_CAUTIONS.find((one) => one.id === id)
    const text = caution?.text({ thruster }) ?? ''
    expect(text).toMatch(/^[A-Z].*\.$/)
    expect(text).not.toMatch(/NaN|undefined|null|Infinity/)
    expect(caution?.source).not.toBe('')
  })

  it('none holds without a thruster, and none of them for a calm one', () => {
    expect(THRUSTER_CAUTIONS.filter(({ text }) => text({ thruster: null }) !== null)).toEqual([])
    const calm = analyseThruster({
      ...withSection({ intake: { area: 4e-4, recoveredShare: 0, lossCoefficient: 0.5 }, vehicle: VEHICLE }),
      frequency: 1,
      pulse: { ...PUSH, programme: { ...PUSH.programme, stroke: 0.04 } },
    })
    expect(calm.notes.map(({ id, text }) => `${id}: ${text}`)).toEqual([])
  })
})
