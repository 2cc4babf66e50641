/** The tank run in print: arrivals with their ranges, imaging, piston, strokes that meet the target. */
import type { TankRunResult } from '../../tank'
import { drawingColours } from '../colours'
import type { DocumentBlock } from '../document/types'
import { pistonPlots, tankPlots, targetPlot } from '../tankPlots'
import { tankScene } from '../tankScene'
import { tankSceneToSvg } from '../tankSceneSvg'
import { FULL, plotFigures } from './figures'
import { duration, NONE, percent, plain, tableOf, type Show } from './show'
import type { RecordContext } from './types'

export function tankBlocks(context: RecordContext): readonly DocumentBlock[] {
  const { plan, data, show } = context
  const section = plan.tankRun
  const result = data.tankRun
  if (result === null || section === null) return []
  const units = {
    length: show.unit('length', section.stations),
    time: show.unit('time', [result.profile.duration]),
    wakeTime: show.unit('wakeTime', [result.path?.time.at(-1)]),
    bodyLength: show.unit('bodyLength', [section.tank.length]),
    ringSpeed: show.unit('ringSpeed', [result.path?.speed[0]]),
    speed: show.unit('speed', [result.profile.peakSpeed]),
    acceleration: show.unit('acceleration', [result.profile.peakAcceleration]),
  }
  const scene = tankScene({ section, nozzle: plan.nozzle, stroke: plan.programme.stroke, result }, units)
  const colours = drawingColours('print')
  return [
    { kind: 'subheading', text: 'Tank run' },
    ...(result.status === 'done' ? [] : [{ kind: 'paragraph', tone: 'limit', text: result.message } as const]),
    ...arrivals(result, show),
    {
      kind: 'figure',
      svg: tankSceneToSvg(scene, { width: FULL, height: 380, colours, part: 'whole', id: 'record-tank' }),
      caption: `Tank, ring and camera to one scale; D is the exit diameter. ${scene.conventions.join(' ')}`,
    },
    {
      kind: 'paragraph',
      tone: 'small',
      text: `Rings followed: ${result.rings.map(({ basis, ageing }) => `${basis} under the ${ageing} law`).join('; ')}.`,
    },
    { kind: 'pairs', rows: figures(result, show) },
    ...clearances(result, show),
    ...solutions(result, show),
    ...plotFigures([
      ...tankPlots(result, units, data.spread?.position ?? null),
      ...pistonPlots(result.profile, units),
      ...(result.solutions.length === 0 ? [] : [targetPlot(result.solutions, plan.programme.stroke, units)]),
    ]),
    ...(result.matrix === null ? [] : [{ kind: 'paragraph', text: `Run matrix: ${result.matrix.text}` } as const]),
  ]
}

function arrivals({ arrivals: rows }: TankRunResult, show: Show): DocumentBlock[] {
  if (rows.length === 0) return []
  const stations = show.column(
    'Station',
    'length',
    rows.map(({ station }) => station),
  )
  const table = tableOf(
    'Arrivals at the stations, time after the piston starts: ends of the range, then the adopted ring',
    { title: stations.column.title, cells: stations.cells },
    [
      show.column(
        'Earliest',
        'wakeTime',
        rows.map(({ timeLow }) => timeLow),
      ),
      show.column(
        'Latest',
        'wakeTime',
        rows.map(({ timeHigh }) => timeHigh),
      ),
      show.column(
        'Adopted',
        'wakeTime',
        rows.map(({ time }) => time),
      ),
      show.column(
        'Speed, lowest',
        'ringSpeed',
        rows.map(({ speedLow }) => speedLow),
      ),
      show.column(
        'highest',
        'ringSpeed',
        rows.map(({ speedHigh }) => speedHigh),
      ),
      show.column(
        'adopted',
        'ringSpeed',
        rows.map(({ speed }) => speed),
      ),
      show.column(
        'Radius',
        'length',
        rows.map(({ radius }) => radius),
      ),
    ],
  )
  const reasons = rows.flatMap(({ reason, station }) =>
    reason === null ? [] : [`${show.result(station, 'length')}: ${reason}.`],
  )
  return reasons.length === 0 ? [table] : [table, { kind: 'paragraph', tone: 'limit', text: reasons.join(' ') }]
}

function figures({ imaging, profile, ...result }: TankRunResult, show: Show): (readonly [string, string])[] {
  const across = imaging.fieldOfView
  return [
    ['Walls change the speed by', percent(result.wallShare)],
    ['Time between frames of a pair', show.result(imaging.pairInterval, 'rampTime')],
    ['Frame rate', show.result(imaging.frameRate, 'frequency')],
    ['Image scale', show.result(imaging.scale, 'imageScale')],
    [
      'Field of view',
      across === null ? NONE : `${show.result(across[0], 'length')} × ${show.result(across[1], 'length')}`,
    ],
    ['Magnification', plain(imaging.magnification)],
    ['Largest displacement of a pair', `${plain(imaging.largestDisplacement)}\u00A0px`],
    ['Vectors across the core', plain(imaging.vectorsAcrossCore)],
    ['Gradient across the core', imaging.gradient === null ? NONE : `${plain(imaging.gradient)}\u00A0px/px`],
    ['Light sheet', show.result(imaging.sheetThickness, 'length')],
    ['Depth of field', show.result(imaging.depthOfField, 'length')],
    ['Storage of one run', imaging.storage === null ? NONE : `${plain(imaging.storage / 1e9)}\u00A0GB`],
    ['Waiting between runs', duration(result.settlingTime)],
    ['Piston travel', show.result(profile.travel, 'length')],
    ['Highest piston speed', show.result(profile.peakSpeed, 'speed')],
    ['Highest piston acceleration', show.result(profile.peakAcceleration, 'acceleration')],
    ['Highest piston jerk', show.result(profile.peakJerk, 'jerk')],
    ['Motion of the piston', show.result(profile.duration, 'time')],
    ['Circulation kept by the rounded motion', percent(profile.rounding.circulationShare)],
  ]
}

function clearances({ clearances: rows }: TankRunResult, show: Show): DocumentBlock[] {
  if (rows.length === 0) return []
  return [
    {
      kind: 'table',
      caption: 'Clearances',
      columns: [
        { title: 'Wall' },
        { title: 'Distance', numeric: true },
        { title: 'Over D', numeric: true },
        { title: 'Over ring radius', numeric: true },
        { title: 'Changes the ring’s speed by', numeric: true },
        { title: 'State' },
      ],
      rows: rows.map(({ wall, distance, overDiameter, overRadius, costPercent, ok, wallInteraction }) => [
        wall,
        show.result(distance, 'length'),
        plain(overDiameter),
        plain(overRadius),
        costPercent === null ? NONE : `${plain(costPercent)}\u00A0%`,
        wallInteraction ? 'WALL INTERACTION' : ok ? 'kept' : 'LESS THAN PRACTICE',
      ]),
    },
  ]
}

function solutions({ solutions: rows }: TankRunResult, show: Show): DocumentBlock[] {
  if (rows.length === 0) return []
  const column = show.column
  return [
    {
      ...tableOf(
        'Strokes and peak speeds that meet the target',
        { title: 'Stroke ratio', cells: rows.map(({ strokeRatio }) => plain(strokeRatio)) },
        [
          column(
            'Stroke',
            'length',
            rows.map(({ stroke }) => stroke),
          ),
          column(
            'Peak exit speed',
            'speed',
            rows.map(({ peakSpeed }) => peakSpeed),
          ),
          column(
            'Circulation',
            'circulation',
            rows.map(({ circulation }) => circulation),
          ),
          column(
            'Ring Reynolds number',
            'number',
            rows.map(({ reynolds }) => reynolds),
          ),
          column(
            'Piston speed',
            'speed',
            rows.map(({ pistonSpeed }) => pistonSpeed),
          ),
          column(
            'Piston travel',
            'length',
            rows.map(({ pistonTravel }) => pistonTravel),
          ),
        ],
      ),
    },
    ...rows.flatMap(({ reason, strokeRatio }): DocumentBlock[] =>
      reason === null ? [] : [{ kind: 'paragraph', tone: 'small', text: `${plain(strokeRatio)} D: ${reason}` }],
    ),
  ]
}
