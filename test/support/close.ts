import { expect } from 'vitest'

/** Relative comparison that prints got, expected and the error; absolute where expected is 0. */
export function expectClose(got: number, expected: number, tolerance: number, what = 'value'): void {
  const error = expected === 0 ? Math.abs(got) : Math.abs(got - expected) / Math.abs(expected)
  const ok = error <= tolerance
  expect(ok, `${what}: got ${got}, expected ${expected}, relative error ${error}, allowed ${tolerance}`).toBe(true)
}

/** Absolute comparison that prints got, expected and the error. */
export function expectNear(got: number, expected: number, tolerance: number, what = 'value'): void {
  const error = Math.abs(got - expected)
  expect(error <= tolerance, `${what}: got ${got}, expected ${expected}, off by ${error}, allowed ${tolerance}`).toBe(
    true,
  )
}
