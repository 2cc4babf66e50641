/**
 * Viscosity of fresh and sea water.
 *
 * Sources: [R12] IAPWS R12-08, Release on the IAPWS Formulation 2008 for the Viscosity of Ordinary Water Substance,
 * eqs. 10 to 12, tables 1 and 2 (M. L. Huber et al. 2009, J. Phys. Chem. Ref. Data 38:101), without the critical
 * enhancement, which is nothing here.  [S10] M. H. Sharqawy, J. H. Lienhard & S. M. Zubair 2010, Desalination and
 * Water Treatment 16:354, eq. 22.
 */
import { ZERO_CELSIUS } from '../base'
import { freshDensity } from './density'

/** [R12] Reference temperature [K], density [kg/m3] and viscosity [Pa s]. */
const REFERENCE_TEMPERATURE = 647.096
const REFERENCE_DENSITY = 322
const REFERENCE_VISCOSITY = 1e-6

/**
 * [R12] Table 2: power of 1/T - 1, power of density - 1, factor (both reduced). Recalled from memory, found equal in an
 * open implementation, and checked on all eleven points of the release's table 4 (all digits printed).
 */
const DENSITY_TERMS = [
  [0, 0, 0.520094],
  [1, 0, 0.0850895],
  [2, 0, -1.08374],
  [3, 0, -0.289555],
  [0, 1, 0.222531],
  [1, 1, 0.999115],
  [2, 1, 1.88797],
  [3, 1, 1.26613],
  [5, 1, 0.120573],
  [0, 2, -0.281378],
  [1, 2, -0.906851],
  [2, 2, -0.772479],
  [3, 2, -0.489837],
  [4, 2, -0.25704],
  [0, 3, 0.161913],
  [1, 3, 0.257399],
  [0, 4, -0.0325372],
  [3, 4, 0.0698452],
  [4, 5, 0.00872102],
  [3, 6, -0.00435673],
  [5, 6, -0.000593264],
] as const

/**
 * Dynamic viscosity of water from temperature and density.
 *
 * @param temperature K, 273 to 1173
 * @param density kg/m3
 * @returns Pa s; uncertainty 1 % in the liquid, 0.17 % at 20 C and 0.1 MPa
 */
export function waterViscosity(temperature: number, density: number): number {
  const t = temperature / REFERENCE_TEMPERATURE
  const dilute = (100 * Math.sqrt(t)) / (1.67752 + 2.20462 / t + 0.6366564 / t ** 2 - 0.241605 / t ** 3)
  const x = 1 / t - 1
  const r = density / REFERENCE_DENSITY
  let sum = 0
  for (const [i, j, factor] of DENSITY_TERMS) sum += factor * x ** i * (r - 1) ** j
  return REFERENCE_VISCOSITY * dilute * Math.exp(r * sum)
}

/** Dynamic viscosity of fresh water at 0.1 MPa [Pa s], 0 to 40 C. */
export function freshViscosity(temperatureCelsius: number): number {
  return waterViscosity(temperatureCelsius + ZERO_CELSIUS, freshDensity(temperatureCelsius))
}

/** Mass of salt per mass of sea water [kg/kg] at practical salinity 1 (Millero et al. 2008, reference composition). */
export const SALT_FRACTION = 35.16504e-3 / 35

/**
 * Dynamic viscosity of sea water at one atmosphere.
 *
 * [S10] gives the ratio to fresh water; the fresh value is that of freshViscosity, so that both meet at salinity 0
 * ([S10] has a shorter fit of the same data there, within 0.02 %, see the tests).
 * The factors were recalled from memory and found equal in two open implementations.
 *
 * @param salinity practical, 0 to 42
 * @param temperatureCelsius 0 to 40
 * @returns Pa s; uncertainty 1.5 % [S10]
 */
export function seaViscosity(salinity: number, temperatureCelsius: number): number {
  const t = temperatureCelsius
  const salt = salinity * SALT_FRACTION
  const linear = 1.541 + 1.998e-2 * t - 9.52e-5 * t ** 2
  const square = 7.974 - 7.561e-2 * t + 4.724e-4 * t ** 2
  return freshViscosity(t) * (1 + linear * salt + square * salt ** 2)
}
