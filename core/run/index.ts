/**
 * A plan in, results out: the one door that window, browser and runner share.
 */
export { availableSections, pulseOf, run, type RunRequest } from './run'
export { SECTIONS, type RunData, type RunResult, type Section } from './types'
export type { WakeArrival, WakeData, WakeRunOptions } from './wake'
export { wakePicture, type WakePicture, type WakePictureRequest } from './wakePicture'
