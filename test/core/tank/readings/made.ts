/** Made readings: a ring that is known, seen through seeded noise. */
import { randomSource, type RandomSource } from '../../../../core/base'
import type { ReadingRow } from '../../../../core/tank'
import { ringAt, type RingStart, type RingSurroundings } from '../../../../core/tank/readings/pathModel'

/** A thin laminar ring whose core grows three times over on its way. */
export const LAMINAR: RingStart = { circulation: 0.0024, radius: 0.015, coreRadius: 0.0018, time: 0.4, x: 0.02 }
export const LAMINAR_AROUND: RingSurroundings = {
  ageing: 'laminar',
  kinematicViscosity: 1e-6,
  axialFlow: 0,
  wallSlowing: 0,
}

/** A turbulent ring. */
export const TURBULENT: RingStart = { circulation: 0.03, radius: 0.02, coreRadius: 0.006, time: 0.2, x: 0.04 }
export const TURBULENT_AROUND: RingSurroundings = { ...LAMINAR_AROUND, ageing: 'turbulent' }

export const NO_ROW: ReadingRow = {
  run: '1',
  time: 0,
  x: null,
  radius: null,
  circulation: null,
  sigmaX: null,
  sigmaRadius: null,
  sigmaCirculation: null,
}

export interface MadeNoise {
  readonly x: number
  readonly radius?: number
  readonly circulation?: number
}

/** Readings at equal times through normal noise. `told`: the noise stands in the rows. */
export function madeRows(
  ring: RingStart,
  around: RingSurroundings,
  options: {
    readonly from: number
    readonly to: number
    readonly count: number
    readonly noise: MadeNoise
    readonly told?: boolean
    readonly seed?: number
    readonly run?: string
  },
): ReadingRow[] {
  const { from, to, count, noise, told = true, seed = 1, run = '1' } = options
  const random = randomSource(seed)
  return Array.from({ length: count }, (_, k) => {
    const time = from + ((to - from) * k) / (count - 1)
    const state = ringAt(ring, around, time)
    const seen = (value: number, sigma: number | undefined): number | null => noisy(value, sigma, random)
    const uncertainty = (sigma: number | undefined): number | null => (told ? (sigma ?? null) : null)
    return {
      run,
      time,
      x: seen(state.x, noise.x),
      radius: seen(state.radius, noise.radius),
      circulation: seen(state.circulation, noise.circulation),
      sigmaX: uncertainty(noise.x),
      sigmaRadius: uncertainty(noise.radius),
      sigmaCirculation: uncertainty(noise.circulation),
    }
  })
}

function noisy(value: number, sigma: number | undefined, random: RandomSource): number | null {
  return sigma === undefined ? null : value + sigma * random.normal()
}
