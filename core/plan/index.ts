/**
 * The plan document: reading and writing it, its fields and choices, edits, examples, cautions, and the tables written out.
 */
export { CAUTIONS, cautionsFor } from './cautions'
export type { CautionContext, CautionDefinition, CautionGroup } from './cautionTypes'
export { csvLine, writeCsv, type Cell } from './csvWriter'
export { checkField } from './decodeFields'
export { JET_DEFAULTS } from './decodeJet'
export { setDesign, type PlannedDesign } from './designEdit'
export { readDragTable, type DragReading, type DragRow, type DragUnits } from './dragCsv'
export { decodePlan, LARGEST_PLAN, readPlan } from './decodePlan'
export { LARGEST_READING_ROWS, READINGS_DEFAULTS } from './decodeReadings'
export { LARGEST_ROWS, SPREAD_DEFAULTS, SWEEP_DEFAULTS } from './decodeSweep'
export { readPartNote } from './decodeSweepPart'
export { MATRIX_DEFAULTS, TANK_RUN_DEFAULTS } from './decodeTankRun'
export { SEARCH_DEFAULTS, THRUSTER_DEFAULTS, VEHICLE_DEFAULTS } from './decodeThruster'
export { pulsesOverlap } from './wakeCautions'
export { WAKE_DEFAULTS } from './decodeWake'
export {
  setChoice,
  setField,
  setHeld,
  setJet,
  setNumber,
  setRevision,
  setReadings,
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
export type { Json, JsonObject } from './json'
export { JET_COLUMNS, jetTable, type JetOutcome } from './jetTables'
export { checkNumber, numberAt } from './planNumbers'
export { isFieldPath, pathHeading, quantityDefinition, variedDefinition } from './planPaths'
export type { HeldDesign, SpreadSection, SweepField, SweepSection } from './sectionTypes'
export { readLists } from './decodeLists'
export {
  ALL_LIST_KINDS,
  mergeLists,
  putIntoPlan,
  sampleLists,
  takeFromPlan,
  withoutPart,
  withPart,
  withPartNamed,
  writeLists,
  type MergedLists,
} from './lists'
export {
  LIST_KINDS,
  LISTS_ENDING,
  LISTS_FORMAT,
  LISTS_VERSION,
  NO_PARTS,
  type ListEntry,
  type ListKind,
  type ListsReading,
  type PartsLists,
} from './listTypes'
export { migrate, MIGRATIONS, type Migration } from './migrations'
export { holdsMeasuredPulse, MEASURED_PULSE } from './measuredPulse'
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
export { SPREAD_COLUMNS, spreadTable } from './spreadTables'
export {
  pulseSummary,
  SUMMARY_FORMAT,
  SUMMARY_VERSION,
  summaryDocument,
  summaryText,
  thrusterSummary,
  type SummaryInput,
  type SummaryResults,
  type ThrusterOutcome,
} from './summary'
export { summaryNumber, summaryValue, type SummaryValue } from './summaryPaths'
export {
  keptRows,
  mergeSweepParts,
  partNoteText,
  rowsOfPart,
  sweepFileNames,
  SWEEP_PART_FORMAT,
  WHOLE_SWEEP,
  type FoundPart,
  type KeptRows,
  type SweepPart,
  type SweepPartNote,
} from './sweepParts'
export { sweepColumns, sweepLine, sweepResults, sweepTable } from './sweepTables'
export {
  eventTable,
  PULSE_COLUMNS,
  pulseTable,
  trajectoryTable,
  wakeFile,
  wakeFileName,
  wakeTimesTable,
} from './tables'
export {
  ARRIVAL_COLUMNS,
  arrivalsTable,
  PROFILE_COLUMNS,
  profileReadFirst,
  profileTable,
  runMatrixTable,
  TRIGGER_COLUMNS,
  triggerTableText,
} from './tankTables'
export {
  PLAN_FORMAT,
  PLAN_VERSION,
  type Caution,
  type JetSection,
  type ModelsInput,
  type Plan,
  type PlanReading,
  type TrainSection,
  type ViewInput,
  type WakeSection,
} from './types'
export type {
  SpreadBand,
  SpreadFigures,
  SpreadOutcome,
  SpreadQuantity,
  SpreadRefusal,
  SweepOutcome,
  SweepRow,
} from './variedTypes'
export { unknownKeys, unknownKeysInWords } from './unknownKeys'
export {
  isUnitKey,
  shownUnit,
  shownUnits,
  UNIT_GROUPS,
  UNIT_KEYS,
  unitKeyOf,
  type Magnitudes,
  type UnitKey,
  type Units,
} from './unitGroups'
export { validatePlan } from './validate'
export { startsFromJet } from './wakeStart'
export { CORE_WORDS, RING_COLUMNS, type RingColumn, type RingColumnKey } from './wakeFields'
export { canonicalInput, planDocument, planFileName, writePlan } from './writePlan'
export { eachFieldFrame, readFieldFrame, type FieldFrameChoices, type FieldFrameReading } from './fieldCsv'
export { fieldsTable, readingsTable } from './readingsTables'
export { choicesOfColumns, sourceLike, withoutReadings, withReadings } from './readingsMapping'
export { readReadings, type ReadingsReading, type ReadingsTable } from './readingsCsv'
export { READINGS_KINDS, READINGS_ROLES, type ReadingsChoices, type ReadingsRole } from './readingsColumns'
export { READING_NUMBERS, type ReadingNumberKey } from './fieldsReadings'
export { startSearch, startThruster } from './thrusterStart'
