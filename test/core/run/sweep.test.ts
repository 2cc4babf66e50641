import { describe, expect, it } from 'vitest'
import { setNumber, setSweep, sweepResults, type SweepRow } from '../../../core/plan'
import { createJetCache, run, sweepDesign, sweepOf } from '../../../core/run'
import { planOf } from '../../support/plans'
import { CONSTANT_SPEED } from '../../support/thrusterPlans'

const FIELDS = [
  { path: 'nozzle.diameter', values: [0.02, 0.03] },
  { path: 'programme.stroke', from: 0.05, to: 0.11, count: 3 },
]
const SPEED = { fields: FIELDS, results: ['pulse.ring.speed'] }

describe('a sweep', () => {
  it('takes every combination of the values, the last field fastest, with rows from 1', async () => {
    const { rows, status, total } = await sweepOf(planOf({ sweep: SPEED }))
    expect({ status, total }).toEqual({ status: 'done', total: 6 })
    expect(rows.map(({ row }) => row)).toEqual([1, 2, 3, 4, 5, 6])
    expect(rows.map(({ inputs }) => inputs)).toEqual([
      [0.02, 0.05],
      [0.02, 0.08],
      [0.02, 0.11],
      [0.03, 0.05],
      [0.03, 0.08],
      [0.03, 0.11],
    ])
  })

  it('reads from a row what the plan with those values gives by itself', async () => {
    const plan = planOf({ sweep: SPEED })
    const { rows } = await sweepOf(plan)
    const alone = setNumber(setNumber(plan, 'nozzle.diameter', 0.03), 'programme.stroke', 0.08)
    const { data } = await run(alone, { sections: ['pulse'] })
    expect(rows[4]?.results).toEqual([data?.pulse?.ring?.speed])
  })

  it('reads the usual results of the sections that stand in the plan where it names none', async () => {
    const plan = planOf({ ...CONSTANT_SPEED, sweep: { fields: FIELDS } })
    const { results, rows } = await sweepOf(plan)
    expect(results).toEqual(sweepResults(plan))
    expect(results).toEqual(
      expect.arrayContaining([
        'pulse.formationNumber.adopted',
        'pulse.ring.circulation',
        'pulse.ring.speed',
        'thruster.meanThrust',
        'thruster.power.total',
      ]),
    )
    const thrust = results.indexOf('thruster.meanThrust')
    // f rho A U L: four ninths of the area at the same stroke.
    expect(Number(rows[1]?.results[thrust]) / Number(rows[4]?.results[thrust])).toBeCloseTo(4 / 9, 12)
  })

  it('sets items of lists, and numbers of a part that was absent', async () => {
    const tank = { tank: { length: 1.2, width: 0.4, depth: 0.5 }, stations: [0.1, 0.2] }
    const sweep = {
      fields: [{ path: 'tankRun.stations.1', values: [0.2, 0.3] }],
      results: ['tankRun.arrivals.0.time', 'tankRun.arrivals.1.station'],
    }
    const { rows } = await sweepOf(planOf({ tankRun: tank, sweep }))
    expect(rows.map(({ results }) => results[1])).toEqual([0.2, 0.3])
    const trains = { fields: [{ path: 'train.period', values: [1, 2] }], results: ['thruster.frequency'] }
    const parts = { ...CONSTANT_SPEED, train: undefined }
    expect((await sweepOf(planOf({ ...parts, sweep: trains }))).rows.map(({ results }) => results)).toEqual([
      [1],
      [0.5],
    ])
  })

  it('writes a row that is refused with its reason and goes on', async () => {
    const nozzle = { shape: 'converging', diameter: 0.03, pistonDiameter: 0.06 }
    // Set in the open plan: a file with such a value is refused when it is read.
    const fields = [{ path: 'nozzle.radialRatio', values: [0.2, 0.6, 0.3], given: null }]
    const plan = setSweep(planOf({ nozzle }), { fields, results: ['pulse.slug.circulation'] })
    const { rows, status } = await sweepOf(plan)
    expect(status).toBe('done')
    expect(rows.map(({ feasible }) => feasible)).toEqual([true, false, true])
    expect(rows[1]?.results).toEqual([null])
    expect(rows[1]?.limit).toMatch(/nozzle\.radialRatio/)
    expect(rows[0]?.limit).toBeNull()
  })

  it('writes a row whose plan breaks a limit between two fields with its reason', async () => {
    // A stroke of 0.16 s does not fit into a period of 0.1 s.
    const sweep = { fields: [{ path: 'train.period', values: [1, 0.1] }], results: ['thruster.meanThrust'] }
    const { rows } = await sweepOf(planOf({ ...CONSTANT_SPEED, sweep }))
    expect(rows.map(({ feasible }) => feasible)).toEqual([expect.any(Boolean), false])
    expect(rows[1]).toMatchObject({ results: [null], limit: expect.stringMatching(/train\.period/) })
  })

  it('names the limits that a row breaks', async () => {
    const thruster = { count: 1, vehicle: null, actuator: { maxTravel: 0.018 } }
    const sweep = { fields: [{ path: 'programme.stroke', values: [0.06, 0.08] }], results: ['thruster.meanThrust'] }
    const { rows } = await sweepOf(planOf({ ...CONSTANT_SPEED, thruster, sweep }))
    // Travel is a quarter of the stroke: 15 and 20 mm.
    expect(rows.map(({ limit }) => limit)).toEqual([null, 'plunger travel'])
    expect(rows.map(({ feasible }) => feasible)).toEqual([true, false])
    expect(rows[1]?.results[0]).toBeGreaterThan(0)
  })

  it('computes a jet once for rows that do not change it', async () => {
    const sweep = { fields: [{ path: 'water.depth', values: [1, 1, 1] }], results: ['jet.ringCirculation'] }
    const jetCache = createJetCache()
    let kept = 0
    const counting = {
      ...jetCache,
      keep: (...jet: Parameters<typeof jetCache.keep>) => ((kept += 1), jetCache.keep(...jet)),
    }
    const programme = { shape: 'rectangular', stroke: 0.24, peakSpeed: 0.2 }
    const jet = { ensemble: false, delta: 0.2 }
    const { rows } = await sweepOf(planOf({ programme, jet, sweep }), { jetCache: counting })
    expect(kept).toBe(1)
    expect(new Set(rows.map(({ results }) => results[0])).size).toBe(1)
  }, 30_000)

  it.each<readonly [string, Readonly<Record<string, unknown>>, string]>([
    ['no field', { sweep: { fields: [] } }, 'sweep.fields'],
    [
      'a number that the rows of a table rule',
      {
        programme: {
          shape: 'table',
          rows: [
            { time: 0, speed: 0 },
            { time: 0.2, speed: 0.1 },
            { time: 0.6, speed: 0 },
          ],
        },
        sweep: { fields: [{ path: 'programme.peakSpeed', values: [0.2] }] },
      },
      'sweep.fields.0.path',
    ],
    [
      'a result of a section that is absent',
      { sweep: { fields: FIELDS, results: ['wake.passes'] } },
      'sweep.results.0',
    ],
    [
      'a result that the summary does not know',
      { sweep: { fields: FIELDS, results: ['pulse.ring.speed', 'pulse.ring.sped'] } },
      'sweep.results.1',
    ],
    ['a result that is a part', { sweep: { fields: FIELDS, results: ['pulse.ring'] } }, 'sweep.results.0'],
  ])('is refused with its field for %s', async (_, parts, field) => {
    const result = await run(planOf(parts), { sections: ['sweep'] })
    expect(result).toMatchObject({ status: 'failed', field })
    expect(result.message).toMatch(/must/)
  })
})

it('a sweep of an item of a list that is not there is refused with its field', async () => {
  const fields = [{ path: 'wake.stations.4', values: [1], given: null }]
  const plan = setSweep(planOf({ wake: { stations: [0.1] } }), { fields })
  expect(await run(plan, { sections: ['sweep'] })).toMatchObject({ status: 'failed', field: 'sweep.fields.0.path' })
})

describe('part of a sweep', () => {
  it('is every n-th row, and all parts together are the whole', async () => {
    const plan = planOf({ sweep: SPEED })
    const { rows } = await sweepOf(plan)
    const parts = await Promise.all([1, 2, 3, 4].map((index) => sweepOf(plan, { part: { index, of: 4 } })))
    expect(parts.map((part) => part.rows.map(({ row }) => row))).toEqual([[1, 5], [2, 6], [3], [4]])
    expect(parts.flatMap((part) => part.rows).toSorted((a, b) => a.row - b.row)).toEqual(rows)
  })

  it('goes on after the rows that are there', async () => {
    const told: SweepRow[] = []
    const { rows } = await sweepOf(planOf({ sweep: SPEED }), {
      from: 4,
      keepRows: false,
      onRow: async (row) => void told.push(row),
    })
    expect(rows).toEqual([])
    expect(told.map(({ row }) => row)).toEqual([5, 6])
  })

  it('is cancelled between two rows with those that are finished', async () => {
    const signal = { aborted: false }
    const { status, rows } = await sweepOf(planOf({ sweep: SPEED }), {
      signal,
      onRow: ({ row }) => void (signal.aborted = row === 2),
    })
    expect(status).toBe('cancelled')
    expect(rows.map(({ row }) => row)).toEqual([1, 2])
  })
})

it('the search of a thruster is made in a sweep only where its results are read', () => {
  const sizing = (results: readonly string[]) =>
    sweepDesign(planOf({ ...CONSTANT_SPEED, sweep: { fields: FIELDS, results } })).request.sizing
  expect(sizing(['thruster.meanThrust'])).toBe('off')
  expect(sizing(['thruster.candidates.0.power'])).toBe('run')
})
