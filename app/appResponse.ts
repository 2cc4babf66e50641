/**
 * The built page as answers to the window's own scheme.
 */
import { APP_ORIGIN, originOf } from './policy'
import { serveFile } from './serveFile'

/** @param method only GET and HEAD are answered @param url whole URL of the request @param origin where the page lives */
export async function appResponse(
  root: string,
  method: string,
  url: string,
  origin: string = APP_ORIGIN,
): Promise<Response> {
  const ours = originOf(url) === origin && (method === 'GET' || method === 'HEAD')
  // '' is a path that names nothing: it is answered as not found, with the headers every answer has.
  const { status, headers, body } = await serveFile(root, ours ? new URL(url).pathname : '')
  return new Response(method === 'HEAD' ? null : Buffer.from(body), { status, headers })
}
