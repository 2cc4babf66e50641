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
      `Circulation, impulse and energy are those of a parallel jet; ${nozzle.shape === 'orifice' ? 'an orifice' : 'a converging exit'} makes more of each. The radial speed ratio, here 0, brings that in.`,
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
      'The matched core is thinner than viscosity alone would make it during the stroke, √(4νt): the real ring is thicker and slower than the match, and core pressure and wave number are taken at √(4νt).',
    )
  if (ring?.model === 'hill limit')
    say(
      'no-steady-ring',
      "No steady ring has this little energy for its circulation and impulse: the ring is held at Hill's vortex with impulse and energy kept, and the circulation it cannot hold is counted to the trailing jet.",
    )
  if (nozzle.axisRatio > 1)
    say(
      'elliptic-exit',
      'Ring and drawing are those of the round exit of equal area; a ring from an elliptic exit is not steady and exchanges its axes as it goes.',
    )
  if (input.axialFlow !== 0) say('stream-left-out', streamSentence(input.axialFlow / programme.peakSpeed))
  return notes
}

/** What the flow past the nozzle does not enter. */
function streamSentence(ratio: number): string {
  const left =
    'The flow past the nozzle is in the formation number only: circulation, impulse, energy and speed of the ring are those in still water, its speed relative to the water around it.'
  return ratio >= 1
    ? `${left} The water outside is as fast as the jet or faster, so the layer that leaves the lip turns the other way: do not expect this ring.`
    : left
}
