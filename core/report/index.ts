/**
 * Plots and drawings as data, and the writers of SVG and CSV that window, reports and runner share.
 */
export {
  placeLabels,
  pointsAlong,
  sharedArea,
  type Box,
  type LabelRequest,
  type Obstacles,
  type Pixel,
  type Place,
  type PlacedLabel,
} from './boxes'
export { drawingColours, type DrawingColours, type DrawingTheme } from './colours'
export { plotTable, plotToCsv, type PlotTable } from './plotCsv'
export { lineEnds, plotLabels, type PlotLabel } from './plotLabels'
export { plotDomain, plotScale, seriesParts, type PlotDomain, type PlotScale } from './plotScale'
export { axisText, axisTicks, DASHES, describePlot, plotToSvg, seriesColour, type DrawingSize } from './plotSvg'
export { pulsePlots, type PulsePlotUnits } from './pulsePlots'
export { pulseScene, type PulseSceneUnits } from './pulseScene'
export { offAxisRuns, sceneToSvg } from './sceneSvg'
export type {
  PulseSceneModel,
  SceneArrow,
  SceneBar,
  SceneCallout,
  SceneColumn,
  SceneExtent,
  SceneNozzle,
  ScenePoint,
  SceneRing,
  SceneSlug,
  WallStation,
} from './sceneTypes'
export { swirlArc } from './swirlArc'
export { textWidth } from './textWidth'
export { thinPlot } from './thinPlot'
export { niceTicks, tickLabel, tickStep } from './ticks'
export type { Explanation, PlotAxis, PlotBand, PlotLine, PlotModel, PlotSeries, SeriesRole } from './types'
export { MOST_LINES, MOST_PAIRS, wakePlots, type WakePlotOptions, type WakePlotUnits } from './wakePlots'
export {
  nearestPair,
  neighbourSeparations,
  pathIndex,
  pathOffsets,
  totalImpulse,
  type NeighbourSeparation,
  type WakeSeries,
} from './wakeSeries'
export { adoptedBasisInWords, explain, EXPLANATION_IDS, type ExplanationId } from './explanations'
export type { ExplanationContext } from './explanationTypes'
export { counterColour, fieldColour, type FieldMap, type Paint } from './fieldColours'
export { wakeSceneToSvg, type WakeSvgChoice } from './wakeSceneSvg'
export { wakeScene, type WakeSceneData, type WakeSceneUnits } from './wakeScene'
export type {
  WakeSceneDatum,
  WakeSceneDye,
  WakeSceneLine,
  WakeSceneModel,
  WakeSceneNozzle,
  WakeScenePlane,
  WakeSceneRing,
  WakeSceneStation,
  WakeSceneTube,
  WakeSceneWall,
} from './wakeSceneTypes'
