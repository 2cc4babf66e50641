/** npm run build: everything, whether or not it is stale. */
import { build } from './scripts/bundle.mjs'
import { ensureInstalled } from './scripts/install.mjs'
import { pageWeightLine } from './scripts/pageWeight.mjs'
import { tell } from './scripts/root.mjs'

try {
  await ensureInstalled()
  await build('app')
  await build('renderer')
  tell(pageWeightLine())
} catch (error) {
  tell(error instanceof Error ? error.message : String(error))
  process.exitCode = 1
}
