/**
 * Places a word may take beside what it names, and the line to it where it had to stand away.
 */
import type { Pixel, Place } from '../../core/report'

export type Side = 'above' | 'below' | 'left' | 'right'

export interface Spots {
  /** Where the word may stand: beside which pixel, best first. */
  readonly spots: readonly (readonly [Side, Pixel])[]
  /** From the pixel to the word [pixels]. */
  readonly gap: number
  /** What a leader points at when the word stands away from it. */
  readonly target: Pixel
}

/** Room that words to be clicked need, in pixels. */
const TARGET_HEIGHT = 24
const LINE_HEIGHT = 17

/** Distances tried, in pixels: beside it first, then further away with a leader. */
const AWAY = [0, 10, 22, 38, 60, 90]
const ALONG = [0, -30, 30, -60, 60]

/** Places for a word, best first. @param clickable it is a target and needs the room of one */
export function placesAround({ spots, gap }: Spots, textWidth: number, clickable: boolean): Place[] {
  const height = clickable ? TARGET_HEIGHT : LINE_HEIGHT
  const width = Math.max(clickable ? TARGET_HEIGHT : 0, textWidth + (clickable ? 12 : 4))
  const place = (left: number, top: number): Place => ({ left, top, width, height, vertical: false })
  const beside = (side: Side, anchor: Pixel, away: number, along: number): Place => {
    const apart = gap + away
    if (side === 'above') return place(anchor.x - width / 2 + along, anchor.y - apart - height)
    if (side === 'below') return place(anchor.x - width / 2 + along, anchor.y + apart)
    if (side === 'left') return place(anchor.x - width - apart, anchor.y - height / 2 + along / 2)
    return place(anchor.x + apart, anchor.y - height / 2 + along / 2)
  }
  return AWAY.flatMap((away) =>
    ALONG.flatMap((along) => spots.map(([side, anchor]) => beside(side, anchor, away, along))),
  )
}

/** A word this near to its object needs no line, in pixels. */
const NEAR = 24

/** @param near no line where the word is nearer than this, in pixels */
export function leaderOf({ target }: Spots, place: Place, near = NEAR): readonly [Pixel, Pixel] | null {
  const start = {
    x: Math.min(place.left + place.width - 4, Math.max(place.left + 4, target.x)),
    y: target.y > place.top + place.height / 2 ? place.top + place.height - 3 : place.top + 3,
  }
  return Math.hypot(target.x - start.x, target.y - start.y) > near ? [start, target] : null
}
