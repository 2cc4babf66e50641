/**
 * Flat parts of the picture of a starting jet: the key of ages, and lengths along the axis.
 */
import {
  AGE_STEPS,
  ageColour,
  niceTicks,
  oldestAge,
  tickLabel,
  tickStep,
  type JetSceneModel,
} from '../../../core/report'
import { formatQuantity, fromBase, toBase } from '../../../core/quantity'
import { joined, NO_OVERLAY, type Overlay } from '../overlay'
import type { Size, View } from '../view'
import { scaleBar } from '../wake/wakeOverlay'

export interface JetOverlayLook {
  readonly size: Size
  readonly dark: boolean
  readonly measure: (text: string) => number
}

/** Middle of the key from the top, and its bar. */
const KEY_TOP = 17
const KEY_WIDTH = 120
const KEY_HEIGHT = 9
const LEFT = 14
/** The axis of lengths from the bottom. */
const AXIS_FOOT = 44
const TICK_SPACING = 64

/** What lies over the picture in a view of one shape. */
export function jetOverlay(
  model: JetSceneModel,
  index: number,
  flat: boolean,
  view: View,
  look: JetOverlayLook,
): Overlay {
  const bar = flat ? lengthAxis(model, view, look) : scaleBar(view, model.units.length, { ...look, ...NO_SENSES })
  return joined(ageKey(model, index, look), bar)
}

const NO_SENSES = { accent: '', counter: '' }

function ageKey(model: JetSceneModel, index: number, { dark, measure }: JetOverlayLook): Overlay {
  const shape = model.shapes[index]
  if (shape === undefined) return NO_OVERLAY
  const young = 'just shed'
  const from = LEFT + measure(young) + 8
  const step = KEY_WIDTH / AGE_STEPS
  const text = (words: string, x: number) =>
    ({ text: words, at: { x, y: KEY_TOP }, anchor: 'start', tone: 'muted' }) as const
  return {
    lines: [],
    patches: Array.from({ length: AGE_STEPS }, (_, k) => ({
      left: from + k * step,
      top: KEY_TOP - KEY_HEIGHT / 2,
      width: step + 0.4,
      height: KEY_HEIGHT,
      fill: ageColour(k, dark),
    })),
    texts: [
      text(young, LEFT),
      text(`${formatQuantity(oldestAge(shape), model.units.time, 3)} old`, from + KEY_WIDTH + 8),
    ],
  }
}

/** x in the chosen unit along the foot of the picture; true in every view from the side. */
function lengthAxis(model: JetSceneModel, view: View, { size, measure }: JetOverlayLook): Overlay {
  const unit = model.units.length
  const y = size.height - AXIS_FOOT
  const xAt = (pixel: number): number => (pixel - size.width / 2) / view.scale + view.centre.right
  const pixelOf = (x: number): number => size.width / 2 + (x - view.centre.right) * view.scale
  const title = `x (${unit})`
  const end = size.width - LEFT - measure(title) - 10
  const [from, to] = [fromBase(xAt(LEFT), unit), fromBase(xAt(end), unit)]
  const count = Math.max(2, Math.floor((end - LEFT) / TICK_SPACING))
  const step = tickStep(to - from, count)
  const ticks = niceTicks(from, to, count).map((value) => ({
    x: pixelOf(toBase(value, unit)),
    label: tickLabel(value, step),
  }))
  return {
    patches: [],
    lines: [
      { from: { x: LEFT, y }, to: { x: end, y }, tone: 'ink', width: 1 },
      ...ticks.map(({ x }) => ({ from: { x, y }, to: { x, y: y + 4 }, tone: 'ink', width: 1 }) as const),
    ],
    texts: [
      ...ticks.map(({ x, label }) => ({ text: label, at: { x, y: y + 13 }, anchor: 'middle', tone: 'muted' }) as const),
      { text: title, at: { x: size.width - LEFT, y }, anchor: 'end', tone: 'muted' },
    ],
  }
}
