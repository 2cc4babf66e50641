/**
 * The stroke at which a formation number is read.
 */
import { compileProgramme, withStroke } from '../../pulse'
import type { JetEnsembleInput } from './ensemble'

/** From this stroke ratio on the formation number no longer depends on the stroke; below, the end of the stroke cuts the ring short. */
export const FORMATION_STROKE_FROM = 6
/** Stroke ratio that is run instead of a shorter one. */
export const FORMATION_STROKE = 8

/**
 * Input of a run that gives the formation number of a programme: the number belongs to the start and the peak speed, and a stroke of 3.5 to
 * 6 diameters ends before the ring is full, so that its own run gives too small a number, a shorter one none.
 *
 * @returns the input itself where its stroke is at least 6 diameters; else the same start and peak with a stroke of 8 (a table is stretched
 * in time), of which only the formation number, its range and the pinched ring are to be read: it is not followed to its end
 * @throws {DomainError} on a programme that breaks its limits
 */
export function formationInput(input: JetEnsembleInput): JetEnsembleInput {
  if (compileProgramme(input.programme).stroke >= FORMATION_STROKE_FROM * input.diameter) return input
  return {
    ...input,
    programme: withStroke(input.programme, FORMATION_STROKE * input.diameter),
    settings: { ...input.settings, wholeStroke: false, followTime: 0, snapshotStep: 0 },
  }
}
