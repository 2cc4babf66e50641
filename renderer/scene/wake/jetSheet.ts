/**
 * The shed sheets of a train of jets while they form: each turned about the axis and cut open toward the viewer, as the nozzle is, in
 * buffers that are made once and written in place.
 */
import { BufferAttribute, BufferGeometry, DynamicDrawUsage } from 'three'
import { at } from '../../../core/base'
import type { JetSnapshot } from '../../../core/coaxial'
import type { WakeJet } from '../../../core/run'
import { CUT_FROM, CUT_TO } from '../meshes'
import { stroke } from '../strokes'
import type { Vector } from '../vectors'
import type { WakeStroke } from './surroundingStrokes'

/** Sheets drawn at one time: of pulses that form before the one ahead has been let go. */
const MOST_SHEETS = 3
/** Places along a sheet, from its tip to the lip. */
const ROWS = 240
/** Parts of the turn that is left, and angles of its two edges from straight up toward the viewer [rad]. */
const AROUND = 32
const EDGES = [CUT_TO, CUT_FROM + 2 * Math.PI] as const
const COLUMNS = AROUND + 1
/** Single filaments of the oldest part of a sheet, each a point at both edges. */
const MOST_LOOSE = 2000

export interface JetSheet {
  readonly surface: BufferGeometry
  readonly loose: BufferGeometry
  setJet(jet: WakeJet | null): void
  /** @param time of the wake [s] @returns whether there is a sheet to see */
  show(time: number): boolean
  /** The edges of the cut. */
  strokes(): readonly WakeStroke[]
}

/** The shape of the sheet of a pulse at a time since it began: the last one kept; null before the first and from the release on. */
export function sheetAt(
  { snapshots, release }: Pick<WakeJet, 'snapshots' | 'release'>,
  time: number,
): JetSnapshot | null {
  // Output times and times of release are sums of the same steps in another order.
  if (time >= release.time * (1 - 1e-9)) return null
  return snapshots.findLast((shape) => shape.time <= time) ?? null
}

/** Shapes of all pulses that form at a time of the wake, earliest pulse first. */
export function sheetsAt(jet: WakeJet, time: number): readonly JetSnapshot[] {
  const newest = Math.min(jet.pulses - 1, Math.floor(time / jet.period))
  const pulses = Array.from({ length: MOST_SHEETS }, (_, back) => newest - back).filter((pulse) => pulse >= 0)
  return pulses.toReversed().flatMap((pulse) => sheetAt(jet, time - pulse * jet.period) ?? [])
}

/** Indices of the places drawn of a sheet: all, or evenly spread ones; tip and lip among them. */
export function drawnNodes({ looseCount, x }: Pick<JetSnapshot, 'looseCount' | 'x'>, most = ROWS): readonly number[] {
  const count = x.length - looseCount
  const rows = Math.min(count, most)
  return Array.from({ length: rows }, (_, i) => looseCount + Math.round((i * (count - 1)) / Math.max(1, rows - 1)))
}

export function createJetSheet(): JetSheet {
  const [surface, loose] = [new BufferGeometry(), new BufferGeometry()]
  let position = new Float32Array(0)
  let normal = new Float32Array(0)
  let points = new Float32Array(0)
  const angles = Array.from({ length: COLUMNS }, (_, j) => EDGES[0] + ((EDGES[1] - EDGES[0]) * j) / AROUND)
  const cosines = Float64Array.from(angles, Math.cos)
  const sines = Float64Array.from(angles, Math.sin)
  let jet: WakeJet | null = null
  let shapes: readonly JetSnapshot[] = []
  let lines: readonly WakeStroke[] = []

  /** Made for the first jet, and kept. */
  function reserve(): void {
    if (position.length > 0) return
    position = new Float32Array(3 * MOST_SHEETS * ROWS * COLUMNS)
    normal = new Float32Array(position.length)
    points = new Float32Array(3 * 2 * MOST_LOOSE)
    const dynamic = (list: Float32Array): BufferAttribute => new BufferAttribute(list, 3).setUsage(DynamicDrawUsage)
    surface.setAttribute('position', dynamic(position))
    surface.setAttribute('normal', dynamic(normal))
    loose.setAttribute('position', dynamic(points))
    surface.setIndex(new BufferAttribute(surfaceIndex(), 1))
  }

  /** A sheet into its rows; those it does not need repeat the lip and have no size. */
  function writeSheet(shape: JetSnapshot, sheet: number): void {
    const nodes = drawnNodes(shape)
    const last = nodes.length - 1
    let k = 3 * sheet * ROWS * COLUMNS
    for (let row = 0; row < ROWS; row += 1) {
      const i = Math.min(row, last)
      const node = at(nodes, i)
      const [before, after] = [at(nodes, Math.max(0, i - 1)), at(nodes, Math.min(last, i + 1))]
      const tx = at(shape.x, after) - at(shape.x, before)
      const tr = at(shape.r, after) - at(shape.r, before)
      const length = Math.hypot(tx, tr) || 1
      const [x, r] = [at(shape.x, node), at(shape.r, node)]
      for (let j = 0; j < COLUMNS; j += 1) {
        const [c, s] = [at(cosines, j), at(sines, j)]
        position[k] = x
        position[k + 1] = r * c
        position[k + 2] = r * s
        normal[k] = -tr / length
        normal[k + 1] = (tx / length) * c
        normal[k + 2] = (tx / length) * s
        k += 3
      }
    }
  }

  function writeLoose(): void {
    let count = 0
    for (const { x, r, looseCount } of shapes)
      for (let i = 0; i < looseCount && count + 2 <= 2 * MOST_LOOSE; i += 1)
        for (const angle of EDGES) {
          points.set([at(x, i), at(r, i) * Math.cos(angle), at(r, i) * Math.sin(angle)], 3 * count)
          count += 1
        }
    loose.setDrawRange(0, count)
    changed(loose, ['position'], 3 * count)
  }

  return {
    surface,
    loose,
    setJet(next) {
      jet = next
      shapes = []
      lines = []
      surface.setDrawRange(0, 0)
      loose.setDrawRange(0, 0)
      if (next !== null) reserve()
    },
    show(time) {
      const wanted = jet === null ? [] : sheetsAt(jet, time)
      if (wanted.length !== shapes.length || wanted.some((shape, i) => shape !== shapes[i])) {
        shapes = wanted
        shapes.forEach(writeSheet)
        surface.setDrawRange(0, shapes.length * (ROWS - 1) * AROUND * 6)
        changed(surface, ['position', 'normal'], 3 * shapes.length * ROWS * COLUMNS)
        writeLoose()
        lines = shapes.flatMap(edgesOf)
      }
      return shapes.length > 0
    },
    strokes: () => lines,
  }
}

function changed(geometry: BufferGeometry, names: readonly string[], count: number): void {
  for (const name of names) {
    const attribute = geometry.getAttribute(name)
    if (!(attribute instanceof BufferAttribute)) continue
    attribute.clearUpdateRanges()
    attribute.addUpdateRange(0, count)
    attribute.needsUpdate = true
  }
}

/** Triangles of every sheet's own rows: none between one sheet and the next. */
function surfaceIndex(): Uint32Array {
  const index = new Uint32Array(MOST_SHEETS * (ROWS - 1) * AROUND * 6)
  let next = 0
  for (let sheet = 0; sheet < MOST_SHEETS; sheet += 1)
    for (let row = 0; row < ROWS - 1; row += 1)
      for (let j = 0; j < AROUND; j += 1) {
        const a = (sheet * ROWS + row) * COLUMNS + j
        const b = a + COLUMNS
        index.set([a, b, a + 1, b, b + 1, a + 1], next)
        next += 6
      }
  return index
}

function edgesOf(shape: JetSnapshot): WakeStroke[] {
  const nodes = drawnNodes(shape)
  return EDGES.map((angle) =>
    stroke(
      nodes.map((node): Vector => {
        const r = at(shape.r, node)
        return [at(shape.x, node), r * Math.cos(angle), r * Math.sin(angle)]
      }),
      'ink',
      1.1,
    ),
  )
}
