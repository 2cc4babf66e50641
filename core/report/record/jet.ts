/** The computed starting jet in print. */
import { jetTimeline } from '../jetTimeline'
import { jetPlots } from '../jetPlots'
import { jetScene } from '../jetScene'
import { jetSceneToSvg } from '../jetSceneSvg'
import type { JetOutcome } from '../../plan'
import type { DocumentBlock } from '../document/types'
import { FULL, plotFigures } from './figures'
import { figureTable, type FigureRow } from './pulse'
import { plain } from './show'
import type { RecordContext } from './types'

type Key = 'formationNumber' | 'ringCirculation' | 'ringDimensionlessEnergy' | 'ringSpeed'

export function jetBlocks(context: RecordContext): readonly DocumentBlock[] {
  const { data, show } = context
  const { jet } = data
  if (jet === null) return []
  const { own, formation } = jet
  const { byDelta } = own
  const range = (rows: readonly Readonly<Record<Key, number | null>>[], key: Key): readonly [number?, number?] => {
    const values = rows.flatMap((row) => row[key] ?? [])
    return values.length === 0 ? [] : [Math.min(...values), Math.max(...values)]
  }
  const basis = byDelta.length > 1 ? 'over the smoothing lengths' : 'one smoothing length: no spread to show'
  const rows: FigureRow[] = [
    [
      'Formation number',
      show.range(formation?.formationNumberLow, formation?.formationNumberHigh, 'number'),
      plain(formation?.formationNumber),
      formation === null || formation.byDelta.length > 1 ? 'over the smoothing lengths' : basis,
    ],
    [
      'Ring circulation',
      show.range(...ends(range(byDelta, 'ringCirculation')), 'circulation'),
      show.result(own.ringCirculation, 'circulation'),
      basis,
    ],
    [
      'Dimensionless energy of the ring',
      show.range(...ends(range(byDelta, 'ringDimensionlessEnergy')), 'number'),
      plain(own.ringDimensionlessEnergy),
      basis,
    ],
    [
      'Ring speed',
      show.range(...ends(range(byDelta, 'ringSpeed')), 'ringSpeed'),
      show.result(own.ringSpeed, 'ringSpeed'),
      basis,
    ],
  ]
  return [
    { kind: 'subheading', text: 'Starting jet' },
    ...(jet.status === 'done' ? [] : [{ kind: 'paragraph', tone: 'limit', text: jet.message } as const]),
    figureTable(null, rows),
    {
      kind: 'pairs',
      rows: [
        ['Everything shed at the end of the stroke', show.result(own.totalCirculation, 'circulation')],
        ['Circulation beyond the slug', show.result(own.circulationBeyondSlug, 'circulation')],
        ['Impulse beyond the slug', show.result(own.impulseBeyondSlug, 'impulse')],
        ['Energy beyond the slug', show.result(own.energyBeyondSlug, 'energy')],
        ['Pinch-off seen at', show.result(own.pinchOffTime, 'time')],
        ['Trailing jet', own.trailingJet === null ? 'not told' : own.trailingJet ? 'yes' : 'none'],
        ['Stopping vortex', show.result(own.shown.stoppingCirculation, 'circulation')],
        [
          'Drift of impulse, of energy',
          own.drift === null ? 'not measured' : `${plain(own.drift.impulse)}, ${plain(own.drift.energy)}`,
        ],
      ],
    },
    ...drawings(context, jet),
  ]
}

function ends([low, high]: readonly [number?, number?]): readonly [number | undefined, number | undefined] {
  return [low, high]
}

function drawings({ plan, data, show }: RecordContext, { own, formation }: JetOutcome): DocumentBlock[] {
  const { shown } = own
  if (shown.snapshots.length === 0) return []
  const timeline = jetTimeline(shown, plan.programme, plan.nozzle.diameter)
  const scene = jetScene(shown, plan.programme, plan.nozzle.diameter, {
    length: show.unit('length', [plan.nozzle.diameter]),
    time: show.unit('time', [timeline.strokeEnd]),
  })
  const last = timeline.times.length - 1
  const plots = jetPlots(shown, {
    pulse: data.pulse,
    density: data.water.density,
    timeline,
    formation,
    units: {
      circulation: show.unit('circulation', [own.totalCirculation]),
      impulse: show.unit('impulse', [data.pulse?.total.impulse]),
    },
  })
  return [
    {
      kind: 'figure',
      svg: jetSceneToSvg(scene, last, { width: FULL, height: 240, theme: 'print' }),
      caption: `The vortex sheet at the last computed shape, smoothing ${shown.delta} D. ${scene.conventions.join(' ')}`,
    },
    ...plotFigures(plots),
  ]
}
