/**
 * Whether the stand itself rings: its resonance against the harmonics of the pulses.
 *
 * Near a harmonic the stand answers more than it is pushed, so that peak and ripple are its own; the mean is not touched.
 */
import { at, bracket } from '../../base'
import { fourier } from './fourier'
import { median } from './robust'

/** Most samples of the spectrum, a power of two. */
const MOST_SAMPLES = 65_536
/** A harmonic is near where it is within this share of the resonance. */
const NEAR = 0.1
/** A line stands out where it is this many times the spectrum around it and this share of the largest harmonic. */
const LINE_OVER_FLOOR = 8
const LINE_OVER_LARGEST = 0.05
/** Bins on either side that a line may spread to, by the Hann window. */
const LINE_WIDTH = 2
/** Harmonics looked at. */
const HARMONICS = 50

export interface StandResonance {
  /** Told by the user, or a line of the spectrum between the harmonics; null: none known. [Hz] */
  readonly frequency: number | null
  readonly from: 'given' | 'spectrum' | null
  /** Amplitude of that line [N]; null where it was not looked for or not seen. */
  readonly amplitude: number | null
  /** Number of the nearest harmonic where it is near enough to warn; null else. */
  readonly nearHarmonic: number | null
  readonly notes: readonly string[]
}

interface Window {
  readonly from: number
  readonly to: number
  readonly period: number
  readonly given: number | null
}

export function resonanceOf(time: Float64Array, force: Float64Array, window: Window): StandResonance {
  const frequency = 1 / window.period
  if (window.given !== null) return judged(window.given, 'given', null, frequency)
  const line = lineBetweenHarmonics(time, force, window)
  if (line === null) return { frequency: null, from: null, amplitude: null, nearHarmonic: null, notes: [] }
  return judged(line.frequency, 'spectrum', line.amplitude, frequency)
}

function judged(
  resonance: number,
  from: 'given' | 'spectrum',
  amplitude: number | null,
  frequency: number,
): StandResonance {
  const harmonic = Math.max(1, Math.round(resonance / frequency))
  const off = Math.abs(harmonic * frequency - resonance) / resonance
  const near = harmonic <= HARMONICS && off < NEAR
  const notes: string[] = []
  const name = `${short(resonance)} Hz`
  if (from === 'spectrum')
    notes.push(
      `The log rings at ${name}, between the harmonics of the pulses, by ${short(amplitude ?? 0)} N: the stand or the vehicle, not the jet.`,
    )
  if (near)
    notes.push(
      `Harmonic ${harmonic} of the pulses, ${short(harmonic * frequency)} Hz, lies within ${100 * NEAR} % of the stand's resonance at ${name}: peak and ripple are the stand's as much as the jet's. The mean is not touched.`,
    )
  return { frequency: resonance, from, amplitude, nearHarmonic: near ? harmonic : null, notes }
}

/** The strongest line that is no harmonic; null where none stands out. */
function lineBetweenHarmonics(
  time: Float64Array,
  force: Float64Array,
  { from, to, period }: Window,
): { readonly frequency: number; readonly amplitude: number } | null {
  const first = bracket(time, from)
  const inside = bracket(time, to) - first
  const span = to - from
  const count = Math.min(MOST_SAMPLES, 2 ** Math.floor(Math.log2(Math.max(1, inside))))
  const bin = 1 / span
  // Fewer bins a harmonic than a line is wide leave nothing between them.
  if (count < 64 || span < (2 * LINE_WIDTH + 2) * period * (1 - 1e-9)) return null
  const amplitude = amplitudes(time, force, { from, span, count })
  const isHarmonic = (k: number): boolean => {
    const nearest = Math.round((k * bin) / (1 / period)) / (period * bin)
    return Math.abs(k - nearest) <= LINE_WIDTH
  }
  let [largest, best] = [0, 0]
  const floor: number[] = []
  for (let k = 1; k < amplitude.length; k++) {
    const height = at(amplitude, k)
    if (isHarmonic(k)) largest = Math.max(largest, height)
    else {
      floor.push(height)
      if (height > at(amplitude, best) || best === 0) best = k
    }
  }
  if (best === 0) return null
  const height = at(amplitude, best)
  if (height < LINE_OVER_FLOOR * median(floor) || height < LINE_OVER_LARGEST * largest) return null
  return { frequency: best * bin, amplitude: height }
}

/** Amplitudes of a stretch at multiples of 1 / span, through a Hann window; index 0 is not used. */
function amplitudes(
  time: Float64Array,
  force: Float64Array,
  { from, span, count }: { readonly from: number; readonly span: number; readonly count: number },
): Float64Array {
  const real = new Float64Array(count)
  const imaginary = new Float64Array(count)
  const hits = new Float64Array(count)
  // Means over equal cells, which hold back what is faster than they are; an empty cell takes the line between its neighbours.
  for (let i = bracket(time, from); i < time.length; i++) {
    const cell = Math.floor(((at(time, i) - from) / span) * count)
    if (cell >= count) break
    if (cell < 0) continue
    real[cell] = at(real, cell) + at(force, i)
    hits[cell] = at(hits, cell) + 1
  }
  let [sum, filled] = [0, 0]
  for (let k = 0; k < count; k++) {
    if (at(hits, k) > 0) real[k] = at(real, k) / at(hits, k)
    else real[k] = valueAt(time, force, from + (span * (k + 0.5)) / count)
    sum += at(real, k)
    filled++
  }
  const middle = sum / filled
  for (let k = 0; k < count; k++) {
    const hann = 0.5 - 0.5 * Math.cos((2 * Math.PI * k) / count)
    real[k] = (at(real, k) - middle) * hann
  }
  fourier(real, imaginary)
  // The window's mean is 1/2, and half of a line lies at the negative frequency.
  return Float64Array.from({ length: count >> 1 }, (_, k) => (4 * Math.hypot(at(real, k), at(imaginary, k))) / count)
}

function valueAt(time: Float64Array, force: Float64Array, when: number): number {
  const i = bracket(time, when)
  const share = (when - at(time, i)) / (at(time, i + 1) - at(time, i))
  return at(force, i) + share * (at(force, i + 1) - at(force, i))
}

function short(value: number): number {
  return Number(value.toPrecision(3))
}
