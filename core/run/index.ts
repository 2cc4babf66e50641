/**
 * A plan in, results out: the one door that window, browser and runner share.
 */
export { computedJet, jetOf, knownJetOf, type JetRunOptions, type KnownJet } from './jet'
export { createJetCache, type JetCache } from './jetCache'
export type { JetData } from './jetTypes'
export { availableSections, pulseOf, run, type RunRequest } from './run'
export { SECTIONS, type RunData, type RunResult, type Section } from './types'
export type { WakeArrival, WakeData, WakeRunOptions } from './wake'
export type { WakeJet } from './wakeJet'
export { wakePicture, type WakePicture, type WakePictureRequest } from './wakePicture'
