/**
 * What has to be said beside the results of one pulse, each with an id that the table of cautions gives its source.
 */
import type { SpeedProgramme } from './programme'
import type { PulseInput, PulseNote, PulseRing } from './types'

/** Notes on a pulse, in the order of its computation. */
export function pulseNotes(
  input: PulseInput,
  programme: SpeedProgramme,
  quickStart: boolean,
  found: { readonly ring: PulseRing | null; readonly ringExpected: boolean; readonly viscousCore: number },
): PulseNote[] {
  const { nozzle } = input
  const { ring } = found
  const notes: PulseNote[] = []
  const say = (id: PulseNote['id'], text: string) => notes.push({ id, text })
  if (programme.notes.length > 0) say('table-read', programme.notes.join(' '))
  if (programme.reducedPeak)
    say(
      'reduced-peak',
      'The stroke is too short for the ramps: they keep their slopes, and the peak that is reached is lower than the one asked for.',
    )
  if (input.overPressure === 'quick-start' && !quickStart)
    say(
      'no-start-over-pressure',
      'The start is not quick, so the adopted quick-start over-pressure adds nothing to the slug.',
    )
  if (quickStart && nozzle.exitProfile === 'parabolic')
    say(
      'parabolic-start',
      'The quick-start terms are those of a uniform exit speed; a parabolic profile has no such start.',
    )
  if (nozzle.shape !== 'tube' && nozzle.radialRatio === 0)
    say(
      'parallel-jet-assumed',
      `Circulation, impulse and energy are those of a parallel jet; ${nozzle.shape === 'orifice' ? 'an orifice' : 'a converging exit'} makes more of each, by the radial speed ratio once it is given.`,
    )
  if (nozzle.radialRatio > 0)
    say(
      'radial-inflow',
      'The factors of the radial speed ratio are interpolated between a parallel jet and one measured ratio, 0.4, for converging exits and orifices.',
    )
  if (found.ringExpected && ring === null)
    say('no-matching-ring', 'The stroke is too short to match a ring: its core would be thinner than any number.')
  if (ring !== null && ring.meanCoreRadius < found.viscousCore)
    say(
      'thin-core',
      'The matched core is thinner than viscosity alone would make it during the stroke, sqrt(4 nu t): the real ring is thicker and slower than the match, and core pressure and wave number are taken at sqrt(4 nu t).',
    )
  if (ring?.model === 'hill limit')
    say(
      'no-steady-ring',
      "No steady ring has this little energy for its circulation and impulse: the ring is held at Hill's vortex with impulse and energy kept, and the circulation it cannot hold is counted to the trailing jet.",
    )
  return notes
}
