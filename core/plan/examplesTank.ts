/** Plans of a day at the tank, invented. */
import { example, NO_FLOW, type Example } from './exampleTypes'

export const TANK_EXAMPLES: readonly Example[] = [
  example('tank-day', 'A day at a glass tank: three stations, twelve strokes and speeds, each three times.', {
    title: 'Rings across a glass tank',
    notes:
      'A 25 mm tube at mid-depth of a tank 1.2 m long; the ring is followed past three stations. Set once for the day: frames from the first motion on, enough of them for the slowest ring.',
    water: { kind: 'fresh', temperatureCelsius: 20, depth: 0.25 },
    nozzle: { shape: 'tube', diameter: 0.025, pistonDiameter: 0.05, length: 0.15 },
    programme: { shape: 'trapezoid', stroke: 0.0625, peakSpeed: 0.1, riseTime: 0.02, fallTime: 0.02 },
    ambient: NO_FLOW,
    tankRun: {
      tank: { length: 1.2, width: 0.4, depth: 0.5 },
      nozzleDepth: 0.25,
      stations: [0.1, 0.2, 0.3],
      controllerStep: 0.001,
      target: null,
      camera: {
        pixels: [5120, 2560],
        pixelPitch: 0.0000045,
        scale: null,
        window: 16,
        maxFrameRate: 100,
        aperture: 4,
        refraction: true,
        standOff: 0.8,
        waterPath: 0.2,
        windowThickness: 0.01,
        sheetThickness: 0.001,
        pairs: 240,
      },
      drive: { maxTravel: 0.1, maxSpeed: 0.5, maxAcceleration: 5, lag: 0.02 },
      matrix: {
        fields: [
          { path: 'programme.stroke', values: [0.025, 0.0375, 0.05, 0.0625] },
          { path: 'programme.peakSpeed', values: [0.06, 0.1, 0.14] },
        ],
        kind: 'grid',
        repeats: 3,
        seed: 1,
        minutesPerRun: 6,
      },
    },
  }),
]
