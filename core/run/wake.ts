/**
 * The wake of a plan: its train or its explicit rings, marched by the engine that suits them, under both ageing laws where the
 * ring Reynolds number does not say which.
 */
import { DomainError } from '../base'
import { LARGEST_TUBE_SHARE, trainRings, type JetRun, type WakeAgeing } from '../coaxial'
import { marchWake, ringsOfNozzles, type Wake, type WakeInput, type WakeRing } from '../filament'
import { loadKernel, type Kernel } from '../kernel'
import type { Plan, WakeSection } from '../plan'
import type { PulseResult } from '../pulse'
import { ageingRegime } from '../ring'
import type { WaterProperties } from '../water'
import type { WakeRunOptions } from './options'
import { jetRings, withPinchOffs, type WakeJet } from './wakeJet'

/** One ring at one station, with the range between the ageing laws where both were run. */
export interface WakeArrival {
  readonly station: number
  readonly ring: number
  readonly time: number
  readonly timeLow: number
  /** null where the march under the other law ended before the ring arrived: the range is open. */
  readonly timeHigh: number | null
  readonly open: boolean
}

export interface WakeData {
  /** The rings the march began with. */
  readonly rings: readonly WakeRing[]
  readonly wake: Wake
  readonly ageing: WakeAgeing
  /** The same rings under the turbulent law, where both laws apply; null else. */
  readonly turbulent: Wake | null
  readonly arrivals: readonly WakeArrival[]
  /** Where the rings come from, and what that left out. */
  readonly notes: readonly string[]
  /** How the rings came about, where they start from the computed jet; null else. */
  readonly jet: WakeJet | null
}

/**
 * March the wake of a plan.
 *
 * @param pulse the pulse of the plan; read where the wake has no rings of its own
 * @param formed the finished jet its rings start from (`wakeJetRun`); null: the matched ring of the pulse, or the wake's own rings
 * @throws {DomainError} with the plan path that breaks a limit
 */
export async function wakeOf(
  plan: Plan,
  section: WakeSection,
  water: WaterProperties,
  pulse: PulseResult | null,
  options: WakeRunOptions,
  formed: JetRun | null = null,
): Promise<WakeData> {
  const kernel = options.kernel ?? (await loadKernel())
  const { rings, notes, jet } = ringsOfPlan(plan, section, water, pulse, formed, kernel)
  if (section.rings.length === 0) checkTube(section.tube, rings)
  const laws = ageingLaws(section, rings, water.kinematicViscosity)
  const march = async (ageing: WakeAgeing, from: number, share: number): Promise<Wake> => {
    const input = inputOf(plan, section, water, rings, ageing)
    const wake = await marchWake(jet === null ? input : { ...input, law: 'regularised', merging: true }, {
      kernel,
      ...(options.pause === undefined ? {} : { pause: options.pause }),
      ...(options.signal === undefined ? {} : { signal: options.signal }),
      onProgress: ({ share: done, what }) => options.onProgress?.({ share: from + share * done, what }),
    })
    return jet === null ? wake : withPinchOffs(wake, jet)
  }
  const [ageing] = laws
  const both = laws.length === 2
  const wake = await march(ageing, 0, both ? 0.5 : 1)
  // Rings in space know no turbulent law, so a second run would only repeat the first.
  const second = both && wake.model === 'coaxial' && wake.status === 'done'
  const turbulent = second ? await march('turbulent', 0.5, 0.5) : null
  return { rings, wake, ageing, turbulent, arrivals: arrivalsOf(wake, turbulent), notes, jet }
}

function ringsOfPlan(
  plan: Plan,
  section: WakeSection,
  water: WaterProperties,
  pulse: PulseResult | null,
  formed: JetRun | null,
  kernel: Kernel,
): { readonly rings: readonly WakeRing[]; readonly notes: readonly string[]; readonly jet: WakeJet | null } {
  if (section.rings.length > 0) return { rings: section.rings, notes: [], jet: null }
  if (formed !== null && pulse !== null) {
    const made = jetRings(plan, water, pulse, formed, kernel)
    return { ...made, rings: ringsOfNozzles(made.rings, []) }
  }
  const ring = pulse?.ring ?? null
  if (pulse === null || ring === null)
    throw new DomainError('wake.rings', 'wake.rings must be given where the pulse makes no ring to follow, got none')
  const train = plan.train ?? { pulses: 1, period: 1 }
  const made = trainRings({ density: water.density, ring, duration: pulse.duration, ...train })
  const notes: string[] = []
  if (pulse.pinchedOff === true)
    notes.push('The trailing jet behind each ring is left out: only the rings are followed.')
  return { rings: ringsOfNozzles(made.rings, section.nozzles, plan.nozzle.axisRatio), notes, jet: null }
}

/** Rings of the pulse stand nowhere in the plan: a tube too small for them is refused by its own name. @throws {DomainError} */
function checkTube(tube: number | null, rings: readonly WakeRing[]): void {
  const largest = Math.max(...rings.map(({ radius }) => radius))
  if (tube === null || !(tube > 0) || largest <= LARGEST_TUBE_SHARE * tube) return
  const number = (value: number): number => Number(value.toPrecision(6))
  throw new DomainError(
    'wake.tube',
    `wake.tube must be at least ${number(largest / LARGEST_TUBE_SHARE)} m in radius, for rings of the pulse of radius ${number(largest)} m fill at most ${LARGEST_TUBE_SHARE} of it, got ${number(tube)} m`,
  )
}

function inputOf(
  plan: Plan,
  section: WakeSection,
  water: WaterProperties,
  rings: readonly WakeRing[],
  ageing: WakeAgeing,
): WakeInput {
  return {
    model: section.model,
    law: section.law,
    rings,
    kinematicViscosity: water.kinematicViscosity,
    viscous: section.viscous,
    ageing,
    axialFlow: plan.ambient.axialFlow,
    wall: section.wall,
    tube: section.tube,
    stations: section.stations,
    duration: section.duration,
    outputStep: section.outputStep,
    tolerance: section.tolerance,
  }
}

/** The laws to run: one, or laminar then turbulent where the strongest ring lies between. */
function ageingLaws(
  section: WakeSection,
  rings: readonly WakeRing[],
  viscosity: number,
): readonly ['laminar', 'turbulent'] | readonly [WakeAgeing] {
  if (!section.viscous) return ['laminar']
  if (section.ageing !== 'auto') return [section.ageing]
  const strongest = Math.max(0, ...rings.map((ring) => Math.abs(ring.circulation)))
  const regime = ageingRegime(strongest, viscosity)
  return regime === 'between' ? ['laminar', 'turbulent'] : [regime]
}

/** The place of an arrival: its station, read from where it happened. */
function arrivalsOf(wake: Wake, other: Wake | null): WakeArrival[] {
  const key = (rings: readonly number[], x: number | null): string => `${rings.join(' ')} at ${(x ?? 0).toPrecision(6)}`
  const others = new Map(
    (other?.events ?? []).flatMap((event) =>
      event.event === 'arrival' ? [[key(event.rings, event.x), event.time] as const] : [],
    ),
  )
  return wake.events.flatMap(({ event, rings, x, time }): WakeArrival[] => {
    const ring = rings[0]
    if (event !== 'arrival' || ring === undefined || x === null) return []
    const second = other === null ? time : others.get(key(rings, x))
    if (second === undefined) return [{ station: x, ring, time, timeLow: time, timeHigh: null, open: true }]
    const [timeLow, timeHigh] = [Math.min(time, second), Math.max(time, second)]
    return [{ station: x, ring, time, timeLow, timeHigh, open: false }]
  })
}
