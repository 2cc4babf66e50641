/** What is to be said beside a fit, one sentence each. */
import { at } from '../../base'
import type { ReadingResidual, RingFit } from './fitTypes'
import { FIT_WORDS } from './identify'
import type { MeasuredQuantity } from './measurements'
import type { FitName } from './types'

/** Robust normalised residual above which a reading is marked. */
export const OUTLIER_ABOVE = 3.5
/** Correlation above which two parameters are told to be hardly apart. */
export const CORRELATED_ABOVE = 0.95
/** Scatter over what the uncertainties say, from which it is told. */
const TELL_SCATTER = 1.5

export function fitNotes(of: {
  readonly names: readonly FitName[]
  readonly correlation: readonly (readonly number[])[]
  /** No circulation was read, and the radius is the planned one. */
  readonly inferred: boolean
  readonly chi: number | null
  readonly freedom: number
  readonly sigma: RingFit['sigma']
  readonly borrowed: readonly MeasuredQuantity[]
  readonly forming: number
  readonly residuals: readonly ReadingResidual[]
}): string[] {
  const notes: string[] = []
  for (const [i, row] of of.correlation.entries())
    for (let j = 0; j < i; j++) {
      const value = at(row, j)
      if (Math.abs(value) > CORRELATED_ABOVE)
        notes.push(
          `${capital(FIT_WORDS[at(of.names, i)])} and ${FIT_WORDS[at(of.names, j)]} are hardly told apart: correlation ${value.toFixed(3)}. Their errors belong together.`,
        )
    }
  if (of.inferred)
    notes.push(
      'The circulation is what the thin-core law needs for the speed that was seen, at the planned radius and core: it was not read off, and their errors are not in its own.',
    )
  if (of.sigma !== 'given')
    notes.push(
      `${of.sigma === 'mixed' ? 'Some readings' : 'The readings'} come without uncertainties: the scatter about the fit stands for them, and 95 % intervals use Student's factor for ${of.freedom} degrees of freedom.`,
    )
  if (of.chi !== null && Math.sqrt(of.chi) > TELL_SCATTER)
    notes.push(
      `The readings scatter ${Math.sqrt(of.chi).toFixed(1)} times as much as their uncertainties say: the model, or the uncertainties, do not describe them, and the standard errors are too small.`,
    )
  if (of.borrowed.length > 0)
    notes.push(`Rows without an uncertainty of ${of.borrowed.join(', ')} were given the median of the others.`)
  if (of.forming > 0)
    notes.push(`${of.forming} ${of.forming === 1 ? 'row is' : 'rows are'} left out: the ring is still forming then.`)
  const outliers = of.residuals.filter(({ outlier }) => outlier).length
  if (outliers > 0)
    notes.push(
      `${outliers} ${outliers === 1 ? 'reading lies' : 'readings lie'} more than ${OUTLIER_ABOVE} robust standard deviations off: marked, not dropped.`,
    )
  return notes
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}
