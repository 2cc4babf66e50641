import { describe, expect, it } from 'vitest'
import { examplePlan, setField } from '../../../core/plan'
import { dateText, keepPaper, keptPaper, printables, stampOf } from '../../../renderer/model/printables'
import { makeWorkspace } from '../parts/mountWithWorkspace'

function storage() {
  const kept = new Map<string, string>()
  return {
    getItem: (key: string) => kept.get(key) ?? null,
    setItem: (key: string, text: string) => void kept.set(key, text),
  }
}

describe('the paper', () => {
  it('is the one chosen last, and at first what the language usually prints on', () => {
    const kept = storage()
    expect(keptPaper(kept, 'en-US')).toBe('Letter')
    expect(keptPaper(kept, 'de-DE')).toBe('A4')
    keepPaper(kept, 'Letter')
    expect(keptPaper(kept, 'de-DE')).toBe('Letter')
    expect(keptPaper(null, 'en-GB')).toBe('A4')
  })
})

describe('the run sheet among the printables', () => {
  it('is offered for the plan as it stands only: never one of an earlier plan', async () => {
    const workspace = makeWorkspace(examplePlan('tank-day'))
    const sheet = () => printables(workspace).find(({ id }) => id === 'run-sheet')
    expect(sheet()?.hindrance).toMatch(/not planned yet/)
    workspace.page.value = 'tankRun'
    for (let i = 0; i < 400 && workspace.tank.quick.status.value !== 'current'; i++)
      await new Promise((resolve) => setTimeout(resolve, 5))
    expect(sheet()?.hindrance).toBeNull()
    expect(sheet()?.make({ date: 'today', foot: 'foot', inputHash: '' })?.kind).toBe('Run sheet')
    workspace.page.value = 'stroke'
    workspace.document.change('stroke', setField(workspace.document.content.value, 'programme.stroke', 0.05))
    expect(sheet()?.hindrance).toMatch(/not planned yet/)
  })
})

describe('what a document is stamped with', () => {
  it('is the hash of the inputs, the same for the same inputs and another for others', async () => {
    const plan = examplePlan('tank-day')
    const [one, again, other] = await Promise.all([
      stampOf(plan),
      stampOf(plan),
      stampOf(setField(plan, 'programme.stroke', 0.05)),
    ])
    expect(one.foot).toMatch(/^Ringwright \S+, inputs [0-9a-f]{64}$/)
    expect(again).toEqual(one)
    expect(other.inputHash).not.toBe(one.inputHash)
  })

  it('is a date in words that no country reads another way', () => {
    expect(dateText(new Date(2026, 11, 3))).toBe('3 December 2026')
  })
})
