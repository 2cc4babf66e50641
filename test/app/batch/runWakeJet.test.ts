import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { runBatch } from '../../../app/batch/runBatch'
import { documentOf } from '../../support/plans'

let folder = ''

/** Coarse smoothing, for speed. A stroke of 6 diameters pinches off; the two pulses stand close. */
const PLAN = {
  programme: { shape: 'rectangular', stroke: 0.18, peakSpeed: 0.2 },
  jet: { ensemble: false, delta: 0.2, coreGrowth: true },
  train: { pulses: 2, period: 1.5 },
  wake: { start: 'jet', duration: 5, outputStep: 0.25, ageing: 'laminar' },
}

async function batch(parts: Readonly<Record<string, unknown>>, ...more: readonly string[]): Promise<string[]> {
  const notes: string[] = []
  await writeFile(path.join(folder, 'plan.json'), JSON.stringify(documentOf(parts)))
  const code = await runBatch(['plan.json', '--out', 'out', ...more], {
    folder,
    signal: new AbortController().signal,
    pause: () => new Promise((resolve) => setImmediate(resolve)),
    readStandardInput: async () => new Uint8Array(),
    writtenLine: () => undefined,
    note: (text) => notes.push(text),
  })
  return [String(code), ...notes]
}

async function rowsOf(name: string): Promise<string[][]> {
  const text = await readFile(path.join(folder, 'out', name), 'utf8')
  return text
    .trimEnd()
    .split('\r\n')
    .slice(1)
    .map((row) => row.split(','))
}

describe('the runner on a wake from the computed jet', () => {
  beforeAll(async () => {
    folder = await mkdtemp(path.join(tmpdir(), 'ringwright jet train '))
    expect(await batch(PLAN)).toEqual(['0'])
  }, 60_000)
  afterAll(() => rm(folder, { recursive: true, force: true }))

  it('tells each pulse’s pinch-off once in events.csv, in the order of time, the end last', async () => {
    const rows = await rowsOf('events.csv')
    const pinched = rows.filter((row) => row[1] === 'pinch-off')
    expect(pinched).toHaveLength(2)
    expect(Number(pinched[1]?.[0]) - Number(pinched[0]?.[0])).toBeCloseTo(1.5, 9)
    expect(pinched.map((row) => row[2])[0]).toBe('1')
    const times = rows.map((row) => Number(row[0]))
    expect(times).toEqual(times.toSorted((a, b) => a - b))
    expect(rows.at(-1)?.[1]).toBe('end')
  })

  it('writes every ring from its release on, at output steps only', async () => {
    const rows = await rowsOf('trajectory.csv')
    const released = rows.filter((row) => row[1] === '1').map((row) => Number(row[0]))
    const pinched = (await rowsOf('events.csv')).find((row) => row[1] === 'pinch-off')
    expect(Math.min(...released)).toBeGreaterThanOrEqual(Number(pinched?.[0]))
    for (const row of rows) expect(Number(row[0]) * 4).toBeCloseTo(Math.round(Number(row[0]) * 4), 9)
  })

  it('says in the summary where its rings come from', async () => {
    const { wake } = JSON.parse(await readFile(path.join(folder, 'out', 'summary.json'), 'utf8'))
    expect(wake.notes.join(' ')).toMatch(/starts from the computed jet at a smoothing of 0\.2 D/)
    expect(wake.drift).toEqual({ circulation: null, impulse: null, energy: null })
  })

  it('refuses a jet on several nozzles with the field', async () => {
    const nozzles = [
      { position: [0, 0, 0], direction: [1, 0, 0], delay: 0 },
      { position: [0, 0.1, 0], direction: [1, 0, 0], delay: 0 },
    ]
    const [code, note = ''] = await batch({ ...PLAN, wake: { ...PLAN.wake, nozzles } })
    expect(code).toBe('2')
    expect(note).toContain('wake.start must be matched here')
  })
})
