/**
 * Velocity fields frame by frame: only the numbers of each frame are kept, so that memory does not grow with the size of the fields.
 */
import { at, DomainError, requireRange } from '../../base'
import { fieldGrid, halfPlanes, sameNodes, vorticityOf, type FieldFrame, type FieldGrid } from './fieldGrid'
import { vorticityNoise } from './fieldNoise'
import { halfSums, LARGEST_THRESHOLD, type FieldPart, type HalfSums } from './fieldSums'
import { measuredFormation } from './fieldFormation'
import type { FieldNumbers, FieldOptions, FieldResult, FieldRing } from './fieldTypes'
import { mean } from './robust'
import type { ReadingsCalibration } from './types'

/** Most frames of one run. */
export const LARGEST_FRAMES = 100_000

export interface FieldAnalysis {
  /** Take in one frame; frames may come in any order. @throws {DomainError} for a frame that cannot be read; it is then left out */
  readonly add: (frame: FieldFrame) => FieldNumbers
  /** Everything so far. */
  readonly result: () => FieldResult
}

/** @throws {DomainError} for options outside their range */
export function createFieldAnalysis(options: FieldOptions): FieldAnalysis {
  requireRange('nozzle.diameter', options.diameter, { above: 0, unit: 'm' })
  requireRange('peakSpeed', options.peakSpeed, { above: 0, unit: 'm/s' })
  requireRange('density', options.density, { above: 0, unit: 'kg/m3' })
  const frames: FieldNumbers[] = []
  // The nodes of the last frame: a run has them at the same places in every frame.
  let known: { readonly frame: FieldFrame; readonly grid: FieldGrid } | null = null
  return {
    add(given) {
      if (frames.length >= LARGEST_FRAMES)
        throw new DomainError('frames', `a run must have at most ${LARGEST_FRAMES} frames, got more`)
      const { length } = given.x
      if (given.u.length !== length || given.v.length !== length)
        throw new DomainError(
          'frame',
          `a frame must have u and v at each of its ${length} nodes, got ${given.u.length} and ${given.v.length}`,
        )
      requireRange('time of a frame', given.time, { unit: 's' })
      const frame = calibratedFrame(given, options.calibration)
      if (known === null || !sameNodes(known.frame, given)) known = { frame: nodesOf(given), grid: fieldGrid(frame) }
      const numbers = numbersOf(frame, known.grid, options)
      frames.push(numbers)
      return numbers
    },
    result: () =>
      measuredFormation(
        frames.toSorted((a, b) => a.time - b.time),
        options,
      ),
  }
}

/** Vorticity of one frame to be looked at: one or two half planes, values row by row along x [1/s]. @throws {DomainError} */
export function frameVorticity(
  frame: FieldFrame,
  axis = 0,
): readonly { readonly x: Float64Array; readonly r: Float64Array; readonly vorticity: Float64Array }[] {
  return halfPlanes(frame, fieldGrid(frame), axis).halves.map((half) => ({
    x: half.x,
    r: half.r,
    vorticity: vorticityOf(half),
  }))
}

/** What tells the nodes, without the velocities: a copy, since whoever reads files may use its lists again. */
function nodesOf({ time, x, r }: FieldFrame): FieldFrame {
  return { time, x: Float64Array.from(x), r: Float64Array.from(r), u: [], v: [] }
}

function calibratedFrame(frame: FieldFrame, calibration: ReadingsCalibration | undefined): FieldFrame {
  if (calibration === undefined) return frame
  const { timeOffset, lengthOffset, lengthScale } = calibration
  const plain = lengthScale === 1 && lengthOffset === 0
  return {
    ...frame,
    time: frame.time + timeOffset,
    x: plain ? frame.x : Float64Array.from(frame.x, (x) => lengthScale * x + lengthOffset),
    r: plain ? frame.r : Float64Array.from(frame.r, (r) => lengthScale * r),
  }
}

function numbersOf(frame: FieldFrame, grid: FieldGrid, options: FieldOptions): FieldNumbers {
  const { axis = 0, from = 0, diameter, density } = options
  const { halves, filled } = halfPlanes(frame, grid, axis)
  const sums = halves.map((half) => {
    const vorticity = vorticityOf(half)
    return halfSums(half, vorticity, vorticityNoise(vorticity, half.x.length), { from, diameter })
  })
  const over = (value: (half: HalfSums) => number): number => mean(sums.map(value))
  const total = sums.flatMap((half) => (half.total === null ? [] : [half.total]))
  const circulations = sums.map((half) => half.total?.circulation ?? 0)
  const whole = mean(circulations)
  const ratios = sums.flatMap(({ cutRatio }) => (cutRatio === null ? [] : [cutRatio]))
  return {
    time: frame.time,
    formationTime: options.formationTime?.(frame.time) ?? null,
    totalCirculation: whole,
    totalByContour: over((half) => half.totalByContour),
    totalImpulse: density * mean(sums.map((half) => half.total?.impulsePerDensity ?? 0)),
    ring: ringOf(sums, density),
    cutRatio: ratios.length === sums.length ? mean(ratios) : null,
    trailingJet: sums.some(({ trailingJet }) => trailingJet),
    peakVorticity: over(({ peak }) => peak),
    threshold: Math.min(
      LARGEST_THRESHOLD,
      over(({ threshold }) => threshold),
    ),
    circulationError: over(({ circulationError }) => circulationError) / Math.sqrt(sums.length),
    asymmetry: total.length === 2 && whole > 0 ? Math.abs(at(circulations, 0) - at(circulations, 1)) / whole : null,
    filled,
  }
}

/** Mean of the halves; null unless every half has a ring. */
function ringOf(sums: readonly HalfSums[], density: number): FieldRing | null {
  const parts = sums.flatMap(({ ring }) => (ring === null ? [] : [ring]))
  if (parts.length < sums.length) return null
  const contours = sums.flatMap(({ ringByContour }) => (ringByContour === null ? [] : [ringByContour]))
  const over = (value: (part: FieldPart) => number): number => mean(parts.map(value))
  return {
    circulation: over(({ circulation }) => circulation),
    circulationByContour: contours.length === sums.length ? mean(contours) : null,
    x: over(({ x }) => x),
    radius: over(({ radius }) => radius),
    coreRadius: over(({ coreRadius }) => coreRadius),
    impulse: density * over(({ impulsePerDensity }) => impulsePerDensity),
  }
}
