import { base64Doubles } from './base64'
import { STREAM_TABLE, TABLE_OCTAVES, VELOCITY_TABLE } from './kernelTable'

/** The decoded tables of the coaxial kernel. */
export interface KernelTables {
  /** 16 doubles an interval: e_7 f_7 .. e_0 f_0. */
  readonly velocity: Float64Array<ArrayBuffer>
  /** 8 doubles an interval: c_7 .. c_0. */
  readonly stream: Float64Array<ArrayBuffer>
}

/** Smallest m1 the tables cover; below it e, f and C follow their logarithm. */
export const SMALLEST_M1 = 2 ** -TABLE_OCTAVES

/** The top 15 bits of SMALLEST_M1, sign, exponent and three of the mantissa: the number of the first interval. */
export const FIRST_INTERVAL = (1023 - TABLE_OCTAVES) * 8

/** Largest m1 looked up: the last interval ends at 1.125, and rounding takes m1 past 1 by a few units at most. */
export const LARGEST_M1 = 1.0625

let decoded: KernelTables | undefined

/** The tables, decoded on first use. */
export function kernelTables(): KernelTables {
  decoded ??= { velocity: base64Doubles(VELOCITY_TABLE, 16), stream: base64Doubles(STREAM_TABLE, 8) }
  return decoded
}
