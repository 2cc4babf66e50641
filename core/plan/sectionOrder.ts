/**
 * Sections that say what is computed, in the order of the file format: the one list from which a plan is written, looked through for
 * unknown keys and edited.
 */
export const COMPUTED_SECTIONS = [
  'water',
  'nozzle',
  'programme',
  'ambient',
  'models',
  'jet',
  'train',
  'wake',
  'thruster',
  'tankRun',
  'readings',
  'sweep',
  'spread',
] as const
