/**
 * The plan document: reading and writing it, its fields and choices, edits, examples, cautions, and the tables written out.
 */
export { CAUTIONS, cautionsFor } from './cautions'
export type { CautionContext, CautionDefinition, CautionGroup } from './cautionTypes'
export { writeCsv, type Cell } from './csvWriter'
export { checkField } from './decodeFields'
export { JET_DEFAULTS } from './decodeJet'
export { decodePlan, LARGEST_PLAN, readPlan } from './decodePlan'
export { LARGEST_ROWS, SPREAD_DEFAULTS, SWEEP_DEFAULTS } from './decodeSweep'
export { MATRIX_DEFAULTS, TANK_RUN_DEFAULTS } from './decodeTankRun'
export { SEARCH_DEFAULTS, THRUSTER_DEFAULTS, VEHICLE_DEFAULTS } from './decodeThruster'
export { WAKE_DEFAULTS } from './decodeWake'
export {
  setChoice,
  setField,
  setHeld,
  setJet,
  setNumber,
  setRows,
  setSpread,
  setStrokeRatio,
  setSweep,
  setTankRun,
  setThruster,
  setTitle,
  setTrain,
  setUnit,
  setWake,
} from './edit'
export { defaultPlan, examplePlan, EXAMPLES } from './examples'
export type { Example } from './exampleTypes'
export { CHOICES, fieldDefinition, FIELDS, type ChoicePath, type FieldPath } from './fields'
export type { FieldDefinition } from './fieldTypes'
export { JET_COLUMNS, jetTable, type JetOutcome } from './jetTables'
export { numberAt } from './planNumbers'
export { isFieldPath, quantityDefinition, variedDefinition } from './planPaths'
export type { HeldDesign, SpreadSection, SweepField, SweepSection } from './sectionTypes'
export { migrate, MIGRATIONS, type Migration } from './migrations'
export { readProgrammeCsv, type ProgrammeReading } from './programmeCsv'
export { readRingTable, type RingReading, type SkippedRow } from './ringCsv'
export {
  RING_TABLE_KEYS,
  ringHeading,
  ringTable,
  ringValue,
  SI_RING_UNITS,
  withRingValue,
  type RingTableKey,
  type RingTableUnits,
} from './ringTable'
export {
  eventTable,
  PULSE_COLUMNS,
  pulseTable,
  SUMMARY_FORMAT,
  SUMMARY_VERSION,
  summaryText,
  trajectoryTable,
  wakeFile,
  wakeFileName,
  wakeTimesTable,
  type SummaryInput,
} from './tables'
export {
  PLAN_FORMAT,
  PLAN_VERSION,
  type Caution,
  type JetSection,
  type Json,
  type JsonObject,
  type ModelsInput,
  type Plan,
  type PlanReading,
  type TrainSection,
  type ViewInput,
  type WakeSection,
} from './types'
export { unknownKeys, unknownKeysInWords } from './unknownKeys'
export { validatePlan } from './validate'
export { startsFromJet } from './wakeStart'
export { CORE_WORDS, RING_COLUMNS, type RingColumn, type RingColumnKey } from './wakeFields'
export { canonicalInput, planDocument, planFileName, writePlan } from './writePlan'
