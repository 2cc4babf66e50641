/**
 * When a drawing is drawn: at most once a frame, coarse while it moves and fine at rest where the processor draws, and never so
 * often that the numbers beside it wait.
 */

export interface PaceOptions {
  readonly draw: () => void
  /** Tell when the drawing is done. */
  readonly whenDrawn: (tell: () => void) => void
  /** The drawing buffer is to be made coarse or fine, as `coarse` now says. */
  readonly setFine: () => void
  /** Told the cost of a drawing while things move [ms]. */
  readonly onCost: (cost: number) => void
  readonly onRest: () => void
}

export interface Pace {
  readonly coarse: () => boolean
  setSoftware(software: boolean): void
  /** Draw in the next frame. */
  request(): void
  /** The same, and the picture moves: coarse from now until it has rested. */
  moved(): void
  drawNow(): void
  stop(): void
}

/** Still for so long, and no pointer held anywhere: at rest [ms]. Making the buffer anew costs more than drawing into it. */
const REST_DELAY = 320
/** The cost of one moving frame in so many is measured. */
const MEASURED_EVERY = 12
/** Not the first, which follows the making of a new buffer. */
const MEASURED_FIRST = 3
/** Most of the time that drawing may take while a pointer is held, on a processor that the numbers need too. */
const HELD_SHARE = 0.25

export function createPace(options: PaceOptions): Pace {
  let software = false
  let coarse = false
  let wanted = 0
  let waiting: ReturnType<typeof setTimeout> | undefined
  let rest: ReturnType<typeof setTimeout> | undefined
  let frames = 0
  /** Last measured cost of a moving frame [ms]. */
  let cost = 0
  let drawnAt = 0
  let held = false

  function draw(): void {
    wanted = 0
    drawnAt = performance.now()
    options.draw()
    frames += 1
    if (!software || !coarse || frames % MEASURED_EVERY !== MEASURED_FIRST) return
    const start = drawnAt
    options.whenDrawn(() => {
      cost = performance.now() - start
      options.onCost(cost)
    })
  }

  function request(): void {
    if (wanted !== 0 || waiting !== undefined) return
    const pause = software && held ? drawnAt + cost / HELD_SHARE - performance.now() : 0
    if (pause > 8) {
      waiting = setTimeout(() => {
        waiting = undefined
        wanted = requestAnimationFrame(draw)
      }, pause)
    } else wanted = requestAnimationFrame(draw)
  }

  function settle(): void {
    // A hand that rests in the middle of a drag goes on: the buffer stays as it is.
    if (held) {
      rest = setTimeout(settle, REST_DELAY)
      return
    }
    coarse = false
    options.setFine()
    options.onRest()
    request()
  }

  const grabbed = (): void => {
    held = true
  }
  const released = (event: PointerEvent): void => {
    held = event.buttons !== 0
  }
  window.addEventListener('pointerdown', grabbed, true)
  window.addEventListener('pointerup', released, true)
  window.addEventListener('pointercancel', released, true)

  return {
    coarse: () => coarse,
    setSoftware(next) {
      software = next
    },
    request,
    moved() {
      if (software) {
        if (!coarse) {
          coarse = true
          frames = 0
          options.setFine()
        }
        clearTimeout(rest)
        rest = setTimeout(settle, REST_DELAY)
      }
      request()
    },
    drawNow: draw,
    stop() {
      window.removeEventListener('pointerdown', grabbed, true)
      window.removeEventListener('pointerup', released, true)
      window.removeEventListener('pointercancel', released, true)
      clearTimeout(rest)
      clearTimeout(waiting)
      if (wanted !== 0) cancelAnimationFrame(wanted)
    },
  }
}
