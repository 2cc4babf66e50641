import { describe, expect, it } from 'vitest'
import { examplePlan, setField, type Plan } from '../../../core/plan'
import { run } from '../../../core/run'

const DAY = examplePlan('tank-day')

/** What the cautions say of the camera and its triggers. */
async function toldOf(plan: Plan): Promise<string> {
  const { data } = await run(plan, { sections: ['tankRun'] })
  expect(data?.tankRun?.imaging.vectorsAcrossCore ?? 0).toBeGreaterThan(8)
  return (data?.cautions ?? [])
    .filter(({ id }) => ['tank-vectors', 'tank-pair-interval', 'tank-light-sheet', 'tank-run-notes'].includes(id))
    .map(({ text }) => text)
    .join('\n')
}

describe('the day at a glass tank', () => {
  it('sees the core, serves the whole ring with one pair interval, and sees it past the last station', async () => {
    const told = await toldOf(DAY)
    expect(told).not.toMatch(/vectors lie across|No pair interval|thinner than|comes before|left out of the ray/)
  })

  it('does so for the slowest and the fastest ring of its matrix as well', async () => {
    for (const [stroke, speed] of [
      [0.025, 0.06],
      [0.0625, 0.14],
    ] as const) {
      const plan = setField(setField(DAY, 'programme.stroke', stroke), 'programme.peakSpeed', speed)
      expect(await toldOf(plan)).not.toMatch(/vectors lie across|No pair interval|comes (before|after)/)
    }
    const slowest = setField(setField(DAY, 'programme.stroke', 0.025), 'programme.peakSpeed', 0.06)
    const [own, late] = [await run(DAY, { sections: ['tankRun'] }), await run(slowest, { sections: ['tankRun'] })]
    const { pairs, pairRate } = own.data?.tankRun?.imaging ?? {}
    // The camera is set once for the day: at the rate of the plan's own ring it still runs when the slowest one passes.
    const recording = ((pairs ?? 0) - 1) / (pairRate ?? NaN)
    expect(late.data?.tankRun?.arrivals.at(-1)?.timeHigh ?? NaN).toBeLessThan(recording)
  })
})
