/**
 * What the run asks of the laboratory: how long to wait, whether the start is sudden enough, whether flow and ring are laminar.
 */
import { requireRange } from '../base'
import { ageingRegime, LAMINAR_BELOW, TURBULENT_ABOVE, type AgeingRegime } from '../ring'
import type { PracticeInput } from './types'

/** Waiting over the time the ring needs to its last station (common practice). */
export const WAITING_OVER_PASSAGE = 10
/** Reynolds number of steady flow in a tube up to which it stays laminar (textbook value). */
export const TUBE_LAMINAR_BELOW = 2300

export interface SettlingInput {
  readonly practice: PracticeInput
  /** Latest arrival at the last station [s]; null where none is seen. */
  readonly lastArrival: number | null
  /** Peak speed x diameter / viscosity. */
  readonly jetReynolds: number
  /** Ring Reynolds numbers of the range, rising; empty without a ring. */
  readonly ringReynolds: readonly number[]
  /** nu [m2/s] */
  readonly kinematicViscosity: number
  /** Peak speed x time to 95 % of it / D: as planned and as the rounded profile moves. */
  readonly startFormationTime: readonly [planned: number, rounded: number]
}

export interface Settling {
  /** Between two runs [s]. */
  readonly settlingTime: number
  readonly ruledBy: 'practice' | 'passage'
  readonly text: string
  readonly ring: { readonly regime: AgeingRegime | null; readonly text: string }
  readonly jet: { readonly laminar: boolean; readonly text: string }
  readonly start: { readonly impulsive: boolean; readonly text: string }
}

/** @throws {DomainError} on tankRun.practice… */
export function settling(input: SettlingInput): Settling {
  const { practice, lastArrival } = input
  requireRange('tankRun.practice.settlingMinutes', practice.settlingMinutes, { min: 0, unit: 'min' })
  requireRange('tankRun.practice.impulsiveStart', practice.impulsiveStart, { above: 0 })
  const byPractice = 60 * practice.settlingMinutes
  const byPassage = WAITING_OVER_PASSAGE * (lastArrival ?? 0)
  const settlingTime = Math.max(byPractice, byPassage)
  const ruledBy = byPassage > byPractice ? 'passage' : 'practice'
  const why =
    ruledBy === 'practice'
      ? `the ${short(practice.settlingMinutes)} minutes of practice`
      : `${WAITING_OVER_PASSAGE} times the ${short(lastArrival ?? 0)} s the ring takes to its last station, which is more than the ${short(practice.settlingMinutes)} minutes of practice`
  return {
    settlingTime,
    ruledBy,
    text: `Wait ${short(settlingTime / 60)} minutes between runs: ${why} (common practice; watch the seeding come to rest).`,
    ring: ringVerdict(input),
    jet: jetVerdict(input.jetReynolds),
    start: startVerdict(input),
  }
}

function ringVerdict({ ringReynolds, kinematicViscosity }: SettlingInput): Settling['ring'] {
  const highest = ringReynolds.at(-1)
  const lowest = ringReynolds[0]
  if (highest === undefined || lowest === undefined) return { regime: null, text: 'There is no ring.' }
  const regimes = [lowest, highest].map((reynolds) => ageingRegime(reynolds * kinematicViscosity, kinematicViscosity))
  const regime = regimes[0] === regimes[1] ? (regimes[1] ?? null) : 'between'
  const range = lowest === highest ? short(highest) : `${short(lowest)} to ${short(highest)}`
  const words = {
    laminar: `below ${LAMINAR_BELOW}: laminar`,
    turbulent: `above ${TURBULENT_ABOVE}: turbulent`,
    between: `neither surely below ${LAMINAR_BELOW} nor surely above ${TURBULENT_ABOVE}: both ways of ageing are shown`,
  } as const
  return { regime, text: `Ring Reynolds number ${range} is ${words[regime ?? 'between']}.` }
}

function jetVerdict(jetReynolds: number): Settling['jet'] {
  const laminar = jetReynolds < TUBE_LAMINAR_BELOW
  return {
    laminar,
    text: laminar
      ? `Jet Reynolds number ${short(jetReynolds)} is below ${TUBE_LAMINAR_BELOW}: the flow in the tube is laminar.`
      : `Jet Reynolds number ${short(jetReynolds)} is above ${TUBE_LAMINAR_BELOW}, where steady flow in a tube turns turbulent; a short stroke from rest usually stays laminar longer. Look at the jet before trusting it.`,
  }
}

function startVerdict({ practice, startFormationTime }: SettlingInput): Settling['start'] {
  const [planned, rounded] = startFormationTime
  const impulsive = rounded <= practice.impulsiveStart
  const text = `The speed reaches 95 % of its peak in ${short(rounded)} formation times as the profile moves (${short(planned)} as planned): ${impulsive ? 'impulsive' : 'not impulsive'} by the ${short(practice.impulsiveStart)} of common practice.`
  return { impulsive, text }
}

function short(value: number): number {
  return Number(value.toPrecision(3))
}
