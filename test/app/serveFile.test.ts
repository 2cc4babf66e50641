import fc from 'fast-check'
import { mkdir, mkdtemp, rm, symlink, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { appResponse } from '../../app/appResponse'
import { CONTENT_SECURITY_POLICY } from '../../app/policy'
import { relativeName, serveFile } from '../../app/serveFile'

const SECRET = 'outside the root'
let folder = ''
let root = ''

beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright serve '))
  root = path.join(folder, 'page')
  await mkdir(path.join(root, 'assets'), { recursive: true })
  await writeFile(path.join(root, 'index.html'), '<!doctype html>page')
  await writeFile(path.join(root, 'assets', 'index-Ab_1.js'), 'script')
  await writeFile(path.join(root, 'assets', 'field.wasm'), 'wasm')
  await writeFile(path.join(root, '.hidden.js'), SECRET)
  await writeFile(path.join(root, 'secret.key'), SECRET)
  await writeFile(path.join(folder, 'secret.js'), SECRET)
  await mkdir(path.join(folder, 'page-beside'))
  await writeFile(path.join(folder, 'page-beside', 'secret.js'), SECRET)
  await symlink(path.join(folder, 'secret.js'), path.join(root, 'link.js'))
  await symlink(folder, path.join(root, 'up'))
})
afterAll(() => rm(folder, { recursive: true, force: true }))

async function textAt(urlPath: string): Promise<string> {
  return new TextDecoder().decode((await serveFile(root, urlPath)).body)
}

describe('serveFile', () => {
  it('answers / with the page, under the policy, isolated, and not to be kept', async () => {
    const served = await serveFile(root, '/')
    expect(served.status).toBe(200)
    expect(await textAt('/')).toBe('<!doctype html>page')
    expect(served.headers).toEqual({
      'content-security-policy': CONTENT_SECURITY_POLICY,
      'cross-origin-opener-policy': 'same-origin',
      'cross-origin-embedder-policy': 'require-corp',
      'cross-origin-resource-policy': 'same-origin',
      'x-content-type-options': 'nosniff',
      'referrer-policy': 'no-referrer',
      'content-type': 'text/html; charset=utf-8',
      'cache-control': 'no-cache',
    })
  })

  it.each([
    ['/assets/index-Ab_1.js', 'text/javascript; charset=utf-8'],
    ['/assets/index-Ab_1.js?v=1', 'text/javascript; charset=utf-8'],
    ['/assets/field.wasm', 'application/wasm'],
  ])('gives %s its type and lets it be kept', async (urlPath, type) => {
    const served = await serveFile(root, urlPath)
    expect(served.status).toBe(200)
    expect(served.headers['content-type']).toBe(type)
    expect(served.headers['cache-control']).toContain('immutable')
  })

  it.each([
    ['a step up', '/../secret.js'],
    ['an encoded step up', '/%2e%2e/secret.js'],
    ['an encoded slash', '/..%2fsecret.js'],
    ['a backslash', '/..\\secret.js'],
    ['an encoded backslash', '/..%5csecret.js'],
    ['a step up from inside', '/assets/../../secret.js'],
    ['a folder beside with the same start', '/../page-beside/secret.js'],
    ['NUL', '/index.html%00.js'],
    ['an absolute path', '//etc/hosts'],
    ['a drive', '/C:/secret.js'],
    ['a stream', '/index.html::$DATA'],
    ['a link that points outside', '/link.js'],
    ['a folder link that points outside', '/up/secret.js'],
    ['a hidden file', '/.hidden.js'],
    ['a kind of file a page has no use for', '/secret.key'],
    ['a folder: there is no listing', '/assets'],
    ['a folder with its slash', '/assets/'],
    ['a broken escape', '/%zz'],
    ['no leading slash', 'index.html'],
    ['nothing', ''],
    ['a whole URL', 'http://127.0.0.1/index.html'],
    ['a file that is not there', '/missing.js'],
  ])('does not answer %s', async (_what, urlPath) => {
    const served = await serveFile(root, urlPath)
    expect(served.status).toBe(404)
    expect(served.headers['content-security-policy']).toBe(CONTENT_SECURITY_POLICY)
    expect(new TextDecoder().decode(served.body)).toBe('Not found.\n')
  })

  it('never leaves its root, whatever path is asked for', async () => {
    const piece = fc.constantFrom(
      '..',
      '.',
      '%2e%2e',
      '%2E.',
      'up',
      'page-beside',
      'secret.js',
      'assets',
      '',
      '%00',
      '\\',
      '%5c..',
    )
    const anyPath = fc.oneof(
      fc.array(piece, { maxLength: 6 }).map((parts) => `/${parts.join('/')}`),
      fc.array(piece, { maxLength: 6 }).map((parts) => `/${parts.join('%2f')}`),
      fc.string({ unit: 'binary' }).map((text) => `/${text}`),
      fc.webPath(),
    )
    await fc.assert(
      fc.asyncProperty(anyPath, async (urlPath) => {
        const { status } = await serveFile(root, urlPath)
        expect([200, 404]).toContain(status)
        expect(await textAt(urlPath)).not.toContain(SECRET)
      }),
    )
  })
})

describe('relativeName', () => {
  it('is null or a path whose every part starts with a letter, digit or mark of a name', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), (text) => {
        const name = relativeName(`/${text}`)
        if (name === null) return
        expect(path.posix.normalize(name)).toBe(name)
        expect(name.split('/').some((part) => part === '' || part.startsWith('.'))).toBe(false)
      }),
    )
  })
})

describe('appResponse', () => {
  it('answers our own origin', async () => {
    const response = await appResponse(root, 'GET', 'app://main/')
    expect(response.status).toBe(200)
    expect(await response.text()).toBe('<!doctype html>page')
    expect(response.headers.get('content-security-policy')).toBe(CONTENT_SECURITY_POLICY)
  })

  it('sends no body for HEAD', async () => {
    const response = await appResponse(root, 'HEAD', 'app://main/')
    expect(response.status).toBe(200)
    expect(await response.text()).toBe('')
  })

  it.each([
    ['another host', 'GET', 'app://other/'],
    ['a look-alike host', 'GET', 'app://main.example.org/'],
    ['a posted form', 'POST', 'app://main/'],
    ['text that is not a URL', 'GET', 'main'],
  ])('answers %s with not found', async (_what, method, url) => {
    expect((await appResponse(root, method, url)).status).toBe(404)
  })
})
