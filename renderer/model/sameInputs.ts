/**
 * Whether two plans have the same results of a part: what the part does not read may differ.
 */
import type { Plan } from '../../core/plan'

/** The same pulse: the jet counts only where the plan adopts a value of it. */
export function samePulse(a: Plan, b: Plan): boolean {
  const { overPressure, formationNumber } = b.models
  const adopted = overPressure === 'computed' || formationNumber === 'computed'
  return (
    a.water === b.water &&
    a.nozzle === b.nozzle &&
    a.programme === b.programme &&
    a.ambient === b.ambient &&
    a.models === b.models &&
    (!adopted || a.jet === b.jet)
  )
}

/** The same figures of the thruster. */
export function sameThruster(a: Plan, b: Plan): boolean {
  return samePulse(a, b) && a.train === b.train && a.thruster === b.thruster
}

/** The same run in the tank, where a ring ages as on the wake. */
export function sameTankRun(a: Plan, b: Plan): boolean {
  return samePulse(a, b) && a.wake?.ageing === b.wake?.ageing && a.tankRun === b.tankRun
}
