import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { runBatch } from '../../../app/batch/runBatch'
import { expectClose } from '../../support/close'
import { documentOf } from '../../support/plans'

let folder = ''
beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright jet '))
  outcomes = { long: await batch('long', LONG), short: await batch('short', SHORT) }
}, 60_000)
afterAll(() => rm(folder, { recursive: true, force: true }))

interface Outcome {
  readonly code: number
  readonly written: readonly string[]
  readonly notes: readonly string[]
}
/** Two whole runs that several tests read. */
let outcomes: { readonly long: Outcome; readonly short: Outcome }

/** Run a plan into the folder `out`. */
async function batch(
  out: string,
  parts: Readonly<Record<string, unknown>>,
  rest: readonly string[] = [],
  signal = new AbortController().signal,
): Promise<Outcome> {
  await writeFile(path.join(folder, 'plan.json'), JSON.stringify(documentOf(parts)))
  const written: string[] = []
  const notes: string[] = []
  const code = await runBatch(['plan.json', '--out', out, ...rest], {
    folder,
    signal,
    pause: () => new Promise((resolve) => setImmediate(resolve)),
    readStandardInput: () => Promise.reject(new Error('no standard input here')),
    writtenLine: (text) => written.push(path.relative(out, text)),
    note: (text) => notes.push(text),
  })
  return { code, written, notes }
}

async function rowsOf(out: string, name: string): Promise<readonly (readonly string[])[]> {
  const text = await readFile(path.join(folder, out, name), 'utf8')
  expect(text.endsWith('\r\n')).toBe(true)
  expect(text).not.toMatch(/NaN|Infinity|null|undefined/)
  return text
    .trimEnd()
    .split('\r\n')
    .map((line) => line.split(','))
}

async function summary(out: string): Promise<Record<string, Record<string, unknown>>> {
  return JSON.parse(await readFile(path.join(folder, out, 'summary.json'), 'utf8'))
}

/** One coarse run, for speed; a stroke that is long enough to tell the formation number by itself, and one that is not. */
const COARSE = { ensemble: false, delta: 0.2, coreGrowth: true }
const LONG = { programme: { shape: 'rectangular', stroke: 0.24, peakSpeed: 0.2 }, jet: COARSE }
const SHORT = { programme: { shape: 'rectangular', stroke: 0.075, peakSpeed: 0.2 }, jet: COARSE }
const UNIT = 0.2 * 0.03

describe('the section jet of a run', () => {
  it('writes jet.csv: the contract’s columns, the ring’s empty until one is cut, sums at the end of the stroke', async () => {
    const { code, notes, written } = outcomes.long
    expect({ code, notes }).toEqual({ code: 0, notes: [] })
    expect(written).toEqual(['pulse.csv', 'jet.csv', 'events.csv', 'report.html', 'summary.json'])
    const [header, ...rows] = await rowsOf('long', 'jet.csv')
    expect(header).toEqual([
      'formation time',
      'time (s)',
      'total circulation (m2/s)',
      'ring circulation (m2/s)',
      'ring x (m)',
      'ring radius (m)',
      'impulse (N s)',
      'energy (J)',
    ])
    const ring = rows.map((row) => row.slice(3, 6))
    const cut = ring.findIndex(([circulation]) => circulation !== '')
    expect(cut).toBeGreaterThan(10)
    expect(ring.slice(0, cut).every((cells) => cells.every((cell) => cell === ''))).toBe(true)
    expect(rows.every((row) => row[2] !== '' && row[6] !== '' && row[7] !== '')).toBe(true)

    const { jet = {}, pulse = {} } = await summary('long')
    // The whole stroke of 8 diameters is over at this row; what follows it is a stopping vortex.
    const end = rows.find((row) => Number(row[0]) > 8 - 1e-9) ?? []
    expectClose(Number(end[2]), Number(jet['totalCirculation']), 1e-12, 'total circulation')
    const slug = pulse['slug'] as { circulation: number; impulse: number }
    expectClose(Number(end[2]), slug.circulation + Number(jet['circulationBeyondSlug']), 1e-12, 'slug and beyond')
    expectClose(Number(end[6]), slug.impulse + Number(jet['impulseBeyondSlug']), 1e-12, 'impulse of all')
  })

  it('writes the contract’s keys into summary.json, each with a number of its size', async () => {
    const { jet = {}, pulse = {} } = await summary('long')
    // P Gharib, Rambod & Shariff 1998: 3.6..4.5; a tenth on either side for one coarse smoothing length.
    expect(jet['formationNumber']).toBeGreaterThan(3.5)
    expect(jet['formationNumber']).toBeLessThan(4.6)
    expect(jet['formationNumberLow']).toBe(jet['formationNumber'])
    expect(jet['formationNumberHigh']).toBe(jet['formationNumber'])
    expect(jet['byDelta']).toEqual([expect.objectContaining({ delta: 0.2, formationNumber: jet['formationNumber'] })])
    expect(pulse['formationNumber']).toMatchObject({ computed: jet['formationNumber'] })
    // O: ring circulation 2.2 +- 0.15 U D, twice that width for the coarse smoothing.
    expect(Math.abs(Number(jet['ringCirculation']) / UNIT - 2.2)).toBeLessThan(0.3)
    expect(Number(jet['totalCirculation'])).toBeGreaterThan(Number(jet['ringCirculation']))
    // Constant speed: formation number = speed times instant over diameter.
    expectClose((Number(jet['formationInstant']) * 0.2) / 0.03, Number(jet['formationNumber']), 1e-9, 'instant')
    expect(Number(jet['pinchOffTime'])).toBeGreaterThan(Number(jet['formationInstant']))
    for (const key of ['ringDimensionlessEnergy', 'ringSpeed', 'impulseBeyondSlug', 'filaments'])
      expect(jet[key], key).toEqual(expect.any(Number))
    // Identities of the scheme: impulse within 1e-3, energy within 5e-3.
    const drift = jet['drift'] as { impulse: number; energy: number }
    expect(drift.impulse).toBeLessThan(1e-3)
    expect(drift.energy).toBeLessThan(5e-3)
    expect(jet).not.toHaveProperty('history')
  })

  it('tells of pinch-off in events.csv, then of the end', async () => {
    const [header, ...rows] = await rowsOf('long', 'events.csv')
    expect(header).toEqual(['time (s)', 'event', 'rings', 'x (m)', 'detail'])
    expect(rows.map((row) => row[1])).toEqual(['pinch-off', 'end'])
    const { jet = {} } = await summary('long')
    expect(Number(rows[0]?.[0])).toBe(jet['pinchOffTimeShown'])
    // One smoothing length alone: its own mean.
    expect(jet['pinchOffTimeShown']).toBe(jet['pinchOffTime'])
    expect(rows[0]?.[4]).toContain(`in the shown run (smoothing length ${String(jet['shownDelta'])} D)`)
    expect(rows[0]?.[2]).toBe('1')
    expect(Number(rows[0]?.[3])).toBeGreaterThan(0)
  })

  it('sorts the pinch-off in among the events of a wake, whose end is last', async () => {
    await batch('wake', { ...LONG, wake: { duration: 6, outputStep: 0.5, stations: [0.05, 0.4] } })
    const [, ...rows] = await rowsOf('wake', 'events.csv')
    const kinds = rows.map((row) => row[1])
    expect(kinds.filter((kind) => kind === 'pinch-off').length).toBe(1)
    expect(kinds.filter((kind) => kind === 'end').length).toBe(1)
    expect(kinds.at(-1)).toBe('end')
    expect(kinds).toContain('arrival')
    const times = rows.map((row) => Number(row[0]))
    expect(times).toEqual([...times].sort((a, b) => a - b))
    expect(times.at(-1)).toBe(6)
  }, 20_000)

  it('has a formation number from a longer stroke where its own is short, and no pinch-off of its own', async () => {
    const { jet = {} } = await summary('short')
    expect(jet['formationStrokeRatio']).toBeCloseTo(8, 9)
    expect(jet['strokeRatio']).toBeCloseTo(2.5, 9)
    expect(jet['formationNumber']).toBeGreaterThan(3)
    expect(jet['pinchOffTime']).toBeNull()
    expect(jet['trailingJet']).toBe(false)
    expect((await rowsOf('short', 'events.csv')).map((row) => row[1])).toEqual(['event', 'end'])
  })

  it('repeats to the byte, the jet alone when asked for it alone', async () => {
    const { written } = await batch('alone', SHORT, ['--only', 'jet'])
    expect(written).toEqual(['jet.csv', 'events.csv', 'report.html', 'summary.json'])
    const alone = await summary('alone')
    expect(alone).not.toHaveProperty('pulse')
    expect(alone['jet']).toEqual((await summary('short'))['jet'])
    for (const name of ['jet.csv', 'events.csv'])
      expect(await readFile(path.join(folder, 'alone', name))).toEqual(await readFile(path.join(folder, 'short', name)))
  }, 20_000)

  it('gives the pulse of a whole run when asked for that alone', async () => {
    const { written } = await batch('pulse', SHORT, ['--only', 'pulse'])
    expect(written).toEqual(['pulse.csv', 'report.html', 'summary.json'])
    const only = await summary('pulse')
    expect(only).not.toHaveProperty('jet')
    expect(only['pulse']).toEqual((await summary('short'))['pulse'])
  }, 20_000)
})

describe('a refusal', () => {
  it('meets the jet of a plan that has no such section, though a model adopts it', async () => {
    const adopting = { programme: SHORT.programme, models: { formationNumber: 'computed' } }
    const { code, notes } = await batch('refused', adopting, ['--only', 'jet'])
    expect(code).toBe(2)
    expect(notes.join()).toMatch(/Section jet cannot be computed: the plan has no jet/)
  })

  it('names field, value and limit of a pulse that no jet can be computed for', async () => {
    const endless = { ...LONG, programme: { shape: 'rectangular', stroke: 3, peakSpeed: 0.2 } }
    const { code, notes, written } = await batch('endless', endless)
    expect(code).toBe(2)
    expect(written).toEqual([])
    expect(notes.join()).toMatch(/programme\.stroke must end within 60 diameters .* got 15 s/)
  })
})

describe('an interrupt', () => {
  it('stops a jet under way with exit code 130', async () => {
    const controller = new AbortController()
    setTimeout(() => controller.abort(), 60)
    const { code } = await batch('interrupted', { ...LONG, jet: {} }, [], controller.signal)
    expect(code).toBe(130)
  })
})
