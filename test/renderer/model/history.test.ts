import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  endBurst,
  HISTORY_LENGTH,
  isEdited,
  markSaved,
  record,
  redo,
  redoName,
  startHistory,
  undo,
  undoName,
} from '../../../renderer/model/history'

describe('history', () => {
  it('names the step that undo takes back and the one that redo does again', () => {
    const changed = record(startHistory('a'), 'stroke', 'b', 0)
    expect(undoName(changed)).toBe('stroke')
    expect(redoName(changed)).toBeNull()
    const back = undo(changed)
    expect(back.present).toBe('a')
    expect(undoName(back)).toBeNull()
    expect(redoName(back)).toBe('stroke')
    expect(redo(back).present).toBe('b')
  })

  it('merges a burst into one step while its pauses are short', () => {
    const burst = { id: 'stroke', pause: 1000 }
    let history = startHistory(0)
    history = record(history, 'stroke', 1, 0, burst)
    history = record(history, 'stroke', 2, 900, burst)
    history = record(history, 'stroke', 3, 1800, burst)
    expect(history.past).toHaveLength(1)
    expect(undo(history).present).toBe(0)
  })

  it('begins a new step after a long pause, for another burst, and after the burst was ended', () => {
    const burst = { id: 'stroke', pause: 1000 }
    const first = record(startHistory(0), 'stroke', 1, 0, burst)
    expect(record(first, 'stroke', 2, 1001, burst).past).toHaveLength(2)
    expect(record(first, 'depth', 2, 10, { id: 'depth', pause: 1000 }).past).toHaveLength(2)
    expect(record(endBurst(first), 'stroke', 2, 10, burst).past).toHaveLength(2)
  })

  it('does not merge into a step that undo has passed', () => {
    const drag = { id: 'drag 1', pause: Infinity }
    const two = record(record(startHistory(0), 'stroke', 1, 0, drag), 'depth', 2, 1)
    const merged = record(undo(two), 'stroke', 5, 2, drag)
    expect(merged.past).toHaveLength(2)
    expect(redoName(merged)).toBeNull()
  })

  it('clears the edited mark when undo comes back to the saved state, and sets it again on redo', () => {
    const saved = markSaved(record(startHistory('a'), 'title', 'b', 0))
    expect(isEdited(saved)).toBe(false)
    const changed = record(saved, 'stroke', 'c', 1)
    expect(isEdited(changed)).toBe(true)
    expect(isEdited(undo(changed))).toBe(false)
    expect(isEdited(undo(undo(changed)))).toBe(true)
    expect(isEdited(redo(undo(changed)))).toBe(true)
  })

  it('forgets the oldest steps beyond its length and nothing else', () => {
    let history = startHistory(0)
    for (let i = 1; i <= HISTORY_LENGTH + 30; i++) history = record(history, 'step', i, i)
    expect(history.past).toHaveLength(HISTORY_LENGTH)
    for (let i = 0; i < HISTORY_LENGTH + 30; i++) history = undo(history)
    expect(history.present).toBe(30)
  })

  it('comes back to the same states for any run of changes, undos and redos', () => {
    fc.assert(
      fc.property(fc.array(fc.oneof(fc.constant('undo'), fc.constant('redo'), fc.integer())), (moves) => {
        let history = startHistory<number>(-1)
        // The plain model: a list of states and a place in it.
        let states = [-1]
        let place = 0
        for (const [time, move] of moves.entries()) {
          if (move === 'undo') {
            history = undo(history)
            place = Math.max(0, place - 1)
          } else if (move === 'redo') {
            history = redo(history)
            place = Math.min(states.length - 1, place + 1)
          } else if (typeof move === 'number') {
            history = record(history, 'step', move, time)
            if (move !== states[place]) {
              states = [...states.slice(0, place + 1), move]
              place++
            }
          }
          expect(history.present).toBe(states[place])
        }
      }),
    )
  })
})
