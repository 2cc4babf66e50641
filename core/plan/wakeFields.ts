/**
 * What a ring of the wake is typed as: the columns of the ring table in the window, in pasted text and in ring files.
 */
import type { Dimension } from '../quantity'

export interface RingColumn {
  readonly label: string
  readonly dimension: Dimension
  readonly help: string
}

/** Columns in their order; x y z is the centre, the direction is any vector the ring moves along. */
export const RING_COLUMNS = {
  circulation: {
    label: 'Circulation',
    dimension: 'circulation',
    help: 'Positive: the ring moves along its direction; negative: against it.',
  },
  radius: {
    label: 'Radius',
    dimension: 'length',
    help: 'Of the ring; of the circle of equal area where it is an ellipse.',
  },
  coreRadius: { label: 'Core radius', dimension: 'length', help: 'Radius of the vortex core.' },
  x: { label: 'x', dimension: 'length', help: 'Centre along the jet axis from the exit plane.' },
  y: { label: 'y', dimension: 'length', help: 'Centre across the axis.' },
  z: { label: 'z', dimension: 'length', help: 'Centre across the axis.' },
  directionX: { label: 'Direction x', dimension: 'number', help: 'Vector the ring faces; only its direction counts.' },
  directionY: { label: 'Direction y', dimension: 'number', help: 'Vector the ring faces; only its direction counts.' },
  directionZ: { label: 'Direction z', dimension: 'number', help: 'Vector the ring faces; only its direction counts.' },
  axisRatio: {
    label: 'Axis ratio',
    dimension: 'number',
    help: 'Extent towards y over that towards z; 1 for a circle.',
  },
  startTime: { label: 'Start', dimension: 'time', help: 'When the ring appears.' },
} as const satisfies Readonly<Record<string, RingColumn>>

export type RingColumnKey = keyof typeof RING_COLUMNS

/** Words of the core models of a ring. */
export const CORE_WORDS = { uniform: 'uniform', hollow: 'hollow', gaussian: 'Gaussian' } as const
