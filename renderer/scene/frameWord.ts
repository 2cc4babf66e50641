import type { Pixel } from '../../core/report'

/** A word on a drawing, in its place. */
export interface FrameWord {
  readonly id: string
  readonly text: string
  readonly quiet: boolean
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
  /** A thin line to what it names, where they stand apart. */
  readonly leader: readonly [Pixel, Pixel] | null
  /** What a click on it does, in words; null for plain words. */
  readonly act: string | null
  /** Pressed or not, for words that choose; left out for others. */
  readonly chosen?: boolean
  /** It stands on a body and needs an edge of the ground's colour to be read. */
  readonly edged?: boolean
}
