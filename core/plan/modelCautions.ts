/**
 * Cautions about what the models can tell of this pulse. Each states its number and its limit.
 */
import type { FormationNumbers, PulseNote, PulseResult } from '../pulse'
import { formatFixed } from '../quantity'
import { LAMINAR_BELOW, TURBULENT_ABOVE } from '../ring'
import type { CautionDefinition } from './cautionTypes'

/** Below this jet Reynolds number viscosity takes a share the slug model does not know: common practice. */
const LOW_JET_REYNOLDS = 500

/** Tube boundary layer that quickens the core flow by this share is worth a note: common practice. */
const BOUNDARY_LAYER_SHARE = 1.25

const two = (value: number): string => formatFixed(value)
/** Three figures, as the results are shown. */
const whole = (value: number): string => String(Number(value.toPrecision(3)))

/** Ring Reynolds numbers of both ends of the range, rising. */
function reynoldsRange(pulse: PulseResult): readonly number[] {
  return [pulse.ring, pulse.ringWithOverPressure]
    .flatMap((ring) => (ring === null ? [] : [ring.reynolds]))
    .sort((a, b) => a - b)
}

function rangeWords(values: readonly number[]): string {
  const low = whole(values[0] ?? 0)
  const high = whole(values.at(-1) ?? 0)
  return low === high ? low : `${low} to ${high}`
}

const ESTIMATES = [
  ['energyLimit', 'energy limit'],
  ['carriedVolume', 'carried volume'],
  ['speedMatch', 'speed match'],
  ['computed', 'computed jet'],
] as const satisfies readonly (readonly [keyof FormationNumbers, string])[]

/** Sentence where some estimates say "still one ring" and others "already past". */
function disagreement(pulse: PulseResult): string | null {
  const found = ESTIMATES.flatMap(([key, name]) => {
    const value = pulse.formationNumber[key]
    // The computed jet's number is good to a few tenths.
    return value === null ? [] : [{ name, value, words: key === 'computed' ? value.toFixed(1) : two(value) }]
  })
  const past = found.filter(({ value }) => pulse.strokeRatio > value)
  const before = found.filter(({ value }) => pulse.strokeRatio <= value)
  if (past.length === 0 || before.length === 0) return null
  const names = (list: typeof found): string => list.map(({ name, words }) => `${name} ${words}`).join(', ')
  return `The estimates of pinch-off disagree about this stroke of ${two(pulse.strokeRatio)} D: already past by ${names(past)}; not yet by ${names(before)}.`
}

/** Sources of what the pulse itself has to say; the sentence is the pulse's own. */
const PULSE_NOTE_SOURCES: Readonly<Record<PulseNote['id'], string>> = {
  'table-read': 'how tables are read',
  'reduced-peak': 'definition of a short trapezoid',
  'no-start-over-pressure': 'Krueger 2005, J. Fluid Mech. 545:427',
  'parabolic-start': 'Krueger 2005, J. Fluid Mech. 545:427',
  'parallel-jet-assumed': 'Krieg & Mohseni 2013, J. Fluid Mech. 719:488',
  'radial-inflow': 'Krieg & Mohseni 2013, J. Fluid Mech. 719:488',
  'no-matching-ring': 'Norbury 1973, J. Fluid Mech. 57:417',
  'thin-core': 'diffusion of a line vortex; textbook law',
  'no-steady-ring': 'Hill 1894; Norbury 1973, J. Fluid Mech. 57:417',
  'elliptic-exit': 'Dhanak & de Bernardinis 1981, J. Fluid Mech. 109:189',
  'stream-left-out': 'limits of the slug model',
}

const PULSE_NOTE_CAUTIONS: readonly CautionDefinition[] = Object.entries(PULSE_NOTE_SOURCES).map(([id, source]) => ({
  id,
  group: 'model',
  source,
  text: ({ pulse }) => pulse?.notes.find((note) => note.id === id)?.text ?? null,
}))

export const MODEL_CAUTIONS: readonly CautionDefinition[] = [
  ...PULSE_NOTE_CAUTIONS,
  {
    id: 'estimates-disagree',
    group: 'model',
    source: 'Linden & Turner 2001; Mohseni & Gharib 1998; Gharib, Rambod & Shariff 1998',
    text: ({ pulse }) => (pulse === null ? null : disagreement(pulse)),
  },
  {
    id: 'pinched-off',
    group: 'model',
    source: 'Gharib, Rambod & Shariff 1998, J. Fluid Mech. 360:121 (recalled, not re-read)',
    text: ({ pulse }) => {
      if (pulse?.pinchedOff !== true || pulse.formationNumber.adopted === null) return null
      return `The stroke of ${two(pulse.strokeRatio)} D is past the adopted formation number ${two(pulse.formationNumber.adopted)}: what leaves after it trails behind the ring as a weaker jet.`
    },
  },
  {
    id: 'ring-not-laminar',
    group: 'model',
    source: 'common practice',
    text: ({ pulse }) => {
      const values = pulse === null ? [] : reynoldsRange(pulse)
      const highest = values.at(-1) ?? 0
      if (highest <= LAMINAR_BELOW) return null
      const state = highest > TURBULENT_ABOVE ? 'likely turbulent' : 'past the laminar range'
      return `Ring Reynolds number ${rangeWords(values)}: ${state}, expect the ring to grow and slow sooner than an ideal one.`
    },
  },
  {
    id: 'low-reynolds',
    group: 'model',
    source: 'common practice',
    text: ({ pulse }) =>
      pulse !== null && pulse.jetReynolds < LOW_JET_REYNOLDS
        ? `Jet Reynolds number ${whole(pulse.jetReynolds)} is below ${LOW_JET_REYNOLDS}: viscosity weakens the ring while it forms, which these inviscid formulas leave out.`
        : null,
  },
  {
    id: 'boundary-layer',
    group: 'model',
    source: 'impulsive start in a tube, laminar boundary layer (recalled, not re-read)',
    text: ({ pulse }) =>
      pulse !== null && pulse.boundaryLayerFactor > BOUNDARY_LAYER_SHARE
        ? `The boundary layer in the tube may quicken the core of the jet by ${whole((pulse.boundaryLayerFactor - 1) * 100)} % by the end of the stroke; this is noted, not applied.`
        : null,
  },
  {
    id: 'slow-start',
    group: 'model',
    source: 'definition of a quick start: peak speed x time to 95 % of it / D at most 1',
    text: ({ pulse }) =>
      pulse !== null && !pulse.quickStart
        ? `The speed takes ${two(pulse.startFormationTime)} formation times to reach 95 % of its peak: carried volume and speed match hold for quick starts only and are left out, the published band was measured for quick starts and is shown for orientation, and no over-pressure is added.`
        : null,
  },
  {
    id: 'modified-formation-number',
    group: 'model',
    source: 'beside each estimate',
    text: ({ pulse }) => {
      const notes = pulse?.formationNumber.notes.filter(({ estimate }) => estimate === 'modifier') ?? []
      return notes.length === 0 ? null : notes.map(({ text }) => text).join(' ')
    },
  },
  {
    id: 'given-water',
    group: 'model',
    source: 'common practice',
    text: ({ plan }) =>
      plan.water.kind === 'given'
        ? 'Density and viscosity are as given; they are not checked against any table.'
        : null,
  },
]
