/**
 * The water of a plan: what every other room takes density, viscosity and pressure from.
 */
import { DomainError, requireRange, STANDARD_GRAVITY } from '../base'
import { freshDensity, seaDensity } from './density'
import { saturationPressure } from './vapour'
import { freshViscosity, seaViscosity } from './viscosity'

/** Fresh or sea water by formula, or any liquid with its properties given. */
export type WaterKind = 'fresh' | 'sea' | 'given'

export interface WaterInput {
  readonly kind: WaterKind
  /** 0 to 40; not read for given water. */
  readonly temperatureCelsius: number
  /** Practical, 0 to 42; read for sea water only. */
  readonly salinity: number
  /** Of the nozzle under the surface [m]. */
  readonly depth: number
  /** At the surface, absolute [Pa]. */
  readonly atmosphericPressure: number
  /** Given water only [kg/m3]. */
  readonly density: number | null
  /** Given water only [m2/s]. */
  readonly kinematicViscosity: number | null
  /** Given water only [Pa]; null there: not known, and nothing that needs it is computed. */
  readonly vapourPressure: number | null
}

export interface WaterProperties {
  readonly density: number
  readonly dynamicViscosity: number
  readonly kinematicViscosity: number
  /** null where the water is given without one. */
  readonly vapourPressure: number | null
  /** At the depth of the nozzle: atmospheric + density x g x depth [Pa]. */
  readonly absolutePressure: number
  /** Where each property comes from, one sentence each. */
  readonly sources: readonly string[]
  /** What the reader of the numbers should know, one sentence each. */
  readonly notes: readonly string[]
}

const TEMPERATURE_RANGE = { min: 0, max: 40, unit: '°C' }
const SALINITY_RANGE = { min: 0, max: 42 }

/**
 * Compressibility of water [1/Pa] for the note on depth only: 4.5e-10 at 25 C, 5.1e-10 at 0 C (IAPWS SR6-08), and a
 * share worth telling.
 */
const COMPRESSIBILITY = 4.6e-10
const SHARE_WORTH_TELLING = 1e-4

const VAPOUR_SOURCE = 'Vapour pressure: IAPWS-IF97, region 4.'
const FRESH_SOURCES = [
  'Density: IAPWS SR6-08, liquid water at 0.1 MPa.',
  'Viscosity: IAPWS R12-08.',
  VAPOUR_SOURCE,
] as const
const SEA_SOURCES = [
  'Density: EOS-80, UNESCO Technical Papers in Marine Science 44, at the surface.',
  'Viscosity: Sharqawy, Lienhard and Zubair 2010, relative to fresh water by IAPWS R12-08.',
  VAPOUR_SOURCE,
] as const

/**
 * Properties of the water, and the pressure at the depth of the nozzle.
 *
 * @returns SI; density and viscosity at surface pressure
 * @throws {DomainError} with the plan path of the field that is outside its range or missing
 */
export function waterProperties(input: WaterInput): WaterProperties {
  requireRange('water.depth', input.depth, { min: 0, unit: 'm' })
  requireRange('water.atmosphericPressure', input.atmosphericPressure, { above: 0, unit: 'Pa' })
  switch (input.kind) {
    case 'given':
      return givenWater(input)
    case 'fresh':
      requireRange('water.temperatureCelsius', input.temperatureCelsius, TEMPERATURE_RANGE)
      return assemble(input, {
        density: freshDensity(input.temperatureCelsius),
        dynamicViscosity: freshViscosity(input.temperatureCelsius),
        vapourPressure: saturationPressure(input.temperatureCelsius),
        sources: FRESH_SOURCES,
        notes: [],
      })
    case 'sea':
      requireRange('water.temperatureCelsius', input.temperatureCelsius, TEMPERATURE_RANGE)
      requireRange('water.salinity', input.salinity, SALINITY_RANGE)
      return assemble(input, {
        density: seaDensity(input.salinity, input.temperatureCelsius),
        dynamicViscosity: seaViscosity(input.salinity, input.temperatureCelsius),
        vapourPressure: saturationPressure(input.temperatureCelsius),
        sources: SEA_SOURCES,
        notes: ['The vapour pressure is that of fresh water; at salinity 35 that of sea water is about 2 % less.'],
      })
  }
}

interface Surface {
  readonly density: number
  readonly dynamicViscosity: number
  readonly vapourPressure: number | null
  readonly sources: readonly string[]
  readonly notes: readonly string[]
}

function givenWater(input: WaterInput): WaterProperties {
  const density = given('water.density', input.density, 'kg/m3')
  const viscosity = given('water.kinematicViscosity', input.kinematicViscosity, 'm2/s')
  const { vapourPressure } = input
  requireRange('water.density', density, { above: 0, unit: 'kg/m3' })
  requireRange('water.kinematicViscosity', viscosity, { above: 0, unit: 'm2/s' })
  if (vapourPressure !== null) requireRange('water.vapourPressure', vapourPressure, { min: 0, unit: 'Pa' })
  const sources = ['Density, kinematic viscosity and vapour pressure: as given in the plan.']
  const notes = vapourPressure === null ? ['No vapour pressure is given: cavitation cannot be judged.'] : []
  const surface = { density, dynamicViscosity: density * viscosity, vapourPressure, sources, notes }
  // The given viscosity is passed through, not divided back out of the dynamic one.
  return { ...assemble(input, surface), kinematicViscosity: viscosity }
}

function given(field: string, value: number | null, unit: string): number {
  if (value === null)
    throw new DomainError(field, `${field} must be given in ${unit} when the water is "given"; it is missing`)
  return value
}

function assemble(input: WaterInput, surface: Surface): WaterProperties {
  const { density, dynamicViscosity, vapourPressure, sources } = surface
  const head = density * STANDARD_GRAVITY * input.depth
  const share = COMPRESSIBILITY * head
  const depthNote = `Density is that at the surface; at this depth water is about ${(100 * share).toPrecision(1)} % denser.`
  return {
    density,
    dynamicViscosity,
    kinematicViscosity: dynamicViscosity / density,
    vapourPressure,
    absolutePressure: input.atmosphericPressure + head,
    sources,
    notes: input.kind !== 'given' && share >= SHARE_WORTH_TELLING ? [...surface.notes, depthNote] : surface.notes,
  }
}
