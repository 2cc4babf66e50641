import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DomainError, at, integrate, last } from '../../../core/base'
import {
  compileProgramme,
  wholeClosedPulse,
  withStroke,
  type ClosedShape,
  type ProgrammeInput,
  type SpeedProgramme,
} from '../../../core/pulse'
import { expectClose, expectNear } from '../../support/close'

const CLOSED: readonly ClosedShape[] = ['rectangular', 'trapezoid', 'linear-ramp', 'half-sine', 'sine-squared']

function closed(shape: ClosedShape, more: Partial<ProgrammeInput> = {}): ProgrammeInput {
  return { shape, stroke: 0.12, peakSpeed: 0.2, riseTime: 0.05, fallTime: 0.08, rows: [], ...more }
}

const SPEED_ROWS = [
  { time: 0, speed: 0 },
  { time: 0.03, speed: 0.11 },
  { time: 0.1, speed: 0.4 },
  { time: 0.14, speed: 0.37 },
  { time: 0.2, speed: 0.05 },
  { time: 0.21, speed: 0 },
]
const POSITION_ROWS = [
  { time: 0, position: 0.01 },
  { time: 0.02, position: 0.0105 },
  { time: 0.05, position: 0.016 },
  { time: 0.09, position: 0.034 },
  { time: 0.12, position: 0.041 },
  { time: 0.16, position: 0.042 },
]

function table(rows: ProgrammeInput['rows']): ProgrammeInput {
  return { shape: 'table', stroke: 0, peakSpeed: 0, riseTime: 0, fallTime: 0, rows }
}

const ALL: readonly (readonly [string, ProgrammeInput])[] = [
  ...CLOSED.map((shape) => [shape, closed(shape)] as const),
  ['trapezoid too short for its ramps', closed('trapezoid', { stroke: 0.005 })],
  ['trapezoid without a rise', closed('trapezoid', { riseTime: 0 })],
  ['trapezoid without ramps', closed('trapezoid', { riseTime: 0, fallTime: 0 })],
  ['speed table', table(SPEED_ROWS)],
  ['position table', table(POSITION_ROWS)],
]

/** The moments by adaptive quadrature of the speed, corner to corner: the second route. */
function quadratureMoments(programme: SpeedProgramme, time: number): readonly [number, number, number] {
  const ends = [...programme.corners.filter((corner) => corner < time), time]
  const power = (n: number) => {
    let sum = 0
    for (let i = 0; i + 1 < ends.length; i++) {
      const a = at(ends, i)
      const b = at(ends, i + 1)
      sum += integrate((t) => programme.speedAt(t) ** n, a, b)
    }
    return sum
  }
  return [power(1), power(2), power(3)]
}

describe('moments of a programme', () => {
  it.each(ALL)('%s: running closed forms agree with adaptive quadrature of the speed', (_, input) => {
    const programme = compileProgramme(input)
    for (const share of [0.003, 0.04, 0.2, 0.36, 0.5, 0.77, 0.96, 1]) {
      const time = share * programme.duration
      const [displacement, square, cube] = quadratureMoments(programme, time)
      const got = programme.momentsAt(time)
      // 1e-9 is what the second route is good for where the speed starts as a high power of time.
      expectClose(got.displacement, displacement, 1e-9, `displacement at ${share}`)
      expectClose(got.square, square, 1e-9, `square at ${share}`)
      expectClose(got.cube, cube, 1e-9, `cube at ${share}`)
    }
  })

  it.each(ALL)('%s: the whole-pulse moments are the running ones at the end', (_, input) => {
    const programme = compileProgramme(input)
    const end = programme.momentsAt(programme.duration * (1 - 1e-9))
    const { moments } = programme
    // 1e-9 of the time is missing; the speed near the end is at most the peak, so at most some 1e-9 of each moment.
    expectClose(end.displacement, moments.displacement, 1e-8)
    expectClose(end.square, moments.square, 1e-8)
    expectClose(end.cube, moments.cube, 1e-8)
    expectClose(programme.momentsAt(2 * programme.duration).square, moments.square, 1e-13)
    expectClose(moments.displacement, programme.stroke, 1e-14)
  })

  it.each(ALL)('%s: is at rest outside its stroke and never above its peak', (_, input) => {
    const programme = compileProgramme(input)
    expect(programme.speedAt(-1e-6)).toBe(0)
    expect(programme.speedAt(programme.duration * (1 + 1e-9))).toBe(0)
    let fastest = 0
    for (let i = 0; i <= 4000; i++) {
      const speed = programme.speedAt((programme.duration * i) / 4000)
      expect(speed).toBeGreaterThanOrEqual(0)
      fastest = Math.max(fastest, speed)
    }
    expect(fastest).toBeLessThanOrEqual(programme.peakSpeed * (1 + 1e-14))
    expectClose(programme.speedAt(programme.timeOfPeak), programme.peakSpeed, 1e-14)
  })

  it.each(ALL)('%s: first reaches 95 percent of its peak when it says', (_, input) => {
    const programme = compileProgramme(input)
    const time = programme.timeTo95PercentOfPeak
    if (time > 0) expectClose(programme.speedAt(time), 0.95 * programme.peakSpeed, 1e-10)
    else expect(programme.speedAt(0)).toBeGreaterThanOrEqual(0.95 * programme.peakSpeed)
    for (let i = 0; time > 0 && i < 500; i++)
      expect(programme.speedAt((time * i) / 500)).toBeLessThanOrEqual(0.95 * programme.peakSpeed * (1 + 1e-12))
  })

  it.each(ALL)('%s: corners rise from 0 to the duration', (_, input) => {
    const { corners, duration } = compileProgramme(input)
    expect(corners[0]).toBe(0)
    expect(last(corners)).toBe(duration)
    for (let i = 1; i < corners.length; i++) expect(at(corners, i)).toBeGreaterThan(at(corners, i - 1))
  })
})

describe('closed shapes', () => {
  // Elementary integrals of each shape at unit peak and unit duration: displacement, square, cube.
  it.each([
    ['rectangular', 1, 1, 1],
    ['linear-ramp', 1 / 2, 1 / 3, 1 / 4],
    ['half-sine', 2 / Math.PI, 1 / 2, 4 / (3 * Math.PI)],
    ['sine-squared', 1 / 2, 3 / 8, 5 / 16],
  ] as const)('%s has its textbook moments', (shape, d, s, c) => {
    const { moments, duration, peakSpeed } = compileProgramme(closed(shape))
    expectClose(moments.displacement, d * peakSpeed * duration, 1e-14)
    expectClose(moments.square, s * peakSpeed ** 2 * duration, 1e-14)
    expectClose(moments.cube, c * peakSpeed ** 3 * duration, 1e-14)
  })

  it('a trapezoid keeps ramps and peak where the stroke is long enough', () => {
    const programme = compileProgramme(closed('trapezoid'))
    expect(programme.reducedPeak).toBe(false)
    expect(programme.peakSpeed).toBe(0.2)
    // Plateau 0.12/0.2 - (0.05 + 0.08)/2 = 0.535 s.
    expectClose(programme.duration, 0.535 + 0.13, 1e-14)
    expect(programme.corners.length).toBe(4)
    expectClose(at(programme.corners, 1), 0.05, 1e-14)
    expectClose(at(programme.corners, 2), 0.585, 1e-14)
  })

  it('a trapezoid too short for its ramps keeps their slopes and turns at a lower peak', () => {
    const programme = compileProgramme(closed('trapezoid', { stroke: 0.00325 }))
    expect(programme.reducedPeak).toBe(true)
    // Ramps alone would make 0.2 (0.05 + 0.08)/2 = 0.013 m; a quarter of the stroke has half the peak.
    expectClose(programme.peakSpeed, 0.1, 1e-14)
    expectClose(programme.duration, 0.065, 1e-14)
    expectClose(programme.speedAt(0.0125), 0.05, 1e-13)
    expectClose(programme.moments.displacement, 0.00325, 1e-14)
    expect(programme.corners.length).toBe(3)
  })

  it('a trapezoid is continuous in its stroke where the plateau vanishes', () => {
    const edge = 0.013
    const below = wholeClosedPulse('trapezoid', closed('trapezoid'), edge * (1 - 1e-10))
    const above = wholeClosedPulse('trapezoid', closed('trapezoid'), edge * (1 + 1e-10))
    expect(below.reducedPeak).toBe(true)
    expect(above.reducedPeak).toBe(false)
    // 2e-10 of stroke between them, and every quantity here is at most linear in it.
    expectClose(below.moments.square, above.moments.square, 1e-9)
    expectClose(below.moments.cube, above.moments.cube, 1e-9)
    expectClose(below.duration, above.duration, 1e-9)
  })

  it('the same trapezoid written as a table has the same moments', () => {
    const trapezoid = compileProgramme(closed('trapezoid'))
    const rows = [0, 0.05, 0.585, 0.665].map((time, i) => ({ time, speed: at([0, 0.2, 0.2, 0], i) }))
    const written = compileProgramme(table(rows))
    expectClose(written.stroke, trapezoid.stroke, 1e-13)
    expectClose(written.moments.cube, trapezoid.moments.cube, 1e-13)
    expectClose(written.timeTo95PercentOfPeak, trapezoid.timeTo95PercentOfPeak, 1e-12)
    expectClose(written.timeOfPeak, 0.05, 1e-13)
  })

  it.each([
    ['programme.stroke', { stroke: 0 }],
    ['programme.stroke', { stroke: Number.NaN }],
    ['programme.peakSpeed', { peakSpeed: -1 }],
    ['programme.riseTime', { riseTime: -0.1 }],
    ['programme.fallTime', { fallTime: Infinity }],
  ])('refuses a bad %s by its name', (field, more) => {
    const refused = () => compileProgramme(closed('trapezoid', more))
    expect(refused).toThrow(DomainError)
    expect(refused).toThrow(field)
  })
})

describe('another stroke', () => {
  it.each(ALL)('%s: withStroke and atStroke agree and keep the peak', (_, input) => {
    const programme = compileProgramme(input)
    const longer = programme.stroke * 1.7
    const compiled = compileProgramme(withStroke(input, longer))
    const whole = programme.atStroke(longer)
    expectClose(compiled.stroke, longer, 1e-13)
    expectClose(compiled.moments.square, whole.moments.square, 1e-12)
    expectClose(compiled.moments.cube, whole.moments.cube, 1e-12)
    expectClose(compiled.duration, whole.duration, 1e-13)
    expectNear(compiled.timeTo95PercentOfPeak, whole.timeTo95PercentOfPeak, 1e-12)
    if (!programme.reducedPeak) expectClose(compiled.peakSpeed, programme.peakSpeed, 1e-12)
  })

  it('a table stretches in time, so speeds keep and positions stretch with it', () => {
    const speeds = withStroke(table(SPEED_ROWS), 2 * compileProgramme(table(SPEED_ROWS)).stroke)
    expectClose(at(speeds.rows, 2).time, 0.2, 1e-14)
    expect(speeds.rows[2]).toMatchObject({ speed: 0.4 })
    const positions = withStroke(table(POSITION_ROWS), 2 * 0.032)
    const row = at(positions.rows, 3)
    expectClose(row.time, 0.18, 1e-13)
    expectClose('position' in row ? row.position : NaN, 0.068, 1e-13)
  })

  it('refuses a stroke that is not above zero', () => {
    expect(() => withStroke(closed('half-sine'), -1)).toThrow('programme.stroke must be above 0 m, got -1 m')
  })

  it('closed shapes at fixed peak have squares and cubes that rise with the stroke', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...CLOSED),
        fc.double({ min: 1e-3, max: 1, noNaN: true }),
        fc.double({ min: 1.001, max: 5, noNaN: true }),
        fc.double({ min: 0, max: 3, noNaN: true }),
        (shape, stroke, factor, riseTime) => {
          const ramps = { peakSpeed: 0.3, riseTime, fallTime: 0.4 }
          const short = wholeClosedPulse(shape, ramps, stroke).moments
          const long = wholeClosedPulse(shape, ramps, stroke * factor).moments
          expect(long.square).toBeGreaterThan(short.square)
          expect(long.cube).toBeGreaterThan(short.cube)
          // Cauchy-Schwarz between the moments of any speed.
          expect(short.square ** 2).toBeLessThanOrEqual(short.displacement * short.cube * (1 + 1e-12))
        },
      ),
      { seed: 1, numRuns: 200 },
    )
  })
})
