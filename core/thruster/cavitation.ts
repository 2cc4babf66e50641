/**
 * Where the water may boil: the core of the ring and the intake opening, against vapour pressure.
 */

/** Pressures are absolute [Pa]. */
export interface Cavitation {
  /** At the depth of the nozzle. */
  readonly ambientPressure: number
  /** In the core of the ring; null where there is no ring. */
  readonly corePressure: number | null
  /** Behind the intake opening at its fastest. */
  readonly intakePressure: number
  /** null where it is not known. */
  readonly vapourPressure: number | null
  /** Smallest of the two over vapour pressure; null where that is not known. */
  readonly margin: number | null
  /** (ambient - vapour) / (rho U^2 / 2) at the peak exit speed and at the peak intake speed; null without a vapour pressure. */
  readonly exitNumber: number | null
  readonly intakeNumber: number | null
}

/**
 * Cavitation figures of a thruster.
 *
 * @param absolutePressure at the depth of the nozzle [Pa]
 * @param corePressureDrop of the ring [Pa], null without one
 * @param intakeSuction [Pa]; the dynamic head is part of it
 * @param speeds peak exit speed and peak intake speed [m/s], > 0
 */
export function cavitation(
  density: number,
  absolutePressure: number,
  vapourPressure: number | null,
  corePressureDrop: number | null,
  intakeSuction: number,
  speeds: { readonly exit: number; readonly intake: number },
): Cavitation {
  const corePressure = corePressureDrop === null ? null : absolutePressure - corePressureDrop
  const intakePressure = absolutePressure - intakeSuction
  const lowest = corePressure === null ? intakePressure : Math.min(corePressure, intakePressure)
  const number = (speed: number) =>
    vapourPressure === null ? null : (absolutePressure - vapourPressure) / (0.5 * density * speed * speed)
  return {
    ambientPressure: absolutePressure,
    corePressure,
    intakePressure,
    vapourPressure,
    margin: vapourPressure === null ? null : lowest - vapourPressure,
    exitNumber: number(speeds.exit),
    intakeNumber: number(speeds.intake),
  }
}
