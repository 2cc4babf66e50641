import { createHash } from 'node:crypto'
import { existsSync } from 'node:fs'
import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { runBatch } from '../../../app/batch/runBatch'
import { canonicalInput, EXAMPLES, readPlan } from '../../../core/plan'
import { documentOf } from '../../support/plans'

let folder = ''
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright batch '))
})
afterEach(() => rm(folder, { recursive: true, force: true }))

interface Outcome {
  readonly code: number
  readonly written: readonly string[]
  readonly notes: readonly string[]
}

/** The runner as a caller standing in `folder` sees it. */
async function batch(list: readonly string[], input = '', signal = new AbortController().signal): Promise<Outcome> {
  const written: string[] = []
  const notes: string[] = []
  const code = await runBatch(list, {
    folder,
    signal,
    date: '4 June 2031',
    pause: () => new Promise((resolve) => setImmediate(resolve)),
    readStandardInput: async () => new TextEncoder().encode(input),
    writtenLine: (text) => written.push(text),
    note: (text) => notes.push(text),
  })
  return { code, written, notes }
}

async function writePlanFile(parts: Readonly<Record<string, unknown>> = {}, name = 'plan.json'): Promise<void> {
  await writeFile(path.join(folder, name), JSON.stringify(documentOf(parts)))
}

async function summary(out = 'out'): Promise<Record<string, unknown>> {
  return JSON.parse(await readFile(path.join(folder, out, 'summary.json'), 'utf8'))
}

describe('a run', () => {
  it('writes pulse.csv, the record, then summary.json, names each on standard output and says nothing else', async () => {
    await writePlanFile()
    expect(await batch(['plan.json', '--out', 'out'])).toEqual({
      code: 0,
      written: ['pulse.csv', 'report.html', 'summary.json'].map((name) => path.join('out', name)),
      notes: [],
    })
    expect((await readdir(path.join(folder, 'out'))).toSorted()).toEqual(['pulse.csv', 'report.html', 'summary.json'])
    const table = await readFile(path.join(folder, 'out', 'pulse.csv'), 'utf8')
    expect(table.split('\r\n')[0]).toBe(
      'time (s),exit speed (m/s),formation time,circulation (m2/s),impulse (N s),energy (J)',
    )
    // 201 equal times at least, the header and the end of the last line.
    expect(table.split('\r\n').length).toBeGreaterThanOrEqual(203)
    expect(table).not.toMatch(/NaN|Infinity/)
  })

  it('says in summary.json what made it, from what, and what it wrote', async () => {
    await writePlanFile()
    await batch(['plan.json', '--out', 'out'])
    const reading = readPlan(JSON.stringify(documentOf()))
    if (!reading.ok) throw new Error('the plan of the test is refused')
    expect(await summary()).toMatchObject({
      format: 'ringwright-summary',
      version: 1,
      files: ['pulse.csv', 'report.html', 'summary.json'],
      program: { name: 'Ringwright', version: expect.stringMatching(/^\d+\.\d+\.\d+$/) },
      inputHash: createHash('sha256').update(canonicalInput(reading.plan)).digest('hex'),
      water: { density: expect.any(Number) },
      pulse: { stroke: 0.096 },
    })
  })

  it.each(EXAMPLES.map(({ id, text }) => ({ id, text })))(
    'computes the example $id from standard input',
    async ({ text }) => {
      const { code, written, notes } = await batch(['-', '--out', 'out'], text)
      expect(notes).toEqual([])
      expect(code).toBe(0)
      const names = written.map((name) => path.relative('out', name)).filter((name) => path.dirname(name) === '.')
      const [jet, wake] = [text.includes('"jet": {'), text.includes('"wake"')]
      expect(names).toEqual([
        'pulse.csv',
        ...(jet ? ['jet.csv'] : []),
        ...(wake ? ['trajectory.csv'] : []),
        ...(jet || wake ? ['events.csv'] : []),
        ...(wake ? ['wake-times.csv'] : []),
        ...(text.includes('"tankRun"') ? ['profile-read-first.txt', 'profile.csv'] : []),
        ...(text.includes('"matrix"') ? ['run-matrix.csv'] : []),
        ...(text.includes('"readings"') ? ['readings.csv'] : []),
        'report.html',
        'summary.json',
      ])
    },
    30_000,
  )

  it('names a field it does not know, and computes all the same', async () => {
    await writePlanFile({ programme: { shape: 'rectangular', stroke: 0.06, peakSpeed: 0.2, riseTme: 1 } })
    const { code, notes } = await batch(['plan.json', '--out', 'out'])
    expect(code).toBe(0)
    expect(notes).toEqual(['plan.json: Not known to this version, kept and not read: programme.riseTme.'])
  })

  it('puts the record beside the results: what the plan is, the day, the whole hash, its cautions, its plots', async () => {
    await writePlanFile({ title: 'Aft <thruster>', revision: 'C' })
    await batch(['plan.json', '--out', 'out'])
    const record = await readFile(path.join(folder, 'out', 'report.html'), 'utf8')
    const { inputHash, cautions } = await summary()
    expect(record).toContain('<h1>Aft &lt;thruster&gt;</h1>')
    expect(record).toContain('Design record, revision C')
    expect(record).toContain('4 June 2031')
    expect(record).toContain(String(inputHash))
    expect(Array.isArray(cautions) && cautions.length > 0).toBe(true)
    expect(record.match(/<svg /g)?.length).toBeGreaterThanOrEqual(4)
    // Loads nothing, runs nothing.
    expect(record).not.toMatch(/<script|(?:src|href)=/)
  })

  it('repeats to the byte', async () => {
    await writePlanFile()
    await batch(['plan.json', '--out', 'a'])
    await batch(['plan.json', '--out', 'b'])
    for (const name of ['pulse.csv', 'report.html', 'summary.json'])
      expect(await readFile(path.join(folder, 'a', name))).toEqual(await readFile(path.join(folder, 'b', name)))
  })

  it('writes water alone when asked for water alone', async () => {
    await writePlanFile()
    const { written } = await batch(['plan.json', '--out', 'out', '--only', 'water'])
    expect(written).toEqual([path.join('out', 'summary.json')])
    const document = await summary()
    expect(document['files']).toEqual(['summary.json'])
    expect(document).toHaveProperty('water')
    expect(document).not.toHaveProperty('pulse')
  })

  it('takes absolute paths and makes the folder with those above it', async () => {
    await writePlanFile()
    const out = path.join(folder, 'deep', 'er', 'out')
    const { code, written } = await batch([path.join(folder, 'plan.json'), '--out', out])
    expect(code).toBe(0)
    expect(written).toContain(path.join(out, 'summary.json'))
  })

  it('says which sections of the plan are left out', async () => {
    await writePlanFile({ readings: { rows: [] }, sweep: { fields: [] }, spread: { relative: {} } })
    const { code, notes } = await batch(['plan.json', '--out', 'out'])
    expect(code).toBe(0)
    expect(notes).toEqual([
      'The readings hold nothing to compare, and are left out.',
      'The sweep names no field to vary, and is left out.',
      'The spread names no number that scatters, and is left out: spread.relative must name one and its relative deviation, or spread.absolute, for instance "relative": { "programme.stroke": 0.01 }.',
    ])
  })

  it('prints its usage when asked for help', async () => {
    const { code, written, notes } = await batch(['--help'])
    expect({ code, notes }).toEqual({ code: 0, notes: [] })
    expect(written.join('\n')).toMatch(/^Use: npm run --silent batch -- PLAN\.json --out DIR/)
  })
})

describe('files that are there already', () => {
  it('are replaced when the folder holds our summary', async () => {
    await writePlanFile()
    await batch(['plan.json', '--out', 'out'])
    const before = await summary()
    await writePlanFile({ water: { kind: 'fresh', temperatureCelsius: 5 } })
    expect((await batch(['plan.json', '--out', 'out'])).code).toBe(0)
    expect((await summary())['inputHash']).not.toBe(before['inputHash'])
  })

  it.each([
    ['no summary', null],
    ['another program’s summary', '{"format":"something-else"}'],
    ['a summary that is no JSON', 'summary'],
  ])('are kept, and the run refused, when the folder holds %s', async (_what, text) => {
    await writePlanFile()
    await mkdir(path.join(folder, 'out'))
    await writeFile(path.join(folder, 'out', 'pulse.csv'), 'mine')
    if (text !== null) await writeFile(path.join(folder, 'out', 'summary.json'), text)
    const { code, written, notes } = await batch(['plan.json', '--out', 'out'])
    expect(code).toBe(2)
    expect(written).toEqual([])
    expect(notes.join('\n')).toMatch(/pulse\.csv exists already and out holds no summary of an earlier run/)
    expect(await readFile(path.join(folder, 'out', 'pulse.csv'), 'utf8')).toBe('mine')
  })

  it('of a run that was killed are cleared, but not files that it does not list', async () => {
    await writePlanFile()
    const out = path.join(folder, 'out')
    await mkdir(out)
    const files = ['pulse.csv', 'jet.csv', '../notes.txt']
    await writeFile(path.join(out, '.ringwright-run'), JSON.stringify({ format: 'ringwright-summary', files }))
    await writeFile(path.join(out, 'pulse.csv'), 'half')
    await writeFile(path.join(out, 'jet.csv'), 'half')
    await writeFile(path.join(out, '.jet.csv.77-4.tmp'), 'half')
    await writeFile(path.join(out, 'mine.csv'), 'mine')
    await writeFile(path.join(folder, 'notes.txt'), 'mine')
    expect((await batch(['plan.json', '--out', 'out'])).code).toBe(0)
    expect((await readdir(out)).toSorted()).toEqual(['mine.csv', 'pulse.csv', 'report.html', 'summary.json'])
    expect(await readFile(path.join(folder, 'notes.txt'), 'utf8')).toBe('mine')
  })

  it('are kept where a killed run does not list them', async () => {
    await writePlanFile()
    const out = path.join(folder, 'out')
    await mkdir(out)
    await writeFile(
      path.join(out, '.ringwright-run'),
      JSON.stringify({ format: 'ringwright-summary', files: ['jet.csv'] }),
    )
    await writeFile(path.join(out, 'pulse.csv'), 'mine')
    expect((await batch(['plan.json', '--out', 'out'])).code).toBe(2)
    expect(await readFile(path.join(out, 'pulse.csv'), 'utf8')).toBe('mine')
  })

  it('do not matter when the run writes nothing of their names', async () => {
    await writePlanFile()
    await mkdir(path.join(folder, 'out'))
    await writeFile(path.join(folder, 'out', 'notes.txt'), 'mine')
    expect((await batch(['plan.json', '--out', 'out'])).code).toBe(0)
    expect(await readFile(path.join(folder, 'out', 'notes.txt'), 'utf8')).toBe('mine')
  })
})

describe('a refusal', () => {
  it('of bad arguments exits 2 and makes no folder', async () => {
    expect((await batch(['plan.json', '--out', 'out', '--fast'])).code).toBe(2)
    expect(await readdir(folder)).toEqual([])
  })

  it('of a file that cannot be read exits 2 and says why', async () => {
    expect(await batch(['gone.json', '--out', 'out'])).toEqual({
      code: 2,
      written: [],
      notes: ['“gone.json” could not be opened because it, or the folder it should lie in, does not exist.'],
    })
  })

  it('of text that is not a plan exits 2', async () => {
    const { code, notes } = await batch(['-', '--out', 'out'], 'not a plan')
    expect(code).toBe(2)
    expect(notes[0]).toMatch(/^standard input: This file is not a plan/)
    expect(await readdir(folder)).toEqual([])
  })

  it('of a plan exits 2 and names field, value and limit', async () => {
    await writePlanFile({ nozzle: { shape: 'tube', diameter: -0.03 } })
    const { code, notes } = await batch(['plan.json', '--out', 'out'])
    expect(code).toBe(2)
    expect(notes.join('\n')).toMatch(/plan\.json: .*nozzle\.diameter.*-0\.03/)
  })

  it('of a newer plan exits 2 and names both versions', async () => {
    await writePlanFile({ version: 99 })
    const { code, notes } = await batch(['plan.json', '--out', 'out'])
    expect(code).toBe(2)
    expect(notes.join('\n')).toMatch(/newer version \(99\); this program reads up to 1/)
  })

  it('of a section the plan does not hold exits 2', async () => {
    await writePlanFile()
    expect(await batch(['plan.json', '--out', 'out', '--only', 'readings'])).toEqual({
      code: 2,
      written: [],
      notes: ['Section readings cannot be computed: the plan has no readings.'],
    })
  })

  it.each([
    ['thruster', {}, 'thruster'],
    ['tankRun', {}, 'tankRun'],
    ['sweep', {}, 'sweep'],
    ['sweep', { sweep: { fields: [] } }, 'field to sweep'],
    [
      'spread',
      { spread: {} },
      'number that scatters: spread.relative must name one and its relative deviation, or spread.absolute, for instance "relative": { "programme.stroke": 0.01 }',
    ],
  ])('of the section %s where there is nothing to compute exits 2', async (section, parts, lacking) => {
    await writePlanFile(parts)
    const { code, notes } = await batch(['plan.json', '--out', 'out', '--only', section])
    expect(code).toBe(2)
    expect(notes).toEqual([`Section ${section} cannot be computed: the plan has no ${lacking}.`])
  })

  it('of a thruster without a train names the period it lacks', async () => {
    await writePlanFile({ thruster: { count: 2 } })
    const { code, written, notes } = await batch(['plan.json', '--out', 'out'])
    expect({ code, written }).toEqual({ code: 2, written: [] })
    expect(notes[0]).toMatch(/train\.period must be given/)
  })

  it('of a section the plan has nothing for exits 2', async () => {
    const ring = { circulation: 0.01, radius: 0.02, coreRadius: 0.002, core: 'uniform' }
    const document = { format: 'ringwright-plan', version: 1, water: { kind: 'fresh', temperatureCelsius: 20 } }
    const text = JSON.stringify({ ...document, wake: { rings: [ring] } })
    const refused = await batch(['-', '--out', 'out', '--only', 'pulse'], text)
    expect(refused.code).toBe(2)
    expect(refused.notes[0]).toMatch(/^Section pulse cannot be computed: the plan has no nozzle and no programme\.$/)
    const { code, written } = await batch(['-', '--out', 'out'], text)
    expect(code).toBe(0)
    expect(written).not.toContain(path.join('out', 'pulse.csv'))
    expect(written).toContain(path.join('out', 'trajectory.csv'))
  })

  // Node's recursive mkdir goes round for ever where a folder's parent stands and the system still says there is none.
  it.runIf(existsSync('/proc/self'))('of a folder the system will not make exits 2 and does not hang', async () => {
    await writePlanFile()
    const { code, notes } = await batch(['plan.json', '--out', '/proc/nope/deeper'])
    expect(code).toBe(2)
    expect(notes[0]).toMatch(/could not be made/)
  })

  it('of a folder that cannot be made exits 2', async () => {
    await writePlanFile()
    const { code, notes } = await batch(['plan.json', '--out', path.join('plan.json', 'out')])
    expect(code).toBe(2)
    expect(notes[0]).toMatch(/could not be made because a part of that path is a file\.$/)
  })
})

describe('a write that fails', () => {
  it('exits 1, says why and leaves no temporary file', async () => {
    await writePlanFile()
    await batch(['plan.json', '--out', 'out'])
    // A folder in the place of the table: a file cannot be renamed over it.
    await rm(path.join(folder, 'out', 'pulse.csv'))
    await mkdir(path.join(folder, 'out', 'pulse.csv', 'inside'), { recursive: true })
    const { code, written, notes } = await batch(['plan.json', '--out', 'out'])
    expect(code).toBe(1)
    expect(written).toEqual([])
    expect(notes[0]).toMatch(/pulse\.csv” could not be saved because/)
    expect((await readdir(path.join(folder, 'out'))).filter((name) => name.endsWith('.tmp'))).toEqual([])
  })
})

describe('an interrupt', () => {
  it('exits 130 and replaces nothing', async () => {
    await writePlanFile()
    const controller = new AbortController()
    controller.abort()
    const { code, written } = await batch(['plan.json', '--out', 'out'], '', controller.signal)
    expect(code).toBe(130)
    expect(written).toEqual([])
  })

  it('between two files keeps the finished one, not an earlier run’s summary and record, and exits 130', async () => {
    await writePlanFile({ water: { kind: 'fresh', temperatureCelsius: 5 } })
    await batch(['plan.json', '--out', 'out'])
    await writePlanFile()
    const controller = new AbortController()
    const written: string[] = []
    const code = await runBatch(['plan.json', '--out', 'out'], {
      folder,
      signal: controller.signal,
      pause: async () => undefined,
      readStandardInput: async () => new Uint8Array(),
      writtenLine: (text) => {
        written.push(text)
        controller.abort()
      },
      note: () => undefined,
    })
    expect(code).toBe(130)
    expect(written).toEqual([path.join('out', 'pulse.csv')])
    // The mark tells a later run whose file this is.
    expect((await readdir(path.join(folder, 'out'))).toSorted()).toEqual(['.ringwright-run', 'pulse.csv'])
    expect((await batch(['plan.json', '--out', 'out'])).code).toBe(0)
    expect((await readdir(path.join(folder, 'out'))).toSorted()).toEqual(['pulse.csv', 'report.html', 'summary.json'])
  })
})

describe('a wake', () => {
  const ring = { circulation: 0.01, radius: 0.02, coreRadius: 0.004 }
  const wake = {
    rings: [ring, { ...ring, centre: [0.02, 0, 0] }],
    duration: 1,
    outputStep: 0.25,
    viscous: false,
    stations: [0.05],
  }
  const read = (name: string) => readFile(path.join(folder, 'out', name), 'utf8')

  it('is written as trajectories, events, one PolyData file a time and the table of their times', async () => {
    await writePlanFile({ wake })
    const { code, written, notes } = await batch(['plan.json', '--out', 'out', '--only', 'wake'])
    expect({ code, notes }).toEqual({ code: 0, notes: [] })
    const frames = ['000000', '000001', '000002', '000003', '000004'].map((name) => path.join('wake', `${name}.vtp`))
    expect(written).toEqual(
      ['trajectory.csv', 'events.csv', ...frames, 'wake-times.csv', 'report.html', 'summary.json'].map((name) =>
        path.join('out', name),
      ),
    )
    const trajectory = (await read('trajectory.csv')).trimEnd().split('\r\n')
    expect(trajectory[0]).toBe(
      'time (s),ring,x (m),y (m),z (m),radius (m),core radius (m),circulation (m2/s),speed (m/s),direction x,direction y,direction z',
    )
    expect(trajectory.length).toBe(1 + 2 * 5)
    const events = (await read('events.csv')).trimEnd().split('\r\n')
    expect(events[0]).toBe('time (s),event,rings,x (m),detail')
    expect(events.at(-1)).toMatch(/^1,end,/)
    expect(events.some((line) => line.includes(',arrival,'))).toBe(true)
    expect(await read('wake-times.csv')).toMatch(
      /^time \(s\),file\r\n0,wake\/000000\.vtp\r\n0\.25,wake\/000001\.vtp\r\n/,
    )
    expect(await summary()).toMatchObject({
      wake: { model: 'coaxial', status: 'done', rings: [{ ring: 1 }, { ring: 2 }] },
    })
  })

  it('of a shorter second run leaves none of the first one’s files behind', async () => {
    await writePlanFile({ wake })
    await batch(['plan.json', '--out', 'out', '--only', 'wake'])
    await writePlanFile({ wake: { ...wake, duration: 0.5 } })
    expect((await batch(['plan.json', '--out', 'out', '--only', 'wake'])).code).toBe(0)
    expect((await readdir(path.join(folder, 'out', 'wake'))).toSorted()).toEqual([
      '000000.vtp',
      '000001.vtp',
      '000002.vtp',
    ])
  })

  it('that breaks a limit is refused with its field, and nothing is written', async () => {
    await writePlanFile({ wake: { ...wake, rings: [ring, ring] } })
    const { code, written, notes } = await batch(['plan.json', '--out', 'out'])
    expect(code).toBe(2)
    expect(written).toEqual([])
    expect(notes.join(' ')).toMatch(/rings 1 and 2 must not coincide/)
  })

  it('does without a pulse', async () => {
    const document = { ...documentOf({ wake }), nozzle: undefined, programme: undefined }
    const { code } = await batch(['-', '--out', 'out'], JSON.stringify(document))
    expect(code).toBe(0)
    expect(await summary()).not.toHaveProperty('pulse')
  })

  it('ends with 130 when it is interrupted', async () => {
    await writePlanFile({ wake: { ...wake, duration: 5000, outputStep: 1, tolerance: 1e-12 } })
    const controller = new AbortController()
    setTimeout(() => controller.abort(), 50)
    expect((await batch(['plan.json', '--out', 'out', '--only', 'wake'], '', controller.signal)).code).toBe(130)
  })
})
