/**
 * Bundles one part into a folder: `node bundlePart.mjs app|renderer FOLDER`.
 *
 * A process of its own (bundlePart in bundle.mjs starts it), because the bundler and the compiler of components read NODE_ENV when
 * they are loaded: bytes must not depend on what else a process has loaded before, or on whether tests run in it.
 */
import { rmSync } from 'node:fs'
import path from 'node:path'
import { tell } from './root.mjs'

const [part, folder] = process.argv.slice(2)
process.env['NODE_ENV'] = 'production'
try {
  if (folder === undefined || (part !== 'app' && part !== 'renderer'))
    throw new Error('Use: bundlePart.mjs app|renderer FOLDER')
  const outDir = path.resolve(folder, part)
  rmSync(outDir, { recursive: true, force: true })
  const { build } = await import('vite')
  for (const config of await configsOf(part)) await build({ ...config, build: { ...config.build, outDir } })
} catch (error) {
  tell(error instanceof Error ? error.message : String(error))
  process.exitCode = 1
}

/** @param {import('./stale.mjs').Part} part @returns {Promise<readonly import('vite').InlineConfig[]>} */
async function configsOf(part) {
  if (part === 'renderer') return [(await import('../vite.renderer.mjs')).rendererConfig()]
  const { APP_ENTRIES, appConfig } = await import('../vite.app.mjs')
  return APP_ENTRIES.map(appConfig)
}
