import { describe, expect, it } from 'vitest'
import { typescriptKernel } from '../../../core/kernel'
import { computePulse, type PulseInput } from '../../../core/pulse'
import { planTankRun, type TankRunInput, type TankRunSection } from '../../../core/tank'
import { expectClose } from '../../support/close'
import { PLAIN } from '../pulse/plans'
import { DRIVE, NO_TANK, section } from './sections'

const OPTIONS = { kernel: typescriptKernel }
/** A gentle pulse: ring Reynolds number 2000. */
const GENTLE: PulseInput = { ...PLAIN, programme: { ...PLAIN.programme, peakSpeed: 0.1 } }

function given(parts: Partial<TankRunSection> = {}, more: Partial<TankRunInput> = {}): TankRunInput {
  return { section: section(parts), pulse: GENTLE, ageing: 'auto', water: 'fresh', ...more }
}

const matrix = {
  fields: [{ path: 'programme.stroke', values: [0.03, 0.04] }],
  kind: 'grid',
  samples: null,
  repeats: 3,
  seed: 1,
  blocks: [],
  minutesPerRun: 2,
  minutesPerSetUp: 0,
} as const

describe('a tank run', () => {
  it('gathers everything under the names of the summary', async () => {
    const tank = { ...NO_TANK, length: 1, width: 0.4, depth: 0.4 }
    const result = await planTankRun(given({ tank, matrix, target: { kind: 'circulation', value: 0.003 } }), OPTIONS)
    expect(result.status).toBe('done')
    expect(result.arrivals.map(({ station }) => station)).toEqual([0.1, 0.3])
    expect(result.pairInterval).toBe(result.imaging.pairInterval)
    expect(result.frameRate).toBe(result.imaging.frameRate)
    expect(result.storage).toBe(result.imaging.storage)
    expect(result.settlingTime).toBeGreaterThanOrEqual(180)
    expect(result.clearances.map(({ wall }) => wall)).toEqual(['side wall', 'surface', 'floor', 'far wall'])
    expect(result.solutions.length).toBeGreaterThan(10)
    expect(result.matrix?.storage).toBe(6 * (result.storage ?? NaN))
    expectClose(result.matrix?.time.total ?? NaN, 6 * result.settlingTime, 1e-12)
    expect(result.triggers.some(({ device }) => device === 'pair at 0.3 m')).toBe(true)
    // Walls hold the ring back, by less than a per cent here.
    expect(result.wallShare).toBeLessThan(0)
    expect(result.wallShare).toBeGreaterThan(-0.01)
  })

  it('takes a pulse that was computed before, and gives the same', async () => {
    const fresh = await planTankRun(given(), OPTIONS)
    const again = await planTankRun(given({}, { computed: computePulse(GENTLE) }), OPTIONS)
    expect(JSON.stringify(again)).toBe(JSON.stringify(fresh))
  })

  it('times the camera by the rings of the whole range', async () => {
    const { imaging, rings, arrivals } = await planTankRun(given(), OPTIONS)
    expect(rings.map(({ basis }) => basis)).toEqual(['adopted', 'quick start'])
    const fastest = Math.max(...arrivals.map(({ speedHigh }) => speedHigh ?? NaN))
    expect(imaging.largestSpeed ?? NaN).toBeGreaterThan(fastest)
  })

  it('stands without stations, tank, camera scale and ring', async () => {
    const bare = await planTankRun(given({ stations: [], camera: { ...section().camera, scale: null } }), OPTIONS)
    expect(bare).toMatchObject({
      status: 'done',
      arrivals: [],
      pairInterval: null,
      clearances: [],
      solutions: [],
      matrix: null,
    })
    expect(bare.path?.time.length ?? 0).toBeGreaterThan(50)
    const ringless = await planTankRun(given({}, { pulse: { ...GENTLE, axialFlow: -0.09 } }), OPTIONS)
    expect(ringless).toMatchObject({ status: 'done', path: null, rings: [], frameRate: null, storage: null })
  })

  it('says that a target keeps what the computed jet adds at the plan s own stroke', async () => {
    const jet = {
      formationNumber: 4,
      formationNumberLow: 3.8,
      formationNumberHigh: 4.2,
      circulationBeyondSlug: 5e-4,
      impulseBeyondSlug: 1e-4,
      energyBeyondSlug: 0,
    }
    const pulse: PulseInput = { ...GENTLE, overPressure: 'computed', jet }
    const target = { kind: 'circulation', value: 0.003 } as const
    const told = /keep what the computed jet adds/
    expect((await planTankRun(given({ target }, { pulse }), OPTIONS)).notes.join(' ')).toMatch(told)
    expect((await planTankRun(given({}, { pulse }), OPTIONS)).notes.join(' ')).not.toMatch(told)
  })

  it('keeps what was finished when cancelled', async () => {
    const signal = { aborted: false }
    const result = await planTankRun(given({ target: { kind: 'circulation', value: 0.003 } }), {
      ...OPTIONS,
      signal,
      onProgress: ({ share }) => (signal.aborted = share > 0.5),
    })
    expect(result.status).toBe('cancelled')
    expect(result.arrivals.every(({ time }) => time !== null)).toBe(true)
    expect(result.solutions.length).toBeGreaterThan(0)
    expect(result.solutions.length).toBeLessThan(16)
  })

  it('reports progress that rises to the end', async () => {
    const shares: number[] = []
    await planTankRun(given({ target: { kind: 'reynolds', value: 2000 } }), {
      ...OPTIONS,
      onProgress: ({ share }) => shares.push(share),
    })
    expect(shares).toEqual(shares.toSorted((a, b) => a - b))
    expectClose(shares.at(-1) ?? NaN, 1, 1e-12)
  })

  it('refuses with the plan path of what is wrong', async () => {
    const refused = (parts: Partial<TankRunSection>): Promise<unknown> => planTankRun(given(parts), OPTIONS)
    const table: readonly (readonly [Partial<TankRunSection>, string])[] = [
      [{ tank: { ...NO_TANK, width: 0.001 } }, 'tankRun.tank.width'],
      [{ tank: { ...NO_TANK, depth: 0.3 }, nozzleDepth: 0.4 }, 'tankRun.nozzleDepth'],
      [{ stations: [0] }, 'tankRun.stations.0'],
      [{ controllerStep: 0 }, 'tankRun.controllerStep'],
      [{ drive: { ...DRIVE, maxJerk: -1 } }, 'tankRun.drive.maxJerk'],
      [{ target: { kind: 'reynolds', value: 0 } }, 'tankRun.target.reynolds'],
      [{ camera: { ...section().camera, window: 1 } }, 'tankRun.camera.window'],
      [{ trigger: { camera: NaN, laser: 0 } }, 'tankRun.trigger.camera'],
      [{ practice: { ...section().practice, settlingMinutes: -1 } }, 'tankRun.practice.settlingMinutes'],
      [{ matrix: { ...matrix, repeats: 0 } }, 'tankRun.matrix.repeats'],
    ]
    for (const [parts, field] of table) await expect(refused(parts), field).rejects.toMatchObject({ field })
  })
})
