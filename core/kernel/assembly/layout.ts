/*
 * The module's memory: the tables first, at fixed places, then what the caller puts there (kernelMemory.ts one folder up).
 * The numbers are those of that file.
 */

/** Rings of a block, and where their intermediate results stand: 64 bytes a ring. */
@inline
export const BLOCK: i32 = 32
@inline
export const WORK: usize = 1024

/** Where the table of e and f begins: 16 doubles an interval. */
@inline
export const VELOCITY_TABLE: usize = 4096

/** Number of intervals in each table. */
@inline
const INTERVALS: usize = 353

/** Where the table of C begins: 8 doubles an interval. */
@inline
export const STREAM_TABLE: usize = VELOCITY_TABLE + INTERVALS * 128

/** Octaves below m1 = 1 in the tables. */
@inline
export const TABLE_OCTAVES: i64 = 44
