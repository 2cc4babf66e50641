/**
 * One file of the built page as an answer: the same function behind the app scheme, the loopback server and the tests.
 */
import { readFile, realpath } from 'node:fs/promises'
import path from 'node:path'
import { CONTENT_SECURITY_POLICY } from './policy'

export interface Served {
  readonly status: 200 | 404
  readonly headers: Readonly<Record<string, string>>
  readonly body: Uint8Array
}

const TYPES: Readonly<Record<string, string>> = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.mjs': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.svg': 'image/svg+xml',
  '.png': 'image/png',
  '.ico': 'image/x-icon',
  '.woff2': 'font/woff2',
  '.wasm': 'application/wasm',
  '.md': 'text/plain; charset=utf-8',
  '.txt': 'text/plain; charset=utf-8',
}

/** Headers every answer carries: the policy, and isolation so that threads may share memory. */
export const COMMON_HEADERS: Readonly<Record<string, string>> = {
  'content-security-policy': CONTENT_SECURITY_POLICY,
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-embedder-policy': 'require-corp',
  'cross-origin-resource-policy': 'same-origin',
  'x-content-type-options': 'nosniff',
  'referrer-policy': 'no-referrer',
}

/**
 * The file under `root` that a URL path names.
 *
 * @param root folder of the built page
 * @param urlPath path of the URL, percent-encoded as it came, with or without a query; `/` is the page itself
 * @returns 200 with the file, or 404 for anything that is not a plain file of a known type inside `root`
 */
export async function serveFile(root: string, urlPath: string): Promise<Served> {
  const relative = relativeName(urlPath)
  if (relative === null) return notFound()
  const type = TYPES[path.posix.extname(relative).toLowerCase()]
  if (type === undefined) return notFound()
  try {
    const base = await realpath(root)
    // A link inside the folder may point out of it: what counts is where the file really lies.
    const file = await realpath(path.join(base, ...relative.split('/')))
    if (!file.startsWith(base + path.sep)) return notFound()
    const body = await readFile(file)
    // Built names carry a hash of their content; the page itself does not.
    const caching = relative.startsWith('assets/') ? 'public, max-age=31536000, immutable' : 'no-cache'
    return { status: 200, headers: { ...COMMON_HEADERS, 'content-type': type, 'cache-control': caching }, body }
  } catch {
    return notFound()
  }
}

/** Name relative to the root with forward slashes, or null when the path is not one we could have given out. */
export function relativeName(urlPath: string): string | null {
  const raw = urlPath.replace(/[?#].*$/s, '')
  let name: string
  try {
    name = decodeURIComponent(raw)
  } catch {
    return null
  }
  if (!name.startsWith('/')) return null
  if (name === '/') return 'index.html'
  const parts = name.slice(1).split('/')
  // Letters, digits and a few marks are all a built file name needs; a leading dot, a backslash, a colon or NUL is not.
  return parts.every((part) => /^[A-Za-z0-9_~@-][A-Za-z0-9_.~@-]*$/.test(part)) ? parts.join('/') : null
}

function notFound(): Served {
  return {
    status: 404,
    headers: { ...COMMON_HEADERS, 'content-type': 'text/plain; charset=utf-8', 'cache-control': 'no-store' },
    body: new TextEncoder().encode('Not found.\n'),
  }
}
