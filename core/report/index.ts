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
export { fittedLine, imprintColour, imprintSvg } from './imprint'
export { plotTable, plotToCsv, type PlotTable } from './plotCsv'
export { lineEnds, plotLabels, type PlotLabel } from './plotLabels'
export { markedPoints, markerPath, MARKERS, type MarkedPoint } from './plotMarkers'
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
export type { Explanation, PlotAxis, PlotBand, PlotLine, PlotMarker, PlotModel, PlotSeries, SeriesRole } from './types'
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
export { JET_EXPLANATION_IDS, explainJet, type JetExplanationContext, type JetExplanationId } from './jetExplanations'
export { jetPlots, PUBLISHED_RING_ENERGY, type JetPlotOptions, type JetPlotUnits } from './jetPlots'
export { describeJet, jetPhase, jetScene, phaseInWords, type JetPhase } from './jetScene'
export { jetSceneToSvg } from './jetSceneSvg'
export type { JetSceneModel, JetSceneRing, JetSceneUnits } from './jetSceneTypes'
export {
  AGE_STEPS,
  ageColour,
  ageStep,
  emptyLine,
  layLine,
  oldestAge,
  sheetRuns,
  type SheetLine,
  type SheetRun,
} from './jetSheet'
export {
  jetReading,
  jetTimeline,
  type JetMoment,
  type JetMomentId,
  type JetReading,
  type JetTimeline,
} from './jetTimeline'
export { documentBody, documentHtml } from './document/html'
export { DOCUMENT_STYLE, pageRule } from './document/style'
export type { DocumentBlock, DocumentColumn, Paper, PrintDocument } from './document/types'
export { contourLines, regionAbove, type ContourGrid, type ContourLine } from './contours'
export { explainThruster, THRUSTER_EXPLANATION_IDS, type ThrusterExplanationId } from './explanationsThruster'
export type { ThrusterExplanationContext } from './thrusterExplanationParts'
export {
  powerBar,
  sizePlot,
  thrusterPlots,
  type PowerPart,
  type ThrusterPlotInput,
  type ThrusterPlotUnits,
} from './thrusterPlots'
export {
  describeThrustMap,
  MAP_FIELDS,
  MAP_RESULTS,
  mapReading,
  thrustMap,
  thrustMapToCsv,
  type MapField,
  type MapMark,
  type MapResult,
  type ThrustMapInput,
  type ThrustMapModel,
  type ThrustMapUnits,
} from './thrustMap'
export { thrustMapDrawing, type MapDrawing, type MapText } from './thrustMapDrawing'
export { MARK_RADIUS, type PlacedMark } from './thrustMapMarks'
export { inkOn, paintText, thrustMapToSvg } from './thrustMapSvg'
export { dayText, runSheet, type RunSheetInput } from './runSheet'
export { bytesText } from './runSheetBlocks'
export { pistonPlots, tankPlots, targetPlot, type TankPlotUnits } from './tankPlots'
export { tankScene, type TankSceneInput, type TankSceneUnits } from './tankScene'
export { tankSceneToSvg, type TankDrawingOptions } from './tankSceneSvg'
export type { TankExtentName, TankSceneModel } from './tankSceneTypes'
export {
  explainTank,
  TANK_EXPLANATION_IDS,
  type TankExplanationContext,
  type TankExplanationId,
} from './tankExplanations'
export { designRecord } from './designRecord'
export type { RecordData, RecordMeta } from './record/types'
export { measuredPulseRows, type MeasuredPulseRow } from './measuredPulse'
export {
  cyclePlot,
  fieldPlot,
  forcePlot,
  residualPlot,
  trackPlots,
  type JetTrack,
  type ReadingsPlotUnits,
  type TrackOptions,
} from './readingsPlots'
export { comparisonBlocks, comparisonRecord } from './comparisonRecord'
