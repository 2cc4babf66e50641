/**
 * What a picture of a finished wake may ask for besides its rings: dye carried by the flow, and a field on a plane.
 */
import {
  carryDye,
  fieldPlane,
  isOnJetAxis,
  MOST_DYE_OUTPUTS,
  MOST_FIELD_OUTPUTS,
  type FieldPlane,
  type FieldQuantity,
  type FlowSurroundings,
} from '../filament'
import { loadKernel } from '../kernel'
import type { Plan } from '../plan'
import type { WakeRunOptions } from './options'
import type { WakeData } from './wake'

export interface WakePictureRequest {
  /** Points of dye; 0: none. */
  readonly dye: number
  readonly plane: FieldQuantity | null
}

export interface WakePicture {
  readonly status: 'done' | 'cancelled'
  /** x y z of the dye at every output time [m]; null where none was asked for. */
  readonly dye: readonly Float32Array[] | null
  readonly plane: FieldPlane | null
  /** What was asked for and left out, in sentences. */
  readonly notes: readonly string[]
}

/** Compute dye and field of a finished wake of this plan. */
export async function wakePicture(
  plan: Plan,
  data: WakeData,
  request: WakePictureRequest,
  options: WakeRunOptions = {},
): Promise<WakePicture> {
  const surroundings: FlowSurroundings = {
    kernel: options.kernel ?? (await loadKernel()),
    cores: data.rings.map(({ core }) => core),
    wall: plan.wake?.wall ?? null,
    axialFlow: plan.ambient.axialFlow,
  }
  const notes: string[] = []
  const outputs = data.wake.outputTimes.length
  const half = request.dye > 0 && request.plane !== null ? 0.5 : 1
  const within = (from: number): WakeRunOptions => ({
    ...options,
    onProgress: ({ share, what }) => options.onProgress?.({ share: from + half * share, what }),
  })
  if (plan.wake?.tube !== null && plan.wake?.tube !== undefined)
    notes.push('Dye and field leave out the reaction of the tube.')
  if (data.jet !== null)
    notes.push('Dye and field are those of the rings: the sheets that form, and the tube, are left out.')
  let dye: readonly Float32Array[] | null = null
  if (request.dye > 0) {
    dye = await carryDye({ wake: data.wake, surroundings, points: request.dye }, within(0))
    if (dye === null) return { status: 'cancelled', dye, plane: null, notes }
    if (outputs > MOST_DYE_OUTPUTS)
      notes.push(`Dye is carried through the first ${MOST_DYE_OUTPUTS} of ${outputs} output times.`)
  }
  if (request.plane === null) return { status: 'done', dye, plane: null, notes }
  const stream = request.plane === 'stream function'
  if (stream && (!isOnJetAxis(data.wake) || surroundings.wall !== null)) {
    notes.push('A stream function is drawn only for rings on the x axis without a wall; speed is drawn instead.')
  }
  const quantity: FieldQuantity =
    stream && isOnJetAxis(data.wake) && surroundings.wall === null ? 'stream function' : 'speed'
  const plane = await fieldPlane(data.wake, surroundings, quantity, within(1 - half))
  if (plane === null) return { status: 'cancelled', dye, plane, notes }
  if (outputs > MOST_FIELD_OUTPUTS)
    notes.push(`The field is drawn for the first ${MOST_FIELD_OUTPUTS} of ${outputs} output times.`)
  return { status: 'done', dye, plane, notes }
}
