import { describe, expect, it } from 'vitest'
import { EXAMPLES, examplePlan, pulseTable, summaryText } from '../../../core/plan'
import { availableSections, run } from '../../../core/run'
import { planOf } from '../../support/plans'

describe('run', () => {
  it('computes water always and the pulse when asked', async () => {
    const water = await run(planOf(), { sections: [] })
    expect(water.status).toBe('done')
    expect(water.data?.pulse).toBeNull()
    const both = await run(planOf(), { sections: ['water', 'pulse'] })
    expect(both.data?.pulse?.strokeRatio).toBeCloseTo(3.2, 12)
  })

  it('returns frozen data', async () => {
    const { data } = await run(planOf(), { sections: ['pulse'] })
    expect(Object.isFrozen(data)).toBe(true)
    expect(Object.isFrozen(data?.pulse?.history.time)).toBe(true)
  })

  it('repeats to the bit', async () => {
    const first = await run(planOf(), { sections: ['pulse'] })
    const second = await run(planOf(), { sections: ['pulse'] })
    expect(JSON.stringify(second)).toBe(JSON.stringify(first))
  })

  it('stops when it is cancelled before it starts, and keeps the water when cancelled after it', async () => {
    const before = await run(planOf(), { sections: ['pulse'] }, { signal: { aborted: true } })
    expect(before).toMatchObject({ status: 'cancelled', data: null })
    const signal = { aborted: false }
    const between = await run(planOf(), { sections: ['pulse'] }, { signal, onProgress: () => (signal.aborted = true) })
    expect(between.status).toBe('cancelled')
    expect(between.data?.water.density).toBeGreaterThan(990)
    expect(between.data?.pulse).toBeNull()
  })

  it('reports progress up to the end', async () => {
    const shares: number[] = []
    await run(planOf(), { sections: ['pulse'] }, { onProgress: ({ share }) => shares.push(share) })
    expect(shares.at(-1)).toBe(1)
    expect([...shares].sort((a, b) => a - b)).toEqual(shares)
  })

  it('says in a sentence which field cannot be computed', async () => {
    const plan = planOf()
    const result = await run({ ...plan, nozzle: { ...plan.nozzle, diameter: -1 } }, { sections: ['pulse'] })
    expect(result.status).toBe('failed')
    expect(result.field).toBe('nozzle.diameter')
    expect(result.message.length).toBeGreaterThan(30)
  })

  it('asks no pulse of a plan that has only rings', async () => {
    const plan = planOf({
      nozzle: undefined,
      programme: undefined,
      wake: { rings: [{ circulation: 0.01, radius: 0.02, coreRadius: 0.004 }], duration: 0.1 },
    })
    expect(availableSections(plan)).toEqual(['water', 'wake'])
    const wake = await run(plan, { sections: ['wake'] })
    expect(wake.status).toBe('done')
    expect(wake.data?.wake?.wake.trajectories.length).toBe(1)
    const result = await run(plan, { sections: ['pulse'] })
    expect(result.status).toBe('failed')
    expect(result.message).toMatch(/no nozzle and no programme/)
  })
})

describe('examples', () => {
  it.each(EXAMPLES.map((example) => [example.id, example.purpose] as const))(
    '%s computes and has a purpose in one line',
    async (id, purpose) => {
      const { data, status } = await run(examplePlan(id), { sections: ['pulse'], jet: 'cached' })
      expect(status).toBe('done')
      expect(data?.pulse?.slug.circulation).toBeGreaterThan(0)
      expect(purpose.length).toBeLessThan(100)
    },
  )

  it('show a laboratory ring, a thruster, low Reynolds number, pinch-off and an orifice', async () => {
    const pulse = async (id: string) => (await run(examplePlan(id), { sections: ['pulse'] })).data?.pulse
    expect((await pulse('bench-generator'))?.pinchedOff).toBe(false)
    expect((await pulse('inspection-thruster'))?.jetReynolds).toBeGreaterThan(4000)
    expect((await pulse('millimetre-nozzle'))?.jetReynolds).toBeLessThan(200)
    expect((await pulse('past-pinch-off'))?.pinchedOff).toBe(true)
    const adopted = (await pulse('sharp-orifice'))?.formationNumber.adopted
    expect(adopted).toBeLessThan(2.5)
  })
})

describe('tables written out', () => {
  it('pulse.csv has the contract’s columns, 201 times with the corners, and ends at the stroke’s sums', async () => {
    const { data } = await run(planOf(), { sections: ['pulse'] })
    const pulse = data?.pulse
    if (pulse === null || pulse === undefined) throw new Error('no pulse')
    const lines = pulseTable(pulse).trimEnd().split('\r\n')
    expect(lines[0]).toBe('time (s),exit speed (m/s),formation time,circulation (m2/s),impulse (N s),energy (J)')
    expect(lines.length - 1).toBeGreaterThanOrEqual(201)
    const end = (lines.at(-1) ?? '').split(',').map(Number)
    expect(end[0]).toBeCloseTo(pulse.duration, 12)
    expect(end[2]).toBeCloseTo(pulse.strokeRatio, 9)
    expect(end[3]).toBeCloseTo(pulse.slug.circulation, 12)
    expect(end[4]).toBeCloseTo(pulse.slug.impulse, 12)
    expect(end[5]).toBeCloseTo(pulse.slug.energy, 12)
  })

  it('summary.json holds the contract’s keys and no histories', async () => {
    const { data } = await run(planOf(), { sections: ['pulse'] })
    if (data === null) throw new Error('no data')
    const summary: unknown = JSON.parse(
      summaryText({
        ...data,
        title: 'x',
        files: ['pulse.csv'],
        program: { name: 'ringwright', version: '0' },
        inputHash: 'h',
      }),
    )
    expect(summary).toMatchObject({ format: 'ringwright-summary', version: 1, files: ['pulse.csv'], inputHash: 'h' })
    expect(Object.keys((summary as { pulse: object }).pulse)).toEqual(
      expect.arrayContaining([
        'stroke',
        'strokeRatio',
        'duration',
        'peakSpeed',
        'meanSpeed',
        'quickStart',
        'slug',
        'overPressure',
        'total',
        'dimensionlessEnergy',
        'formationNumber',
        'pinchedOff',
        'ring',
        'ringWithOverPressure',
        'trailingJet',
      ]),
    )
    expect((summary as { pulse: object }).pulse).not.toHaveProperty('history')
  })
})
