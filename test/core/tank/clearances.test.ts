import { describe, expect, it } from 'vitest'
import { tubeSlowing } from '../../../core/coaxial'
import { thinRingSpeed } from '../../../core/ring'
import { clearances, tankWalls, type ClearanceInput } from '../../../core/tank'
import { expectClose } from '../../support/close'
import { NO_TANK } from './sections'

const RING = { circulation: 1, radius: 1, speed: thinRingSpeed(1, 1, 0.1), largestRadius: 1 }

const walls = (tank: object, nozzleDepth: number | null = null) =>
  tankWalls({ tank: { ...NO_TANK, ...tank }, nozzleDepth }, 1.5)

function rows(parts: Partial<ClearanceInput>) {
  const all = clearances({
    walls: walls({}),
    exitDiameter: 1.5,
    practice: 8,
    ring: RING,
    lastStation: null,
    ...parts,
  })
  return Object.fromEntries(all.map((row) => [row.wall, row]))
}

describe('clearances', () => {
  it('are told for the walls that are told', () => {
    expect(Object.keys(rows({}))).toEqual([])
    expect(Object.keys(rows({ walls: walls({ width: 30 }) }))).toEqual(['side wall'])
    expect(Object.keys(rows({ walls: walls({ width: 30, depth: 20, length: 100 }) }))).toEqual([
      'side wall',
      'surface',
      'floor',
      'far wall',
    ])
    expect(Object.keys(rows({ walls: walls({ bore: 30 }) }))).toEqual(['tank wall'])
    expect(Object.keys(rows({ walls: walls({}, 9) }))).toEqual(['surface'])
  })

  it('count from the axis, and to the far wall from the last station', () => {
    const told = rows({ walls: walls({ width: 30, depth: 20, length: 100 }, 8), lastStation: 40 })
    expect(told['side wall']).toMatchObject({ distance: 15, overDiameter: 10, overRadius: 15, ok: true })
    expect(told['surface']).toMatchObject({ distance: 8, ok: false })
    expect(told['surface']?.text).toMatch(/5\.33 exit diameters from the axis, less than the 8 of common practice/)
    expect(told['floor']).toMatchObject({ distance: 12, overDiameter: 8, ok: true })
    expect(told['far wall']).toMatchObject({ distance: 60, overDiameter: 40 })
  })

  it('cost what one mirror image costs: as a dipole, Gamma R^2 / (4 (2 d)^3), far away', () => {
    const { surface, 'far wall': end } = rows({ walls: walls({ length: 60 }, 60) })
    // The size of the ring enters by (R / 2 d)^2, 1e-4 here, with a factor of about 3.
    const dipole = 1 / (4 * 120 ** 3)
    expectClose(surface?.costPercent ?? NaN, (-100 * dipole) / RING.speed, 5e-4)
    // On its own axis a dipole moves fluid twice as fast; the image is of opposite sense.
    expectClose(end?.costPercent ?? NaN, (-200 * dipole) / RING.speed, 1e-3)
  })

  it('of a round tank cost the whole of it', () => {
    const told = rows({ walls: walls({ bore: 10 }) })['tank wall']
    expectClose(told?.costPercent ?? NaN, (100 * tubeSlowing(1, 1, 5)) / RING.speed, 1e-12)
    expectClose(told?.costPercent ?? NaN, -0.99, 5e-3)
  })

  it('warn where the rim comes within a radius of a wall', () => {
    // The ring grows to 1.6 on its way: its rim comes to 1.4 of a wall 3 away.
    const grown = { ...RING, largestRadius: 1.6 }
    expect(rows({ walls: walls({}, 3), ring: grown })['surface']).toMatchObject({ wallInteraction: true })
    expect(rows({ walls: walls({}, 3) })['surface']).toMatchObject({ wallInteraction: false })
    expect(rows({ walls: walls({ length: 41.5 }), ring: grown, lastStation: 40 })['far wall']).toMatchObject({
      wallInteraction: true,
      text: expect.stringMatching(/sheds vorticity of its own and the ring rebounds/),
    })
  })

  it('have no cost without a ring', () => {
    expect(rows({ walls: walls({ width: 30 }), ring: null })['side wall']).toMatchObject({
      costPercent: null,
      overRadius: null,
      overDiameter: 10,
    })
  })
})
