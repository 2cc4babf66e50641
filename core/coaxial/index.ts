/**
 * Rings on one axis: induction, walls, tubes, march in time, events; trains of pulses.
 */
export { checkMarch, MOST_OUTPUTS, MOST_RINGS } from './checkInput'
export { marchCoaxialRings } from './marchCoaxial'
export { marchMergingRings } from './marchMerging'
export { THIN_CORE_LIMIT } from './ringEvents'
export {
  ENSEMBLE_DELTAS,
  ensembleDeltas,
  SHORT_STROKE,
  SHORT_STROKE_DELTA,
  SHOWN_DELTA,
  startingJetEnsemble,
  type JetByDelta,
  type JetEnsemble,
  type JetEnsembleInput,
} from './jet/ensemble'
export { checkJetInput, LARGEST_DELTA, LEAST_DELTA } from './jet/checkJetInput'
export { FORMATION_STROKE, FORMATION_STROKE_FROM, formationInput } from './jet/formationInput'
export { releaseJet } from './jet/release'
export type { JetRelease, JetReleaseInput, JetSums, ReleasedRing } from './jet/releaseTypes'
export { axialDensity, ringCut, type AxialDensity, type RingCut } from './jet/ringCut'
export { LIP_AVERAGE } from './jet/shedding'
export { startingJet } from './jet/startingJet'
export type {
  JetCounters,
  JetHistory,
  JetOptions,
  JetPinchOff,
  JetRing,
  JetRun,
  JetSettings,
  JetSnapshot,
  StartingJetInput,
} from './jet/types'
export { deltaOverCore } from './ringFlow'
export { hasJustAppeared } from './ringEvents'
export { LARGEST_TUBE_SHARE, RoundTube, tubeSlowing } from './roundTube'
export { tankSlowing, type TankSection } from './tankImages'
export { fallsOnOutput, outputTimesInside } from './trajectoryWriter'
export { trainRings, type TrainInput, type TrainRings } from './train'
export type {
  CoaxialLaw,
  CoaxialOptions,
  CoaxialRing,
  CoaxialTrajectory,
  CoaxialWake,
  CoaxialWakeInput,
  WakeAgeing,
} from './types'
export type { WakeCounters, WakeDrift, WakeEvent, WakeEventKind, WakeOutcome } from './wakeTypes'
