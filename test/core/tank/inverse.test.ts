import { describe, expect, it } from 'vitest'
import { typescriptKernel } from '../../../core/kernel'
import { computePulse, withStroke, type PulseInput } from '../../../core/pulse'
import {
  pistonProfile,
  solutionsFor,
  tankArrivals,
  tankWalls,
  withPeak,
  type InverseInput,
  type Solution,
} from '../../../core/tank'
import { risingRoot } from '../../../core/tank/risingRoot'
import { expectClose } from '../../support/close'
import { PLAIN } from '../pulse/plans'
import { DRIVE, NO_TANK } from './sections'

const OPTIONS = { kernel: typescriptKernel }
const OPEN = tankWalls({ tank: NO_TANK, nozzleDepth: null }, PLAIN.nozzle.diameter)
const NU = PLAIN.kinematicViscosity

const SHAPES: Readonly<Record<string, PulseInput>> = {
  rectangular: PLAIN,
  trapezoid: { ...PLAIN, programme: { ...PLAIN.programme, shape: 'trapezoid', riseTime: 0.02, fallTime: 0.03 } },
  'half-sine': { ...PLAIN, programme: { ...PLAIN.programme, shape: 'half-sine' } },
  table: {
    ...PLAIN,
    programme: {
      ...PLAIN.programme,
      shape: 'table',
      rows: [
        { time: 0, speed: 0 },
        { time: 0.05, speed: 0.4 },
        { time: 0.1, speed: 0.3 },
        { time: 0.2, speed: 0 },
      ],
    },
  },
}

function given(parts: Partial<InverseInput> = {}): InverseInput {
  return {
    target: { kind: 'circulation', value: 0.004 },
    pulse: PLAIN,
    drive: DRIVE,
    controllerStep: 0.001,
    ageing: 'auto',
    walls: OPEN,
    strokes: [0.02, 0.04, 0.07, 0.12],
    ...parts,
  }
}

/** The pulse of a solution, computed anew. */
function pulseOf(pulse: PulseInput, { stroke, peakSpeed }: Solution): PulseInput {
  const base = withStroke(pulse.programme, stroke)
  const from = computePulse({ ...pulse, programme: base }).peakSpeed
  return { ...pulse, programme: withPeak(base, peakSpeed ?? NaN, from) }
}

describe('strokes and peak speeds for a target', () => {
  it.each(Object.keys(SHAPES))('give the wanted circulation when computed forward: %s', async (shape) => {
    const pulse = SHAPES[shape] ?? PLAIN
    const solutions = await solutionsFor(given({ pulse }), OPTIONS)
    expect(solutions.map(({ stroke }) => stroke)).toEqual([0.02, 0.04, 0.07, 0.12])
    for (const solution of solutions) {
      expect(solution.reason).toBeNull()
      const { ring, peakSpeed, stroke } = computePulse(pulseOf(pulse, solution))
      expectClose(ring?.circulation ?? NaN, 0.004, 1e-6)
      expectClose(peakSpeed, solution.peakSpeed ?? NaN, 1e-9)
      expectClose(stroke, solution.stroke, 1e-9)
    }
  })

  it('keep the ratios tried as they are, and take the stroke of the plan for one of them but for rounding', async () => {
    // 4.5 times 25 mm over 25 mm is 4.500000000000001 in floating point.
    const nozzle = { ...PLAIN.nozzle, diameter: 0.025, pistonDiameter: 0.025 }
    const pulse = { ...PLAIN, nozzle, programme: { ...PLAIN.programme, stroke: 0.1125 } }
    const { strokes, ...usual } = given({ pulse })
    expect(strokes).toBeDefined()
    const solutions = await solutionsFor(usual, OPTIONS)
    expect(solutions.map(({ strokeRatio }) => strokeRatio)).toEqual(Array.from({ length: 16 }, (_, k) => (k + 1) / 2))
  })

  it('follow the slug for a ring Reynolds number: Re = (U D / nu) (L / D) / 2', async () => {
    // Check L2, an identity of the slug of constant speed.
    const solutions = await solutionsFor(
      given({ target: { kind: 'reynolds', value: 5000 }, strokes: [0.02, 0.04] }),
      OPTIONS,
    )
    for (const { peakSpeed, strokeRatio, reynolds, circulation } of solutions) {
      expectClose((((peakSpeed ?? NaN) * 0.02) / NU) * (strokeRatio / 2), 5000, 1e-7)
      expectClose(reynolds ?? NaN, 5000, 1e-7)
      expectClose(circulation ?? NaN, 5000 * NU, 1e-7)
    }
  })

  it('give the wanted speed at a station in the tank, as the arrivals tell it', async () => {
    const walls = tankWalls({ tank: { ...NO_TANK, width: 0.3, depth: 0.25 }, nozzleDepth: null }, 0.02)
    const target = { kind: 'speed', value: 0.1, station: 0.25 } as const
    const solutions = await solutionsFor(given({ target, walls, strokes: [0.03, 0.06] }), OPTIONS)
    for (const solution of solutions) {
      expect(solution.reason).toBeNull()
      const pulse = pulseOf(PLAIN, solution)
      const { arrivals } = await tankArrivals(
        { ...pulse, pulse: computePulse(pulse), ageing: 'auto', walls, stations: [0.25] },
        OPTIONS,
      )
      expectClose(arrivals[0]?.speed ?? NaN, 0.1, 1e-6)
      expectClose(solution.speedAtStation ?? NaN, 0.1, 1e-6)
    }
  })

  it('give both the laminar ring and the faster turbulent one that come to a speed, each by its own Reynolds number', async () => {
    const solutions = await solutionsFor(
      given({ target: { kind: 'speed', value: 0.18, station: 0.1 }, strokes: [0.04] }),
      OPTIONS,
    )
    expect(solutions.map(({ ageing }) => ageing)).toEqual(['laminar', 'turbulent'])
    const [laminar, turbulent] = solutions
    expect(laminar?.reynolds ?? NaN).toBeLessThan(10_000)
    expect(turbulent?.reynolds ?? NaN).toBeGreaterThan(10_000)
    for (const solution of solutions) {
      expectClose(solution.speedAtStation ?? NaN, 0.18, 1e-7)
      const pulse = pulseOf(PLAIN, solution)
      const { arrivals } = await tankArrivals(
        { ...pulse, pulse: computePulse(pulse), ageing: 'auto', walls: OPEN, stations: [0.1] },
        OPTIONS,
      )
      expectClose(arrivals[0]?.speed ?? NaN, 0.18, 1e-6)
    }
  })

  it('give none where a laminar ring would have to be turbulent and a turbulent one laminar', async () => {
    // The thin core of a short stroke slows a laminar ring more than a turbulent one of the same speed at birth.
    const target = { kind: 'speed', value: 0.26, station: 0.1 } as const
    const solutions = await solutionsFor(given({ target, strokes: [0.02] }), OPTIONS)
    expect(solutions.length).toBe(1)
    expect(solutions[0]).toMatchObject({ ok: false, peakSpeed: null })
    expect(solutions[0]?.reason).toMatch(/would be turbulent by its Reynolds number, and a turbulent one laminar/)
    // Asked for one law, the plan gets it.
    const forced = await solutionsFor(given({ target, strokes: [0.02], ageing: 'turbulent' }), OPTIONS)
    expectClose(forced[0]?.speedAtStation ?? NaN, 0.26, 1e-7)
  })

  it('say what the drive cannot follow, and keep the solution', async () => {
    const drive = { ...DRIVE, maxSpeed: 0.02, maxTravel: 0.02, leak: 0.1 }
    const solutions = await solutionsFor(given({ drive }), OPTIONS)
    const [first, second, , last] = solutions
    // 0.4 m/s and 0.2 m/s at the exit are a quarter of that at the piston, over 0.9.
    expectClose(first?.pistonSpeed ?? NaN, 0.4 / 4 / 0.9, 1e-7)
    expect(first?.ok).toBe(false)
    expect(first?.reason).toMatch(/Piston speed 0\.1111 m\/s is above the drive's 0\.02 m\/s/)
    expectClose(second?.pistonTravel ?? NaN, 0.04 / 4 / 0.9, 1e-12)
    expect(last?.reason).toMatch(/Piston travel 0\.03333 m is above/)
    expect(last?.peakSpeed).not.toBeNull()
    const free = await solutionsFor(given({ drive: { ...DRIVE, maxSpeed: 0.2 } }), OPTIONS)
    expect(free.every(({ ok }) => ok)).toBe(true)
  })

  it('say why there is none', async () => {
    const behind = await solutionsFor(
      given({ target: { kind: 'speed', value: 0.1, station: 0.01 }, strokes: [0.06] }),
      OPTIONS,
    )
    expect(behind[0]).toMatchObject({ ok: false, peakSpeed: null })
    expect(behind[0]?.reason).toMatch(/still forming at the station/)
    const walls = tankWalls({ tank: { ...NO_TANK, length: 0.2 }, nozzleDepth: null }, 0.02)
    const beyond = await solutionsFor(
      given({ target: { kind: 'speed', value: 0.1, station: 0.3 }, strokes: [0.06], walls }),
      OPTIONS,
    )
    expect(beyond[0]?.reason).toMatch(/beyond the far wall/)
    // A short trapezoid never reaches the speed it would need.
    const pulse = { ...PLAIN, programme: { ...PLAIN.programme, shape: 'trapezoid' as const, riseTime: 1, fallTime: 1 } }
    const far = await solutionsFor(
      given({ pulse, target: { kind: 'circulation', value: 100 }, strokes: [0.02] }),
      OPTIONS,
    )
    expect(far[0]?.reason).toMatch(/no peak speed from 0\.00001 to 100 m\/s/)
  })

  it('stop when cancelled, and report how far they are', async () => {
    const shares: number[] = []
    const signal = { aborted: false }
    const some = await solutionsFor(given(), {
      ...OPTIONS,
      signal,
      onProgress: ({ share }) => {
        shares.push(share)
        signal.aborted = share >= 0.5
      },
    })
    expect(shares).toEqual([0.25, 0.5])
    expect(some.length).toBe(2)
  })

  it('refuse a target that cannot be, with the field', async () => {
    await expect(solutionsFor(given({ target: { kind: 'circulation', value: -1 } }), OPTIONS)).rejects.toMatchObject({
      field: 'tankRun.target.circulation',
    })
    await expect(
      solutionsFor(given({ target: { kind: 'speed', value: 1, station: 0 } }), OPTIONS),
    ).rejects.toMatchObject({ field: 'tankRun.target.station' })
  })
})

describe('the root of a rising function', () => {
  const root = (f: (x: number) => number | null, target: number, guess = 1) =>
    risingRoot((x) => Promise.resolve(f(x)), target, { guess, least: 1e-6, most: 1e6, tolerance: 1e-12 })

  it.each([
    ['a power', (x: number) => x ** 2.7, 40, 40 ** (1 / 2.7)],
    ['a line with a floor', (x: number) => 3 + x, 1e4, 9997],
    ['something steep', (x: number) => Math.exp(Math.min(x, 600)), 1e9, Math.log(1e9)],
  ])('is found for %s', async (_name, f, target, expected) => {
    for (const guess of [1e-3, 1, 1e3]) expectClose((await root(f, target, guess)) ?? NaN, expected, 1e-10)
  })

  it('is null where the value never comes to the target or is not there', async () => {
    expect(await root(() => 1, 2)).toBeNull()
    expect(await root((x) => Math.min(x, 5), 7)).toBeNull()
    expect(await root((x) => (x > 10 ? null : x), 100)).toBeNull()
  })

  it('closes in on a jump past the target', async () => {
    expectClose((await root((x) => (x < 5 ? x : x + 10), 8)) ?? NaN, 5, 1e-12)
  })
})

describe('a solution is judged by what would run', () => {
  // A drive that has 0.1 m/s, 2 m/s2 and 200 m/s3 for a ring of 50 cm2/s from a 25 mm tube.
  const drive = { ...DRIVE, maxTravel: 0.06, maxSpeed: 0.1, maxAcceleration: 2, maxJerk: 200 }
  const pulse: PulseInput = {
    ...PLAIN,
    nozzle: { ...PLAIN.nozzle, diameter: 0.025, pistonDiameter: 0.05 },
    programme: {
      ...PLAIN.programme,
      shape: 'trapezoid',
      stroke: 0.0625,
      peakSpeed: 0.1,
      riseTime: 0.02,
      fallTime: 0.02,
    },
  }
  const walls = tankWalls({ tank: NO_TANK, nozzleDepth: null }, 0.025)
  const { strokes, ...usual } = given({ target: { kind: 'circulation', value: 0.005 }, pulse, drive, walls })

  it('by the speed asked and by the circulation left after rounding, and tells both', async () => {
    expect(strokes).toBeDefined()
    const solutions = await solutionsFor(usual, OPTIONS)
    expect(solutions.some(({ ok }) => ok)).toBe(true)
    expect(solutions.some(({ ok }) => !ok)).toBe(true)
    for (const { ok, peakSpeed, askedPeakSpeed, stroke, pistonSpeed, reason } of solutions) {
      const programme = { ...pulse.programme, stroke, peakSpeed: askedPeakSpeed ?? NaN }
      const profile = pistonProfile({ programme, nozzle: pulse.nozzle, drive, controllerStep: 0.001 })
      const kept = Math.abs(profile.rounding.circulationShare - 1) <= 0.01
      expect(ok).toBe((pistonSpeed ?? NaN) <= 0.1 && kept && profile.ok)
      expect(reason === null).toBe(ok)
      if ((pistonSpeed ?? NaN) > 0.1)
        expect(reason).toContain(`Piston speed ${Number((pistonSpeed ?? NaN).toPrecision(4))} m/s is above`)
      if (!kept) expect(reason).toMatch(/rounded over \d+ steps .* in place of 0\.005 m2\/s/)
      // The peak listed is the peak reached, at most the one that is asked for.
      expectClose(computePulse({ ...pulse, programme }).peakSpeed, peakSpeed ?? NaN, 1e-9)
      expect(peakSpeed ?? NaN).toBeLessThanOrEqual(askedPeakSpeed ?? NaN)
    }
    // Half a diameter of stroke never reaches what its ramps of 20 ms are asked for.
    expect(solutions[0]?.peakSpeed ?? NaN).toBeLessThan(0.9 * (solutions[0]?.askedPeakSpeed ?? NaN))
  })

  it('tells which strokes lie past pinch-off, and strokes in twelve digits', async () => {
    const solutions = await solutionsFor(usual, OPTIONS)
    expect(solutions.map(({ stroke }) => stroke)).toContain(0.075)
    for (const { pinchedOff, formationNumber, strokeRatio, stroke } of solutions) {
      expect(pinchedOff).toBe(strokeRatio > (formationNumber ?? NaN))
      expect(stroke).toBe(Number(stroke.toPrecision(12)))
    }
    expect(new Set(solutions.map(({ pinchedOff }) => pinchedOff))).toEqual(new Set([true, false]))
  })
})
