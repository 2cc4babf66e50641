/**
 * Width of text where nothing can measure it: an SVG written without a screen.
 *
 * Advance widths of a common grotesque in thousandths of the font size, rounded up; system fonts differ by a few per cent, which the
 * room left around labels covers.
 */
const NARROW = new Set([..."ijl.,:;|!'`"])
const SLIM = new Set([...'frt()[]{}/\\-" I'])
const WIDE = new Set([...'mwMW@%—'])

/** Estimated width of one line of text at a font size, in the units of that size. */
export function textWidth(text: string, fontSize: number): number {
  let thousandths = 0
  for (const letter of text) {
    if (NARROW.has(letter)) thousandths += 290
    else if (SLIM.has(letter)) thousandths += 370
    else if (WIDE.has(letter)) thousandths += 900
    else if (letter >= 'A' && letter <= 'Z') thousandths += 700
    else if (letter >= '⁰' && letter <= '⁹') thousandths += 380
    else thousandths += 600
  }
  return (thousandths / 1000) * fontSize
}
