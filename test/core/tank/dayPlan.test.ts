import { describe, expect, it } from 'vitest'
import {
  settling,
  triggerTable,
  type SettlingInput,
  type TankArrival,
  type TriggerTableInput,
} from '../../../core/tank'
import { expectClose } from '../../support/close'
import { PRACTICE } from './sections'

function settled(parts: Partial<SettlingInput> = {}) {
  return settling({
    practice: PRACTICE,
    lastArrival: 4,
    jetReynolds: 1000,
    ringReynolds: [1500, 2000],
    kinematicViscosity: 1e-6,
    startFormationTime: [0.1, 0.15],
    ...parts,
  })
}

describe('settling and verdicts', () => {
  it('wait the minutes of practice, or ten times the way of a slow ring', () => {
    // Check L6: a few minutes between shots (common practice).
    expect(settled()).toMatchObject({ settlingTime: 180, ruledBy: 'practice' })
    expect(settled({ lastArrival: 30 })).toMatchObject({ settlingTime: 300, ruledBy: 'passage' })
    expect(settled({ lastArrival: 30 }).text).toMatch(/Wait 5 minutes .* 10 times the 30 s/)
    expect(settled({ lastArrival: null })).toMatchObject({ settlingTime: 180 })
  })

  it('call a start impulsive within the formation times of practice', () => {
    // Check L6: a ramp within 0.1 to 0.2 formation times (common practice).
    expect(settled().start).toMatchObject({ impulsive: true })
    expect(settled({ startFormationTime: [0.1, 0.3] }).start).toMatchObject({
      impulsive: false,
      text: 'The speed reaches 95 % of its peak in 0.3 formation times as the profile moves (0.1 as planned): not impulsive by the 0.2 of common practice.',
    })
  })

  it('call rings laminar, turbulent or neither by both ends of the range', () => {
    expect(settled().ring).toMatchObject({
      regime: 'laminar',
      text: expect.stringMatching(/1500 to 2000 is below 3000/),
    })
    expect(settled({ ringReynolds: [2000, 4000] }).ring.regime).toBe('between')
    expect(settled({ ringReynolds: [2000, 12000] }).ring.regime).toBe('between')
    expect(settled({ ringReynolds: [11000, 12000] }).ring.regime).toBe('turbulent')
    expect(settled({ ringReynolds: [] }).ring.regime).toBeNull()
    expect(settled({ jetReynolds: 3000 }).jet).toMatchObject({ laminar: false })
    expect(settled().jet.text).toMatch(/1000 is below 2300/)
  })

  it('refuse a practice that cannot be, with the field', () => {
    expect(() => settled({ practice: { ...PRACTICE, settlingMinutes: -1 } })).toThrow(
      /tankRun.practice.settlingMinutes/,
    )
    expect(() => settled({ practice: { ...PRACTICE, impulsiveStart: 0 } })).toThrow(/tankRun.practice.impulsiveStart/)
  })
})

const nothing = { speed: null, speedLow: null, speedHigh: null, radius: null, coreRadius: null, circulation: null }
const arrival = (station: number, time: number): TankArrival => ({
  station,
  time,
  timeLow: time - 0.1,
  timeHigh: time + 0.2,
  ...nothing,
  reason: null,
})

function table(parts: Partial<TriggerTableInput> = {}) {
  return triggerTable({
    trigger: { camera: 0.2, laser: -0.05 },
    lag: 0.02,
    delay: 0.004,
    duration: 0.5,
    arrivals: [arrival(0.1, 1), arrival(0.3, 3), { ...arrival(9, 9), time: null, timeLow: null, timeHigh: null }],
    pairInterval: 0.002,
    recording: 4,
    ...parts,
  })
}

describe('the trigger table', () => {
  it('stands in the order of time, on the clocks of motion and command', () => {
    const { rows } = table()
    expect(rows.map(({ device }) => device)).toEqual([
      'laser',
      'piston command',
      'piston',
      'camera',
      'piston stops',
      'pair at 0.1 m',
      'pair at 0.3 m',
    ])
    for (const { time, afterCommand } of rows) expectClose(afterCommand, time + 0.02, 1e-14)
    expect(rows.find(({ device }) => device === 'piston command')).toMatchObject({ time: -0.02, afterCommand: 0 })
  })

  it('centres each pair on the passage, the delay of the rounded motion added', () => {
    const pair = table().rows.find(({ device }) => device === 'pair at 0.1 m')
    expectClose(pair?.time ?? NaN, 1 + 0.004 - 0.001, 1e-14)
    expectClose(pair?.early ?? NaN, 0.9 + 0.003, 1e-14)
    expectClose(pair?.late ?? NaN, 1.2 + 0.003, 1e-14)
  })

  it('says where camera and light come too late or stop too soon', () => {
    expect(table().notes).toEqual([])
    const late = table({ trigger: { camera: 2, laser: 2.5 }, recording: 0.5 }).notes.join(' ')
    expect(late).toMatch(/light comes on after the first frame/)
    expect(late).toMatch(/first frame at 2 s comes after the ring may pass the first station, 0\.904 s/)
    expect(late).toMatch(/last frame at 2\.5 s comes before the ring may pass the last station, 3\.204 s/)
  })

  it('refuses delays that are no numbers', () => {
    expect(() => table({ trigger: { camera: NaN, laser: 0 } })).toThrow(
      /tankRun.trigger.camera must be a finite number/,
    )
  })
})
