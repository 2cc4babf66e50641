import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest'
import { CONTENT_SECURITY_POLICY } from '../../app/policy'
import { describeInChromium, launchChromium } from '../support/chromium'
import { openDesktopPage, type DesktopPage } from '../support/desktopPage'
import { documentOf } from '../support/plans'

describeInChromium('the desktop window', () => {
  let browser: Browser
  let desktop: DesktopPage
  let folder = ''

  beforeAll(async () => {
    browser = await launchChromium()
    folder = await mkdtemp(path.join(tmpdir(), 'ringwright-desktop-'))
  })
  afterAll(async () => {
    await browser.close()
    await rm(folder, { recursive: true, force: true })
  })
  beforeEach(async () => {
    desktop = await openDesktopPage(browser)
    await desktop.page.locator('h1').waitFor()
    return () => desktop.context.close()
  })

  async function waitForShown(title: string, edited: boolean): Promise<void> {
    await expect.poll(() => desktop.shown.at(-1), { timeout: 20_000 }).toMatchObject({ title, edited })
  }

  async function rename(title: string): Promise<void> {
    await desktop.page.locator('h1 button').click()
    await desktop.page.locator('h1 input').fill(title)
    await desktop.page.locator('h1 input').press('Tab')
  }

  it('opens a plan, saves the change to the same file, and reopens it', async () => {
    const file = path.join(folder, 'my plan.ringwright.json')
    await writeFile(file, JSON.stringify(documentOf({ title: 'First title', unknownKey: { kept: [1, 2.5] } })))

    desktop.dialogAnswers.push(file)
    await desktop.command('file.open')
    await waitForShown('First title', false)

    await rename('Second title')
    await waitForShown('Second title', true)
    await desktop.command('file.save')
    await waitForShown('Second title', false)
    const saved: unknown = JSON.parse(await readFile(file, 'utf8'))
    expect(saved).toMatchObject({ title: 'Second title', unknownKey: { kept: [1, 2.5] }, nozzle: { diameter: 0.03 } })
    expect(await readdir(folder)).toEqual(['my plan.ringwright.json'])

    await rename('Third title')
    await waitForShown('Third title', true)
    await desktop.command('edit.undo')
    await waitForShown('Second title', false)

    desktop.dialogAnswers.push(file)
    await desktop.command('file.open')
    await waitForShown('Second title', false)
    expect(desktop.dialogAnswers).toEqual([])
  })

  it('saves a new plan where the dialog says, with the ending added', async () => {
    await rename('Fresh plan')
    desktop.dialogAnswers.push(path.join(folder, 'fresh'))
    await desktop.command('file.save')
    await waitForShown('Fresh plan', false)
    const text = await readFile(path.join(folder, 'fresh.ringwright.json'), 'utf8')
    expect(JSON.parse(text)).toMatchObject({ format: 'ringwright-plan', title: 'Fresh plan' })
  })

  it('opens a file that the system gives it, and saves back to it', async () => {
    const file = path.join(folder, 'given.ringwright.json')
    await writeFile(file, JSON.stringify(documentOf({ title: 'Given title' })))
    await desktop.give(file)
    await waitForShown('Given title', false)
    await rename('Changed title')
    await waitForShown('Changed title', true)
    await desktop.command('file.save')
    await waitForShown('Changed title', false)
    expect(JSON.parse(await readFile(file, 'utf8'))).toMatchObject({ title: 'Changed title' })
  })

  it('tells its version and the terms of everything it holds', async () => {
    await desktop.command('help.about')
    const dialog = desktop.page.getByRole('dialog', { name: 'About Ringwright' })
    await dialog.getByText(/^Version \d+\.\d+\.\d+$/).waitFor({ timeout: 20_000 })
    await dialog.getByText(/^three 0\./).click()
    await dialog.getByText(/three\.js authors/i).waitFor()
    await dialog.getByText('LICENSES.chromium.html').waitFor()
    expect(desktop.errors).toEqual([])
  })

  it('shows a sentence when a file cannot be opened', async () => {
    desktop.dialogAnswers.push(path.join(folder, 'gone.json'))
    await desktop.command('file.open')
    await desktop.page.getByText('“gone.json” could not be opened because').waitFor({ timeout: 20_000 })
  })

  it('lives under the policy: no refused script or style, no request outside its origin, isolated memory', async () => {
    const response = await desktop.page.reload()
    expect(await response?.headerValue('content-security-policy')).toBe(CONTENT_SECURITY_POLICY)
    await waitForShown(desktop.shown.at(-1)?.title ?? '', false)
    expect(await desktop.page.evaluate(() => globalThis.crossOriginIsolated)).toBe(true)
    expect(desktop.strayRequests).toEqual([])
    expect(desktop.errors).toEqual([])
  })

  it('does not run a script or a style written into the page', async () => {
    const ran = await desktop.page.evaluate(async () => {
      const script = document.createElement('script')
      script.textContent = 'globalThis.planted = true'
      document.head.append(script)
      const holder = document.createElement('div')
      holder.innerHTML = '<p id="stray" style="display: none">x</p><img src="x:" onerror="globalThis.planted = true">'
      document.body.append(holder)
      await new Promise((resolve) => setTimeout(resolve, 50))
      const stray = document.getElementById('stray')
      return { script: Reflect.get(globalThis, 'planted'), display: stray && getComputedStyle(stray).display }
    })
    expect(ran).toEqual({ script: undefined, display: 'block' })
    expect(desktop.errors.join('\n')).toMatch(/Content Security Policy/)
  })

  it('gives the page one bridge with four verbs, and refuses channels the contract does not have', async () => {
    const seen = await desktop.page.evaluate(async () => {
      const bridge: unknown = Reflect.get(globalThis, 'bridge')
      if (typeof bridge !== 'object' || bridge === null) return null
      const request: unknown = Reflect.get(bridge, 'request')
      const ask = (channel: unknown) => (typeof request === 'function' ? request(channel, '/etc/passwd') : null)
      return {
        verbs: Object.keys(bridge),
        unknown: await ask('plan:delete'),
        dropped: await ask('ringwright:dropped'),
        node: ['require', 'process', 'module', 'electron', 'ipcRenderer'].filter((name) => name in globalThis),
      }
    })
    const refused = { ok: false, error: { code: 'channel', message: expect.any(String) } }
    expect(seen).toEqual({
      verbs: ['request', 'openDropped', 'onCommand', 'onGiven'],
      unknown: refused,
      dropped: refused,
      node: [],
    })
  })
})
