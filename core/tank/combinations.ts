/**
 * Each combination of a run matrix held against the drive, and the first of them followed down the tank: what the piston does, when the
 * ring comes by, when the camera has to look.
 */
import { DomainError } from '../base'
import type { WakeAgeing } from '../coaxial'
import { loadKernel } from '../kernel'
import { computePulse, type PulseInput } from '../pulse'
import { tankArrivals } from './arrivals'
import { driveVerdict } from './driveVerdict'
import type { Combination, ExpectedArrival, MatrixRun, RunMatrix } from './runMatrix'
import type { TankOptions, TankRunSection } from './types'
import { tankWalls } from './walls'

/** What a combination makes of the day. */
export interface CombinedInput {
  readonly section: TankRunSection
  readonly pulse: PulseInput
  readonly ageing: 'auto' | WakeAgeing
}

/** Combinations followed down the tank: each costs about as much as the plan's own arrivals. */
export const MOST_FOLLOWED = 60

/**
 * The matrix with each combination and each run judged.
 *
 * @param combined the day at a combination's levels; its DomainError is why that combination cannot be
 * @returns null where it was cancelled
 */
export async function judgedMatrix(
  matrix: RunMatrix,
  combined: (values: readonly number[]) => CombinedInput,
  options: TankOptions = {},
): Promise<RunMatrix | null> {
  const kernel = options.kernel ?? (await loadKernel())
  const different = new Map(matrix.runs.map(({ values }) => [keyOf(values), values]))
  const rising = [...different.values()].toSorted(byLevels)
  const judged = new Map<string, Combination>()
  for (const [k, values] of rising.entries()) {
    await options.pause?.()
    if (options.signal?.aborted === true) return null
    judged.set(keyOf(values), await judge(values, combined, k < MOST_FOLLOWED, { ...options, kernel }))
    options.onProgress?.({ share: (k + 1) / rising.length, what: 'combinations of the matrix' })
  }
  const runs = matrix.runs.map((run): MatrixRun => {
    const { ok, reason } = judged.get(keyOf(run.values)) ?? run
    return { ...run, ok, reason }
  })
  return { ...matrix, runs, each: [...judged.values()] }
}

function keyOf(values: readonly number[]): string {
  return values.join(' ')
}

function byLevels(a: readonly number[], b: readonly number[]): number {
  const k = a.findIndex((value, i) => value !== b[i])
  return k < 0 ? 0 : (a[k] ?? 0) - (b[k] ?? 0)
}

async function judge(
  values: readonly number[],
  combined: (values: readonly number[]) => CombinedInput,
  follow: boolean,
  options: TankOptions,
): Promise<Combination> {
  try {
    const { section, pulse, ageing } = combined(values)
    const { drive, controllerStep } = section
    const { profile, ...verdict } = driveVerdict({
      programme: pulse.programme,
      nozzle: pulse.nozzle,
      drive,
      controllerStep,
    })
    const delay = profile?.rounding.delay ?? 0
    const seen = follow ? await seenAt({ pulse, ageing, section }, delay, options) : null
    return { values, ...verdict, ...watched(seen) }
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    return { values, pistonSpeed: null, pistonTravel: null, ...watched(null), ok: false, reason: error.message }
  }
}

/** Arrivals of the rounded motion. */
async function seenAt(
  { pulse, ageing, section }: CombinedInput,
  delay: number,
  { kernel, signal }: TankOptions,
): Promise<readonly ExpectedArrival[]> {
  const walls = tankWalls(section, pulse.nozzle.diameter)
  const { arrivals } = await tankArrivals(
    { ...pulse, pulse: computePulse(pulse), ageing, walls, stations: section.stations },
    { ...(kernel === undefined ? {} : { kernel }), ...(signal === undefined ? {} : { signal }) },
  )
  const later = (time: number | null): number | null => (time === null ? null : time + delay)
  return arrivals.map(({ station, timeLow, timeHigh }) => ({
    station,
    timeLow: later(timeLow),
    timeHigh: later(timeHigh),
  }))
}

function watched(
  arrivals: readonly ExpectedArrival[] | null,
): Pick<Combination, 'arrivals' | 'cameraDelay' | 'recordLength'> {
  const times = (arrivals ?? []).flatMap(({ timeLow, timeHigh }) =>
    timeLow === null || timeHigh === null ? [] : [timeLow, timeHigh],
  )
  if (times.length === 0) return { arrivals, cameraDelay: null, recordLength: null }
  const first = Math.min(...times)
  return { arrivals, cameraDelay: first, recordLength: Math.max(...times) - first }
}
