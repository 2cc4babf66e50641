/**
 * Quantities of the record in the plan's chosen units; where none was chosen, a unit moves to its neighbour with the size of the number.
 */
import { shownUnit, UNIT_GROUPS, unitKeyOf, type FieldDefinition, type Plan, type UnitKey } from '../../plan'
import { formatNumber, formatQuantity, formatRange, fromBase } from '../../quantity'
import type { DocumentColumn } from '../document/types'

/** Stands where there is no value. */
export const NONE = '—'
/** Stands for a value without a bound, as the force on a piston whose speed jumps. */
const UNBOUNDED = 'without bound'

const INPUT_DIGITS = 6
const RESULT_DIGITS = 3

type Known = number | null | undefined

export interface Show {
  /** A value as it was typed, to six digits. */
  input(value: number, path: string, definition: FieldDefinition): string
  /** A result to three digits where no other count is given; a dash where there is none. */
  result(value: Known, key: UnitKey, digits?: number): string
  /** Two ends, told once where they look the same. */
  range(low: Known, high: Known, key: UnitKey): string
  /** Unit for all of these together. */
  unit(key: UnitKey, values: readonly Known[]): string
  /** A column of numbers under one heading with its unit. */
  column(title: string, key: UnitKey, values: readonly Known[], digits?: number): ShownColumn
}

export interface ShownColumn {
  readonly column: DocumentColumn
  readonly cells: readonly string[]
}

/** How quantities of a plan are shown. */
export function showOf(plan: Plan): Show {
  const unitAt = (key: UnitKey, size: number): string => shownUnit(key, plan.view.units, Math.abs(size))
  const unit = (key: UnitKey, values: readonly Known[]): string =>
    unitAt(
      key,
      values.reduce<number>((most, value) => Math.max(most, isKnown(value) ? Math.abs(value) : 0), 0),
    )
  return {
    input(value, path, definition) {
      if (definition.minutes === true) return `${formatNumber(value, INPUT_DIGITS)}\u00A0min`
      const key = unitKeyOf(path, definition.dimension)
      const chosen = unitAt(key, value)
      return formatQuantity(value, readable(value, chosen, key), INPUT_DIGITS)
    },
    result: (value, key, digits = RESULT_DIGITS) => {
      if (value === null || value === undefined) return NONE
      if (!Number.isFinite(value)) return Number.isNaN(value) ? NONE : UNBOUNDED
      return formatQuantity(value, unitAt(key, value), digits)
    },
    range(low, high, key) {
      const ends = [low, high].filter(isKnown)
      const [first, second = first] = ends
      if (first === undefined || second === undefined) return NONE
      const { text, unit: shown } = formatRange(
        first,
        second,
        unit(key, ends),
        key === 'number' ? RESULT_DIGITS : digitsOf(first, second),
      )
      return shown === '' ? text : `${text}\u00A0${shown}`
    },
    unit,
    column(title, key, values, digits = RESULT_DIGITS) {
      const shown = unit(key, values)
      const numbers = values.map((value) => (isKnown(value) ? fromBase(value, shown) : value))
      return {
        column: { title: shown === '' ? title : `${title} (${shown})`, numeric: true },
        cells: aligned(numbers, digits),
      }
    },
  }
}

/** Numbers of a column with one count of decimals, as many as the largest needs; each its own way where one would show as nothing. */
function aligned(values: readonly Known[], digits: number): string[] {
  const known = values.filter(isKnown)
  const most = known.reduce((size, value) => Math.max(size, Math.abs(value)), 0)
  const decimals = most === 0 ? 0 : digits - 1 - Math.floor(Math.log10(most))
  const least = 0.5 * 10 ** -decimals
  const alike = decimals >= 0 && decimals <= 6 && known.every((value) => value === 0 || Math.abs(value) >= 20 * least)
  return values.map((value) => {
    if (value === null || value === undefined || Number.isNaN(value)) return NONE
    if (!Number.isFinite(value)) return UNBOUNDED
    return alike ? value.toFixed(decimals).replace('-', '\u2212') : formatNumber(value, digits)
  })
}

/** One digit more where the smaller end has one order less: else it would show less than the adopted value beside it. */
function digitsOf(a: number, b: number): number {
  const [low, high] = [a, b].map((value) => Math.floor(Math.log10(Math.abs(value))))
  return low !== undefined && high !== undefined && Math.abs(high - low) === 1 ? RESULT_DIGITS + 1 : RESULT_DIGITS
}

function isKnown(value: Known): value is number {
  return typeof value === 'number' && Number.isFinite(value)
}

/** Very small lengths are read in micrometres: a pixel's pitch, a wavelength. */
function readable(value: number, unit: string, key: UnitKey): string {
  return UNIT_GROUPS[key].dimension === 'length' && unit === 'mm' && value !== 0 && Math.abs(value) < 1e-4 ? 'µm' : unit
}

/** Percent of a share, to three digits; what is next to nothing or far beyond all is told in words. */
export function percent(share: Known): string {
  if (isKnown(share) && share !== 0 && Math.abs(share) < 1e-4) return 'below 0.01\u00A0%'
  if (isKnown(share) && share > 9.995) return 'above 1000\u00A0%'
  return isKnown(share) ? `${formatNumber(100 * share, RESULT_DIGITS)}\u00A0%` : NONE
}

/** A pure number to three digits. */
export function plain(value: Known): string {
  return isKnown(value) ? formatNumber(value, RESULT_DIGITS) : NONE
}

/** A duration in words of the day. */
export function duration(seconds: Known): string {
  if (!isKnown(seconds)) return NONE
  if (seconds < 120) return `${formatNumber(seconds, RESULT_DIGITS)}\u00A0s`
  const minutes = Math.round(seconds / 60)
  const hours = Math.floor(minutes / 60)
  return hours === 0 ? `${minutes}\u00A0min` : `${hours}\u00A0h ${String(minutes % 60).padStart(2, '0')}\u00A0min`
}

/** Columns side by side as a table. */
export function tableOf(
  caption: string | null,
  first: { readonly title: string; readonly cells: readonly string[] },
  columns: readonly ShownColumn[],
): { readonly kind: 'table'; caption: string | null; columns: DocumentColumn[]; rows: string[][] } {
  return {
    kind: 'table',
    caption,
    columns: [{ title: first.title }, ...columns.map(({ column }) => column)],
    rows: first.cells.map((cell, row) => [cell, ...columns.map(({ cells }) => cells[row] ?? NONE)]),
  }
}
