/** npm run batch: the headless runner, built first when its sources are newer. */
import { endWithParent } from './scripts/parent.mjs'
import { isStale } from './scripts/stale.mjs'
import { tell } from './scripts/root.mjs'

endWithParent()
try {
  if (isStale('app')) {
    const { ensureInstalled } = await import('./scripts/install.mjs')
    const { ensureBuilt } = await import('./scripts/bundle.mjs')
    await ensureInstalled()
    await ensureBuilt(['app'])
  }
  const runner = new URL('../dist/app/batch.mjs', import.meta.url)
  const { main } = await import(runner.href)
  process.exitCode = await main(process.argv.slice(2))
} catch (error) {
  tell(error instanceof Error ? error.message : String(error))
  process.exitCode = 1
}
