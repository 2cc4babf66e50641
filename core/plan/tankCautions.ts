/**
 * Cautions about a run in the tank: walls too near, what the camera cannot do, what the drive cannot follow, what the ring is not.
 */
import type { TankRunResult } from '../tank'
import type { Plan } from './types'

/** What these cautions look at. */
export interface TankCautionContext {
  readonly plan: Pick<Plan, 'water' | 'tankRun'>
  readonly tankRun: TankRunResult | null
}

export interface TankCaution {
  readonly id: string
  readonly group: 'model'
  readonly source: string
  /** The sentence for this run, or null where the caution does not hold. */
  readonly text: (context: TankCautionContext) => string | null
}

/** Circulation that the rounded motion may lose before it is told. */
const CIRCULATION_WORTH_TELLING = 0.98
/** Change of scale from axis to corner that is worth a note. */
const CORNER_WORTH_TELLING = 0.005

const three = (value: number): string => String(Number(value.toPrecision(3)))
const percent = (share: number): string => `${three(100 * share)} %`
const milliseconds = (time: number): string => `${three(1000 * time)} ms`

/** A caution that only looks at a run that was planned. */
function caution(id: string, source: string, text: (run: TankRunResult) => string | null): TankCaution {
  return { id, group: 'model', source, text: ({ tankRun }) => (tankRun === null ? null : text(tankRun)) }
}

/** Sentences joined, or null where there is none. */
function joined(sentences: readonly string[]): string | null {
  return sentences.length === 0 ? null : [...new Set(sentences)].join(' ')
}

const WALLS: readonly TankCaution[] = [
  caution('tank-near-walls', 'common practice', ({ clearances, wallShare }) => {
    const near = clearances.filter(({ ok, wallInteraction }) => !ok && !wallInteraction)
    if (near.length === 0) return null
    const cost = wallShare === 0 ? '' : ` All of them together change the ring's speed by ${percent(wallShare)}.`
    return `${near.map(({ text }) => text).join(' ')}${cost}`
  }),
  caution(
    'tank-wall-interaction',
    'Walker et al. 1987; Orlandi & Verzicco 1993 (recalled, not re-read)',
    ({ clearances }) => joined(clearances.filter(({ wallInteraction }) => wallInteraction).map(({ text }) => text)),
  ),
  caution('tank-arrivals', 'limits of the ring models', ({ arrivals }) =>
    joined(
      arrivals.flatMap(({ station, reason }) => (reason === null ? [] : [`Station ${three(station)} m: ${reason}.`])),
    ),
  ),
  caution('tank-run-notes', 'how results are kept', ({ notes }) => joined(notes)),
]

const RING: readonly TankCaution[] = [
  caution('tank-ring-regime', 'common practice', ({ settling }) =>
    settling.ring.regime === 'laminar' || settling.ring.regime === null ? null : settling.ring.text,
  ),
  caution('tank-jet-regime', 'steady flow in a tube; textbook value', ({ settling }) =>
    settling.jet.laminar ? null : settling.jet.text,
  ),
  caution('tank-not-impulsive', 'common practice', ({ settling }) =>
    settling.start.impulsive ? null : settling.start.text,
  ),
  caution('tank-settling', 'common practice', ({ settling }) => settling.text),
  caution(
    'tank-dye',
    'Maxworthy 1972, J. Fluid Mech. 51:15 (recalled, not re-read)',
    () =>
      'Dye does not mark vorticity: it spreads slower and stays where it was put. Read ring size, core and circulation from velocities, not from the edge of the dye.',
  ),
]

/** Depths of the axis this far apart [m] are not one depth told twice. */
const DEPTHS_APART = 0.01

/** The pulse has its pressures from one depth, the tank its surface from another. */
const DEPTH: TankCaution = {
  id: 'tank-depth-differs',
  group: 'model',
  source: 'inputs of the plan',
  text: ({ plan }) => {
    const pulse = plan.water.depth
    const tank = plan.tankRun?.nozzleDepth ?? null
    // A depth of 0 is what stands where none was told.
    if (tank === null || pulse === 0 || Math.abs(pulse - tank) <= DEPTHS_APART) return null
    return `The pulse is computed at a depth of ${three(pulse)} m, the axis in the tank lies ${three(tank)} m deep: pressures and cavitation are those of the first, walls and surface those of the second. Give both the same depth.`
  },
}

const DRIVE: readonly TankCaution[] = [
  caution('tank-drive-limits', 'limits given in the plan', ({ profile }) =>
    joined(profile.limits.filter(({ ok }) => !ok).map(({ text }) => text)),
  ),
  caution('tank-matrix-limits', 'limits given in the plan', ({ matrix }) => {
    const broken = matrix?.runs.filter(({ ok }) => !ok) ?? []
    const [first] = broken
    if (matrix === null || first === undefined) return null
    const combinations = matrix.each.filter(({ ok }) => !ok).length
    return `${broken.length} of the ${matrix.runs.length} runs in the order (${combinations} of ${matrix.each.length} combinations) cannot be made as they stand; run ${first.run}: ${(first.reason ?? '').replace(/\.$/u, '')}.`
  }),
  caution('tank-rounding', 'S-curve of the piston profile', ({ profile }) =>
    profile.rounding.circulationShare < CIRCULATION_WORTH_TELLING
      ? `${profile.rounding.text} Arrivals and ring are those of the planned motion.`
      : null,
  ),
]

const CAMERA: readonly TankCaution[] = [
  caution('tank-pair-interval', 'Keane & Adrian 1990 and 1992', ({ imaging }) => {
    const { pairInterval, gradient, gradientOk, pairIntervalForGradient } = imaging
    if (pairInterval === null) return 'The pair interval cannot be told: it needs an image scale and a ring.'
    if (gradientOk !== false || gradient === null || pairIntervalForGradient === null) return null
    return `No pair interval serves the whole ring: ${milliseconds(pairInterval)} moves the fastest particles by a quarter of the window, but across the core the displacement then changes by ${three(gradient)} pixels a pixel, above 0.05, for which ${milliseconds(pairIntervalForGradient)} would be needed. A larger scale or a smaller window brings the two together.`
  }),
  caution('tank-vectors', 'common practice', ({ imaging }) =>
    imaging.vectorsOk === false && imaging.vectorsAcrossCore !== null && imaging.scaleForVectors !== null
      ? `${three(imaging.vectorsAcrossCore)} vectors lie across the core, fewer than 8: its size and peak vorticity will be smeared. A scale of ${three(imaging.scaleForVectors / 1000)} pixels a millimetre would do with this window.`
      : null,
  ),
  caution('tank-frame-rate', 'common practice', ({ imaging }) =>
    imaging.frameRateOk === false && imaging.frameRate !== null
      ? `Following the ring by half its radius a pair takes ${three(imaging.frameRate)} frames a second, more than the camera's: fewer pairs will be seen on its way.`
      : null,
  ),
  caution('tank-straddled-pairs', 'common practice', ({ imaging }) =>
    imaging.evenFrames === false && imaging.evenFrameRate !== null && imaging.pairInterval !== null
      ? `Frames in an even row ${milliseconds(imaging.pairInterval)} apart take ${three(imaging.evenFrameRate)} frames a second, more than the camera's: pairs must straddle two frames, with two light pulses.`
      : null,
  ),
  caution('tank-light-sheet', 'Keane & Adrian 1990; common text of optics', ({ imaging }) => {
    const { sheetThickness, thinnestSheet, sheetOk, depthOfField, depthOfFieldOk } = imaging
    const told: string[] = []
    if (sheetOk === false && sheetThickness !== null && thinnestSheet !== null)
      told.push(
        `The light sheet of ${three(1000 * sheetThickness)} mm is thinner than the ${three(1000 * thinnestSheet)} mm that keep particles from frame to frame.`,
      )
    if (depthOfFieldOk === false && sheetThickness !== null && depthOfField !== null)
      told.push(
        `The depth of field of ${three(1000 * depthOfField)} mm is less than the light sheet's ${three(1000 * sheetThickness)} mm: close the aperture.`,
      )
    return joined(told)
  }),
  caution('tank-refraction', "Snell's law through a flat window", ({ imaging }) => {
    const error = imaging.refraction?.cornerError ?? null
    if (error === null || error < CORNER_WORTH_TELLING) return null
    return `Through the window the scale is ${percent(error)} larger at the corner of the field than on its axis: calibrate with a target in the water, over the whole field.`
  }),
]

export const TANK_CAUTIONS: readonly TankCaution[] = [...WALLS, DEPTH, ...RING, ...DRIVE, ...CAMERA]
