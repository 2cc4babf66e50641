/** Width of a text in the ruler's type. */

/** Share of the type size an average letter takes, on the wide side: used where no canvas can measure. */
const LETTER = 0.62

/** A measure for a font such as `11.5px sans-serif`; without a canvas an estimate that is rather too wide. */
export function textMeasure(font: string, size: number): (text: string) => number {
  const context = globalThis.document?.createElement('canvas').getContext?.('2d') ?? null
  if (context === null) return (text) => text.length * size * LETTER
  context.font = font
  return (text) => Math.ceil(context.measureText(text).width) + 1
}
