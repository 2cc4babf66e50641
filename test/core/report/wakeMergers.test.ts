import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { marchWake, type WakeInput } from '../../../core/filament'
import { typescriptKernel as kernel } from '../../../core/kernel'
import { wakePlots } from '../../../core/report'
import { expectClose } from '../../support/close'

const RING = { radius: 1, core: 'uniform', direction: [1, 0, 0], coreRadius: 0.3 } as const

/** Two rings, of which the stronger takes in the other. */
const INPUT: WakeInput = {
  model: 'auto',
  law: 'regularised',
  merging: true,
  rings: [
    { ...RING, circulation: 1, centre: [0.9, 0, 0] },
    { ...RING, circulation: 3, centre: [0, 0, 0] },
  ],
  kinematicViscosity: 1e-6,
  viscous: false,
  ageing: 'laminar',
  axialFlow: 0,
  wall: null,
  tube: null,
  stations: [],
  duration: 4,
  outputStep: 0.1,
  tolerance: 1e-8,
}

describe('plots of a wake in which rings merge', () => {
  it('keep the impulse of a swallowed ring in both sums', async () => {
    const wake = await marchWake(INPUT, { kernel })
    expect(wake.events.map(({ event }) => event)).toEqual(['merge', 'end'])
    const units = { length: 'm', time: 's', impulse: 'N·s' }
    const plots = wakePlots(wake, INPUT.rings, { units, density: 1000, duration: 4, selected: null })
    const impulse = plots.find(({ id }) => id === 'wake-impulse')
    // Now and as they appeared are one line, and level.
    expect(impulse?.series).toHaveLength(1)
    const values = impulse?.series[0]?.y ?? []
    const expected = 1000 * Math.PI * 4
    expect(values.length).toBe(wake.outputTimes.length)
    // The march's tolerance is 1e-8 a step.
    for (const value of values) expectClose(value ?? NaN, expected, 1e-6)
  })

  it('end the line of a swallowed ring and the gap to it', async () => {
    const wake = await marchWake(INPUT, { kernel })
    const units = { length: 'm', time: 's', impulse: 'N·s' }
    const plots = wakePlots(wake, INPUT.rings, { units, density: 1000, duration: 4, selected: null })
    const merger = at(wake.events, 0).time
    const position = plots.find(({ id }) => id === 'wake-position')
    expect(Math.max(...(position?.series[0]?.x ?? []))).toBeLessThan(merger)
    expect(position?.series[1]?.x.at(-1)).toBe(4)
    const gap = plots.find(({ id }) => id === 'wake-separation')
    expect(Math.max(...(gap?.series[0]?.x ?? []))).toBeLessThan(merger)
  })
})
