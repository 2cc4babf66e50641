/** The sections `tankRun`, `sweep`, `spread` and `held` as they are saved. */
import type { MatrixInput, TankRunSection, TankTarget } from '../tank'
import type { Json, JsonObject } from './json'
import { merged, mergedList, objectOf, type Part } from './mergedDocument'
import type { HeldDesign, SpreadSection, SweepSection } from './sectionTypes'

export function tankRunDocument(source: Json | undefined, section: TankRunSection): JsonObject {
  const old = objectOf(source)
  const { tank, nozzleDepth, stations, controllerStep, target, camera, trigger, drive, practice, matrix } = section
  return merged(source, {
    tank: merged(old['tank'], { ...tank }),
    nozzleDepth,
    stations: [...stations],
    controllerStep,
    target: target === null ? null : targetDocument(old['target'], target),
    camera: merged(old['camera'], { ...camera, pixels: [...camera.pixels] }),
    trigger: merged(old['trigger'], { ...trigger }),
    drive: merged(old['drive'], { ...drive }),
    practice: merged(old['practice'], { ...practice }),
    matrix: matrix === null ? null : matrixDocument(old['matrix'], matrix),
  })
}

/** The key names the kind: `{ circulation }`, `{ reynolds }` or `{ speed, station }`; those of another kind go with it. */
function targetDocument(source: Json | undefined, target: TankTarget): JsonObject {
  const others =
    target.kind in objectOf(source)
      ? {}
      : { circulation: undefined, reynolds: undefined, speed: undefined, station: undefined }
  return target.kind === 'speed'
    ? merged(source, { ...others, speed: target.value, station: target.station })
    : merged(source, { ...others, [target.kind]: target.value })
}

function matrixDocument(source: Json | undefined, { fields, blocks, ...plain }: MatrixInput): JsonObject {
  const ends = { from: undefined, to: undefined, count: undefined }
  const rows = fields.map(({ path, values }): Part => ({ path, values: [...values], ...ends }))
  return merged(source, {
    fields: mergedList(objectOf(source)['fields'], rows),
    ...plain,
    blocks: [...blocks],
  })
}

/** Steps are written as they were given, by ends and count; other levels as their list. */
export function sweepDocument(source: Json | undefined, { fields, results }: SweepSection): JsonObject {
  const none = { from: undefined, to: undefined, count: undefined, values: undefined }
  const rows = fields.map(({ path, values, given }): Part => ({
    path,
    ...none,
    ...(given === null ? { values: [...values] } : given),
  }))
  return merged(source, { fields: mergedList(objectOf(source)['fields'], rows), results: [...results] })
}

export function spreadDocument(
  source: Json | undefined,
  { relative, absolute, samples, seed }: SpreadSection,
): JsonObject {
  return merged(source, { relative: { ...relative }, absolute: { ...absolute }, samples, seed })
}

/** Nothing where no design is held and the document has no such list. */
export function heldDocument(source: Json | undefined, held: readonly HeldDesign[]): Json | undefined {
  if (held.length === 0 && source === undefined) return undefined
  return mergedList(
    source,
    held.map(({ name, plan }): Part => ({ name, plan })),
  )
}
