/**
 * The browser face: the built page on this computer's loopback address, for this computer only.
 */
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http'
import { COMMON_HEADERS, serveFile } from './serveFile'

const LOOPBACK = '127.0.0.1'

export interface ServeOptions {
  /** Folder of the built page. */
  readonly root: string
  /** Port wished for; a free one is taken when it is in use. 0 asks for a free one. */
  readonly port: number
}

export interface RunningServer {
  readonly address: string
  readonly port: number
  /** True when the port wished for was in use and another was taken. */
  readonly moved: boolean
  close(): Promise<void>
}

/**
 * Serve the page on 127.0.0.1.
 *
 * @throws when no port at all can be opened
 */
export async function startServer(options: ServeOptions): Promise<RunningServer> {
  const server = createServer((request, response) => {
    answer(options.root, portOf(server), request, response).catch(() => response.destroy())
  })
  let moved = false
  try {
    await listen(server, options.port)
  } catch (error) {
    if (!isPortRefusal(error) || options.port === 0) throw error
    moved = true
    await listen(server, 0)
  }
  const port = portOf(server)
  return { address: `http://${LOOPBACK}:${port}/`, port, moved, close: () => close(server) }
}

/**
 * Why a request is not answered, or null when it may be. A page elsewhere on the web that has its own name resolve to
 * 127.0.0.1 shows that name as Host, and a page that posts here shows its Origin: both are turned away.
 */
export function refusal(
  port: number,
  request: { readonly method: string; readonly host: string | undefined; readonly origin: string | undefined },
): { readonly status: 403 | 405; readonly text: string } | null {
  const hosts = [`${LOOPBACK}:${port}`, `localhost:${port}`]
  if (request.host === undefined || !hosts.includes(request.host)) return { status: 403, text: 'Wrong host.\n' }
  if (request.origin !== undefined && !hosts.some((host) => request.origin === `http://${host}`)) {
    return { status: 403, text: 'Wrong origin.\n' }
  }
  if (request.method !== 'GET' && request.method !== 'HEAD') return { status: 405, text: 'Only GET and HEAD.\n' }
  return null
}

async function answer(root: string, port: number, request: IncomingMessage, response: ServerResponse): Promise<void> {
  const { method = 'GET', url = '/', headers } = request
  const refused = refusal(port, { method, host: headers.host, origin: headers.origin })
  if (refused !== null) {
    const allow = refused.status === 405 ? { allow: 'GET, HEAD' } : {}
    response.writeHead(refused.status, { ...COMMON_HEADERS, 'content-type': 'text/plain; charset=utf-8', ...allow })
    response.end(method === 'HEAD' ? undefined : refused.text)
    return
  }
  const served = await serveFile(root, url)
  response.writeHead(served.status, { ...served.headers, 'content-length': served.body.byteLength })
  response.end(method === 'HEAD' ? undefined : served.body)
}

function listen(server: Server, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject)
    server.listen({ host: LOOPBACK, port, exclusive: true }, () => {
      server.off('error', reject)
      resolve()
    })
  })
}

function close(server: Server): Promise<void> {
  return new Promise((resolve) => {
    server.close(() => resolve())
    server.closeAllConnections()
  })
}

function portOf(server: Server): number {
  const address = server.address()
  return typeof address === 'object' && address !== null ? address.port : 0
}

function isPortRefusal(error: unknown): boolean {
  const code = errorCode(error)
  return code === 'EADDRINUSE' || code === 'EACCES'
}

function errorCode(error: unknown): string {
  return error instanceof Error && 'code' in error && typeof error.code === 'string' ? error.code : ''
}
