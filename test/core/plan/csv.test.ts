import fc from 'fast-check'
import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import { readProgrammeCsv, writeCsv } from '../../../core/plan'

describe('writeCsv', () => {
  it('writes RFC 4180: CRLF, doubled quotes, empty for missing, shortest digits', () => {
    expect(
      writeCsv(
        ['time (s)', 'say "x"'],
        [
          [0.1, null],
          [1e-7, 'a,b'],
          [Number.NaN, true],
        ],
      ),
    ).toBe('time (s),"say ""x"""\r\n0.1,\r\n1e-7,"a,b"\r\n,true\r\n')
  })

  it('disarms texts that a spreadsheet would run', () => {
    expect(writeCsv(['a'], [['=1+1'], ['-2 m'], [-2]])).toBe("a\r\n'=1+1\r\n'-2 m\r\n-2\r\n")
  })

  it('is read back by a general CSV reader to the same numbers', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.tuple(
            fc.double({ noNaN: true, noDefaultInfinity: true }),
            fc.double({ noNaN: true, noDefaultInfinity: true }),
          ),
          { minLength: 1 },
        ),
        (rows) => {
          const text = writeCsv(['a', 'b'], rows)
          const back = Papa.parse<string[]>(text.trimEnd())
            .data.slice(1)
            .map((cells) => cells.map(Number))
          // -0 and 0 print alike; they are the same number for every reader.
          expect(back).toEqual(rows.map((row) => row.map((value) => value + 0)))
        },
      ),
    )
  })
})

describe('readProgrammeCsv', () => {
  const expected = [
    { time: 0, speed: 0 },
    { time: 0.1, speed: 0.2 },
    { time: 0.25, speed: 0 },
  ]

  it.each([
    ['commas and units in the header', 'time (ms),speed (mm/s)\r\n0,0\r\n100,200\r\n250,0\r\n'],
    ['semicolons and decimal commas', 'Time (s);Speed (m/s)\n0,0;0,0\n0,1;0,2\n0,25;0\n'],
    ['tabs, a byte order mark and a comment', '\uFEFF# run 3\nt\tu\n0\t0\n0.1\t0.2\n0.25\t0\n'],
    ['two bare columns', '0,0\n0.1,0.2\n0.25,0'],
    ['blanks between', '0 0\n0.1 0.2\n0.25 0\n'],
    ['columns in the other order', 'velocity (m/s),time (s)\n0,0\n0.2,0.1\n0,0.25\n'],
  ])('reads %s', (_, text) => {
    const reading = readProgrammeCsv(text)
    if (!reading.ok) throw new Error(reading.message)
    expect(reading.rows).toEqual(expected)
    expect(reading.notes.join(' ')).toMatch(/Delimiter .* decimal/)
  })

  it('carries the piston’s own column to the exit by the ratio of areas, and says so', () => {
    const reading = readProgrammeCsv('time (s),piston position (mm)\n0,0\n1,5\n2,10\n', 4)
    if (!reading.ok) throw new Error(reading.message)
    expect(reading.rows.at(-1)).toEqual({ time: 2, position: 0.04 })
    expect(reading.notes.join(' ')).toMatch(/position of the piston in mm, times 4 for the exit/)
    const exit = readProgrammeCsv('time (s),exit speed (m/s)\n0,0\n1,5\n2,0\n', 4)
    expect(exit.ok && exit.rows[1]).toEqual({ time: 1, speed: 5 })
    expect(exit.ok && exit.notes.join(' ')).toMatch(/speed at the exit/)
  })

  it('reads positions', () => {
    const reading = readProgrammeCsv('time (s),position (cm)\n0,0\n1,2\n2,3\n')
    expect(reading.ok && reading.rows).toEqual([
      { time: 0, position: 0 },
      { time: 1, position: 0.02 },
      { time: 2, position: 0.03 },
    ])
  })

  it.each([
    ['', /empty/],
    ['time (s),speed (m/s)\n0,0\n0.1,fast\n', /Line 3: speed must be a number, got "fast"/],
    ['time (s),colour\n0,red\n', /name a column of time and one of speed or position/],
    ['time (s),speed (mm)\n0,0\n1,1\n2,2', /needs a speed/],
    ['1\n2\n3\n', /two columns/],
    ['a\u0000b', /plain text/],
  ])('refuses %j with a sentence', (text, message) => {
    const reading = readProgrammeCsv(text)
    expect(reading.ok ? 'accepted' : reading.message).toMatch(message)
  })

  it('never throws on any text', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary' }), (text) => typeof readProgrammeCsv(text).ok === 'boolean'))
  })
})
