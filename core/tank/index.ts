/**
 * A day at the tank: stations, imaging, run matrix and the piston's profile.
 *
 * planTankRun      everything a run needs to be told
 * tankArrivals     when the ring comes to each station, with its range
 * pistonProfile    what the piston is told to do at each step of its controller
 * solutionsFor     strokes and peak speeds that give a wanted ring
 */
export {
  ageingLaws,
  tankArrivals,
  type ArrivalInput,
  type Arrivals,
  type RingVariant,
  type TankArrival,
} from './arrivals'
export type { CombinedInput } from './combinations'
export { clearances, type Clearance, type ClearanceInput, type WallName } from './clearances'
export { imaging, type Imaging, type ImagingInput, type ImagingNote, type Refraction, type RingSeen } from './imaging'
export {
  depthOfField,
  DISPLACEMENT_SHARE,
  FEWEST_VECTORS,
  LARGEST_GRADIENT,
  OUT_OF_PLANE_SHARE,
  pairInterval,
  seedingDensity,
  SHEET_OVER_DISPLACEMENT,
  STEP_OVER_RADIUS,
  storageOf,
  thinnestSheet,
} from './imagingRules'
export { solutionsFor, withPeak, type InverseInput, type Solution } from './inverse'
export {
  pistonProfile,
  type DriveLimit,
  type DriveLimitName,
  type PistonProfile,
  type ProfileInput,
  type ProfileRounding,
  type ProfileRows,
} from './profile'
export { integrateProfile, type ProfileCheck } from './profileCheck'
export {
  apparentPlace,
  paraxialPath,
  REFRACTIVE_INDEX,
  waterOverAirScale,
  type ApparentPlace,
  type WindowView,
} from './refraction'
export type { Passage, RingPath } from './ringPath'
export {
  MOST_RUNS,
  runMatrix,
  type Combination,
  type ExpectedArrival,
  type MatrixRun,
  type RunMatrix,
} from './runMatrix'
export { settling, TUBE_LAMINAR_BELOW, WAITING_OVER_PASSAGE, type Settling, type SettlingInput } from './settling'
export type { TankPath } from './tankPath'
export { planTankRun, type FollowedRing, type TankRunInput, type TankRunResult } from './tankRun'
export { triggerTable, type TriggerRow, type TriggerTable, type TriggerTableInput } from './triggers'
export type {
  CameraInput,
  DriveInput,
  MatrixField,
  MatrixInput,
  PracticeInput,
  TankInput,
  TankOptions,
  TankRunSection,
  TankTarget,
  TriggerInput,
} from './types'
export { nearestSide, slowingTube, tankWalls, wallSlowing, type TankWalls, type WallKind } from './walls'
export {
  calibrated,
  FIT_NAMES,
  forceLog,
  type FieldFiles,
  type FitName,
  type ForceLog,
  type ReadingRow,
  type ReadingsCalibration,
  type ReadingsColumn,
  type ReadingsKind,
  type ReadingsSection,
  type ReadingsSource,
} from './readings/types'
export { createFieldAnalysis, frameVorticity, type FieldAnalysis } from './readings/fieldAnalysis'
export type { FieldFrame } from './readings/fieldGrid'
export type { FieldNumbers, FieldOptions, FieldResult, FieldRing, MeasuredValue } from './readings/fieldTypes'
export type { FittedValue, ReadingResidual, RingFit } from './readings/fitTypes'
export { compareReadings, type ReadingsInput, type ReadingsPath, type ReadingsResult } from './readings/compareReadings'
export { fitRing, type RingFitInput } from './readings/fitRing'
export {
  analyseForce,
  type ForceInput,
  type ForceResult,
  type ForceValue,
  type ForceZero,
} from './readings/forceAnalysis'
export type { StandResonance } from './readings/forceSpectrum'
export type { HeldParameter } from './readings/identify'
export type { MeasuredQuantity } from './readings/measurements'
export { ringAt, type RingStart, type RingState, type RingSurroundings } from './readings/pathModel'
export { programmeOfLog, type AsRunProgramme } from './readings/pistonLog'
export type { ComparedQuantity, PredictedRing, PredictedValue, Prediction } from './readings/predicted'
export { fitRepeats, type Repeats, type RepeatValue, type RunFit } from './readings/repeats'
export type { Cause, Sensitivity } from './readings/sensitivities'
export { QUANTITY_WORDS, verdictOf, type ComparedValue, type Explanation, type Verdict } from './readings/verdict'
