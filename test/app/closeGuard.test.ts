import { describe, expect, it } from 'vitest'
import { CLOSE_CHOICES, closeQuestion, createCloseGuard, type CloseChoice } from '../../app/closeGuard'

function guardThatAnswers(choice: CloseChoice) {
  const done: string[] = []
  const guard = createCloseGuard({
    ask: async (title) => {
      done.push(`ask ${title}`)
      return choice
    },
    requestSave: () => done.push('save'),
    close: () => done.push('close'),
  })
  return { guard, done }
}

/** Let the answers that are already given arrive. */
async function settled(): Promise<void> {
  for (let i = 0; i < 5; i++) await Promise.resolve()
}

describe('the close guard', () => {
  it('lets a window without changes go at once', () => {
    const { guard, done } = guardThatAnswers('cancel')
    guard.documentShown('Ring', false)
    expect(guard.mayClose()).toBe(true)
    expect(done).toEqual([])
  })

  it('asks about changes, and stays on Cancel', async () => {
    const { guard, done } = guardThatAnswers('cancel')
    guard.documentShown('Ring', true)
    expect(guard.mayClose()).toBe(false)
    await settled()
    expect(done).toEqual(['ask Ring'])
    expect(guard.mayClose()).toBe(false)
  })

  it('closes without saving when told so', async () => {
    const { guard, done } = guardThatAnswers('discard')
    guard.documentShown('Ring', true)
    guard.mayClose()
    await settled()
    expect(done).toEqual(['ask Ring', 'close'])
    expect(guard.mayClose()).toBe(true)
  })

  it('saves, and closes once the page has nothing unsaved', async () => {
    const { guard, done } = guardThatAnswers('save')
    guard.documentShown('Ring', true)
    guard.mayClose()
    await settled()
    expect(done).toEqual(['ask Ring', 'save'])
    guard.saveEnded(true)
    guard.documentShown('Ring', false)
    expect(done).toEqual(['ask Ring', 'save', 'close'])
    expect(guard.mayClose()).toBe(true)
  })

  it('stays when the save is cancelled or fails, also after a later save', async () => {
    const { guard, done } = guardThatAnswers('save')
    guard.documentShown('Ring', true)
    guard.mayClose()
    await settled()
    guard.saveEnded(false)
    guard.saveEnded(true)
    guard.documentShown('Ring', false)
    expect(done).not.toContain('close')
  })

  it('asks once while its question is open', async () => {
    const { guard, done } = guardThatAnswers('cancel')
    guard.documentShown('Ring', true)
    guard.mayClose()
    guard.mayClose()
    await settled()
    expect(done).toEqual(['ask Ring'])
  })

  it('keeps the window when its question cannot be shown', async () => {
    const guard = createCloseGuard({
      ask: () => Promise.reject(new Error('no dialog')),
      requestSave: () => undefined,
      close: () => undefined,
    })
    guard.documentShown('Ring', true)
    expect(guard.mayClose()).toBe(false)
    await settled()
    expect(guard.mayClose()).toBe(false)
  })
})

describe('the question', () => {
  it('has a button for each choice, Enter saves and Escape stays', () => {
    const question = closeQuestion('Ring')
    expect(question.buttons).toHaveLength(CLOSE_CHOICES.length)
    expect(CLOSE_CHOICES[question.defaultId]).toBe('save')
    expect(CLOSE_CHOICES[question.cancelId]).toBe('cancel')
    expect(question.message).toBe('Save the changes to “Ring”?')
  })
})
