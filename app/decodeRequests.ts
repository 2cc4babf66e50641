/**
 * What the page sends, checked field by field before a handler sees it. Nothing here throws, whatever it is given.
 */
import type { Channel, Requests } from './contract'
import { MAXIMUM_FILE_BYTES, MAXIMUM_FILE_TEXT } from './limits'

export type Decoded<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly message: string }
export type Decoders = { readonly [C in Channel]: (input: unknown) => Decoded<Requests[C]['in']> }

const MAXIMUM_NAME = 255
const MAXIMUM_TITLE = 1000

export const DECODERS: Decoders = {
  'plan:open': nothing,
  'plan:given': nothing,
  'table:open': nothing,
  'app:information': nothing,
  'plan:save': (input) =>
    fields(input, {
      token: nullable(text('token', MAXIMUM_NAME)),
      name: text('name', MAXIMUM_NAME),
      text: content('text', MAXIMUM_FILE_BYTES),
    }),
  'export:save': (input) => {
    const decoded = fields<Requests['export:save']['in']>(input, {
      kind: oneOf('kind', ['csv', 'svg', 'png', 'vtp', 'gltf', 'html', 'txt', 'lists']),
      name: text('name', MAXIMUM_NAME),
      text: nullable(content('text', MAXIMUM_FILE_BYTES)),
      base64: nullable(base64('base64')),
    })
    if (!decoded.ok) return decoded
    const { kind, text: asText, base64: asBase64 } = decoded.value
    const wanted = kind === 'png' ? asBase64 !== null && asText === null : asText !== null && asBase64 === null
    return wanted
      ? decoded
      : refuse(`a ${kind} export must carry ${kind === 'png' ? 'base64' : 'text'} and nothing else`)
  },
  'window:document': (input) =>
    fields(input, {
      title: text('title', MAXIMUM_TITLE),
      edited: flag('edited'),
      undo: nullable(text('undo', MAXIMUM_TITLE)),
      redo: nullable(text('redo', MAXIMUM_TITLE)),
    }),
  'window:theme': (input) => fields(input, { theme: oneOf('theme', ['system', 'light', 'dark']) }),
}

/** The path of a dropped file as the preload resolved it: of a kind that may hold a plan or a table. */
export function decodeDroppedPath(input: unknown): Decoded<string> {
  const decoded = text('path', 4096)(input)
  if (!decoded.ok) return decoded
  if (decoded.value === '') return refuse('Drop a file from a folder: this one has no path on the disk.')
  if (decoded.value.includes('\0') || !/\.(json|csv|tsv|txt)$/i.test(decoded.value))
    return refuse('Drop a plan (a name ending in .ringwright.json) or a table (.csv, .tsv or .txt).')
  return decoded
}

type Decode<T> = (input: unknown) => Decoded<T>

function refuse(message: string): { readonly ok: false; readonly message: string } {
  return { ok: false, message }
}

function nothing(input: unknown): Decoded<null> {
  return input === null || input === undefined ? { ok: true, value: null } : refuse('this request takes no input')
}

/** An object with exactly these fields. */
function fields<T extends object>(input: unknown, decoders: { readonly [K in keyof T]: Decode<T[K]> }): Decoded<T> {
  if (typeof input !== 'object' || input === null || Array.isArray(input)) return refuse('the input must be an object')
  const extra = Object.keys(input).find((key) => !Object.hasOwn(decoders, key))
  if (extra !== undefined) return refuse(`the input has a field that is not known: ${extra.slice(0, 40)}`)
  const value: Record<string, unknown> = {}
  for (const [key, decode] of Object.entries<Decode<unknown>>(decoders)) {
    if (!Object.hasOwn(input, key)) return refuse(`${key} is missing`)
    const decoded = decode((input as Record<string, unknown>)[key])
    if (!decoded.ok) return decoded
    value[key] = decoded.value
  }
  return { ok: true, value: value as T }
}

function text(name: string, maximum: number): Decode<string> {
  return (input) => {
    if (typeof input !== 'string') return refuse(`${name} must be a text`)
    if (input.length > maximum) return refuse(`${name} must have at most ${maximum} characters, it has ${input.length}`)
    return { ok: true, value: input }
  }
}

function content(name: string, maximumBytes: number): Decode<string> {
  return (input) => {
    if (typeof input !== 'string') return refuse(`${name} must be a text`)
    // A UTF-16 unit takes 1 to 3 bytes of UTF-8: count the bytes only where the length does not settle it.
    const long =
      input.length > maximumBytes || (input.length * 3 > maximumBytes && Buffer.byteLength(input) > maximumBytes)
    return long ? refuse(`${name} must be at most ${MAXIMUM_FILE_TEXT}`) : { ok: true, value: input }
  }
}

function base64(name: string): Decode<string> {
  return (input) => {
    if (typeof input !== 'string') return refuse(`${name} must be a text`)
    if (input.length > Math.ceil(MAXIMUM_FILE_BYTES / 3) * 4)
      return refuse(`${name} must be at most ${MAXIMUM_FILE_TEXT}`)
    const wellFormed = input.length % 4 === 0 && /^[A-Za-z0-9+/]*={0,2}$/.test(input)
    return wellFormed ? { ok: true, value: input } : refuse(`${name} must be base64`)
  }
}

function flag(name: string): Decode<boolean> {
  return (input) => (typeof input === 'boolean' ? { ok: true, value: input } : refuse(`${name} must be true or false`))
}

function oneOf<const T extends string>(name: string, choices: readonly T[]): Decode<T> {
  return (input) => {
    const found = choices.find((choice) => choice === input)
    return found === undefined ? refuse(`${name} must be one of ${choices.join(', ')}`) : { ok: true, value: found }
  }
}

function nullable<T>(decode: Decode<T>): Decode<T | null> {
  return (input) => (input === null ? { ok: true, value: null } : decode(input))
}
