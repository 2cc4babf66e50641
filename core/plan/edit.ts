/**
 * Changes of a plan as pure functions: each returns a new plan, the old one stays what it was.
 */
import { DomainError } from '../base'
import { compileProgramme, withStroke, type ProgrammeInput, type ProgrammeRow } from '../pulse'
import type { ChoicePath, FieldPath } from './fields'
import { waterProperties, type WaterInput } from '../water'
import { WAKE_DEFAULTS } from './decodeWake'
import type { Plan, TrainSection, WakeSection } from './types'

/** A plan with one section present again after a change in it. */
function present(plan: Plan, section: string): Plan {
  return plan.absent.some((name) => name === section)
    ? { ...plan, absent: plan.absent.filter((name) => name !== section) }
    : plan
}

function split(path: string): readonly [string, string] {
  const dot = path.indexOf('.')
  return [path.slice(0, dot), path.slice(dot + 1)]
}

/** What an absent section starts from when one of its values is set. */
const EMPTY: Partial<Record<EditedSection, TrainSection | WakeSection>> = {
  train: { pulses: 1, period: 1 },
  wake: WAKE_DEFAULTS,
}

function replace(plan: Plan, section: EditedSection, key: string, value: number | string | null): Plan {
  const old = plan[section] ?? EMPTY[section]
  if (typeof old !== 'object') return plan
  return { ...present(plan, section), [section]: { ...old, [key]: value } }
}

type EditedSection = 'water' | 'nozzle' | 'programme' | 'ambient' | 'models' | 'train' | 'wake'

function isSection(name: string): name is EditedSection {
  return ['water', 'nozzle', 'programme', 'ambient', 'models', 'train', 'wake'].includes(name)
}

/**
 * Set one number of the plan [SI]. The stroke of a table is set by stretching its times.
 *
 * The value is not checked here: `validatePlan` tells what the changed plan breaks.
 */
export function setField(plan: Plan, path: FieldPath, value: number | null): Plan {
  if (path === 'programme.stroke' && plan.programme.shape === 'table' && value !== null)
    return { ...plan, programme: stretched(plan.programme, value) }
  const [section, key] = split(path)
  return isSection(section) ? replace(plan, section, key, value) : plan
}

/** A table stretched to a stroke; left as it is where rows or stroke are unusable, which the decoder then tells. */
function stretched(programme: ProgrammeInput, stroke: number): ProgrammeInput {
  return unlessRefused(() => withStroke(programme, stroke)) ?? { ...programme, stroke }
}

/** A table with the stroke and peak speed its rows give; other shapes, and unusable rows, as they are. */
function ruledByRows(programme: ProgrammeInput): ProgrammeInput {
  if (programme.shape !== 'table') return programme
  const compiled = unlessRefused(() => compileProgramme(programme))
  return compiled === null ? programme : { ...programme, stroke: compiled.stroke, peakSpeed: compiled.peakSpeed }
}

function unlessRefused<T>(make: () => T): T | null {
  try {
    return make()
  } catch (error) {
    if (error instanceof DomainError) return null
    throw error
  }
}

/** Set the stroke as a number of exit diameters. */
export function setStrokeRatio(plan: Plan, ratio: number): Plan {
  return setField(plan, 'programme.stroke', ratio * plan.nozzle.diameter)
}

/** Set one choice of the plan; `value` is a key of CHOICES[path]. */
export function setChoice(plan: Plan, path: ChoicePath, value: string): Plan {
  const [section, key] = split(path)
  if (!isSection(section)) return plan
  const changed = replace(plan, section, key, value)
  if (path === 'water.kind' && value === 'given') return { ...changed, water: givenFrom(plan.water) }
  return { ...changed, programme: ruledByRows(changed.programme) }
}

/** Given water that starts from what the water was, so that nothing jumps and there is something to change. */
function givenFrom(water: WaterInput): WaterInput {
  const found = unlessRefused(() => waterProperties(water))
  if (found === null) return { ...water, kind: 'given' }
  return {
    ...water,
    kind: 'given',
    density: water.density ?? found.density,
    kinematicViscosity: water.kinematicViscosity ?? found.kinematicViscosity,
    vapourPressure: water.vapourPressure ?? found.vapourPressure,
  }
}

/** Make the programme a table of these rows. */
export function setRows(plan: Plan, rows: readonly ProgrammeRow[]): Plan {
  return { ...present(plan, 'programme'), programme: ruledByRows({ ...plan.programme, shape: 'table', rows }) }
}

export function setTitle(plan: Plan, title: string): Plan {
  return { ...plan, title }
}

/** Set the unit a dimension is shown in. */
export function setUnit(plan: Plan, dimension: string, unit: string): Plan {
  return { ...plan, view: { ...plan.view, units: { ...plan.view.units, [dimension]: unit } } }
}

/** Set parts of the wake section, which is added where it was absent: rings, nozzles, wall, stations, viscous. */
export function setWake(plan: Plan, change: Partial<WakeSection>): Plan {
  return { ...plan, wake: { ...(plan.wake ?? WAKE_DEFAULTS), ...change } }
}

/** Set the train, or take it out with null: one pulse. */
export function setTrain(plan: Plan, train: TrainSection | null): Plan {
  return { ...plan, train }
}
