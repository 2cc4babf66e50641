/** npm run dev: the page on 127.0.0.1, rebuilt as its sources change. */
import { ensureInstalled } from './scripts/install.mjs'
import { endWithParent } from './scripts/parent.mjs'
import { tell } from './scripts/root.mjs'

endWithParent()
try {
  await ensureInstalled()
  const { createServer } = await import('vite')
  const { rendererConfig } = await import('./vite.renderer.mjs')
  const server = await createServer({ ...rendererConfig(), logLevel: 'info' })
  await server.listen()
  server.printUrls()
} catch (error) {
  tell(error instanceof Error ? error.message : String(error))
  process.exitCode = 1
}
