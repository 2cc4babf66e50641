import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { eachFieldFrame, readFieldFrame, readReadings, writeCsv, type ReadingsTable } from '../../../core/plan'
import type { FieldFrame } from '../../../core/tank'

function read(text: string, choices = {}): ReadingsTable {
  const reading = readReadings(text, choices)
  if (!reading.ok) throw new Error(reading.message)
  return reading
}

function refusal(text: string, choices = {}): string {
  const reading = readReadings(text, choices)
  return reading.ok ? '' : reading.message
}

const lines = (...rows: readonly string[]): string => rows.join('\n')

describe('a table of readings', () => {
  it('is read with its delimiter, decimal mark, units and columns found and shown', () => {
    const table = read(
      lines(
        'Run;t [ms];x (mm);R (mm);Γ (cm²/s);σ x (mm)',
        'a;100;12,5;9,75;1,2e1;0,2',
        'a;200;20,0;;12,1;',
        'b;100;12,7;9,8;;0,2',
      ),
    )
    expect(table).toMatchObject({ kind: 'rows', delimiter: ';', decimalComma: true, skippedCount: 0 })
    expect(table.rows).toEqual([
      { run: 'a', time: 0.1, x: 0.0125, radius: 0.00975, circulation: 0.0012, sigmaX: 0.0002, ...NO_SIGMA },
      { run: 'a', time: 0.2, x: 0.02, radius: null, circulation: 0.00121, sigmaX: null, ...NO_SIGMA },
      { run: 'b', time: 0.1, x: 0.0127, radius: 0.0098, circulation: null, sigmaX: 0.0002, ...NO_SIGMA },
    ])
    expect(table.columns).toEqual([
      { heading: 'Run', role: 'run', unit: '' },
      { heading: 't [ms]', role: 'time', unit: 'ms' },
      { heading: 'x (mm)', role: 'x', unit: 'mm' },
      { heading: 'R (mm)', role: 'radius', unit: 'mm' },
      { heading: 'Γ (cm²/s)', role: 'circulation', unit: 'cm²/s' },
      { heading: 'σ x (mm)', role: 'sigmaX', unit: 'mm' },
    ])
    expect(table.notes.join(' ')).toMatch(/Delimiter semicolon, decimal comma.*"x \(mm\)" as place in mm.*2 runs: a, b/)
  })

  it('reads every digit as the plain number would be', () => {
    const table = read(lines('t (s),x (mm)', '0.1,12.3456789012345', '1e-1,1.5e3', '0.3,-.5'))
    expect(table.rows.map(({ x }) => x)).toEqual([12.3456789012345e-3, 1.5, -0.5e-3])
  })

  it.each([
    ['tabs', 'time (s)\tx (m)\n0.1\t0.2\n0.2\t0.3\n'],
    ['bars and Windows line ends', 'time (s)|x (m)\r\n0.1|0.2\r\n0.2|0.3\r\n'],
    ['old line ends', 'time (s),x (m)\r0.1,0.2\r0.2,0.3\r'],
    ['mixed line ends', 'time (s),x (m)\r\n0.1,0.2\n0.2,0.3'],
    ['spaces', 'time   x\n0.1   0.2\n0.2   0.3\n'],
    ['a byte-order mark', '\uFEFFtime (s),x (m)\n0.1,0.2\n0.2,0.3'],
    ['quotes round every cell', '"time (s)","x (m)"\n"0.1","0.2"\n"0.2","0.3"'],
    ['comments and no heading', '# made on a day\n0.1,0.2\n# and on\n0.2,0.3'],
    ['a semicolon and decimal commas', 'time (s);x (m)\n0,1;0,2\n0,2;0,3'],
    ['units in cells', 'time,x\n100 ms,20 cm\n0.2 s,300 mm'],
    ['true minus signs and blanks round cells', 'time (s),x (m)\n 0.1 , 0.2 \n+0.2,0.3'],
  ])('is read with %s', (_name, text) => {
    const { rows, skippedCount } = read(text)
    expect(rows.map(({ time, x }) => [time, x])).toEqual([
      [0.1, 0.2],
      [0.2, 0.3],
    ])
    expect(skippedCount).toBe(0)
  })

  it('takes empty lines as the end of a run, and a heading that stands again as one', () => {
    const table = read(lines('t (s),x (m)', '1,1', '2,2', '', 't (s),x (m)', '1,1.1', '', '', '1,1.2'))
    expect(table.rows.map(({ run }) => run)).toEqual(['1', '1', '2', '3'])
    expect(table.notes.join(' ')).toMatch(/heading stands again 1 time/)
  })

  it('maps columns and units as it is told', () => {
    const text = lines('A,B,C', '12.5,0.1,7', '20,0.2,8')
    expect(refusal(text)).toMatch(/needs a column of time; its columns are "A", "B", "C"\. Say which column is which/)
    const table = read(text, { roles: ['x', 'time', null], units: ['mm', 's', null] })
    expect(table.rows.map(({ time, x }) => [time, x])).toEqual([
      [0.1, 0.0125],
      [0.2, 0.02],
    ])
    expect(at(table.columns, 2)).toEqual({ heading: 'C', role: null, unit: '' })
    expect(read('1,5\n2,6', { kind: 'force', delimiter: ',', decimalComma: false }).force.force).toEqual(
      Float64Array.from([5, 6]),
    )
  })

  it('leaves pixels for the length scale, and refuses a unit of the wrong kind', () => {
    const table = read(lines('t (s),x (px)', '1,120'))
    expect(at(table.rows, 0).x).toBe(120)
    expect(table.notes.join(' ')).toMatch(/in pixels: set the length scale/)
    expect(refusal(lines('t (s),x (mL)', '1,120'))).toMatch(/Column "x \(mL\)".*length.*volume/)
  })
})

describe('hostile tables', () => {
  it('name every row that is skipped, with its line, and keep the others', () => {
    const table = read(
      lines(
        't (s),x (m),radius (m)',
        '0.1,0.2,0.01',
        'soon,0.2,0.01',
        '0.3,=1+2,0.01',
        '0.4,0.4,0.01,7',
        '0.5',
        '0.6,0.6,-1',
        '0.7,3 mL,0.01',
        '0.8,0.8',
        '0.9,1.2.3,0.01',
      ),
    )
    expect(table.rows.map(({ time }) => time)).toEqual([0.1, 0.8])
    expect(table.skipped.map(({ message }) => message.slice(0, 7))).toEqual(
      [3, 4, 5, 6, 7, 8, 10].map((line) => `Line ${line}:`.slice(0, 7)),
    )
    expect(table.skipped.map(({ message }) => message).join('\n')).toMatch(
      /=1\+2[\s\S]*4 cells where the table has 3[\s\S]*holds no place[\s\S]*radius must be above 0[\s\S]*volume/,
    )
    expect(table.notes.join(' ')).toMatch(/7 of 9 rows were skipped/)
  })

  it('counts lines through comments, empty lines and quoted cells over several lines', () => {
    const table = read('# one\nt (s),x (m)\n\n0.1,0.2\n# five\n"0.2\n0.25",0.3\n0.3,bad\n0.4,0.4\n')
    expect(table.rows.map(({ time }) => time)).toEqual([0.1, 0.4])
    expect(table.skipped.map(({ line }) => line)).toEqual([6, 7, 8])
    expect(at(table.skipped, 0).message).toMatch(/quotation mark is not closed on its line/)
  })

  it('lose nothing behind a quotation mark that is never closed', () => {
    const rest = Array.from({ length: 500 }, (_, k) => `${k + 1},"${k + 2}"`)
    const table = read(lines('t (s),x (m)', '0.1,0.1', '0.2,"0.3', ...rest))
    expect(table.rows).toHaveLength(501)
    expect(table.skipped).toEqual([{ line: 3, message: 'Line 3: a quotation mark is not closed on its line.' }])
  })

  it('refuse zero characters by row, and text of two bytes a character as a whole', () => {
    const table = read('t (s),x (m)\n0.1,0.1\n0.2,0.\u00002\n0.3,0.3')
    expect(table.rows).toHaveLength(2)
    expect(table.skipped.map(({ message }) => message)).toEqual([
      'Line 3: it holds a character that is no text (zero).',
    ])
    const wide = [...'t,x\n1,2\n'].join('\u0000')
    expect(refusal(wide)).toMatch(/two bytes a character \(UTF-16\) and no byte-order mark: save it as UTF-8/)
  })

  it('keep a run that looks like a formula as text, and arm it again when written', () => {
    const table = read(lines('run,t (s),x (m)', "'=cmd,1,1", '@b,2,2'))
    expect(table.rows.map(({ run }) => run)).toEqual(['=cmd', '@b'])
    expect(
      writeCsv(
        ['run'],
        table.rows.map(({ run }) => [run]),
      ),
    ).toBe("run\r\n'=cmd\r\n'@b\r\n")
  })

  it('do not guess what a comma between three digits means where points stand too', () => {
    const table = read(lines('t (s);x (mm)', '1;1,234', '2;12.5', '3;13.5'))
    expect(table.rows.map(({ x }) => x)).toEqual([0.0125, 0.0135])
    expect(table.skipped.map(({ line }) => line)).toEqual([2])
  })

  it('never throw, and name or read every line, whatever the text', () => {
    const cell = fc.oneof(
      fc.string({ maxLength: 4 }),
      fc.constantFrom('"', '1', '0,5', '2.5', '\u0000', '#', '\n', ';', 't', 'x (mm)'),
    )
    fc.assert(
      fc.property(
        fc.array(fc.array(cell, { maxLength: 5 }), { maxLength: 12 }),
        fc.constantFrom(',', ';', '\t'),
        (rows, mark) => {
          const body = rows.map((row) => row.join(mark)).join('\n')
          for (const text of [body, `t (s)${mark}x (m)\n${body}`]) {
            const reading = readReadings(text)
            if (!reading.ok) expect(reading.message).toMatch(/\.$/)
          }
        },
      ),
      { numRuns: 300 },
    )
    fc.assert(
      fc.property(
        fc.array(fc.constantFrom('1,1', '2,"2"', '3,"3', '"4,4', '5,5"', '6,6,6', 'x,y', '\u00007,7'), {
          maxLength: 30,
        }),
        (rows) => {
          const reading = readReadings(['t (s),x (m)', '0,0', ...rows].join('\n'))
          if (!reading.ok) throw new Error(reading.message)
          expect(reading.rows.length + reading.skippedCount).toBe(rows.length + 1)
        },
      ),
      { numRuns: 300 },
    )
  })

  it.each([
    ['', /empty/],
    ['\n\n\n', /empty/],
    ['time (s),x (m)\n', /heading and no rows/],
    ['a letter to the editor', /Say which column is which/],
    ['t (s),x (m)\nno,no\n', /Line 2: time/],
    ['x (m),y (m),u (m/s),v (m/s)\n0,0,0,0', /velocity field/],
  ])('are refused in a sentence: %j', (text, why) => {
    expect(refusal(text)).toMatch(why)
  })
})

describe('logs', () => {
  it('of force are found by their heading, and times that do not rise are named', () => {
    const table = read(lines('Time (ms),Load cell (mN)', '0,1', '10,2', '5,3', '20,4'))
    expect(table.kind).toBe('force')
    expect(table.force.time).toEqual(Float64Array.from([0, 0.01, 0.02]))
    expect(table.force.force).toEqual(Float64Array.from([0.001, 0.002, 0.004]))
    expect(table.skipped.map(({ message }) => message)).toEqual([
      'Line 4: its time 0.005 s does not come after 0.01 s, the row before it.',
    ])
  })

  it('of the piston are read by position or by speed', () => {
    expect(read(lines('t (s),piston position (mm)', '0,0', '1,5')).piston).toEqual([
      { time: 0, position: 0 },
      { time: 1, position: 0.005 },
    ])
    const { kind, piston } = read(lines('time (s);velocity (mm/s)', '0;0', '1;5'))
    expect([kind, at(piston, 1)]).toEqual(['piston', { time: 1, speed: 0.005 }])
  })

  it('of a million rows are read whole, the bad ones named', () => {
    const count = 1_000_000
    const rows = Array.from({ length: count }, (_, i) =>
      i % 250_000 === 249_999 ? 'gap,gap' : `${(i * 1e-4).toFixed(4)},${(0.03 * Math.sin(i / 500)).toFixed(5)}`,
    )
    const text = `time (s),force (N)\n${rows.join('\n')}\n`
    const started = performance.now()
    const table = read(text)
    console.info(
      `1e6 rows, ${(text.length / 1e6).toFixed(0)} MB, read in ${((performance.now() - started) / 1000).toFixed(1)} s`,
    )
    expect(table.force.time).toHaveLength(count - 4)
    expect(table.skipped.map(({ line }) => line)).toEqual([250_001, 500_001, 750_001, 1_000_001])
    expect(at(table.force.time, 999_000)).toBe(Number((999_003 * 1e-4).toFixed(4)))
  })
})

describe('velocity fields', () => {
  const field = (u: number): string[] => [0, 1, 2, 3].flatMap((y) => [0, 1, 2, 3].map((x) => `${x};${y};${u},5;NaN`))

  it('are read one frame a file, nodes without a vector kept', () => {
    const reading = readFieldFrame(lines('x [mm];y [mm];Vx [m/s];Vy [m/s]', ...field(1)), 0.5)
    if (!reading.ok) throw new Error(reading.message)
    expect(reading.frame.time).toBe(0.5)
    expect(reading.frame.x).toHaveLength(16)
    expect(at(reading.frame.u, 0)).toBe(1.5)
    expect(at(reading.frame.x, 1)).toBe(0.001)
    expect(Array.from(reading.frame.v).every(Number.isNaN)).toBe(true)
  })

  it('are read several frames in a file, by their time or by empty lines, one held at a time', () => {
    const frames: FieldFrame[] = []
    const timed = [0.1, 0.2].flatMap((time) => field(time * 10).map((row) => `${time};${row}`))
    const byTime = eachFieldFrame(
      lines('t (s);x (mm);r (mm);u (m/s);v (m/s)', ...timed),
      () => 9,
      { decimalComma: true },
      (frame) => frames.push(frame),
    )
    expect(byTime).toMatchObject({ ok: true, frames: 2, skippedCount: 0 })
    expect(frames.map(({ time, u }) => [time, at(u, 0), u.length])).toEqual([
      [0.1, 1.5, 16],
      [0.2, 2.5, 16],
    ])
  })

  it('that hold several frames are told apart from one', () => {
    const text = lines('x (mm);r (mm);u (m/s);v (m/s)', ...field(1), '', ...field(2))
    expect(readFieldFrame(text, 0)).toEqual({
      ok: false,
      message: 'The file holds 2 frames where one is read at a time.',
    })
    const times: number[] = []
    eachFieldFrame(
      text,
      (k) => k / 10,
      {},
      ({ time }) => times.push(time),
    )
    expect(times).toEqual([0, 0.1])
  })
})

const NO_SIGMA = { sigmaRadius: null, sigmaCirculation: null }
