/** Widths of words in the font of the drawing. */
import type { Ref } from 'vue'

export const FONT_SIZE = 12

export interface Measure {
  /** Width of a text in pixels. */
  measure(text: string): number
  family(): string
}

export function useMeasure(frame: Readonly<Ref<HTMLElement | null>>): Measure {
  let context: CanvasRenderingContext2D | null = null
  const known = new Map<string, number>()
  const family = (): string => (frame.value === null ? 'sans-serif' : getComputedStyle(frame.value).fontFamily)
  return {
    family,
    measure(text) {
      const before = known.get(text)
      if (before !== undefined) return before
      context ??= document.createElement('canvas').getContext('2d')
      if (context === null) return text.length * FONT_SIZE * 0.55
      context.font = `${FONT_SIZE}px ${family()}`
      const { width } = context.measureText(text)
      // Numbers that change with every drag would otherwise be kept for ever.
      if (known.size > 400) known.clear()
      known.set(text, width)
      return width
    },
  }
}
