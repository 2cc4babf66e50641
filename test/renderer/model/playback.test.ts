import { describe, expect, it } from 'vitest'
import { effectScope, nextTick, shallowRef } from 'vue'
import { createPlayback, nearestOutput, outputAt, outputShare, usualSpeed } from '../../../renderer/model/playback'

/** Frames the test hands in. */
function heldFrames() {
  let waiting: ((now: number) => void) | null = null
  let clock = 0
  return {
    next: (callback: (now: number) => void) => {
      waiting = callback
      return () => {
        if (waiting === callback) waiting = null
      }
    },
    get idle() {
      return waiting === null
    },
    /** One frame, some milliseconds later. */
    tick(milliseconds: number) {
      clock += milliseconds
      const callback = waiting
      waiting = null
      callback?.(clock)
    },
  }
}

function started(list: readonly number[] = [0, 0.1, 0.2, 0.3, 0.4, 0.45]) {
  const times = shallowRef<readonly number[]>(list)
  const frames = heldFrames()
  const playback = effectScope(true).run(() => createPlayback(() => times.value, frames.next))
  if (playback === undefined) throw new Error('the scope was stopped')
  return { times, frames, playback }
}

describe('playback', () => {
  it('stands still until it is played', () => {
    const { frames, playback } = started()
    expect(frames.idle).toBe(true)
    expect(playback.index.value).toBe(0)
  })

  it('moves with the clock, at its speed', () => {
    const { frames, playback } = started()
    playback.speed.value = 2
    playback.play()
    frames.tick(16)
    expect(playback.time.value).toBe(0)
    frames.tick(60)
    expect(playback.time.value).toBeCloseTo(0.12, 12)
    expect(playback.index.value).toBe(1)
  })

  it('stops at the end, and begins anew when played from there', () => {
    const { frames, playback } = started()
    playback.play()
    frames.tick(0)
    frames.tick(200)
    frames.tick(200)
    frames.tick(200)
    expect(playback.playing.value).toBe(false)
    expect(playback.index.value).toBe(5)
    expect(frames.idle).toBe(true)
    playback.play()
    expect(playback.index.value).toBe(0)
  })

  it('goes round where it loops', () => {
    const { frames, playback } = started()
    playback.loop.value = true
    playback.play()
    frames.tick(0)
    for (let i = 0; i < 3; i++) frames.tick(200)
    expect(playback.playing.value).toBe(true)
    expect(playback.time.value).toBeCloseTo(0.15, 12)
  })

  it('does not jump over what a held-up frame would skip', () => {
    const { frames, playback } = started()
    playback.play()
    frames.tick(0)
    frames.tick(60_000)
    expect(playback.time.value).toBe(0.25)
  })

  it('steps and pauses, and holds at both ends', () => {
    const { frames, playback } = started()
    playback.play()
    playback.step(1)
    expect([playback.index.value, playback.playing.value, frames.idle]).toEqual([1, false, true])
    playback.step(-5)
    expect(playback.index.value).toBe(0)
    playback.step(99)
    expect(playback.index.value).toBe(5)
  })

  it('goes to the output nearest to an event', () => {
    const { playback } = started()
    playback.seekTime(0.16)
    expect(playback.index.value).toBe(2)
    playback.seekTime(99)
    expect(playback.index.value).toBe(5)
  })

  it('stays inside a run that became shorter', async () => {
    const { times, playback } = started()
    playback.seek(5)
    times.value = [0, 0.1]
    await nextTick()
    expect([playback.index.value, playback.time.value]).toEqual([1, 0.1])
  })
})

describe('the times of a playback', () => {
  it('finds the output shown and the nearest one', () => {
    const times = [0, 0.1, 0.2]
    expect([0, 0.05, 0.1, 0.19, 0.2, 5].map((time) => outputAt(times, time))).toEqual([0, 0, 1, 1, 2, 2])
    expect([0.04, 0.06, 0.16].map((time) => nearestOutput(times, time))).toEqual([0, 1, 2])
    expect([outputAt([], 1), nearestOutput([0], 3)]).toEqual([0, 0])
  })

  it('is real where that can be watched, else a round multiple', () => {
    expect([3, 10, 60, 0].map(usualSpeed)).toEqual([1, 1, 1, 1])
    expect([2.5, 0.02, 120, 5000].map(usualSpeed)).toEqual([0.2, 0.002, 10, 500])
  })
})

describe('the place of a time on a slider over outputs', () => {
  it('is that of the output at each output, also after a last step that is shorter, and between two in between', () => {
    const times = [0, 0.1, 0.2, 0.25]
    expect(times.map((time) => outputShare(times, time))).toEqual([0, 1 / 3, 2 / 3, 1])
    expect(outputShare(times, 0.15)).toBeCloseTo(0.5, 12)
    expect(outputShare(times, 0.225)).toBeCloseTo(5 / 6, 12)
    expect([outputShare(times, -1), outputShare(times, 9), outputShare([0], 0), outputShare([], 1)]).toEqual([
      0, 1, 0, 0,
    ])
  })
})
