/**
 * Vapour pressure of water.
 *
 * Source: IAPWS R7-97(2012), IAPWS Industrial Formulation 1997, region 4, eqs. 28 to 30 and table 34.
 */
import { ZERO_CELSIUS } from '../base'

/**
 * Table 34, n1 to n10. Recalled from memory, found equal in three open implementations, and checked on the release's
 * table 35 (all digits printed).
 */
const [N1, N2, N3, N4, N5, N6, N7, N8, N9, N10] = [
  0.11670521452767e4, -0.72421316703206e6, -0.17073846940092e2, 0.1202082470247e5, -0.32325550322333e7,
  0.1491510861353e2, -0.48232657361591e4, 0.40511340542057e6, -0.23855557567849, 0.65017534844798e3,
] as const

/**
 * Saturation pressure of fresh water.
 *
 * @param temperatureCelsius 0 to 373
 * @returns Pa
 */
export function saturationPressure(temperatureCelsius: number): number {
  const T = temperatureCelsius + ZERO_CELSIUS
  const theta = T + N9 / (T - N10)
  const a = theta * theta + N1 * theta + N2
  const b = N3 * theta * theta + N4 * theta + N5
  const c = N6 * theta * theta + N7 * theta + N8
  return 1e6 * ((2 * c) / (-b + Math.sqrt(b * b - 4 * a * c))) ** 4
}
