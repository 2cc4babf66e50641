import { Window } from 'happy-dom'
import { describe, expect, it } from 'vitest'
import { CAUTIONS, type Caution } from '../../../core/plan'
import { dayText, documentHtml, runSheet, type DocumentBlock, type PrintDocument } from '../../../core/report'
import { tankCase, UNITS } from './tankRuns'

const STAMP = { date: '3 December 2026', foot: 'Ringwright 0.1.0, inputs 00ff' }

async function sheet(cautions?: readonly Caution[], change = {}): Promise<PrintDocument> {
  const { plan, data, result } = await tankCase(change)
  const made = runSheet({ plan, result, cautions: cautions ?? data.cautions, units: UNITS, ...STAMP })
  if (made === null) throw new Error('no run sheet')
  return made
}

function printed(document: PrintDocument): string {
  const window = new Window()
  window.document.write(documentHtml(document, 'A4'))
  return window.document.body.textContent ?? ''
}

function tables({ blocks }: PrintDocument): Extract<DocumentBlock, { kind: 'table' }>[] {
  return blocks.flatMap((block) => (block.kind === 'table' ? [block] : []))
}

/** Words of a caution that are printed in one line; an ending that a whole group shares is printed once, over them. */
function parts(text: string): readonly string[] {
  const found = /^(.*[.!?]) ([^.!?]+[.!?])$/su.exec(text)
  return found === null ? [text] : [found[1] ?? '', found[2] ?? '']
}

describe('the run sheet', () => {
  it('loses no caution: each of a plan stands in print', async () => {
    const { data } = await tankCase()
    const text = printed(await sheet())
    expect(data.cautions.length).toBeGreaterThan(20)
    for (const caution of data.cautions) for (const part of parts(caution.text)) expect(text).toContain(part)
  })

  it('loses none of the whole table, whatever their groups', async () => {
    const all = CAUTIONS.map(({ id, group, source }): Caution => ({
      id,
      group,
      source,
      text: `Mind ${id}. It may hurt.`,
    }))
    const text = printed(await sheet(all))
    for (const { id } of all) expect(text).toContain(`Mind ${id}.`)
    expect(text.match(/It may hurt\./g)).toHaveLength(4)
  })

  it('keeps an ending that only some cautions of a group share', async () => {
    const of = (id: string, text: string): Caution => ({ id, group: 'machine', source: 'common practice', text })
    const text = printed(await sheet([of('a', 'Mind a. Ask.'), of('b', 'Mind b.')]))
    expect(text).toContain('Mind a. Ask.')
    expect(text).toContain('Mind b.')
  })

  it('gives hazards a box to tick', async () => {
    const { blocks } = await sheet()
    const ticked = blocks.flatMap((block) => (block.kind === 'checklist' ? block.items : []))
    expect(ticked).toHaveLength(18)
  })

  it('prints every run in the order of the day with empty cells to write in', async () => {
    const { result } = await tankCase()
    const order = tables(await sheet()).at(-1)
    expect(order?.rows.map(([run]) => Number(run))).toEqual(result.matrix?.runs.map(({ run }) => run))
    expect(order?.rows[0]?.slice(0, 4)).toEqual(['1', '1', '62.5', '0.1'])
    order?.rows.forEach((row, i) => {
      expect(row).toHaveLength(order.columns.length)
      order.columns.forEach(({ blank }, k) => {
        if (blank === true) expect(row[k], `row ${i}`).toBe('')
      })
    })
    expect(order?.columns.filter(({ blank }) => blank)).toHaveLength(5)
  })

  it('tells each station with time, tolerance and speed from the very result', async () => {
    const { result } = await tankCase()
    const stations = tables(await sheet()).find(({ columns }) => columns.some(({ title }) => title === 'Tolerance'))
    const { time = 0, timeLow = 0, timeHigh = 0 } = { ...result.arrivals[0] }
    const off = (value: number): string => Math.abs(value - Number(time)).toFixed(2)
    expect(stations?.rows[0]?.slice(0, 3)).toEqual([
      '100',
      Number(Number(time).toPrecision(3)).toString(),
      `−${off(Number(timeLow))}\u00a0to\u00a0+${off(Number(timeHigh))}`,
    ])
  })

  it('adds the scatter of a spread where one was made', async () => {
    const { plan, data, result } = await tankCase()
    const row = { mean: 2.25, standardDeviation: 0.05, p05: 2.2, p50: 2.25, p95: 2.3, nominal: 2.24, samples: 9 }
    const spread = [{ path: 'tankRun.arrivals.0.time', unit: 's', ...row }]
    const made = runSheet({ plan, result, cautions: data.cautions, units: UNITS, spread, ...STAMP })
    if (made === null) throw new Error('no run sheet')
    expect(printed(made)).toContain('2.2\u00a0to\u00a02.3')
  })

  it('has rows to fill in by hand where the plan has no matrix, and says what the drive cannot', async () => {
    const { plan } = await tankCase()
    const drive = plan.tankRun?.drive
    if (drive === undefined) throw new Error('no drive')
    const made = await sheet(undefined, { matrix: null, drive: { ...drive, maxSpeed: 0.01 } })
    expect(tables(made).at(-1)?.rows).toHaveLength(8)
    expect(printed(made)).toMatch(/Broken: .*0\.01 m\/s/)
  })

  it('is on A4 and on Letter', async () => {
    const made = await sheet()
    expect(documentHtml(made, 'A4')).toContain('@page{size:A4')
    expect(documentHtml(made, 'Letter')).toContain('@page{size:letter')
    expect(documentHtml(made, 'A4')).not.toMatch(/NaN|Infinity|undefined/)
  })

  it('is none for a plan without a tank run', async () => {
    const { plan, result } = await tankCase()
    expect(runSheet({ plan: { ...plan, tankRun: null }, result, cautions: [], units: UNITS, ...STAMP })).toBeNull()
  })
})

describe('dayText', () => {
  it.each([
    [0, '0 min'],
    [59 * 60, '59 min'],
    [3600, '1 h 00 min'],
    // Rounded up to the whole hour, never 60 minutes.
    [7199, '2 h 00 min'],
  ])('%d s is %s', (seconds, text) => expect(dayText(seconds)).toBe(text))
})
