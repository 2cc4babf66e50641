/**
 * Cautions about the computed starting jet: what its model holds, the one constant chosen in it, and where its numbers are known to be off.
 */
import { LIP_AVERAGE, SHORT_STROKE, SHORT_STROKE_DELTA } from '../coaxial'
import type { NozzleInput } from '../pulse'
import { formatFixed } from '../quantity'
import type { CautionContext, CautionDefinition } from './cautionTypes'

/** Shown member of the plan's own stroke, where there is a jet. */
function shown({ jet }: CautionContext) {
  return jet?.own.shown ?? null
}

/** Shares of the impulse that differ by more than this are told. */
const TOLD_SHARE = 0.1

/** Share of the impulse shed by pinch-off that lies behind the ring then; null without pinch-off. */
function jetBehind(context: CautionContext): { readonly behind: number; readonly formationTime: number } | null {
  const run = shown(context)
  if (run === null || run.pinchOff === null || run.ring === null) return null
  const { time, formationTime } = run.pinchOff
  // Rows end with the run, which goes on past pinch-off; rounding may put its own row just before.
  const row = run.history.time.findIndex((known) => known >= time * (1 - 1e-9))
  const whole = run.history.totalImpulse[row]
  return whole === undefined ? null : { behind: 1 - run.ring.impulse / whole, formationTime }
}

/** What keeps a nozzle from being a plain round tube, in words. */
function unlikeTube({ shape, axisRatio, exitProfile, radialRatio }: NozzleInput): readonly string[] {
  return [
    ...(shape === 'converging' ? ['a converging exit'] : []),
    ...(shape === 'orifice' ? ['a sharp orifice'] : []),
    ...(axisRatio > 1 ? [`an axis ratio of ${Number(axisRatio.toPrecision(3))}`] : []),
    ...(exitProfile === 'parabolic' ? ['a parabolic exit profile'] : []),
    ...(radialRatio > 0 ? ['a radial speed ratio'] : []),
  ]
}

export const JET_CAUTIONS: readonly CautionDefinition[] = [
  {
    id: 'jet-not-run',
    group: 'model',
    source: 'how results are kept',
    text: ({ jetMissing }) => jetMissing,
  },
  {
    id: 'jet-round-tube',
    group: 'model',
    source: 'limits of the starting jet',
    text: (context) => {
      const unlike = unlikeTube(context.plan.nozzle)
      if (context.jet === null || unlike.length === 0) return null
      return `The computed jet is that of a round tube with a uniform exit speed on the exit diameter; this nozzle has ${unlike.join(' and ')}, which the jet leaves out. Its formation number is brought to this nozzle by the same factors as the other estimates; what it has beyond the slug is not.`
    },
  },
  {
    id: 'jet-one-constant',
    group: 'model',
    source:
      'method after Nitsche & Krasny 1994, J. Fluid Mech. 276:139; constant by Krueger 2005, J. Fluid Mech. 545:427',
    text: ({ jet }) =>
      jet === null
        ? null
        : `One constant of the computed jet is chosen, not derived: the bound strength at the lip is averaged over ${LIP_AVERAGE} smoothing length of wall, so that the circulation beyond the slug agrees with the published over-pressure circulation. Half or twice that length would move it from 0.28 to 0.47 or 0.17 of peak speed times diameter.${(jet.formation?.formationNumber ?? null) === null ? '' : ' The range of the computed formation number is over smoothing lengths only: the stroke of its run alone moves it by about 0.3.'}`,
  },
  {
    id: 'jet-impulse-share',
    group: 'model',
    source: 'own comparison of the slug and the starting jet',
    text: (context) => {
      const ofJet = jetBehind(context)
      const { pulse } = context
      if (ofJet === null || pulse === null || pulse.pinchedOff === null) return null
      const ofSlug = pulse.trailingJet.impulse / pulse.total.impulse
      if (Math.abs(ofSlug - ofJet.behind) <= TOLD_SHARE) return null
      const percent = (share: number): string => `${formatFixed(100 * share, 0)} %`
      return `Two shares of the impulse differ. Cut at the adopted formation number, the slug leaves ${percent(ofSlug)} of the impulse of the whole stroke behind its ring: what the piston pushes out after the ring is full. The computed jet, cut where its ring is seen to pinch off at formation time ${formatFixed(ofJet.formationTime, 1)}, has ${percent(ofJet.behind)} behind the ring and ${percent(1 - ofJet.behind)} in it, of the impulse of everything shed by then${ofJet.behind < ofSlug ? ': its ring goes on taking in fluid until it pinches off' : ''}.`
    },
  },
  {
    id: 'jet-left-out',
    group: 'model',
    source: 'limits of the starting jet',
    text: ({ jet }) =>
      jet === null
        ? null
        : 'The computed jet is one of perfect rings: waves round the ring, turbulence, the boundary layer in the tube and the cancellation of opposite vorticity are not in it.',
  },
  {
    id: 'jet-slow-ring',
    group: 'model',
    source: 'own comparison; measured pulse: open data to Choi et al., arXiv 2605.03239',
    text: ({ jet }) =>
      jet === null || jet.own.ringSpeed === null
        ? null
        : 'The smoothing makes the computed ring slow, by 5 to 9 % at a smoothing of 0.1 D. Against the one measured path at hand, a short pulse, the computed ring is 41 % too slow, and why is not known: do not take arrival times from it.',
  },
  {
    id: 'jet-short-stroke',
    group: 'model',
    source: 'own study of the smoothing',
    text: (context) => {
      const run = shown(context)
      if (run === null || run.strokeRatio >= SHORT_STROKE) return null
      const begin = `The stroke of ${formatFixed(run.strokeRatio)} D is below ${SHORT_STROKE} D`
      return run.delta <= SHORT_STROKE_DELTA
        ? `${begin}: its jet is computed at one smoothing length, ${run.delta} D, and has no spread to show.`
        : `${begin}, and the smoothing given, ${run.delta} D, takes much of the energy of so young a ring, half of it at 0.1 D; ${SHORT_STROKE_DELTA} D is meant for such strokes.`
    },
  },
  {
    id: 'jet-one-smoothing',
    group: 'model',
    source: 'own study of the smoothing',
    text: ({ jet }) => {
      if (jet === null || jet.formation === null) return null
      const { formationNumber, runs } = jet.formation
      if (formationNumber === null || runs.length > 1) return null
      return 'The formation number comes from one smoothing length; another would move it by some tenths. Three lengths show the spread.'
    },
  },
  {
    id: 'jet-no-pinch-off',
    group: 'model',
    source: 'rule of pinch-off in the starting jet',
    text: ({ jet }) => {
      if (jet === null || jet.formation?.status !== 'done' || jet.formation.formationNumber !== null) return null
      return `No pinch-off was seen in the computed jet with a stroke of ${formatFixed(jet.formation.shown.strokeRatio, 1)} D, so it gives no formation number. A speed that rises to the end and a counter-flow let a ring take more; a longer stroke may show where it ends.`
    },
  },
  {
    id: 'jet-notes',
    group: 'model',
    source: 'how the starting jet is read',
    text: ({ jet }) => (jet === null || jet.notes.length === 0 ? null : jet.notes.join(' ')),
  },
]
