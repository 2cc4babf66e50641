import { describe, expect, it } from 'vitest'
import { defaultPlan, readPlan, setField, setStrokeRatio, writePlan } from '../../../core/plan'
import { createDocument, TYPING_PAUSE } from '../../../renderer/model/document'

function openDocument() {
  let time = 0
  const document = createDocument(defaultPlan(), () => time)
  return { document, wait: (milliseconds: number) => (time += milliseconds) }
}

describe('document', () => {
  it('is untouched until the first change, then edited until undo comes back', () => {
    const { document } = openDocument()
    expect(document.untouched.value).toBe(true)
    document.change('stroke', setStrokeRatio(document.content.value, 3))
    expect(document.untouched.value).toBe(false)
    expect(document.edited.value).toBe(true)
    expect(document.undoName.value).toBe('stroke')
    document.undo()
    expect(document.edited.value).toBe(false)
    expect(document.redoName.value).toBe('stroke')
  })

  it('makes one step of a drag, however long it rests, and a new one of the next', () => {
    const { document, wait } = openDocument()
    for (const ratio of [2, 3, 4]) {
      document.change('stroke', setStrokeRatio(document.content.value, ratio), { id: 'drag 1', pause: Infinity })
      wait(60_000)
    }
    document.endBurst()
    document.change('stroke', setStrokeRatio(document.content.value, 5), { id: 'drag 2', pause: Infinity })
    document.undo()
    expect(document.content.value.programme.stroke).toBeCloseTo(4 * 0.025, 12)
    document.undo()
    expect(document.undoName.value).toBeNull()
  })

  it('begins a new step when typing pauses', () => {
    const { document, wait } = openDocument()
    const step = (depth: number) =>
      document.change('depth', setField(document.content.value, 'water.depth', depth), {
        id: 'water.depth',
        pause: TYPING_PAUSE,
      })
    step(1)
    wait(TYPING_PAUSE)
    step(2)
    wait(TYPING_PAUSE + 1)
    step(3)
    document.undo()
    expect(document.content.value.water.depth).toBe(2)
  })

  it('saves chosen units with the plan without making them a step of undo or a new computation', () => {
    const { document } = openDocument()
    const content = document.content.value
    document.setUnit('length', 'in')
    expect(document.undoName.value).toBeNull()
    expect(document.content.value).toBe(content)
    expect(document.edited.value).toBe(true)
    const reading = readPlan(writePlan(document.plan.value))
    expect(reading.ok && reading.plan.view.units['length']).toBe('in')
  })

  it('keeps the units through undo', () => {
    const { document } = openDocument()
    document.change('stroke', setStrokeRatio(document.content.value, 3))
    document.setUnit('length', 'cm')
    document.undo()
    expect(document.plan.value.view.units['length']).toBe('cm')
  })

  it('forgets the history of the plan before when another is opened', () => {
    const { document } = openDocument()
    document.change('stroke', setStrokeRatio(document.content.value, 3))
    document.replace(defaultPlan(), { token: 'file-1', name: 'a.ringwright.json' })
    expect(document.undoName.value).toBeNull()
    expect(document.edited.value).toBe(false)
    expect(document.file.value?.name).toBe('a.ringwright.json')
  })
})
