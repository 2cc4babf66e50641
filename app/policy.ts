/**
 * What the window may load, ask for and go to. Pure decisions: main only applies them.
 */

export const SCHEME = 'app'
/** The one origin the window is served from. */
export const APP_ORIGIN = `${SCHEME}://main`

/** Scripts, styles, images, workers from our own origin only; nothing inline, nothing from the network. */
export const CONTENT_SECURITY_POLICY = [
  "default-src 'none'",
  "script-src 'self' 'wasm-unsafe-eval'",
  "style-src 'self'",
  "img-src 'self' data: blob:",
  "font-src 'self'",
  "connect-src 'self'",
  "worker-src 'self'",
  "base-uri 'none'",
  "form-action 'none'",
  "frame-ancestors 'none'",
].join('; ')

/** The part of a frame that tells who is asking. */
export interface SenderFrame {
  readonly url: string
  /** Null for the top frame; anything else is a frame inside a page. */
  readonly parent: unknown
}

/** True when a request comes from our own page in the top frame. */
export function isTrustedSender(frame: SenderFrame | null, origin: string = APP_ORIGIN): boolean {
  return frame !== null && frame.parent === null && originOf(frame.url) === origin
}

/** The window never leaves its page. */
export function isAllowedNavigation(url: string, origin: string = APP_ORIGIN): boolean {
  return originOf(url) === origin
}

/** Only what a page needs of itself: its own scheme, and blobs and data it made. Development tools serve themselves. */
export function isAllowedRequest(url: string, origin: string = APP_ORIGIN): boolean {
  const scheme = /^([a-z][a-z0-9+.-]*):/i.exec(url)?.[1]?.toLowerCase()
  if (scheme === 'data' || scheme === 'devtools') return true
  if (scheme === 'blob') return originOf(url.slice('blob:'.length)) === origin
  return originOf(url) === origin
}

/** Copying a table to the clipboard is the only permission there is. */
export function allowPermission(name: string, requestingUrl: string, origin: string = APP_ORIGIN): boolean {
  return name === 'clipboard-sanitized-write' && originOf(requestingUrl) === origin
}

/**
 * Origin of a URL as `scheme://host[:port]`; null when it is not a URL or carries credentials.
 * `URL.origin` is 'null' for a scheme the engine does not know, so it is put together here.
 */
export function originOf(text: string): string | null {
  if (!URL.canParse(text)) return null
  const url = new URL(text)
  if (url.username !== '' || url.password !== '' || url.host === '') return null
  return `${url.protocol}//${url.host}`
}
