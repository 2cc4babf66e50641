/** The section `thruster` as it is saved: SI numbers, every key, what this version does not know kept. */
import type { DragInput, DutyPoint, SearchInput, ThrusterSection, VehicleInput } from '../thruster'
import type { Json, JsonObject } from './json'
import { merged, mergedList, objectOf, type Part } from './mergedDocument'

export function thrusterDocument(source: Json | undefined, section: ThrusterSection): JsonObject {
  const old = objectOf(source)
  const { vehicle, actuator, intake, bay, target, search, manufacture, ...plain } = section
  const { energyStore, ...first } = plain
  return merged(source, {
    ...first,
    vehicle: vehicle === null ? null : vehicleDocument(old['vehicle'], vehicle),
    actuator: merged(old['actuator'], { ...actuator }),
    intake: merged(old['intake'], { ...intake }),
    bay: merged(old['bay'], { ...bay }),
    energyStore,
    target: targetDocument(old['target'], target),
    search: search === null ? null : searchDocument(old['search'], search),
    manufacture: merged(old['manufacture'], { ...manufacture }),
  })
}

function vehicleDocument(source: Json | undefined, { drag, ...plain }: VehicleInput): JsonObject {
  const old = objectOf(source)
  return merged(source, { ...plain, drag: drag === null ? null : dragDocument(old['drag'], drag) })
}

/** Keys of the other kinds go when the kind changes; beside a kind that stands they are kept like any other key. */
const NO_DRAG: Part = { dragArea: undefined, wettedArea: undefined, formFactor: undefined, rows: undefined }

function dragDocument(source: Json | undefined, drag: DragInput): JsonObject {
  const old = objectOf(source)
  const others = old['kind'] === drag.kind ? {} : NO_DRAG
  const { kind, ...values } = drag
  if ('rows' in values)
    return merged(source, { kind, ...others, rows: mergedList(old['rows'], values.rows.map(plainCopy)) })
  return merged(source, { kind, ...others, ...values })
}

function plainCopy(item: Part): Part {
  return { ...item }
}

/** One duty point as an object, several as a list, none as null. */
function targetDocument(source: Json | undefined, target: readonly DutyPoint[]): Json {
  const points = target.map((point): Part => ({ speed: undefined, thrust: undefined, ...point }))
  const [only] = points
  if (only === undefined) return null
  return points.length === 1 ? merged(Array.isArray(source) ? source[0] : source, only) : mergedList(source, points)
}

function searchDocument(source: Json | undefined, search: SearchInput): JsonObject {
  const { stock, ejectShare, diameter, strokeRatio, frequency, count, seed, goal } = search
  return merged(source, {
    diameter: [...diameter],
    strokeRatio: [...strokeRatio],
    frequency: [...frequency],
    count: [...count],
    ejectShare: ejectShare === null ? null : [...ejectShare],
    stock:
      stock === null
        ? null
        : merged(objectOf(source)['stock'], { diameters: [...stock.diameters], strokes: [...stock.strokes] }),
    seed,
    goal,
  })
}
