import { kernelTable, OCTAVES } from './table.mjs'

/** core/kernel/kernelTable.ts as text. */
export function tableSource() {
  const { velocity, stream } = kernelTable()
  return `/**
 * Made by build/generate-kernel.mjs: do not edit. The table of the coaxial kernel, as base64 of little-endian doubles.
 *
 * The functions and the order of the coefficients are described in build/kernel/table.mjs.
 */

/** The table starts at m1 = 2^-TABLE_OCTAVES, has eight intervals an octave and one more above m1 = 1. */
export const TABLE_OCTAVES = ${OCTAVES}

/** e_7 f_7 .. e_0 f_0 for each interval. */
export const VELOCITY_TABLE =
  '${base64(velocity)}'

/** c_7 .. c_0 for each interval. */
export const STREAM_TABLE =
  '${base64(stream)}'
`
}

/** @param {Float64Array} values */
function base64(values) {
  const bytes = new Uint8Array(values.length * 8)
  const view = new DataView(bytes.buffer)
  values.forEach((value, i) => view.setFloat64(i * 8, value, true))
  return Buffer.from(bytes).toString('base64')
}
