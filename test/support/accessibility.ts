import axe from 'axe-core'
import type { Page } from 'playwright-core'

/** What breaks WCAG 2.2 A and AA on the page as it stands, by axe-core: rule and elements; empty where nothing does. */
export async function violations(page: Page): Promise<readonly string[]> {
  await page.evaluate(axe.source)
  return page.evaluate(async () => {
    const { axe: engine } = globalThis as unknown as { axe: typeof import('axe-core') }
    const result = await engine.run(document, { runOnly: ['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'] })
    return result.violations.map(
      ({ id, nodes }) => `${id}: ${nodes.map((node) => node.html.slice(0, 160)).join(' | ')}`,
    )
  })
}
