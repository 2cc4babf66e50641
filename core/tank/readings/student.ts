/**
 * Two-sided 95 % factor of Student's distribution.
 *
 * Abramowitz & Stegun 26.7.5, expansion in 1 / nu about the normal quantile (recalled, not re-read); below seven degrees of freedom,
 * where it is off in the third decimal, the values of their Table 26.10.
 */
import { at, requireRange } from '../../base'

/** 97.5 % point of the normal distribution. */
export const NORMAL_95 = 1.959963984540054

/** At 1 to 6 degrees of freedom. */
const FEW = [12.706, 4.303, 3.182, 2.776, 2.571, 2.447] as const

/** @param freedom degrees of freedom, a whole number from 1. @throws {DomainError} */
export function student95(freedom: number): number {
  requireRange('degrees of freedom', freedom, { min: 1 })
  if (freedom < FEW.length + 1) return at(FEW, Math.floor(freedom) - 1)
  const x = NORMAL_95
  const g1 = (x ** 3 + x) / 4
  const g2 = (5 * x ** 5 + 16 * x ** 3 + 3 * x) / 96
  const g3 = (3 * x ** 7 + 19 * x ** 5 + 17 * x ** 3 - 15 * x) / 384
  const g4 = (79 * x ** 9 + 776 * x ** 7 + 1482 * x ** 5 - 1920 * x ** 3 - 945 * x) / 92160
  return x + g1 / freedom + g2 / freedom ** 2 + g3 / freedom ** 3 + g4 / freedom ** 4
}
