/** A comparison written out: its part of the summary, the readings with what the fit leaves, the numbers of each velocity field. */
import type { ReadingRow, ReadingsResult, RunFit } from '../tank'
import { writeCsv } from './csvWriter'

/** The section `readings` of the summary: fits, force, fields and verdicts, without the rows and paths of a table. */
export function readingsSummary(result: ReadingsResult): object {
  const { force, fields } = result
  return {
    status: result.status,
    message: result.message,
    fit: result.fit,
    correlation: result.correlation,
    fitted: result.fitted,
    held: result.held,
    residualRms: result.residualRms,
    rows: result.rows,
    perRun: result.perRun.map(runSummary),
    repeats: result.repeats,
    ring: result.ring,
    force: force === null ? null : without(force, ['cycle']),
    fields: fields === null ? null : { ...without(fields, ['frames']), frames: fields.frames.length },
    prediction: result.prediction,
    verdicts: result.verdicts,
    sensitivities: result.sensitivities,
    notes: result.notes,
  }
}

function runSummary({ run, status, message, fit, correlation, residualRms, rows, reducedChiSquare }: RunFit): object {
  return { run, status, message, fit, correlation, residualRms, rows, reducedChiSquare }
}

function without<T extends object>(part: T, keys: readonly (keyof T & string)[]): object {
  const left: readonly string[] = keys
  return Object.fromEntries(Object.entries(part).filter(([key]) => !left.includes(key)))
}

export const READINGS_COLUMNS = [
  'run',
  'time (s)',
  'quantity',
  'measured',
  'unit',
  'uncertainty',
  'fitted',
  'residual',
  'outlier',
] as const

const UNITS = { x: 'm', radius: 'm', circulation: 'm2/s' } as const
const SIGMAS = { x: 'sigmaX', radius: 'sigmaRadius', circulation: 'sigmaCirculation' } as const
const QUANTITIES = ['x', 'radius', 'circulation'] as const

/** readings.csv: every number that was read, after calibration, and what the fit of all runs leaves of it; empty where it is not in the fit. */
export function readingsTable({ calibrated, residuals }: ReadingsResult): string {
  const left = new Map(residuals.map((one) => [`${one.row} ${one.quantity}`, one]))
  return writeCsv(
    READINGS_COLUMNS,
    calibrated.flatMap((row: ReadingRow, index) =>
      QUANTITIES.flatMap((quantity) => {
        const value = row[quantity]
        if (value === null) return []
        const one = left.get(`${index} ${quantity}`) ?? null
        return [
          [
            row.run,
            row.time,
            quantity,
            value,
            UNITS[quantity],
            row[SIGMAS[quantity]],
            one?.model ?? null,
            one?.residual ?? null,
            one === null ? null : one.outlier ? 'yes' : 'no',
          ],
        ]
      }),
    ),
  )
}

export const FIELD_COLUMNS = [
  'time (s)',
  'formation time',
  'total circulation (m2/s)',
  'circulation error (m2/s)',
  'ring circulation (m2/s)',
  'ring circulation by contour (m2/s)',
  'ring x (m)',
  'ring radius (m)',
  'ring core radius (m)',
  'ring impulse (N s)',
  'peak vorticity (1/s)',
  'filled vectors',
] as const

/** readings-fields.csv: one row a velocity field. */
export function fieldsTable({ fields }: ReadingsResult): string {
  return writeCsv(
    FIELD_COLUMNS,
    (fields?.frames ?? []).map(({ ring, ...frame }) => [
      frame.time,
      frame.formationTime,
      frame.totalCirculation,
      frame.circulationError,
      ring?.circulation ?? null,
      ring?.circulationByContour ?? null,
      ring?.x ?? null,
      ring?.radius ?? null,
      ring?.coreRadius ?? null,
      ring?.impulse ?? null,
      frame.peakVorticity,
      frame.filled,
    ]),
  )
}
