/** Columns and values of an edited table. */
import { formatFull, formatQuantity, type Dimension } from '../../core/quantity'
import type { FieldLimits } from '../model/fieldCheck'

export type GridValue = number | string | null

export interface GridColumn {
  readonly key: string
  readonly label: string
  /** Shown unit, '' for none; it stands in the heading. */
  readonly unit: string
  readonly dimension: Dimension
  readonly help: string
  readonly limits?: FieldLimits
  /** Words by key where the column is a choice. */
  readonly options?: Readonly<Record<string, string>>
  /** True for a row whose value cannot be edited here. */
  readonly fixed?: (row: number) => boolean
}

/** Stands in a cell that has no value of its own. */
export const NO_VALUE = '—'

/** A value as its cell shows it; the unit stands in the heading. */
export function cellText(value: GridValue, column: GridColumn | undefined): string {
  if (value === null || column === undefined) return ''
  if (typeof value === 'string') return column.options?.[value] ?? value
  return formatQuantity(value, column.unit).split('\u00A0')[0] ?? ''
}

/** All digits of a value, for its title. */
export function cellTitle(value: GridValue, column: GridColumn | undefined): string {
  return typeof value === 'number' && column !== undefined ? formatFull(value, column.unit) : ''
}
