/**
 * Where a drawing came from, in small print in a margin of its own below it: a file that leaves the window alone still says what it shows.
 */
import { DomainError } from '../base'
import { drawingColours } from './colours'
import { coordinate, svgText } from './svgText'
import { textWidth } from './textWidth'

/** Height of the margin and size of its print, in the pixels of a drawing written as SVG. */
export const IMPRINT = { height: 18, font: 10, left: 10 } as const

/** How every SVG of ours begins, and the ground under all it shows. */
const HEAD = /^<svg xmlns="[^"]*" width="([\d.]+)" height="([\d.]+)" viewBox="0 0 \1 \2"/
const GROUND = /<rect width="[\d.]+" height="[\d.]+" fill="(#[0-9A-Fa-f]{6})"\/>/

/**
 * A drawing with a line of print below it; the drawing itself stays as it is.
 *
 * @param svg a document written by this room
 * @param line one line of text; what has no room is cut with an ellipsis
 * @throws {DomainError} if svg is not such a document
 */
export function imprintSvg(svg: string, line: string): string {
  const [head, width, height] = HEAD.exec(svg) ?? []
  const [ground, colour] = GROUND.exec(svg) ?? []
  if (head === undefined || ground === undefined || colour === undefined)
    throw new DomainError('svg', 'svg must be a drawing of this program with its ground, got something else')
  const [w, h] = [Number(width), Number(height)]
  const taller = coordinate(h + IMPRINT.height)
  const text = svgText(
    fittedLine(line, w - 2 * IMPRINT.left, (part) => textWidth(part, IMPRINT.font)),
    IMPRINT.left,
    h + 12,
    {
      size: IMPRINT.font,
      colour: imprintColour(colour),
    },
  )
  const margin = `<rect y="${coordinate(h)}" width="${coordinate(w)}" height="${IMPRINT.height}" fill="${colour}"/>${text}`
  return svg
    .replace(head, head.replace(/ height="[^"]*"/, ` height="${taller}"`).replace(/ [\d.]+"$/, ` ${taller}"`))
    .replace(/<\/svg>\s*$/, () => `${margin}</svg>\n`)
}

/** Colour of the print on a ground `#rrggbb`. */
export function imprintColour(ground: string): string {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5].map((from) => Number.parseInt(ground.slice(from, from + 2), 16))
  return drawingColours(0.3 * red + 0.59 * green + 0.11 * blue < 128 ? 'dark' : 'light').muted
}

/** As much of a line as has room, with an ellipsis where some is left out. */
export function fittedLine(line: string, room: number, measure: (text: string) => number): string {
  if (measure(line) <= room) return line
  const letters = [...line]
  while (letters.length > 0 && measure(`${letters.join('').trimEnd()}…`) > room) letters.pop()
  return letters.length === 0 ? '' : `${letters.join('').trimEnd()}…`
}
