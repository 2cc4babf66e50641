/**
 * Pulses in a row on a vehicle: thrust, power, limits, cruise speed.
 *
 * analyseThruster     everything about one thruster and its vehicle
 * vehicleBudget       every mean figure of a design, in about a microsecond
 * sizeThruster        search for designs: candidates and the front of power against size
 * compileDesigns      many designs priced at their duty points; designMap over two of their fields
 * shapeMoments        what one stroke of a closed shape asks for
 */
export {
  LARGEST_PROXIMITY_LOSS,
  proximityLoss,
  vehicleBudget,
  type Budget,
  type BudgetSetting,
  type ThrusterPower,
} from './budget'
export { MOST_THRUSTERS } from './checkThruster'
export type { Cavitation } from './cavitation'
export type { Cruise, CruiseSpeed } from './cruise'
export { describeDesign, type Binding, type Candidate, type CandidatePoint, type RangeEnd } from './candidates'
export { compileDesigns, type CompiledDesigns, type DesignOptions } from './design'
export { thrusterInputOf } from './designInput'
export { slackOf, type LimitScales } from './designLimits'
export { scaledProgramme } from './designStroke'
export type {
  Design,
  DesignField,
  DesignFigures,
  DesignProblem,
  DutyDemand,
  HeldPoint,
  PointFigures,
} from './designTypes'
export { designMap, type DesignMap, type MapAxis } from './map'
export {
  sizeThruster,
  sweptVolume,
  type FrontDesign,
  type LeastViolated,
  type SizingOptions,
  type SizingResult,
} from './searchThruster'
export {
  SENSITIVITY_FIELDS,
  SPREAD_WIDTH,
  type Sensitivity,
  type SensitivityField,
  type ThrustSpread,
} from './sensitivity'
export { CYCLE_TIMES, type Cycle, type CycleHistory } from './cycle'
export { compileDrag, FRICTION_HELD_BELOW, FRICTION_LINE_FROM, ittcFriction, type DragLaw } from './drag'
export { above, atLeast, atMost, mechanicalLimits } from './limits'
export { MEASURED_BEST_STROKE, ringImpulsePerWork, type RingImpulseCurve, type RingShare } from './ringShare'
export {
  THRUSTER_NOTES,
  type Duty,
  type PlungerFigures,
  type ThrusterInput,
  type ThrusterNote,
  type ThrusterNoteId,
  type ThrusterResult,
} from './resultTypes'
export { budgetSetting } from './setting'
export {
  programmeMoments,
  rampsInTime,
  shapeMoments,
  shapeMomentsInTime,
  type Ramps,
  type StrokeMoments,
} from './shapeMoments'
export { THERE as CRUISE_REACHED, type StartUp } from './startUp'
export { analyseThruster } from './thruster'
export {
  LIMIT_NAMES,
  type ActuatorInput,
  type BayInput,
  type DragInput,
  type DutyPoint,
  type IntakeInput,
  type Limit,
  type LimitName,
  type SearchInput,
  type Span,
  type StockInput,
  type ThrusterSection,
  type VehicleInput,
} from './types'
export { CLOSE_RINGS, type RingSpacing, type Turning } from './vectoring'
