/**
 * The published formation number and what a nozzle and a stream do to every estimate of it.
 *
 * Sources: [G] M. Gharib, E. Rambod & K. Shariff 1998, J. Fluid Mech. 360:121 (band 3.6..4.5, quick starts from a tube);
 * [Z] Zhu, Zhang, Gao & Yu 2023, J. Fluid Mech. (axial stream; the ends are published, the curve between is ours);
 * [R] M. Rosenfeld, E. Rambod & M. Gharib 1998, J. Fluid Mech. 376:297 (parabolic exit profile, about 1; recalled, not re-read);
 * [O] C. O'Farrell & J. O. Dabiri 2014, J. Fluid Mech. 740:61 (elliptic nozzles of aspect 2 and 4: 3..4);
 * [L] D. Limbourg & J. Nedic 2021, J. Fluid Mech. (sharp orifices: times contraction^1.5).
 */
import { evaluateCubic, monotoneCubic } from '../base'
import { contraction } from './exitFactors'
import type { NozzleInput } from './types'

/** Band and centre of [G]. */
export const PUBLISHED_BAND = { low: 3.6, centre: 4, high: 4.5 } as const
/** The same on elliptic nozzles of aspect 2 to 4, on the equal-area diameter [O]. */
const ELLIPTIC_BAND = { low: 3, centre: 3.5, high: 4 } as const
const ELLIPTIC_FROM = 2
const ELLIPTIC_TO = 4

/** Stream over peak exit speed between which [Z] measured, and the formation numbers there (of a tube with 4 at rest). */
const STRONGEST_COUNTER_FLOW = -0.4
const AT_COUNTER_FLOW = 9.6
const STRONGEST_CO_FLOW = 0.5
const AT_CO_FLOW = 1.92
/** A ratio of two decimal inputs may miss -0.4 by rounding. */
const ROUNDING = 1e-9

/** A parabolic profile brings the measured 4 to about 1 [R]. */
const PARABOLIC_SHARE = 1 / 4

/** The plan's modifiers, ready to act on any estimate. */
export interface FormationModifiers {
  /**
   * Modified estimate. @param share what the exit itself already did to the raw estimate, as a factor on that of a
   * uniform parallel jet; the stream acts on the estimate without it.
   */
  readonly apply: (raw: number, share: number) => number
  /**
   * Modified value of the computed jet: it carries the stream itself, and is made for a round tube with a uniform exit, so that profile,
   * axis ratio and contraction are still to come.
   */
  readonly applyToJet: (raw: number) => number
  /** False in a counter-flow so strong that no ring is expected. */
  readonly ringExpected: boolean
  /** Modified band of the experiments. */
  readonly band: { readonly low: number; readonly centre: number; readonly high: number }
  readonly notes: readonly string[]
}

/**
 * @param nozzle a valid nozzle
 * @param streamRatio flow past the nozzle over peak exit speed, + along the jet
 */
export function formationModifiers(nozzle: NozzleInput, streamRatio: number): FormationModifiers {
  const band = ellipticBand(nozzle.axisRatio)
  const ellipse = band.centre / PUBLISHED_BAND.centre
  const orifice = contraction(nozzle) ** 1.5
  const profileShare = nozzle.exitProfile === 'parabolic' ? PARABOLIC_SHARE : 1
  const ringExpected = streamRatio >= STRONGEST_COUNTER_FLOW - ROUNDING
  // The band keeps its relative width in a stream: [Z] gives one value, not a scatter.
  const onBand = (inStream(PUBLISHED_BAND.centre, streamRatio) / PUBLISHED_BAND.centre) * orifice * profileShare
  return {
    apply: (raw, share) => share * inStream(raw / share, streamRatio) * ellipse * orifice,
    applyToJet: (raw) => raw * profileShare * ellipse * orifice,
    ringExpected,
    band: { low: band.low * onBand, centre: band.centre * onBand, high: band.high * onBand },
    notes: modifierNotes(nozzle, streamRatio, ringExpected),
  }
}

/**
 * Formation number in a stream: monotone cubic in its logarithm through (-0.4, 9.6), (0, still), (0.5, 1.92 still/4), held
 * beyond both ends [Z].
 *
 * @param still formation number without a stream
 */
function inStream(still: number, streamRatio: number): number {
  if (streamRatio === 0) return still
  const held = Math.min(STRONGEST_CO_FLOW, Math.max(STRONGEST_COUNTER_FLOW, streamRatio))
  const atCoFlow = (AT_CO_FLOW / PUBLISHED_BAND.centre) * still
  const curve = monotoneCubic(
    [STRONGEST_COUNTER_FLOW, 0, STRONGEST_CO_FLOW],
    [Math.log(AT_COUNTER_FLOW), Math.log(still), Math.log(atCoFlow)],
  )
  return Math.exp(evaluateCubic(curve, held).value)
}

/** Band for an axis ratio: [G] at 1, [O] from 2 on, a straight line between. */
function ellipticBand(axisRatio: number): { low: number; centre: number; high: number } {
  const share = Math.min(1, (axisRatio - 1) / (ELLIPTIC_FROM - 1))
  const mix = (key: 'low' | 'centre' | 'high') =>
    PUBLISHED_BAND[key] + (ELLIPTIC_BAND[key] - PUBLISHED_BAND[key]) * share
  return { low: mix('low'), centre: mix('centre'), high: mix('high') }
}

function modifierNotes(nozzle: NozzleInput, streamRatio: number, ringExpected: boolean): string[] {
  const notes: string[] = []
  const ratio = streamRatio.toFixed(2).replace('-', '−')
  if (!ringExpected)
    notes.push(
      `No ring is expected: the counter-flow is ${ratio} of the peak exit speed, and rings were seen down to −0.40 (Zhu et al. 2023).`,
    )
  else if (streamRatio > STRONGEST_CO_FLOW + ROUNDING)
    notes.push(
      `The co-flow is ${ratio} of the peak exit speed; the modifier is held at its value for 0.50, the strongest measured (Zhu et al. 2023).`,
    )
  else if (streamRatio !== 0)
    notes.push(
      `The stream, ${ratio} of the peak exit speed, is in every estimate but the computed jet, which carries it itself, by a curve between the published values at −0.40 and 0.50 (Zhu et al. 2023).`,
    )
  if (nozzle.exitProfile === 'parabolic')
    notes.push(
      'The parabolic exit profile is in the slug integrals, so in the estimates made from them; the published band is scaled to the about 1 found for it (Rosenfeld et al. 1998; recalled, not re-read).',
    )
  if (nozzle.axisRatio > 1)
    notes.push(
      nozzle.axisRatio > ELLIPTIC_TO
        ? `Elliptic nozzles were measured at axis ratios 2 and 4: 3 to 4 on the equal-area diameter (O'Farrell & Dabiri 2014); this one, ${nozzle.axisRatio.toPrecision(3)}, is held at that.`
        : `Elliptic nozzles of axis ratio 2 and 4 gave 3 to 4 on the equal-area diameter (O'Farrell & Dabiri 2014); every estimate is scaled by the centre of that band.`,
    )
  if (nozzle.shape === 'orifice') notes.push(...orificeNotes(nozzle))
  if (nozzle.shape !== 'orifice' && nozzle.radialRatio > 0)
    notes.push(
      `The radial speed ratio ${nozzle.radialRatio.toPrecision(2)} is in the slug integrals, so in the estimates made from them; the published band is for a parallel jet and left as it is.`,
    )
  return notes
}

function orificeNotes(nozzle: NozzleInput): string[] {
  const notes = [
    `Every estimate is multiplied by the contraction to the power 1.5, here ${contraction(nozzle).toFixed(3)} (Limbourg & Nedic 2021)${
      nozzle.contraction === null ? ', estimated from the area ratio' : ''
    }.`,
  ]
  if (nozzle.radialRatio > 0)
    notes.push(
      'The search leaves the radial speed ratio out: the contraction is its effect on the formation number, and both would count it twice.',
    )
  return notes
}
