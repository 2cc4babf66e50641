/** What is known of one number of the plan. */
import type { Dimension } from '../quantity'

export interface FieldDefinition {
  readonly label: string
  readonly dimension: Dimension
  readonly min?: number
  readonly max?: number
  /** Exclusive lower limit. */
  readonly above?: number
  /** What it is, in a sentence, for the field's help. */
  readonly help: string
  /** True where null is allowed and means "not given". */
  readonly optional?: boolean
  /** True where only whole numbers are meant. */
  readonly whole?: boolean
  /** True where minutes are stored, by the contract, as a plain number; a text such as "5 min" or "2 h" is read too. */
  readonly minutes?: boolean
}
