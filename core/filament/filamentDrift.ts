/**
 * How far the sums that filaments conserve have strayed.
 */
import { at } from '../base'
import type { FilamentFlow } from './filamentFlow'

/** Energy costs a double sum: it is looked at this many times in a run. */
const ENERGY_LOOKS = 12

interface Reference {
  readonly impulse: readonly number[]
  readonly scale: number
  readonly energy: number
}

/** Largest departure from the sums at the start, or since the last appearance of a ring. */
export class FilamentDrift {
  private reference: Reference | null = null
  private nextEnergyLook = 0
  private impulse = 0
  private energy = 0

  /** @param duration of the whole run [s] */
  constructor(private readonly duration: number) {}

  /** Circulation is carried by each ring and does not drift. */
  get found(): { readonly circulation: number; readonly impulse: number; readonly energy: number } {
    return { circulation: 0, impulse: this.impulse, energy: this.energy }
  }

  /** The next look sets the sums anew: a ring has appeared. */
  restart(): void {
    this.reference = null
  }

  look(flow: FilamentFlow, state: Float64Array, time: number): void {
    const { sum, scale } = flow.impulse(state)
    if (this.reference === null) {
      this.reference = { impulse: sum, scale, energy: flow.energy(state) }
      this.nextEnergyLook = time + this.duration / ENERGY_LOOKS
      return
    }
    const { impulse, energy } = this.reference
    const strayed = Math.hypot(...sum.map((value, axis) => value - at(impulse, axis)))
    this.impulse = Math.max(this.impulse, strayed / this.reference.scale)
    if (time < this.nextEnergyLook && time < this.duration) return
    this.nextEnergyLook = time + this.duration / ENERGY_LOOKS
    this.energy = Math.max(this.energy, Math.abs(flow.energy(state) / energy - 1))
  }
}
