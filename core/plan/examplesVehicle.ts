/** Plans of thrusters, invented: on a vehicle with duty points, and alone on a bench. */
import { example, NO_FLOW, type Example } from './exampleTypes'

export const VEHICLE_EXAMPLES: readonly Example[] = [
  example('survey-vehicle', 'Two thrusters of a small survey vehicle, sized for a slow and a fast leg.', {
    title: 'Survey vehicle, two thrusters',
    notes:
      'A 1.6 m hull that follows a line at 0.5 m/s and crosses between lines at 0.8 m/s. The plan as it stands cruises a little above the slow leg; the search is for what does both.',
    water: { kind: 'sea', temperatureCelsius: 12, salinity: 35, depth: 8 },
    nozzle: { shape: 'tube', diameter: 0.05, pistonDiameter: 0.1, length: 0.06, lossCoefficient: 0.1 },
    programme: { shape: 'half-sine', stroke: 0.2, peakSpeed: 1.6 },
    ambient: NO_FLOW,
    train: { pulses: 6, period: 0.45 },
    thruster: {
      count: 2,
      spacing: 0.3,
      vehicle: {
        speed: null,
        mass: 60,
        addedMass: 6,
        length: 1.6,
        drag: { kind: 'hull', wettedArea: 1.2, formFactor: 0.2 },
      },
      actuator: {
        maxForce: 150,
        maxSpeed: 1,
        maxAcceleration: 20,
        maxPower: 120,
        maxTravel: 0.08,
        efficiency: 0.7,
        ejectShare: 0.5,
        valveLag: 0.01,
      },
      intake: { area: 0.004, recoveredShare: 0.2, lossCoefficient: 0.5 },
      bay: { length: 0.5, diameter: 0.15 },
      energyStore: 720000,
      target: [
        { speed: 0.5, share: 0.8 },
        { speed: 0.8, share: 0.2 },
      ],
      search: {
        diameter: [0.03, 0.09],
        strokeRatio: [2, 6],
        frequency: [0.5, 4],
        count: [1, 4],
        stock: { diameters: [0.04, 0.05, 0.06, 0.08], strokes: [] },
        seed: 1,
      },
    },
  }),
  example('bench-thruster', 'One plunger thruster clamped on a bench, pulsing twice a second.', {
    title: 'Bench thruster',
    notes: 'A 20 mm nozzle on a force balance, before anything is built around it.',
    water: { kind: 'fresh', temperatureCelsius: 20, depth: 0.25 },
    nozzle: { shape: 'tube', diameter: 0.02, pistonDiameter: 0.04, length: 0.03, lossCoefficient: 0.1 },
    programme: { shape: 'half-sine', stroke: 0.06, peakSpeed: 0.6 },
    ambient: NO_FLOW,
    train: { pulses: 10, period: 0.5 },
    thruster: {
      count: 1,
      vehicle: null,
      actuator: { maxForce: 40, maxSpeed: 0.5, maxTravel: 0.04, efficiency: 0.6, ejectShare: 0.4 },
      intake: { lossCoefficient: 0.5 },
    },
  }),
]
