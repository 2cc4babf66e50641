/**
 * One measured pulse from a rigid tube, transcribed as numbers: the program's own comparison with a measurement. The licence of the data
 * is kept beside them and shown wherever they are.
 */
import { example, NO_FLOW, type Example } from './exampleTypes'
import type { Plan } from './types'

export const MEASURED_PULSE = {
  source:
    'D. Choi, P. Singh, I. Bergerson, M. Kim, J. Park, H. J. Wallace, K. Zhang, S. Y. Hsieh, A. T. Asberry, T. A. Uyeno, W. F. Gilly, H. Park, D. Kang, C. Bose & S. Bhamla, Squid-inspired superpropulsion, source data, GitHub bhamla-lab/squid-superpropulsion-2026, commit 85586fdc38f309a8c9b6c615e7523da920244a97 (27 February 2026)',
  paper: 'Squid-inspired soft superpropulsion, arXiv 2605.03239',
  licence: [
    'MIT License',
    'Copyright (c) 2026 Bhamla Lab at Georgia Tech',
    'Permission is hereby granted, free of charge, to any person obtaining a copy of this software and associated documentation files (the "Software"), to deal in the Software without restriction, including without limitation the rights to use, copy, modify, merge, publish, distribute, sublicense, and/or sell copies of the Software, and to permit persons to whom the Software is furnished to do so, subject to the following conditions:',
    'The above copyright notice and this permission notice shall be included in all copies or substantial portions of the Software.',
    'THE SOFTWARE IS PROVIDED "AS IS", WITHOUT WARRANTY OF ANY KIND, EXPRESS OR IMPLIED, INCLUDING BUT NOT LIMITED TO THE WARRANTIES OF MERCHANTABILITY, FITNESS FOR A PARTICULAR PURPOSE AND NONINFRINGEMENT. IN NO EVENT SHALL THE AUTHORS OR COPYRIGHT HOLDERS BE LIABLE FOR ANY CLAIM, DAMAGES OR OTHER LIABILITY, WHETHER IN AN ACTION OF CONTRACT, TORT OR OTHERWISE, ARISING FROM, OUT OF OR IN CONNECTION WITH THE SOFTWARE OR THE USE OR OTHER DEALINGS IN THE SOFTWARE.',
  ],
  /** What these numbers can and cannot show; shown beside the comparison. */
  words: [
    'Reported beside the prediction, never as a test of it: the measured numbers do not fit one another. With the measured energy no thin ring of plausible radius reaches the measured speed (0.25 to 0.27 of the peak exit speed against 0.372).',
    'The ring with over-pressure matches the speed only by carrying 1.9 times the measured energy. Stretching the time scale by 1.5 would put the computed track on the data, but the files state the acceleration time to 4 %.',
    'The exit speed may be that on the centre line rather than the mean, and exit diameter or acceleration time may differ from what the files say: the input alone leaves 15 % in circulation, impulse and energy. Nothing here was tuned to the data.',
    'Circulation, ring radius and core radius were not measured: nothing is claimed of those.',
  ],
  /** Name of the file in the plan, by which the comparison is known again. */
  file: 'Data_Fig_S06_F_vortex_core_data.xlsx (rigid tube), as medians',
  /** Mean after the pulse with its scatter [J]; mean speed of the ring over 1 to 8 T [m/s]; when half the final impulse was there [s]. */
  fieldEnergy: { value: 1.79e-5, scatter: 0.23e-5 },
  ringSpeed: 0.0645,
  halfImpulseTime: 0.0954,
} as const

/** [m]: stated for the matching simulations, inferred for the experiment. */
const DIAMETER = 0.015
/** Acceleration time T [s], 4 % uncertain. */
const TIME = 0.106
/** [m/s] */
const PEAK = 0.173549
/** Root mean square of the places about a straight line [D]. */
const PLACE_SIGMA = 0.03

/** t/T, V/Vmax in thousandths: the raw trace, averaged. */
const TRACE: readonly (readonly [number, number])[] = [
  [0, 0],
  [0.4, 62],
  [0.5, 85],
  [0.55, 126],
  [0.6, 328],
  [0.65, 689],
  [0.7, 769],
  [0.75, 814],
  [0.8, 836],
  [0.85, 858],
  [0.9, 876],
  [0.95, 939],
  [1, 961],
  [1.05, 919],
  [1.1, 937],
  [1.15, 924],
  [1.2, 882],
  [1.25, 834],
  [1.3, 780],
  [1.35, 781],
  [1.4, 670],
  [1.45, 479],
  [1.5, 305],
  [1.55, 147],
  [1.6, 123],
  [1.7, 210],
  [1.8, 256],
  [1.9, 230],
  [2, 222],
  [2.1, 92],
  [2.2, 117],
  [2.3, 80],
  [2.4, 48],
  [2.6, 3],
  [3, 0],
]

/** x/D in thousandths at 0.5, 1, 1.5 … 8 T: medians over 0.1 T on either side. */
const PLACES = [82, 214, 411, 652, 915, 1134, 1375, 1594, 1835, 2054, 2273, 2492, 2711, 2952, 3149, 3324]

function digits(value: number): number {
  return Number(value.toPrecision(6))
}

export const MEASURED_EXAMPLE: Example = example(
  'measured-pulse',
  'A measured pulse from a rigid tube (open data, MIT licence) beside the prediction.',
  {
    title: 'One measured pulse',
    notes: `Measured, not invented. Data: ${MEASURED_PULSE.source}. Paper: ${MEASURED_PULSE.paper}. ${MEASURED_PULSE.licence[0]}, ${MEASURED_PULSE.licence[1]}. Density and viscosity are assumed: the temperature is not given.`,
    water: { kind: 'given', density: 998.2, kinematicViscosity: 1e-6, depth: 0.2 },
    nozzle: { shape: 'tube', diameter: DIAMETER, pistonDiameter: DIAMETER, length: 0.041 },
    programme: {
      shape: 'table',
      rows: TRACE.map(([time, speed]) => ({ time: digits(time * TIME), speed: digits((speed / 1000) * PEAK) })),
    },
    ambient: NO_FLOW,
    readings: {
      rows: PLACES.map((place, index) => ({
        run: 'rigid tube',
        time: digits(((index + 1) / 2) * TIME),
        x: digits((place / 1000) * DIAMETER),
        sigmaX: digits(PLACE_SIGMA * DIAMETER),
      })),
      fit: ['circulation', 'startPosition'],
      sources: [{ name: MEASURED_PULSE.file, hash: '', kind: 'rows', columns: [] }],
    },
  },
)

/** Whether a plan holds these readings. */
export function holdsMeasuredPulse(plan: Plan): boolean {
  return plan.readings?.sources.some(({ name }) => name === MEASURED_PULSE.file) ?? false
}
