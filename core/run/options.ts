/** What a long computation of run may be given. */
import type { RunOptions } from '../base'
import type { Kernel } from '../kernel'

export interface WakeRunOptions extends RunOptions {
  /** The hot sums; loaded where it is not given. */
  readonly kernel?: Kernel
  /** Lets messages in between steps, so that a cancellation can arrive. */
  readonly pause?: () => Promise<void>
}
