import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { compileProgramme, programmeRowProblems, type ProgrammeInput, type ProgrammeRow } from '../../../core/pulse'
import { expectClose } from '../../support/close'

function table(rows: readonly ProgrammeRow[]): ProgrammeInput {
  return { shape: 'table', stroke: 0, peakSpeed: 0, riseTime: 0, fallTime: 0, rows }
}

const GOOD: readonly ProgrammeRow[] = [
  { time: 0, speed: 0 },
  { time: 0.1, speed: 0.2 },
  { time: 0.2, speed: 0 },
]

describe('rows of a programme', () => {
  it('passes a good table', () => {
    expect(programmeRowProblems(GOOD)).toEqual([])
  })

  it.each<readonly [string, readonly ProgrammeRow[], string, string]>([
    ['too few rows', GOOD.slice(0, 2), 'programme.rows', 'A programme table needs at least 3 rows, got 2.'],
    [
      'a repeated time',
      [at(GOOD, 0), at(GOOD, 1), { time: 0.1, speed: 0 }],
      'programme.rows.2.time',
      'Row 3 of the programme must be later than row 2 at 0.1 s, got 0.1 s.',
    ],
    [
      'a time that is no number',
      [at(GOOD, 0), { time: NaN, speed: 1 }, at(GOOD, 2)],
      'programme.rows.1.time',
      'Row 2 of the programme must have a finite time, got NaN.',
    ],
    [
      'an infinite speed',
      [at(GOOD, 0), { time: 0.1, speed: Infinity }, at(GOOD, 2)],
      'programme.rows.1.speed',
      'Row 2 of the programme must have a finite speed, got Infinity.',
    ],
    [
      'a negative speed',
      [at(GOOD, 0), at(GOOD, 1), { time: 0.2, speed: -0.01 }],
      'programme.rows.2.speed',
      'Row 3 of the programme must have a speed of at least 0 m/s, got -0.01 m/s: fluid drawn back in is not part of a stroke.',
    ],
    [
      'a falling position',
      [
        { time: 0, position: 0.1 },
        { time: 0.1, position: 0.2 },
        { time: 0.2, position: 0.15 },
      ],
      'programme.rows.2.position',
      'Row 3 of the programme must not lie behind row 2 at 0.2 m, got 0.15 m.',
    ],
    [
      'a mixture',
      [at(GOOD, 0), { time: 0.1, position: 0.2 }, at(GOOD, 2)],
      'programme.rows.1.position',
      'Row 2 of the programme has a position, row 1 has a speed: all rows must give the same one.',
    ],
    [
      'no motion',
      GOOD.map(({ time }) => ({ time, speed: 0 })),
      'programme.rows',
      'The rows of the programme must add up to a stroke above 0 m, got 0 m: the piston never moves.',
    ],
  ])('refuses %s and names the row', (_, rows, field, message) => {
    const problem = at(programmeRowProblems(rows), 0)
    expect(problem.field).toBe(field)
    expect(problem.message).toBe(message)
    expect(() => compileProgramme(table(rows))).toThrow(message)
  })

  it('names every bad row, up to twenty', () => {
    const rows = Array.from({ length: 50 }, (_, i) => ({ time: i, speed: i % 2 === 0 ? -1 : 1 }))
    const problems = programmeRowProblems(rows)
    expect(problems.length).toBe(20)
    expect(at(problems, 1).field).toBe('programme.rows.2.speed')
  })
})

describe('reading of a table', () => {
  it('counts time from the first motion and ends the stroke with the last, and says so', () => {
    const rows = [
      { time: 2, speed: 0 },
      { time: 2.5, speed: 0 },
      { time: 2.6, speed: 0.2 },
      { time: 2.7, speed: 0 },
      { time: 3.5, speed: 0 },
    ]
    const programme = compileProgramme(table(rows))
    expectClose(programme.duration, 0.2, 1e-12)
    expectClose(programme.timeOfPeak, 0.1, 1e-12)
    expectClose(programme.stroke, 0.02, 1e-12)
    expect(programme.notes.length).toBe(2)
    expect(programme.notes[0]).toContain('first piston motion: 2.5 s')
    expect(programme.notes[1]).toContain('2.7 s')
    expect(compileProgramme(table(GOOD)).notes).toEqual([])
  })

  it('takes positions from wherever the piston stood', () => {
    const rows = [0.3, 0.3, 0.34, 0.42, 0.46, 0.46].map((position, i) => ({ time: 0.1 * i, position }))
    const programme = compileProgramme(table(rows))
    expectClose(programme.stroke, 0.16, 1e-12)
    expectClose(programme.duration, 0.3, 1e-12)
    // The monotone cubic leaves the rest and comes back to it with no speed, and passes every position.
    expect(programme.speedAt(0)).toBe(0)
    expectClose(programme.momentsAt(0.1).displacement, 0.04, 1e-12)
    expectClose(programme.momentsAt(0.2).displacement, 0.12, 1e-12)
  })

  it('positions of a steady push give a steady speed', () => {
    const rows = [0, 0.1, 0.25, 0.3].map((time) => ({ time, position: 0.4 * time }))
    const programme = compileProgramme(table(rows))
    expectClose(programme.peakSpeed, 0.4, 1e-12)
    expectClose(programme.moments.square, 0.16 * 0.3, 1e-12)
    expect(programme.corners).toEqual([0, programme.duration])
  })

  it('a table may start and stop at speed', () => {
    const programme = compileProgramme(table([0, 0.1, 0.3].map((time) => ({ time, speed: 0.5 }))))
    expect(programme.speedAt(0)).toBe(0.5)
    expect(programme.speedAt(0.3)).toBe(0.5)
    expect(programme.timeTo95PercentOfPeak).toBe(0)
    expectClose(programme.moments.cube, 0.125 * 0.3, 1e-13)
  })

  it('finds the peak of a position table between its rows', () => {
    // x = 3 t^2 - 2 t^3 has slopes 0 at 0 and 1, so two rows of rest around it make the cubic exact: peak 1.5 at 0.5.
    const rows = [-1, 0, 1, 2].map((time) => ({ time, position: time <= 0 ? 0 : 1 }))
    const programme = compileProgramme(table(rows))
    expectClose(programme.peakSpeed, 1.5, 1e-13)
    expectClose(programme.timeOfPeak, 0.5, 1e-13)
    // 6 t (1 - t) = 0.95 * 1.5.
    expectClose(programme.timeTo95PercentOfPeak, (1 - Math.sqrt(0.05)) / 2, 1e-12)
    // int (6 t (1 - t))^2 = 36/30, int (6 t (1 - t))^3 = 216/140.
    expectClose(programme.moments.square, 1.2, 1e-13)
    expectClose(programme.moments.cube, 216 / 140, 1e-13)
  })
})
