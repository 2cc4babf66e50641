/**
 * An invented day at the tank with its readings: three runs of one stroke, read off every 0.3 s, and a log of the force stand over four pulses.
 *
 * Made from the ring of this plan with 0.93 of its circulation (-1, 0, +1 % from run to run) and a start 40 ms late, with noise of one seed:
 * 0.6 mm in place, 0.4 mm in radius, 2.5 % in circulation, 0.22 mN in force on a zero of 0.8 mN that drifts. Numbers are stored as they would be
 * written down.
 */
import { example, NO_FLOW, type Example } from './exampleTypes'

/** Place [0.1 mm], radius [10 um], circulation [mm2/s] at 0.9, 1.2 … 4.2 s. */
const RUNS: readonly (readonly (readonly [number, number, number])[])[] = [
  [
    [378, 1774, 2823],
    [500, 1817, 2850],
    [621, 1808, 2877],
    [736, 1828, 2868],
    [852, 1790, 2908],
    [969, 1786, 2767],
    [1106, 1842, 2829],
    [1218, 1758, 2851],
    [1331, 1695, 2849],
    [1459, 1755, 2752],
    [1559, 1741, 2797],
    [1670, 1749, 2837],
  ],
  [
    [367, 1715, 2943],
    [497, 1753, 2824],
    [632, 1829, 2836],
    [752, 1741, 2946],
    [870, 1793, 2930],
    [994, 1764, 2888],
    [1107, 1867, 3048],
    [1227, 1670, 2975],
    [1352, 1825, 2827],
    [1456, 1812, 2929],
    [1584, 1759, 2877],
    [1697, 1777, 2940],
  ],
  [
    [374, 1792, 2938],
    [503, 1799, 2806],
    [628, 1732, 2974],
    [750, 1749, 2869],
    [871, 1703, 2965],
    [1000, 1807, 2972],
    [1115, 1845, 2924],
    [1238, 1796, 2845],
    [1357, 1754, 2920],
    [1463, 1845, 2814],
    [1580, 1741, 2936],
    [1701, 1802, 2978],
  ],
]

/** Every 40 ms from 1 s before the first stroke [10 uN]. */
const FORCE = [
  101, 96, 103, 109, 76, 64, 36, 113, 59, 71, 75, 87, 119, 103, 62, 55, 89, 64, 58, 71, 72, 60, 64, 98, 78, 96, 53, 498,
  520, 519, 581, 564, 524, 515, 512, 549, 545, 556, 569, 545, 577, 513, 166, 63, 58, 89, 75, 116, 101, 107, 124, 68,
  140, 58, 82, 116, 103, 72, 95, 114, 87, 107, 69, 95, 97, 96, 50, 69, 56, 68, 88, 88, 107, 60, 101, 90, 81, 571, 546,
  551, 537, 581, 558, 539, 550, 526, 542, 569, 540, 528, 528, 548, 117, 97, 63, 46, 82, 100, 72, 69, 66, 88, 126, 89,
  85, 101, 116, 94, 62, 100, 91, 96, 84, 85, 54, 84, 90, 67, 137, 73, 93, 102, 118, 95, 82, 120, 79, 567, 537, 525, 549,
  528, 525, 531, 549, 593, 519, 528, 545, 547, 563, 551, 114, 64, 109, 88, 106, 96, 76, 97, 99, 103, 103, 91, 104, 102,
  64, 90, 105, 99, 74, 107, 105, 110, 92, 94, 117, 115, 75, 95, 58, 82, 82, 107, 81, 104, 121, 556, 543, 572, 579, 522,
  537, 550, 522, 562, 558, 558, 602, 525, 534, 558, 139, 67, 93, 106, 140, 137, 90, 101, 111, 113, 49, 121, 117, 109,
  105, 112, 117, 85, 134, 104, 110, 87, 101, 123, 84, 133, 104, 105, 129, 109, 92, 100, 131, 91, 72, 105, 138, 54, 86,
  149, 63, 95, 109, 88, 85, 127, 92, 127, 98, 134, 111, 104, 79, 157, 124, 122, 118, 71, 133, 135, 114, 87, 91, 150,
  130, 107, 126, 74, 113, 112, 75, 84, 114, 116, 98, 126, 132, 98, 81, 143, 139, 101, 91,
]

const FIRST = 0.9
const STEP = 0.3

function decimal(value: number): number {
  return Number(value.toPrecision(6))
}

export const READINGS_EXAMPLES: readonly Example[] = [
  example(
    'tank-day-measured',
    'After a day at the tank, invented: tracks of three runs and a force log against the plan.',
    {
      title: 'A day at the tank, measured',
      notes: 'Invented: three runs of one stroke from a 25 mm tube, and the thrust of four pulses on a stand.',
      water: { kind: 'fresh', temperatureCelsius: 20, depth: 0.25 },
      nozzle: { shape: 'tube', diameter: 0.025, pistonDiameter: 0.05, length: 0.15 },
      programme: { shape: 'trapezoid', stroke: 0.0625, peakSpeed: 0.1, riseTime: 0.02, fallTime: 0.02 },
      ambient: NO_FLOW,
      train: { pulses: 4, period: 2 },
      readings: {
        rows: RUNS.flatMap((rows, run) =>
          rows.map(([x, radius, circulation], index) => ({
            run: String(run + 1),
            time: decimal(FIRST + STEP * index),
            x: decimal(x * 1e-4),
            radius: decimal(radius * 1e-5),
            circulation: decimal(circulation * 1e-6),
            sigmaX: 0.0006,
            sigmaRadius: 0.0004,
            sigmaCirculation: 0.00007,
          })),
        ),
        force: [{ start: -1, step: 0.04, force: FORCE.map((value) => decimal(value * 1e-5)) }],
        fit: ['circulation', 'startTime'],
      },
    },
  ),
]
