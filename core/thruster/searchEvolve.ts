/**
 * Global search by differential evolution over a unit cube, feasible trials first.
 *
 * Each member moves towards one of the better ones plus the difference of two others; step factor and crossover rate travel
 * with the member and are drawn anew now and then, so that nothing has to be tuned for a problem.
 * Sources: R. Storn & K. Price 1997, J. Glob. Optim. 11:341 (the method); J. Zhang & A. C. Sanderson 2009, IEEE Trans. Evol.
 * Comput. 13:945 (towards one of the best); J. Brest et al. 2006, IEEE Trans. Evol. Comput. 10:646 (factors that travel);
 * recalled, not re-read.
 */
import { at, type RandomSource } from '../base'
import { isBetter, type Trial } from './searchCompare'

/** Members a variable, and the least number of members. */
const MEMBERS_PER_VARIABLE = 10
const FEWEST_MEMBERS = 30
/** Share of the members that count as the better ones. */
const BETTER_SHARE = 0.15
/** Chance that a member draws its factors anew. */
const REDRAW = 0.1
/** Generations without a gain of GAIN, relative, after which a population has settled. */
const PATIENCE = 30
const GAIN = 1e-7

interface Member {
  trial: Trial
  step: number
  crossover: number
}

/** A population that is moved one generation at a time. */
export class Evolution {
  evaluations = 0
  private readonly members: Member[] = []
  private idle = 0

  /**
   * @param size number of variables
   * @param seeds points that are among the first members, at most half of them are taken
   */
  constructor(
    private readonly size: number,
    private readonly score: (point: Float64Array) => Trial,
    private readonly random: RandomSource,
    seeds: readonly Float64Array[] = [],
  ) {
    const count = Math.max(FEWEST_MEMBERS, MEMBERS_PER_VARIABLE * size)
    const taken = seeds.slice(0, count >> 1)
    // Every variable is cut into as many slices as there are members, each used once: an even first spread.
    const orders = Array.from({ length: size }, () => shuffled(count, random))
    for (let k = 0; k < count; k++) {
      const point =
        taken[k] ?? Float64Array.from({ length: size }, (_, i) => (at(at(orders, i), k) + random.uniform()) / count)
      this.members.push({ trial: this.judge(point), step: 0.5, crossover: 0.9 })
    }
  }

  get best(): Trial {
    return this.members.reduce((a, b) => (isBetter(b.trial, a.trial) ? b : a)).trial
  }

  /** True where the best has not gained for many generations. */
  get settled(): boolean {
    return this.idle >= PATIENCE
  }

  /** One generation. */
  advance(): void {
    const { members, random, size } = this
    const before = this.best
    const ranked = [...members].sort((a, b) => (isBetter(a.trial, b.trial) ? -1 : isBetter(b.trial, a.trial) ? 1 : 0))
    const betterCount = Math.max(2, Math.round(BETTER_SHARE * members.length))
    for (const member of members) {
      const step = random.uniform() < REDRAW ? 0.1 + 0.9 * random.uniform() : member.step
      const crossover = random.uniform() < REDRAW ? random.uniform() : member.crossover
      const guide = at(ranked, Math.floor(random.uniform() * betterCount)).trial.point
      const one = this.other(member).trial.point
      const two = this.other(member).trial.point
      const here = member.trial.point
      const kept = Math.floor(random.uniform() * size)
      const point = here.slice()
      for (let i = 0; i < size; i++) {
        if (i !== kept && random.uniform() >= crossover) continue
        const x = at(here, i)
        point[i] = reflected(x + step * (at(guide, i) - x) + step * (at(one, i) - at(two, i)), x)
      }
      const trial = this.judge(point)
      if (isBetter(member.trial, trial)) continue
      member.trial = trial
      member.step = step
      member.crossover = crossover
    }
    const after = this.best
    const gained =
      after.violation < before.violation * (1 - GAIN) || before.value - after.value > GAIN * Math.abs(before.value)
    this.idle = gained ? 0 : this.idle + 1
  }

  private other(member: Member): Member {
    for (;;) {
      const found = at(this.members, Math.floor(this.random.uniform() * this.members.length))
      if (found !== member) return found
    }
  }

  private judge(point: Float64Array): Trial {
    this.evaluations++
    return this.score(point)
  }
}

/** A step out of the cube ends half way to its face. */
function reflected(place: number, from: number): number {
  if (place < 0) return from / 2
  if (place > 1) return (from + 1) / 2
  return place
}

function shuffled(count: number, random: RandomSource): number[] {
  const order = Array.from({ length: count }, (_, i) => i)
  for (let i = count - 1; i > 0; i--) {
    const j = Math.floor(random.uniform() * (i + 1))
    const kept = at(order, i)
    order[i] = at(order, j)
    order[j] = kept
  }
  return order
}
