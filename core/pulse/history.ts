/**
 * Sums along one pulse at rising times, for plots and tables.
 */
import { equallySpaced } from '../base'
import { dimensionlessEnergy, quickStartTerms, slugInvariants } from './invariants'
import type { SpeedProgramme } from './programme'
import type { Invariants, PulseHistory } from './types'

/** Equal times of a history, both ends included; corners of the programme come on top. */
export const HISTORY_TIMES = 201
/** A corner this close to an equal time, relative to the stroke, is that time. */
const SAME_TIME = 1e-12

/**
 * Slug sums at 201 equal times and every corner of the programme.
 *
 * @param factors exit factors of the slug
 * @param quickStart whether the start over-pressure applies
 */
export function pulseHistory(
  programme: SpeedProgramme,
  density: number,
  diameter: number,
  factors: Invariants,
  quickStart: boolean,
): PulseHistory {
  const time = historyTimes(programme)
  const columns = {
    exitSpeed: new Array<number>(),
    formationTime: new Array<number>(),
    circulation: new Array<number>(),
    impulse: new Array<number>(),
    energy: new Array<number>(),
    dimensionlessEnergy: new Array<number | null>(),
    circulationQuickStart: new Array<number>(),
  }
  let fastest = 0
  for (const t of time) {
    const speed = programme.speedAt(t)
    const moments = programme.momentsAt(t)
    const slug = slugInvariants(moments, density, diameter, factors)
    // The over-pressure is made while the speed rises and is not taken back when it falls.
    fastest = t >= programme.timeOfPeak ? programme.peakSpeed : Math.max(fastest, speed)
    const start = quickStart ? quickStartTerms(fastest, density, diameter).circulation : 0
    columns.exitSpeed.push(speed)
    columns.formationTime.push(moments.displacement / diameter)
    columns.circulation.push(slug.circulation)
    columns.impulse.push(slug.impulse)
    columns.energy.push(slug.energy)
    columns.dimensionlessEnergy.push(slug.circulation > 0 ? dimensionlessEnergy(slug, density) : null)
    columns.circulationQuickStart.push(slug.circulation + start)
  }
  return { time, ...columns }
}

function historyTimes(programme: SpeedProgramme): number[] {
  const close = SAME_TIME * programme.duration
  const equal = equallySpaced(0, programme.duration, HISTORY_TIMES)
  const step = programme.duration / (HISTORY_TIMES - 1)
  const extra = programme.corners.filter((corner) => {
    const nearest = equal[Math.round(corner / step)]
    return nearest === undefined || Math.abs(nearest - corner) > close
  })
  return [...equal, ...extra].sort((a, b) => a - b)
}
