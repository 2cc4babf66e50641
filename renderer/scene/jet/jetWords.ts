/** Words on the picture of a starting jet. They stand above everything that is ever drawn, so that nothing moves into them. */
import type { JetSceneModel } from '../../../core/report'
import type { FrameWord } from '../frameWord'
import { basisOf, project, type Size, type View } from '../view'

const LINE = 17
const GAP = 5

export function jetWords(
  model: JetSceneModel,
  index: number,
  flat: boolean,
  look: { readonly view: View; readonly size: Size; readonly measure: (text: string) => number },
): readonly FrameWord[] {
  const { view, size, measure } = look
  const { xMin, rMax } = model.extent
  const basis = basisOf(view)
  // Seen along the axis, places along it are one.
  if (!flat && Math.abs(basis.toward[0]) > 0.9) return []
  const above = (x: number, r: number) => project([x, r * basis.radial[1], r * basis.radial[2]], basis, view, size)
  const cutX = model.shapes[index]?.cutX ?? null
  const word = (id: string, text: string, left: number, top: number, quiet: boolean): FrameWord => ({
    id,
    text,
    quiet,
    left,
    top,
    width: measure(text) + 4,
    height: LINE,
    leader: null,
    act: null,
  })
  const tube = above(xMin, model.diameter / 2 + model.nozzle.wall)
  const words = [word('tube', `tube, ${model.diameterText}`, tube.x, tube.y - LINE - (flat ? 2 : 12), true)]
  if (cutX === null) return words
  const cut = above(cutX, flat ? rMax : 0.94 * rMax)
  return [
    ...words,
    word(
      'ring',
      flat ? 'ring, beyond the cut' : 'cut behind the ring',
      cut.x + (flat ? 0 : 4),
      cut.y - LINE - GAP,
      false,
    ),
  ]
}
