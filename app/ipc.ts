/**
 * Names of the wires between preload and main, and the list of channels the page may ask for.
 */
import type { Channel } from './contract'

/** Every request of the page travels on this wire: `(channel, input)`. */
export const REQUEST_WIRE = 'ringwright:request'
/** A dropped file, its path resolved in the preload; the page cannot name this wire. */
export const DROPPED_WIRE = 'ringwright:dropped'
/** Menu commands, from main to the page. */
export const COMMAND_WIRE = 'ringwright:command'

/** From main to the page: a file that the system gave waits to be asked for. */
export const GIVEN_WIRE = 'ringwright:given'

const CHANNELS: Readonly<Record<Channel, true>> = {
  'plan:open': true,
  'plan:given': true,
  'plan:save': true,
  'table:open': true,
  'export:save': true,
  'window:document': true,
  'window:theme': true,
  'app:information': true,
}

/** True when the text is one of the contract's channels. */
export function isChannel(text: unknown): text is Channel {
  return typeof text === 'string' && Object.hasOwn(CHANNELS, text)
}
