/**
 * Moments of an exit speed over time: what every slug integral is made of.
 */

/** int U dt [m], int U^2 dt [m2/s] and int U^3 dt [m3/s2]. */
export interface Moments {
  readonly displacement: number
  readonly square: number
  readonly cube: number
}

export const NO_MOMENTS: Moments = { displacement: 0, square: 0, cube: 0 }

/** Moments of the same speeds in a time stretched by a factor. */
export function stretchMoments(moments: Moments, factor: number): Moments {
  return {
    displacement: moments.displacement * factor,
    square: moments.square * factor,
    cube: moments.cube * factor,
  }
}
