/**
 * One pulse: speed programmes, slug integrals, start over-pressure, formation number and the ring it makes.
 *
 * computePulse        everything one pulse makes
 * compileProgramme    a speed programme that can be read at any time and at any stroke
 * wholeClosedPulse    moments of a closed shape in microseconds, for searches over many designs
 * withStroke          the same programme at another stroke
 * programmeRowProblems  what is wrong with the rows of a table
 */
export { contraction, exitFactors, exitPerPiston, LARGEST_RADIAL_RATIO } from './exitFactors'
export { PUBLISHED_BAND } from './formationModifiers'
export { isQuickStart, LIMITING_ENERGY } from './formationNumber'
export { HISTORY_TIMES } from './history'
export { diddenRatio, dimensionlessEnergy, quickStartTerms, slugInvariants } from './invariants'
export type { Moments } from './moments'
export { compileProgramme, withStroke, type SpeedProgramme } from './programme'
export { programmeRowProblems } from './programmeTable'
export { computePulse } from './pulse'
export { ringOfInvariants } from './pulseRing'
export type {
  ClosedShape,
  ComputedJet,
  ExitProfile,
  FormationBasis,
  FormationNumbers,
  Invariants,
  NozzleInput,
  NozzleShape,
  OverPressureBasis,
  ProgrammeInput,
  ProgrammeRow,
  ProgrammeShape,
  PulseHistory,
  PulseInput,
  PulseNote,
  PulseResult,
  PulseRing,
  StrokeMargin,
} from './types'
export { wholeClosedPulse, type WholePulse } from './wholePulse'
