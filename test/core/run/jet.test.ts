import { describe, expect, it } from 'vitest'
import type { Plan } from '../../../core/plan'
import { setField } from '../../../core/plan'
import { availableSections, createJetCache, run, type JetRunOptions, type RunResult } from '../../../core/run'
import { expectClose } from '../../support/close'
import { planOf } from '../../support/plans'

/** A coarse smoothing and one run of it: these tests are about what is done with a jet, not about the jet. */
const COARSE = { ensemble: false, delta: 0.2, coreGrowth: false }
const QUICK = { shape: 'rectangular', stroke: 0.03, peakSpeed: 0.2 }
const COMPUTED = { overPressure: 'computed', formationNumber: 'computed' }

/** A stroke of one diameter with a coarse jet. */
const short = (parts: Readonly<Record<string, unknown>> = {}): Plan =>
  planOf({ programme: QUICK, jet: COARSE, ...parts })

/** One cache for the plans that have the same jet: what they share is computed once. */
const shared = createJetCache()

async function jetOfRun(plan: Plan, options: JetRunOptions = { jetCache: shared }): Promise<RunResult> {
  return await run(plan, { sections: ['pulse', 'jet'] }, options)
}

function cautionIds(result: RunResult): readonly string[] {
  return (result.data?.cautions ?? []).map(({ id }) => id)
}

/** Options that count the steps of the jets that are computed. */
function counting(options: JetRunOptions = {}): { readonly options: JetRunOptions; readonly steps: () => number } {
  let steps = 0
  return { options: { ...options, pause: async () => void steps++ }, steps: () => steps }
}

describe('the section jet', () => {
  it('stands between pulse and wake where the plan has it, and not where the plan has no nozzle', () => {
    expect(availableSections(short())).toEqual(['water', 'pulse', 'jet'])
    expect(availableSections(planOf())).toEqual(['water', 'pulse'])
    const rings = { rings: [{ circulation: 0.01, radius: 0.02, coreRadius: 0.004 }], duration: 0.1 }
    const onlyRings = planOf({ nozzle: undefined, programme: undefined, wake: rings, jet: COARSE })
    expect(availableSections(onlyRings)).toEqual(['water', 'wake'])
  })

  it('takes ring and sums from the plan’s own stroke and the formation number from a longer one', async () => {
    const { status, data } = await jetOfRun(short())
    expect(status).toBe('done')
    const jet = data?.jet
    expect(jet?.own.shown.strokeRatio).toBeCloseTo(1, 12)
    expect(jet?.own.trailingJet).toBe(false)
    expect(jet?.formation?.shown.strokeRatio).toBeCloseTo(8, 12)
    expect(data?.pulse?.formationNumber.computed).toBe(jet?.formation?.formationNumber)
    expect(jet?.notes.join(' ')).toMatch(/a stroke of 8 D: the plan's own stroke of 1\.00 D is too short to tell it/)
    expect(Object.isFrozen(jet?.own.shown.history.time)).toBe(true)
  })

  it('runs a stroke that is long enough once', async () => {
    const plan = short({ programme: { ...QUICK, stroke: 0.03 * 6.5 } })
    const { data } = await jetOfRun(plan)
    expect(data?.jet?.formation).toBe(data?.jet?.own)
    expect(data?.jet?.notes.join(' ')).not.toMatch(/longer|stroke of 8/)
  })

  it('leaves no trailing jet at a stroke of two diameters, with the usual smoothing', async () => {
    // P Gharib, Rambod & Shariff 1998: below a stroke of about 3 one ring takes everything.
    const plan = planOf({ programme: { ...QUICK, stroke: 0.06 }, jet: { ensemble: false } })
    const { data } = await jetOfRun(plan)
    expect(data?.jet?.own.trailingJet).toBe(false)
    expect(data?.jet?.own.pinchOffTime).toBeNull()
    // The stopping vortex of the other sign, which joins it after the stroke, takes about 2 % off.
    const { ringCirculation, totalCirculation } = data?.jet?.own ?? {}
    expectClose(ringCirculation ?? NaN, totalCirculation ?? NaN, 0.03, 'ring and everything shed')
  })

  it('gives no formation number, and says so, where the ring is not let go', async () => {
    // Zhu, Zhang, Gao & Yu 2023: in a counter-flow of 0.4 of the jet the ring takes more than nine diameters.
    const plan = short({ programme: { ...QUICK, stroke: 0.03 * 6.5 }, ambient: { axialFlow: -0.07 } })
    const result = await jetOfRun(plan)
    expect(result.status).toBe('done')
    expect(result.data?.jet?.formation?.formationNumber).toBeNull()
    expect(result.data?.pulse?.formationNumber.computed).toBeNull()
    expect(result.data?.cautions.find(({ id }) => id === 'jet-no-pinch-off')?.text).toMatch(
      /No pinch-off was seen .* stroke of 6\.5 D/,
    )
  })
})

describe('a jet that cannot be computed', () => {
  it.each([
    ['a pulse that is a steady jet', { programme: { ...QUICK, stroke: 0.03 * 61 } }, 'programme.stroke', /within 60/],
    ['a stroke of next to nothing', { programme: { ...QUICK, stroke: 0.03 * 0.05 } }, 'programme.stroke', /at least/],
    ['a stream faster than the jet', { ambient: { axialFlow: 0.3 } }, 'ambient.axialFlow', /slower than the jet/],
  ])('refuses %s with its field', async (_, parts, field, message) => {
    const result = await jetOfRun(short(parts))
    expect(result.status).toBe('failed')
    expect(result.field).toBe(field)
    expect(result.message).toMatch(message)
    expect(result.data?.water.density).toBeGreaterThan(990)
  })

  it('refuses a table that draws fluid back in', async () => {
    const rows = [
      { time: 0, speed: 0 },
      { time: 0.1, speed: 0.2 },
      { time: 0.2, speed: -0.1 },
    ]
    const plan = short()
    const result = await jetOfRun({ ...plan, programme: { ...plan.programme, shape: 'table', rows } })
    expect(result).toMatchObject({ status: 'failed', field: expect.stringMatching(/^programme\.rows/) })
    expect(result.message).toMatch(/at least 0 m\/s/)
  })

  it('keeps the plan’s own jet where only the longer stroke breaks a limit', async () => {
    // 10 D/U long; stretched from a stroke of 1 to 8 diameters it is 75 D/U.
    const rows = [
      { time: 0, speed: 0.2 },
      { time: 0.15, speed: 0.2 },
      { time: 0.16, speed: 0.001 },
      { time: 1.5, speed: 0 },
    ]
    const result = await jetOfRun(short({ programme: { shape: 'table', rows } }))
    expect(result.status).toBe('done')
    expect(result.data?.jet?.formation).toBeNull()
    expect(result.data?.jet?.own.status).toBe('done')
    expect(result.data?.jet?.notes.join(' ')).toMatch(/No formation number: .* must end within 60 diameters/)
  })

  it('is asked for in vain where the plan has no such section and adopts none', async () => {
    const result = await run(planOf(), { sections: ['jet'] })
    expect(result).toMatchObject({ status: 'failed', message: expect.stringMatching(/no jet section/) })
  })
})

describe('a pulse that adopts the computed jet', () => {
  it('has the defaults of the jet where the plan has no section, and does not write it', async () => {
    const plan = planOf({ programme: QUICK, models: COMPUTED })
    const signal = { aborted: false }
    // The first run of the defaults at a stroke below 2 is at the small smoothing alone.
    const { data } = await run(plan, { sections: ['pulse', 'jet'] }, { signal, pause: stopAfter(signal, 30) })
    expect(data?.jet?.own.runs.map(({ delta }) => delta)).toEqual([0.05])
    expect(availableSections(plan)).not.toContain('jet')
  })

  it('adds its circulation and impulse to the slug, and no energy that the smoothing took', async () => {
    const { data } = await jetOfRun(short({ models: COMPUTED }))
    const pulse = data?.pulse
    const own = data?.jet?.own
    if (pulse === null || pulse === undefined || own === undefined) throw new Error('no pulse, no jet')
    expect(own.energyBeyondSlug).toBeLessThan(0)
    expectClose(pulse.total.circulation, pulse.slug.circulation + own.circulationBeyondSlug, 1e-12, 'circulation')
    expectClose(pulse.total.impulse, pulse.slug.impulse + own.impulseBeyondSlug, 1e-12, 'impulse')
    expectClose(pulse.total.energy, pulse.slug.energy, 1e-12, 'energy')
    expect(pulse.formationNumber.adopted).toBe(data?.jet?.formation?.formationNumber)
    expect(data?.jet?.notes.join(' ')).toMatch(/Where the computed jet is adopted, 0 is taken/)
  })

  it('has the same numbers whether or not the jet is asked for, and hands on only what was asked for', async () => {
    const plan = short({ models: COMPUTED })
    const both = await jetOfRun(plan)
    const alone = await run(plan, { sections: ['pulse'] }, { jetCache: shared })
    expect(alone.data?.pulse).toEqual(both.data?.pulse)
    expect(alone.data?.jet).toBeNull()
    expect(cautionIds(alone)).toContain('jet-one-constant')
  })

  it('carries a stream once: in the jet', async () => {
    const plan = short({ ambient: { axialFlow: 0.06 } })
    const { data } = await jetOfRun(plan)
    expect(data?.pulse?.formationNumber.computed).toBe(data?.jet?.formation?.formationNumber)
    // Zhu, Zhang, Gao & Yu 2023: a co-flow lowers the formation number.
    const still = await jetOfRun(short())
    expect(data?.jet?.formation?.formationNumber ?? Infinity).toBeLessThan(
      still.data?.jet?.formation?.formationNumber ?? NaN,
    )
  })

  it('hands its ring to a wake', async () => {
    const plan = short({ models: COMPUTED, wake: { duration: 0.1 } })
    const { status, data } = await run(plan, { sections: ['wake'] }, { jetCache: shared })
    expect(status).toBe('done')
    expectClose(
      data?.wake?.rings[0]?.circulation ?? NaN,
      data?.pulse?.ring?.circulation ?? NaN,
      1e-12,
      'circulation of ring 1',
    )
    expect(data?.pulse?.ring?.circulation).toBeGreaterThan(1.1 * (data?.pulse?.slug.circulation ?? NaN))
    expect(data?.jet).toBeNull()
  })
})

describe('cancelling', () => {
  it('keeps what the jet had by then, and water', async () => {
    const signal = { aborted: false }
    const result = await jetOfRun(short({ models: COMPUTED }), { signal, pause: stopAfter(signal, 40) })
    expect(result.status).toBe('cancelled')
    expect(result.message).toMatch(/^Cancelled at t = /)
    expect(result.data?.water.density).toBeGreaterThan(990)
    expect(result.data?.jet?.status).toBe('cancelled')
    expect(result.data?.jet?.own.shown.history.time.length).toBeGreaterThan(3)
    expect(result.data?.jet?.formation).toBeNull()
    expect(result.data?.pulse).toBeNull()
  })

  it('keeps the finished own stroke when it comes in the longer run', async () => {
    const signal = { aborted: false }
    const own = (await jetOfRun(short())).data?.jet?.own
    const result = await jetOfRun(short(), {
      signal,
      onProgress: ({ share }) => (signal.aborted ||= share > 0.1),
    })
    expect(result.status).toBe('cancelled')
    expect(result.data?.jet?.own.status).toBe('done')
    expect(result.data?.jet?.own.ringCirculation).toBe(own?.ringCirculation)
    expect(result.data?.jet?.formation?.formationNumber ?? null).toBeNull()
  })

  it('keeps no cancelled jet for the next run', async () => {
    const jetCache = createJetCache()
    const signal = { aborted: false }
    await jetOfRun(short(), { jetCache, signal, pause: stopAfter(signal, 20) })
    const { data } = await run(short(), { sections: ['pulse'], jet: 'cached' }, { jetCache })
    expect(data?.pulse?.formationNumber.computed).toBeNull()
  })

  it('reports progress that rises to its end', async () => {
    const shares: number[] = []
    await jetOfRun(short({ wake: { duration: 0.1 } }), { onProgress: ({ share }) => shares.push(share) })
    expect(shares.at(-1)).toBe(1)
    expect([...shares].sort((a, b) => a - b)).toEqual(shares)
    expect(shares.length).toBeGreaterThan(100)
  })
})

describe('the cache', () => {
  it('computes no jet anew for a change that leaves it as it is', async () => {
    const jetCache = createJetCache()
    await jetOfRun(short(), { jetCache })
    const again = counting({ jetCache })
    const changed = setField(setField(short({ models: COMPUTED }), 'nozzle.lossCoefficient', 0.4), 'water.depth', 3)
    expect((await jetOfRun(changed, again.options)).status).toBe('done')
    expect(again.steps()).toBe(0)
    const other = counting({ jetCache })
    await jetOfRun(setField(short(), 'nozzle.diameter', 0.031), other.options)
    expect(other.steps()).toBeGreaterThan(100)
  })

  it('runs only the own stroke anew where the stroke alone changes', async () => {
    const jetCache = createJetCache()
    const first = counting({ jetCache })
    await jetOfRun(short(), first.options)
    const second = counting({ jetCache })
    await jetOfRun(short({ programme: { ...QUICK, stroke: 0.033 } }), second.options)
    expect(second.steps()).toBeGreaterThan(0)
    expect(second.steps()).toBeLessThan(first.steps() / 2)
  })

  it('lets go of the jet that was not asked for longest', () => {
    const cache = createJetCache(2)
    const input = (diameter: number) => ({
      density: 1000,
      kinematicViscosity: 1e-6,
      diameter,
      programme: planOf().programme,
      axialFlow: 0,
      ...COARSE,
    })
    // Any value serves: a cache does not look into what it keeps.
    const jet = { mark: 'jet' } as unknown as Parameters<typeof cache.keep>[1]
    cache.keep(input(1), jet)
    cache.keep(input(2), jet)
    expect(cache.find(input(1))).toBe(jet)
    cache.keep(input(3), jet)
    expect(cache.find(input(2))).toBeNull()
    expect(cache.find(input(1))).toBe(jet)
    expect(cache.find({ ...input(1), settings: { snapshotStep: 0 } })).toBeNull()
  })
})

describe('a run that only looks for a finished jet', () => {
  const asked = { sections: ['water', 'pulse', 'jet'], jet: 'cached' } as const

  it('computes none, treats what is adopted from it as absent, and says so', async () => {
    const counted = counting({ jetCache: createJetCache() })
    const result = await run(short({ models: COMPUTED }), asked, counted.options)
    expect(counted.steps()).toBe(0)
    expect(result.status).toBe('done')
    const { pulse, jet } = result.data ?? {}
    expect(jet).toBeNull()
    expect(pulse?.formationNumber.computed).toBeNull()
    expect(pulse?.formationNumber.adopted).toBeNull()
    expect(pulse?.total).toEqual(pulse?.slug)
    expect(result.data?.cautions.find(({ id }) => id === 'jet-not-run')?.text).toMatch(
      /not been computed yet: until then nothing is added to the slug and no formation number is adopted/,
    )
  })

  it('finds it after a run, the same numbers in it', async () => {
    const jetCache = createJetCache()
    const plan = short({ models: COMPUTED })
    const whole = await jetOfRun(plan, { jetCache })
    const result = await run(plan, asked, { jetCache })
    expect(result.data).toEqual(whole.data)
  })

  it('keeps the formation number while only the stroke is dragged', async () => {
    const jetCache = createJetCache()
    await jetOfRun(short({ models: COMPUTED }), { jetCache })
    const dragged = await run(short({ models: COMPUTED, programme: { ...QUICK, stroke: 0.04 } }), asked, { jetCache })
    expect(dragged.data?.pulse?.formationNumber.computed).toBeGreaterThan(3)
    expect(dragged.data?.pulse?.total).toEqual(dragged.data?.pulse?.slug)
    expect(dragged.data?.cautions.find(({ id }) => id === 'jet-not-run')?.text).toMatch(
      /until then nothing is added to the slug\. /,
    )
  })

  it('says why there will be none where a limit is broken', async () => {
    const result = await run(short({ models: COMPUTED, programme: { ...QUICK, stroke: 0.001 } }), asked, {})
    expect(result.status).toBe('done')
    expect(result.data?.cautions.find(({ id }) => id === 'jet-not-run')?.text).toMatch(
      /cannot be computed: programme\.stroke must be at least 0\.1 of the diameter/,
    )
  })

  it('says nothing where the plan has no part in it', async () => {
    expect(cautionIds(await run(planOf(), { sections: ['pulse'], jet: 'cached' }))).not.toContain('jet-not-run')
  })
})

/** A pause that cancels after some steps of the jet. */
function stopAfter(signal: { aborted: boolean }, steps: number): () => Promise<void> {
  let left = steps
  return async () => {
    left--
    if (left <= 0) signal.aborted = true
  }
}
