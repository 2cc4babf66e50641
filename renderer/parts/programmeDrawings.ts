/** Small outlines that stand for the speed programmes: signs to choose by, not plots of this plan. */
import type { ProgrammeShape } from '../../core/pulse'

export interface ProgrammeDrawing {
  readonly shape: ProgrammeShape
  /** Path in a box 80 wide and 34 high, speed upward. */
  readonly path: string
  readonly dashed: boolean
}

export const PROGRAMME_DRAWINGS: readonly ProgrammeDrawing[] = [
  { shape: 'rectangular', path: 'M8 27V8H72V27', dashed: false },
  { shape: 'trapezoid', path: 'M8 27 21 9H59L72 27', dashed: false },
  { shape: 'linear-ramp', path: 'M8 27 72 8V27', dashed: false },
  { shape: 'half-sine', path: 'M8 27C25 3 55 3 72 27', dashed: false },
  { shape: 'sine-squared', path: 'M8 27C24 27 28 8 40 8S56 27 72 27', dashed: false },
  { shape: 'table', path: 'M8 27 17 15 25 11 33 12 43 8 52 11 60 16 66 25 72 27', dashed: true },
]
