import { kernelTable, OCTAVES } from './table.mjs'

/** core/kernel/kernelTable.ts as text. */
export function tableSource() {
  const { velocity, stream } = kernelTable()
  return `/**
 * Made by build/generate-kernel.mjs: do not edit. The table of the coaxial kernel, as base64 of doubles laid out in
 * planes: first the lowest byte of every double, coefficient by coefficient, last the highest. Bytes that are alike then stand
 * together, and the page that carries the table compresses to two thirds.
 *
 * The functions and the order of the coefficients are described in build/kernel/table.mjs.
 */

/** The table starts at m1 = 2^-TABLE_OCTAVES, has eight intervals an octave and one more above m1 = 1. */
export const TABLE_OCTAVES = ${OCTAVES}

/** e_7 f_7 .. e_0 f_0 for each interval. */
export const VELOCITY_TABLE =
  '${base64Planes(velocity, 16)}'

/** c_7 .. c_0 for each interval. */
export const STREAM_TABLE =
  '${base64Planes(stream, 8)}'
`
}

/** @param {Float64Array} values @param {number} width coefficients an interval */
function base64Planes(values, width) {
  const bytes = new Uint8Array(values.length * 8)
  const view = new DataView(new ArrayBuffer(8))
  const intervals = values.length / width
  values.forEach((value, i) => {
    const place = (i % width) * intervals + Math.floor(i / width)
    view.setFloat64(0, value, true)
    for (let plane = 0; plane < 8; plane++) bytes[plane * values.length + place] = view.getUint8(plane)
  })
  return Buffer.from(bytes).toString('base64')
}
