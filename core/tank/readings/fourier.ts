/** Discrete Fourier transform of a power of two of values, in place (Cooley & Tukey 1965). */
import { at } from '../../base'

/** @param real @param imaginary of one length, a power of two */
export function fourier(real: Float64Array, imaginary: Float64Array): void {
  const count = real.length
  for (let i = 1, j = 0; i < count; i++) {
    let bit = count >> 1
    for (; (j & bit) !== 0; bit >>= 1) j ^= bit
    j ^= bit
    if (i >= j) continue
    const [re, im] = [at(real, i), at(imaginary, i)]
    real[i] = at(real, j)
    imaginary[i] = at(imaginary, j)
    real[j] = re
    imaginary[j] = im
  }
  for (let half = 1; half < count; half *= 2) {
    const angle = -Math.PI / half
    for (let k = 0; k < half; k++) {
      const [cos, sin] = [Math.cos(angle * k), Math.sin(angle * k)]
      for (let i = k; i < count; i += 2 * half) {
        const j = i + half
        const re = at(real, j) * cos - at(imaginary, j) * sin
        const im = at(real, j) * sin + at(imaginary, j) * cos
        real[j] = at(real, i) - re
        imaginary[j] = at(imaginary, i) - im
        real[i] = at(real, i) + re
        imaginary[i] = at(imaginary, i) + im
      }
    }
  }
}
