/**
 * One step of the shed sheet by Heun's method, the shedding inside its stages.
 */
import type { JetFlow } from './jetFlow'
import type { Sheet } from './sheet'

export interface StepSpan {
  readonly time: number
  readonly length: number
  /** Speed in the tube at the beginning and at the end of the step, each from the inside: a jump lies between steps. */
  readonly speedBefore: number
  readonly speedAfter: number
}

/** Room for what a step keeps, used again by the next. */
export class StepMemory {
  x = new Float64Array(0)
  r = new Float64Array(0)
  axial = new Float64Array(0)
  radial = new Float64Array(0)

  reserve(length: number): void {
    if (this.x.length >= length) return
    this.x = new Float64Array(length)
    this.r = new Float64Array(length)
    this.axial = new Float64Array(length)
    this.radial = new Float64Array(length)
  }
}

/**
 * Advance the sheet by a step.
 *
 * @param held true: a tube is there, a node leaves its lip and the last one is held at it; false: every filament moves
 * @returns false where a speed is not finite; the sheet is then not to be used
 */
export function stepSheet(sheet: Sheet, flow: JetFlow, memory: StepMemory, span: StepSpan, held: boolean): boolean {
  const { time, length, speedBefore, speedAfter } = span
  if (held) sheet.release(time)
  sheet.weigh()
  const moving = held ? sheet.count - 1 : sheet.count
  memory.reserve(sheet.x.length)
  const { x: x0, r: r0, axial, radial } = memory
  const { x, r, shed, lip } = sheet
  const shedBefore = shed[lip] ?? NaN

  const firstRate = flow.evaluate(sheet, time, speedBefore)
  for (let i = 0; i < moving; i++) {
    const u = flow.axial[i] ?? NaN
    const v = flow.radial[i] ?? NaN
    x0[i] = x[i] ?? NaN
    r0[i] = r[i] ?? NaN
    axial[i] = u
    radial[i] = v
    x[i] = (x[i] ?? NaN) + length * u
    r[i] = (r[i] ?? NaN) + length * v
  }
  shed[lip] = shedBefore + length * firstRate
  sheet.weigh()

  const secondRate = flow.evaluate(sheet, time + length, speedAfter)
  let finite = true
  for (let i = 0; i < moving; i++) {
    const nextX = (x0[i] ?? NaN) + (length / 2) * ((axial[i] ?? NaN) + (flow.axial[i] ?? NaN))
    const nextR = (r0[i] ?? NaN) + (length / 2) * ((radial[i] ?? NaN) + (flow.radial[i] ?? NaN))
    if (!(Math.abs(nextX) < 1e6 && nextR > 0 && nextR < 1e6)) finite = false
    x[i] = nextX
    r[i] = nextR
  }
  shed[lip] = shedBefore + (length / 2) * (firstRate + secondRate)
  sheet.weigh()
  return finite
}
