/**
 * Density, viscosity and vapour pressure of fresh and sea water.
 */
export { freshDensity, seaDensity } from './density'
export { waterProperties, type WaterInput, type WaterKind, type WaterProperties } from './properties'
export { saturationPressure } from './vapour'
export { freshViscosity, SALT_FRACTION, seaViscosity, waterViscosity } from './viscosity'
