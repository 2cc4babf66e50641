import { describe, expect, it } from 'vitest'
import { CAUTIONS } from '../../../core/plan'
import { run } from '../../../core/run'
import { planOf } from '../../support/plans'
import { CONSTANT_SPEED } from '../../support/thrusterPlans'

const SEARCH = { diameter: [0.02, 0.04], strokeRatio: [2, 4], frequency: [0.5, 2], count: [1, 2], seed: 1 }

/** Sentences of the sizing's cautions by their ids. */
async function toldOf(thruster: Readonly<Record<string, unknown>>): Promise<Readonly<Record<string, string>>> {
  const plan = planOf({
    ...CONSTANT_SPEED,
    thruster: { count: 1, vehicle: null, target: [{ thrust: 0.02, share: 1 }], search: SEARCH, ...thruster },
  })
  const { data } = await run(plan, { sections: ['thruster'] })
  return Object.fromEntries((data?.cautions ?? []).map(({ id, text }) => [id, text]))
}

describe('cautions of a sizing', () => {
  it('tell of a best candidate that only just holds a limit', async () => {
    // The widest exit takes 20 mm of travel at the least stroke ratio: less than that leaves the best design standing on the limit.
    const told = await toldOf({ actuator: { maxTravel: 0.019 }, manufacture: { diameter: 0.01, stroke: 0.01 } })
    expect(told['sizing-within-spread']).toMatch(/\(.*plunger travel.*\): check by test before relying on it\.$/)
    expect(told).not.toHaveProperty('sizing-nothing-fits')
    expect(told).not.toHaveProperty('sizing-incomplete')
  }, 30_000)

  it('tell where no design holds every limit, and which one stands in the way', async () => {
    const told = await toldOf({ target: [{ thrust: 50, share: 1 }] })
    expect(told['sizing-nothing-fits']).toMatch(/^No design in the ranges of the search holds every limit/)
  }, 30_000)

  it('tell of a search for least power that has nothing to reach, and not of one for most thrust', async () => {
    const told = await toldOf({ target: [] })
    expect(told['sizing-no-target']).toMatch(/makes no sizing: .* Give a duty point, a thrust or a speed to hold/)
    expect(await toldOf({ target: [], search: { ...SEARCH, goal: 'thrust' } })).not.toHaveProperty('sizing-no-target')
    expect(await toldOf({ target: [], search: null })).not.toHaveProperty('sizing-no-target')
  }, 30_000)

  it('tell of a search that was cut short', async () => {
    const signal = { aborted: false }
    const plan = planOf({
      ...CONSTANT_SPEED,
      thruster: { count: 1, vehicle: null, target: [{ thrust: 0.02, share: 1 }], search: SEARCH },
    })
    const onProgress = ({ what }: { readonly what: string }): void => {
      if (what === 'candidates') signal.aborted = true
    }
    const { data } = await run(plan, { sections: ['thruster'] }, { signal, onProgress })
    expect(data?.cautions.find(({ id }) => id === 'sizing-incomplete')?.text).toMatch(/^Cancelled/)
  })

  it('are all tried here', () => {
    expect(CAUTIONS.map(({ id }) => id).filter((id) => id.startsWith('sizing-'))).toEqual([
      'sizing-within-spread',
      'sizing-nothing-fits',
      'sizing-no-target',
      'sizing-incomplete',
    ])
  })
})
