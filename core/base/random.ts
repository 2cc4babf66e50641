/**
 * Random numbers that repeat for a seed, on any engine.
 *
 * Source: D. Blackman & S. Vigna, "Scrambled linear pseudorandom number generators", ACM Trans. Math. Softw. 47 (2021):
 * xoshiro128**; its state is filled by the 32-bit split-mix of G. L. Steele et al. 2014. Recalled, not re-read.
 */
import { requireRange } from './errors'

/** A stream of random numbers; every draw moves it on. */
export interface RandomSource {
  /** Whole number in 0..2^32 - 1. */
  readonly word: () => number
  /** Evenly in 0 <= x < 1, 53 bits. */
  readonly uniform: () => number
  /** Normal with mean 0 and standard deviation 1. */
  readonly normal: () => number
}

/**
 * A stream for a seed: the same seed gives the same numbers.
 *
 * @param seed whole number in 0..2^53 - 1
 * @throws {DomainError} on `seed`
 */
export function randomSource(seed: number): RandomSource {
  requireRange('seed', seed, { min: 0, max: Number.MAX_SAFE_INTEGER })
  // Both halves of the seed take part.
  const low = seed >>> 0
  const high = Math.floor(seed / 2 ** 32) >>> 0
  let mix = (low ^ Math.imul(high, 0x9e3779b1)) >>> 0
  const next = () => {
    mix = (mix + 0x9e3779b9) >>> 0
    let z = mix
    z = Math.imul(z ^ (z >>> 16), 0x21f0aaad)
    z = Math.imul(z ^ (z >>> 15), 0x735a2d97)
    return (z ^ (z >>> 15)) >>> 0
  }
  return sourceOfState(next(), next(), next(), next())
}

/** A stream from a state of four 32-bit words, not all 0. */
export function sourceOfState(first: number, second: number, third: number, fourth: number): RandomSource {
  let a = first >>> 0
  let b = second >>> 0
  let c = third >>> 0
  let d = fourth >>> 0
  const word = () => {
    const scrambled = Math.imul(turned(Math.imul(b, 5), 7), 9) >>> 0
    const shifted = b << 9
    c ^= a
    d ^= b
    b ^= c
    a ^= d
    c ^= shifted
    d = turned(d, 11)
    return scrambled
  }
  const uniform = () => ((word() >>> 5) * 2 ** 26 + (word() >>> 6)) / 2 ** 53
  let kept: number | null = null
  /** Polar method of Marsaglia: two at a time. */
  const normal = () => {
    if (kept !== null) {
      const value = kept
      kept = null
      return value
    }
    for (;;) {
      const x = 2 * uniform() - 1
      const y = 2 * uniform() - 1
      const square = x * x + y * y
      if (square >= 1 || square === 0) continue
      const factor = Math.sqrt((-2 * Math.log(square)) / square)
      kept = y * factor
      return x * factor
    }
  }
  return { word, uniform, normal }
}

function turned(x: number, bits: number): number {
  return (x << bits) | (x >>> (32 - bits))
}
