/**
 * The camera's day: field, pair interval, frame rate, light sheet, seeding and storage for the rings that will come by.
 *
 * What depends on something that is not told is null, and a note says what is missing.
 */
import { at, requireRange } from '../base'
import {
  DISPLACEMENT_SHARE,
  FEWEST_VECTORS,
  LARGEST_GRADIENT,
  OUT_OF_PLANE_SHARE,
  STEP_OVER_RADIUS,
  depthOfField,
  pairInterval,
  seedingDensity,
  storageOf,
  thinnestSheet,
} from './imagingRules'
import { apparentPlace, paraxialPath, REFRACTIVE_INDEX, waterOverAirScale, type ApparentPlace } from './refraction'
import type { CameraInput } from './types'

/** A ring as the camera meets it. */
export interface RingSeen {
  readonly time: number
  readonly circulation: number
  readonly radius: number
  readonly coreRadius: number
  readonly speed: number
}

export interface ImagingInput {
  readonly camera: CameraInput
  readonly stations: readonly number[]
  /** Every ring of the range at every station, or at its birth where there is none. */
  readonly rings: readonly RingSeen[]
  /** Highest exit speed [m/s]. */
  readonly exitSpeed: number
  readonly water: 'fresh' | 'sea' | 'given'
  readonly particlesPerWindow: number
}

export interface ImagingNote {
  readonly item: string
  readonly text: string
}

export interface Refraction {
  readonly waterIndex: number
  /** Where the light sheet seems to lie behind the window [m]. */
  readonly apparentDepth: number
  /** Scale in water over that of a target photographed dry at the same place. */
  readonly waterOverAirScale: number
  /** From the middle of the field to its corner. */
  readonly places: readonly ApparentPlace[]
  /** Scale at the corner over the scale on the axis, less 1. */
  readonly cornerError: number | null
}

export interface Imaging {
  /** Pixels a metre, given or made to hold the stations. */
  readonly scale: number | null
  /** Along and across the jet [m]. */
  readonly fieldOfView: readonly [number, number] | null
  readonly magnification: number | null
  /** Side of an interrogation window [m]. */
  readonly windowSize: number | null
  /** Largest speed in the sheet [m/s]: the exit speed, or the swirl at the edge of the core with the speed of the ring. */
  readonly largestSpeed: number | null
  readonly largestSpeedOf: 'exit' | 'core' | null
  /** [s] */
  readonly pairInterval: number | null
  /** Largest displacement of a pair [pixels]. */
  readonly largestDisplacement: number
  /** Change of displacement across the core at that interval [pixels a pixel]. */
  readonly gradient: number | null
  readonly gradientOk: boolean | null
  /** Longest interval that keeps the gradient [s]. */
  readonly pairIntervalForGradient: number | null
  readonly vectorsAcrossCore: number | null
  readonly vectorsOk: boolean | null
  /** Scale at which the core holds enough vectors [pixels/m]. */
  readonly scaleForVectors: number | null
  /** Pairs a second so that the ring moves half its radius from one to the next. */
  readonly pairRate: number | null
  /** Frames a second, two a pair. */
  readonly frameRate: number | null
  readonly frameRateOk: boolean | null
  /** Frames a second of a camera that takes a pair as two frames of an even row: 1 / pair interval. */
  readonly evenFrameRate: number | null
  /** True: the camera is fast enough for that; false: pairs must straddle two frames. null: not told. */
  readonly evenFrames: boolean | null
  readonly sheetThickness: number | null
  /** Thinnest sheet for the motion out of its plane [m]. */
  readonly thinnestSheet: number | null
  readonly sheetOk: boolean | null
  readonly depthOfField: number | null
  readonly depthOfFieldOk: boolean | null
  readonly refraction: Refraction | null
  readonly pairs: number | null
  readonly frames: number | null
  /** Bytes of a run. */
  readonly storage: number | null
  /** Particles in a cubic metre. */
  readonly seeding: number | null
  readonly notes: readonly ImagingNote[]
}

/** Radii of the ring left free before the first and after the last station, and over the whole height. */
const FREE_RADII = 2
const HEIGHT_RADII = 4
/** Pairs before the first and after the last passage. */
const SPARE_PAIRS = 2
/** Places of the refraction table. */
const PLACES = 9

/** @throws {DomainError} on tankRun.camera… */
export function imaging(input: ImagingInput): Imaging {
  const { camera, rings } = input
  requireCamera(camera)
  const notes: ImagingNote[] = []
  const tell = (item: string, text: string): null => {
    notes.push({ item, text })
    return null
  }
  const scale = scaleOf(input, tell)
  const fieldOfView = scale === null ? null : ([camera.pixels[0] / scale, camera.pixels[1] / scale] as const)
  const magnification =
    camera.pixelPitch === null
      ? tell('magnification', 'Magnification and depth of field need the pixel pitch of the sensor.')
      : scale === null
        ? null
        : camera.pixelPitch * scale
  const windowSize = scale === null ? null : camera.window / scale
  if (rings.length === 0) tell('pair interval', 'Pair interval, frame rate and storage need a ring to look at.')
  const speeds = largestSpeeds(input)
  const interval = scale === null || speeds === null ? null : pairInterval(camera.window, scale, speeds.value)
  const core = coreOf(rings)
  const gradient = core === null || interval === null ? null : core.gradient * interval
  const vectorsAcrossCore = core === null || windowSize === null ? null : (2 * core.radius) / windowSize
  const rates = ratesOf(camera, rings, interval)
  const needed =
    speeds === null || interval === null ? null : thinnestSheet(OUT_OF_PLANE_SHARE * speeds.value, interval)
  const sheet = camera.sheetThickness ?? needed
  const depth = depthOf(camera, magnification, tell)
  const pairs = pairsOf(camera, rings, rates.pairRate)
  const frames = pairs === null ? null : 2 * pairs
  return {
    scale,
    fieldOfView,
    magnification,
    windowSize,
    largestSpeed: speeds?.value ?? null,
    largestSpeedOf: speeds?.of ?? null,
    pairInterval: interval,
    largestDisplacement: DISPLACEMENT_SHARE * camera.window,
    gradient,
    gradientOk: gradient === null ? null : gradient <= LARGEST_GRADIENT,
    pairIntervalForGradient: core === null ? null : LARGEST_GRADIENT / core.gradient,
    vectorsAcrossCore,
    vectorsOk: vectorsAcrossCore === null ? null : vectorsAcrossCore >= FEWEST_VECTORS,
    scaleForVectors: core === null ? null : (FEWEST_VECTORS * camera.window) / (2 * core.radius),
    ...rates,
    sheetThickness: sheet,
    thinnestSheet: needed,
    sheetOk: sheet === null || needed === null ? null : sheet >= needed,
    depthOfField: depth,
    depthOfFieldOk: depth === null || sheet === null ? null : depth >= sheet,
    refraction: refractionOf(input, fieldOfView, tell),
    pairs,
    frames,
    storage: frames === null ? null : storageOf(frames, camera.pixels, camera.bytesPerPixel),
    seeding: windowSize === null || sheet === null ? null : seedingDensity(input.particlesPerWindow, windowSize, sheet),
    notes,
  }
}

type Tell = (item: string, text: string) => null

function requireCamera(camera: CameraInput): void {
  const field = (key: string): string => `tankRun.camera.${key}`
  camera.pixels.forEach((count, i) => requireRange(field(`pixels.${i}`), count, { min: 1 }))
  requireRange(field('window'), camera.window, { min: 2, max: Math.min(...camera.pixels), unit: 'pixels' })
  requireRange(field('bytesPerPixel'), camera.bytesPerPixel, { above: 0 })
  requireRange(field('wavelength'), camera.wavelength, { above: 0, unit: 'm' })
  const above = {
    pixelPitch: 'm',
    scale: '1/m',
    maxFrameRate: '1/s',
    aperture: '',
    sheetThickness: 'm',
    pairs: '',
  } as const
  for (const key of ['pixelPitch', 'scale', 'maxFrameRate', 'aperture', 'sheetThickness', 'pairs'] as const) {
    const value = camera[key]
    if (value !== null) requireRange(field(key), value, { above: 0, unit: above[key] })
  }
}

function scaleOf({ camera, stations, rings }: ImagingInput, tell: Tell): number | null {
  if (camera.scale !== null) return camera.scale
  if (stations.length === 0 || rings.length === 0)
    return tell(
      'scale',
      'Without an image scale the field is made to hold the stations: it needs a station and a ring.',
    )
  const radius = Math.max(...rings.map((ring) => ring.radius))
  const span = Math.max(...stations) - Math.min(...stations) + 2 * FREE_RADII * radius
  return Math.min(camera.pixels[0] / span, camera.pixels[1] / (HEIGHT_RADII * radius))
}

function largestSpeeds({
  rings,
  exitSpeed,
}: ImagingInput): { readonly value: number; readonly of: 'exit' | 'core' } | null {
  if (rings.length === 0) return null
  const core = Math.max(
    ...rings.map(({ circulation, coreRadius, speed }) => circulation / (2 * Math.PI * coreRadius) + speed),
  )
  return core > exitSpeed ? { value: core, of: 'core' } : { value: exitSpeed, of: 'exit' }
}

/** Steepest and thinnest core: a uniform core turns as a whole, dv/dr = Gamma / (2 pi a^2). */
function coreOf(rings: readonly RingSeen[]): { readonly gradient: number; readonly radius: number } | null {
  if (rings.length === 0) return null
  return {
    gradient: Math.max(...rings.map(({ circulation, coreRadius }) => circulation / (2 * Math.PI * coreRadius ** 2))),
    radius: Math.min(...rings.map(({ coreRadius }) => coreRadius)),
  }
}

function ratesOf(
  { maxFrameRate }: CameraInput,
  rings: readonly RingSeen[],
  interval: number | null,
): Pick<Imaging, 'pairRate' | 'frameRate' | 'frameRateOk' | 'evenFrameRate' | 'evenFrames'> {
  const fastest = Math.max(...rings.map(({ speed, radius }) => speed / (STEP_OVER_RADIUS * radius)))
  const pairRate = rings.length === 0 || !(fastest > 0) ? null : fastest
  const frameRate = pairRate === null ? null : 2 * pairRate
  const evenFrameRate = interval === null ? null : 1 / interval
  const within = (rate: number | null): boolean | null =>
    rate === null || maxFrameRate === null ? null : rate <= maxFrameRate
  return { pairRate, frameRate, frameRateOk: within(frameRate), evenFrameRate, evenFrames: within(evenFrameRate) }
}

function depthOf(camera: CameraInput, magnification: number | null, tell: Tell): number | null {
  if (magnification === null) return null
  if (camera.aperture === null) return tell('depth of field', 'Depth of field needs the aperture of the lens.')
  return depthOfField(magnification, camera.aperture, camera.wavelength)
}

/** As asked, or from before the first passage to after the last. */
function pairsOf(camera: CameraInput, rings: readonly RingSeen[], pairRate: number | null): number | null {
  if (camera.pairs !== null) return camera.pairs
  if (pairRate === null) return null
  const times = rings.map(({ time }) => time)
  return Math.ceil((Math.max(...times) - Math.min(...times)) * pairRate) + SPARE_PAIRS
}

function refractionOf(
  { camera, water }: ImagingInput,
  field: readonly [number, number] | null,
  tell: Tell,
): Refraction | null {
  if (!camera.refraction) return null
  const { standOff, waterPath } = camera
  if (standOff === null || waterPath === null)
    return tell('refraction', 'Apparent places need the air from lens to window and the water from window to sheet.')
  if (field === null) return null
  const waterIndex = water === 'sea' ? REFRACTIVE_INDEX.sea : REFRACTIVE_INDEX.fresh
  const glassThickness = camera.windowThickness ?? 0
  const view = { standOff, glassThickness, waterPath, waterIndex, glassIndex: REFRACTIVE_INDEX.glass }
  if (glassThickness === 0) tell('refraction', 'The thickness of the window is left out of the ray.')
  if (water === 'given')
    tell('refraction', 'The liquid is given without a refractive index: that of fresh water is used.')
  const corner = Math.hypot(field[0], field[1]) / 2
  const places = Array.from({ length: PLACES }, (_, k) => apparentPlace((corner * k) / (PLACES - 1), view)).filter(
    (place) => place !== null,
  )
  if (places.length < PLACES)
    tell('refraction', 'The corner of the field lies beyond total reflection and is not seen.')
  return {
    waterIndex,
    apparentDepth: paraxialPath({ ...view, standOff: 0 }),
    waterOverAirScale: waterOverAirScale(view),
    places,
    cornerError: places.length < PLACES ? null : at(places, PLACES - 1).scaleFactor - 1,
  }
}
