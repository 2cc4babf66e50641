import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  keptRows,
  mergeSweepParts,
  partNoteText,
  readPartNote,
  rowsOfPart,
  sweepColumns,
  sweepFileNames,
  sweepLine,
  sweepTable,
  type FoundPart,
  type SweepPart,
  type SweepPartNote,
  type SweepRow,
} from '../../../core/plan'

const OUTCOME = { paths: ['nozzle.diameter'], results: ['pulse.ring.speed'], total: 11 }
const COLUMNS = sweepColumns(OUTCOME)

function rowOf(row: number): SweepRow {
  const broken = row % 4 === 0
  return {
    row,
    inputs: [0.01 * row],
    results: [broken ? null : row / 7],
    feasible: !broken,
    limit: broken ? 'too wide, and "quoted"\nover two lines' : null,
  }
}

function noteOf(part: SweepPart, change: Partial<SweepPartNote> = {}): SweepPartNote {
  const program = { name: 'Ringwright', version: '0.1.0' }
  return { program, inputHash: 'h', part, total: OUTCOME.total, columns: COLUMNS, ...change }
}

function tableOf(part: SweepPart): string {
  return sweepTable(OUTCOME, rowsOfPart(part, OUTCOME.total).map(rowOf))
}

function found(part: SweepPart, change: Partial<FoundPart> = {}): FoundPart {
  return { name: `p/${sweepFileNames(part).table}`, note: noteOf(part), text: tableOf(part), ...change }
}

const WHOLE = tableOf({ index: 1, of: 1 })
const three = [1, 2, 3].map((index) => found({ index, of: 3 }))

describe('sweep.csv', () => {
  it('has the number of the row, inputs with their SI unit, results, feasible and limit', () => {
    expect(COLUMNS).toEqual(['row', 'nozzle.diameter (m)', 'pulse.ring.speed', 'feasible', 'limit'])
    expect(sweepLine(rowOf(2))).toBe(`2,0.02,${2 / 7},true,\r\n`)
  })

  it('writes a refused row on one line, with its reason and no results', () => {
    expect(sweepLine(rowOf(4))).toBe('4,0.04,,false,"too wide, and ""quoted"" over two lines"\r\n')
  })
})

describe('parts of a sweep', () => {
  it('are disjoint and complete, and differ by one row at most', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 40 }), fc.integer({ min: 1, max: 200 }), (of, total) => {
        const parts = Array.from({ length: of }, (_, k) => rowsOfPart({ index: k + 1, of }, total))
        const all = parts.flat().toSorted((a, b) => a - b)
        expect(all).toEqual(Array.from({ length: total }, (_, k) => k + 1))
        const sizes = parts.map((rows) => rows.length)
        expect(Math.max(...sizes) - Math.min(...sizes)).toBeLessThanOrEqual(1)
      }),
    )
  })

  it('merge to the bytes of the whole in any order', () => {
    fc.assert(
      fc.property(fc.shuffledSubarray(three, { minLength: 3 }), (parts) => {
        expect(mergeSweepParts(parts, 'h')).toBe(WHOLE)
      }),
    )
  })

  it('may be more than there are rows', () => {
    const many = Array.from({ length: 15 }, (_, k) => found({ index: k + 1, of: 15 }))
    expect(mergeSweepParts(many, 'h')).toBe(WHOLE)
  })

  const [first, second, third] = three
  if (first === undefined || second === undefined || third === undefined) throw new Error('three parts were made')
  it.each<readonly [string, readonly FoundPart[], RegExp]>([
    ['none', [], /^No part of a sweep was found/],
    ['one is missing', [first, third], /^Part 2 of 3 is missing\.$/],
    ['two are missing', [second], /^Parts 1, 3 of 3 are missing\.$/],
    ['one is there twice', [...three, { ...second, name: 'q/x' }], /^Part 2 of 3 is there twice: p\/.* and q\/x\.$/],
    ['one is not finished', [first, { ...second, text: null }, third], /2-of-3\.csv is not finished: run part 2 of 3/],
    [
      'one is of another plan',
      [first, { ...second, note: noteOf({ index: 2, of: 3 }, { inputHash: 'g' }) }, third],
      /2-of-3\.csv was computed from another plan/,
    ],
    ['one is of another split', [...three, found({ index: 1, of: 2 })], /1-of-2\.csv is one of 2 parts/],
    [
      'one is of another version',
      [first, { ...second, note: noteOf({ index: 2, of: 3 }, { program: { name: 'x', version: '9' } }) }, third],
      /computed by version 9/,
    ],
    [
      'one has a row too few',
      [first, { ...second, text: second.text?.replace(/\r\n5,[^\r]*/, '') ?? null }, third],
      /2-of-3\.csv is damaged: it must hold the 4 rows/,
    ],
    ['one has a row twice', [first, { ...second, text: `${second.text}2,0.02,1,true,\r\n` }, third], /is damaged/],
  ])('are refused where %s', (_, parts, message) => {
    expect(() => mergeSweepParts(parts, 'h')).toThrow(message)
  })
})

describe('the rows of a part that was cut off', () => {
  const part = { index: 2, of: 3 }

  it('are kept whole, wherever the file was cut, and the rest is what was missing', () => {
    const text = tableOf(part)
    fc.assert(
      fc.property(fc.integer({ min: 0, max: text.length }), (end) => {
        const { text: kept, rows } = keptRows(text.slice(0, end), noteOf(part))
        const rest = rowsOfPart(part, OUTCOME.total).slice(rows).map(rowOf)
        const header = kept === '' ? sweepTable(OUTCOME, []) : kept
        expect(header + rest.map(sweepLine).join('')).toBe(text)
      }),
    )
  })

  it('go where the header is another', () => {
    expect(keptRows(`row,x\r\n${tableOf(part)}`, noteOf(part))).toEqual({ text: '', rows: 0 })
  })

  it('end before a row out of its place, and before one with a cell too few', () => {
    const lines = tableOf(part).split('\r\n')
    const swapped = [lines[0], lines[1], lines[3], lines[2], ''].join('\r\n')
    expect(keptRows(swapped, noteOf(part)).rows).toBe(1)
    expect(keptRows([lines[0], lines[1], '5,0.05', ''].join('\r\n'), noteOf(part)).rows).toBe(1)
  })
})

describe('the note of a part', () => {
  it('reads back what was written', () => {
    const note = noteOf({ index: 2, of: 3 })
    expect(readPartNote(partNoteText(note))).toEqual(note)
  })

  it('is none of ours where it does not say so, and never throws', () => {
    fc.assert(
      fc.property(fc.oneof(fc.json(), fc.string()), (text) => {
        expect(readPartNote(text)).toBeNull()
      }),
    )
    const text = partNoteText(noteOf({ index: 2, of: 3 }))
    expect(readPartNote(text.replace('"part": 2', '"part": 4'))).toBeNull()
    expect(readPartNote(text.replace('"version": 1', '"version": 2'))).toBeNull()
  })
})
