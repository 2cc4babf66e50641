/**
 * The one door for requests of the page: who asks, what for, with what; every outcome comes back as data.
 */
import type { Answer, Channel, OpenedFile, Requests } from './contract'
import { decodeDroppedPath, DECODERS } from './decodeRequests'
import { isChannel } from './ipc'
import { APP_ORIGIN, isTrustedSender, type SenderFrame } from './policy'

export type HandlerTable = { readonly [C in Channel]: (input: Requests[C]['in']) => Promise<Requests[C]['out']> }

/** A failure with a sentence meant for the user; anything else that is thrown is reported without its details. */
export class RequestFailure extends Error {
  readonly code: string

  constructor(code: string, message: string) {
    super(message)
    this.name = 'RequestFailure'
    this.code = code
  }
}

const STRANGER = failure('sender', 'The request did not come from the window’s own page.')

/** Carry out one request. Never throws. */
export async function dispatch(
  table: HandlerTable,
  channel: unknown,
  input: unknown,
  frame: SenderFrame | null,
  origin: string = APP_ORIGIN,
): Promise<Answer<unknown>> {
  if (!isTrustedSender(frame, origin)) return STRANGER
  if (!isChannel(channel)) return failure('channel', 'This request is not one the program knows.')
  return answer(() => call(table, channel, input))
}

/** Open a file dropped on the window: the preload resolved its path, the page learns a token. Never throws. */
export async function dispatchDropped(
  openPath: (filePath: string) => Promise<OpenedFile>,
  input: unknown,
  frame: SenderFrame | null,
  origin: string = APP_ORIGIN,
): Promise<Answer<OpenedFile>> {
  if (!isTrustedSender(frame, origin)) return STRANGER
  const decoded = decodeDroppedPath(input)
  return decoded.ok ? answer(() => openPath(decoded.value)) : failure('input', decoded.message)
}

/** Run `work` and turn what it returns or throws into data. */
async function answer<T>(work: () => Promise<T>): Promise<Answer<T>> {
  try {
    return { ok: true, value: await work() }
  } catch (error) {
    if (error instanceof RequestFailure) return failure(error.code, error.message)
    return failure('internal', 'The request failed for a reason the program did not expect.')
  }
}

function call<C extends Channel>(table: HandlerTable, channel: C, input: unknown): Promise<Requests[C]['out']> {
  const decoded = DECODERS[channel](input)
  if (!decoded.ok) throw new RequestFailure('input', `The request “${channel}” was refused: ${decoded.message}.`)
  return table[channel](decoded.value)
}

function failure(code: string, message: string): { ok: false; error: { code: string; message: string } } {
  return { ok: false, error: { code, message } }
}
