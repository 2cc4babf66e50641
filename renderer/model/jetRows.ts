/**
 * The computed starting jet as rows and words to show: figures in the chosen units, ranges first. Pure; every number is core's own.
 */
import { at } from '../../core/base'
import type { JetEnsemble } from '../../core/coaxial'
import { formatNumber, formatQuantity, formatRange } from '../../core/quantity'
import {
  jetPhase,
  jetReading,
  phaseInWords,
  PUBLISHED_RING_ENERGY,
  type JetExplanationId,
  type JetSceneModel,
} from '../../core/report'
import type { FinishedJet } from './jetJob'
import type { Units } from './units'

export interface JetRow {
  readonly id: JetExplanationId
  readonly label: string
  readonly figure: string
  readonly unit: string
  readonly notes: readonly string[]
}

/** One smoothing length of the ensemble. */
export interface JetDeltaRow {
  readonly delta: string
  readonly formationNumber: string
  readonly circulation: string
  readonly energy: string
  readonly speed: string
}

/** A number of the shape shown. */
export interface JetFigure {
  readonly label: string
  readonly text: string
}

const NONE = '—'

function known<T>(values: readonly (T | null)[]): readonly T[] {
  return values.filter((value): value is T => value !== null)
}

function ends(values: readonly number[], unit: string, digits = 3): { readonly text: string; readonly unit: string } {
  return formatRange(Math.min(...values), Math.max(...values), unit, digits)
}

/** Formation number with its range: one decimal, for the cut falls between discrete billows. */
export function formationRange(
  formation: JetEnsemble | null,
): { readonly range: string; readonly mean: string } | null {
  const [low, high, mean] = [
    formation?.formationNumberLow ?? null,
    formation?.formationNumberHigh ?? null,
    formation?.formationNumber ?? null,
  ]
  if (low === null || high === null || mean === null) return null
  const [from, to] = [low.toFixed(1), high.toFixed(1)]
  return { range: from === to ? from : `${from} to ${to}`, mean: mean.toFixed(1) }
}

/** Rows under "The jet as computed". */
export function jetRows({ jet }: FinishedJet, units: Units): readonly JetRow[] {
  const { own, formation } = jet
  const rows: JetRow[] = []
  const number = formationRange(formation)
  const members = known((formation ?? own).byDelta.map((one) => one.formationNumber)).length
  rows.push({
    id: 'jet.formationNumber',
    label: 'Formation number',
    figure: number?.range ?? 'none',
    unit: '',
    notes:
      number === null
        ? [formation === null ? 'not computed to its end' : 'no ring pinched off']
        : members > 1
          ? [`mean ${number.mean} of ${members} smoothing lengths`]
          : ['one smoothing length: no range'],
  })
  const circulations = known(own.byDelta.map((one) => one.ringCirculation))
  if (circulations.length > 0)
    rows.push({
      id: 'jet.ringCirculation',
      label: 'Circulation',
      figure: ends(circulations, units.circulation).text,
      unit: units.circulation,
      notes: [
        own.totalCirculation === null
          ? 'in the ring'
          : `in the ring, of ${formatQuantity(own.totalCirculation, units.circulation, 3)} shed by the end of the stroke`,
        own.trailingJet === true
          ? 'a trailing jet follows the ring'
          : own.trailingJet === false
            ? 'one ring takes everything'
            : 'whether a jet trails is not clear from these runs',
      ],
    })
  const energies = known(own.byDelta.map((one) => one.ringDimensionlessEnergy))
  if (energies.length > 0)
    rows.push({
      id: 'jet.ringEnergy',
      label: 'Energy',
      figure: ends(energies, '', 2).text,
      unit: '',
      notes: [`of the ring, dimensionless; published for pinched rings: about ${PUBLISHED_RING_ENERGY}`],
    })
  if (own.status === 'done' && own.totalCirculation !== null)
    rows.push({
      id: 'jet.beyondSlug',
      label: 'Excess impulse',
      figure: ends([own.impulseBeyondSlug], units.impulse).text,
      unit: units.impulse,
      notes: [
        `beyond the slug; circulation beyond it ${formatQuantity(own.circulationBeyondSlug, units.circulation, 3)}`,
      ],
    })
  return rows
}

/** Smaller rows: how the run went. */
export function jetFurtherRows({ jet }: FinishedJet, units: Units): readonly JetRow[] {
  const { own } = jet
  const stopping = own.shown.stoppingCirculation
  const rows: JetRow[] = [
    {
      id: 'jet.stoppingVortex',
      label: 'Stopping vortex',
      figure: ends([stopping], units.circulation).text,
      unit: units.circulation,
      notes: [],
    },
  ]
  if (own.drift !== null)
    rows.push({
      id: 'jet.drift',
      label: 'Drift',
      figure: `${formatNumber(own.drift.impulse, 2)} and ${formatNumber(own.drift.energy, 2)}`,
      unit: '',
      notes: ['of impulse and energy, where both are conserved'],
    })
  return rows
}

/** Which stroke each column of the members is read from, where they differ; null where all are of one. */
export function jetDeltaNote({ jet: { own, formation } }: FinishedJet): string | null {
  if (formation === null || formation.shown.strokeRatio === own.shown.strokeRatio) return null
  const [longer, planned] = [formation.shown.strokeRatio.toFixed(0), own.shown.strokeRatio.toFixed(2)]
  return `Formation number: from a stroke of ${longer} D. Γ, energy and speed of the ring: from the plan's own, ${planned} D.`
}

/** The members of the ensemble beside one another. */
export function jetDeltaRows({ jet }: FinishedJet, units: Units): readonly JetDeltaRow[] {
  const { own, formation } = jet
  return own.byDelta.map((one, index) => {
    const same = formation?.byDelta.find(({ delta }) => delta === one.delta) ?? formation?.byDelta[index]
    const text = (value: number | null, unit: string, digits = 3): string =>
      value === null ? NONE : formatRange(value, value, unit, digits).text
    return {
      delta: formatNumber(one.delta, 3),
      formationNumber: same?.formationNumber?.toFixed(1) ?? NONE,
      circulation: text(one.ringCirculation, units.circulation),
      energy: text(one.ringDimensionlessEnergy, '', 2),
      speed: text(one.ringSpeed, units.ringSpeed),
    }
  })
}

/** The numbers of the shape shown. */
export function jetFigures(
  finished: FinishedJet,
  model: JetSceneModel,
  index: number,
  units: Units,
): readonly JetFigure[] {
  const shape = model.shapes[index]
  const reading = shape === undefined ? null : jetReading(finished.jet.own.shown, shape.time)
  if (reading === null) return []
  const text = (value: number | null, unit: string): string => (value === null ? NONE : formatQuantity(value, unit, 3))
  return [
    { label: 'State', text: shape === undefined ? NONE : phaseInWords(jetPhase(model.timeline, shape)) },
    { label: 'Formation time', text: formationTimeText(model, index, reading.formationTime, 'on to') },
    { label: 'Time', text: text(reading.time, units.time) },
    { label: 'Circulation', text: text(reading.totalCirculation, units.circulation) },
    { label: 'In the ring', text: text(reading.ringCirculation, units.circulation) },
    { label: 'Ring at', text: text(reading.ringX, units.length) },
    { label: 'Ring radius', text: text(reading.ringRadius, units.length) },
  ]
}

/** Where the playback stands, for the sliders: `formation time 4.10, 2.05 s: ...`. */
export function placeInWords(model: JetSceneModel, index: number, timeUnit: string): string {
  const shape = model.shapes[index]
  if (shape === undefined) return 'nothing computed'
  const words = phaseInWords(jetPhase(model.timeline, shape))
  return `formation time ${formationTimeText(model, index, shape.formationTime)}, ${formatQuantity(shape.time, timeUnit, 3)}: ${words}`
}

/** Formation time, which stands still after the stroke, and the place on the ruler where it has run on: `5.00, run on to 7.7`. */
function formationTimeText(
  { timeline }: JetSceneModel,
  index: number,
  formationTime: number,
  how = 'run on to',
): string {
  const place = timeline.places[index] ?? formationTime
  const text = formationTime.toFixed(2)
  return place > formationTime + 0.05 ? `${text}, ${how} ${place.toFixed(1)}` : text
}

/** Longest text of a moment's button: `pinch-off 9.4`. */
export function momentText(label: string, place: number, strokeRatio: number): string {
  return place > strokeRatio * (1 + 1e-9) ? label : `${label}, ${place.toFixed(1)}`
}

/** Where along the slider a place stands, as a share of its way. */
export function shareOf(places: ArrayLike<number>, place: number): number {
  if (places.length < 2) return 0
  const [from, to] = [at(places, 0), at(places, places.length - 1)]
  return to > from ? Math.min(1, Math.max(0, (place - from) / (to - from))) : 0
}
