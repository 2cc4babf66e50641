import { median } from './measure'

/** Calls before the measuring, so that the engine has compiled what it will compile. */
export const WARM_UP_CALLS = 60

/** A job by name; gives the seconds it took when it measures itself, nothing when it is to be measured. */
export type Job = () => number | void

/** Processor time of the process, all its threads, s. */
export function processorTime(): number {
  const { user, system } = process.cpuUsage()
  return (user + system) * 1e-6
}

/** Time by the clock, s. */
export function wallTime(): number {
  return performance.now() * 1e-3
}

/**
 * Seconds a call of each job, the jobs taking turns, so that a slow spell of the machine falls on all.
 *
 * @param clock processorTime or wallTime.
 * @returns by name, the median of the rounds or what `of` makes of them.
 */
export function interleaved<Name extends string>(
  jobs: Readonly<Record<Name, Job>>,
  rounds: number,
  clock: () => number,
  warmUpCalls = WARM_UP_CALLS,
): (name: Name, of?: (rounds: readonly number[]) => number) => number {
  const entries = Object.entries<Job>(jobs).map(([name, job]) => ({ name, job, seconds: [] as number[] }))
  for (const { job } of entries) for (let call = 0; call < warmUpCalls; call++) job()
  for (let round = 0; round < rounds; round++) {
    for (const { job, seconds } of entries) {
      const start = clock()
      const own = job()
      seconds.push(typeof own === 'number' ? own : clock() - start)
    }
  }
  return (name, of = median) => of(entries.find((entry) => entry.name === name)?.seconds ?? [])
}
