/**
 * Density of fresh and sea water at the surface.
 *
 * Sources: [SR6] IAPWS SR6-08(2011), Revised Supplementary Release on Properties of Liquid Water at 0.1 MPa, eq. 2
 * and table 2; J. Patek et al. 2009, J. Phys. Chem. Ref. Data 38:21.  [EOS80] N. P. Fofonoff & R. C. Millard 1983,
 * UNESCO Technical Papers in Marine Science 44 (one-atmosphere equation of Millero & Poisson 1981).
 */
import { at, ZERO_CELSIUS } from '../base'

/** [SR6] Specific gas constant of water [J/(kg K)], reference pressure [Pa] and scales [K]. */
const GAS_CONSTANT = 461.51805
const REFERENCE_PRESSURE = 1e5
const REFERENCE_TEMPERATURE = 10
const UPPER_POLE = 593
const LOWER_POLE = 232

/**
 * [SR6] Specific volume: a constant, powers of 10 K / (593 K - T), powers 1 to 6 of 10 K / (T - 232 K). Recalled from
 * memory, found equal in two open implementations, and checked on the release's own table 8 (all digits printed).
 */
const VOLUME_CONSTANT = 1.93763157e-2
const UPPER_TERMS = [
  [4, 6.74458446e3],
  [5, -2.22521604e5],
  [7, 1.00231247e8],
  [8, -1.63552118e9],
  [9, 8.32299658e9],
] as const
const LOWER_TERMS = [
  5.78545292e-3, -1.53195665e-2, 3.11337859e-2, -4.23546241e-2, 3.38713507e-2, -1.19946761e-2,
] as const

/**
 * Density of liquid fresh water at 0.1 MPa.
 *
 * At one standard atmosphere it is 6e-7 (relative) higher.
 *
 * @param temperatureCelsius 0 to 40 here; the formula holds from -20 to 110
 * @returns kg/m3, uncertainty 1e-6 relative near room temperature [SR6]
 */
export function freshDensity(temperatureCelsius: number): number {
  const T = temperatureCelsius + ZERO_CELSIUS
  const upper = REFERENCE_TEMPERATURE / (UPPER_POLE - T)
  const lower = REFERENCE_TEMPERATURE / (T - LOWER_POLE)
  let sum = VOLUME_CONSTANT
  for (const [power, factor] of UPPER_TERMS) sum += factor * upper ** power
  LOWER_TERMS.forEach((factor, i) => (sum += factor * lower ** (i + 1)))
  return REFERENCE_PRESSURE / (GAS_CONSTANT * REFERENCE_TEMPERATURE * sum)
}

/**
 * [EOS80] Polynomials in temperature, constant first: pure water, and the factors of S, S^1.5 and S^2. Recalled from
 * memory, found equal in an open implementation, and checked on the published values of the technical paper.
 */
const PURE = [999.842594, 6.793952e-2, -9.09529e-3, 1.001685e-4, -1.120083e-6, 6.536332e-9] as const
const LINEAR = [8.24493e-1, -4.0899e-3, 7.6438e-5, -8.2467e-7, 5.3875e-9] as const
const THREE_HALVES = [-5.72466e-3, 1.0227e-4, -1.6546e-6] as const
const SQUARE = 4.8314e-4

/**
 * Density of sea water at one standard atmosphere.
 *
 * The temperature is taken as it stands: the scale of the formula (IPTS-68) differs from today's (ITS-90) by less
 * than 0.010 K below 40 C, 3e-6 of the density, less than the formula's distance from newer ones (5e-5).
 *
 * @param salinity practical, 0 to 42
 * @param temperatureCelsius 0 to 40
 * @returns kg/m3
 */
export function seaDensity(salinity: number, temperatureCelsius: number): number {
  const t = temperatureCelsius
  const linear = polynomial(LINEAR, t) * salinity
  return polynomial(PURE, t) + linear + polynomial(THREE_HALVES, t) * salinity ** 1.5 + SQUARE * salinity ** 2
}

function polynomial(coefficients: readonly number[], x: number): number {
  let sum = 0
  for (let i = coefficients.length - 1; i >= 0; i--) sum = sum * x + at(coefficients, i)
  return sum
}
