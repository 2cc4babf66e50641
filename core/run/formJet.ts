/**
 * The starting jet of a plan: its own stroke for what leaves the tube, a long enough one for the formation number.
 */
import { DomainError } from '../base'
import { formationInput, startingJetEnsemble, type JetEnsemble, type JetEnsembleInput } from '../coaxial'
import { loadKernel } from '../kernel'
import type { Plan } from '../plan'
import { compileProgramme } from '../pulse'
import type { WaterProperties } from '../water'
import { jetData, jetInput, withoutFormation, type JetRunOptions } from './jet'
import { createJetCache, type JetCache } from './jetCache'
import type { JetData } from './jetTypes'

/**
 * Compute the starting jet of a plan, with defaults where it has no such section.
 *
 * The plan's own stroke comes first. Where it is too short to tell the formation number, the same start with a longer stroke is run for
 * that alone.
 *
 * @returns status 'cancelled' or 'failed' with what had been computed
 * @throws {DomainError} with the plan path of a value that no starting jet can be computed for
 */
export async function jetOf(plan: Plan, water: WaterProperties, options: JetRunOptions = {}): Promise<JetData> {
  const input = jetInput(plan, water)
  const longer = formationInput(input)
  const cache = options.jetCache ?? createJetCache()
  const twoRuns = longer !== input
  const share = twoRuns ? shareOfOwn(input, longer, cache) : 1
  const own = await ensembleOf(input, cache, options, 0, share)
  if (!twoRuns || own.status !== 'done')
    return jetData(plan, own, own.status === 'done' ? own : null, own.status, own.message)
  try {
    const formation = await ensembleOf(longer, cache, options, share, 1 - share)
    return jetData(
      plan,
      own,
      formation,
      formation.status,
      formation.status === 'done' ? own.message : formation.message,
    )
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    return withoutFormation(plan, own, error)
  }
}

async function ensembleOf(
  input: JetEnsembleInput,
  cache: JetCache,
  options: JetRunOptions,
  from: number,
  share: number,
): Promise<JetEnsemble> {
  const known = cache.find(input)
  if (known !== null) return known
  const jet = slim(
    await startingJetEnsemble(input, {
      kernel: options.kernel ?? (await loadKernel()),
      ...(options.pause === undefined ? {} : { pause: options.pause }),
      ...(options.signal === undefined ? {} : { signal: options.signal }),
      onProgress: ({ share: done, what }) => options.onProgress?.({ share: from + share * done, what }),
    }),
  )
  if (jet.status === 'done') cache.keep(input, jet)
  return jet
}

/** The same with the shapes of the shown member only: the others are read for their numbers. */
function slim(jet: JetEnsemble): JetEnsemble {
  return { ...jet, runs: jet.runs.map((run) => (run === jet.shown ? run : { ...run, snapshots: [] })) }
}

/** Share of the work that the plan's own stroke takes: it grows with the cube of what has been shed. */
function shareOfOwn(input: JetEnsembleInput, longer: JetEnsembleInput, cache: JetCache): number {
  const work = (one: JetEnsembleInput): number =>
    cache.find(one) === null ? (compileProgramme(one.programme).stroke / one.diameter + 2) ** 3 : 0
  const own = work(input)
  const all = own + work(longer)
  return all === 0 ? 1 : own / all
}
