import { describe, expect, it } from 'vitest'
import { CAUTIONS } from '../../../core/plan'
import { createJetCache, run, type RunRequest } from '../../../core/run'
import { planOf } from '../../support/plans'

/** Plans with one jet share it. */
const jetCache = createJetCache()

async function cautionsOf(
  parts: Readonly<Record<string, unknown>>,
  jet: RunRequest['jet'] = 'run',
): Promise<ReadonlyMap<string, string>> {
  const { data, message } = await run(planOf(parts), { sections: ['pulse'], jet }, { jetCache })
  if (data === null) throw new Error(message)
  return new Map(data.cautions.map(({ id, text }) => [id, text]))
}

/** One coarse run of a stroke of one diameter: what is said of a jet, not the jet, is tested here. */
const JET = {
  jet: { ensemble: false, delta: 0.2, coreGrowth: false },
  programme: { shape: 'rectangular', stroke: 0.03, peakSpeed: 0.2 },
}
const TUBE = { shape: 'tube', diameter: 0.03, pistonDiameter: 0.06 }

/** A plan that fires each caution, and what its sentence must hold. */
const TRIGGERS: Readonly<Record<string, readonly [Readonly<Record<string, unknown>>, RegExp]>> = {
  'jet-not-run': [{ models: { overPressure: 'computed' } }, /has not been computed yet: until then nothing is added/],
  'jet-round-tube': [
    { ...JET, nozzle: { ...TUBE, shape: 'orifice', radialRatio: 0.2 } },
    /this nozzle has a sharp orifice and a radial speed ratio/,
  ],
  'jet-one-constant': [JET, /averaged over 1 smoothing length .* published over-pressure circulation/],
  'jet-impulse-share': [
    { ...JET, programme: { shape: 'rectangular', stroke: 0.24, peakSpeed: 0.2 } },
    /the slug leaves \d+ % .* pinch off at formation time [\d.]+, has \d+ % behind the ring and \d+ % in it/,
  ],
  'jet-left-out': [JET, /waves round the ring, turbulence, the boundary layer in the tube/],
  'jet-slow-ring': [JET, /5 to 9 % .* 41 % too slow, and why is not known/],
  'jet-short-stroke': [JET, /stroke of 1\.00 D is below 2 D, and the smoothing given, 0\.2 D/],
  'jet-one-smoothing': [JET, /one smoothing length/],
  'jet-no-pinch-off': [
    { ...JET, programme: { shape: 'rectangular', stroke: 0.195, peakSpeed: 0.2 }, ambient: { axialFlow: -0.07 } },
    /No pinch-off was seen/,
  ],
  'jet-notes': [JET, /formation number is that of the same start .* % of the slug's are missing/],
}

describe('cautions of the starting jet', () => {
  it.each(CAUTIONS.filter(({ id }) => id.startsWith('jet-')).map(({ id }) => id))(
    '%s fires on its trigger',
    async (id) => {
      const trigger = TRIGGERS[id]
      if (trigger === undefined) throw new Error(`no trigger is written down for ${id}`)
      const [parts, words] = trigger
      const cautions = await cautionsOf(parts, id === 'jet-not-run' ? 'cached' : 'run')
      expect(cautions.get(id)).toMatch(words)
    },
  )

  it('are none where no jet was computed', async () => {
    const ids = [...(await cautionsOf({})).keys()]
    expect(ids.filter((id) => id.startsWith('jet-'))).toEqual([])
  })

  it('a plain round tube has nothing to say of its nozzle', async () => {
    expect([...(await cautionsOf(JET)).keys()]).not.toContain('jet-round-tube')
  })
})
