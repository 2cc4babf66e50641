/**
 * Finished starting jets by their input, so that a change elsewhere in the plan, or a step back, computes none anew.
 */
import type { JetEnsemble, JetEnsembleInput } from '../coaxial'
import type { ProgrammeInput } from '../pulse'

/** Jets kept; one holds a few megabytes of shapes. */
const MOST_JETS = 6

export interface JetCache {
  /** The finished jet of this input, or null. */
  find(input: JetEnsembleInput): JetEnsemble | null
  /** Keep a finished jet; the one that was not asked for longest goes. */
  keep(input: JetEnsembleInput, jet: JetEnsemble): void
}

/** @param most how many jets are kept, from 1 */
export function createJetCache(most = MOST_JETS): JetCache {
  // A map keeps the order of its entries: the first was not asked for longest.
  const jets = new Map<string, JetEnsemble>()
  const put = (key: string, jet: JetEnsemble): void => {
    jets.delete(key)
    jets.set(key, jet)
  }
  return {
    find(input) {
      const key = keyOf(input)
      const jet = jets.get(key)
      if (jet === undefined) return null
      put(key, jet)
      return jet
    },
    keep(input, jet) {
      put(keyOf(input), jet)
      for (const key of jets.keys()) if (jets.size > most) jets.delete(key)
    },
  }
}

/** Inputs with one key make the same jet. */
function keyOf(input: JetEnsembleInput): string {
  const { density, kinematicViscosity, diameter, axialFlow, coreGrowth, ensemble, delta, settings } = input
  const programme = programmeKey(input.programme)
  return JSON.stringify([
    density,
    kinematicViscosity,
    diameter,
    programme,
    axialFlow,
    coreGrowth,
    ensemble,
    delta,
    settings,
  ])
}

/** What of a programme its shape reads. */
function programmeKey({ shape, stroke, peakSpeed, riseTime, fallTime, rows }: ProgrammeInput): readonly unknown[] {
  if (shape === 'table') return [shape, rows]
  return shape === 'trapezoid' ? [shape, stroke, peakSpeed, riseTime, fallTime] : [shape, stroke, peakSpeed]
}
