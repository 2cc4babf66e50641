import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { request as httpRequest } from 'node:http'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { CONTENT_SECURITY_POLICY } from '../../app/policy'
import { refusal, startServer, type RunningServer } from '../../app/serve'

let root = ''
let server: RunningServer

beforeAll(async () => {
  root = await mkdtemp(path.join(tmpdir(), 'ringwright-loopback-'))
  await writeFile(path.join(root, 'index.html'), 'page')
  server = await startServer({ root, port: 0 })
})
afterAll(async () => {
  await server.close()
  await rm(root, { recursive: true, force: true })
})

interface Reply {
  readonly status: number
  readonly headers: Readonly<Record<string, unknown>>
  readonly body: string
}

/** A request as it is written here: nothing tidies its path or its headers. */
function ask(asked: { method?: string; path?: string; headers?: Record<string, string> }): Promise<Reply> {
  return new Promise((resolve, reject) => {
    const sent = httpRequest(
      { host: '127.0.0.1', port: server.port, method: 'GET', path: '/', ...asked },
      (response) => {
        const chunks: Buffer[] = []
        response.on('data', (chunk: Buffer) => chunks.push(chunk))
        response.on('end', () =>
          resolve({
            status: response.statusCode ?? 0,
            headers: response.headers,
            body: Buffer.concat(chunks).toString(),
          }),
        )
      },
    )
    sent.on('error', reject)
    sent.end()
  })
}

describe('the loopback server', () => {
  it('serves the page on 127.0.0.1 with the policy and the isolation headers', async () => {
    expect(server.address).toBe(`http://127.0.0.1:${server.port}/`)
    const reply = await ask({})
    expect(reply.status).toBe(200)
    expect(reply.body).toBe('page')
    expect(reply.headers).toMatchObject({
      'content-security-policy': CONTENT_SECURITY_POLICY,
      'cross-origin-opener-policy': 'same-origin',
      'cross-origin-embedder-policy': 'require-corp',
      'x-content-type-options': 'nosniff',
      'content-length': '4',
    })
  })

  it('answers HEAD with the headers alone', async () => {
    const reply = await ask({ method: 'HEAD' })
    expect(reply.status).toBe(200)
    expect(reply.body).toBe('')
    expect(reply.headers['content-length']).toBe('4')
  })

  it.each([
    ['a name that resolves to this computer', { headers: { host: 'evil.example.org' } }, 403],
    ['our address with another port', { headers: { host: '127.0.0.1:1' } }, 403],
    ['a request sent by another site', { headers: { origin: 'https://evil.example.org' } }, 403],
    ['a request sent from nowhere', { headers: { origin: 'null' } }, 403],
    ['POST', { method: 'POST' }, 405],
    ['PUT', { method: 'PUT' }, 405],
    ['DELETE', { method: 'DELETE' }, 405],
    ['OPTIONS', { method: 'OPTIONS' }, 405],
    ['a path out of the folder', { path: '/../index.html' }, 404],
    ['an encoded path out of the folder', { path: '/%2e%2e/index.html' }, 404],
    ['a whole URL as the path', { path: 'http://evil.example.org/' }, 404],
  ])('turns %s away', async (_what, asked, status) => {
    const reply = await ask(asked)
    expect(reply.status).toBe(status)
    expect(reply.body).not.toContain('page')
  })

  it('takes a free port and says so when the one wished for is in use', async () => {
    const taken = createServer()
    await new Promise<void>((resolve) => taken.listen({ host: '127.0.0.1', port: 0 }, resolve))
    const address = taken.address()
    const port = typeof address === 'object' && address !== null ? address.port : 0
    const other = await startServer({ root, port })
    expect(other.moved).toBe(true)
    expect(other.port).not.toBe(port)
    await other.close()
    await new Promise((resolve) => taken.close(resolve))
  })

  it('listens on the loopback address alone', async () => {
    const again = await startServer({ root, port: 0 })
    expect(again.moved).toBe(false)
    expect(new URL(again.address).hostname).toBe('127.0.0.1')
    await again.close()
    await expect(fetch(again.address)).rejects.toThrow()
  })
})

describe('refusal', () => {
  it('lets our own page ask, by number or by name', () => {
    expect(refusal(80, { method: 'GET', host: '127.0.0.1:80', origin: undefined })).toBeNull()
    expect(refusal(80, { method: 'GET', host: 'localhost:80', origin: 'http://localhost:80' })).toBeNull()
  })

  it('needs a host', () => {
    expect(refusal(80, { method: 'GET', host: undefined, origin: undefined })?.status).toBe(403)
  })
})
