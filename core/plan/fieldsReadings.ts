/** Numbers of the section `readings`; see fields.ts for what the limits mean. */
import type { FieldDefinition } from './fieldTypes'

export const READINGS_FIELDS = {
  'readings.calibration.timeOffset': {
    label: 'Time offset',
    dimension: 'time',
    min: -1e6,
    max: 1e6,
    help: 'Added to every time read off, so that 0 is the first motion of the piston.',
  },
  'readings.calibration.lengthOffset': {
    label: 'Length offset',
    dimension: 'length',
    min: -1000,
    max: 1000,
    help: 'Added to every place after its scale, so that 0 is the exit plane.',
  },
  'readings.calibration.lengthScale': {
    label: 'Length scale',
    dimension: 'number',
    above: 0,
    max: 1e6,
    help: 'Metres for each unit of length in the rows: 1 where they are in metres, the size of a pixel where they are in pixels.',
  },
  'readings.standResonance': {
    label: 'Resonance of the stand',
    dimension: 'frequency',
    above: 0,
    max: 1e6,
    optional: true,
    help: 'Lowest resonance of the force stand; empty: the force log is searched for one.',
  },
} as const satisfies Readonly<Record<string, FieldDefinition>>

const uncertainty = { above: 0, max: 1000, optional: true } as const

/** Numbers of one row, and of one sample of a log, by the key they stand under. */
export const READING_NUMBERS = {
  time: { label: 'Time', dimension: 'time', min: -1e6, max: 1e6, help: 'When it was read off.' },
  x: { label: 'Place', dimension: 'length', optional: true, help: 'Of the core along the axis, from the exit plane.' },
  radius: {
    label: 'Ring radius',
    dimension: 'length',
    above: 0,
    optional: true,
    help: 'From the axis to the middle of the core.',
  },
  circulation: { label: 'Circulation', dimension: 'circulation', optional: true, help: 'Of the ring.' },
  sigmaX: { ...uncertainty, label: 'Uncertainty of the place', dimension: 'length', help: 'One standard deviation.' },
  sigmaRadius: {
    ...uncertainty,
    label: 'Uncertainty of the radius',
    dimension: 'length',
    help: 'One standard deviation.',
  },
  sigmaCirculation: {
    ...uncertainty,
    label: 'Uncertainty of the circulation',
    dimension: 'circulation',
    help: 'One standard deviation.',
  },
} as const satisfies Readonly<Record<string, FieldDefinition>>

export type ReadingNumberKey = keyof typeof READING_NUMBERS
