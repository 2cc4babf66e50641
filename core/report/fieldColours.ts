/**
 * Colour maps of fields: one for amounts, one for signed values, and the colour of rings that turn the other way.
 */
import { at } from '../base'

/** Red, green, blue from 0 to 255. */
export type Paint = readonly [number, number, number]

/**
 * Ten equal steps of cividis, made to read alike with and without red-green colour blindness and in grey: Nunez, Anderton & Renslow
 * 2018, PLoS ONE 13(7):e0199239. Values recalled, not re-read.
 */
const CIVIDIS: readonly Paint[] = [
  [0, 32, 77],
  [0, 51, 111],
  [57, 72, 107],
  [87, 92, 109],
  [112, 113, 115],
  [138, 135, 121],
  [166, 157, 117],
  [196, 181, 108],
  [228, 207, 91],
  [255, 234, 70],
]

/** Violet through a pale middle to ochre, equally dark at both ends. */
const SIGNED: readonly Paint[] = [
  [78, 42, 120],
  [129, 101, 165],
  [183, 166, 205],
  [243, 240, 236],
  [222, 186, 125],
  [184, 134, 52],
  [122, 80, 6],
]

export type FieldMap = 'amount' | 'signed'

/** Colour at a share of a map from 0 to 1, held to its ends. */
export function fieldColour(map: FieldMap, share: number): Paint {
  const stops = map === 'amount' ? CIVIDIS : SIGNED
  const place = Math.min(1, Math.max(0, share)) * (stops.length - 1)
  const index = Math.min(stops.length - 2, Math.floor(place))
  const [a, b] = [at(stops, index), at(stops, index + 1)]
  const mix = (channel: 0 | 1 | 2): number => Math.round(a[channel] + (b[channel] - a[channel]) * (place - index))
  return [mix(0), mix(1), mix(2)]
}

/**
 * Colour of rings that turn against the main ones: Okabe and Ito's reddish purple, darkened on light ground so that it keeps its hue under the light of the drawing.
 */
export function counterColour(dark: boolean): string {
  return dark ? '#D98DB7' : '#7A3B66'
}
