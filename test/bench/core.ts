/** Pure computation: one pulse, matches to the steady family. */
import { steadyRing, matchSteadyRing } from '../../core/ring'
import { pulseOf } from '../../core/run'
import { waterProperties } from '../../core/water'
import { planOf } from '../support/plans'
import { median, type Figure } from './measure'

const PULSES = 200
const MATCHES = 20_000

/** CPU time of the functions that dragging and searching lean on; told, without a goal of their own. */
export function coreFigures(): readonly Figure[] {
  const plan = planOf()
  const water = waterProperties(plan.water)
  const pulses: number[] = []
  for (let i = 0; i < PULSES + 60; i++) {
    const start = performance.now()
    pulseOf(plan, water)
    if (i >= 60) pulses.push(performance.now() - start)
  }
  const ring = steadyRing(0.01, 0.02, 0.4, 1000)
  const start = performance.now()
  let sum = 0
  for (let i = 0; i < MATCHES; i++) {
    const energy = ring.energy * (1 + (i % 100) / 500)
    sum += matchSteadyRing({ density: 1000, circulation: 0.01, impulse: ring.impulse, energy }).ring?.speed ?? 0
  }
  const each = ((performance.now() - start) / MATCHES) * 1000
  if (!(sum > 0)) throw new Error('the matches gave no speed')
  return [
    { name: 'one pulse, computed', value: median(pulses), unit: 'ms', n: PULSES, goal: null },
    { name: 'one match to the steady family', value: each, unit: 'us', n: MATCHES, goal: null },
  ]
}
