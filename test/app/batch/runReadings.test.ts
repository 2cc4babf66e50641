/** Readings in the runner: an invented day in the plan, and files beside it through --data. */
import { mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { runBatch } from '../../../app/batch/runBatch'
import { EXAMPLES } from '../../../core/plan'
import { INVENTED_RING, INVENTED_TIMES, inventedFrame } from '../../support/inventedFields'

let folder = ''
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright readings '))
})
afterEach(() => rm(folder, { recursive: true, force: true }))

async function batch(list: readonly string[]) {
  const written: string[] = []
  const notes: string[] = []
  const code = await runBatch(list, {
    folder,
    signal: new AbortController().signal,
    date: '4 June 2031',
    pause: () => new Promise((resolve) => setImmediate(resolve)),
    readStandardInput: async () => new Uint8Array(),
    writtenLine: (text) => written.push(text),
    note: (text) => notes.push(text),
  })
  return { code, written, notes }
}

/** The plan of the invented day, with parts of its readings replaced. */
async function writeDay(readings: Readonly<Record<string, unknown>> = {}): Promise<void> {
  const text = EXAMPLES.find(({ id }) => id === 'tank-day-measured')?.text ?? ''
  const plan = JSON.parse(text)
  await writeFile(
    path.join(folder, 'day.json'),
    JSON.stringify({ ...plan, readings: { ...plan.readings, ...readings } }),
  )
}

interface ReadingsSummary {
  readonly fit: { readonly circulation: { readonly value: number; readonly standardError: number } }
  readonly perRun: readonly { readonly run: string }[]
  readonly force: { readonly mean: number; readonly peak: number; readonly impulse: number; readonly ripple: number }
  readonly verdicts: readonly { readonly text: string }[]
  readonly rows: number
  readonly fields: {
    readonly frames: number
    readonly ring: { readonly circulation: { readonly value: number }; readonly radius: { readonly value: number } }
  }
}

async function readingsOf(): Promise<ReadingsSummary> {
  const summary: { readonly readings: ReadingsSummary } = JSON.parse(
    await readFile(path.join(folder, 'out', 'summary.json'), 'utf8'),
  )
  return summary.readings
}

const FIELDS = {
  frames: [0, 1, 2, 3, 4, 5].map((k) => ({
    name: `f${k}.csv`,
    time: INVENTED_TIMES.first + INVENTED_TIMES.step * k,
  })),
  hash: '',
}

describe('the section readings', () => {
  it('fits what the plan holds and writes summary, table and report', async () => {
    await writeDay()
    const { code, written, notes } = await batch(['day.json', '--out', 'out', '--only', 'readings'])
    expect({ code, notes }).toEqual({ code: 0, notes: [] })
    expect(written.map((name) => path.basename(name))).toEqual(['readings.csv', 'report.html', 'summary.json'])
    const { fit, perRun, force, verdicts } = await readingsOf()
    // Made with 0.93 of the slug's 30.92 cm2/s.
    expect(fit.circulation.value).toBeGreaterThan(28.4e-4)
    expect(fit.circulation.value).toBeLessThan(29.1e-4)
    expect(fit.circulation.standardError).toBeGreaterThan(0)
    expect(perRun.map(({ run }) => run)).toEqual(['1', '2', '3'])
    for (const name of ['mean', 'peak', 'impulse', 'ripple'] as const) expect(force[name]).toBeGreaterThan(0)
    expect(verdicts[0]?.text).toMatch(/below the predicted band/)
    const table = await readFile(path.join(folder, 'out', 'readings.csv'), 'utf8')
    // 36 rows of three quantities, the heading and the end of the last line.
    expect(table.split('\r\n')).toHaveLength(3 * 36 + 2)
    const report = await readFile(path.join(folder, 'out', 'report.html'), 'utf8')
    expect(report).toContain('Readings against the prediction')
    expect(report).toContain('Run by run')
  })

  it('reads tracks and velocity fields by name from the folder of --data', async () => {
    await mkdir(path.join(folder, 'data'))
    await writeDay({
      rows: [],
      sources: [
        {
          name: 'tracks.csv',
          hash: 'another',
          kind: 'rows',
          columns: [
            { heading: 'when', role: 'time', unit: 's' },
            { heading: 'where', role: 'x', unit: 'mm' },
          ],
        },
      ],
      fields: FIELDS,
    })
    const rows = Array.from({ length: 10 }, (_, k) => `${1 + 0.3 * k},${40 + 12 * k + (k % 2 === 0 ? 0.3 : -0.3)}`)
    await writeFile(path.join(folder, 'data', 'tracks.csv'), `when,where\n${rows.join('\n')}\n`)
    for (const [k, { name }] of FIELDS.frames.entries())
      await writeFile(path.join(folder, 'data', name), inventedFrame(k))
    const { code, notes } = await batch(['day.json', '--out', 'out', '--only', 'readings', '--data', 'data'])
    expect({ code, notes }).toEqual({
      code: 0,
      notes: ['tracks.csv is not the file the plan was made with: its hash differs.'],
    })
    const { rows: count, fields } = await readingsOf()
    expect(count).toBe(10)
    expect(fields.frames).toBe(6)
    // Noise of 0.5 mm/s on 4131 vectors, and a core of three spacings: within 3 % of what it was made with.
    expect(Math.abs(fields.ring.circulation.value / INVENTED_RING.circulation - 1)).toBeLessThan(0.03)
    expect(Math.abs(fields.ring.radius.value / INVENTED_RING.radius - 1)).toBeLessThan(0.02)
  })

  it('says why nothing can be fitted, and writes what can still be told', async () => {
    const none = { radius: null, circulation: null, sigmaX: null, sigmaRadius: null, sigmaCirculation: null }
    await writeDay({ rows: ['1', '1', '2', '2'].map((run) => ({ ...none, run, time: 2, x: 0.1 })) })
    const { code, notes } = await batch(['day.json', '--out', 'out', '--only', 'readings'])
    expect({ code, notes }).toEqual({
      code: 0,
      notes: ['The readings: Nothing can be fitted to 4 readings, all of one moment.'],
    })
    const report = await readFile(path.join(folder, 'out', 'report.html'), 'utf8')
    expect(report).not.toMatch(/NaN|undefined/)
    expect(report).toContain('all of one moment')
  })

  it('says which fields are left out where no folder is named', async () => {
    await writeDay({ fields: FIELDS })
    const { code, notes } = await batch(['day.json', '--out', 'out', '--only', 'readings'])
    expect(code).toBe(0)
    expect(notes.join(' ')).toContain(
      'The 6 velocity fields of the readings are left out: --data must name their folder.',
    )
  })

  it('refuses a file that is not there, one named with a way, and a folder without readings', async () => {
    await mkdir(path.join(folder, 'data'))
    await writeDay({ fields: FIELDS })
    const missing = await batch(['day.json', '--out', 'out', '--data', 'data'])
    expect(missing.code).toBe(2)
    expect(missing.notes.join(' ')).toContain('f0.csv')
    await writeDay({ fields: { frames: [{ name: '../day.json', time: 0 }], hash: '' } })
    const way = await batch(['day.json', '--out', 'out', '--data', 'data'])
    expect(way.code).toBe(2)
    expect(way.notes.join(' ')).toContain('must be named without a folder')
    await writeFile(path.join(folder, 'bench.json'), EXAMPLES.find(({ id }) => id === 'bench-generator')?.text ?? '')
    const none = await batch(['bench.json', '--out', 'out', '--data', 'data'])
    expect(none.code).toBe(2)
    expect(none.notes.join(' ')).toContain('--data needs readings in the plan')
  })
})
