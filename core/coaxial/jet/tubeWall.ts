/**
 * The tube that the jet leaves, as bound vortex rings on its wall. Scaled by exit diameter and peak speed: radius 0.5, lip at x = 0,
 * the tube on x < 0.
 *
 * Panels of constant strength on [-4, 0], short at the lip; beyond them the strength an emptying tube has far from its end,
 * gamma (1 + R^2 / (4 x^2)): the flow inside, and outside the return flow of the source that the exit is from afar. The
 * strengths follow from the stream function on the wall, which also fixes the flux. The matrix takes the unsmoothed kernel
 * integrated over each panel: smoothed, it is ill-conditioned.
 */
import { at, completeEllipticFromComplement, gaussLegendre } from '../../base'
import { FactoredMatrix } from './factoredMatrix'

/** Radius of the tube in exit diameters. */
export const TUBE_RADIUS = 0.5
/** Length covered by panels, in exit diameters. */
const PANEL_REACH = 4
/** Growth from one panel to the next, and the longest panel. */
const PANEL_GROWTH = 1.15
const LONGEST_PANEL = 0.25
/** First panel over delta. */
const FIRST_PANEL = 0.25
/** Where the far tail is cut off: its end then acts on the jet by R^2 / (4 x^2), 4e-7 of the speed. */
const TAIL_REACH = 400
const TAIL_GROWTH = 1.25
/** The wall acts on the jet as rings no farther apart than this over delta: the ripple of their sum is exp(-4 pi). */
const RING_SPACING = 0.5

const PANEL_RULE = gaussLegendre(24)
const TAIL_RULE = gaussLegendre(4)

export interface TubeWallOptions {
  /** delta over D, the smoothing of the free filaments. */
  readonly delta: number
  /** Every panel's length is multiplied by this (for the test of independence); 1 when absent. */
  readonly panelFactor?: number
}

interface Panel {
  /** Ends, from < to <= 0. */
  readonly from: number
  readonly to: number
}

export class TubeWall {
  /** Middles of the panels, from the lip inwards: where the stream function is fixed. */
  readonly middles: Float64Array
  /** Rings that stand for the wall when it acts on the jet; circulations are written by `spread`. */
  readonly ringX: Float64Array
  private readonly panels: readonly Panel[]
  private readonly matrix: FactoredMatrix
  /** Stream function at the middles for a tail of unit strength. */
  private readonly tailStream: Float64Array
  /** Panel of each ring, -1 in the tail, and what it takes of that panel's strength. */
  private readonly ringPanel: Int32Array
  private readonly ringShare: Float64Array
  private readonly rightSide: Float64Array

  constructor(options: TubeWallOptions) {
    this.panels = wallPanels(options.delta, options.panelFactor ?? 1)
    const count = this.panels.length
    this.middles = Float64Array.from(this.panels, ({ from, to }) => (from + to) / 2)
    this.rightSide = new Float64Array(count)
    const rows = new Float64Array(count * count)
    for (let i = 0; i < count; i++)
      for (let j = 0; j < count; j++) rows[i * count + j] = panelStream(at(this.middles, i), at(this.panels, j))
    this.matrix = new FactoredMatrix(rows)
    const tail = tailRings()
    this.tailStream = this.middles.map((x) => tail.reduce((sum, ring) => sum + ring.share * ringStream(x - ring.x), 0))
    const rings = [...panelRings(this.panels, RING_SPACING * options.delta), ...tail]
    this.ringX = Float64Array.from(rings, (ring) => ring.x)
    this.ringPanel = Int32Array.from(rings, (ring) => ring.panel)
    this.ringShare = Float64Array.from(rings, (ring) => ring.share)
  }

  get panelCount(): number {
    return this.panels.length
  }

  /**
   * Strength of the panels that carries a flux.
   *
   * @param relativeSpeed speed in the tube less the stream outside, in peak speeds
   * @param freeStream stream function of the free filaments at the middles
   * @param strengths written: circulation a length of wall, from the lip inwards
   */
  solve(relativeSpeed: number, freeStream: Float64Array, strengths: Float64Array): void {
    const { rightSide, tailStream } = this
    const onWall = 0.5 * TUBE_RADIUS * TUBE_RADIUS * relativeSpeed
    for (let i = 0; i < rightSide.length; i++)
      rightSide[i] = onWall - relativeSpeed * (tailStream[i] ?? NaN) - (freeStream[i] ?? NaN)
    this.matrix.solve(rightSide, strengths)
  }

  /** Writes the circulations of the wall's rings from an index of `out` on. */
  spread(relativeSpeed: number, strengths: Float64Array, out: Float64Array, from: number): void {
    const { ringPanel, ringShare } = this
    for (let k = 0; k < ringPanel.length; k++) {
      const panel = ringPanel[k] ?? 0
      out[from + k] = (ringShare[k] ?? NaN) * (panel < 0 ? relativeSpeed : (strengths[panel] ?? NaN))
    }
  }

  /** Mean strength over a length of wall next to the lip. */
  meanStrength(length: number, strengths: Float64Array): number {
    let sum = 0
    for (let k = 0; k < this.panels.length; k++) {
      const { from, to } = at(this.panels, k)
      if (to <= -length) break
      sum += at(strengths, k) * (to - Math.max(from, -length))
    }
    return sum / length
  }

  /** Circulation on the wall beyond that of a uniform flow in the tube up to the lip, far tail included, in U D. */
  excess(relativeSpeed: number, strengths: Float64Array): number {
    const far = (TUBE_RADIUS * TUBE_RADIUS) / (4 * PANEL_REACH)
    let sum = relativeSpeed * far
    this.panels.forEach(({ from, to }, k) => (sum += (at(strengths, k) - relativeSpeed) * (to - from)))
    return sum
  }
}

function wallPanels(delta: number, factor: number): Panel[] {
  const lengths: number[] = []
  let length = FIRST_PANEL * delta * factor
  let reach = 0
  while (reach < PANEL_REACH) {
    lengths.push(length)
    reach += length
    length = Math.min(length * PANEL_GROWTH, LONGEST_PANEL * factor)
  }
  // Scaled to end exactly at the reach.
  const scale = PANEL_REACH / reach
  let to = 0
  return lengths.map((one) => {
    const panel = { from: to - one * scale, to }
    to = panel.from
    return panel
  })
}

interface WallRing {
  readonly x: number
  readonly panel: number
  readonly share: number
}

function panelRings(panels: readonly Panel[], spacing: number): WallRing[] {
  return panels.flatMap(({ from, to }, panel) => {
    const count = Math.max(1, Math.ceil((to - from) / spacing))
    const share = (to - from) / count
    return Array.from({ length: count }, (_, k) => ({ x: to - (k + 0.5) * share, panel, share }))
  })
}

function tailRings(): WallRing[] {
  const rule = TAIL_RULE
  const rings: WallRing[] = []
  let to = -PANEL_REACH
  let length = LONGEST_PANEL
  while (to > -TAIL_REACH) {
    for (let k = 0; k < rule.nodes.length; k++) {
      const x = to - (length / 2) * (1 + at(rule.nodes, k))
      const strength = 1 + (TUBE_RADIUS * TUBE_RADIUS) / (4 * x * x)
      rings.push({ x, panel: -1, share: strength * (length / 2) * at(rule.weights, k) })
    }
    to -= length
    length *= TAIL_GROWTH
  }
  return rings
}

/** Stream function on the wall of a plain ring on the wall, of unit circulation, at a distance along it; Lamb, art. 161. */
function ringStream(distance: number): number {
  const d1 = distance * distance
  const d2 = d1 + 4 * TUBE_RADIUS * TUBE_RADIUS
  const { K, E } = completeEllipticFromComplement(d1 / d2)
  const root = Math.sqrt(d2)
  return (((d1 + d2) / 2) * (K / root) - E * root) / (2 * Math.PI)
}

/** The same of a panel of unit strength. */
function panelStream(x: number, { from, to }: Panel): number {
  const half = (to - from) / 2
  const rule = PANEL_RULE
  let sum = 0
  if (x > from && x < to) {
    // The logarithm at the panel's own middle: s = half t^3 makes the integrand smooth.
    for (let k = 0; k < rule.nodes.length; k++) {
      const t = (1 + at(rule.nodes, k)) / 2
      sum += at(rule.weights, k) * 3 * t * t * half * ringStream(half * t * t * t)
    }
    return sum
  }
  for (let k = 0; k < rule.nodes.length; k++)
    sum += at(rule.weights, k) * half * ringStream(x - (from + to) / 2 - half * at(rule.nodes, k))
  return sum
}
