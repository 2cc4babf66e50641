/**
 * Foundation of core: refusals, arrays, constants and the numerical methods every room shares.
 */
export { at, bracket, equallySpaced, last } from './arrays'
export { EULER_GAMMA, STANDARD_ATMOSPHERE, STANDARD_GRAVITY, ZERO_CELSIUS } from './constants'
export { completeElliptic, completeEllipticFromComplement, type CompleteElliptic } from './elliptic'
export {
  DomainError,
  requireRange,
  type CancelSignal,
  type Problem,
  type Progress,
  type RunOptions,
  type RunStatus,
} from './errors'
export { evaluateCubic, monotoneCubic, type CubicCurve } from './interpolation'
export { march, type Crossing, type EventFunctions, type MarchOptions, type MarchResult } from './march'
export { gaussLegendre, integrate, type GaussRule } from './quadrature'
export { randomSource, sourceOfState, type RandomSource } from './random'
export { bracketedRoot } from './root'
export {
  RungeKuttaStepper,
  type Derivative,
  type StepCounters,
  type StepOutcome,
  type StepperOptions,
} from './rungeKutta'
