/**
 * A train of pulses as explicit rings.
 */
import { requireRange } from '../base'
import { CORE_CONSTANT } from '../ring'
import { THIN_CORE_LIMIT } from './ringEvents'
import type { CoaxialRing } from './types'

export interface TrainInput {
  /** rho [kg/m3] */
  readonly density: number
  /** The ring one pulse makes. */
  readonly ring: { readonly circulation: number; readonly impulse: number; readonly speed: number }
  /** Duration of the stroke [s]. */
  readonly duration: number
  /** Number of pulses, at least 1. */
  readonly pulses: number
  /** Time from one pulse to the next [s]; not read for a single pulse. */
  readonly period: number
}

export interface TrainRings {
  readonly rings: readonly CoaxialRing[]
  /** a/R of every ring when it appears. */
  readonly coreRatio: number
  /** True above 0.3: the core is then only a measure of the speed, and the thin-core law a stand-in. */
  readonly thick: boolean
}

/** More pulses than this are a mistake of the input. */
const MOST_PULSES = 400

/**
 * Rings of a pulse train. Ring k (from 0) appears at k period + duration, where a ring of its speed would be that left the exit
 * at the start of its stroke. It keeps circulation and impulse, R = sqrt(I / (rho pi Gamma)), and has the uniform core with which
 * the thin-core law gives the speed of the steady ring. What trails behind the ring is left out.
 *
 * @throws {DomainError} for a train or a ring outside its range
 */
export function trainRings(input: TrainInput): TrainRings {
  const { density, ring, duration, pulses, period } = input
  requireRange('train.pulses', pulses, { min: 1, max: MOST_PULSES })
  if (pulses > 1) requireRange('train.period', period, { above: 0, unit: 's' })
  requireRange('density', density, { above: 0, unit: 'kg/m3' })
  requireRange('duration', duration, { above: 0, unit: 's' })
  requireRange('ring.circulation', ring.circulation, { above: 0, unit: 'm2/s' })
  requireRange('ring.impulse', ring.impulse, { above: 0, unit: 'N s' })
  requireRange('ring.speed', ring.speed, { above: 0, unit: 'm/s' })
  const radius = Math.sqrt(ring.impulse / (density * Math.PI * ring.circulation))
  const coreRatio = 8 * Math.exp(CORE_CONSTANT.uniform - 0.5 - (4 * Math.PI * radius * ring.speed) / ring.circulation)
  const rings = Array.from({ length: Math.floor(pulses) }, (_, k) => ({
    circulation: ring.circulation,
    radius,
    coreRadius: coreRatio * radius,
    core: 'uniform' as const,
    x: ring.speed * duration,
    startTime: k === 0 ? duration : k * period + duration,
  }))
  return { rings, coreRatio, thick: coreRatio > THIN_CORE_LIMIT }
}
