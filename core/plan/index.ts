/**
 * The plan document: reading and writing it, its fields and choices, edits, examples, cautions, and the tables written out.
 */
export { CAUTIONS, cautionsFor } from './cautions'
export type { CautionContext, CautionDefinition, CautionGroup } from './cautionTypes'
export { readProgrammeCsv, type ProgrammeReading } from './csvReader'
export { writeCsv, type Cell } from './csvWriter'
export { checkField } from './decodeFields'
export { decodePlan, LARGEST_PLAN, readPlan } from './decodePlan'
export { setChoice, setField, setRows, setStrokeRatio, setTitle, setUnit } from './edit'
export { defaultPlan, examplePlan, EXAMPLES, type Example } from './examples'
export { CHOICES, fieldDefinition, FIELDS, type ChoicePath, type FieldDefinition, type FieldPath } from './fields'
export { migrate, MIGRATIONS, type Migration } from './migrations'
export { PULSE_COLUMNS, pulseTable, SUMMARY_FORMAT, SUMMARY_VERSION, summaryText, type SummaryInput } from './tables'
export {
  PLAN_FORMAT,
  PLAN_VERSION,
  type Caution,
  type Json,
  type JsonObject,
  type ModelsInput,
  type Plan,
  type PlanReading,
  type ViewInput,
} from './types'
export { validatePlan } from './validate'
export { canonicalInput, planDocument, planFileName, writePlan } from './writePlan'
