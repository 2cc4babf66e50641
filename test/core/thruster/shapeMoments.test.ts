import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compileProgramme, type ClosedShape, type ProgrammeInput } from '../../../core/pulse'
import { programmeMoments, rampsInTime, shapeMoments, shapeMomentsInTime } from '../../../core/thruster'
import { expectClose } from '../../support/close'

const SHAPES: readonly ClosedShape[] = ['rectangular', 'trapezoid', 'linear-ramp', 'half-sine', 'sine-squared']

describe('moments of a stroke', () => {
  it.each(SHAPES)('%s makes its stroke in the time asked for', (shape) => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 0.5, noNaN: true }),
        fc.double({ min: 0, max: 0.5, noNaN: true }),
        (r, f) => {
          const moments = shapeMomentsInTime(shape, 0.07, 0.3, r, f)
          expectClose(moments.duration, 0.3, 1e-12)
          expect(moments.stroke).toBe(0.07)
          const programme = compileProgramme({ shape, stroke: 0.07, ...rampsInTime(shape, 0.07, 0.3, r, f), rows: [] })
          expect(moments.integralSpeedSquared).toBe(programme.moments.square)
          expect(moments.integralSpeedCubed).toBe(programme.moments.cube)
        },
      ),
    )
  })

  it.each([
    ['half-sine', Math.PI * (Math.PI / 2)],
    ['sine-squared', Math.PI * 2],
  ] as const)('%s is steepest at %d strokes over duration squared', (shape, expected) => {
    expectClose(shapeMomentsInTime(shape, 1, 1).peakAcceleration, expected, 1e-13)
  })

  it('a trapezoid too short for its ramps keeps their slopes', () => {
    const ramps = { peakSpeed: 1, riseTime: 0.1, fallTime: 0.2 }
    const moments = shapeMoments('trapezoid', ramps, 0.0375)
    expectClose(moments.peakSpeed, 0.5, 1e-13)
    expectClose(moments.peakAcceleration, 10, 1e-13)
    expectClose(moments.risenSpeedSquared, 0.25, 1e-13)
  })

  it('jumps have no largest acceleration', () => {
    const ramps = { peakSpeed: 0.5, riseTime: 0, fallTime: 0.1 }
    expect(shapeMoments('trapezoid', ramps, 0.1)).toMatchObject({
      peakAcceleration: Infinity,
      jumpUp: true,
      jumpDown: false,
    })
    expect(shapeMoments('linear-ramp', ramps, 0.1)).toMatchObject({
      peakAcceleration: Infinity,
      jumpUp: false,
      jumpDown: true,
    })
    expect(shapeMoments('half-sine', ramps, 0.1)).toMatchObject({ jumpUp: false, jumpDown: false })
  })
})

describe('moments of a table', () => {
  const table = (rows: ProgrammeInput['rows']): ProgrammeInput => ({
    shape: 'table',
    stroke: 0,
    peakSpeed: 0,
    riseTime: 0,
    fallTime: 0,
    rows,
  })
  const momentsOf = (input: ProgrammeInput) => programmeMoments(compileProgramme(input), input)

  it('are those of the trapezoid its rows draw', () => {
    const closed = shapeMoments('trapezoid', { peakSpeed: 0.4, riseTime: 0.05, fallTime: 0.1 }, 0.07)
    const plateau = closed.duration - 0.15
    const rows = [
      [0, 0],
      [0.05, 0.4],
      [0.05 + plateau, 0.4],
      [0.15 + plateau, 0],
    ].map(([time = 0, speed = 0]) => ({ time, speed }))
    const read = momentsOf(table(rows))
    for (const key of ['stroke', 'duration', 'integralSpeedSquared', 'integralSpeedCubed', 'peakAcceleration'] as const)
      expectClose(read[key], closed[key], 1e-9)
    // Sums of squares over hundreds of parts.
    expectClose(read.risenSpeedSquared, 0.16, 1e-9)
    expect([read.jumpUp, read.jumpDown]).toEqual([false, false])
  })

  it('sum every rise of a stroke with two humps and see its jumps', () => {
    const rows = [
      [0, 0],
      [0.1, 0.3],
      [0.2, 0.1],
      [0.3, 0.4],
      [0.4, 0.2],
    ].map(([time = 0, speed = 0]) => ({ time, speed }))
    const read = momentsOf(table(rows))
    expectClose(read.risenSpeedSquared, 0.09 + (0.16 - 0.01), 1e-9)
    expect([read.jumpUp, read.jumpDown]).toEqual([false, true])
  })

  it('follow the slope of a curve through positions', () => {
    const rows = [0, 1, 2, 3, 4, 5].map((i) => ({ time: i / 10, position: 0.01 * i * i * (15 - 2 * i) * 0.1 }))
    const input = table(rows)
    const programme = compileProgramme(input)
    const read = programmeMoments(programme, input)
    let steepest = 0
    const n = 50_000
    const h = programme.duration / n
    for (let i = 0; i < n; i++)
      steepest = Math.max(steepest, Math.abs(programme.speedAt((i + 1) * h) - programme.speedAt(i * h)) / h)
    // Chords of 1/50000 of the stroke miss the end of a piece by half their length.
    if (!read.jumpUp && !read.jumpDown) expectClose(read.peakAcceleration, steepest, 1e-3)
    else expect(read.peakAcceleration).toBe(Infinity)
    expectClose(read.integralSpeedSquared, programme.moments.square, 1e-14)
  })
})
