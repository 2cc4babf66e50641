/**
 * Lists of parts the user owns: nozzles, actuators, vehicles, tanks, cameras. A file of its own beside the plans; a part is picked into a
 * plan by copy, so that a plan never depends on a list.
 */
import type { Problem } from '../base'
import type { JsonObject } from './json'

export const LISTS_FORMAT = 'ringwright-lists'
export const LISTS_VERSION = 1
export const LISTS_ENDING = '.ringwright-lists.json'

/** Each kind with the part of the plan it fills and the word for one of it. */
export const LIST_KINDS = {
  nozzles: { path: 'nozzle', title: 'Nozzles', one: 'nozzle' },
  actuators: { path: 'thruster.actuator', title: 'Actuators', one: 'actuator' },
  vehicles: { path: 'thruster.vehicle', title: 'Vehicles', one: 'vehicle' },
  tanks: { path: 'tankRun.tank', title: 'Tanks', one: 'tank' },
  cameras: { path: 'tankRun.camera', title: 'Cameras', one: 'camera' },
} as const
export type ListKind = keyof typeof LIST_KINDS

export interface ListEntry {
  readonly name: string
  /** By the keys of the plan's own part, SI. */
  readonly values: JsonObject
}

export type PartsLists = Readonly<Record<ListKind, readonly ListEntry[]>>

export type ListsReading =
  { readonly ok: true; readonly lists: PartsLists } | { readonly ok: false; readonly problems: readonly Problem[] }

export const NO_PARTS: PartsLists = { nozzles: [], actuators: [], vehicles: [], tanks: [], cameras: [] }
