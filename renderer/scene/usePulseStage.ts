/**
 * The drawing of one pulse in its component: follows the plan's size until the user looks closer.
 */
import { watch, type Ref, type ShallowRef } from 'vue'
import type { DrawingColours, PulseSceneModel } from '../../core/report'
import { createStage, type PulseDrawing } from './stage'
import { useStage, type StageLife } from './useStage'
import { fitted, followed, type Margins } from './view'

export function usePulseStage(
  canvas: Readonly<Ref<HTMLCanvasElement | null>>,
  frame: Readonly<Ref<HTMLElement | null>>,
  model: () => PulseSceneModel,
  colours: Readonly<ShallowRef<DrawingColours>>,
  margins: () => Margins,
): StageLife<PulseDrawing> {
  const life = useStage<PulseDrawing>({
    canvas,
    frame,
    colours,
    margins,
    create: createStage,
    begin: (stage) => stage.setModel(model()),
    fitted: (angles, size, room) => fitted(model(), angles, size, room),
  })
  watch(model, (next) => {
    life.stage()?.setModel(next)
    if (life.fits()) life.view.value = followed(life.view.value, next, life.size.value, margins())
    life.moved()
  })
  return life
}
