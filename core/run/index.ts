/**
 * A plan in, results out: the one door that window, browser and runner share.
 */
export { fieldPicture, type FieldPicture } from './fieldPicture'
export { fieldSession, type AnalysedField, type FieldSession, type FileOutcome } from './fieldSession'
export { jetOf } from './formJet'
export { computedJet, knownJetOf, type JetRunOptions, type KnownJet } from './jet'
export { createJetCache, type JetCache } from './jetCache'
export type { JetData } from './jetTypes'
export { pulseOf } from './pulse'
export { holdsReadings } from './readings'
export { availableSections, run, sweepOf } from './run'
export type { SpreadData } from './spread'
export type { DrawnField } from './spreadDraw'
export { sweepDesign, type SweepDesign, type SweepOptions } from './sweep'
export type { SweepData } from './sweepData'
export type { ThrusterData } from './thruster'
export {
  designOfPlan,
  thrusterMap,
  type ThrusterMap,
  type ThrusterMapRequest,
  type ThrusterMapResult,
} from './thrusterMap'
export { SECTIONS, type RunData, type RunRequest, type RunResult, type Section } from './types'
export type { WakeRunOptions } from './options'
export type { WakeArrival, WakeData } from './wake'
export type { WakeJet } from './wakeJet'
export { wakePicture, type WakePicture, type WakePictureRequest } from './wakePicture'
