/**
 * A plot model as a Chart.js chart: made once, updated in place.
 */
import {
  Chart,
  Filler,
  LinearScale,
  LineController,
  LineElement,
  PointElement,
  type ChartConfiguration,
  type ChartDataset,
  type Plugin,
  type Scale,
} from 'chart.js'
import {
  axisText,
  axisTicks,
  DASHES,
  plotDomain,
  seriesColour,
  type DrawingColours,
  type PlotModel,
  type PlotSeries,
} from '../../core/report'
import { marksPlugin, type PlotState } from './marks'
import { withOpacity } from './themeColours'

Chart.register(LineController, LineElement, PointElement, LinearScale, Filler)

/** One dash without end: a line without dashes is thinned to one point a pixel column, which makes stairs of steep parts. */
const WHOLE = [1e6, 0]

interface Point {
  x: number
  y: number
}
type LineChart = Chart<'line', Point[]>

export interface PlotChart {
  /** Show another model, other colours or another cursor; nothing is made anew. */
  update(state: PlotState): void
  /** Only the marks on top have changed. */
  redraw(): void
  /** Abscissa under a horizontal pixel of the canvas. */
  valueAt(pixel: number): number
  /** Place of a point in pixels of the canvas. */
  pixelOf(x: number, y: number): Point
  readonly area: { readonly left: number; readonly right: number; readonly top: number; readonly bottom: number }
  destroy(): void
}

export interface ChartLook {
  readonly fontFamily: string
  readonly fontSize: number
  /** Follow the size of the parent element; else the canvas keeps its own. */
  readonly responsive: boolean
  readonly pixelRatio?: number
  /** Room kept above the frame, for a heading. */
  readonly top: number
  readonly plugins?: readonly Plugin<'line'>[]
  readonly axisTitles: boolean
}

/** Draw a plot on a canvas. Animation is off: the picture follows the plan at once. */
export function createPlotChart(canvas: HTMLCanvasElement, first: PlotState, look: ChartLook): PlotChart {
  const state: { current: PlotState } = { current: first }
  const chart: LineChart = new Chart<'line', Point[]>(canvas, configuration(state, look))
  return {
    update(next) {
      state.current = next
      const sets = datasets(next.model, next.colours)
      sets.forEach((set, index) => {
        const present = chart.data.datasets[index]
        if (present === undefined) chart.data.datasets.push(set)
        else Object.assign(present, set)
      })
      chart.data.datasets.length = sets.length
      chart.update('none')
    },
    redraw() {
      chart.draw()
    },
    valueAt: (pixel) => chart.scales['x']?.getValueForPixel(pixel) ?? Number.NaN,
    pixelOf: (x, y) => ({
      x: chart.scales['x']?.getPixelForValue(x) ?? 0,
      y: chart.scales['y']?.getPixelForValue(y) ?? 0,
    }),
    get area() {
      return chart.chartArea
    },
    destroy() {
      chart.destroy()
    },
  }
}

function datasets(model: PlotModel, colours: DrawingColours): ChartDataset<'line', Point[]>[] {
  return model.series.map((series) => {
    const colour = seriesColour(series, colours)
    return {
      // Measured points are drawn with the marks: their shapes and bars are those of the exports.
      data: series.marker === undefined ? points(series) : [],
      borderColor: colour,
      borderWidth: series.role === 'primary' ? 1.8 : 1.4,
      borderDash: series.line === 'solid' ? WHOLE : [...DASHES[series.line]],
      borderJoinStyle: 'round',
      fill: filling(series, model),
      backgroundColor: withOpacity(colour, 0.15),
      clip: { left: 2, right: 2, top: 0, bottom: 2 },
    }
  })
}

/** What the area of a series is shaded to. */
function filling({ filled, fillTo }: PlotSeries, { series }: PlotModel): 'origin' | number | false {
  const other = fillTo === undefined ? -1 : series.findIndex(({ id }) => id === fillTo)
  return other >= 0 ? other : filled ? 'origin' : false
}

/** Not a number breaks the line. */
function points(series: PlotSeries): Point[] {
  return series.x.map((x, index) => ({ x, y: series.y[index] ?? Number.NaN }))
}

function configuration(state: { current: PlotState }, look: ChartLook): ChartConfiguration<'line', Point[]> {
  const font = { family: look.fontFamily, size: look.fontSize }
  const colour = (name: keyof DrawingColours) => (): string => state.current.colours[name]
  const labels = { x: new Map<number, string>(), y: new Map<number, string>() }
  // Chart.js would widen the axis to its own round ends when it builds ticks: ours are put back after that.
  const fit = (axis: 'x' | 'y') => (scale: Scale) => {
    const domain = plotDomain(state.current.model)
    const [min, max] = axis === 'x' ? [domain.xMin, domain.xMax] : [domain.yMin, domain.yMax]
    const room = axis === 'x' ? scale.chart.width / 52 : scale.chart.height / 42
    const ticks = axisTicks(min, max, Math.max(2, Math.min(8, Math.floor(room))))
    scale.min = min
    scale.max = max
    scale.ticks = [...ticks]
    labels[axis] = new Map(ticks.map(({ value, label }) => [value, label]))
  }
  const axis = (id: 'x' | 'y') => ({
    type: 'linear' as const,
    afterBuildTicks: fit(id),
    border: { display: false },
    grid: {
      color: id === 'y' ? colour('rule') : colour('edge'),
      drawOnChartArea: id === 'y',
      drawTicks: id === 'x',
      tickLength: id === 'x' ? 4 : 0,
    },
    ticks: {
      color: colour('muted'),
      font,
      maxRotation: 0,
      padding: id === 'x' ? 2 : 6,
      autoSkip: false,
      callback: (value: number | string) => labels[id].get(Number(value)) ?? '',
    },
    title: {
      display: look.axisTitles && id === 'x',
      text: axisText(state.current.model.x),
      color: state.current.colours.muted,
      font,
    },
  })
  return {
    type: 'line',
    data: { datasets: datasets(state.current.model, state.current.colours) },
    options: {
      animation: false,
      responsive: look.responsive,
      maintainAspectRatio: false,
      ...(look.pixelRatio === undefined ? {} : { devicePixelRatio: look.pixelRatio }),
      parsing: false,
      normalized: true,
      events: [],
      layout: { padding: { top: look.top, right: 10, bottom: 0, left: 0 } },
      elements: { point: { radius: 0 }, line: { tension: 0 } },
      scales: { x: axis('x'), y: axis('y') },
    },
    plugins: [marksPlugin(state, look), ...(look.plugins ?? [])],
  }
}
