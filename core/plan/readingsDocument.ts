/** The section `readings` as it is saved: only what is there, so that rows stay short. */
import type { ReadingRow, ReadingsSection } from '../tank'
import { forceDocument } from './decodeForceLog'
import { READINGS_DEFAULTS } from './decodeReadings'
import type { Json, JsonObject } from './json'
import { merged, mergedList, objectOf, type Part } from './mergedDocument'

export function readingsDocument(source: Json | undefined, section: ReadingsSection): JsonObject {
  const old = objectOf(source)
  const { rows, force, piston, fit, calibration, sources, fields, standResonance } = section
  const { timeOffset, lengthOffset, lengthScale } = READINGS_DEFAULTS.calibration
  const calibrates =
    'calibration' in old ||
    calibration.timeOffset !== timeOffset ||
    calibration.lengthOffset !== lengthOffset ||
    calibration.lengthScale !== lengthScale
  return merged(source, {
    rows: mergedList(old['rows'], rows.map(rowDocument)),
    force: forceDocument(force),
    piston: piston.length === 0 ? undefined : piston.map((row) => ({ ...row })),
    fit: [...fit],
    calibration: calibrates ? merged(old['calibration'], { ...calibration }) : undefined,
    sources:
      sources.length === 0
        ? undefined
        : mergedList(
            old['sources'],
            sources.map((file): Part => ({ ...file, columns: file.columns.map((column) => ({ ...column })) })),
          ),
    fields:
      fields === null
        ? undefined
        : merged(old['fields'], { frames: fields.frames.map((frame) => ({ ...frame })), hash: fields.hash }),
    standResonance: standResonance ?? undefined,
  })
}

function rowDocument(row: ReadingRow): Part {
  return {
    run: row.run,
    time: row.time,
    x: row.x ?? undefined,
    radius: row.radius ?? undefined,
    circulation: row.circulation ?? undefined,
    sigmaX: row.sigmaX ?? undefined,
    sigmaRadius: row.sigmaRadius ?? undefined,
    sigmaCirculation: row.sigmaCirculation ?? undefined,
  }
}
