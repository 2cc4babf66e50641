/** Plots and drawings at the sizes of the page: full width, or two side by side. */
import type { DocumentBlock } from '../document/types'
import { plotToSvg } from '../plotSvg'
import { thinPlot } from '../thinPlot'
import type { PlotModel } from '../types'

/** Pixels at 96 to the inch: the width of the text of a page, 180 mm, and half of it less the gap. */
export const FULL = 680
const HALF = { width: 330, height: 214, theme: 'print' } as const
/** A lone plot is not stretched over the page. */
const LONE = { width: 460, height: 240, theme: 'print' } as const
/** Points of a line that print can show. */
const MOST_POINTS = 400

/** Plots two in a row; a lone one alone. */
export function plotFigures(models: readonly PlotModel[]): readonly DocumentBlock[] {
  if (models.length === 0) return []
  const size = models.length === 1 ? LONE : HALF
  const items = models.map((model) => ({
    svg: plotToSvg(thinPlot(model, MOST_POINTS), size),
    caption: captionOf(model),
  }))
  return [{ kind: 'figures', items }]
}

/** What the lines and shades stand for, so that the plot can be read without colour. */
function captionOf({ title, series, bands, lines }: PlotModel): string {
  const named = [
    ...series.filter(({ unnamed = false }) => !unnamed && series.length > 1).map(({ name, line }) => `${name} ${line}`),
    ...bands.map(({ label }) => `${label} shaded`),
    ...new Set(lines.filter(({ kind }) => kind === 'limit').map(({ label }) => `${label} dash-dotted`)),
  ]
  return named.length === 0 || named.length > 8 ? `${title}.` : `${title}: ${named.join(', ')}.`
}
