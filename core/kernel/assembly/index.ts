/** What the module exports, next to its memory. Compiled by build/kernel/module.mjs. */
export { addCoaxialVelocity, coaxialStream, coaxialVelocity } from './coaxial'
export { segmentVelocity } from './segments'
export { segmentVelocityMixed, shortenSegments } from './segmentsMixed'
export {
  localOfCells,
  localOfPart,
  momentsOfPart,
  momentsOfSegments,
  treeTables,
  velocityOfLocal,
} from './segmentTree'
