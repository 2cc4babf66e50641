/**
 * One sample of a spread: what a drawn plan makes, as the summary tells it.
 */
import { at, bracket } from '../base'
import { loadKernel, type Kernel } from '../kernel'
import { pulseSummary, thrusterSummary, type Plan } from '../plan'
import { compileProgramme, computePulse, type ComputedJet, type PulseResult } from '../pulse'
import { ageingLaws, tankArrivals, tankWalls, type TankPath } from '../tank'
import { analyseThruster } from '../thruster'
import { waterProperties, type WaterProperties } from '../water'
import { pulseInputOf } from './pulse'
import { thrusterInputOf } from './thruster'
import type { WakeRunOptions } from './options'

export interface Sample {
  /** Sections as in the summary, with the keys that are read. */
  readonly document: Readonly<Record<string, unknown>>
  readonly pulse: PulseResult
  /** Where the ring goes in the tank; null without a tank run or a ring. */
  readonly path: TankPath | null
}

/** What every sample of a spread shares. */
export interface SampleSetting {
  readonly plan: Plan
  readonly water: WaterProperties
  readonly pulse: PulseResult
  /** What the computed jet of the plan itself hands on; null where the plan does not adopt one. */
  readonly jet: ComputedJet | null
  /** Law the ring of the plan ages by; null without a tank run or a ring. */
  readonly ageing: 'laminar' | 'turbulent' | null
  readonly kernel: Kernel
}

export async function sampleSetting(
  plan: Plan,
  water: WaterProperties,
  jet: ComputedJet | null,
  options: WakeRunOptions,
): Promise<SampleSetting> {
  const pulse = computePulse(pulseInputOf(plan, water, jet))
  const laws =
    plan.tankRun === null || pulse.ring === null
      ? []
      : ageingLaws(pulse.ring, water.kinematicViscosity, plan.wake?.ageing ?? 'auto')
  return { plan, water, pulse, jet, ageing: laws[0] ?? null, kernel: options.kernel ?? (await loadKernel()) }
}

/**
 * Compute a drawn plan.
 *
 * @returns null where it was cancelled
 * @throws {DomainError} where it cannot be computed
 */
export async function sampleOf(plan: Plan, setting: SampleSetting, options: WakeRunOptions): Promise<Sample | null> {
  const water = plan.water === setting.plan.water ? setting.water : waterProperties(plan.water)
  const jet = setting.jet === null ? null : scaledJet(setting.jet, setting, plan, water)
  const input = pulseInputOf(plan, water, jet)
  const pulse = computePulse(input)
  const thruster =
    plan.thruster === null
      ? null
      : analyseThruster(thrusterInputOf(plan, { ...plan.thruster, search: null }, water, jet))
  let document: Readonly<Record<string, unknown>> = {
    pulse: pulseSummary(pulse),
    thruster: thruster === null ? undefined : thrusterSummary({ result: thruster, sizing: null }),
  }
  if (plan.tankRun === null || setting.ageing === null) return { document, pulse, path: null }
  const { arrivals, path, status } = await tankArrivals(
    {
      // The adopted ring alone: what it is told to be, not the range of models around it, is what scatters here.
      pulse: { ...pulse, ringFromSlug: null, ringWithOverPressure: null },
      density: water.density,
      kinematicViscosity: water.kinematicViscosity,
      axialFlow: plan.ambient.axialFlow,
      ageing: setting.ageing,
      walls: tankWalls(plan.tankRun, plan.nozzle.diameter),
      stations: plan.tankRun.stations,
    },
    { ...options, kernel: setting.kernel },
  )
  if (status === 'cancelled') return null
  document = { ...document, tankRun: { arrivals } }
  return { document, pulse, path }
}

/**
 * The jet of a drawn plan from that of the plan itself, by its dimensions: circulation as U D, impulse as rho U D^3, energy as
 * rho U^2 D^3. Exact for the same start and stroke ratio but for viscosity; a change of those is left out.
 */
function scaledJet(
  jet: ComputedJet,
  { plan, water, pulse }: SampleSetting,
  drawn: Plan,
  there: WaterProperties,
): ComputedJet {
  const speed = compileProgramme(drawn.programme).peakSpeed / pulse.peakSpeed
  const size = drawn.nozzle.diameter / plan.nozzle.diameter
  const density = there.density / water.density
  return {
    ...jet,
    circulationBeyondSlug: jet.circulationBeyondSlug * speed * size,
    impulseBeyondSlug: jet.impulseBeyondSlug * density * speed * size ** 3,
    energyBeyondSlug: jet.energyBeyondSlug * density * speed ** 2 * size ** 3,
  }
}

/** Circulation of the slug at a formation time; held after the stroke. */
export function circulationAt({ history }: PulseResult, formationTime: number): number {
  return valueAt(history.formationTime, history.circulation, formationTime)
}

/** Straight between points, held before the first and after the last. */
function valueAt(x: readonly number[], y: readonly number[], place: number): number {
  const last = x.length - 1
  if (place <= at(x, 0)) return at(y, 0)
  if (place >= at(x, last)) return at(y, last)
  const k = bracket(x, place)
  const step = at(x, k + 1) - at(x, k)
  return step > 0 ? at(y, k) + ((place - at(x, k)) / step) * (at(y, k + 1) - at(y, k)) : at(y, k)
}

/** Place of the ring at a time; before its birth and after its end at the speed it has there. */
export function positionAt(path: TankPath, time: number): number {
  const last = path.time.length - 1
  const beyond = time < at(path.time, 0) ? 0 : time > at(path.time, last) ? last : null
  if (beyond !== null) return at(path.x, beyond) + at(path.speed, beyond) * (time - at(path.time, beyond))
  return valueAt(path.time, path.x, time)
}
