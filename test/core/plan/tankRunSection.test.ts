import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  decodePlan,
  numberAt,
  planDocument,
  setChoice,
  setField,
  setTankRun,
  TANK_RUN_DEFAULTS,
  validatePlan,
} from '../../../core/plan'
import { documentOf, planOf } from '../../support/plans'

function refusals(tankRun: unknown): string {
  const reading = decodePlan(documentOf({ tankRun }))
  return reading.ok ? '' : reading.problems.map(({ message }) => message).join('\n')
}

describe('the section tankRun', () => {
  it('is null where a plan has none, and is not written', () => {
    expect(planOf().tankRun).toBeNull()
    expect(planDocument(planOf())['tankRun']).toBeUndefined()
  })

  it('has common practice where it says nothing', () => {
    expect(planOf({ tankRun: {} }).tankRun).toEqual(TANK_RUN_DEFAULTS)
    expect(TANK_RUN_DEFAULTS).toMatchObject({
      controllerStep: 0.001,
      camera: { window: 32, refraction: true, bytesPerPixel: 1, wavelength: 532e-9 },
      practice: { settlingMinutes: 3, clearance: 8, impulsiveStart: 0.1, particlesPerWindow: 8 },
      matrix: null,
    })
    expect(planOf({ tankRun: { matrix: {} } }).tankRun?.matrix).toMatchObject({
      kind: 'grid',
      repeats: 3,
      minutesPerRun: 6,
      minutesPerSetUp: 15,
    })
  })

  it('keeps minutes as minutes and reads a text of another unit of time into them', () => {
    const plan = planOf({
      tankRun: { practice: { settlingMinutes: '5 min' }, matrix: { minutesPerRun: '1.5 h', minutesPerSetUp: '30' } },
    })
    expect(plan.tankRun?.practice.settlingMinutes).toBe(5)
    expect(plan.tankRun?.matrix).toMatchObject({ minutesPerRun: 90, minutesPerSetUp: 30 })
    expect(refusals({ practice: { settlingMinutes: '5 mm' } })).toMatch(/settlingMinutes.*needs a time/)
  })

  it.each([
    [{ circulation: '100 cm²/s' }, { kind: 'circulation', value: 0.01 }],
    [{ reynolds: 5000 }, { kind: 'reynolds', value: 5000 }],
    [
      { speed: '10 cm/s', station: 0.2 },
      { kind: 'speed', value: 0.1, station: 0.2 },
    ],
  ])('takes %j as target', (target, held) => {
    const plan = planOf({ tankRun: { target } })
    expect(plan.tankRun?.target).toEqual(held)
    expect(planOf(planDocument(plan)).tankRun?.target).toEqual(held)
  })

  it.each([
    [{ tank: { width: 0 } }, /tankRun\.tank\.width must be above 0.m.*got 0.m/],
    [{ tank: { depth: 0.3 }, nozzleDepth: 0.3 }, /nozzleDepth must be less than the depth .* 0\.3 m, got 0\.3 m/],
    [{ stations: [0.1, -1] }, /tankRun\.stations\.1 must be above 0.m.*got -1.m/],
    [{ stations: [null] }, /tankRun\.stations\.0 must be a number in SI units or a text/],
    [{ target: {} }, /tankRun\.target must give one of circulation, reynolds and speed; it gives 0/],
    [{ target: { circulation: 1, reynolds: 2 } }, /it gives 2/],
    [{ target: { speed: 0.1 } }, /tankRun\.target\.station must be given/],
    [{ camera: { pixels: [10] } }, /tankRun\.camera\.pixels must be columns and rows/],
    [{ camera: { pixels: [10.5, 10] } }, /camera\.pixels\.0 must be a whole number between 1 and 100000, got 10\.5/],
    [{ camera: { window: 31.5 } }, /camera\.window must be a whole number between 4 and 1024, got 31\.5/],
    [{ camera: { pixels: [64, 40], window: 48 } }, /camera\.window must be at most .* 40 pixels, got 48/],
    [{ camera: { scale: '4 mm' } }, /camera\.scale: Image scale needs an image scale such as 12 px\/mm/],
    [
      { camera: { standOff: 0, waterPath: 0 } },
      /camera\.waterPath and tankRun\.camera\.standOff must not both be 0 m: the lens would lie in the light sheet/,
    ],
    [{ matrix: { kind: 'latin', samples: 5001 } }, /matrix\.samples must be .* between 1 and 5000, got 5001/],
    [{ camera: { refraction: 'no' } }, /camera\.refraction must be true or false/],
    [{ drive: { leak: 0.6 } }, /drive\.leak must be between 0 and 0\.5, got 0\.6/],
    [{ matrix: { kind: 'square' } }, /matrix\.kind must be one of grid, latin, got "square"/],
    [{ matrix: { fields: [{ path: 'nozzle.bore', values: [1] }] } }, /fields\.0\.path must be the dotted path/],
    [{ matrix: { fields: [{ path: 'nozzle.diameter', values: [] }] } }, /fields\.0\.values must be a list of at least/],
    [{ matrix: { fields: [{ path: 'nozzle.diameter', values: [50] }] } }, /values\.0 must be between .* got 50.m/],
    [
      { matrix: { fields: [{ path: 'nozzle.diameter', values: [0.02] }], blocks: ['programme.stroke'] } },
      /blocks\.0 must be the path of a field of the matrix, got "programme\.stroke"/,
    ],
    [{ matrix: { fields: [{ path: 'tankRun.matrix.seed', values: [1] }] } }, /fields\.0\.path must be the dotted path/],
    [
      { matrix: { repeats: 1000, fields: [{ path: 'nozzle.diameter', from: 0.01, to: 0.02, count: 6 }] } },
      /tankRun\.matrix\.fields must come to at most 5000 runs, got 6 combinations x 1000 repeats = 6000/,
    ],
    [
      { matrix: { kind: 'latin', samples: 1700, fields: [{ path: 'nozzle.diameter', values: [0.01, 0.02] }] } },
      /must come to at most 5000 runs, got 1700 combinations x 3 repeats = 5100/,
    ],
    [
      { matrix: { fields: [{ path: 'nozzle.diameter', values: [0.01, 0.02, 0.01] }] } },
      /fields\.0\.values\.2 must be a level of its own, got 0\.01 again/,
    ],
  ])('refuses %j with field, value and limit', (tankRun, message) => {
    expect(refusals(tankRun)).toMatch(message)
  })

  it('takes a lens on the window, a sheet on it, and both at 0 where refraction is left out', () => {
    for (const camera of [
      { standOff: 0, waterPath: 0.2 },
      { standOff: 0.2, waterPath: 0 },
      { standOff: 0, waterPath: 0, refraction: false },
    ])
      expect(refusals({ camera })).toBe('')
  })

  it('refuses a level that is past what a number can hold', () => {
    const text = JSON.stringify(
      documentOf({ tankRun: { matrix: { fields: [{ path: 'wake.duration', values: [7] }] } } }),
    )
    const reading = decodePlan(JSON.parse(text.replace('[7]', '[1e999]')))
    expect(reading.ok ? '' : reading.problems[0]?.message).toMatch(
      /values\.0 must be .* got a value that is not finite/,
    )
  })

  it('never throws, whatever JSON stands at any key of it', () => {
    const keys = [...Object.keys(TANK_RUN_DEFAULTS), 'matrix.fields', 'camera.pixels']
    fc.assert(
      fc.property(fc.jsonValue(), fc.constantFrom(...keys), (value, key) => {
        const [first = '', second] = key.split('.')
        const reading = decodePlan(
          documentOf({ tankRun: { [first]: second === undefined ? value : { [second]: value } } }),
        )
        return reading.ok || reading.problems.every(({ field, message }) => field !== '' && message.length > 10)
      }),
      { numRuns: 500 },
    )
  })

  it('is begun from its defaults by an edit, and its target takes the kind that is set', () => {
    const plan = setField(planOf(), 'tankRun.camera.window', 64)
    expect(plan.tankRun).toEqual({ ...TANK_RUN_DEFAULTS, camera: { ...TANK_RUN_DEFAULTS.camera, window: 64 } })
    const reynolds = setField(plan, 'tankRun.target.reynolds', 3000)
    expect(reynolds.tankRun?.target).toEqual({ kind: 'reynolds', value: 3000 })
    expect(numberAt(reynolds, 'tankRun.target.reynolds')).toBe(3000)
    expect(numberAt(reynolds, 'tankRun.target.circulation')).toBeNull()
    const speed = setChoice(setTankRun(reynolds, { stations: [0.25] }), 'tankRun.target.kind', 'speed')
    expect(speed.tankRun?.target).toMatchObject({ kind: 'speed', station: 0.25 })
    expect(setField(speed, 'tankRun.target.speed', null).tankRun?.target).toBeNull()
    expect(validatePlan(speed)).toEqual([])
    expect(planDocument(setTankRun(planOf({ tankRun: {} }), null))['tankRun']).toBeUndefined()
  })

  it('writes a target of another kind without the keys of the old one', () => {
    const plan = planOf({ tankRun: { target: { speed: 0.1, station: 0.2, why: 'overlay' } } })
    const changed = planDocument(setField(plan, 'tankRun.target.circulation', 0.02))
    expect(changed['tankRun']).toMatchObject({ target: { circulation: 0.02, why: 'overlay' } })
    expect(JSON.stringify(changed['tankRun'])).not.toContain('"station"')
  })
})
