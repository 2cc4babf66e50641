/**
 * Tick values on the 1-2-5 ladder and the text that stands beside them.
 */

const MINUS = '\u2212'
const SUPERSCRIPTS = ['⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹']

/**
 * Step of 1, 2 or 5 times a power of ten that cuts a length into at most about `count` parts.
 *
 * @param span length to cut, > 0; anything else gives 1.
 */
export function tickStep(span: number, count: number): number {
  if (!(span > 0) || !Number.isFinite(span)) return 1
  const rough = span / Math.max(1, count)
  const power = 10 ** Math.floor(Math.log10(rough))
  const part = rough / power
  // A hair of room: 0.2 / 0.1 is 2.0000000000000004 in binary and must still choose 2.
  const multiple = part <= 1 + 1e-9 ? 1 : part <= 2 + 1e-9 ? 2 : part <= 5 + 1e-9 ? 5 : 10
  return multiple * power
}

/**
 * Ticks inside [min, max] at a 1-2-5 step, at most about `count` + 1 of them, each a multiple of the step and free of binary noise.
 *
 * Ends in the wrong order are put right; ends that coincide give that one value; ends that are not finite give none.
 */
export function niceTicks(min: number, max: number, count: number): number[] {
  if (!Number.isFinite(min) || !Number.isFinite(max)) return []
  const low = Math.min(min, max)
  const high = Math.max(min, max)
  if (low === high) return [low]
  const step = tickStep(high - low, count)
  const slack = step * 1e-9
  const first = Math.ceil((low - slack) / step)
  const final = Math.floor((high + slack) / step)
  const digits = Math.min(100, Math.max(0, -Math.floor(Math.log10(step))))
  const ticks: number[] = []
  for (let index = first; index <= final; index += 1) {
    const exact = index * step
    const value = exact === 0 ? 0 : digits > 0 ? Number(exact.toFixed(digits)) : exact
    // Far from zero the quotient rounds, and the first or last multiple can lie a unit of the last place outside.
    if (value >= low - slack && value <= high + slack) ticks.push(value)
  }
  return ticks
}

/** Text of a tick: as many decimals as the step needs, powers of ten beyond 1e5 and below 1e-4, a true minus sign. */
export function tickLabel(value: number, step: number): string {
  if (!Number.isFinite(value)) return ''
  const magnitude = Math.abs(value)
  if (value !== 0 && (magnitude >= 1e5 || step < 1e-4)) return powerLabel(value)
  const decimals = Math.min(100, Math.max(0, -Math.floor(Math.log10(step) + 1e-9)))
  return signed(value, magnitude.toFixed(decimals))
}

function signed(value: number, text: string): string {
  return value < 0 ? MINUS + text : text
}

function powerLabel(value: number): string {
  const [mantissa = '0', exponent = '0'] = Number(Math.abs(value).toPrecision(4)).toExponential().split('e')
  const power = Number(exponent)
  const digits = [...String(Math.abs(power))].map((digit) => SUPERSCRIPTS[Number(digit)] ?? '').join('')
  const times = mantissa === '1' ? '' : `${mantissa}×`
  return signed(value, `${times}10${power < 0 ? '⁻' : ''}${digits}`)
}
