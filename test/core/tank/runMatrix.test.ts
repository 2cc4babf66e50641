import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { runMatrix, MOST_RUNS, type MatrixInput } from '../../../core/tank'

const COST = { settlingTime: 180, storage: 1e9 }

const STROKES = { path: 'programme.stroke', values: [0.04, 0.06, 0.08] }
const SPEEDS = { path: 'programme.peakSpeed', values: [0.1, 0.2] }
const NOZZLES = { path: 'nozzle.diameter', values: [0.02, 0.03] }

function matrix(parts: Partial<MatrixInput> = {}): MatrixInput {
  return {
    fields: [STROKES, SPEEDS, NOZZLES],
    kind: 'grid',
    samples: null,
    repeats: 3,
    seed: 1,
    blocks: ['nozzle.diameter'],
    minutesPerRun: 6,
    minutesPerSetUp: 30,
    ...parts,
  }
}

const key = (values: readonly number[]): string => values.join(' ')

function counted<T>(list: readonly T[]): Map<T, number> {
  const counts = new Map<T, number>()
  for (const item of list) counts.set(item, (counts.get(item) ?? 0) + 1)
  return counts
}

const levels = fc.uniqueArray(fc.integer({ min: 1, max: 50 }), { minLength: 1, maxLength: 5 })
const anyMatrix: fc.Arbitrary<MatrixInput> = fc
  .record({
    lists: fc.array(levels, { minLength: 1, maxLength: 3 }),
    kind: fc.constantFrom('grid' as const, 'latin' as const),
    samples: fc.option(fc.integer({ min: 1, max: 40 })),
    repeats: fc.integer({ min: 1, max: 4 }),
    seed: fc.integer({ min: 0, max: 2 ** 40 }),
    blocked: fc.integer({ min: 0, max: 3 }),
  })
  .map(({ lists, blocked, ...rest }) => {
    const fields = lists.map((values, i) => ({ path: `field.${i}`, values }))
    const blocks = fields.slice(0, blocked).map(({ path }) => path)
    return { ...rest, fields, blocks, minutesPerRun: 1, minutesPerSetUp: 1 }
  })

describe('the run matrix', () => {
  it('of a grid holds every combination as often as it is repeated, numbered in order', () => {
    const { runs, combinations } = runMatrix(matrix(), COST)
    expect(combinations).toBe(12)
    expect(runs.map(({ run }) => run)).toEqual(Array.from({ length: 36 }, (_, i) => i + 1))
    const counts = counted(runs.map(({ values }) => key(values)))
    expect(counts.size).toBe(12)
    expect(new Set(counts.values())).toEqual(new Set([3]))
  })

  it('covers every level alike, counts repeats in order and finishes a block before the next', () => {
    fc.assert(
      fc.property(anyMatrix, (input) => {
        const { runs, blocks } = runMatrix(input, COST)
        input.fields.forEach(({ values }, i) => {
          const counts = counted(runs.map((run) => run.values[i]))
          const seen = values.map((value) => (counts.get(value) ?? 0) / input.repeats)
          // A latin hypercube whose rows do not divide by the levels takes some once more.
          const most = input.kind === 'grid' ? 0 : 1
          expect(Math.max(...seen) - Math.min(...seen)).toBeLessThanOrEqual(most)
        })
        const places = input.fields.flatMap(({ path }, i) => (input.blocks.includes(path) ? [i] : []))
        const setUpOf = (values: readonly number[]): string => places.map((i) => values[i]).join(' ')
        const setUps = runs.map(({ values }) => setUpOf(values))
        const changes = setUps.filter((setUp, k) => k > 0 && setUp !== setUps[k - 1]).length
        expect(changes + 1).toBe(new Set(setUps).size)
        expect(blocks).toBe(new Set(setUps).size)
        runs.forEach(({ block }, k) => {
          const before = runs[k - 1]
          if (before !== undefined) expect(block - before.block).toBe(setUps[k] === setUps[k - 1] ? 0 : 1)
        })
        // The n-th time a combination is drawn within the day is a repeat not above n.
        const seen = new Map<string, number>()
        for (const { values, repeat } of runs) {
          seen.set(key(values), (seen.get(key(values)) ?? 0) + 1)
          expect(repeat).toBeLessThanOrEqual(seen.get(key(values)) ?? 0)
        }
      }),
    )
  })

  it('repeats to the run for a seed and changes with it', () => {
    const order = (seed: number): string[] => runMatrix(matrix({ seed }), COST).runs.map(({ values }) => key(values))
    expect(order(1)).toEqual(order(1))
    expect(order(1)).not.toEqual(order(2))
    expect(order(1).toSorted()).toEqual(order(2).toSorted())
  })

  it('runs in an order that favours no level: the mean place of each is that of all', () => {
    const input = matrix({ blocks: [], fields: [SPEEDS], repeats: 20 })
    let sum = 0
    const seeds = 400
    for (let seed = 0; seed < seeds; seed++) {
      const { runs } = runMatrix({ ...input, seed }, COST)
      const places = runs.flatMap(({ run, values }) => (values[0] === 0.1 ? [run] : []))
      sum += places.reduce((a, b) => a + b, 0) / places.length
    }
    // The mean of 20 places of 40 scatters by sqrt(41 x 40 / 12 / 40) = 1.85, over 400 seeds by 0.092: four of those.
    expect(Math.abs(sum / seeds - 20.5)).toBeLessThan(0.37)
  })

  it('of a latin hypercube has as many rows as asked, or as the longest list', () => {
    expect(runMatrix(matrix({ kind: 'latin', repeats: 1 }), COST).combinations).toBe(3)
    expect(runMatrix(matrix({ kind: 'latin', repeats: 2, samples: 7 }), COST)).toMatchObject({ combinations: 7 })
  })

  it('sums time and storage: the longer of run and waiting, and a set-up a block', () => {
    const told = runMatrix(matrix(), COST)
    expect(told.time).toEqual({ runs: 36 * 360, setUps: 2 * 1800, total: 36 * 360 + 2 * 1800 })
    expect(told.storage).toBe(36e9)
    expect(told.text).toMatch(/36 runs of 12 combinations in 2 set-ups take 4\.6 hours/)
    expect(runMatrix(matrix(), { settlingTime: 600, storage: null })).toMatchObject({
      time: { runs: 36 * 600 },
      storage: null,
    })
  })

  it('without fields is the plan itself, repeated', () => {
    const told = runMatrix(matrix({ fields: [], blocks: [] }), COST)
    expect(told.runs.map(({ repeat, values }) => [repeat, values])).toEqual([
      [1, []],
      [2, []],
      [3, []],
    ])
  })

  it('refuses what cannot be run, with the field', () => {
    const refused = (parts: Partial<MatrixInput>): unknown => {
      try {
        runMatrix(matrix(parts), COST)
      } catch (error) {
        return error
      }
      return null
    }
    const wide = Array.from({ length: 50 }, (_, i) => i)
    expect(
      refused({
        fields: [
          { path: 'a', values: wide },
          { path: 'b', values: wide },
        ],
        blocks: [],
      }),
    ).toMatchObject({
      field: 'tankRun.matrix.fields',
      message: `tankRun.matrix.fields must come to at most ${MOST_RUNS} runs, got 2500 combinations x 3 repeats = 7500`,
    })
    expect(refused({ fields: [{ ...STROKES, values: [] }], blocks: [] })).toMatchObject({
      field: 'tankRun.matrix.fields.0.values',
    })
    expect(refused({ fields: [{ ...STROKES, values: [0.1, 0.1] }], blocks: [] })).toMatchObject({
      field: 'tankRun.matrix.fields.0.values.1',
    })
    expect(refused({ fields: [STROKES, STROKES], blocks: [] })).toMatchObject({ field: 'tankRun.matrix.fields.1.path' })
    expect(refused({ blocks: ['water.salinity'] })).toMatchObject({ field: 'tankRun.matrix.blocks.0' })
    expect(refused({ repeats: 0 })).toMatchObject({ field: 'tankRun.matrix.repeats' })
    expect(refused({ repeats: 1.5 })).toMatchObject({ field: 'tankRun.matrix.repeats' })
    expect(refused({ seed: -1 })).toMatchObject({ field: 'tankRun.matrix.seed' })
  })
})
