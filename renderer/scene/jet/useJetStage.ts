/**
 * The drawing of a starting jet in its component: follows the playback and the way the sheet is looked at.
 */
import { watch, type Ref, type ShallowRef } from 'vue'
import type { DrawingColours, JetSceneModel } from '../../../core/report'
import { useStage, type StageLife } from '../useStage'
import { shifted, STANDARD_VIEWS, type Angles, type Margins, type Size, type View } from '../view'
import { fittedJet } from './jetFit'
import { createJetStage, type JetDrawing } from './jetStage'

export interface JetStageOptions {
  readonly canvas: Readonly<Ref<HTMLCanvasElement | null>>
  readonly frame: Readonly<Ref<HTMLElement | null>>
  readonly colours: Readonly<ShallowRef<DrawingColours>>
  readonly props: { readonly model: JetSceneModel; readonly index: number; readonly flat: boolean }
}

export interface JetStageLife extends StageLife<JetDrawing> {
  readonly limits: () => readonly [number, number]
}

/** Pixels that a section moves for what turns a drawing in space by a radian. */
const PIXELS_PER_RADIAN = 125

export function useJetStage({ canvas, frame, colours, props }: JetStageOptions): JetStageLife {
  /** Angles in space, kept while the section is shown. */
  let angles: Angles = STANDARD_VIEWS.threeQuarter
  const life = useStage<JetDrawing>({
    canvas,
    frame,
    colours,
    margins,
    create: createJetStage,
    begin(stage) {
      stage.setModel(props.model)
      stage.setFlat(props.flat)
      stage.setFrame(props.index)
    },
    fitted: (wanted: Angles, size: Size, room: Margins): View =>
      fittedJet(props.model, props.flat ? STANDARD_VIEWS.side : wanted, size, room),
  })

  function margins(): Margins {
    const { width, height } = life.size.value
    const small = width < 460 || height < 260
    if (props.flat)
      return small ? { left: 14, right: 14, top: 52, bottom: 54 } : { left: 20, right: 20, top: 54, bottom: 54 }
    return small ? { left: 20, right: 20, top: 46, bottom: 48 } : { left: 30, right: 30, top: 46, bottom: 50 }
  }

  watch(
    () => props.model,
    (model) => {
      const stage = life.stage()
      stage?.setModel(model)
      stage?.setFrame(props.index)
      if (life.fits()) life.fit()
      else life.request()
    },
  )
  watch(
    () => props.index,
    (index) => {
      life.stage()?.setFrame(index)
      life.moved()
    },
  )
  watch(
    () => props.flat,
    (flat) => {
      if (flat) angles = { azimuth: life.view.value.azimuth, elevation: life.view.value.elevation }
      life.stage()?.setFlat(flat)
      life.fit(flat ? STANDARD_VIEWS.side : angles)
    },
  )

  return {
    ...life,
    // A section is only seen from the side: what would turn it moves it.
    turn(azimuth, elevation) {
      if (!props.flat) life.turn(azimuth, elevation)
      else life.look(shifted(life.view.value, -azimuth * PIXELS_PER_RADIAN, elevation * PIXELS_PER_RADIAN))
    },
    limits() {
      const whole = fittedJet(props.model, life.view.value, life.size.value, margins()).scale
      return [whole / 3, whole * 40]
    },
  }
}
