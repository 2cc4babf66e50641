/**
 * Places the ruler's labels so that no two texts, no text and handle, and no text and another label's stem ever meet.
 *
 * Each estimate is a stem at its value with a dot in one of a few rows; its text stands beside the dot or further along the
 * row with a thin leader. Every arrangement is tried, cheapest first, within a bound; what has no room is left out of the
 * picture and returned as such, so that it can be told elsewhere. Pure and deterministic.
 */

export interface RulerLabel {
  readonly id: string
  /** Place of the stem [px]; null for a text without one, such as the band's name. */
  readonly stem: number | null
  /** Ends of a line through the dot, which the text keeps clear of; absent: none [px]. */
  readonly reach?: readonly [number, number]
  /** Where a text without stem begins [px]; ignored with a stem. */
  readonly anchor: number
  /** Measured width of the text [px]. */
  readonly width: number
  /** Topmost row is 0; a text without stem stays in its row. */
  readonly row: number | null
}

export interface Rectangle {
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
}

export interface PlacedLabel {
  readonly id: string
  readonly row: number
  /** Left end of the text [px]. */
  readonly x: number
  /** True where the text stands left of its stem. */
  readonly before: boolean
  /** True where a leader is drawn from dot to text. */
  readonly leader: boolean
}

export interface LabelLayout {
  readonly placed: readonly PlacedLabel[]
  /** Labels without room. */
  readonly left: readonly string[]
}

export interface LabelSpace {
  readonly width: number
  readonly rows: number
  readonly rowHeight: number
  /** Top of row 0 [px]. */
  readonly top: number
  /** Things no text may cover, such as the handle. */
  readonly obstacles: readonly Rectangle[]
  /** Places a text may be moved to along its row, besides its stem: for instance the right edge of the band. */
  readonly stops: readonly number[]
}

/** Between dot and text, and between any two things [px]. */
export const LABEL_GAP = 7
const CLEAR = 3
/** Arrangements looked at before the best so far is taken; a full search of five labels is well below it. */
const SEARCH_LIMIT = 4000

interface Candidate extends PlacedLabel {
  readonly box: Rectangle
  readonly stem: number | null
  /** Ends of its own line in its row. */
  readonly reach: readonly [number, number]
  readonly cost: number
}

/** Box of a text in a row [px]. */
export function labelBox(space: LabelSpace, row: number, x: number, width: number): Rectangle {
  const top = space.top + row * space.rowHeight
  return { left: x, right: x + width, top, bottom: top + space.rowHeight }
}

/** Lay labels out; see the module header. */
export function layOutLabels(labels: readonly RulerLabel[], space: LabelSpace): LabelLayout {
  const stems = labels.flatMap((label) => (label.stem === null ? [] : [label.stem]))
  const order = [...labels].sort(
    (a, b) => (a.stem === null ? 0 : 1) - (b.stem === null ? 0 : 1) || (a.stem ?? a.anchor) - (b.stem ?? b.anchor),
  )
  const options = order.map((label) => candidates(label, space, stems))
  const best = search(options)
  const placed = best.map(({ id, row, x, before, leader }) => ({ id, row, x, before, leader }))
  const found = new Set(placed.map((label) => label.id))
  return { placed, left: labels.filter((label) => !found.has(label.id)).map((label) => label.id) }
}

/** Every place of one label that respects the edges and the obstacles, cheapest first. */
function candidates(label: RulerLabel, space: LabelSpace, stems: readonly number[]): readonly Candidate[] {
  const rows = label.row === null ? Array.from({ length: space.rows }, (_, i) => i) : [label.row]
  const { stem, width } = label
  const list: Candidate[] = []
  for (const row of rows) {
    for (const x of placesAlong(label, space, stems)) {
      const box = labelBox(space, row, x, width)
      if (box.left < 0 || box.right > space.width) continue
      if (space.obstacles.some((obstacle) => meet(box, obstacle))) continue
      const before = stem !== null && x + width < stem
      const [from, to] = reachOf(label, stem ?? 0)
      const distance = stem === null ? Math.abs(x - label.anchor) : before ? from - x - width : x - to
      const leader = stem !== null && distance > LABEL_GAP + 1
      const cost = distance + (before ? 14 : 0) + (leader ? 10 : 0)
      list.push({ id: label.id, row, x, before, leader, box, stem, reach: [from, to], cost })
    }
  }
  return list.sort((a, b) => a.cost - b.cost || a.row - b.row || a.x - b.x)
}

function placesAlong(label: RulerLabel, space: LabelSpace, stems: readonly number[]): readonly number[] {
  const { stem, width } = label
  if (stem === null) return [label.anchor, label.anchor - width - 2 * LABEL_GAP]
  const edges = [...space.stops, ...stems, ...space.obstacles.flatMap((o) => [o.left, o.right])]
  const [from, to] = reachOf(label, stem)
  const after = [to, ...edges.filter((edge) => edge > to)].map((edge) => edge + LABEL_GAP)
  const before = [from, ...edges.filter((edge) => edge < from)].map((edge) => edge - LABEL_GAP - width)
  return [...new Set([...after, ...before])]
}

/** From where to where a label has a line of its own in its row: its stem alone, or its range. */
function reachOf({ reach }: RulerLabel, stem: number): readonly [number, number] {
  return reach === undefined ? [stem, stem] : [Math.min(stem, reach[0]), Math.max(stem, reach[1])]
}

/** Fewest labels left out, then least cost; rows read downwards in the order of their stems where that is free. */
function search(options: readonly (readonly Candidate[])[]): readonly Candidate[] {
  let best: readonly Candidate[] = []
  let bestCost = Infinity
  let looked = 0
  const chosen: Candidate[] = []

  function visit(index: number, cost: number, skipped: number): void {
    if (looked++ > SEARCH_LIMIT) return
    const bound = cost + SKIP * skipped
    if (bound >= bestCost) return
    if (index === options.length) {
      best = [...chosen]
      bestCost = bound
      return
    }
    for (const candidate of options[index] ?? []) {
      if (chosen.some((other) => collide(candidate, other))) continue
      chosen.push(candidate)
      visit(index + 1, cost + candidate.cost + disorder(candidate, chosen), skipped)
      chosen.pop()
    }
    visit(index + 1, cost, skipped + 1)
  }

  visit(0, 0, 0)
  return best
}

/** Leaving a label out costs more than any distance on a ruler. */
const SKIP = 1e6

/** Texts to the right read best when a later stem stands in a lower row. */
function disorder(candidate: Candidate, chosen: readonly Candidate[]): number {
  return chosen.some((other) => other.stem !== null && !other.before && other.row > candidate.row) ? 6 : 0
}

/** Texts meet, a text meets the other's stem, or a leader runs through the other's text. */
function collide(a: Candidate, b: Candidate): boolean {
  return meet(a.box, b.box) || crosses(a, b) || crosses(b, a) || leaderMeets(a, b) || leaderMeets(b, a)
}

function meet(a: Rectangle, b: Rectangle): boolean {
  return a.left < b.right + CLEAR && b.left < a.right + CLEAR && a.top < b.bottom && b.top < a.bottom
}

/** The stem of a runs down from its row through every row below. */
function crosses(a: Candidate, b: Candidate): boolean {
  if (a.stem === null || b.row < a.row) return false
  return a.stem > b.box.left - CLEAR - 1 && a.stem < b.box.right + CLEAR + 1
}

/** A range and a leader occupy their row, from there to the text. */
function leaderMeets(a: Candidate, b: Candidate): boolean {
  if (a.stem === null || a.row !== b.row) return false
  const left = Math.min(a.reach[0], a.box.left)
  const right = Math.max(a.reach[1], a.box.right)
  return b.box.left < right + CLEAR && b.box.right > left - CLEAR
}
