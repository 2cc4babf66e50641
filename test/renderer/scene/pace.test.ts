import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { createPace, type Pace } from '../../../renderer/scene/pace'

describe('when a drawing is drawn', () => {
  let pace: Pace
  let drawn: number
  let sizes: string[]
  let cost: number

  beforeEach(() => {
    vi.useFakeTimers({
      toFake: ['setTimeout', 'clearTimeout', 'requestAnimationFrame', 'cancelAnimationFrame', 'performance'],
    })
    drawn = 0
    cost = 5
    sizes = []
    pace = createPace({
      draw: () => {
        drawn += 1
      },
      whenDrawn: (tell) => void setTimeout(tell, cost),
      setFine: () => void sizes.push(pace.coarse() ? 'coarse' : 'fine'),
      onCost: () => {},
      onRest: () => {},
    })
  })
  afterEach(() => {
    pace.stop()
    vi.useRealTimers()
  })

  const pointer = (type: string, buttons: number): void => {
    window.dispatchEvent(new PointerEvent(type, { buttons }))
  }

  it('is once a frame, however often it is asked', () => {
    for (let i = 0; i < 10; i += 1) pace.request()
    vi.advanceTimersByTime(40)
    expect(drawn).toBe(1)
  })

  it('keeps one buffer where the graphics processor draws', () => {
    pace.moved()
    vi.advanceTimersByTime(2000)
    expect(sizes).toEqual([])
    expect(drawn).toBe(1)
  })

  it('is coarse from the first move on and fine once at rest, on the processor', () => {
    pace.setSoftware(true)
    for (let i = 0; i < 20; i += 1) {
      pace.moved()
      vi.advanceTimersByTime(20)
    }
    expect(sizes).toEqual(['coarse'])
    vi.advanceTimersByTime(1000)
    expect(sizes).toEqual(['coarse', 'fine'])
  })

  it('does not make the buffer anew while a pointer is held, however long it rests', () => {
    pace.setSoftware(true)
    pointer('pointerdown', 1)
    pace.moved()
    vi.advanceTimersByTime(5000)
    pace.moved()
    vi.advanceTimersByTime(5000)
    expect(sizes).toEqual(['coarse'])
    pointer('pointerup', 0)
    vi.advanceTimersByTime(1000)
    expect(sizes).toEqual(['coarse', 'fine'])
  })

  it('takes at most a quarter of the time while a pointer is held, and still follows to the end', () => {
    pace.setSoftware(true)
    cost = 40
    pointer('pointerdown', 1)
    // The first frames tell what one costs.
    for (let i = 0; i < 5; i += 1) {
      pace.moved()
      vi.advanceTimersByTime(100)
    }
    const before = drawn
    for (let i = 0; i < 100; i += 1) {
      pace.moved()
      vi.advanceTimersByTime(16)
    }
    // 1.6 s at one drawing of 40 ms in 160 ms, and a frame's wait for each.
    expect(drawn - before).toBeLessThanOrEqual(11)
    expect(drawn - before).toBeGreaterThanOrEqual(8)
    const during = drawn
    vi.advanceTimersByTime(250)
    expect(drawn).toBe(during + 1)
  })

  it('stops with its component', () => {
    pace.setSoftware(true)
    pace.moved()
    pace.stop()
    vi.advanceTimersByTime(5000)
    expect(drawn).toBe(0)
  })
})
