/** Shares of a whole run's progress, by what its parts usually cost. */

/** Usual cost of a part against the others. */
export const COST = {
  jet: 60,
  start: 60,
  wake: 37,
  thruster: 1,
  sizing: 40,
  tankRun: 10,
  readings: 5,
  sweep: 400,
  spread: 100,
} as const
export type CostlyPart = keyof typeof COST

/** Progress before the first and after the last of them. */
const FROM = 0.02
const TO = 0.99

export interface Share {
  readonly from: number
  readonly share: number
}

/** Where in the progress of the whole each part of a run lies. @param parts that take long, in the order they are computed */
export function sharesOf(parts: readonly CostlyPart[]): (part: CostlyPart) => Share {
  const all = parts.reduce((sum, part) => sum + COST[part], 0)
  return (part) => {
    // Nothing to wait for: it is there already.
    if (!parts.includes(part)) return { from: FROM, share: 0 }
    const before = parts.slice(0, parts.indexOf(part)).reduce((sum, other) => sum + COST[other], 0)
    return { from: FROM + ((TO - FROM) * before) / all, share: ((TO - FROM) * COST[part]) / all }
  }
}
