/**
 * What is drawn flat over the picture, in its pixels: leaders, the scale bar, keys of colours. One list for the window and the file.
 */
import type { Pixel } from '../../core/report'

export interface OverlayLine {
  readonly from: Pixel
  readonly to: Pixel
  readonly tone: 'ink' | 'muted'
  readonly width: number
}

export interface OverlayPatch {
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
  readonly fill: string
}

export interface OverlayText {
  readonly text: string
  /** Of the anchor, at the middle of the letters' height. */
  readonly at: Pixel
  readonly anchor: 'start' | 'middle' | 'end'
  readonly tone: 'ink' | 'muted'
}

export interface Overlay {
  readonly lines: readonly OverlayLine[]
  readonly patches: readonly OverlayPatch[]
  readonly texts: readonly OverlayText[]
}

export const NO_OVERLAY: Overlay = { lines: [], patches: [], texts: [] }

export function joined(...parts: readonly Overlay[]): Overlay {
  return {
    lines: parts.flatMap(({ lines }) => lines),
    patches: parts.flatMap(({ patches }) => patches),
    texts: parts.flatMap(({ texts }) => texts),
  }
}
