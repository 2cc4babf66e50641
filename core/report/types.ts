/** Plots as data: one model feeds the window's chart, the SVG and CSV exports and the reports. Values in the shown units. */

export interface PlotAxis {
  readonly title: string
  /** Shown unit, '' for a pure number. */
  readonly unit: string
  /** Ends of the axis where they are given; else from the data. */
  readonly min?: number
  readonly max?: number
}

export type SeriesRole = 'primary' | 'secondary' | 'reference'

/** How a measured point is marked. */
export type PlotMarker = 'circle' | 'square' | 'diamond' | 'triangle' | 'cross'

export interface PlotSeries {
  readonly id: string
  readonly name: string
  readonly x: readonly number[]
  /** null: no value there, the line is broken. */
  readonly y: readonly (number | null)[]
  readonly role: SeriesRole
  readonly line: 'solid' | 'dashed' | 'dotted'
  /** Area down to zero shaded. */
  readonly filled: boolean
  /** Identifier of a series with the same x: the area between the two is shaded. */
  readonly fillTo?: string
  /** True where its name is left off the drawing: one of many lines. */
  readonly unnamed?: boolean
  /** Measured points, each with this mark and without a line through them; absent: a line. */
  readonly marker?: PlotMarker
  /** Half lengths of error bars, one a point; null: none there. */
  readonly error?: readonly (number | null)[]
}

/** A shaded interval, for instance where published experiments put pinch-off. */
export interface PlotBand {
  readonly axis: 'x' | 'y'
  readonly from: number
  readonly to: number
  readonly label: string
}

/** A line across the plot: a limit (warm colour) or a mark of the present plan. */
export interface PlotLine {
  readonly axis: 'x' | 'y'
  readonly value: number
  readonly label: string
  readonly kind: 'limit' | 'mark'
}

export interface PlotModel {
  readonly id: string
  readonly title: string
  readonly x: PlotAxis
  readonly y: PlotAxis
  readonly series: readonly PlotSeries[]
  readonly bands: readonly PlotBand[]
  readonly lines: readonly PlotLine[]
}

/** The answer to "why?" beside a found value. */
export interface Explanation {
  readonly id: string
  readonly title: string
  /** The formula in presentation MathML (a <math> element) and, for screen readers and copying, in words. */
  readonly mathml: string
  readonly formula: string
  /** The plan's own numbers that enter. */
  readonly values: readonly { readonly name: string; readonly value: number; readonly unit: string }[]
  readonly source: string
  /** How far the source was checked: published, recalled, identity, own study, common practice. */
  readonly mark: 'published' | 'recalled' | 'identity' | 'own study' | 'common practice'
  /** Where the formula holds, in words. */
  readonly range: string
  /** Whether this plan is inside it, and a sentence that says so with the plan's number. */
  readonly inside: boolean
  readonly verdict: string
}
