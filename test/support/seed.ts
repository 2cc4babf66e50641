/**
 * Property tests wander on a developer's machine, where a failure prints the seed to replay; in CI they run on one seed, so that the
 * gate gives one answer for one commit. PROPERTY_RUNS raises the number of cases for a long search.
 */
import fc from 'fast-check'

const runs = Number(process.env['PROPERTY_RUNS'] ?? '0')
fc.configureGlobal({
  ...(process.env['CI'] === undefined ? {} : { seed: 20261201 }),
  ...(runs > 0 ? { numRuns: runs } : {}),
})
