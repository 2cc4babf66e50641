import { beforeAll, describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { type Plan } from '../../../core/plan'
import { createJetCache, run, type RunResult, type WakeData } from '../../../core/run'
import { expectClose } from '../../support/close'
import { planOf } from '../../support/plans'

const LONG = 60_000
/** A tube of 25 mm at 80 mm/s: D / U is 0.3125 s. */
const DIAMETER = 0.025
const SPEED = 0.08
const PERIOD = 3

function jetPlan(wake: Readonly<Record<string, unknown>> = {}, more: Readonly<Record<string, unknown>> = {}): Plan {
  return planOf({
    nozzle: { shape: 'tube', diameter: DIAMETER },
    programme: { shape: 'trapezoid', stroke: 4 * DIAMETER, peakSpeed: SPEED, riseTime: 0.03, fallTime: 0 },
    train: { pulses: 2, period: PERIOD },
    wake: { start: 'jet', duration: 10, outputStep: 0.1, ageing: 'laminar', ...wake },
    ...more,
  })
}

/** Jets are computed once for the whole file. */
const jetCache = createJetCache()

async function wakeFrom(plan: Plan): Promise<RunResult> {
  return await run(plan, { sections: ['wake'] }, { jetCache })
}

function dataOf({ data }: RunResult): WakeData {
  if (data?.wake === undefined || data.wake === null) throw new Error('there is no wake')
  return data.wake
}

describe('a wake from the computed jet', () => {
  let wake: WakeData
  let shares: number[]

  beforeAll(async () => {
    shares = []
    const options = { jetCache, onProgress: ({ share }: { share: number }) => void shares.push(share) }
    const result = await run(jetPlan(), { sections: ['wake'] }, options)
    expect(result.status).toBe('done')
    wake = dataOf(result)
  }, LONG)

  it('has the same rings for each pulse, a period apart', () => {
    const { jet, rings } = wake
    const each = jet?.release.rings.length ?? 0
    expect(each).toBeGreaterThan(1)
    expect(rings).toHaveLength(2 * each)
    for (let i = 0; i < each; i++) {
      const [first, second] = [at(rings, i), at(rings, each + i)]
      expect(second.centre).toEqual(first.centre)
      expect(second.circulation).toBe(first.circulation)
      expectClose((second.startTime ?? NaN) - (first.startTime ?? NaN), PERIOD, 1e-12)
      expect(first.startTime).toBe(jet?.release.time)
    }
  })

  it('tells the pinch-off of every pulse, before its ring appears, with the number the ring will have', () => {
    const told = wake.wake.events.filter(({ event }) => event === 'pinch-off')
    const each = wake.jet?.release.rings.length ?? 0
    expect(told.map(({ rings }) => rings)).toEqual([[1], [each + 1]])
    const time = wake.jet?.pinchOff?.time ?? NaN
    told.forEach((event, k) => expectClose(event.time, k * PERIOD + time, 1e-12))
    expect(time).toBeLessThanOrEqual(wake.jet?.release.time ?? NaN)
    const times = wake.wake.events.map((event) => event.time)
    expect(times).toEqual(times.toSorted((a, b) => a - b))
    expect(wake.wake.events.at(-1)?.event).toBe('end')
  })

  it('lets the second ring meet the billow of the first pulse, and goes on', () => {
    const each = wake.jet?.release.rings.length ?? 0
    const meeting = wake.wake.events.find(
      ({ event, rings }) => event === 'merge' && rings.some((ring) => ring <= each) && rings.includes(each + 1),
    )
    // At the earliest as the second ring appears, where the first pulse's billow already stands at its place.
    expect(meeting?.time).toBeGreaterThanOrEqual(PERIOD + (wake.jet?.release.time ?? NaN))
    expect(wake.wake.time).toBe(10)
  })

  it('keeps the shapes of the sheet up to the release, and none after it', () => {
    const { snapshots, release } = wake.jet ?? { snapshots: [], release: { time: NaN } }
    expect(snapshots.length).toBeGreaterThan(10)
    expect(snapshots.at(-1)?.time).toBe(release.time)
  })

  it('says what is kept, what is left out and which law is marched', () => {
    const words = wake.notes.join(' ')
    expect(words).toMatch(/circulation, impulse and centroid of the sheet/)
    expect(words).toMatch(/left out: the stopping vortex/)
    expect(words).toMatch(/regularised law/)
    expect(words).toMatch(/Each jet is computed alone/)
  })

  it('reports jet and march in one progress that never falls', () => {
    expect(shares).toEqual(shares.toSorted((a, b) => a - b))
    expect(shares.at(-1)).toBe(1)
    expect(shares.some((share) => share > 0.1 && share < 0.6)).toBe(true)
    expect(shares.some((share) => share > 0.63 && share < 0.99)).toBe(true)
  })

  it('repeats to the bit from the kept jet', async () => {
    const again = dataOf(await wakeFrom(jetPlan()))
    expect(again.wake.events).toEqual(wake.wake.events)
    expect(again.wake.trajectories).toEqual(wake.wake.trajectories)
  })

  it('tells no pinch-off beyond its own end', async () => {
    const short = dataOf(await wakeFrom(jetPlan({ duration: 3.5 })))
    expect(short.wake.events.filter(({ event }) => event === 'pinch-off')).toHaveLength(1)
  })

  it('follows explicit rings where there are any, whatever it starts from', async () => {
    const rings = [{ circulation: 0.002, radius: 0.02, coreRadius: 0.004, centre: [0, 0, 0] }]
    const given = dataOf(await wakeFrom(jetPlan({ rings, duration: 1 })))
    expect(given.jet).toBeNull()
    expect(given.rings).toHaveLength(1)
  })
})

describe('a wake that cannot start from a jet', () => {
  const NOZZLE = { position: [0, 0, 0], direction: [1, 0, 0], delay: 0 }
  const refusals: readonly (readonly [string, Plan, RegExp])[] = [
    ['several nozzles', jetPlan({ nozzles: [NOZZLE] }), /one nozzle, got 1 under wake\.nozzles/],
    [
      'a sharp orifice',
      jetPlan({}, { nozzle: { shape: 'orifice', diameter: DIAMETER, pistonDiameter: 0.05 } }),
      /orifice/,
    ],
    ['an elliptic exit', jetPlan({}, { nozzle: { shape: 'tube', diameter: DIAMETER, axisRatio: 2 } }), /axisRatio 2/],
    ['rings in space', jetPlan({ model: 'filament' }), /wake\.model filament/],
    ['a slanting wall', jetPlan({ wall: { point: [0.3, 0, 0], normal: [1, 0.2, 0] } }), /not square/],
  ]

  it.each(refusals)('refuses %s in a sentence', async (_, plan, words) => {
    const result = await wakeFrom(plan)
    expect(result).toMatchObject({ status: 'failed', field: 'wake.start' })
    expect(result.message).toMatch(/^wake\.start must be matched here: /)
    expect(result.message).toMatch(words)
  })
})

describe('cancelling a wake from a jet', () => {
  it.each([0.2, 0.7])(
    'takes effect at a share of %d of its way',
    async (when) => {
      const signal = { aborted: false }
      const result = await run(
        jetPlan(),
        { sections: ['wake'] },
        {
          signal,
          onProgress: ({ share }) => {
            if (share >= when) signal.aborted = true
          },
        },
      )
      expect(result.status).toBe('cancelled')
      expect(result.data?.pulse).not.toBeNull()
      // In the jet there are no rings yet; in the march what was done is kept.
      expect(result.data?.wake === null).toBe(when < 0.6)
    },
    LONG,
  )
})

describe('the choice in the plan', () => {
  it('is the matched ring unless it is given', async () => {
    const plan = jetPlan({ start: undefined, duration: 4 })
    expect(plan.wake?.start).toBe('matched')
    const wake = dataOf(await wakeFrom(plan))
    expect(wake.jet).toBeNull()
    expect(wake.rings).toHaveLength(2)
    expect(wake.wake.events.some(({ event }) => event === 'pinch-off')).toBe(false)
  })
})
