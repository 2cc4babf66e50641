import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bracketedRoot } from '../../../core/base'
import {
  apparentPlace,
  depthOfField,
  imaging,
  pairInterval,
  paraxialPath,
  REFRACTIVE_INDEX,
  storageOf,
  waterOverAirScale,
  type ImagingInput,
  type WindowView,
} from '../../../core/tank'
import { expectClose, expectNear } from '../../support/close'
import { CAMERA } from './sections'

const RING = { time: 1, circulation: 0.01, radius: 0.014, coreRadius: 0.004, speed: 0.2 }

function given(parts: Partial<ImagingInput> = {}): ImagingInput {
  return {
    camera: CAMERA,
    stations: [0.1, 0.3],
    rings: [RING, { ...RING, time: 2, speed: 0.18, coreRadius: 0.005 }],
    exitSpeed: 0.3,
    water: 'fresh',
    particlesPerWindow: 8,
    ...parts,
  }
}

const camera = (parts: object): ImagingInput['camera'] => ({ ...CAMERA, ...parts })

describe('imaging', () => {
  it('takes a quarter of the window: 32 pixels at 4 pixels a millimetre and 1 m/s ask for 2 ms', () => {
    // Check L1: Keane & Adrian 1990, 8 pixels of 32.
    expectClose(pairInterval(32, 4000, 1), 0.002, 1e-15)
    const told = imaging(given({ rings: [{ ...RING, speed: 0.1, circulation: 1e-4 }], exitSpeed: 1 }))
    expectClose(told.pairInterval ?? NaN, 0.002, 1e-15)
    expect(told.largestSpeedOf).toBe('exit')
    expect(told.largestDisplacement).toBe(8)
  })

  it('takes the swirl at the edge of the thinnest core where that is faster than the jet', () => {
    const told = imaging(given())
    const swirl = 0.01 / (2 * Math.PI * 0.004)
    expectClose(told.largestSpeed ?? NaN, swirl + 0.2, 1e-14)
    expect(told.largestSpeedOf).toBe('core')
    expectClose(told.pairInterval ?? NaN, 8 / (4000 * (swirl + 0.2)), 1e-14)
  })

  it('judges gradient, vectors across the core and frame rates', () => {
    const told = imaging(given())
    const gradient = 0.01 / (2 * Math.PI * 0.004 ** 2)
    expectClose(told.gradient ?? NaN, gradient * (told.pairInterval ?? NaN), 1e-14)
    expect(told.gradientOk).toBe(false)
    expectClose(told.pairIntervalForGradient ?? NaN, 0.05 / gradient, 1e-14)
    // 2 x 4 mm of core over 8 mm of window.
    expectClose(told.vectorsAcrossCore ?? NaN, 1, 1e-14)
    expect(told.vectorsOk).toBe(false)
    const fine = imaging(given({ camera: camera({ scale: told.scaleForVectors }) }))
    expectClose(fine.vectorsAcrossCore ?? NaN, 8, 1e-14)
    expect(fine.vectorsOk).toBe(true)
    // Half a radius from pair to pair: 0.2 / 0.007 pairs a second, two frames each.
    expectClose(told.pairRate ?? NaN, 0.2 / 0.007, 1e-14)
    expectClose(told.frameRate ?? NaN, 0.4 / 0.007, 1e-14)
    expect(told.frameRateOk).toBe(true)
    expectClose((told.evenFrameRate ?? NaN) * (told.pairInterval ?? NaN), 1, 1e-14)
    expect(told.evenFrames).toBe(false)
    const slow = imaging(given({ camera: camera({ maxFrameRate: 50 }) }))
    expect(slow.frameRateOk).toBe(false)
    expect(imaging(given({ camera: camera({ maxFrameRate: null }) })).frameRateOk).toBeNull()
  })

  it('makes the field hold the stations where no scale is given', () => {
    const told = imaging(given({ camera: camera({ scale: null }) }))
    // 0.2 m between the stations and two radii at each end, along 1920 pixels.
    expectClose(told.scale ?? NaN, 1920 / (0.2 + 4 * 0.014), 1e-14)
    expectClose(told.fieldOfView?.[0] ?? NaN, 0.256, 1e-14)
    const bare = imaging(given({ camera: camera({ scale: null }), stations: [] }))
    expect(bare).toMatchObject({ scale: null, fieldOfView: null, windowSize: null, pairInterval: null, seeding: null })
    expect(bare.notes.map(({ text }) => text).join(' ')).toMatch(/needs a station and a ring/)
  })

  it('needs the pixel pitch for magnification and the aperture for depth of field, and says so', () => {
    const told = imaging(given())
    expectClose(told.magnification ?? NaN, 0.02, 1e-14)
    expectClose(told.depthOfField ?? NaN, 4 * 51 ** 2 * 16 * 532e-9, 1e-14)
    expectClose(depthOfField(1, 8, 532e-9), 4 * 4 * 64 * 532e-9, 1e-14)
    const blind = imaging(given({ camera: camera({ pixelPitch: null }) }))
    expect(blind).toMatchObject({ magnification: null, depthOfField: null, depthOfFieldOk: null })
    expect(blind.notes.find(({ item }) => item === 'magnification')?.text).toMatch(/pixel pitch/)
    const open = imaging(given({ camera: camera({ aperture: null }) }))
    expect(open.depthOfField).toBeNull()
    expect(open.notes.find(({ item }) => item === 'depth of field')?.text).toMatch(/aperture/)
  })

  it('sets the light sheet by the motion out of its plane, and seeds its windows', () => {
    const told = imaging(given())
    // Four times the displacement out of the plane, a tenth of the largest: 0.4 x 8 pixels.
    expectClose(told.sheetThickness ?? NaN, (0.4 * 8) / 4000, 1e-14)
    expect(told.sheetOk).toBe(true)
    expectClose(told.seeding ?? NaN, 8 / (0.008 ** 2 * 0.0008), 1e-14)
    expect(imaging(given({ camera: camera({ sheetThickness: 0.0005 }) })).sheetOk).toBe(false)
  })

  it('counts frames and bytes', () => {
    const told = imaging(given())
    expect(told.pairs).toBe(Math.ceil(0.2 / 0.007) + 2)
    expect(told.frames).toBe(2 * (told.pairs ?? NaN))
    expect(told.storage).toBe((told.frames ?? NaN) * 1920 * 1080)
    expect(storageOf(1000, [1024, 1024], 2)).toBe(2_097_152_000)
    expect(imaging(given({ camera: camera({ pairs: 50, bytesPerPixel: 2 }) })).storage).toBe(100 * 1920 * 1080 * 2)
  })

  it('has nothing to time without a ring', () => {
    const told = imaging(given({ rings: [] }))
    expect(told).toMatchObject({ pairInterval: null, frameRate: null, storage: null, gradient: null, pairs: null })
    expect(told.notes.map(({ text }) => text).join(' ')).toMatch(/need a ring/)
  })

  it('refuses a camera that cannot be, with the field', () => {
    const refused = (parts: object): unknown => {
      try {
        imaging(given({ camera: camera(parts) }))
      } catch (error) {
        return error
      }
      return null
    }
    expect(refused({ window: 2000 })).toMatchObject({ field: 'tankRun.camera.window' })
    expect(refused({ pixels: [1920, 0] })).toMatchObject({ field: 'tankRun.camera.pixels.1' })
    expect(refused({ scale: -1 })).toMatchObject({ field: 'tankRun.camera.scale' })
    expect(refused({ standOff: -0.1 })).toMatchObject({ field: 'tankRun.camera.standOff' })
    expect(refused({ bytesPerPixel: 0 })).toMatchObject({ field: 'tankRun.camera.bytesPerPixel' })
  })
})

describe('a flat window', () => {
  const VIEW: WindowView = {
    standOff: 0.4,
    glassThickness: 0.015,
    waterPath: 0.3,
    waterIndex: REFRACTIVE_INDEX.fresh,
    glassIndex: REFRACTIVE_INDEX.glass,
  }

  it('lets light take the way of least time (Fermat)', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.005, max: 0.6, noNaN: true }), (offset) => {
        const found = apparentPlace(offset, VIEW)
        if (found === null) throw new Error('not seen')
        // Where the ray meets both faces of the glass, by nested least times; slopes of the optical path are zero there.
        const { standOff, glassThickness, waterPath, waterIndex, glassIndex } = VIEW
        const pull = (across: number, along: number): number => across / Math.hypot(across, along)
        const first = (second: number): number =>
          bracketedRoot((y) => pull(y, standOff) - glassIndex * pull(second - y, glassThickness), 0, second) ?? NaN
        const second = bracketedRoot(
          (y) => glassIndex * pull(y - first(y), glassThickness) - waterIndex * pull(offset - y, waterPath),
          1e-12,
          offset,
        )
        expectClose(Math.tan(found.angle), first(second ?? NaN) / standOff, 1e-9)
      }),
    )
  })

  it('keeps the scale near its axis and widens it outside as the square of the angle', () => {
    const near = apparentPlace(1e-4, VIEW)
    expectNear((near?.scaleFactor ?? NaN) - 1, 0, 1e-7)
    const [one, two] = [0.005, 0.01].map((offset) => (apparentPlace(offset, VIEW)?.scaleFactor ?? NaN) - 1)
    // Next terms are of the fourth power: 1e-3 of the second at these angles.
    expectClose((two ?? NaN) / (one ?? NaN), 4, 2e-3)
    expect(one).toBeGreaterThan(0)
  })

  it('shows the sheet at three quarters of its depth and larger than in air', () => {
    expectClose(paraxialPath({ ...VIEW, standOff: 0, glassThickness: 0 }), 0.3 / 1.333, 1e-14)
    expectClose(waterOverAirScale({ ...VIEW, glassThickness: 0 }), 0.7 / (0.4 + 0.3 / 1.333), 1e-14)
    expectClose(waterOverAirScale({ ...VIEW, glassIndex: 1, waterIndex: 1 }), 1, 1e-14)
    expectClose(apparentPlace(0.2, { ...VIEW, glassIndex: 1, waterIndex: 1 })?.scaleFactor ?? NaN, 1, 1e-12)
  })

  it('hides what lies beyond total reflection from a lens on the window', () => {
    const onWindow = { ...VIEW, standOff: 0, glassThickness: 0 }
    // asin(1/1.333) = 48.6 degrees: 0.34 m at 0.3 m.
    expect(apparentPlace(0.33, onWindow)).not.toBeNull()
    expect(apparentPlace(0.35, onWindow)).toBeNull()
  })

  it('is told for the field of the camera, with the water it looks through', () => {
    const told = imaging(given()).refraction
    expect(told?.waterIndex).toBe(1.333)
    expect(imaging(given({ water: 'sea' })).refraction?.waterIndex).toBe(1.34)
    const corner = Math.hypot(1920, 1080) / 4000 / 2
    expectClose(told?.places.at(-1)?.offset ?? NaN, corner, 1e-12)
    expectClose(told?.cornerError ?? NaN, (told?.places.at(-1)?.scaleFactor ?? NaN) - 1, 1e-12)
    const glazed = imaging(given({ camera: camera({ windowThickness: 0.02 }) }))
    expect(glazed.notes.some(({ item }) => item === 'refraction')).toBe(false)
    expect(imaging(given({ camera: camera({ refraction: false }) })).refraction).toBeNull()
    const untold = imaging(given({ camera: camera({ standOff: null }) }))
    expect(untold.refraction).toBeNull()
    expect(untold.notes.find(({ item }) => item === 'refraction')?.text).toMatch(/from lens to window/)
  })
})
