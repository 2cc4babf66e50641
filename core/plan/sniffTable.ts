/** Which delimiter and decimal mark a table uses, from a sample of its lines. */

const DELIMITERS = ['\t', ';', '|', ','] as const
/** Lines looked at, from the start and from the middle. */
const SAMPLE = 50

export interface TableMarks {
  readonly delimiter: string
  readonly decimalComma: boolean
}

/**
 * The delimiter that cuts most lines into the same number of cells, at least two; space where none does. The decimal comma where cells hold
 * digits on both sides of a comma that is not the delimiter, and none on both sides of a point.
 *
 * @param text with line feeds only
 */
export function sniffTable(text: string): TableMarks {
  const sample = sampleOf(text)
  let best: { readonly delimiter: string; readonly lines: number; readonly cells: number } | null = null
  for (const delimiter of DELIMITERS) {
    const counts = sample.map((line) => unquoted(line).split(delimiter).length)
    const usual = commonest(counts.filter((count) => count > 1))
    if (usual === null) continue
    const lines = counts.filter((count) => count === usual).length
    // A comma inside numbers cuts every line too: a mark that is no part of a number goes first.
    const wins = best === null || (delimiter === ',' ? lines > 2 * best.lines : lines > best.lines)
    if (wins) best = { delimiter, lines, cells: usual }
  }
  const rare = best !== null && best.lines < sample.length / 3
  const delimiter =
    best === null || (rare && sample.filter((line) => /\S\s+\S/.test(line)).length > best.lines) ? ' ' : best.delimiter
  return { delimiter, decimalComma: delimiter !== ',' && hasDecimalComma(sample) }
}

function hasDecimalComma(sample: readonly string[]): boolean {
  const commas = sample.filter((line) => /\d,\d/.test(line)).length
  const points = sample.filter((line) => /\d\.\d/.test(line)).length
  return commas > points
}

function sampleOf(text: string): string[] {
  const from = (start: number): string[] => {
    const lines: string[] = []
    let at = start
    while (lines.length < SAMPLE && at < text.length) {
      const end = text.indexOf('\n', at)
      const line = text.slice(at, Math.min(end < 0 ? text.length : end, at + 4000))
      if (line.trim() !== '' && !line.startsWith('#')) lines.push(line)
      at = end < 0 ? text.length : end + 1
    }
    return lines
  }
  const first = from(0)
  if (first.length < SAMPLE) return first
  const middle = text.indexOf('\n', text.length >> 1)
  return middle < 0 ? first : [...first, ...from(middle + 1)]
}

function unquoted(line: string): string {
  return line.replace(/"[^"]*"/g, '')
}

function commonest(counts: readonly number[]): number | null {
  const times = new Map<number, number>()
  for (const count of counts) times.set(count, (times.get(count) ?? 0) + 1)
  let best: number | null = null
  for (const [count, seen] of times) if (best === null || seen > (times.get(best) ?? 0)) best = count
  return best
}
