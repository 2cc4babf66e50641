/**
 * The drawing of rings in its component: follows the output time, the picked ring and what is shown.
 */
import { watch, type Ref, type ShallowRef } from 'vue'
import { wakeFrame, type RingShape } from '../../../core/filament'
import type { DrawingColours, WakeSceneModel } from '../../../core/report'
import type { WakeJet } from '../../../core/run'
import { useStage, type StageLife } from '../useStage'
import type { Angles, Margins, Size, View } from '../view'
import { centredOn, fittedRing, fittedWake } from './wakeView'
import { createWakeStage, type WakeDrawing, type WakeShown } from './wakeStage'

export interface WakeStageOptions {
  readonly canvas: Readonly<Ref<HTMLCanvasElement | null>>
  readonly frame: Readonly<Ref<HTMLElement | null>>
  readonly colours: Readonly<ShallowRef<DrawingColours>>
  /** Kept at the rings of the output time shown. */
  readonly shapes: ShallowRef<readonly RingShape[]>
  readonly props: {
    readonly model: WakeSceneModel
    readonly jet?: WakeJet | null | undefined
    readonly index: number
    readonly selected: number | null
    readonly follow: boolean
    readonly shown: WakeShown
  }
}

export interface WakeStage extends StageLife<WakeDrawing> {
  readonly limits: () => readonly [number, number]
  readonly ringsNow: () => readonly RingShape[]
}

/** Moving frames that take longer than this are drawn more cheaply from then on, until the picture rests [ms]. */
const SLOW = 33
/** So many measured frames in a row must be slow: one may be another program's doing. */
const SLOW_RUN = 2

export function useWakeStage({ canvas, frame, colours, shapes, props }: WakeStageOptions): WakeStage {
  let cheap = false
  let slow = 0
  const life = useStage<WakeDrawing>({
    canvas,
    frame,
    colours,
    margins,
    create: createWakeStage,
    begin(stage) {
      stage.setModel(props.model)
      stage.setJet(props.jet ?? null)
      stage.setShown({ ...props.shown })
      stage.setFrame(props.index, shapes.value)
      stage.select(props.selected)
    },
    fitted(angles: Angles, size: Size, room: Margins): View {
      const ring = followed()
      return ring === null ? fittedWake(props.model, angles, size, room) : fittedRing(ring, angles, size, room)
    },
    onCost(cost) {
      slow = cost > SLOW ? slow + 1 : 0
      if (slow < SLOW_RUN || cheap) return
      cheap = true
      life.stage()?.setEffort({ cheap, moving: true })
    },
    onRest() {
      cheap = false
      slow = 0
      life.stage()?.setEffort({ cheap, moving: false })
    },
  })

  function margins(): Margins {
    const { width, height } = life.size.value
    const small = width < 460 || height < 260
    return small ? { left: 30, right: 40, top: 50, bottom: 56 } : { left: 56, right: 64, top: 66, bottom: 84 }
  }

  function ringsNow(): readonly RingShape[] {
    const { wake } = props.model
    const last = wake.outputTimes.length - 1
    return last < 0 ? [] : wakeFrame(wake, Math.min(last, Math.max(0, props.index)))
  }

  function followed(): RingShape | null {
    if (!props.follow) return null
    return shapes.value.find(({ number }) => number === props.selected) ?? shapes.value[0] ?? null
  }

  function centre(): void {
    const ring = followed()
    if (ring !== null) life.view.value = centredOn(life.view.value, ring)
  }

  function moved(): void {
    life.stage()?.setEffort({ cheap, moving: true })
    life.moved()
  }

  shapes.value = ringsNow()
  watch(
    () => props.model,
    (model) => {
      shapes.value = ringsNow()
      const stage = life.stage()
      stage?.setModel(model)
      stage?.setJet(props.jet ?? null)
      stage?.setFrame(props.index, shapes.value)
      if (life.fits()) life.fit()
      else life.moved()
    },
  )
  watch(
    () => props.index,
    () => {
      shapes.value = ringsNow()
      life.stage()?.setFrame(props.index, shapes.value)
      centre()
      moved()
    },
  )
  watch(
    () => props.selected,
    (ring) => {
      life.stage()?.select(ring)
      centre()
      life.request()
    },
  )
  watch(
    // A copy, so that one that is changed in place is noticed too.
    () => ({ ...props.shown }),
    (shown) => {
      life.stage()?.setShown(shown)
      life.request()
    },
  )
  watch(
    () => props.follow,
    () => {
      life.fit()
    },
  )

  return {
    ...life,
    ringsNow,
    limits() {
      const whole = fittedWake(props.model, life.view.value, life.size.value, margins()).scale
      return [whole / 4, whole * 60]
    },
  }
}
