/** The answer to "why?" beside every figure of a tank run. */
import { DISPLACEMENT_SHARE, STEP_OVER_RADIUS, WAITING_OVER_PASSAGE, type TankRunResult } from '../tank'
import type { Plan } from '../plan'
import { formula, over, row, sub } from './mathml'
import type { Explanation } from './types'

export interface TankExplanationContext {
  readonly plan: Plan
  readonly result: TankRunResult
}

type Maker = (context: TankExplanationContext) => Omit<Explanation, 'id'>
type Given = readonly [name: string, value: number | null, unit: string]

function present(...entries: readonly Given[]): Explanation['values'] {
  return entries.flatMap(([name, value, unit]) => (value === null ? [] : [{ name, value, unit }]))
}

const short = (value: number): string => String(Number(value.toPrecision(3)))

const arrival: Maker = ({ result }) => {
  const regimes = [...new Set(result.rings.map(({ ageing }) => ageing))]
  const unseen = result.arrivals.filter(({ time }) => time === null).length
  return {
    title: 'Arrival at a station',
    mathml: formula(sub('x', 'station'), '=', sub('x', '0'), '+', '∫ V d t'),
    formula:
      'The ring appears after the stroke where its speed times the duration has brought it and moves at the speed of its core, which ageing thickens and the walls slow; the range spans what it may be made of and how it may age.',
    values: present(
      ...result.rings.flatMap(({ basis, ageing, circulation }): Given[] => [
        [`circulation, ${basis}, ${ageing}`, circulation, 'm²/s'],
      ]),
      ['speed changed by the walls', 100 * result.wallShare, '%'],
    ),
    source:
      'Thin-ring law with a growing core, and turbulent ageing after Maxworthy 1974 and Glezer & Coles 1990: the laws of the Wake page.',
    mark: 'published',
    range:
      'One ring in water at rest before it, away from the walls. Below a ring Reynolds number of 3000 it ages as a laminar one, above 10 000 as a turbulent one, between them both are run. Scatter of what the plan states is the spread, not this range.',
    inside: unseen === 0 && result.clearances.every(({ wallInteraction }) => !wallInteraction),
    verdict:
      unseen > 0
        ? `Outside at ${unseen} of ${result.arrivals.length} stations: the ring is not seen there.`
        : `${result.rings.length} rings followed, ageing ${regimes.join(' and ')}.`,
  }
}

const walls: Maker = ({ plan, result }) => {
  const near = result.clearances.reduce((least, { overDiameter }) => Math.min(least, overDiameter), Infinity)
  const practice = plan.tankRun?.practice.clearance ?? 0
  const inside = result.clearances.every(({ ok, wallInteraction }) => ok && !wallInteraction)
  return {
    title: 'What the walls do',
    mathml: formula(over(row('Δ V'), 'V'), '=', over('1', 'V'), '∑', sub('V', 'image')),
    formula:
      'Images of the ring behind every wall and the surface, opposite in sense, slow it; a round tank by the exact sum of a ring in a tube.',
    values: present(
      ['all walls together', 100 * result.wallShare, '%'],
      ...result.clearances.map(({ wall, overDiameter }): Given => [wall, overDiameter, 'D']),
    ),
    source: 'Method of images; the clearance asked for is common practice.',
    mark: 'identity',
    range:
      'Walls the ring does not come near: within about a radius a real wall sheds vorticity of its own and the ring rebounds, which no image has.',
    inside,
    verdict:
      result.clearances.length === 0
        ? 'The tank is not told, so nothing slows the ring here.'
        : `The nearest is ${short(near)} exit diameters away; practice asks for ${short(practice)}.`,
  }
}

const pairInterval: Maker = ({ plan, result: { imaging } }) => ({
  title: 'Pair interval',
  mathml: formula('Δ t =', over(row(String(DISPLACEMENT_SHARE), 'N'), row('M', sub('V', 'largest')))),
  formula: 'A quarter of the interrogation window over image scale and largest speed in the light sheet.',
  values: present(
    ['window N', plan.tankRun?.camera.window ?? null, 'px'],
    ['scale M', imaging.scale, 'px/m'],
    ['largest speed', imaging.largestSpeed, 'm/s'],
    ['gradient across the core', imaging.gradient, 'px/px'],
  ),
  source: 'Keane & Adrian 1990, Meas. Sci. Technol. 1:1202, and 1992, Appl. Sci. Res. 49:191.',
  mark: 'recalled',
  range: 'Displacements of at most a quarter of a window, and gradients of at most 0.05 pixels a pixel across one.',
  inside: imaging.gradientOk !== false && imaging.pairInterval !== null,
  verdict:
    imaging.pairInterval === null
      ? 'It needs an image scale and a ring.'
      : imaging.gradientOk === false
        ? `Outside: across the core the displacement changes by ${short(imaging.gradient ?? 0)} pixels a pixel.`
        : `Inside; the fastest water is that ${imaging.largestSpeedOf === 'exit' ? 'at the exit' : 'at the edge of the core'}.`,
})

const frameRate: Maker = ({ plan, result: { imaging } }) => ({
  title: 'Frame rate',
  mathml: formula('f = 2', over('V', row(String(STEP_OVER_RADIUS), 'R'))),
  formula: 'Two frames a pair, and a pair each half radius of the ring on its way.',
  values: present(
    ['pairs a second', imaging.pairRate, 'Hz'],
    ['camera, at most', plan.tankRun?.camera.maxFrameRate ?? null, 'Hz'],
    ['an even row of frames would take', imaging.evenFrameRate, 'Hz'],
  ),
  source: 'Common practice for a ring that is followed past its stations.',
  mark: 'common practice',
  range: 'A camera that gives both frames of a pair; light pulses straddle two frames where an even row is too slow.',
  inside: imaging.frameRateOk !== false,
  verdict:
    imaging.frameRateOk === false ? 'Outside: more than the camera takes.' : 'Inside what is told of the camera.',
})

const storage: Maker = ({ plan, result: { imaging, storage: bytes } }) => ({
  title: 'Store of a run',
  mathml: formula('frames × columns × rows × bytes'),
  formula: 'Frames times pixels times bytes a pixel, before any compression.',
  values: present(
    ['frames', imaging.frames, ''],
    ['columns', plan.tankRun?.camera.pixels[0] ?? null, ''],
    ['rows', plan.tankRun?.camera.pixels[1] ?? null, ''],
    ['bytes a pixel', plan.tankRun?.camera.bytesPerPixel ?? null, ''],
  ),
  source: 'Counting.',
  mark: 'identity',
  range: 'Raw frames.',
  inside: true,
  verdict: bytes === null ? 'It needs a frame rate.' : 'Inside.',
})

const settling: Maker = ({ plan, result }) => ({
  title: 'Wait between runs',
  mathml: formula('t =', 'max', '(', sub('t', 'practice'), ',', String(WAITING_OVER_PASSAGE), sub('t', 'last'), ')'),
  formula: 'The minutes of practice, or ten times what the ring needs to its last station where that is longer.',
  values: present(
    ['practice', 60 * (plan.tankRun?.practice.settlingMinutes ?? 0), 's'],
    [
      'latest arrival',
      result.arrivals.reduce<number | null>((most, { timeHigh }) => Math.max(most ?? 0, timeHigh ?? 0), null),
      's',
    ],
  ),
  source: 'Common practice; watch the seeding come to rest.',
  mark: 'common practice',
  range: 'A tank without filter or heater at work; a large tank or a strong stroke may need longer.',
  inside: true,
  verdict: result.settling.text,
})

const day: Maker = ({ plan, result: { matrix } }) => ({
  title: 'Time of the day',
  mathml: formula(
    't =',
    sub('n', 'runs'),
    'max',
    '(',
    sub('t', 'run'),
    ',',
    sub('t', 'wait'),
    ')',
    '+',
    sub('n', 'setups'),
    sub('t', 'setup'),
  ),
  formula: 'Runs times the longer of the time of a run and the wait, and what the changes of set-up cost.',
  values: present(
    ['runs', matrix?.runs.length ?? null, ''],
    ['time of a run', 60 * (plan.tankRun?.matrix?.minutesPerRun ?? 0), 's'],
    ['set-ups', matrix?.blocks ?? null, ''],
    ['time of a set-up', 60 * (plan.tankRun?.matrix?.minutesPerSetUp ?? 0), 's'],
  ),
  source: 'Counting; the minutes are those of the plan.',
  mark: 'identity',
  range: 'No breaks, no runs that are repeated because they failed.',
  inside: true,
  verdict: matrix?.text ?? 'No matrix is planned.',
})

const regime: Maker = ({ result }) => {
  const numbers = result.rings.map(({ reynolds }) => reynolds)
  const { ring, jet, start } = result.settling
  return {
    title: 'Laminar or not',
    mathml: formula('Re =', over('Γ', 'ν')),
    formula: 'Circulation of the ring over kinematic viscosity: below 3000 laminar, above 10 000 turbulent.',
    values: present(
      ['lowest ring Reynolds number', numbers.length === 0 ? null : Math.min(...numbers), ''],
      ['highest', numbers.length === 0 ? null : Math.max(...numbers), ''],
      ['start in formation times', result.profile.rounding.startFormationTime, ''],
    ),
    source: 'Ranges as on the Wake page; a start within 0.1 formation times is common practice.',
    mark: 'common practice',
    range: 'A single ring of a short stroke from rest.',
    inside: ring.regime !== 'between' && start.impulsive,
    verdict: [ring.text, jet.text, start.text].join(' '),
  }
}

const MAKERS = {
  'tank.arrival': arrival,
  'tank.walls': walls,
  'tank.pairInterval': pairInterval,
  'tank.frameRate': frameRate,
  'tank.storage': storage,
  'tank.settling': settling,
  'tank.day': day,
  'tank.regime': regime,
} as const satisfies Readonly<Record<string, Maker>>

export type TankExplanationId = keyof typeof MAKERS
export const TANK_EXPLANATION_IDS = Object.keys(MAKERS).filter((id): id is TankExplanationId => id in MAKERS)

export function explainTank(id: TankExplanationId, context: TankExplanationContext): Explanation {
  return { id, ...MAKERS[id](context) }
}
