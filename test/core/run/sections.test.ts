import { describe, expect, it } from 'vitest'
import { summaryDocument } from '../../../core/plan'
import { availableSections, run, type RunRequest } from '../../../core/run'
import { expectClose } from '../../support/close'
import { planOf } from '../../support/plans'
import { CONSTANT_SPEED, SINUSOIDAL } from '../../support/thrusterPlans'

async function dataOf(parts: Readonly<Record<string, unknown>>, request: RunRequest) {
  const { data, status, message } = await run(planOf(parts), request)
  if (data === null || status !== 'done') throw new Error(message)
  return data
}

const THRUSTER = { sections: ['thruster'] } as const
const TANK = { tankRun: { tank: { length: 1.2, width: 0.4, depth: 0.5 }, stations: [0.1, 0.2] } }
const ALL_OF_IT = {
  ...CONSTANT_SPEED,
  ...TANK,
  sweep: { fields: [{ path: 'nozzle.diameter', values: [0.02, 0.03] }] },
  spread: { relative: { 'nozzle.diameter': 0.01 }, samples: 5 },
}

describe('the thruster of a plan', () => {
  it('gives 12.5438 mN at constant speed', async () => {
    const { thruster } = await dataOf(CONSTANT_SPEED, THRUSTER)
    // Six digits are printed.
    expectClose(thruster?.result.meanThrust ?? 0, 0.0125438, 5e-6)
  })

  it('gives 0.0310063 N with a sinusoidal plunger', async () => {
    const { thruster } = await dataOf(SINUSOIDAL, THRUSTER)
    expectClose(thruster?.result.meanThrust ?? 0, 0.0310063, 5e-6)
  })

  it('is refused without a train, with the field that is lacking', async () => {
    const result = await run(planOf({ ...CONSTANT_SPEED, train: undefined }), THRUSTER)
    expect(result).toMatchObject({ status: 'failed', field: 'train.period' })
    expect(result.message).toMatch(/^train\.period must be given/)
  })

  it('is searched only where search and something to aim at stand in the plan, and not where that is off', async () => {
    const search = { diameter: [0.02, 0.04], strokeRatio: [2, 4], frequency: [0.5, 2], count: [1, 2], seed: 1 }
    const target = [{ thrust: 0.02, share: 1 }]
    const sizing = async (thruster: object, request: RunRequest = THRUSTER) =>
      (await dataOf({ ...CONSTANT_SPEED, thruster }, request)).thruster?.sizing ?? null
    expect(await sizing({ count: 1, vehicle: null, search })).toBeNull()
    expect(await sizing({ count: 1, vehicle: null, target })).toBeNull()
    expect(await sizing({ count: 1, vehicle: null, target, search }, { ...THRUSTER, sizing: 'off' })).toBeNull()
    const made = await sizing({ count: 1, vehicle: null, target, search })
    expect(made?.status).toBe('done')
    expect(made?.candidates.length).toBeGreaterThan(0)
  }, 30_000)

  it('keeps its figures where the search is cancelled', async () => {
    const search = { diameter: [0.02, 0.04], strokeRatio: [2, 4], frequency: [0.5, 2], count: [1, 2], seed: 1 }
    const plan = planOf({
      ...CONSTANT_SPEED,
      thruster: { count: 1, vehicle: null, target: [{ thrust: 0.02, share: 1 }], search },
    })
    const signal = { aborted: false }
    const onProgress = ({ what }: { readonly what: string }): void => {
      if (what === 'candidates') signal.aborted = true
    }
    const { status, data } = await run(plan, THRUSTER, { signal, onProgress })
    expect(status).toBe('cancelled')
    expectClose(data?.thruster?.result.meanThrust ?? 0, 0.0125438, 5e-6)
  })

  it('does without a jet that the plan does not adopt, whatever else is asked for', async () => {
    const jet = { ensemble: false, delta: 0.2 }
    const alone = await dataOf({ ...CONSTANT_SPEED, jet }, THRUSTER)
    const beside = await dataOf({ ...CONSTANT_SPEED, jet }, { sections: ['pulse', 'thruster'], jet: 'cached' })
    expect(beside.thruster).toEqual(alone.thruster)
  })

  it('reads the computed jet where the plan adopts it', async () => {
    const parts = { ...CONSTANT_SPEED, jet: { ensemble: false, delta: 0.2 } }
    const { jet, pulse } = await dataOf(parts, { sections: ['pulse', 'jet'] })
    const adopted = await dataOf({ ...parts, models: { overPressure: 'computed' } }, THRUSTER)
    const impulse = (pulse?.slug.impulse ?? Number.NaN) + (jet?.own.impulseBeyondSlug ?? Number.NaN)
    // Once a second on a bench: the thrust is the impulse of a pulse, to rounding.
    expectClose(adopted.thruster?.result.meanThrust ?? 0, impulse, 1e-12)
    expect(jet?.own.impulseBeyondSlug).not.toBe(0)
  }, 30_000)
})

describe('the tank run of a plan', () => {
  it('is planned, with its cautions beside those of a machine and a laboratory', async () => {
    const { tankRun, cautions } = await dataOf(TANK, { sections: ['tankRun'] })
    expect(tankRun?.arrivals.map(({ station }) => station)).toEqual([0.1, 0.2])
    const ids = cautions.map(({ id }) => id)
    expect(ids).toEqual(expect.arrayContaining(['tank-dye', 'tank-settling', 'machine-guard', 'laser']))
  })

  it('is cancelled with what was finished', async () => {
    const signal = { aborted: false }
    const onProgress = ({ what }: { readonly what: string }): void => {
      if (what === 'ring on its way') signal.aborted = true
    }
    const { status, data } = await run(planOf(TANK), { sections: ['tankRun'] }, { signal, onProgress })
    expect(status).toBe('cancelled')
    expect(data?.tankRun?.profile.ok).toBe(true)
  })
})

describe('sections', () => {
  it('are available where the plan has them and something to compute in them', () => {
    expect(availableSections(planOf(ALL_OF_IT))).toEqual(['water', 'pulse', 'thruster', 'tankRun', 'sweep', 'spread'])
    expect(availableSections(planOf({ sweep: {}, spread: {} }))).toEqual(['water', 'pulse'])
  })

  it.each(['thruster', 'tankRun', 'sweep', 'spread'] as const)('%s is told to be absent', async (section) => {
    const result = await run(planOf(), { sections: [section] })
    expect(result.status).toBe('failed')
    expect(result.message).toMatch(new RegExp(`^The plan has no ${section} section`))
  })

  it('report a progress that rises to the end', async () => {
    const shares: number[] = []
    await run(
      planOf(ALL_OF_IT),
      { sections: availableSections(planOf(ALL_OF_IT)) },
      { onProgress: ({ share }) => shares.push(share) },
    )
    expect(shares.toSorted((a, b) => a - b)).toEqual(shares)
    expect(shares.at(-1)).toBe(1)
    expect(shares.length).toBeGreaterThan(10)
  })

  it('stand in the summary by the names of the contract, without histories', async () => {
    const data = await dataOf(ALL_OF_IT, { sections: ['thruster', 'tankRun', 'spread'] })
    const { thruster, tankRun, spread, pulse, sweep } = summaryDocument(data)
    expect({ pulse, sweep }).toEqual({ pulse: undefined, sweep: undefined })
    for (const name of [
      'thrustPerPulse',
      'meanThrust',
      'meanThrustRange',
      'peakThrust',
      'steadyJetThrust',
      'thrustRatio',
      'power.jet',
      'power.nozzleLoss',
      'power.refill',
      'power.column',
      'power.carried',
      'power.total',
      'froudeEfficiency',
      'overallEfficiency',
      'speed',
      'dragAtSpeed',
      'costOfTransport',
      'endurance',
      'corePressure',
      'cavitationMargin',
      'limits.0.name',
      'limits.0.ok',
    ])
      expect(thruster).toHaveProperty(name)
    expect(thruster).not.toHaveProperty('cycle')
    expect(thruster).toMatchObject({ candidates: undefined, front: undefined })
    for (const name of ['station', 'time', 'timeLow', 'timeHigh', 'speed', 'radius'])
      expect(tankRun).toHaveProperty(`arrivals.1.${name}`)
    for (const name of [
      'pairInterval',
      'frameRate',
      'storage',
      'settlingTime',
      'clearances.0.wall',
      'solutions',
      'cautions.0.text',
    ])
      expect(tankRun).toHaveProperty(name)
    expect(tankRun).not.toHaveProperty('path')
    expect(tankRun).not.toHaveProperty('profile.position')
    expect(spread).toMatchObject({
      'pulse.ring.speed': {
        mean: expect.any(Number),
        standardDeviation: expect.any(Number),
        p05: expect.any(Number),
        p95: expect.any(Number),
      },
    })
  })
})
