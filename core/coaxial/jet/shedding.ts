/**
 * How fast circulation leaves the lip.
 */

/**
 * Length of wall next to the lip over which the bound strength is averaged, in delta. The one constant of the model that is
 * chosen: the circulation beyond the slug at formation time 4 is 0.47, 0.28 or 0.17 U D for half, one and two delta, and one
 * agrees with the over-pressure circulation U D / pi of P. S. Krueger 2005, J. Fluid Mech. 545:427.
 */
export const LIP_AVERAGE = 1

/**
 * Circulation that leaves the lip a unit of time: the flux of vorticity of the two streams that meet there,
 * (u_in^2 - u_out^2) / 2, neither of which can bring vorticity back.
 *
 * @param strength mean bound strength next to the lip, the jump of speed across the wall
 * @param meanSpeed axial speed at the lip, the mean of both sides
 */
export function sheddingRate(strength: number, meanSpeed: number): number {
  const inside = Math.max(meanSpeed + strength / 2, 0)
  const outside = Math.max(meanSpeed - strength / 2, 0)
  return (inside * inside - outside * outside) / 2
}
