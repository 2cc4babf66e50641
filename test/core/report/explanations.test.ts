import { describe, expect, it } from 'vitest'
import { EXAMPLES, examplePlan } from '../../../core/plan'
import { explain, EXPLANATION_IDS } from '../../../core/report'
import { run } from '../../../core/run'

async function contextOf(id: string) {
  const plan = examplePlan(id)
  const { data } = await run(plan, { sections: ['pulse'], jet: 'cached' })
  if (data === null || data.pulse === null) throw new Error('no pulse')
  return { plan, water: data.water, pulse: data.pulse }
}

describe('explain', () => {
  it.each(EXAMPLES.map((example) => example.id))(
    'answers every found value of %s with formula, source, range and verdict',
    async (example) => {
      const context = await contextOf(example)
      for (const id of EXPLANATION_IDS) {
        const answer = explain(id, context)
        expect(answer.formula.length, id).toBeGreaterThan(10)
        expect(answer.source.length, id).toBeGreaterThan(5)
        expect(answer.range.length, id).toBeGreaterThan(5)
        expect(answer.verdict, id).toMatch(/\.$/)
        expect(answer.verdict, id).not.toMatch(/NaN|undefined|null/)
        for (const { name, value } of answer.values) expect(Number.isFinite(value), `${id}: ${name}`).toBe(true)
      }
    },
  )

  it('writes formulas as balanced MathML', async () => {
    const context = await contextOf('bench-generator')
    for (const id of EXPLANATION_IDS) {
      const { mathml } = explain(id, context)
      expect(mathml.startsWith('<math'), id).toBe(true)
      const open: string[] = []
      for (const [, closing, name] of mathml.matchAll(/<(\/?)([a-z]+)[^>]*>/g)) {
        if (closing === '') open.push(name ?? '')
        else expect(open.pop(), id).toBe(name)
      }
      expect(open, id).toEqual([])
    }
  })

  it('tells a pulse past pinch-off from one below it', async () => {
    const below = explain('ring.circulation', await contextOf('bench-generator'))
    const past = explain('ring.circulation', await contextOf('past-pinch-off'))
    expect(below.inside).toBe(true)
    expect(past.inside).toBe(false)
    expect(past.verdict).toMatch(/past the adopted formation number/)
  })
})
