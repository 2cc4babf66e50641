/**
 * The ruler as shapes in pixels: everything the SVG needs, from the ruler's model and the width there is.
 */
import { at } from '../../../core/base'
import { layOutLabels, LABEL_GAP, type RulerLabel } from './labels'
import type { RulerEstimate, RulerModel } from './rulerModel'
import { axisTicks, tickText } from './scale'

export const RULER_HEIGHT = 88
const AXIS_Y = 68
const OUTLINE_TOP = 27
const LEFT = 20
const RIGHT = 88
const NARROW_RIGHT = 24
const ROW_HEIGHT = 13
const ROW_TOP = 2
const ROWS = 5
const HANDLE_HALF = 11
const HANDLE_TOP = 20

export interface DrawnTick {
  readonly x: number
  readonly major: boolean
  readonly text: string
}

export interface DrawnEstimate {
  readonly id: string
  readonly x: number
  /** Height of the dot. */
  readonly y: number
  readonly adopted: boolean
  /** Beyond the end of the axis: drawn as an arrow. */
  readonly beyond: boolean
  readonly text: string
  /** Left end of the text and its baseline; null where there was no room. */
  readonly label: { readonly x: number; readonly y: number } | null
  /** Ends of the leader from dot to text. */
  readonly leader: readonly [number, number] | null
  readonly range: readonly [number, number] | null
}

export interface RulerDrawing {
  readonly width: number
  readonly axisY: number
  readonly left: number
  readonly right: number
  readonly ticks: readonly DrawnTick[]
  /** Points of the filled outline. */
  readonly outline: string
  readonly handle: { readonly x: number; readonly top: number; readonly bottom: number }
  readonly band: { readonly x: number; readonly width: number; readonly label: { x: number; y: number } | null } | null
  readonly estimates: readonly DrawnEstimate[]
  readonly absence: { readonly x: number; readonly y: number; readonly text: string } | null
  /** Texts that found no room, to be told beside the ruler. */
  readonly untold: readonly string[]
}

/** Left and right end of the axis in a drawing of some width [px]. */
export function axisSpan(width: number): { readonly left: number; readonly right: number } {
  return { left: LEFT, right: Math.max(LEFT + 60, width - (width < 700 ? NARROW_RIGHT : RIGHT)) }
}

const BAND_TEXT = 'published band'

/**
 * @param end end of the axis in formation time
 * @param measure width of a text [px]
 */
export function drawRuler(
  model: RulerModel,
  end: number,
  width: number,
  measure: (text: string) => number,
): RulerDrawing {
  const { left, right } = axisSpan(width)
  const scale = (right - left) / end
  const place = (value: number): number => left + value * scale
  const held = (value: number): number => Math.min(right, place(value))
  const handleX = held(model.strokeRatio)
  const band = model.band === null ? null : { x: held(at(model.band, 0)), to: held(at(model.band, 1)) }
  const labels: RulerLabel[] = model.estimates.map((estimate) => ({
    id: estimate.id,
    stem: held(estimate.value),
    ...(estimate.low === null || estimate.high === null
      ? {}
      : { reach: [held(estimate.low), held(estimate.high)] as const }),
    anchor: 0,
    width: measure(estimate.text),
    row: null,
  }))
  if (band !== null) labels.push({ id: BAND_TEXT, stem: null, anchor: band.x + 6, width: measure(BAND_TEXT), row: 0 })
  if (model.absence !== null)
    labels.push({ id: 'absence', stem: null, anchor: handleX + 24, width: measure(model.absence), row: null })
  const layout = layOutLabels(labels, {
    width,
    rows: ROWS,
    rowHeight: ROW_HEIGHT,
    top: ROW_TOP,
    obstacles: [{ left: handleX - HANDLE_HALF, right: handleX + HANDLE_HALF, top: HANDLE_TOP, bottom: AXIS_Y + 8 }],
    stops: band === null ? [] : [band.x, band.to],
  })
  const baseline = (row: number): number => ROW_TOP + row * ROW_HEIGHT + ROW_HEIGHT - 3
  const find = (id: string) => layout.placed.find((label) => label.id === id)
  const textAt = (id: string) => {
    const label = find(id)
    return label === undefined ? null : { x: label.x, y: baseline(label.row) }
  }
  const drawEstimate = (estimate: RulerEstimate): DrawnEstimate => {
    const label = find(estimate.id)
    const x = held(estimate.value)
    const textWidth = measure(estimate.text)
    return {
      id: estimate.id,
      x,
      y: label === undefined ? AXIS_Y - 8 : baseline(label.row) - 4,
      adopted: estimate.adopted,
      beyond: estimate.value > end,
      text: estimate.text,
      label: textAt(estimate.id),
      leader:
        label === undefined || !label.leader
          ? null
          : label.before
            ? [label.x + textWidth + 2, held(estimate.low ?? estimate.value) - 4]
            : [held(estimate.high ?? estimate.value) + 4, label.x - LABEL_GAP / 2],
      range: estimate.low === null || estimate.high === null ? null : [held(estimate.low), held(estimate.high)],
    }
  }
  const absence = textAt('absence')
  const texts = new Map(model.estimates.map((estimate) => [estimate.id, estimate.text]))
  return {
    width,
    axisY: AXIS_Y,
    left,
    right,
    ticks: axisTicks(end, right - left).map((tick) => ({
      x: place(tick.value),
      major: tick.major,
      text: tick.major ? tickText(tick.value) : '',
    })),
    outline: outlinePath(model, held),
    handle: { x: handleX, top: HANDLE_TOP, bottom: AXIS_Y + 5 },
    band: band === null ? null : { x: band.x, width: Math.max(1, band.to - band.x), label: textAt(BAND_TEXT) },
    estimates: model.estimates.map(drawEstimate),
    absence: absence === null || model.absence === null ? null : { ...absence, text: model.absence },
    untold: layout.left.flatMap((id) => texts.get(id) ?? (id === BAND_TEXT ? [BAND_TEXT] : [])),
  }
}

function outlinePath(model: RulerModel, place: (value: number) => number): string {
  if (model.outline.length === 0) return ''
  const y = (share: number): number => AXIS_Y - share * (AXIS_Y - OUTLINE_TOP)
  const points = model.outline.map(([t, share]) => `${place(t).toFixed(1)},${y(share).toFixed(1)}`)
  const [first] = at(model.outline, 0)
  const [lastTime] = at(model.outline, model.outline.length - 1)
  return `${place(first).toFixed(1)},${AXIS_Y} ${points.join(' ')} ${place(lastTime).toFixed(1)},${AXIS_Y}`
}
