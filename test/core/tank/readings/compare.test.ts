import { describe, expect, it } from 'vitest'
import { at } from '../../../../core/base'
import { typescriptKernel } from '../../../../core/kernel'
import { READINGS_DEFAULTS } from '../../../../core/plan'
import { computePulse, type PulseInput } from '../../../../core/pulse'
import {
  compareReadings,
  forceLog,
  programmeOfLog,
  tankArrivals,
  tankWalls,
  type FieldResult,
  type ReadingsInput,
  type ReadingsSection,
} from '../../../../core/tank'
import { predictedRings } from '../../../../core/tank/readings/predicted'
import { ringAt } from '../../../../core/tank/readings/pathModel'
import { verdictOf } from '../../../../core/tank/readings/verdict'
import { expectClose, expectNear } from '../../../support/close'
import { PLAIN } from '../../pulse/plans'
import { NO_TANK } from '../sections'
import { madeRows, NO_ROW } from './made'

const SLOW: PulseInput = { ...PLAIN, programme: { ...PLAIN.programme, shape: 'half-sine', peakSpeed: 0.1 } }
const FAST: PulseInput = { ...PLAIN, programme: { ...PLAIN.programme, shape: 'half-sine', peakSpeed: 1 } }
const WATER = {
  kind: 'fresh' as const,
  temperatureCelsius: 20,
  salinity: 35,
  depth: 0,
  atmosphericPressure: 101325,
  density: null,
  kinematicViscosity: null,
  vapourPressure: null,
}

function input(section: Partial<ReadingsSection>, parts: Partial<ReadingsInput> = {}): ReadingsInput {
  return {
    section: { ...READINGS_DEFAULTS, ...section },
    pulse: SLOW,
    ageing: 'auto',
    walls: null,
    water: WATER,
    train: null,
    meanThrust: null,
    leak: 0,
    fields: null,
    ...parts,
  }
}

const ringsOf = (pulse: PulseInput) =>
  predictedRings(
    {
      pulse,
      ageing: 'auto',
      walls: tankWalls({ tank: NO_TANK, nozzleDepth: null }, 0.02),
      seen: null,
      period: null,
      meanForce: null,
    },
    computePulse(pulse),
  )

/** Readings of the planned ring with another circulation. */
function rowsOf(pulse: PulseInput, share: number, run = '1', seed = 1, sigma = 2e-4) {
  const { start, around } = at(ringsOf(pulse), 0)
  const from = start.time
  const way = 0.3 / ringAt(start, around, from).speed
  return madeRows({ ...start, circulation: share * start.circulation }, around, {
    from,
    to: from + way,
    count: 40,
    noise: { x: sigma, radius: sigma },
    seed,
    run,
  })
}

describe('the model of a fit', () => {
  it.each([
    ['laminar, far from walls', SLOW, {}],
    ['laminar, in a square tank', SLOW, { width: 0.2, depth: 0.2 }],
    ['turbulent, in a round tank', FAST, { bore: 0.3 }],
  ])('moves the ring as the march to the stations does: %s', async (_name, pulse, tank) => {
    const walls = tankWalls({ tank: { ...NO_TANK, ...tank }, nozzleDepth: null }, pulse.nozzle.diameter)
    const computed = computePulse(pulse)
    const stations = [0.1, 0.2, 0.3]
    const { arrivals } = await tankArrivals(
      { ...pulse, pulse: computed, ageing: 'auto', walls, stations },
      { kernel: typescriptKernel },
    )
    const { start, around } = at(
      predictedRings({ pulse, ageing: 'auto', walls, seen: null, period: null, meanForce: null }, computed),
      0,
    )
    for (const { station, time, radius, speed } of arrivals) {
      const ring = ringAt(start, around, time ?? NaN)
      // Far from walls both integrate one law, to 1e-6 a step; walls enter by their slowing at birth, good to the next order.
      const tolerance = walls.kind === 'round' ? 2e-4 : 2e-6
      expectClose(ring.x, station, tolerance)
      expectClose(ring.radius, radius ?? NaN, tolerance)
      expectClose(ring.speed, speed ?? NaN, 10 * tolerance)
    }
  })
})

describe('readings against the prediction', () => {
  it('of the planned ring lie inside its band, and the ring comes back', () => {
    const result = compareReadings(input({ rows: rowsOf(SLOW, 1), fit: ['circulation', 'startPosition', 'radius'] }))
    expect(result.status).toBe('done')
    expect(result.fitted).toEqual(['circulation', 'startPosition', 'radius'])
    const { start } = at(ringsOf(SLOW), 0)
    expectNear(
      result.fit.circulation?.value ?? NaN,
      start.circulation,
      3 * (result.fit.circulation?.standardError ?? 0),
    )
    expect(result.verdicts.map(({ quantity, state }) => [quantity, state])).toEqual(
      expect.arrayContaining([['speed', expect.stringMatching(/inside|touching/)]]),
    )
    expect(result.rows).toBe(40)
    expect(result.residualRms ?? NaN).toBeLessThan(3e-4)
    expect(result.paths.map(({ basis }) => basis)).toContain('fit')
  })

  it('outside it are told by how much, and what would explain it', () => {
    const { verdicts } = compareReadings(input({ rows: rowsOf(SLOW, 0.92), fit: ['circulation', 'startPosition'] }))
    const circulation = verdicts.find(({ quantity }) => quantity === 'circulation')
    expect(circulation?.state).toBe('outside')
    expectNear(circulation?.outsideShare ?? NaN, -0.08, 0.01)
    const stroke = circulation?.explanations.find(({ cause }) => cause === 'stroke')
    // Slug circulation goes as the square of the speed, so that 8 % are 4 % of the stroke.
    expectNear(stroke?.change ?? NaN, Math.sqrt(0.92) - 1, 0.003)
    expectNear(
      circulation?.explanations.find(({ cause }) => cause === 'leak')?.change ?? NaN,
      1 - Math.sqrt(0.92),
      0.003,
    )
    expect(circulation?.text).toMatch(
      /^Circulation .* lies \d\.\d % below the predict.*It would be explained by .*a (leak|stroke)/,
    )
    console.info(verdicts.map(({ text }) => text).join('\n'))
  })

  it('take the calibration in: time, offset and scale', () => {
    const rows = rowsOf(SLOW, 1)
    const raw = rows.map((row) => ({
      ...row,
      time: row.time - 0.4,
      x: row.x === null ? null : (row.x - 0.01) / 1e-4,
      radius: row.radius === null ? null : row.radius / 1e-4,
      sigmaX: row.sigmaX === null ? null : row.sigmaX / 1e-4,
      sigmaRadius: row.sigmaRadius === null ? null : row.sigmaRadius / 1e-4,
    }))
    const calibration = { timeOffset: 0.4, lengthOffset: 0.01, lengthScale: 1e-4 }
    const fit = ['circulation', 'startPosition'] as const
    const [plain, scaled] = [
      compareReadings(input({ rows, fit })),
      compareReadings(input({ rows: raw, fit, calibration })),
    ]
    // The same numbers but for rounding, through a fit that stops at 1e-10 of its sum.
    expectClose(scaled.fit.circulation?.value ?? NaN, plain.fit.circulation?.value ?? NaN, 1e-7)
    expectClose(scaled.fit.startPosition?.standardError ?? NaN, plain.fit.startPosition?.standardError ?? NaN, 1e-5)
  })

  it('of several runs give each, the mean and the scatter', () => {
    const shares = [0.95, 1, 1.05, 1.02]
    const rows = shares.flatMap((share, k) => rowsOf(SLOW, share, `run ${k}`, k + 1))
    const { perRun, repeats, notes } = compareReadings(input({ rows, fit: ['circulation', 'startPosition'] }))
    expect(perRun.map(({ run, rows: own }) => [run, own])).toEqual(shares.map((_, k) => [`run ${k}`, 40]))
    const { start } = at(ringsOf(SLOW), 0)
    expectClose(repeats.circulation?.mean ?? NaN, start.circulation * 1.005, 0.005)
    // Standard deviation of the shares: 0.0420.
    expectClose(repeats.circulation?.standardDeviation ?? NaN, 0.042 * start.circulation, 0.1)
    expect(notes.join(' ')).toMatch(/circulation changes from run to run by .* times its error within a run/)
  })

  it('mark outliers and keep them', () => {
    const rows = rowsOf(SLOW, 1).map((row, k) => (k === 20 && row.x !== null ? { ...row, x: row.x + 0.003 } : row))
    const { residuals, notes, rows: used } = compareReadings(input({ rows, fit: ['circulation', 'startPosition'] }))
    expect(residuals.filter(({ outlier }) => outlier).map(({ row }) => row)).toContain(20)
    expect(used).toBe(40)
    expect(notes.join(' ')).toMatch(/marked, not dropped/)
  })

  it('tell which parameters the data cannot carry', () => {
    const fit = ['circulation', 'startTime', 'startPosition', 'radius', 'coreRadius'] as const
    const placesOnly = rowsOf(SLOW, 1).map((row) => ({ ...row, radius: null, sigmaRadius: null }))
    const long = compareReadings(input({ rows: placesOnly, fit }))
    expect(long.fitted).toEqual(['circulation', 'startTime', 'startPosition'])
    expect(long.held.find(({ name }) => name === 'radius')?.reason).toMatch(/places alone tell circulation over radius/)
    // a0^2 - 4 nu t0 is all that places tell of the two.
    expect(long.held.find(({ name }) => name === 'coreRadius')?.reason).toMatch(/cannot tell it from the other/)
    expect(long.notes.join(' ')).toMatch(/Start position and start time are hardly told apart: correlation/)

    const rough = rowsOf(SLOW, 1, '1', 1, 1e-3).map((row) => ({ ...row, radius: null, sigmaRadius: null }))
    const short = compareReadings(input({ rows: rough.slice(0, 10), fit }))
    // A start cannot be told from one tenth of a way: the place is the plan's, and the time is fitted.
    expect(short.fitted).toEqual(['circulation', 'startTime'])
    expect(short.held.find(({ name }) => name === 'startPosition')?.reason).toMatch(
      /held at the planned one, in every run alike/,
    )

    const turbulent = rowsOf(FAST, 1).map((row) => ({ ...row, radius: null, sigmaRadius: null }))
    const { held, notes } = compareReadings(input({ rows: turbulent, fit }, { pulse: FAST }))
    expect(held.find(({ name }) => name === 'coreRadius')?.reason).toMatch(/only by a long laminar record/)
    expect(notes.join(' ')).toMatch(/what the thin-core law needs for the speed that was seen, at the planned radius/)
  })

  it('before the ring has formed are left out, and nothing is fitted where none are left', () => {
    const rows = rowsOf(SLOW, 1).map((row) => ({ ...row, time: row.time - 10 }))
    const { status, message } = compareReadings(input({ rows }))
    expect(status).toBe('failed')
    expect(message).toMatch(/40 of 40 rows lie before the ring has formed: check the time offset/)
  })

  it('of one place at one time tell nothing, in every run and in all, and say why', () => {
    const rows = ['a', 'a', 'b', 'b'].map((run) => ({ ...NO_ROW, run, time: 2, x: 0.1 }))
    for (const fit of [['circulation', 'startTime', 'startPosition'], ['startPosition'], ['circulation']] as const) {
      const result = compareReadings(input({ rows, fit }))
      expect(result.status).toBe('failed')
      expect(result.message).toBe('Nothing can be fitted to 4 readings, all of one moment.')
      expect(result.fit).toEqual({})
      expect(result.held.map(({ name }) => name).toSorted()).toEqual([...fit].toSorted())
      for (const { reason } of result.held) expect(reason).toMatch(/at the same time/)
      expect(result.perRun.map(({ run, status }) => [run, status])).toEqual([
        ['a', 'failed'],
        ['b', 'failed'],
      ])
    }
  })

  it('of several places at one time tell where the ring started, not how fast it is', () => {
    const rows = [0.1, 0.11, 0.12, 0.13].map((x) => ({ ...NO_ROW, time: 2, x }))
    const result = compareReadings(input({ rows, fit: ['circulation', 'startPosition'] }))
    expect(result.status).toBe('done')
    expect(result.fitted).toEqual(['startPosition'])
    expect(result.held[0]?.reason).toMatch(/every place was read at the same time, and a speed needs two times/)
    // Standard error of the mean of four: sqrt(5/3) cm / 2.
    expectClose(result.fit.startPosition?.standardError ?? NaN, 0.01 * Math.sqrt(5 / 12), 1e-6)
  })

  it('that lie outside the band by less than their 95 % interval are at its edge', () => {
    const told = (value: number, low: number): string =>
      verdictOf('speed', { value, standardError: 0.001 }, { value: 0.1, low, high: 0.1 }, []).text
    expect(told(0.1001, 0.08)).toMatch(
      /lies at the edge of the band: 0\.1 % above the predicted band.*reaches into it\.$/,
    )
    expect(told(0.1001, 0.1)).toMatch(/lies 0\.1 % above the prediction, .* and its 95 % interval reaches it\.$/)
    expect(told(0.103, 0.08)).toMatch(/lies 3\.0 % above the predicted band/)
  })

  it('are fitted under both laws where the ring Reynolds number leaves them open', () => {
    const between: PulseInput = { ...PLAIN, programme: { ...PLAIN.programme, peakSpeed: 0.3 } }
    const { laws, notes } = compareReadings(
      input({ rows: rowsOf(between, 1), fit: ['circulation', 'startPosition'] }, { pulse: between }),
    )
    expect(laws.map(({ ageing }) => ageing)).toEqual(['laminar', 'turbulent'])
    expect(notes.join(' ')).toMatch(/leaves laminar and turbulent ageing open/)
    expect(notes.join(' ')).toMatch(
      /Under the turbulent law the circulation is fitted as [\d.]+\scm²\/s \(standard error .*\), and the places lie [\d.]+\smm RMS off it/,
    )
  })

  it('without any say nothing, and refuse nothing', () => {
    expect(compareReadings(input({}))).toMatchObject({ status: 'done', rows: 0, force: null, verdicts: [], fit: {} })
  })
})

describe('logs and fields in the comparison', () => {
  it('the piston as it really moved gives the prediction', () => {
    const duration = computePulse(SLOW).duration
    const piston = Array.from({ length: 200 }, (_, k) => {
      const time = (duration * k) / 199
      // The exit of the plain nozzle moves 4 times as far as its piston; 95 % of the planned way.
      return { time, position: (0.95 * 0.04 * (1 - Math.cos((Math.PI * time) / duration))) / 2 / 4 }
    })
    const { asRun, prediction, notes } = compareReadings(input({ piston }))
    expect(asRun?.ok).toBe(true)
    if (asRun?.ok !== true) return
    expectClose(asRun.programme.stroke, 0.038, 1e-9)
    expectClose(prediction.circulation?.value ?? NaN, (computePulse(SLOW).ring?.circulation ?? NaN) * 0.95 ** 2, 1e-3)
    expect(notes.join(' ')).toMatch(/as it really moved/)
  })

  it.each([
    [[{ time: 0, position: 0 }], /at least 3 rows/],
    [[0, 1, 2, 3].map((time) => ({ time, position: time === 2 ? 0.5 : time })), /goes back by more than 1 %/],
    [[0, 1, 2].map((time) => ({ time, speed: 0 })), /never moves/],
  ])('a piston log that is no stroke is refused in a sentence', (rows, why) => {
    const made = programmeOfLog(rows, SLOW.nozzle)
    expect(made.ok ? '' : made.message).toMatch(why)
  })

  it('steps back that are noise are held, a leak is taken off, long logs are thinned', () => {
    const rows = Array.from({ length: 5000 }, (_, k) => ({
      time: k / 5000,
      position: 0.01 * (k / 5000) + (k % 2) * 1e-5,
    }))
    const made = programmeOfLog(rows, SLOW.nozzle, { leak: 0.1 })
    if (!made.ok) throw new Error(made.message)
    expect(made.programme.rows.length).toBeLessThanOrEqual(2000)
    // Means of three rows at the ends: a part in a thousand of the way.
    expectClose(made.programme.stroke, 0.01 * 4 * 0.9, 0.002)
    expect(made.notes.join(' ')).toMatch(/thinned.*leak of 10 % taken off/)
  })

  it('force and fields have their verdicts', () => {
    const { total, duration } = computePulse(SLOW)
    const period = 2 * duration
    const mean = (0.9 * total.impulse) / period
    const time = Array.from({ length: 4001 }, (_, k) => (k / 4000) * 4 * period)
    const force = time.map((t) =>
      t % period < duration ? mean * Math.PI * Math.sin((Math.PI * (t % period)) / duration) : 0,
    )
    const fields: FieldResult = {
      frames: [],
      pinchOff: null,
      ring: null,
      formationNumber: { value: 3.9, standardError: 0.1 },
      notes: [],
    }
    const { verdicts, force: found } = compareReadings(
      input({ force: forceLog(time, force) }, { train: { period, pulses: 4 }, fields }),
    )
    expectClose(found?.mean ?? NaN, mean, 1e-3)
    expectClose(found?.lossFactor?.value ?? NaN, 0.9, 1e-3)
    expect(verdicts.map(({ quantity }) => quantity)).toEqual(['formationNumber', 'meanForce'])
    expect(verdicts.find(({ quantity }) => quantity === 'meanForce')?.text).toMatch(/10\.0 % below the predict/)
  })
})
