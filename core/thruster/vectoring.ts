/**
 * Turning moments of a pair of thrusters, and the rings of a pulse train behind one.
 */

/** Mean moments about the vehicle's centre [N m] and mean side force [N]. */
export interface Turning {
  /** One of the pair works alone, the arm across the vehicle: arm x its thrust ahead. */
  readonly oneOff: number
  /** One pushes ahead and the other astern, the arm across the vehicle: twice that. */
  readonly opposed: number
  /** Both turned by the cant to one side, the arm along the vehicle: arm x side force. */
  readonly vectored: number
  /** Of both jets turned to one side. */
  readonly sideForce: number
}

/**
 * Turning moments at rest from the mean jet thrust of one thruster. The intake's pull is taken to act through the centre.
 *
 * @param jetThrust f I of one thruster along its own axis [N]
 * @param arm from the centre to a nozzle [m]: across the vehicle for a pair that differs in thrust, along it for one that swivels
 * @param cant [rad]
 */
export function turningMoments(jetThrust: number, arm: number, cant: number): Turning {
  const ahead = jetThrust * Math.cos(cant)
  const sideForce = 2 * jetThrust * Math.sin(Math.abs(cant))
  return { oneOff: arm * ahead, opposed: 2 * arm * ahead, vectored: arm * sideForce, sideForce }
}

/** Rings nearer than this many radii move each other: "a few", common practice. */
export const CLOSE_RINGS = 4

/** Rings of one nozzle, one after another. */
export interface RingSpacing {
  /** From ring to ring [m]. */
  readonly distance: number
  readonly radius: number
  /** distance / radius. */
  readonly ratio: number
  /** True below `CLOSE_RINGS` radii: the wake of the train should be marched. */
  readonly close: boolean
}

/**
 * Spacing of the rings of a train: each leaves the nozzle at its own speed and that of the stream past it.
 *
 * @param stream speed of the water past the nozzle, + along the jet [m/s]
 * @returns null where the rings do not leave the nozzle
 */
export function ringSpacing(
  ring: { readonly speed: number; readonly radius: number },
  stream: number,
  frequency: number,
): RingSpacing | null {
  const distance = (ring.speed + stream) / frequency
  if (!(distance > 0)) return null
  const ratio = distance / ring.radius
  return { distance, radius: ring.radius, ratio, close: ratio < CLOSE_RINGS }
}
