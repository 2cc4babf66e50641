import { describe, expect, it } from 'vitest'
import { typescriptKernel } from '../../../core/kernel'
import { readProgrammeCsv, examplePlan, MATRIX_DEFAULTS, type Plan } from '../../../core/plan'
import { TANK_CAUTIONS } from '../../../core/plan/tankCautions'
import {
  arrivalsTable,
  profileReadFirst,
  profileTable,
  runMatrixTable,
  triggerTableText,
} from '../../../core/plan/tankTables'
import {
  integrateProfile,
  pistonProfile,
  planTankRun,
  type TankRunInput,
  type TankRunSection,
} from '../../../core/tank'
import { expectClose } from '../../support/close'
import { PLAIN } from '../pulse/plans'
import { CAMERA, DRIVE, NO_TANK, section } from '../tank/sections'

/** Fine enough for a core of 100 vectors, slow enough for laminar rings. */
const CALM = {
  tank: { ...NO_TANK, length: 2, width: 1, depth: 1 },
  stations: [0.04],
  camera: { ...CAMERA, scale: 400_000, aperture: 16, maxFrameRate: 1e6, refraction: false, pairs: 2000 },
  trigger: { camera: 0, laser: -0.1 },
}

function planned(parts: Partial<TankRunSection> = {}, more: Partial<TankRunInput> = {}) {
  // A diameter of stroke at 50 mm/s: ring Reynolds number 500 to 810, a thin core.
  const pulse = { ...PLAIN, programme: { ...PLAIN.programme, stroke: 0.02, peakSpeed: 0.05 } }
  return planTankRun(
    { section: section({ ...CALM, ...parts }), pulse, ageing: 'auto', water: 'fresh', ...more },
    { kernel: typescriptKernel },
  )
}

/** The plan about a run: its pulse is computed 0.2 m deep. */
function planOf(parts: Partial<TankRunSection> = {}): Plan {
  const { water } = examplePlan('tank-day')
  return { ...examplePlan('tank-day'), water: { ...water, depth: 0.2 }, tankRun: section({ ...CALM, ...parts }) }
}

const fast = { pulse: { ...PLAIN, programme: { ...PLAIN.programme, peakSpeed: 0.5 } } }

/** A run that fires each caution. */
const TRIGGERS: Readonly<Record<string, readonly [Partial<TankRunSection>, Partial<TankRunInput>?]>> = {
  'tank-near-walls': [{ tank: { ...NO_TANK, width: 0.2, depth: 1 } }],
  'tank-wall-interaction': [{ tank: { ...NO_TANK, width: 0.05, depth: 1 } }],
  'tank-arrivals': [{ stations: [0.001, 0.1] }],
  'tank-run-notes': [{ tank: NO_TANK }],
  'tank-ring-regime': [{}, fast],
  'tank-jet-regime': [{}, fast],
  'tank-not-impulsive': [
    {},
    { pulse: { ...PLAIN, programme: { ...PLAIN.programme, peakSpeed: 0.05, shape: 'half-sine' } } },
  ],
  'tank-settling': [{}],
  'tank-dye': [{}],
  'tank-drive-limits': [{ drive: { ...DRIVE, maxTravel: 0.001 } }],
  'tank-depth-differs': [{ nozzleDepth: 0.5 }],
  'tank-matrix-limits': [
    {
      drive: { ...DRIVE, maxSpeed: 0.1 },
      matrix: { ...MATRIX_DEFAULTS, fields: [{ path: 'programme.peakSpeed', values: [0.05, 5] }] },
    },
    {
      combined: ([peakSpeed = 0]) => ({
        section: section({ ...CALM, drive: { ...DRIVE, maxSpeed: 0.1 } }),
        pulse: { ...PLAIN, programme: { ...PLAIN.programme, peakSpeed } },
        ageing: 'auto',
      }),
    },
  ],
  'tank-rounding': [{ drive: { ...DRIVE, maxAcceleration: 0.05 } }],
  'tank-pair-interval': [{ camera: { ...CALM.camera, scale: 4000 } }],
  'tank-vectors': [{ camera: { ...CALM.camera, scale: 4000 } }],
  'tank-frame-rate': [{ camera: { ...CALM.camera, maxFrameRate: 1 } }],
  'tank-straddled-pairs': [{ camera: { ...CALM.camera, maxFrameRate: 100 } }],
  'tank-light-sheet': [{ camera: { ...CALM.camera, sheetThickness: 1e-7 } }],
  'tank-refraction': [{ camera: { ...CALM.camera, scale: 4000, refraction: true, windowThickness: 0.01 } }],
}

describe('cautions of the tank', () => {
  it.each(TANK_CAUTIONS.map(({ id }) => id))('%s fires on its trigger', async (id) => {
    const trigger = TRIGGERS[id]
    if (trigger === undefined) throw new Error(`no trigger is written down for ${id}`)
    const tankRun = await planned(...trigger)
    const text = TANK_CAUTIONS.find((one) => one.id === id)?.text({ plan: planOf(trigger[0]), tankRun }) ?? ''
    expect(text.length).toBeGreaterThan(30)
    expect(text).toMatch(/[.:]$/)
    expect(text).not.toMatch(/NaN|undefined|null|Infinity/)
  })

  it('are few for a calm run, none without one, and each is told once', async () => {
    const tankRun = await planned()
    const ids = TANK_CAUTIONS.filter(({ text }) => text({ plan: planOf(), tankRun }) !== null).map(({ id }) => id)
    expect(ids).toEqual(['tank-settling', 'tank-dye'])
    expect(TANK_CAUTIONS.every(({ text }) => text({ plan: planOf(), tankRun: null }) === null)).toBe(true)
    expect(new Set(TANK_CAUTIONS.map(({ id }) => id)).size).toBe(TANK_CAUTIONS.length)
  })

  it('say on every run sheet that dye does not mark vorticity', async () => {
    // Check L4: Maxworthy 1972.
    const tankRun = await planned()
    expect(TANK_CAUTIONS.find(({ id }) => id === 'tank-dye')?.text({ plan: planOf(), tankRun })).toMatch(
      /Dye does not mark vorticity/,
    )
  })
})

const PROFILE = pistonProfile({
  programme: { ...PLAIN.programme, shape: 'trapezoid', riseTime: 0.02, fallTime: 0.02 },
  nozzle: PLAIN.nozzle,
  controllerStep: 0.001,
  drive: { ...DRIVE, maxAcceleration: 8, maxTravel: 0.005, lag: 0.01 },
})

function cellsOf(csv: string): number[][] {
  return csv
    .trimEnd()
    .split('\r\n')
    .slice(1)
    .map((line) => line.split(',').map(Number))
}

describe('tables of the tank', () => {
  it('profile.csv holds the columns of the contract, and its rows integrate to the stroke', () => {
    const csv = profileTable(PROFILE)
    expect(csv.split('\r\n')[0]).toBe('time (s),piston position (m),piston speed (m/s),piston acceleration (m/s2)')
    const rows = cellsOf(csv)
    const column = (index: number): number[] => rows.map((row) => row[index] ?? NaN)
    const check = integrateProfile({ time: column(0), position: column(1), speed: column(2), acceleration: column(3) })
    // Exit area over piston area is 1/4.
    expectClose(check.travel, 0.01, 1e-9)
    expectClose(check.lastPosition, 0.01, 1e-12)
    expect(rows.every((row) => row.length === 4 && row.every(Number.isFinite))).toBe(true)
  })

  it('profile.csv can be read back as a programme', () => {
    const reading = readProgrammeCsv(profileTable({ ...PROFILE, time: PROFILE.time.map((t) => t + 0.01) }))
    expect(reading).toMatchObject({ ok: true })
  })

  it('the text beside it tells what moves, what is broken and every caution for a machine', () => {
    const cautions = [
      { id: 'machine-hands', group: 'machine' as const, text: 'Keep hands clear.', source: 'common practice' },
      { id: 'dye', group: 'laboratory' as const, text: 'Dyes: wear gloves.', source: 'common practice' },
    ]
    const text = profileReadFirst(PROFILE, cautions)
    expect(text).toMatch(/^READ FIRST: profile\.csv moves a machine\.\r\n/)
    expect(text).toMatch(/Travel 0\.01 m, highest speed 0\.125 m\/s/)
    expect(text).toMatch(/first row stands 0\.01 s before it/)
    expect(text).toMatch(/- BROKEN: Piston travel 0\.01 m is above the drive's 0\.005 m/)
    expect(text).toMatch(/- Keep hands clear\./)
    expect(text).not.toMatch(/gloves/)
  })

  it('run-matrix.csv holds run, block, repeat and the fields with their units', async () => {
    const { matrix } = await planned({
      matrix: {
        fields: [
          { path: 'programme.stroke', values: [0.03, 0.04] },
          { path: 'nozzle.axisRatio', values: [1, 2] },
        ],
        kind: 'grid',
        samples: null,
        repeats: 2,
        seed: 3,
        blocks: ['nozzle.axisRatio'],
        minutesPerRun: 6,
        minutesPerSetUp: 10,
      },
    })
    if (matrix === null) throw new Error('no matrix')
    const csv = runMatrixTable(matrix)
    expect(csv.split('\r\n')[0]).toBe('run,block,repeat,programme.stroke (m),nozzle.axisRatio')
    expect(cellsOf(csv)).toEqual(matrix.runs.map(({ run, block, repeat, values }) => [run, block, repeat, ...values]))
  })

  it('arrivals and triggers leave cells empty where there is nothing', async () => {
    const { arrivals, triggers } = await planned({ stations: [0.001, 0.1] })
    const lines = arrivalsTable(arrivals).split('\r\n')
    expect(lines[0]).toBe(
      'station (m),time (s),earliest (s),latest (s),speed (m/s),lowest speed (m/s),highest speed (m/s),radius (m),note',
    )
    expect(lines[1]).toMatch(/^0\.001,,,,,,,,.*still forming/)
    expect(triggerTableText(triggers).split('\r\n')[2]).toMatch(/^piston command,0,0,,,The profile is started\.$/)
  })
})
