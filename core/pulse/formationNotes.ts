/**
 * What has to be said beside the estimates of the formation number: what is absent, outside the band, or weaker than it looks.
 */
import type { FormationModifiers } from './formationModifiers'
import type { FormationNumbers } from './types'

type Note = FormationNumbers['notes'][number]

const NAMES = {
  energyLimit: 'The energy limit',
  carriedVolume: 'The carried volume',
  speedMatch: 'The speed match',
  computed: 'The computed jet',
} as const

/** Notes in the order of the estimates, modifiers last. */
export function formationNotes(state: {
  readonly estimates: FormationNumbers['unmodified']
  readonly adopted: number | null
  readonly startFormationTime: number
  readonly quick: boolean
  readonly modifiers: FormationModifiers
}): Note[] {
  const { estimates, adopted, startFormationTime, quick, modifiers } = state
  const { band } = modifiers
  const notes: Note[] = []
  const say = (estimate: Note['estimate'], text: string) => notes.push({ estimate, text })
  const start = startFormationTime.toPrecision(2)
  const bandText = `${band.low.toFixed(2)} to ${band.high.toFixed(2)}${
    modifiers.notes.length > 0 ? " with this plan's modifiers" : ''
  }, which was measured for quick starts from a tube`

  for (const estimate of ['energyLimit', 'carriedVolume', 'speedMatch', 'computed'] as const) {
    const value = estimates[estimate]
    const onlyQuick = estimate === 'carriedVolume' || estimate === 'speedMatch'
    if (value === null) {
      if (estimate === 'computed') continue
      say(
        estimate,
        onlyQuick && !quick
          ? `${NAMES[estimate]} holds for quick starts only; this start takes ${start} formation times, and 1 is the limit.`
          : `${NAMES[estimate]} has no crossing for this programme${onlyQuick ? ' with a quick start' : ''}, so it gives no value.`,
      )
      continue
    }
    if (value < band.low || value > band.high)
      say(
        estimate,
        `${NAMES[estimate]} gives ${value.toFixed(estimate === 'computed' ? 1 : 2)}, outside the published band, ${bandText}.`,
      )
    if (estimate === 'carriedVolume')
      say(estimate, 'The carried volume is a flat criterion: 1 % of volume moves it by about 0.2.')
    if (estimate === 'speedMatch')
      say(
        estimate,
        "On the whole steady family the speed match gives 3.06 for a constant speed; its authors' own limit of circulation, 1.77 to 2.07, brackets 3.8.",
      )
  }
  if (!quick)
    say(
      'published',
      `The published band was measured for quick starts from a tube; this start takes ${start} formation times.`,
    )
  if (adopted === null)
    say('adopted', 'The adopted estimate has no value here, so everything the pulse makes is put into one ring.')
  for (const text of modifiers.notes) say('modifier', text)
  return notes
}
