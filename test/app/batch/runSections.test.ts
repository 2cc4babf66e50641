import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { runBatch } from '../../../app/batch/runBatch'
import { expectClose } from '../../support/close'
import { documentOf } from '../../support/plans'
import { CONSTANT_SPEED, SINUSOIDAL } from '../../support/thrusterPlans'

let folder = ''
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright sections '))
})
afterEach(() => rm(folder, { recursive: true, force: true }))

async function batch(
  parts: Readonly<Record<string, unknown>>,
  rest: readonly string[] = [],
  signal = new AbortController().signal,
): Promise<{ readonly code: number; readonly written: readonly string[]; readonly notes: readonly string[] }> {
  await writeFile(path.join(folder, 'plan.json'), JSON.stringify(documentOf(parts)))
  const written: string[] = []
  const notes: string[] = []
  const code = await runBatch(['plan.json', '--out', 'out', ...rest], {
    folder,
    signal,
    pause: () => new Promise((resolve) => setImmediate(resolve)),
    readStandardInput: () => Promise.reject(new Error('no standard input here')),
    writtenLine: (text) => written.push(path.relative('out', text)),
    note: (text) => notes.push(text),
  })
  return { code, written, notes }
}

const read = (name: string): Promise<string> => readFile(path.join(folder, 'out', name), 'utf8')

async function summary(): Promise<Record<string, Record<string, unknown>>> {
  const text = await read('summary.json')
  expect(text).not.toMatch(/NaN|Infinity/)
  return JSON.parse(text)
}

const TANK = {
  tank: { length: 1.2, width: 0.4, depth: 0.5 },
  stations: [0.1, 0.2],
  matrix: { fields: [{ path: 'programme.stroke', values: [0.06, 0.09] }], kind: 'grid', repeats: 2, seed: 1 },
}

describe('the section thruster of a run', () => {
  it.each([
    ['12.5438 mN at constant speed', CONSTANT_SPEED, 0.0125438],
    ['0.0310063 N with a sinusoidal plunger', SINUSOIDAL, 0.0310063],
  ])('gives %s', async (_, parts, thrust) => {
    const { code, written } = await batch(parts, ['--only', 'thruster'])
    expect({ code, written }).toEqual({ code: 0, written: ['report.html', 'summary.json'] })
    const { thruster, pulse } = await summary()
    // Six digits are printed.
    expectClose(Number(thruster?.['meanThrust']), thrust, 5e-6)
    expect(pulse).toBeUndefined()
  })

  it('writes null where a speed jumps, since no actuator gives that', async () => {
    await batch(CONSTANT_SPEED, ['--only', 'thruster'])
    const { thruster } = await summary()
    expect(thruster).toMatchObject({ plunger: { acceleration: null }, froudeEfficiency: null, dragAtSpeed: null })
    expect(thruster).not.toHaveProperty('candidates')
    expect(thruster).not.toHaveProperty('cycle')
  })

  it('holds candidates and front where the plan asks for a search', async () => {
    const search = { diameter: [0.02, 0.04], strokeRatio: [2, 4], frequency: [0.5, 2], count: [1, 2], seed: 1 }
    const target = [{ thrust: 0.02, share: 1 }]
    await batch({ ...CONSTANT_SPEED, thruster: { count: 1, vehicle: null, target, search } }, ['--only', 'thruster'])
    const { thruster } = await summary()
    expect(thruster).toMatchObject({ front: expect.any(Array), sizing: { status: 'done' } })
    expect(thruster?.['candidates']).toEqual(expect.arrayContaining([expect.objectContaining({ feasible: true })]))
  }, 30_000)
})

describe('the section tankRun of a run', () => {
  it('writes profile, what to read first and the run matrix, and its summary', async () => {
    const { code, written } = await batch({ tankRun: TANK }, ['--only', 'tankRun'])
    expect({ code, written }).toEqual({
      code: 0,
      written: ['profile-read-first.txt', 'profile.csv', 'run-matrix.csv', 'report.html', 'summary.json'],
    })
    expect((await read('profile.csv')).split('\r\n')[0]).toBe(
      'time (s),piston position (m),piston speed (m/s),piston acceleration (m/s2)',
    )
    expect((await read('run-matrix.csv')).trimEnd().split('\r\n').length).toBe(1 + 4)
    expect(await read('profile-read-first.txt')).toMatch(/emergency stop within reach/)
    const { tankRun } = await summary()
    expect(tankRun?.['arrivals']).toMatchObject([{ station: 0.1, time: expect.any(Number) }, { station: 0.2 }])
    expect(tankRun?.['cautions']).toEqual(expect.arrayContaining([expect.objectContaining({ id: 'machine-guard' })]))
    expect(tankRun).toMatchObject({ settlingTime: expect.any(Number), solutions: [] })
  })

  it('without a matrix writes none, and a later run without a tank takes the profile away', async () => {
    const tankRun = { tank: TANK.tank, stations: TANK.stations }
    expect((await batch({ tankRun })).written).toEqual([
      'pulse.csv',
      'profile-read-first.txt',
      'profile.csv',
      'report.html',
      'summary.json',
    ])
    await batch({})
    expect((await readdir(path.join(folder, 'out'))).toSorted()).toEqual(['pulse.csv', 'report.html', 'summary.json'])
  })
})

describe('the section spread of a run', () => {
  const spread = { relative: { 'programme.peakSpeed': 0.01 }, samples: 100, seed: 1 }

  it('writes spread.csv, one row a quantity, and the same figures by path into the summary', async () => {
    const { code, written } = await batch({ spread }, ['--only', 'spread'])
    expect({ code, written }).toEqual({ code: 0, written: ['spread.csv', 'report.html', 'summary.json'] })
    const [header, ...rows] = (await read('spread.csv')).trimEnd().split('\r\n')
    expect(header).toBe('quantity,unit,nominal,mean,standard deviation,p05,p50,p95,samples')
    const document = await summary()
    const speed = rows.map((row) => row.split(',')).find(([name]) => name === 'pulse.ring.speed')
    expect(document['spread']?.['pulse.ring.speed']).toMatchObject({
      mean: Number(speed?.[3]),
      standardDeviation: Number(speed?.[4]),
      p05: Number(speed?.[5]),
      p95: Number(speed?.[7]),
    })
    expect(Object.keys(document['spread'] ?? {})).toEqual(rows.map((row) => row.split(',')[0]))
    expect(document['spreadRun']).toMatchObject({ status: 'done', samples: 100, used: 100, refused: 0, seed: 1 })
  })

  it('repeats to the byte', async () => {
    await batch({ spread })
    const first = [await read('spread.csv'), await read('summary.json')]
    await batch({ spread })
    expect([await read('spread.csv'), await read('summary.json')]).toEqual(first)
  })

  it('ends with 130 when it is interrupted', async () => {
    const controller = new AbortController()
    setTimeout(() => controller.abort(), 50)
    const { code, written } = await batch({ spread: { ...spread, samples: 100000 } }, [], controller.signal)
    expect({ code, written }).toEqual({ code: 130, written: [] })
  })
})
