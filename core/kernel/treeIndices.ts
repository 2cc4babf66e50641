/** Bytes of index tables of Cartesian Taylor expansions to an order, in the form assembly/segmentTree.ts reads. */
export interface TreeIndices {
  readonly order: number
  readonly terms: number
  /** A word for each degree and one more: how many terms lie below it. */
  readonly below: Uint8Array
  /** A word a term: 16 times its place in the cube (order + 1)^3. */
  readonly places: Uint8Array
  /** A word a place of the cube: the term there, 0 where there is none. */
  readonly termAt: Uint8Array
  /** Two words a term and a double: the term one degree down, 8 times the axis, and 1 / exponent of that axis. */
  readonly chain: Uint8Array
  /** Six doubles a term, six words, and two unused: see `derivatives` in assembly/segmentTree.ts. */
  readonly recurrence: Uint8Array
}

const CHAIN_BYTES = 16
const RECURRENCE_BYTES = 80

/** The tables for one order, 2 or above. */
export function treeIndices(order: number): TreeIndices {
  const side = order + 1
  const exponents: (readonly [number, number, number])[] = []
  const below = [0]
  for (let degree = 0; degree <= order; degree++) {
    for (let x = degree; x >= 0; x--) for (let y = degree - x; y >= 0; y--) exponents.push([x, y, degree - x - y])
    below.push(exponents.length)
  }
  const place = (n: readonly number[]): number => ((n[0] ?? 0) * side + (n[1] ?? 0)) * side + (n[2] ?? 0)
  const termAt = new Int32Array(side ** 3)
  exponents.forEach((n, term) => (termAt[place(n)] = term))
  const chain = new DataView(new ArrayBuffer(CHAIN_BYTES * exponents.length))
  const recurrence = new DataView(new ArrayBuffer(RECURRENCE_BYTES * exponents.length))
  exponents.forEach((n, term) => {
    const degree = n[0] + n[1] + n[2]
    const axis = n.findIndex((exponent) => exponent > 0)
    if (axis < 0) return
    const lowered = (by: number, a: number): number[] => n.map((exponent, i) => (i === a ? exponent - by : exponent))
    chain.setInt32(CHAIN_BYTES * term, termAt[place(lowered(1, axis))] ?? 0, true)
    chain.setInt32(CHAIN_BYTES * term + 4, 8 * axis, true)
    chain.setFloat64(CHAIN_BYTES * term + 8, 1 / (n[axis] ?? NaN), true)
    n.forEach((exponent, a) => {
      // N R^2 D_k = -(2 N - 1) sum S_i k_i D_{k - e_i} - (N - 1) sum k_i (k_i - 1) D_{k - 2 e_i}, N = |k|: the recurrence of
      // the Legendre polynomials, whose generating function phi is.
      const row = RECURRENCE_BYTES * term
      if (exponent >= 1) {
        recurrence.setFloat64(row + 8 * a, (-(2 * degree - 1) * exponent) / degree, true)
        recurrence.setInt32(row + 48 + 4 * a, 16 * place(lowered(1, a)), true)
      }
      if (exponent >= 2) {
        recurrence.setFloat64(row + 24 + 8 * a, (-(degree - 1) * exponent * (exponent - 1)) / degree, true)
        recurrence.setInt32(row + 60 + 4 * a, 16 * place(lowered(2, a)), true)
      }
    })
  })
  return {
    order,
    terms: exponents.length,
    below: words(below),
    places: words(exponents.map((n) => 16 * place(n))),
    termAt: words(termAt),
    chain: new Uint8Array(chain.buffer),
    recurrence: new Uint8Array(recurrence.buffer),
  }
}

function words(values: ArrayLike<number>): Uint8Array {
  return new Uint8Array(Int32Array.from(values).buffer)
}
