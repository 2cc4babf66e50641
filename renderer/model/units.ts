/**
 * Units as shown: the groups and their choice are the plan's own (`core/plan/unitGroups.ts`, where a group is added), so that print
 * shows a number as the window does.
 */
export {
  isUnitKey,
  shownUnit,
  shownUnits,
  UNIT_GROUPS,
  UNIT_KEYS,
  unitKeyOf,
  type Magnitudes,
  type UnitKey,
  type Units,
} from '../../core/plan'
