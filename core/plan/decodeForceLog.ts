/**
 * A force log in a plan: a list of samples `{ time, force }`, and of blocks that keep a long log small: `{ start, step, force: [...] }` for
 * equal times, `{ time: [...], force: [...] }` for any.
 */
import { forceLog, type ForceLog } from '../tank'
import { decodeQuantity, isObject, refuse, type Problems } from './decodeFields'
import type { Json, JsonObject } from './json'

/** Most samples of a log. */
export const LARGEST_FORCE_LOG = 2_000_000
/** Samples from which a log is written as a block. */
const BLOCK_FROM = 200
/** Times count as equally spaced where none is off by more than this many roundings. */
const ROUNDINGS = 4

export function decodeForce(raw: Json | undefined, problems: Problems): ForceLog {
  if (raw === undefined || raw === null) return forceLog([], [])
  if (!Array.isArray(raw)) {
    refuse(problems, 'readings.force', raw, 'a list of samples { time, force }, or of blocks')
    return forceLog([], [])
  }
  const time: number[] = []
  const force: number[] = []
  for (const [index, item] of raw.entries()) {
    const field = `readings.force.${index}`
    const read = isObject(item) && readItem(item, field, time, force, problems)
    if (!isObject(item)) refuse(problems, field, item, 'a sample { time, force }, or a block')
    if (!read) return forceLog([], [])
  }
  if (time.length > LARGEST_FORCE_LOG)
    refuse(
      problems,
      'readings.force',
      time.length,
      `at most ${LARGEST_FORCE_LOG} samples`,
      `readings.force must have at most ${LARGEST_FORCE_LOG} samples, got ${time.length}.`,
    )
  for (let i = 1; i < time.length; i++) {
    const [before = 0, now = 0] = [time[i - 1], time[i]]
    if (now > before) continue
    const text = `readings.force must be at rising times: sample ${i + 1} at ${now} s does not come after ${before} s.`
    refuse(problems, 'readings.force', now, 'rising times', text)
    break
  }
  return forceLog(time, force)
}

/** Put what an item holds at the ends of the lists. */
function readItem(item: JsonObject, field: string, time: number[], force: number[], problems: Problems): boolean {
  const forces = item['force']
  if (!Array.isArray(forces)) {
    const when = decodeQuantity(item['time'], `${field}.time`, 'time', problems)
    const value = decodeQuantity(forces, `${field}.force`, 'force', problems)
    if (when === null || value === null) return false
    time.push(when)
    force.push(value)
    return true
  }
  if (!onlyNumbers(forces, `${field}.force`, problems)) return false
  const times = item['time']
  if (times === undefined) {
    const start = decodeQuantity(item['start'], `${field}.start`, 'time', problems)
    const step = decodeQuantity(item['step'], `${field}.step`, 'time', problems)
    if (start === null || step === null) return false
    for (let i = 0; i < forces.length; i++) time.push(start + i * step)
  } else {
    if (!Array.isArray(times) || times.length !== forces.length) {
      refuse(problems, `${field}.time`, times, `a list of ${forces.length} times, one for each force`)
      return false
    }
    if (!onlyNumbers(times, `${field}.time`, problems)) return false
    for (const when of times) time.push(when)
  }
  for (const value of forces) force.push(value)
  return true
}

function onlyNumbers(list: readonly Json[], field: string, problems: Problems): list is readonly number[] {
  const wrong = list.findIndex((value) => typeof value !== 'number' || !Number.isFinite(value))
  if (wrong < 0) return true
  refuse(problems, `${field}.${wrong}`, list[wrong], 'a number in SI units')
  return false
}

/** A log as it is saved: samples while they are few, then one block. */
export function forceDocument({ time, force }: ForceLog): JsonObject[] {
  if (time.length < BLOCK_FROM) return Array.from(time, (when, i) => ({ time: when, force: force[i] ?? Number.NaN }))
  const step = equalStep(time)
  const forces = Array.from(force)
  return [
    step === null ? { time: Array.from(time), force: forces } : { start: time[0] ?? Number.NaN, step, force: forces },
  ]
}

/** The step of equally spaced times, to rounding; null where they are not. */
function equalStep(time: Float64Array): number | null {
  const start = time[0] ?? Number.NaN
  const end = time[time.length - 1] ?? Number.NaN
  const mean = (end - start) / (time.length - 1)
  const slack = ROUNDINGS * Number.EPSILON * Math.max(Math.abs(start), Math.abs(end))
  const fits = (step: number): boolean => time.every((when, i) => Math.abs(start + i * step - when) <= slack)
  // The step as it was written down, where its digits are the same.
  return [Number(mean.toPrecision(12)), mean].find(fits) ?? null
}
