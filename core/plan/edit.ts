/**
 * Changes of a plan as pure functions: each returns a new plan, the old one stays what it was.
 */
import { DomainError } from '../base'
import { compileProgramme, withStroke, type ProgrammeInput, type ProgrammeRow } from '../pulse'
import type { ReadingsSection, TankRunSection } from '../tank'
import type { ThrusterSection } from '../thruster'
import type { ChoicePath, FieldPath } from './fields'
import { waterProperties, type WaterInput } from '../water'
import { JET_DEFAULTS } from './decodeJet'
import { READINGS_DEFAULTS } from './decodeReadings'
import { SPREAD_DEFAULTS, SWEEP_DEFAULTS } from './decodeSweep'
import { TANK_RUN_DEFAULTS } from './decodeTankRun'
import { THRUSTER_DEFAULTS, VEHICLE_DEFAULTS } from './decodeThruster'
import { WAKE_DEFAULTS } from './decodeWake'
import { dragOfKind, present, tankTargetOfKind, withKindOf, withValue } from './editPath'
import { isFieldPath, quantityDefinition } from './planPaths'
import type { HeldDesign, SpreadSection, SweepSection } from './sectionTypes'
import type { JetSection, Plan, TrainSection, WakeSection } from './types'

/**
 * Set one number of the plan [SI]. The stroke of a table is set by stretching its times.
 *
 * The value is not checked here: `validatePlan` tells what the changed plan breaks.
 */
export function setField(plan: Plan, path: FieldPath, value: number | null): Plan {
  if (path === 'programme.stroke' && plan.programme.shape === 'table' && value !== null)
    return { ...plan, programme: stretched(plan.programme, value) }
  return withKindOf(plan, path, value) ?? withValue(plan, path, value)
}

/**
 * As setField for any number of the plan by its dotted path, items of lists included (`wake.stations.0`): what sweeps,
 * spread and matrices set.
 *
 * @throws {DomainError} if the plan knows no number at the path
 */
export function setNumber(plan: Plan, path: string, value: number): Plan {
  if (isFieldPath(path)) return setField(plan, path, value)
  if (quantityDefinition(path) === null)
    throw new DomainError('path', `path must be the dotted path of a number of the plan, got "${path}"`)
  return withValue(plan, path, value)
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
  if (path === 'thruster.vehicle.drag.kind') {
    const vehicle = plan.thruster?.vehicle ?? VEHICLE_DEFAULTS
    return withValue(plan, 'thruster.vehicle.drag', dragOfKind(vehicle.drag, value))
  }
  if (path === 'tankRun.target.kind') return withValue(plan, 'tankRun.target', tankTargetOfKind(plan, value))
  const changed = withValue(plan, path, value)
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

/** Set the revision of the design, as its owner counts. */
export function setRevision(plan: Plan, revision: string): Plan {
  return { ...plan, revision }
}

/** Set the unit a dimension is shown in. */
export function setUnit(plan: Plan, dimension: string, unit: string): Plan {
  return { ...plan, view: { ...plan.view, units: { ...plan.view.units, [dimension]: unit } } }
}

/** Set parts of the wake section, which is added where it was absent: rings, nozzles, wall, stations, viscous. */
export function setWake(plan: Plan, change: Partial<WakeSection>): Plan {
  return { ...plan, wake: { ...(plan.wake ?? WAKE_DEFAULTS), ...change } }
}

/** Set parts of the section of the starting jet, which is added where it was absent; null takes it out. */
export function setJet(plan: Plan, change: Partial<JetSection> | null): Plan {
  return { ...plan, jet: change === null ? null : { ...(plan.jet ?? JET_DEFAULTS), ...change } }
}

/** Set the train, or take it out with null: one pulse. */
export function setTrain(plan: Plan, train: TrainSection | null): Plan {
  return { ...plan, train }
}

/** Set parts of the section of the vehicle's thrusters, which is added where it was absent; null takes it out. */
export function setThruster(plan: Plan, change: Partial<ThrusterSection> | null): Plan {
  return { ...plan, thruster: change === null ? null : { ...(plan.thruster ?? THRUSTER_DEFAULTS), ...change } }
}

/** Set parts of the section of the tank run, which is added where it was absent; null takes it out. */
export function setTankRun(plan: Plan, change: Partial<TankRunSection> | null): Plan {
  return { ...plan, tankRun: change === null ? null : { ...(plan.tankRun ?? TANK_RUN_DEFAULTS), ...change } }
}

/** Set parts of the readings, which are added where they were absent; null takes them out. */
export function setReadings(plan: Plan, change: Partial<ReadingsSection> | null): Plan {
  return { ...plan, readings: change === null ? null : { ...(plan.readings ?? READINGS_DEFAULTS), ...change } }
}

/** Set parts of the sweep, which is added where it was absent; null takes it out. */
export function setSweep(plan: Plan, change: Partial<SweepSection> | null): Plan {
  return { ...plan, sweep: change === null ? null : { ...(plan.sweep ?? SWEEP_DEFAULTS), ...change } }
}

/** Set parts of the spread, which is added where it was absent; null takes it out. */
export function setSpread(plan: Plan, change: Partial<SpreadSection> | null): Plan {
  return { ...plan, spread: change === null ? null : { ...(plan.spread ?? SPREAD_DEFAULTS), ...change } }
}

/** Hold these designs against the plan. */
export function setHeld(plan: Plan, held: readonly HeldDesign[]): Plan {
  return { ...plan, held }
}
