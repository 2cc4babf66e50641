const FOUR_PI = 4 * Math.PI

/** Doubles in a segment record. */
export const SEGMENT_RECORD = 8

/** A closed curve of straight segments: node k to node k + 1, and the last back to the first. */
export interface ClosedCurve {
  readonly nodeCount: number
  /** x y z of each node, m. */
  readonly nodes: Float64Array
  /** Gamma, m2/s, by the right hand along the curve. */
  readonly circulation: number
  /** delta^2, m2. */
  readonly deltaSquared: number
}

/**
 * Writes the records of a closed curve for `Kernel.segmentVelocity`.
 *
 * A record is eight doubles: midpoint x y z, Gamma dl / (4 pi) x y z, delta^2, 0. The midpoint rule is of second order in
 * the length of a segment, and needs delta of at least about that length near the curve.
 *
 * @param first number of the first record to write.
 * @returns number of the record after the last one written.
 */
export function writeSegmentRecords(curve: ClosedCurve, records: Float64Array, first = 0): number {
  const { nodeCount, nodes, deltaSquared } = curve
  const strength = curve.circulation / FOUR_PI
  for (let k = 0; k < nodeCount; k++) {
    const next = k + 1 === nodeCount ? 0 : k + 1
    const at = SEGMENT_RECORD * (first + k)
    for (let axis = 0; axis < 3; axis++) {
      const a = nodes[3 * k + axis] ?? NaN
      const b = nodes[3 * next + axis] ?? NaN
      records[at + axis] = 0.5 * (a + b)
      records[at + 3 + axis] = strength * (b - a)
    }
    records[at + 6] = deltaSquared
    records[at + 7] = 0
  }
  return first + nodeCount
}
