/**
 * Rings anywhere in space, and the one door to both engines of rings in motion.
 */
export { NODE_LIMIT } from './mesh'
export { PLAIN_NOZZLE, ringsOfNozzles, type WakeNozzle } from './nozzles'
export { wakePolyData } from './polyData'
export { sharedAxis, type Axis, type AxisFinding } from './sharedAxis'
export type { Wake, WakeFrame, WakeInput, WakeModel, WakeOptions, WakeRing, WakeTrajectory, WakeWall } from './types'
export { acrossOf, type Vector } from './vector'
export { marchWake } from './wake'
export { WAKE_CIRCLE_NODES, wakeFrame, type RingShape } from './wakeFrame'
export {
  EVENT_COLUMNS,
  eventRows,
  TRAJECTORY_COLUMNS,
  trajectoryRows,
  wakeSummary,
  type WakeSummary,
} from './wakeTables'
export { carryDye, MOST_DYE, MOST_DYE_OUTPUTS, type DyeInput } from './dye'
export { fieldPlane, isOnJetAxis, MOST_FIELD_OUTPUTS, type FieldPlane, type FieldQuantity } from './fieldPlane'
export { WakeFlow, type FlowSurroundings } from './wakeFlow'
