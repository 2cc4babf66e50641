import { describe, expect, it } from 'vitest'
import { run, type WakeData } from '../../../core/run'
import { planOf } from '../../support/plans'

/** Ring Reynolds number 5000 in water at 20 degrees: both ageing laws are marched. */
const RING = { circulation: 0.005, radius: 0.02, coreRadius: 0.002 }

async function wakeOf(wake: Readonly<Record<string, unknown>>): Promise<WakeData> {
  const { data, message } = await run(planOf({ wake: { rings: [RING], outputStep: 0.05, ...wake } }), {
    sections: ['wake'],
  })
  if (data === null || data.wake === null) throw new Error(message)
  return data.wake
}

describe('arrivals', () => {
  it('have an open range where the slower law has not arrived when its run ends', async () => {
    const whole = (await wakeOf({ stations: [0.1], duration: 6 })).arrivals[0]
    if (whole === undefined || whole.timeHigh === null) throw new Error('the ring arrives under both laws')
    expect(whole.open).toBe(false)
    expect(whole.timeHigh).toBeGreaterThan(whole.timeLow)
    const duration = (whole.timeLow + whole.timeHigh) / 2
    const [cut] = (await wakeOf({ stations: [0.1], duration })).arrivals
    expect(cut).toMatchObject({ open: true, timeHigh: null })
    expect(cut?.timeLow).toBe(cut?.time)
  })

  it.each(['coaxial', 'filament'])('are none of a ring put on its station, in the engine %s', async (model) => {
    const places = [0.05, 0.1, 0.15]
    for (const x of places) {
      const rings = [{ ...RING, centre: [x, 0, 0] }]
      const law = 'regularised'
      const { wake } = await wakeOf({ rings, stations: [x], model, law, viscous: false, duration: 0.2 })
      expect(wake.events.filter(({ event }) => event === 'arrival')).toEqual([])
    }
  })
})

describe('a tube too small for the rings of the pulse', () => {
  it('is refused by its own name, with a number one can read', async () => {
    const plan = planOf({ programme: { shape: 'rectangular', stroke: 0.06, peakSpeed: 0.2 }, wake: { tube: 0.02 } })
    const result = await run(plan, { sections: ['wake'] })
    expect(result.field).toBe('wake.tube')
    expect(result.message).toMatch(/wake\.tube must be at least 0\.\d{1,7} m in radius/)
  })
})
