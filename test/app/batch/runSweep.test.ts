import { appendFile, cp, mkdir, mkdtemp, readdir, readFile, rename, rm, truncate, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { runBatch } from '../../../app/batch/runBatch'
import { documentOf } from '../../support/plans'
import { CONSTANT_SPEED } from '../../support/thrusterPlans'

let folder = ''
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright sweep '))
  await writePlanFile()
})
afterEach(() => rm(folder, { recursive: true, force: true }))

/** Eleven rows, of which the last field's third value does not fit into the period. */
const SWEEP = {
  fields: [
    { path: 'nozzle.diameter', values: [0.02, 0.025, 0.03, 0.035] },
    { path: 'programme.stroke', values: [0.06, 0.08, 0.6] },
  ],
  results: ['pulse.ring.speed', 'thruster.meanThrust', 'pulse.pinchedOff'],
}

async function writePlanFile(parts: Readonly<Record<string, unknown>> = {}): Promise<void> {
  const document = documentOf({ ...CONSTANT_SPEED, sweep: SWEEP, ...parts })
  await writeFile(path.join(folder, 'plan.json'), JSON.stringify(document))
}

interface Outcome {
  readonly code: number
  readonly written: readonly string[]
  readonly notes: readonly string[]
}

/** The runner. @param pause called between rows: throws the switch of an interrupt, say */
async function batch(list: readonly string[], signal?: AbortSignal, pause: () => void = () => {}): Promise<Outcome> {
  const written: string[] = []
  const notes: string[] = []
  const code = await runBatch(list, {
    folder,
    signal: signal ?? new AbortController().signal,
    pause: async () => pause(),
    readStandardInput: () => Promise.reject(new Error('no standard input here')),
    writtenLine: (text) => written.push(text),
    note: (text) => notes.push(text),
  })
  return { code, written, notes }
}

/** The runner, interrupted after so many pauses. */
function interrupted(list: readonly string[], pauses: number): Promise<Outcome> {
  const controller = new AbortController()
  let left = pauses
  return batch(list, controller.signal, () => {
    left -= 1
    if (left < 0) controller.abort()
  })
}

const read = (...name: string[]): Promise<string> => readFile(path.join(folder, ...name), 'utf8')
const whole = (out = 'whole'): Promise<Outcome> => batch(['plan.json', '--out', out, '--only', 'sweep'])
const part = (index: number, of: number, out = 'parts'): Promise<Outcome> =>
  batch(['plan.json', '--out', out, '--part', `${index}/${of}`])

describe('sweep.csv', () => {
  it('holds a row for every combination, streamed and then named in the summary', async () => {
    expect(await whole()).toEqual({
      code: 0,
      written: [path.join('whole', 'sweep.csv'), path.join('whole', 'summary.json')],
      notes: [],
    })
    const [header, ...rows] = (await read('whole', 'sweep.csv')).trimEnd().split('\r\n')
    expect(header).toBe(
      'row,nozzle.diameter (m),programme.stroke (m),pulse.ring.speed,thruster.meanThrust,pulse.pinchedOff,feasible,limit',
    )
    expect(rows.map((row) => row.split(',').slice(0, 3).join(' '))).toEqual(
      [0.02, 0.025, 0.03, 0.035].flatMap((diameter, i) =>
        [0.06, 0.08, 0.6].map((stroke, k) => `${3 * i + k + 1} ${diameter} ${stroke}`),
      ),
    )
    expect(rows[2]).toMatch(/^3,0\.02,0\.6,,,,false,".*train\.period.*"$|^3,0\.02,0\.6,,,,false,train\.period.*$/)
    const summary = JSON.parse(await read('whole', 'summary.json'))
    expect(summary).toMatchObject({
      files: ['sweep.csv', 'summary.json'],
      sweep: { rows: 12, fields: ['nozzle.diameter', 'programme.stroke'], results: SWEEP.results },
    })
    expect((await readdir(path.join(folder, 'whole'))).toSorted()).toEqual(['summary.json', 'sweep.csv'])
  })

  it('stands beside the other results of a plan, and tells a refused result before anything is computed', async () => {
    const { code, written } = await batch(['plan.json', '--out', 'all'])
    expect(code).toBe(0)
    expect(written.map((name) => path.basename(name))).toEqual([
      'pulse.csv',
      'sweep.csv',
      'report.html',
      'summary.json',
    ])
    await writePlanFile({ sweep: { ...SWEEP, results: ['wake.passes'] } })
    const refused = await batch(['plan.json', '--out', 'none'])
    expect(refused).toMatchObject({ code: 2, written: [] })
    expect(refused.notes[0]).toMatch(/^plan\.json: sweep\.results\.0 must start with a section that the plan has/)
  })

  it('of a result that no summary has is refused at its first row, and leaves nothing behind', async () => {
    await writePlanFile({ sweep: { ...SWEEP, results: ['pulse.ring.sped'] } })
    const { code, notes, written } = await whole()
    expect({ code, written }).toEqual({ code: 2, written: [] })
    expect(notes[0]).toMatch(/sweep\.results\.0 must be the dotted path of one value of the summary/)
    expect(await readdir(path.join(folder, 'whole'))).toEqual([])
  })
})

describe('parts of a sweep', () => {
  it('are written with a note each and no summary, side by side', async () => {
    expect(await part(2, 3)).toEqual({
      code: 0,
      written: [path.join('parts', 'sweep.2-of-3.json'), path.join('parts', 'sweep.2-of-3.csv')],
      notes: [],
    })
    await part(1, 3)
    expect((await readdir(path.join(folder, 'parts'))).toSorted()).toEqual(
      [1, 2].flatMap((i) => [`sweep.${i}-of-3.csv`, `sweep.${i}-of-3.json`]),
    )
    const summaryHash = async () => (await whole(), JSON.parse(await read('whole', 'summary.json')).inputHash)
    expect(JSON.parse(await read('parts', 'sweep.2-of-3.json'))).toMatchObject({
      format: 'ringwright-sweep-part',
      part: 2,
      of: 3,
      rows: 12,
      inputHash: await summaryHash(),
    })
  })

  it.each([
    ['in one folder', ['parts'], [3, 1, 2]],
    ['in a folder each, in any order', ['c', 'a', 'b'], [1, 2, 3]],
  ])('merge to the bytes of the whole sweep, %s', async (_, folders, order) => {
    await whole()
    for (const index of order) await part(index, 3, folders.length === 1 ? 'parts' : ['a', 'b', 'c'][index - 1])
    const merged = await batch(['plan.json', '--out', 'merged', '--merge', ...folders])
    expect(merged).toEqual({
      code: 0,
      written: [path.join('merged', 'sweep.csv'), path.join('merged', 'summary.json')],
      notes: [],
    })
    expect(await read('merged', 'sweep.csv')).toBe(await read('whole', 'sweep.csv'))
    expect(await read('merged', 'summary.json')).toBe(await read('whole', 'summary.json'))
  })

  it('merge into the folder they lie in, and once more', async () => {
    await whole()
    for (const index of [1, 2]) await part(index, 2)
    const merge = ['plan.json', '--out', 'parts', '--merge', 'parts', path.join('.', 'parts')]
    expect((await batch(merge)).code).toBe(0)
    expect((await batch(merge)).code).toBe(0)
    expect(await read('parts', 'sweep.csv')).toBe(await read('whole', 'sweep.csv'))
    expect((await readdir(path.join(folder, 'parts'))).length).toBe(6)
  })

  it('that are finished stay as they are when they are asked for again', async () => {
    await part(1, 2)
    const before = await read('parts', 'sweep.1-of-2.csv')
    const again = await part(1, 2)
    expect(again).toMatchObject({ code: 0, written: [] })
    expect(again.notes[0]).toMatch(/sweep\.1-of-2\.csv is finished already, from the same plan: it stays as it is\.$/)
    expect(await read('parts', 'sweep.1-of-2.csv')).toBe(before)
  })

  it('of another plan are replaced, not mixed', async () => {
    await part(1, 2)
    const before = await read('parts', 'sweep.1-of-2.csv')
    await writePlanFile({ water: { kind: 'fresh', temperatureCelsius: 5 } })
    expect((await part(1, 2)).written.length).toBe(2)
    expect(await read('parts', 'sweep.1-of-2.csv')).not.toBe(before)
  })

  it('do not touch files that are not theirs', async () => {
    await mkdir(path.join(folder, 'parts'))
    await writeFile(path.join(folder, 'parts', 'sweep.1-of-2.csv'), 'mine')
    const { code, notes } = await part(1, 2)
    expect(code).toBe(2)
    expect(notes[0]).toMatch(/sweep\.1-of-2\.csv exists already/)
    expect(await read('parts', 'sweep.1-of-2.csv')).toBe('mine')
  })
})

describe('a part that was stopped', () => {
  const partial = () => path.join(folder, 'parts', 'sweep.1-of-2.csv.partial')

  it('exits 130 with its finished rows, and goes on from there to the same bytes', async () => {
    await part(1, 2, 'straight')
    const stopped = await interrupted(['plan.json', '--out', 'parts', '--part', '1/2'], 3)
    expect(stopped.code).toBe(130)
    expect(stopped.written).toEqual([])
    const rows = Number(/interrupted: (\d+) of 6 rows are kept/.exec(stopped.notes[0] ?? '')?.[1])
    expect(rows).toBeGreaterThan(0)
    expect(rows).toBeLessThan(6)
    expect((await readFile(partial(), 'utf8')).split('\r\n').length).toBe(rows + 2)
    const resumed = await part(1, 2)
    expect(resumed.code).toBe(0)
    expect(resumed.notes).toEqual([
      `${rows} finished rows of ${path.join('parts', 'sweep.1-of-2.csv.partial')} are kept.`,
    ])
    expect(await read('parts', 'sweep.1-of-2.csv')).toBe(await read('straight', 'sweep.1-of-2.csv'))
    expect(await readdir(path.join(folder, 'parts'))).not.toContain('sweep.1-of-2.csv.partial')
  })

  /** What a kill in the middle of a row leaves: so many bytes of the rows (null: all), under the unfinished name. */
  async function killedAt(bytes: number | null): Promise<string> {
    await part(1, 2)
    const finished = path.join(folder, 'parts', 'sweep.1-of-2.csv')
    const text = await readFile(finished, 'utf8')
    await rename(finished, partial())
    if (bytes !== null) await truncate(partial(), bytes)
    return text
  }

  it('by a kill in the middle of a row drops that row and computes it again', async () => {
    const middle = 200
    const text = await killedAt(middle)
    expect(text.slice(middle - 1, middle + 1)).not.toContain('\n')
    const { code, notes } = await part(1, 2)
    expect(code).toBe(0)
    expect(notes[0]).toMatch(/^\d finished rows/)
    expect(await read('parts', 'sweep.1-of-2.csv')).toBe(text)
  })

  it('by a kill in the header begins afresh', async () => {
    const text = await killedAt(30)
    const { notes } = await part(1, 2)
    expect(notes).toEqual([])
    expect(await read('parts', 'sweep.1-of-2.csv')).toBe(text)
  })

  it('with bytes that are no rows after the finished ones drops them', async () => {
    const text = await killedAt(null)
    await appendFile(partial(), '\0\0\0\0\r\n')
    expect((await part(1, 2)).code).toBe(0)
    expect(await read('parts', 'sweep.1-of-2.csv')).toBe(text)
  })

  it('keeps nothing of another plan', async () => {
    const text = await killedAt(200)
    await writePlanFile({ sweep: { ...SWEEP, results: [...SWEEP.results].toReversed() } })
    const { code, notes } = await part(1, 2)
    expect({ code, notes }).toEqual({ code: 0, notes: [] })
    expect(await read('parts', 'sweep.1-of-2.csv')).not.toContain(text.slice(0, 200))
  })

  it('is told as unfinished by a merge', async () => {
    await killedAt(200)
    await part(2, 2)
    const { code, notes, written } = await batch(['plan.json', '--out', 'merged', '--merge', 'parts'])
    expect({ code, written }).toEqual({ code: 2, written: [] })
    expect(notes[0]).toMatch(/sweep\.1-of-2\.csv is not finished: run part 1 of 2 again/)
  })
})

describe('a whole sweep that was stopped', () => {
  it('goes on in its own folder, beside results that were finished before', async () => {
    await batch(['plan.json', '--out', 'straight'])
    const stopped = await interrupted(['plan.json', '--out', 'out'], 5)
    expect(stopped.code).toBe(130)
    expect(stopped.written).toEqual([path.join('out', 'pulse.csv')])
    expect((await readdir(path.join(folder, 'out'))).toSorted()).toEqual([
      '.ringwright-run',
      'pulse.csv',
      'sweep.csv.partial',
      'sweep.json',
    ])
    const resumed = await batch(['plan.json', '--out', 'out'])
    expect(resumed.code).toBe(0)
    expect(resumed.notes[0]).toMatch(/finished rows of .* are kept\.$/)
    expect(await read('out', 'sweep.csv')).toBe(await read('straight', 'sweep.csv'))
    expect((await readdir(path.join(folder, 'out'))).toSorted()).toEqual([
      'pulse.csv',
      'report.html',
      'summary.json',
      'sweep.csv',
    ])
  })
})

describe('a merge', () => {
  it('refuses parts of another plan', async () => {
    for (const index of [1, 2]) await part(index, 2)
    await writePlanFile({ water: { kind: 'fresh', temperatureCelsius: 5 } })
    const { code, notes, written } = await batch(['plan.json', '--out', 'merged', '--merge', 'parts'])
    expect({ code, written }).toEqual({ code: 2, written: [] })
    expect(notes[0]).toMatch(/was computed from another plan than the one given\.$/)
  })

  it('refuses a part that is missing, one that is there twice, and one that is damaged', async () => {
    await part(1, 2)
    const merge = async (...folders: string[]) =>
      (await batch(['plan.json', '--out', 'merged', '--merge', ...folders])).notes[0]
    expect(await merge('parts')).toMatch(/^Part 2 of 2 is missing\.$/)
    await part(2, 2)
    await cp(path.join(folder, 'parts'), path.join(folder, 'copy'), { recursive: true })
    expect(await merge('parts', 'copy')).toMatch(/^Part 1 of 2 is there twice: /)
    await appendFile(path.join(folder, 'parts', 'sweep.2-of-2.csv'), '2,0.02,0.08,1,1,true,true,\r\n')
    expect(await merge('parts')).toMatch(/sweep\.2-of-2\.csv is damaged/)
    expect(await merge('empty')).toMatch(/“empty” could not be opened because/)
    await writeFile(path.join(folder, 'copy', 'sweep.1-of-2.json'), '{}')
    expect(await merge('copy')).toMatch(/sweep\.1-of-2\.json is no note of a part of a sweep\.$/)
  })
})
