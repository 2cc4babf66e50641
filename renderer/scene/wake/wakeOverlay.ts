/**
 * Flat parts of the picture: the scale bar, what the two colours of rings mean, and the scale of the field.
 */
import { fieldColour, tickStep, type Box, type WakeSceneModel, type WakeScenePlane } from '../../../core/report'
import { formatNumber, formatQuantity, fromBase, toBase } from '../../../core/quantity'
import { joined, NO_OVERLAY, type Overlay } from '../overlay'
import type { Size, View } from '../view'

/** Longest scale bar, in pixels and as a share of the picture. */
const BAR = 150
const BAR_SHARE = 0.25
const LEFT = 16
/** Middle of the lowest row of keys, from the bottom. */
const FOOT = 36
const ROW = 18
const SCALE_WIDTH = 168
const SCALE_STEPS = 42
const SCALE_HEIGHT = 9

export interface OverlayLook {
  readonly size: Size
  readonly accent: string
  readonly counter: string
  readonly measure: (text: string) => number
}

/** A bar of a round length: true everywhere in the plane of the picture, because the projection is parallel. */
export function scaleBar(view: View, unit: string, { size, measure }: OverlayLook): Overlay {
  const most = Math.min(BAR, size.width * BAR_SHARE)
  const whole = fromBase(most / view.scale, unit)
  const step = tickStep(whole, 1)
  // The ladder rounds up; its next rung down fits.
  const shown =
    step <= whole * (1 + 1e-9)
      ? step
      : ([2, 2.5, 5].map((part) => step / part).find((value) => value <= whole && onLadder(value)) ?? step / 10)
  const length = toBase(shown, unit) * view.scale
  const y = size.height - FOOT
  const line = (x: number, from: number, to: number) =>
    ({ from: { x, y: from }, to: { x, y: to }, tone: 'ink', width: 1.1 }) as const
  return {
    patches: [],
    lines: [
      { from: { x: LEFT, y }, to: { x: LEFT + length, y }, tone: 'ink', width: 1.1 },
      line(LEFT, y - 4, y + 4),
      line(LEFT + length, y - 4, y + 4),
    ],
    texts: [
      {
        text: formatQuantity(toBase(shown, unit), unit, 3),
        at: { x: LEFT + length / 2, y: y - 12 },
        anchor: measure(formatQuantity(toBase(shown, unit), unit, 3)) > length ? 'start' : 'middle',
        tone: 'ink',
      },
    ],
  }
}

function onLadder(value: number): boolean {
  const part = value / 10 ** Math.floor(Math.log10(value) + 1e-9)
  return [1, 2, 5].some((rung) => Math.abs(part - rung) < 1e-6)
}

/** What the colours of rings mean, where both occur. */
export function senseKey(model: WakeSceneModel, { size, accent, counter, measure }: OverlayLook): Overlay {
  const senses = new Set(model.rings.map(({ sense }) => sense))
  if (senses.size < 2) return NO_OVERLAY
  const rows = [
    { text: 'turns as a ring moving toward +x', fill: accent },
    { text: 'turns as a ring moving toward \u2212x', fill: counter },
  ]
  const width = Math.max(...rows.map(({ text }) => measure(text)))
  const left = size.width - 16 - width
  return {
    lines: [],
    patches: rows.map(({ fill }, row) => ({
      left: left - 24,
      top: size.height - FOOT - (1 - row) * ROW - 3,
      width: 16,
      height: 6,
      fill,
    })),
    texts: rows.map(({ text }, row) => ({
      text,
      at: { x: left, y: size.height - FOOT - (1 - row) * ROW },
      anchor: 'start',
      tone: 'muted',
    })),
  }
}

/** The scale of the field: its colours in steps, ends and middle in the shown unit. */
export function fieldScale(plane: WakeScenePlane, raised: number, { size }: OverlayLook): Overlay {
  const left = size.width - 20 - SCALE_WIDTH
  const top = size.height - FOOT - raised - 20
  const map = plane.quantity === 'speed' ? 'amount' : 'signed'
  const step = SCALE_WIDTH / SCALE_STEPS
  const marks = [0, 0.5, 1].map((share) => ({ share, value: plane.low + share * (plane.high - plane.low) }))
  return {
    patches: Array.from({ length: SCALE_STEPS }, (_, i) => ({
      left: left + i * step,
      top,
      width: step,
      height: SCALE_HEIGHT,
      fill: `rgb(${fieldColour(map, (i + 0.5) / SCALE_STEPS).join(', ')})`,
    })),
    lines: marks.map(({ share }) => ({
      from: { x: left + share * SCALE_WIDTH, y: top + SCALE_HEIGHT },
      to: { x: left + share * SCALE_WIDTH, y: top + SCALE_HEIGHT + 4 },
      tone: 'ink',
      width: 1,
    })),
    texts: [
      {
        text: `${plane.quantity} (${plane.unit})`,
        at: { x: left + SCALE_WIDTH / 2, y: top - 10 },
        anchor: 'middle',
        tone: 'ink',
      },
      ...marks.map(({ share, value }) => ({
        text: formatNumber(fromBase(value, plane.unit), 3),
        at: { x: left + share * SCALE_WIDTH, y: top + SCALE_HEIGHT + 12 },
        anchor: 'middle' as const,
        tone: 'muted' as const,
      })),
    ],
  }
}

export function wakeOverlay(
  model: WakeSceneModel,
  view: View,
  plane: boolean,
  look: OverlayLook,
): { readonly overlay: Overlay; readonly taken: readonly Box[] } {
  const small = look.size.width < 460 || look.size.height < 260
  const parts = [scaleBar(view, model.units.length, look)]
  const key = small ? NO_OVERLAY : senseKey(model, look)
  parts.push(key)
  if (plane && model.plane !== null) parts.push(fieldScale(model.plane, key.texts.length > 0 ? 2 * ROW + 6 : 0, look))
  return { overlay: joined(...parts), taken: parts.flatMap((part) => boxOf(part, look.measure)) }
}

/** The room a part covers. */
function boxOf({ lines, patches, texts }: Overlay, measure: (text: string) => number): Box[] {
  const xs: number[] = []
  const ys: number[] = []
  for (const { from, to } of lines) {
    xs.push(from.x, to.x)
    ys.push(from.y, to.y)
  }
  for (const { left, top, width, height } of patches) {
    xs.push(left, left + width)
    ys.push(top, top + height)
  }
  for (const { at, text, anchor } of texts) {
    const width = measure(text)
    const left = anchor === 'start' ? at.x : anchor === 'middle' ? at.x - width / 2 : at.x - width
    xs.push(left, left + width)
    ys.push(at.y - 8, at.y + 8)
  }
  if (xs.length === 0) return []
  const [left, top] = [Math.min(...xs) - 4, Math.min(...ys) - 2]
  return [{ left, top, width: Math.max(...xs) + 4 - left, height: Math.max(...ys) + 2 - top }]
}
