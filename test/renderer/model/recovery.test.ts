import { effectScope } from 'vue'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { defaultPlan, setStrokeRatio, writePlan } from '../../../core/plan'
import { createDocument } from '../../../renderer/model/document'
import { createRecovery, RECOVERY_DELAY } from '../../../renderer/model/recovery'

beforeEach(() => {
  vi.useFakeTimers()
})
afterEach(() => {
  vi.useRealTimers()
})

function setUp(kept: string | null = null) {
  const items = new Map<string, string>(kept === null ? [] : [['ringwright.recovery', kept]])
  const storage = {
    getItem: (key: string) => items.get(key) ?? null,
    setItem: (key: string, value: string) => void items.set(key, value),
    removeItem: (key: string) => void items.delete(key),
  }
  const document = createDocument(defaultPlan())
  const recovery = effectScope(true).run(() => createRecovery(document, storage))
  if (recovery === undefined) throw new Error('the scope was stopped')
  return { document, recovery, copy: () => items.get('ringwright.recovery') ?? null }
}

describe('recovery', () => {
  it('keeps a copy a little after the last change and drops it when nothing is unsaved', () => {
    const { document, copy } = setUp()
    document.change('stroke', setStrokeRatio(document.content.value, 3))
    vi.advanceTimersByTime(RECOVERY_DELAY - 1)
    expect(copy()).toBeNull()
    vi.advanceTimersByTime(1)
    expect(copy()).toBe(writePlan(document.plan.value))
    document.undo()
    expect(copy()).toBeNull()
  })

  it('offers the copy at the next start and restores it as unsaved', () => {
    const unsaved = { ...setStrokeRatio(defaultPlan(), 3), title: 'Lost' }
    const { document, recovery, copy } = setUp(writePlan(unsaved))
    expect(recovery.offer.value?.title).toBe('Lost')
    recovery.restore()
    expect(document.content.value.title).toBe('Lost')
    expect(document.edited.value).toBe(true)
    expect(recovery.offer.value).toBeNull()
    vi.advanceTimersByTime(RECOVERY_DELAY)
    expect(copy()).toBe(writePlan(document.plan.value))
  })

  it('forgets the copy when it is discarded, and never offers what is no plan', () => {
    const { recovery, copy } = setUp(writePlan(defaultPlan()))
    recovery.discard()
    expect(copy()).toBeNull()
    expect(setUp('{"half a').recovery.offer.value).toBeNull()
  })

  it('keeps an open offer although the plan is changed meanwhile', () => {
    const kept = writePlan({ ...defaultPlan(), title: 'Lost' })
    const { document, copy } = setUp(kept)
    document.change('stroke', setStrokeRatio(document.content.value, 3))
    vi.advanceTimersByTime(RECOVERY_DELAY * 2)
    expect(copy()).toBe(kept)
  })
})
