/**
 * One vortex ring: thin-ring laws, the steady family up to Hill's vortex, ageing, and what happens inside the core.
 */
export {
  LAMINAR_BELOW,
  LATE_LAW,
  TURBULENT_ABOVE,
  TURBULENT_GROWTH_RATE,
  ageingRegime,
  laminarAgeing,
  laminarCoreRadius,
  lateAgeing,
  stokesRingSpeed,
  turbulentAgeing,
  type AgedRing,
  type Ageing,
  type AgeingRegime,
  type LaminarRing,
  type LateRing,
  type TurbulentRing,
} from './ageing'
export { corePressureDrop, mostUnstableWaveNumber, peakSwirlRadius } from './coreDetails'
export { HILL_DIMENSIONLESS_ENERGY } from './hillVortex'
export {
  coreRatioOfDimensionlessEnergy,
  matchSteadyRing,
  type MatchedRing,
  type RingInvariants,
} from './matchSteadyRing'
export { secondOrderRing, type SecondOrderRing } from './secondOrderRing'
export { dimensionlessEnergyOfSteadyRing, steadyRing, type SteadyRing } from './steadyFamily'
export { steadyRingOutline, type MeridionalCurve, type SteadyRingOutline } from './steadyOutline'
export { CORE_CONSTANT, thinRingEnergy, thinRingImpulse, thinRingSpeed, type CoreModel } from './thinRing'
