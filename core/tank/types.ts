/**
 * A day at the tank: what goes in. SI; x along the jet from the exit plane, y across, z up.
 */
import type { RunOptions } from '../base'
import type { Kernel } from '../kernel'

export interface TankInput {
  /** Along the jet axis, from the exit plane to the far wall [m]; null: not told. */
  readonly length: number | null
  /** Across the axis, the nozzle in the middle [m]. */
  readonly width: number | null
  /** Of the water [m]. */
  readonly depth: number | null
  /** Bore of a round tank about the axis [m] instead of width and depth; null: rectangular. */
  readonly bore: number | null
}

export interface CameraInput {
  /** Columns and rows. */
  readonly pixels: readonly [number, number]
  /** Pixel to pixel on the sensor [m]. */
  readonly pixelPitch: number | null
  /** Pixels a metre in the light sheet [1/m]; null: the field is made to hold the stations. */
  readonly scale: number | null
  /** Side of an interrogation window [pixels]. */
  readonly window: number
  /** [1/s] */
  readonly maxFrameRate: number | null
  /** f-number. */
  readonly aperture: number | null
  /** True: the camera looks through a flat window, and apparent places are corrected. */
  readonly refraction: boolean
  /** Bytes of a pixel in store. */
  readonly bytesPerPixel: number
  /** Wavelength of the light [m]. */
  readonly wavelength: number
  /** Light-sheet thickness [m]; null: what the out-of-plane motion asks for. */
  readonly sheetThickness: number | null
  /** From the lens to the window and from the window to the sheet [m]; null: not told. */
  readonly standOff: number | null
  readonly waterPath: number | null
  /** Of the window's glass [m]; absent or null: left out of the ray. */
  readonly windowThickness?: number | null
  /** Frame pairs a run; null: from before the first station to after the last. */
  readonly pairs: number | null
}

/** Delay of one device after the piston's start [s]; negative: before it. */
export interface TriggerInput {
  readonly camera: number
  readonly laser: number
}

/** What the day wants of the ring. */
export type TankTarget =
  | { readonly kind: 'circulation'; readonly value: number }
  | { readonly kind: 'reynolds'; readonly value: number }
  | { readonly kind: 'speed'; readonly value: number; readonly station: number }

/** One field of the plan and its levels. */
export interface MatrixField {
  readonly path: string
  readonly values: readonly number[]
}

export interface MatrixInput {
  readonly fields: readonly MatrixField[]
  /** Every combination, or one row a sample with each level used alike. */
  readonly kind: 'grid' | 'latin'
  /** Rows of a latin hypercube; null: as many as the longest list of levels. */
  readonly samples: number | null
  readonly repeats: number
  readonly seed: number
  /** Fields whose change costs a new set-up: their levels form blocks. */
  readonly blocks: readonly string[]
  readonly minutesPerRun: number
  readonly minutesPerSetUp: number
}

/** Piston and drive of the tank run; null: no limit is known. */
export interface DriveInput {
  /** [m] */
  readonly maxTravel: number | null
  /** [m/s] */
  readonly maxSpeed: number | null
  /** [m/s2] */
  readonly maxAcceleration: number | null
  /** [m/s3]; null: what the smallest rounding needs. */
  readonly maxJerk: number | null
  /** Share of the piston's displacement that leaks past it, 0 to 0.5: the piston moves that much further. */
  readonly leak: number
  /** From command to motion [s]: the profile starts that much earlier. */
  readonly lag: number
}

/** Common practice of a laboratory, to be changed by who knows better. */
export interface PracticeInput {
  /** Waiting between runs over the time of a turn of the largest remaining motion; in minutes [min]. */
  readonly settlingMinutes: number
  /** Clearance from any wall over the exit diameter. */
  readonly clearance: number
  /** Longest start that is called impulsive, in formation times. */
  readonly impulsiveStart: number
  /** Particles an interrogation window of each frame. */
  readonly particlesPerWindow: number
}

export interface TankRunSection {
  readonly tank: TankInput
  /** Of the axis below the surface [m]; null: half the depth. */
  readonly nozzleDepth: number | null
  /** x of the stations [m]. */
  readonly stations: readonly number[]
  /** Time between two rows of the piston profile [s]. */
  readonly controllerStep: number
  readonly target: TankTarget | null
  readonly camera: CameraInput
  readonly trigger: TriggerInput
  readonly drive: DriveInput
  readonly practice: PracticeInput
  readonly matrix: MatrixInput | null
}

export interface TankOptions extends RunOptions {
  /** The hot sums of the march; loaded where it is not given. */
  readonly kernel?: Kernel
  /** Lets messages in between steps, so that a cancellation can arrive. */
  readonly pause?: () => Promise<void>
}
